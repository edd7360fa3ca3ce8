"""Attenuation and energy absorption of the elements and of air, as tabulated by NIST."""

from __future__ import annotations

from functools import cache
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from scatterbay.tables.files import read_table

LOWEST_KEV, HIGHEST_KEV = 10.0, 3000.0

Array = NDArray[np.float64]


class Coefficients(NamedTuple):
    """Tabulated rows; an edge is a pair of rows at the same energy, below it first."""

    energy_kev: Array
    """Energies, shape (n,) [keV]."""
    attenuation: Array
    """mu/rho, shape (n,) [cm2/g]."""
    absorption: Array
    """mu_en/rho, shape (n,) [cm2/g]."""


@cache
def element(z: int) -> Coefficients:
    """NIST rows of the element with atomic number z (1 to 92), 10 keV to 3 MeV."""
    rows = _elements()
    chosen = rows[rows[:, 0] == z]
    return Coefficients(chosen[:, 1], chosen[:, 2], chosen[:, 3])


@cache
def air() -> Coefficients:
    """NIST rows of dry air, 10 keV to 3 MeV."""
    table = read_table("air.csv", ("energy_kev", "mu_rho", "mu_en_rho"))
    energy, attenuation, absorption = (np.array(table.numbers(name)) for name in table.columns)
    return Coefficients(energy, attenuation, absorption)


@cache
def pair(z: int) -> tuple[Array, Array]:
    """Energies [keV] and mass coefficients of pair production [cm2/g], nuclear and electron field together."""
    rows = _pairs()
    chosen = rows[rows[:, 0] == z]
    return chosen[:, 1], chosen[:, 2]


@cache
def _elements() -> Array:
    table = read_table("attenuation.csv", ("z", "energy_kev", "mu_rho", "mu_en_rho"))
    return np.array([table.numbers(name) for name in table.columns]).T


@cache
def _pairs() -> Array:
    table = read_table("pair.csv", ("z", "energy_kev", "pair"))
    return np.array([table.numbers(name) for name in table.columns]).T
