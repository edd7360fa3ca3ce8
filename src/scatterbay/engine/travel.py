"""A bare source on its way: what it gives to a place along a path, by quadrature that is finer near the place."""

from __future__ import annotations

import itertools
from collections.abc import Sequence

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.arrive import Surroundings, dose_from_emitters
from scatterbay.errors import OutOfRangeError
from scatterbay.physics import dose
from scatterbay.physics.spectrum import Spectrum

Array = NDArray[np.float64]

NODES = 4
"""Gauss points on each piece of the path."""
LONGEST = 0.25
"""Longest piece, in units of its distance from the place and in m: barriers and bodies come and go along a path."""
CLOSEST = 0.05
"""Nearest that a path may pass a place [m]."""


def dose_along(
    path: Sequence[Sequence[float]], spectrum: Spectrum, place: Array, around: Surroundings
) -> Array:
    """Integral over a path of the dose at a place per unit of output, (q,) [Gy m, Sv m].

    Divided by the speed it is the dose of one pass per unit of output each second.

    Raises
    ------
    OutOfRangeError : the path passes the place within 50 mm.
    """
    nodes, weights = np.polynomial.legendre.leggauss(NODES)
    positions, lengths = [], []
    corners = [np.asarray(corner, dtype=float) for corner in path]
    for start, end in itertools.pairwise(corners):
        for first, last in _pieces(start, end, place):
            share = 0.5 * (nodes + 1.0)[:, None]
            positions.append(first + share * (last - first))
            lengths.append(0.5 * weights * float(np.linalg.norm(last - first)))
    position, length = np.concatenate(positions), np.concatenate(lengths)
    total = np.zeros(len(dose.QUANTITIES))
    for energy, photons in zip(spectrum.energy_kev, spectrum.photons, strict=True):
        given = dose_from_emitters(position, np.full(len(position), energy), place, around)
        total += photons * (given @ length)
    return total


def highest_along(
    path: Sequence[Sequence[float]], spectrum: Spectrum, place: Array, around: Surroundings
) -> Array:
    """Highest dose at a place per unit of output along a path, (q,) [Gy, Sv]: at points 0.1 m apart."""
    corners = [np.asarray(corner, dtype=float) for corner in path]
    points = np.concatenate(
        [
            np.linspace(start, end, 2 + int(np.linalg.norm(end - start) / 0.1))
            for start, end in itertools.pairwise(corners)
        ]
    )
    found = np.zeros((len(dose.QUANTITIES), len(points)))
    for energy, photons in zip(spectrum.energy_kev, spectrum.photons, strict=True):
        found += photons * dose_from_emitters(points, np.full(len(points), energy), place, around)
    return found.max(axis=1)


def _pieces(start: Array, end: Array, place: Array) -> list[tuple[Array, Array]]:
    """A straight stretch in pieces that are short beside their distance from the place."""
    distance = _distance(start, end, place)
    length = float(np.linalg.norm(end - start))
    if distance < CLOSEST:
        raise OutOfRangeError(
            f"a travelling source passes the place at {[round(float(x), 2) for x in place]} within 50 mm"
        )
    if length <= LONGEST * min(distance, 1.0):
        return [(start, end)]
    middle = 0.5 * (start + end)
    return _pieces(start, middle, place) + _pieces(middle, end, place)


def _distance(start: Array, end: Array, place: Array) -> float:
    """Shortest distance from a place to a straight stretch [m]."""
    along = end - start
    square = float(along @ along)
    share = float(np.clip((place - start) @ along / square, 0.0, 1.0)) if square > 0.0 else 0.0
    return float(np.linalg.norm(place - start - share * along))
