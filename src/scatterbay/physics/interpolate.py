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


def spline_matrix(nodes: Array, x: Array) -> Array:
    """Matrix (m, n) that turns values at the nodes (n,) into the cubic spline's values at x (m,).

    Third derivatives are continuous at the second and the last but one node ("not a knot"); n is at least 4.
    """
    n, steps = nodes.size, np.diff(nodes)
    system, right = np.zeros((n, n)), np.zeros((n, n))
    for i in range(1, n - 1):
        system[i, i - 1 : i + 2] = steps[i - 1], 2.0 * (steps[i - 1] + steps[i]), steps[i]
        right[i, i - 1 : i + 2] = (
            6.0 / steps[i - 1],
            -6.0 * (1.0 / steps[i - 1] + 1.0 / steps[i]),
            6.0 / steps[i],
        )
    system[0, :3] = -steps[1], steps[0] + steps[1], -steps[0]
    system[-1, -3:] = -steps[-1], steps[-2] + steps[-1], -steps[-2]
    curvature = np.linalg.solve(system, right)
    index = np.clip(np.searchsorted(nodes, x, side="right") - 1, 0, n - 2)
    step, rows = steps[index], np.arange(x.size)
    a, b = (nodes[index + 1] - x) / step, (x - nodes[index]) / step
    result = ((a**3 - a) * step**2 / 6.0)[:, None] * curvature[index]
    result += ((b**3 - b) * step**2 / 6.0)[:, None] * curvature[index + 1]
    result[rows, index] += a
    result[rows, index + 1] += b
    return result
