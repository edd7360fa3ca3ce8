"""What comes to light while a scenario is built: problems, and what was assumed for the author."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import TypeVar

from scatterbay.errors import Problem
from scatterbay.scenario.model.base import Broken
from scatterbay.scenario.model.messages import place
from scatterbay.scenario.parts import Assumption
from scatterbay.scenario.yaml_tree import Path, Tree
from scatterbay.units import TextError, nearest

T = TypeVar("T")
Section = Mapping[str, T | Broken] | Broken


class Findings:
    """Collects problems and assumptions."""

    def __init__(self, tree: Tree) -> None:
        self.tree = tree
        self.problems: list[Problem] = []
        self._assumed: dict[tuple[str, str], list[str]] = {}

    def wrong(self, path: Path, message: str, hint: str = "", on_key: bool = False) -> None:
        """Notes a problem at a place in the file."""
        self.problems.append(place(self.tree, path, TextError(message, hint), on_key))

    def unknown(self, path: Path, what: str, name: str, known: Iterable[str], on_key: bool = False) -> None:
        """Notes a name that nothing goes by."""
        names = list(known)
        near = nearest(name, names)
        hint = f"did you mean '{near}'? " if near else ""
        self.wrong(path, f"there is no {what} '{name}'", f"{hint}known: {', '.join(names) or 'none'}", on_key)

    def assume(self, topic: str, sentence: str, name: str = "") -> None:
        """Notes something filled in for the author; one sentence serves all the names it holds for."""
        names = self._assumed.setdefault((topic, sentence), [])
        names += [name] if name else []

    @property
    def assumptions(self) -> tuple[Assumption, ...]:
        """All that was assumed, in the order it came up."""
        return tuple(
            Assumption(topic, f"{sentence}: {', '.join(names)}." if names else f"{sentence}.")
            for (topic, sentence), names in self._assumed.items()
        )


def usable(section: Section[T]) -> dict[str, T]:
    """The entries of a section that were read."""
    if isinstance(section, Broken):
        return {}
    return {name: entry for name, entry in section.items() if not isinstance(entry, Broken)}


def names_in(section: Section[T]) -> tuple[str, ...] | None:
    """Every name a section gives, broken entries included; None where the section itself is broken."""
    return None if isinstance(section, Broken) else tuple(section)


def whole(entry: T | Broken | None) -> T | None:
    """The entry, or None where it was refused."""
    return None if isinstance(entry, Broken) else entry
