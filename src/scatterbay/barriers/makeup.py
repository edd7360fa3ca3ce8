"""The physical content of a make-up, and the key under which its answer is kept."""

from __future__ import annotations

import hashlib
from collections.abc import Iterable
from dataclasses import dataclass
from functools import cache
from typing import Protocol

from scatterbay.physics.medium import medium
from scatterbay.resources import folder
from scatterbay.tables.materials import Material, material

METHOD_VERSION = 1
"""Raised whenever the slab method changes its numbers, so that kept answers are made anew."""

SMALLEST_SHARE = 0.005
"""Mass share from which an element's K edge gets its twin nodes."""

TABLES = ("attenuation.csv", "air.csv", "incoherent.csv", "coherent.csv", "k-shell.csv", "pair.csv", "elements.csv",
          "dose-conversion.csv")  # fmt: skip


class LayerLike(Protocol):
    """A layer as a scenario writes it."""

    @property
    def material(self) -> str: ...
    @property
    def thickness(self) -> object: ...


@dataclass(frozen=True)
class Sheet:
    """One layer by content: composition, density [g/cm3] and thickness [m]."""

    fractions: tuple[tuple[int, float], ...]
    density_g_cm3: float
    thickness: float


Sheets = tuple[Sheet, ...]
"""Layers in the order in which the radiation meets them."""


def sheet(name: str, thickness: float, defined: Iterable[Material] = ()) -> Sheet:
    """A sheet of a named material, thickness in m."""
    found = material(name, defined)
    return Sheet(found.fractions, found.density_g_cm3, thickness)


def merged(sheets: Sheets) -> Sheets:
    """Neighbouring sheets of the same stuff as one: a layer split in two gives the same answer, exactly."""
    result: list[Sheet] = []
    for one in sheets:
        if result and (result[-1].fractions, result[-1].density_g_cm3) == (one.fractions, one.density_g_cm3):
            one = Sheet(one.fractions, one.density_g_cm3, result.pop().thickness + one.thickness)
        result.append(one)
    return tuple(result)


def k_elements(sheets: Sheets) -> tuple[int, ...]:
    """Elements of a wall whose K edges the grid must resolve."""
    found = {
        z
        for one in sheets
        for z, edge in medium(one.fractions).k_edges_kev.items()
        if edge > 0.0 and dict(one.fractions)[z] >= SMALLEST_SHARE
    }
    return tuple(sorted(found))


def content_key(sheets: Sheets) -> str:
    """Digest of all that a kept answer depends on: the sheets, the tables and the method."""
    text = repr([(one.fractions, one.density_g_cm3, round(one.thickness, 12)) for one in sheets])
    return hashlib.sha256(f"{METHOD_VERSION} {_tables_digest()} {text}".encode()).hexdigest()[:32]


@cache
def _tables_digest() -> str:
    digest = hashlib.sha256()
    for name in TABLES:
        digest.update((folder("data") / name).read_bytes())
    return digest.hexdigest()
