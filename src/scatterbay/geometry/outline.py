"""Closed outlines in the plan: corners as (n, 2) arrays, counter-clockwise."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

Array = NDArray[np.float64]


def signed_area(corners: ArrayLike) -> float:
    """Area inside the outline, positive when its corners run counter-clockwise [m2]."""
    x, y = np.asarray(corners, dtype=float).T
    return float(0.5 * np.sum(x * np.roll(y, -1) - np.roll(x, -1) * y))


def crosses_itself(corners: ArrayLike) -> bool:
    """True where two sides that are not neighbours touch, or two neighbours fold back on each other."""
    points = np.asarray(corners, dtype=float)
    count = len(points)
    following = np.roll(points, -1, axis=0)
    for i in range(count):
        for j in range(i + 1, count):
            neighbours = j == i + 1 or (i == 0 and j == count - 1)
            if neighbours:
                if _folds_back(points, following, i, j):
                    return True
            elif _segments_touch(points[i], following[i], points[j], following[j]):
                return True
    return False


def contains(corners: ArrayLike, points: ArrayLike) -> NDArray[np.bool_]:
    """Which points (m, 2) lie inside, by even-odd crossings with a half-open rule."""
    outline, where = np.asarray(corners, dtype=float), np.atleast_2d(np.asarray(points, dtype=float))
    start, end = outline, np.roll(outline, -1, axis=0)
    x, y = where[:, :1], where[:, 1:2]
    spans = (start[:, 1] <= y) != (end[:, 1] <= y)
    rise = np.where(end[:, 1] == start[:, 1], 1.0, end[:, 1] - start[:, 1])
    crossing = start[:, 0] + (y - start[:, 1]) / rise * (end[:, 0] - start[:, 0])
    return np.count_nonzero(spans & (x < crossing), axis=1) % 2 == 1


def distance_to_edges(corners: ArrayLike, points: ArrayLike) -> Array:
    """Distance from points (m, 2) to the nearest side, shape (m,) [m]."""
    outline, where = np.asarray(corners, dtype=float), np.atleast_2d(np.asarray(points, dtype=float))
    start, along = outline, np.roll(outline, -1, axis=0) - outline
    offset = where[:, None, :] - start
    share = np.clip((offset * along).sum(-1) / (along * along).sum(-1), 0.0, 1.0)
    return np.linalg.norm(offset - share[..., None] * along, axis=-1).min(axis=1)


def _cross(a: Array, b: Array) -> float:
    return float(a[0] * b[1] - a[1] * b[0])


def _folds_back(points: Array, following: Array, i: int, j: int) -> bool:
    one, two = following[i] - points[i], following[j] - points[j]
    length = float(np.linalg.norm(one) * np.linalg.norm(two))
    return abs(_cross(one, two)) <= 1e-12 * length and float(one @ two) < 0.0


def _segments_touch(a: Array, b: Array, c: Array, d: Array) -> bool:
    one, two, three, four = (
        _cross(b - a, c - a),
        _cross(b - a, d - a),
        _cross(d - c, a - c),
        _cross(d - c, b - c),
    )
    if ((one > 0) != (two > 0)) and ((three > 0) != (four > 0)) and 0.0 not in (one, two, three, four):
        return True
    return any(
        value == 0.0 and _between(p, q, r)
        for value, p, q, r in ((one, a, b, c), (two, a, b, d), (three, c, d, a), (four, c, d, b))
    )


def _between(a: Array, b: Array, p: Array) -> bool:
    """A point known to lie on the line through a and b: does it lie on the segment?"""
    return bool(np.all(np.minimum(a, b) <= p) and np.all(p <= np.maximum(a, b)))
