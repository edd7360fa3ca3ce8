"""Slab matrices as the tests handle them: whole, without blocks, by plain linear algebra."""

from __future__ import annotations

import functools
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.physics.compton import scattered_energy
from scatterbay.physics.constants import PAIR_THRESHOLD
from scatterbay.physics.medium import Medium, medium
from scatterbay.physics.slab.grid import LOWEST_KEV, Grid, grid_for
from scatterbay.physics.slab.kernel import Kernel, build_kernel
from scatterbay.physics.slab.layer import THIN, Layer, build_layer
from scatterbay.tables.materials import material

Array = NDArray[np.float64]


@functools.cache
def kernel_of(name: str, beside: tuple[str, ...] = ()) -> tuple[Grid, Kernel]:
    """Kernel of a material on the grid for it and for the materials beside it."""
    everything = {z for other in (name, *beside) for z in medium(material(other).fractions).k_edges_kev}
    grid = grid_for(tuple(sorted(everything)))
    return grid, build_kernel(medium(material(name).fractions), grid)


@functools.cache
def layer_of(name: str, thickness: float, beside: tuple[str, ...] = ()) -> Layer:
    """A layer of a shipped material, thickness in m."""
    grid, kernel = kernel_of(name, beside)
    return build_layer(kernel, grid, material(name).density_g_cm3, thickness)


def doublings(kernel: Kernel, grid: Grid, density: float, thickness: float) -> int:
    """How often a thin start must be doubled to be this thick and start thin enough."""
    grazing = float(kernel.scattering.max()) * 100.0 * density * thickness / float(grid.gauss[0].min())
    return max(0, int(np.ceil(np.log2(grazing / THIN))))


@dataclass(frozen=True)
class Dense:
    """Matrices of a stack: photons out per photon in, and energy left inside per photon in [keV]."""

    grid: Grid
    transmitted: Array
    reflected: Array
    uncollided: Array
    absorbed: Array

    @property
    def gauss_rows(self) -> NDArray[np.int64]:
        """Rows whose incoming direction is a Gauss node."""
        n, a, m = self.grid.energy_kev.size, self.grid.cosines.size, self.grid.gauss[0].size
        return (np.arange(n)[:, None] * a + np.arange(m)).ravel()

    def under(self, top: Dense) -> Dense:
        """This stack under another: all orders of reflection between them by one dense solution."""
        rows = self.gauss_rows
        once = np.eye(rows.size) - self.reflected[rows] @ top.reflected[rows]
        lit = top.uncollided[:, None] * self.reflected
        down = np.linalg.solve(once.T, (top.transmitted + lit @ top.reflected[rows]).T).T
        up = lit + down @ self.reflected[rows]
        return Dense(
            self.grid,
            top.uncollided[:, None] * self.transmitted
            + down * self.uncollided[rows]
            + down @ self.transmitted[rows],
            top.reflected + up * top.uncollided[rows] + up @ top.transmitted[rows],
            top.uncollided * self.uncollided,
            top.absorbed
            + top.uncollided * self.absorbed
            + down @ self.absorbed[rows]
            + up @ top.absorbed[rows],
        )


def dense(layer: Layer, absorbed: Array | None = None) -> Dense:
    """A layer's own matrices."""
    inside = np.zeros(layer.uncollided.size) if absorbed is None else absorbed
    return Dense(layer.grid, layer.transmitted, layer.reflected, layer.uncollided, inside)


def left_per_gram(matter: Medium, energy: Array) -> Array:
    """Energy left at a collision times the cross section for it [keV cm2/g], photons under 10 keV counted as left."""
    parts, (lines, made) = matter.partials(energy), matter.fluorescence(energy)
    cosine, weights = np.polynomial.legendre.leggauss(600)
    recoil = np.empty(energy.size)
    for k, before in enumerate(energy):
        strength = matter.incoherent_shape.differential(np.full(600, before), cosine) * weights
        after = scattered_energy(np.full(600, before), cosine)
        recoil[k] = before - (strength @ np.where(after >= LOWEST_KEV, after, 0.0)) / strength.sum()
    counted = lines >= LOWEST_KEV
    lost = parts.incoherent * recoil + parts.photoelectric * energy - lines[counted] @ made[counted]
    return np.asarray(lost + parts.pair * np.maximum(energy - PAIR_THRESHOLD, 0.0))
