"""What a scenario may take from shipped lists by name: rule sets, occupancy, container classes, receptors.

All of it is recalled or common practice, and says so in its source; local rules prevail over it.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, replace
from typing import TYPE_CHECKING, Protocol, TypeVar

from scatterbay.scenario.goals import goal
from scatterbay.scenario.make_ups import make_up
from scatterbay.scenario.parts import Goal, MakeUp
from scatterbay.units import Quantity, TextError, nearest, read

if TYPE_CHECKING:
    from scatterbay.tables.occupancy import Occupancy
    from scatterbay.tables.rules import Rule


@dataclass(frozen=True)
class ContainerClass:
    """A class of container: its highest ambient dose equivalent rates, and their source.

    At the surface, and at 50 mm and 1 m from the surface, which is not 1 m from the source; None: none is set.
    """

    name: str
    surface: Quantity
    at_50_mm: Quantity | None
    at_1_m: Quantity
    source: str


@dataclass(frozen=True)
class Receptor:
    """Preset attenuation behind the patient: its name, the layers that stand for it, and their source."""

    name: str
    make_up: MakeUp
    source: str


class _Named(Protocol):
    """An entry of a table that goes by several names."""

    @property
    def also(self) -> tuple[str, ...]: ...


_N = TypeVar("_N", bound=_Named)


def goals_from(text: str) -> tuple[Goal, ...]:
    """The design goals of an entry of a rule set, as ``NCRP 147: controlled area``; the colon may be left out.

    Each carries in ``source`` the set and entry, where they stand, and the quantity that the rule itself is
    stated in: the goal is judged by air kerma or H*(10).

    Raises
    ------
    TextError : no such set or entry; the nearest name is suggested.
    """
    from scatterbay.tables.rules import rules

    found = rules()
    sets = {rule_set: [entry for one, entry in found if one == rule_set] for rule_set, _ in found}
    said = " ".join(text.split())
    for rule_set in sorted(sets, key=len, reverse=True):
        rest = said.removeprefix(rule_set)
        if rest != said and rest[:1] in ("", ":", " "):
            entry = rest.lstrip(": ").strip()
            _check(entry, sets[rule_set], f"an entry of {rule_set}", max(text.find(entry), 0))
            return tuple(_goal(rule) for rule in found[rule_set, entry])
    _check(said.partition(":")[0].strip(), sets, "a rule set")
    raise AssertionError("a known rule set was not found")


def _goal(rule: Rule) -> Goal:
    stated = f"stated as {rule.stated}, {rule.averaging}"
    return replace(goal(rule.goal), source=f"{rule.rule_set}: {rule.entry} ({rule.source}; {stated})")


def occupancy_suggestion(space: str) -> Occupancy:
    """The occupancy factor suggested for a kind of space, such as ``corridor``, with its source; never applied.

    Raises
    ------
    TextError : the table has no such kind of space; the nearest is suggested.
    """
    from scatterbay.tables.occupancy import spaces

    return _look_up(space, spaces(), "a kind of space")


def container_class(name: str) -> ContainerClass:
    """The limits of a class of container: ``class P`` or ``P``, ``class M``, ``class F``, ``source changer``.

    Raises
    ------
    TextError : no such class; the nearest is suggested.
    """
    from scatterbay.tables.containers import containers

    found = _look_up(name, containers(), "a class of container")
    surface, near, at_1_m = (
        read(text, "ambient dose equivalent rate") if text else None
        for text in (found.surface, found.at_50_mm, found.at_1_m)
    )
    if surface is None or at_1_m is None:
        raise AssertionError(f"'{found.name}' lacks a limit that every class has")
    return ContainerClass(found.name, surface, near, at_1_m, found.source)


def receptor(name: str) -> Receptor:
    """The preset attenuation behind the patient of this name, such as ``table and receptor``.

    Raises
    ------
    TextError : no such preset; the nearest is suggested.
    """
    from scatterbay.tables.receptors import receptors

    found = _look_up(name, receptors(), "a preset behind the patient")
    return Receptor(found.name, make_up(found.make_up, open_allowed=False), found.source)


def _look_up(name: str, entries: Mapping[str, _N], what: str) -> _N:
    """The entry that goes by a name."""
    said = " ".join(name.split())
    for main, entry in entries.items():
        if said == main or said in entry.also:
            return entry
    others = [other for entry in entries.values() for other in entry.also]
    _check(said, entries, what, others=others)
    raise AssertionError("a known name was not found")


def _check(name: str, known: Iterable[str], what: str, start: int = 0, others: Iterable[str] = ()) -> None:
    """Refuse a name that is not among those known; ``others`` are as good, but not listed in the error."""
    listed = list(known)
    if name in listed:
        return
    near = nearest(name, [*listed, *others])
    hint = f"did you mean '{near}'? " if near else ""
    message = f"'{name}' is not {what}" if name else f"the name of {what} is missing"
    raise TextError(message, f"{hint}known: {', '.join(listed)}", start)
