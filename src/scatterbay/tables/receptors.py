"""Preset attenuation behind the patient: lead that stands for a receptor and what carries it."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

from scatterbay.tables.files import read_table, split_names


@dataclass(frozen=True)
class ReceptorPreset:
    """A preset, other names for it, its make-up as a scenario would write it, what it is, and its source."""

    name: str
    also: tuple[str, ...]
    make_up: str
    what: str
    source: str


@cache
def receptors() -> dict[str, ReceptorPreset]:
    """Presets by name, in the order of the table."""
    columns = ("name", "also", "make_up", "what", "source")
    return {
        name: ReceptorPreset(name, split_names(also), *rest)
        for name, also, *rest in read_table("receptors.csv", columns).rows
    }
