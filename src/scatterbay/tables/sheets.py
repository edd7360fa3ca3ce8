"""Thicknesses that are put on a wall, as they are ordered."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

from scatterbay.tables.files import read_table


@dataclass(frozen=True)
class SheetSold:
    """A sheet, plate or cast of a material: the make-up it is ordered as, and where that is from."""

    material: str
    sold_as: str
    source: str


@cache
def sheets_sold() -> dict[str, tuple[SheetSold, ...]]:
    """By material, in the order of the table: thinnest first."""
    found: dict[str, tuple[SheetSold, ...]] = {}
    for material, sold_as, source in read_table("sheets.csv", ("material", "sold_as", "source")).rows:
        found[material] = (*found.get(material, ()), SheetSold(material, sold_as, source))
    return found
