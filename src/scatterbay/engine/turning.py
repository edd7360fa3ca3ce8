"""Draws scattering angles from the exact angular laws, and turns directions by them."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from scatterbay.physics.binding import CoherentShape, IncoherentShape, momentum_transfer
from scatterbay.physics.constants import ELECTRON_REST_ENERGY, PLANCK_TIMES_LIGHT
from scatterbay.physics.slab.grid import HIGHEST_KEV

Array = NDArray[np.float64]


def incoherent_cosines(shape: IncoherentShape, energy_kev: Array, random: np.random.Generator) -> Array:
    """Cosines drawn from Klein-Nishina times the incoherent scattering function, shape (n,).

    The energy ratio is drawn by composition and rejection (the law of P = E'/E is a mixture of 1/P and P, kept
    with probability 1 - P sin^2 / (1 + P^2)), then kept with probability S(x) / S(at the highest x).
    """
    alpha = energy_kev / ELECTRON_REST_ENERGY
    least = 1.0 / (1.0 + 2.0 * alpha)
    part_one, part_two = -np.log(least), 0.5 * (1.0 - least * least)
    top = shape.electrons(momentum_transfer(energy_kev, np.full(energy_kev.size, -1.0)))
    result = np.empty(energy_kev.size)
    left = np.arange(energy_kev.size)
    while left.size:
        draws = random.random((4, left.size))
        low = least[left]
        first = draws[0] * (part_one[left] + part_two[left]) < part_one[left]
        ratio = np.where(first, low ** (1.0 - draws[1]), np.sqrt(low * low + draws[1] * (1.0 - low * low)))
        fall = (1.0 - ratio) / (alpha[left] * ratio)
        cosine = 1.0 - fall
        kept = draws[2] <= 1.0 - ratio * fall * (2.0 - fall) / (1.0 + ratio * ratio)
        bound = shape.electrons(momentum_transfer(energy_kev[left], np.clip(cosine, -1.0, 1.0)))
        kept &= draws[3] * top[left] <= bound
        result[left[kept]] = np.clip(cosine[kept], -1.0, 1.0)
        left = left[~kept]
    return result


def coherent_cosines(shape: CoherentShape, energy_kev: Array, random: np.random.Generator) -> Array:
    """Cosines drawn from (1 + cos^2) F^2, shape (n,): x^2 from the integral of F^2, kept by (1 + cos^2) / 2."""
    highest = (np.minimum(energy_kev, HIGHEST_KEV) / PLANCK_TIMES_LIGHT) ** 2
    whole = shape.moments(highest)[0]
    result = np.empty(energy_kev.size)
    left = np.arange(energy_kev.size)
    while left.size:
        draws = random.random((2, left.size))
        square = shape.inverse(draws[0] * whole[left])
        cosine = np.clip(1.0 - 2.0 * square / highest[left], -1.0, 1.0)
        kept = draws[1] <= 0.5 * (1.0 + cosine * cosine)
        result[left[kept]] = cosine[kept]
        left = left[~kept]
    return result


def turned(direction: Array, cosine: Array, turn: Array) -> Array:
    """Unit directions (n, 3) turned by an angle of that cosine (n,), about a random part (n,) of a full turn."""
    x, y, z = direction.T
    sign = np.copysign(1.0, z)
    a = -1.0 / (sign + z)
    b = x * y * a
    one = np.stack([1.0 + sign * x * x * a, sign * b, -sign * x], axis=1)
    two = np.stack([b, sign + y * y * a, -y], axis=1)
    sine, phi = np.sqrt(np.maximum(1.0 - cosine * cosine, 0.0)), 2.0 * np.pi * turn
    across = np.cos(phi)[:, None] * one + np.sin(phi)[:, None] * two
    result = cosine[:, None] * direction + sine[:, None] * across
    return result / np.linalg.norm(result, axis=1, keepdims=True)
