"""One uniform layer: reflection and transmission matrices, by doubling from a thin start."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.physics.slab.grid import Grid
from scatterbay.physics.slab.kernel import Kernel

Array = NDArray[np.float64]

THIN = 3e-3
"""Largest scattering depth along the most grazing direction in the starting layer."""


@dataclass(frozen=True)
class Layer:
    """A uniform layer: numbers of photons out per photon in.

    ``transmitted`` and ``reflected``: shape (n a, n m), scattered photons only. ``uncollided``: shape (n a).
    Rows are (energy, incoming direction), columns (energy, outgoing direction), direction running faster.
    """

    grid: Grid
    transmitted: Array
    reflected: Array
    uncollided: Array


def build_layer(kernel: Kernel, grid: Grid, density_g_cm3: float, thickness: float) -> Layer:
    """The matrices of a layer of this thickness [m].

    Doubling keeps the uncollided part apart, exactly, at every step.
    """
    linear = 100.0 * density_g_cm3
    grazing = float(kernel.scattering.max()) * linear * thickness / float(grid.gauss[0].min())
    doublings = max(0, int(np.ceil(np.log2(grazing / THIN))))
    layer = _thin_layer(kernel, grid, linear, thickness / 2.0**doublings)
    for _ in range(doublings):
        layer = _doubled(layer)
    return layer


def _thin_layer(kernel: Kernel, grid: Grid, linear: float, thickness: float) -> Layer:
    """Single scattering in a thin layer, with the exponentials in closed form."""
    n, a, m = grid.energy_kev.size, grid.cosines.size, grid.gauss[0].size
    way_in = (linear * kernel.attenuation[:, None] / grid.cosines)[:, :, None, None]
    way_out = (linear * kernel.attenuation[:, None] / grid.gauss[0])[None, None, :, :]
    difference = way_in - way_out
    close = np.abs(difference) * thickness < 1e-9
    safe = np.where(close, 1.0, difference)
    through = np.exp(-way_in * thickness) * np.where(close, thickness, np.expm1(safe * thickness) / safe)
    steep = difference * thickness > 500.0
    if steep.any():
        through = np.where(steep, np.exp(-way_out * thickness) / safe, through)
    back = -np.expm1(-(way_in + way_out) * thickness) / (way_in + way_out)
    per_depth = linear / grid.cosines[None, :, None, None]
    return Layer(
        grid,
        (kernel.forward * per_depth * through).reshape(n * a, n * m),
        (kernel.backward * per_depth * back).reshape(n * a, n * m),
        np.exp(-way_in * thickness).reshape(n * a),
    )


def _doubled(layer: Layer) -> Layer:
    """Two of the same layer on top of each other."""
    grid = layer.grid
    once, back = outgoing_rows(grid, layer.transmitted), outgoing_rows(grid, layer.reflected)
    alone = outgoing_rows(grid, layer.uncollided[:, None])[:, 0]
    between = layer.transmitted + multiply(grid, layer.uncollided[:, None] * layer.reflected, back)
    down = solve_reflections(grid, between, multiply(grid, back, back))
    up = layer.uncollided[:, None] * layer.reflected + multiply(grid, down, back)
    transmitted = layer.uncollided[:, None] * layer.transmitted + down * alone + multiply(grid, down, once)
    reflected = layer.reflected + up * alone + multiply(grid, up, once)
    return Layer(grid, transmitted, reflected, layer.uncollided**2)


def outgoing_rows(grid: Grid, matrix: Array) -> Array:
    """The rows whose incoming direction is one of the Gauss nodes, shape (n m, columns)."""
    n, a, m = grid.energy_kev.size, grid.cosines.size, grid.gauss[0].size
    return matrix.reshape(n, a, -1)[:, :m].reshape(n * m, -1)


def multiply(grid: Grid, left: Array, right: Array) -> Array:
    """left @ right where neither raises energy: only the blocks at or below the diagonal energy are touched."""
    rows, m = left.shape[0] // grid.energy_kev.size, grid.gauss[0].size
    result = np.zeros((left.shape[0], right.shape[1]))
    for start, stop in grid.blocks:
        into = result[start * rows : stop * rows]
        for low, high in grid.blocks:
            if low < start:
                continue
            columns = slice(low * m, high * m)
            inner = slice(start * m, high * m)
            into[:, columns] = left[start * rows : stop * rows, inner] @ right[inner, columns]
    return result


def solve_reflections(grid: Grid, right: Array, twice: Array) -> Array:
    """X with X (1 - twice) = right: all orders of reflection between two layers."""
    rows, m = right.shape[0] // grid.energy_kev.size, grid.gauss[0].size
    result = np.zeros_like(right)
    for low, high in grid.blocks:
        columns = slice(low * m, high * m)
        above = slice(0, high * rows)
        known = right[above, columns] + result[above, : low * m] @ twice[: low * m, columns]
        inside = np.eye((high - low) * m) - twice[columns, columns]
        result[above, columns] = np.linalg.solve(inside.T, known.T).T
    return result
