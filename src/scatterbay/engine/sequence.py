"""Evenly spread points in the unit cube: an additive recurrence, shifted at random per replicate."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


def spread_points(count: int, dimensions: int, shift: Array) -> Array:
    """Points of the additive recurrence with the generalised golden ratio, shape (count, dimensions), in [0, 1).

    Parameters
    ----------
    count : number of points.
    dimensions : number of coordinates.
    shift : added to every point, modulo 1, shape (dimensions,).

    References
    ----------
    H. Niederreiter, Random Number Generation and Quasi-Monte Carlo Methods (1992), section 3.1 (additive
    recurrences); the ratio is the root above 1 of x^(d+1) = x + 1.
    """
    root = 1.5
    for _ in range(60):
        root = (1.0 + root) ** (1.0 / (dimensions + 1))
    steps = root ** -np.arange(1.0, dimensions + 1)
    return (shift + np.arange(1, count + 1)[:, None] * steps) % 1.0


def generator(seed: int, *stream: int) -> np.random.Generator:
    """The generator of one stream: explicit algorithm, keyed by seed and stream numbers."""
    return np.random.Generator(np.random.PCG64(np.random.SeedSequence([seed, *stream])))
