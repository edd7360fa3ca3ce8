"""Occupancy factors suggested for kinds of space; never applied unasked."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

from scatterbay.tables.files import read_table, split_names


@dataclass(frozen=True)
class Occupancy:
    """A kind of space, other names for it, the factor suggested (as text, such as ``1/5``), and its source."""

    space: str
    also: tuple[str, ...]
    factor: str
    source: str

    @property
    def value(self) -> float:
        """The factor as a number."""
        top, _, bottom = self.factor.partition("/")
        return float(top) / float(bottom or "1")


@cache
def spaces() -> dict[str, Occupancy]:
    """Kinds of space by name, in the order of the table."""
    table = read_table("occupancy.csv", ("space", "also", "factor", "source"))
    return {
        space: Occupancy(space, split_names(also), factor, source)
        for space, also, factor, source in table.rows
    }
