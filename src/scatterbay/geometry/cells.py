"""A face cut into rectangles by what is there, and which of them a ray may meet on its way through."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
Ints = NDArray[np.int64]

MOST_KINDS = 24
"""Different make-ups that one face may have."""
MOST_EDGES = 48
"""Edges of rectangles along one direction of a face."""


@dataclass(frozen=True)
class Rectangle:
    """A rectangle in a face, in the face's own two coordinates [m]."""

    low: tuple[float, float]
    high: tuple[float, float]

    def holds(self, first: float, second: float) -> bool:
        """Does a point lie in it? The low edges belong to it, the high ones do not."""
        return self.low[0] <= first < self.high[0] and self.low[1] <= second < self.high[1]


@dataclass(frozen=True)
class Cells:
    """A face cut along rising edges in its two coordinates [m].

    ``kinds``: a number for what is in each cell, shape (first edges + 1, second edges + 1); the outermost cells
    reach to infinity. A mask has bit k set where kind k may be met.
    """

    first: Array
    second: Array
    kinds: Ints

    @cached_property
    def _any_of(self) -> Ints:
        """Masks of all blocks of cells, (i from, i to, j from, j to)."""
        bits = np.int64(1) << self.kinds
        n, m = bits.shape
        along = np.zeros((n, n, m), dtype=np.int64)
        for i in range(n):
            along[i, i:] = np.bitwise_or.accumulate(bits[i:], axis=0)
        whole = np.zeros((n, n, m, m), dtype=np.int64)
        for j in range(m):
            whole[:, :, j, j:] = np.bitwise_or.accumulate(along[:, :, j:], axis=2)
        return whole

    def masks(self, position: tuple[Array, Array], shift: tuple[Array, Array], breadth: float) -> Ints:
        """What rays may meet between the planes of a face, (n,).

        A ray takes in every cell that the upright block around it touches, widened by ``breadth`` [m]: never fewer
        than it passes.

        Parameters
        ----------
        position : where the rays meet the inner plane, (n,) each [m].
        shift : how much farther along they meet the outer plane, (n,) each [m].
        """
        block = []
        for edges, start, step in zip((self.first, self.second), position, shift, strict=True):
            block.append(np.searchsorted(edges, np.minimum(start, start + step) - breadth, side="right"))
            block.append(np.searchsorted(edges, np.maximum(start, start + step) + breadth, side="right"))
        return self._any_of[tuple(block)]


def cut(rectangles: Sequence[Rectangle]) -> tuple[Array, Array]:
    """The edges that a face with these rectangles is cut along, and the middles of the cells can be told from."""
    first = np.unique([x for one in rectangles for x in (one.low[0], one.high[0])])
    second = np.unique([y for one in rectangles for y in (one.low[1], one.high[1])])
    return first, second


def middles(edges: Array) -> Array:
    """A point in each cell between rising edges; in the outermost ones, 1 m beyond the edge."""
    inner = 0.5 * (edges[1:] + edges[:-1])
    return np.concatenate([[edges[0] - 1.0], inner, [edges[-1] + 1.0]])
