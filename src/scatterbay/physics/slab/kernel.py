"""What one scattering does to a photon in a medium, on a grid: energy to energy, direction to direction."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.physics.binding import IncoherentShape
from scatterbay.physics.compton import scattered_energy
from scatterbay.physics.constants import ELECTRON_REST_ENERGY
from scatterbay.physics.medium import Medium
from scatterbay.physics.slab.grid import GAUSS_ANGLES, LOWEST_KEV, Grid

Array = NDArray[np.float64]

AZIMUTHS = 24
STENCIL = 4


@dataclass(frozen=True)
class Kernel:
    """Mass cross sections [cm2/g] for going from node to node, and what is left to attenuate with.

    ``forward`` and ``backward``: shape (n, a, n, m), from (energy, incoming direction) to (energy, outgoing
    direction) into the same and the opposite hemisphere, the outgoing weights included.
    ``attenuation`` (n,): total less the part of coherent scattering that is taken as going straight on.
    ``straight`` (n,): that part's share of coherent scattering. ``scattering`` (n,): all that scatters.
    """

    forward: Array
    backward: Array
    attenuation: Array
    straight: Array
    scattering: Array


def build_kernel(matter: Medium, grid: Grid) -> Kernel:
    """The kernel of a medium on a grid."""
    energy = grid.energy_kev
    parts = matter.partials(energy)
    forward, backward = _incoherent(matter.incoherent_shape, parts.incoherent, grid)
    straight = np.zeros(energy.size)
    if not matter.free_electrons:
        straight, same, opposite = _coherent(matter, parts.coherent, grid)
        diagonal = np.arange(energy.size)
        forward[diagonal, :, diagonal, :] += same
        backward[diagonal, :, diagonal, :] += opposite
    local = _local_sources(matter, parts.pair, grid)
    isotropic = 0.5 * local[:, None, :, None] * grid.gauss[1]
    attenuation = parts.total - straight * parts.coherent
    scattering = parts.incoherent + (1.0 - straight) * parts.coherent + local.sum(axis=1)
    return Kernel(forward + isotropic, backward + isotropic, attenuation, straight, scattering)


def _incoherent(shape: IncoherentShape, total: Array, grid: Grid) -> tuple[Array, Array]:
    """Azimuthal mean of the incoherent cross section, spread over the grid; rows rescaled to the total.

    Photons that fall below the lowest energy count in the total but are dropped.
    """
    energy, (nodes, weights) = grid.energy_kev, grid.gauss
    n, a, m = energy.size, grid.cosines.size, nodes.size
    phi = np.pi * (np.arange(AZIMUTHS) + 0.5) / AZIMUTHS
    both = np.concatenate([nodes, -nodes])
    sines = np.sqrt((1.0 - grid.cosines[:, None] ** 2) * (1.0 - both[None, :] ** 2))
    cosine = grid.cosines[:, None, None] * both[None, :, None] + sines[:, :, None] * np.cos(phi)
    cosine = np.clip(cosine, -1.0, 1.0)
    result, drawn = np.zeros((n, a * 2 * m, n)), np.zeros((n, a, 2, m))
    rows = np.repeat(np.arange(a * 2 * m), AZIMUTHS)
    for i in range(n):
        strength = shape.differential(np.asarray(energy[i]), cosine).ravel()
        drawn[i] = strength.reshape(a, 2, m, AZIMUTHS).sum(axis=-1)
        after = scattered_energy(np.full(cosine.size, energy[i]), cosine.ravel())
        for column, share in _spread(after, i, grid):
            counted = np.bincount(rows * n + column, weights=strength * share, minlength=result[i].size)
            result[i] += counted.reshape(result[i].shape)
    scale = total[:, None] / (drawn * weights).sum(axis=(2, 3))
    result = result.reshape(n, a, 2, m, n) * weights[:, None] * scale[:, :, None, None, None]
    return result[:, :, 0].transpose(0, 1, 3, 2).copy(), result[:, :, 1].transpose(0, 1, 3, 2).copy()


def _spread(after: Array, source: int, grid: Grid) -> list[tuple[NDArray[np.int64], Array]]:
    """Columns and Lagrange weights in ln E that stand for photons of these energies.

    Nodes lie at or below the source's energy and within the stretch between edges; below the lowest node
    photons are dropped.
    """
    size = grid.energy_kev.size
    position = np.searchsorted(-grid.energy_kev, -after)
    first, last = (bound[grid.stretch_of(after)] for bound in grid.stretch_bounds)
    first = np.maximum(first, source)
    count = np.clip(last - first + 1, 1, STENCIL)
    start = np.clip(position - 2, first, np.maximum(last - count + 1, first))
    offsets = np.arange(STENCIL)
    columns = np.minimum(start[:, None] + offsets, size - 1)
    used = offsets < count[:, None]
    points, x = np.log(grid.energy_kev)[columns], np.log(after)
    kept = after >= LOWEST_KEV * (1 - 1e-12)
    result = []
    for k in range(STENCIL):
        weight = np.where(used[:, k] & kept, 1.0, 0.0)
        for j in range(STENCIL):
            if j != k:
                both = used[:, j] & used[:, k]
                apart = np.where(both, points[:, k] - points[:, j], 1.0)
                weight *= np.where(both, (x - points[:, j]) / apart, 1.0)
        result.append((columns[:, k], weight))
    return result


def _coherent(matter: Medium, total: Array, grid: Grid) -> tuple[Array, Array, Array]:
    """Straight share (n,), and coherent cross sections (n, a, m) into the same and the opposite hemisphere.

    Legendre moments with delta-M truncation (W. J. Wiscombe, J. Atmos. Sci. 34 (1977) 1408).
    """
    (nodes, weights), terms = grid.gauss, 2 * GAUSS_ANGLES
    moments = _coherent_moments(matter, grid.energy_kev, terms)
    straight = moments[:, terms]
    scaled = (moments[:, :terms] - straight[:, None]) / (1.0 - straight[:, None])
    order = np.arange(terms)
    incoming = np.polynomial.legendre.legvander(grid.cosines, terms - 1)
    outgoing = np.polynomial.legendre.legvander(nodes, terms - 1)
    sign = np.where(order % 2 == 0, 1.0, -1.0)
    amount = 0.5 * (total * (1.0 - straight))[:, None, None] * weights
    factors = scaled * (2 * order + 1)
    same = np.einsum("nl,al,ml->nam", factors, incoming, outgoing) * amount
    opposite = np.einsum("nl,al,ml->nam", factors * sign, incoming, outgoing) * amount
    return straight, same, opposite


def _coherent_moments(matter: Medium, energy: Array, terms: int) -> Array:
    """Legendre moments 0 .. terms of the coherent phase function, shape (n, terms + 1), the zeroth 1."""
    x, w = np.polynomial.legendre.leggauss(400)
    half_sine = 0.5 * (x + 1.0)
    half_sine, weight = half_sine**2, 0.5 * w * 2.0 * half_sine
    cosine = 1.0 - 2.0 * half_sine**2
    density = matter.coherent_shape.differential(energy[:, None], cosine[None, :]) * half_sine * weight
    moments = density @ np.polynomial.legendre.legvander(cosine, terms)
    return moments / moments[:, :1]


def _local_sources(matter: Medium, pair: Array, grid: Grid) -> Array:
    """Photons sent out evenly in all directions: K fluorescence and annihilation, shape (n, n) [cm2/g]."""
    energy = grid.energy_kev
    result = np.zeros((energy.size, energy.size))
    lines, made = matter.fluorescence(energy)
    for line, row in zip(lines, made, strict=True):
        if line >= LOWEST_KEV:
            _add_line(result, float(line), row, grid)
    _add_line(result, ELECTRON_REST_ENERGY, 2.0 * pair, grid)
    return result


def _add_line(result: Array, line_kev: float, made: Array, grid: Grid) -> None:
    for column, share in _spread(np.array([line_kev]), 0, grid):
        result[:, column[0]] += made * share[0]
