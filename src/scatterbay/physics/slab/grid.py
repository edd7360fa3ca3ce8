"""The energies and angles at which a barrier is resolved."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache, cached_property

import numpy as np
from numpy.typing import NDArray

from scatterbay.physics.constants import ELECTRON_REST_ENERGY
from scatterbay.physics.medium import medium
from scatterbay.tables import shells

Array = NDArray[np.float64]

LOWEST_KEV, HIGHEST_KEV = 10.0, 1400.0
TWIN_OFFSET = 1e-5
GAUSS_ANGLES = 6
EXTRA_COSINES = (1.0, float(np.sqrt(0.5)), 0.5, float(np.cos(np.radians(75.0))))
"""Directions that carry answers (0, 45, 60 and 75 degrees) but no weight: nothing scatters into them."""
BLOCKS = 5

_DENSITY = ((10.0, 50.0, 14), (50.0, 140.0, 20), (140.0, 1400.0, 24))
_CLOSEST = 0.008


@dataclass(frozen=True)
class Grid:
    """Energies (falling) and directions for walls that hold the given elements with K edges.

    Each K edge is a pair of twin nodes; the K lines and the annihilation line are nodes. ``k_elements`` are
    atomic numbers, sorted.
    """

    k_elements: tuple[int, ...]

    @cached_property
    def energy_kev(self) -> Array:
        """Energies, shape (n,), falling [keV]."""
        special = [ELECTRON_REST_ENERGY]
        for z in self.k_elements:
            shell = shells.k_shell(z)
            edge = self.edges_kev[z]
            special += [edge * (1 - TWIN_OFFSET), edge * (1 + TWIN_OFFSET)]
            special += [e for e in shell.energies_kev if e > LOWEST_KEV] if shell else []
        fixed = np.array(sorted({*special, LOWEST_KEV, HIGHEST_KEV}))
        base = np.concatenate([np.geomspace(a, b, n, endpoint=False) for a, b, n in _DENSITY])
        far = np.abs(np.log(base[:, None] / fixed[None, :])).min(axis=1) > _CLOSEST
        return np.unique(np.concatenate([base[far], fixed]))[::-1].copy()

    @cached_property
    def edges_kev(self) -> dict[int, float]:
        """K edge of each of the elements [keV]."""
        return {z: medium(((z, 1.0),)).k_edges_kev[z] for z in self.k_elements}

    def stretch_of(self, energy_kev: Array) -> NDArray[np.int64]:
        """Number of the stretch between edges that each energy lies in, counted from the lowest."""
        return np.searchsorted(np.sort(np.array(list(self.edges_kev.values()))), energy_kev)

    @cached_property
    def stretch_bounds(self) -> tuple[NDArray[np.int64], NDArray[np.int64]]:
        """Index of the first (highest) and the last energy of each stretch."""
        falling = self.stretch_of(self.energy_kev)
        numbers = np.arange(len(self.k_elements) + 1)
        last = falling.size - 1 - np.searchsorted(falling[::-1], numbers, side="left")
        return falling.size - np.searchsorted(falling[::-1], numbers, side="right"), last

    @cached_property
    def cosines(self) -> Array:
        """Cosines of incoming directions: the Gauss nodes, then the extra ones; shape (a,)."""
        return np.concatenate([self.gauss[0], np.array(EXTRA_COSINES)])

    @cached_property
    def gauss(self) -> tuple[Array, Array]:
        """Gauss nodes and weights on (0, 1), shape (m,): the outgoing directions."""
        nodes, weights = np.polynomial.legendre.leggauss(GAUSS_ANGLES)
        return 0.5 * (nodes + 1.0), 0.5 * weights

    @cached_property
    def blocks(self) -> list[tuple[int, int]]:
        """Runs of energies (start, stop) that matrices are multiplied by: scattering never raises energy."""
        bounds = np.linspace(0, self.energy_kev.size, BLOCKS + 1).astype(int)
        return list(zip(bounds[:-1].tolist(), bounds[1:].tolist(), strict=True))


@cache
def grid_for(k_elements: tuple[int, ...]) -> Grid:
    """The grid for walls with these K-edge elements; one instance each."""
    return Grid(k_elements)
