"""Nuclides of sealed sources: half-life and photon lines."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

import numpy as np
from numpy.typing import NDArray

from scatterbay.errors import UsageError
from scatterbay.tables.files import read_table


@dataclass(frozen=True)
class Nuclide:
    """A nuclide: half-life [s], photon lines (n,) [keV] and photons per decay (n,), from 20 keV up."""

    name: str
    half_life: float
    lines_kev: NDArray[np.float64]
    per_decay: NDArray[np.float64]
    evaluation: str


@cache
def names() -> tuple[str, ...]:
    """Names of the nuclides in the table."""
    return tuple(read_table("nuclides.csv", ("nuclide", "half_life_s", "evaluation")).texts("nuclide"))


@cache
def nuclide(name: str) -> Nuclide:
    """Nuclide by name, such as ``Ir-192``.

    Raises
    ------
    UsageError : the table has no nuclide of that name.
    """
    if name not in names():
        raise UsageError(f"'{name}' is not in the table of nuclides: {', '.join(names())}")
    table = read_table("nuclides.csv", ("nuclide", "half_life_s", "evaluation"))
    row = names().index(name)
    lines = read_table("nuclide-lines.csv", ("nuclide", "energy_kev", "per_decay"))
    mine = np.array([text == name for text in lines.texts("nuclide")])
    return Nuclide(
        name,
        table.numbers("half_life_s")[row],
        np.array(lines.numbers("energy_kev"))[mine],
        np.array(lines.numbers("per_decay"))[mine],
        table.texts("evaluation")[row],
    )


def highest_line_kev(name: str) -> float:
    """Energy [keV] of the highest line that makes up more than 1e-4 of the photons."""
    found = nuclide(name)
    strong = found.per_decay > 1e-4 * found.per_decay.sum()
    return float(found.lines_kev[strong].max())
