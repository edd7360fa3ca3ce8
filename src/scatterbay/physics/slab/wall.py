"""A wall of layers: what comes out of its far side, per quantity and direction, and what it sends back."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.physics import dose
from scatterbay.physics.slab.grid import Grid
from scatterbay.physics.slab.layer import Layer, multiply, outgoing_rows, solve_reflections

Array = NDArray[np.float64]


@dataclass(frozen=True)
class WallAnswer:
    """Scattered photons behind a wall, as dose per unit fluence that comes in.

    ``diffuse``: shape (n, a, q, m): per energy and direction in, quantity, and direction out (Gauss weights
    included, so that the sum over m is the dose on the far face). ``uncollided``: shape (n, a).
    """

    grid: Grid
    diffuse: Array
    uncollided: Array


def wall_answer(layers: Sequence[Layer]) -> WallAnswer:
    """Dose behind layers given from the inside to the outside, all reflections between them included.

    The layers are added from the outside in; only the answer is carried, not the whole transmission matrix.
    """
    grid = layers[0].grid
    n, a, m = grid.energy_kev.size, grid.cosines.size, grid.gauss[0].size
    wanted = _dose_columns(grid)
    last = layers[-1]
    diffuse = last.transmitted @ wanted
    reflected, uncollided = last.reflected, last.uncollided
    for layer in reversed(layers[:-1]):
        once = outgoing_rows(grid, uncollided[:, None]) * wanted + outgoing_rows(grid, diffuse)
        back, top = outgoing_rows(grid, reflected), outgoing_rows(grid, layer.reflected)
        lit = layer.uncollided[:, None] * reflected
        down = solve_reflections(
            grid, layer.transmitted + multiply(grid, lit, top), multiply(grid, back, top)
        )
        diffuse = layer.uncollided[:, None] * diffuse + down @ once
        if layer is not layers[0]:
            up = lit + multiply(grid, down, back)
            alone = outgoing_rows(grid, layer.uncollided[:, None])[:, 0]
            through = outgoing_rows(grid, layer.transmitted)
            reflected = layer.reflected + up * alone + multiply(grid, up, through)
        uncollided = layer.uncollided * uncollided
    per_fluence = diffuse.reshape(n, a, -1) * grid.cosines[None, :, None]
    return WallAnswer(grid, per_fluence.reshape(n, a, len(dose.QUANTITIES), m), uncollided.reshape(n, a))


def _dose_columns(grid: Grid) -> Array:
    """Dose per photon crossing the far face, shape (n m, q m): one column per quantity and direction."""
    n, m = grid.energy_kev.size, grid.gauss[0].size
    per_fluence = dose.per_fluence(grid.energy_kev)
    columns = np.zeros((n, m, per_fluence.shape[0], m))
    each = np.arange(m)
    columns[:, each, :, each] = (per_fluence.T[None, :, :] / grid.gauss[0][:, None, None]).reshape(m, n, -1)
    return columns.reshape(n * m, -1)
