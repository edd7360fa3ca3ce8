"""Highest dose rates allowed round containers of sealed sources, by class."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

from scatterbay.tables.files import read_table, split_names


@dataclass(frozen=True)
class ContainerLimits:
    """A class of container, other names for it, and its limits as text.

    ``surface``, ``at_50_mm``, ``at_1_m``: ambient dose equivalent rate at the surface and at these distances from
    the surface; empty where none is set. ``what``: which containers it is for.
    """

    name: str
    also: tuple[str, ...]
    surface: str
    at_50_mm: str
    at_1_m: str
    what: str
    source: str


@cache
def containers() -> dict[str, ContainerLimits]:
    """Classes by name, in the order of the table."""
    columns = ("name", "also", "surface", "at_50_mm", "at_1_m", "what", "source")
    return {
        name: ContainerLimits(name, split_names(also), *rest)
        for name, also, *rest in read_table("containers.csv", columns).rows
    }
