"""Incoherent scattering functions and form factors of the elements, over the momentum transfer x."""

from __future__ import annotations

from functools import cache

import numpy as np
from numpy.typing import NDArray

from scatterbay.tables.elements import symbols
from scatterbay.tables.files import Table, read_table

Array = NDArray[np.float64]


@cache
def momentum_nodes() -> Array:
    """Tabulated x = sin(theta/2)/wavelength, shape (n,) [1/angstrom]."""
    return np.array(_table("incoherent.csv").numbers("x"))


@cache
def incoherent_function(z: int) -> Array:
    """S(x, Z) at the nodes, shape (n,), electrons per atom (tends to Z)."""
    return np.array(_table("incoherent.csv").numbers(symbols()[z - 1]))


@cache
def form_factor(z: int) -> Array:
    """F(x, Z) at the nodes, shape (n,), electrons per atom (starts from Z)."""
    return np.array(_table("coherent.csv").numbers(symbols()[z - 1]))


def _table(name: str) -> Table:
    return read_table(name, ("x", *symbols()))
