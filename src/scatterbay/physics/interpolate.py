"""Interpolation along one axis: log-log lines, and a shape-preserving cubic."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


def log_log(x: Array, nodes: Array, values: Array) -> Array:
    """Values on straight lines of ln value over ln x, between the nodes; the caller keeps x inside them."""
    return np.exp(np.interp(np.log(x), np.log(nodes), np.log(values)))


def cubic_slopes(nodes: Array, values: Array) -> Array:
    """Slopes of the shape-preserving cubic through (nodes, values), along the last axis.

    Harmonic means inside, three-point ends kept from overshooting (Fritsch and Butland, SIAM J. Sci. Stat.
    Comput. 5 (1984) 300). ``values`` has shape (..., n); the result has the same shape.
    """
    steps = np.diff(nodes)
    secants = np.diff(values, axis=-1) / steps
    if nodes.size == 2:
        return np.repeat(secants, 2, axis=-1)
    left, right = secants[..., :-1], secants[..., 1:]
    w1, w2 = 2.0 * steps[1:] + steps[:-1], steps[1:] + 2.0 * steps[:-1]
    same_sign = left * right > 0.0
    safe_left, safe_right = np.where(same_sign, left, 1.0), np.where(same_sign, right, 1.0)
    inner = np.where(same_sign, (w1 + w2) / (w1 / safe_left + w2 / safe_right), 0.0)
    first = _end_slope(steps[0], steps[1], secants[..., 0], secants[..., 1])
    last = _end_slope(steps[-1], steps[-2], secants[..., -1], secants[..., -2])
    return np.concatenate([first[..., None], inner, last[..., None]], axis=-1)


def _end_slope(h0: float, h1: float, s0: Array, s1: Array) -> Array:
    slope = ((2.0 * h0 + h1) * s0 - h0 * s1) / (h0 + h1)
    slope = np.where(slope * s0 <= 0.0, 0.0, slope)
    return np.where((s0 * s1 <= 0.0) & (np.abs(slope) > 3.0 * np.abs(s0)), 3.0 * s0, slope)


def hermite(x: Array, nodes: Array, values: Array, slopes: Array) -> Array:
    """The cubic with these slopes at x (m,), for values of shape (..., n): result (..., m)."""
    index = np.clip(np.searchsorted(nodes, x, side="right") - 1, 0, nodes.size - 2)
    step = nodes[index + 1] - nodes[index]
    u = (x - nodes[index]) / step
    rise = values[..., index + 1] - values[..., index]
    a = slopes[..., index] * step - rise
    b = rise - slopes[..., index + 1] * step
    return values[..., index] + u * (rise + (1.0 - u) * (a * (1.0 - u) + b * u))


def cubic(x: Array, nodes: Array, values: Array) -> Array:
    """Shape-preserving cubic through (nodes, values) at x; the caller keeps x inside the nodes."""
    return hermite(x, nodes, values, cubic_slopes(nodes, values))
