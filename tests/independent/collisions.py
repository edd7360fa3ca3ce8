"""Collisions of photons, sampled: the second implementation that the transport of scatterbay is held against.

It takes the tabulated data from the program (partial cross sections, S(x), F(x)^2, K lines, dose per fluence) and
nothing else. Photons below 10 keV stop; electrons are not followed. Every collision sends out one photon, whose
weight is the expected number: absorption is a loss of weight, an electron pair a photon of double weight.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

import numpy as np
from numpy.typing import NDArray

from scatterbay.physics import dose
from scatterbay.physics.medium import Medium

Array = NDArray[np.float64]
Indices = NDArray[np.int64]

LOWEST_KEV, HIGHEST_KEV = 10.0, 1500.0
ELECTRON_KEV, WAVE_KEV = 510.99895, 12.3984198
"""Rest energy of the electron [keV]; hc [keV angstrom]."""
INCOHERENT, COHERENT, PAIR, LINES = 0, 1, 2, 3
"""Columns of ``Matter.parts``; the K lines follow."""
_POINTS = 3000


@dataclass(frozen=True)
class Matter:
    """One medium, tabulated finely: mass coefficients [cm2/g] over energy, and what directions are drawn from.

    Parameters
    ----------
    log_energy : nodes of ln(E / keV), rising; edges are twin nodes.
    total : all interactions, at the nodes (n,).
    parts : photons sent out, by kind (n, 3 + lines): incoherent, coherent, annihilation, K lines.
    line_kev : energies of the K lines.
    log_y, log_cumulative : ln x^2 [1/angstrom2], and ln of the integral of F^2 over x^2 up to there.
    """

    medium: Medium
    log_energy: Array
    total: Array
    parts: Array
    line_kev: Array
    log_y: Array
    log_cumulative: Array

    def at(self, energy_kev: Array) -> tuple[Array, Array]:
        """Total (n,) and parts (n, kinds) at these energies, linear over ln E."""
        log = np.log(energy_kev)
        index = np.clip(np.searchsorted(self.log_energy, log) - 1, 0, self.log_energy.size - 2)
        share = (log - self.log_energy[index]) / (self.log_energy[index + 1] - self.log_energy[index])
        total = self.total[index] * (1 - share) + self.total[index + 1] * share
        return total, self.parts[index] * (1 - share)[:, None] + self.parts[index + 1] * share[:, None]

    def totals(self, energy_kev: Array) -> Array:
        """Total at these energies, any shape."""
        return np.interp(np.log(energy_kev), self.log_energy, self.total)


@cache
def matter(medium: Medium) -> Matter:
    """The tables of a medium."""
    edges = medium.edges_kev
    twins = np.concatenate([edges * (1 - 1e-6), edges * (1 + 1e-6)])
    energy = np.unique(
        np.concatenate([np.geomspace(LOWEST_KEV, HIGHEST_KEV, _POINTS), twins[twins > LOWEST_KEV]])
    )
    partials = medium.partials(energy)
    lines, made = medium.fluorescence(energy)
    heard = lines > LOWEST_KEV
    sent = [partials.incoherent, partials.coherent, 2.0 * partials.pair, *made[heard]]
    log_y = np.linspace(np.log(1e-12), np.log((HIGHEST_KEV / WAVE_KEV) ** 2), 6000)
    # F^2 dy = F^2 y d(ln y): trapezoids over ln y, the part below the first node taken as F(0)^2 y.
    density = medium.coherent_shape.squared(np.exp(0.5 * log_y)) * np.exp(log_y)
    steps = 0.5 * (density[1:] + density[:-1]) * np.diff(log_y)
    log_cumulative = np.log(np.cumsum(np.concatenate([density[:1], steps])))
    return Matter(
        medium, np.log(energy), partials.total, np.stack(sent, axis=1), lines[heard], log_y, log_cumulative
    )


@cache
def _kerma_table() -> tuple[Array, Array]:
    energy = np.geomspace(LOWEST_KEV, HIGHEST_KEV, _POINTS)
    return np.log(energy), np.log(dose.air_kerma_per_fluence(energy))


def kerma(energy_kev: Array) -> Array:
    """Air kerma per fluence [Gy m2], any shape."""
    nodes, values = _kerma_table()
    return np.exp(np.interp(np.log(energy_kev), nodes, values))


def collide(stuff: Matter, energy_kev: Array, rng: np.random.Generator) -> tuple[Array, Array, Array]:
    """One photon sent out by each collision: energy, cosine to the old direction, and factor on its weight."""
    total, parts = stuff.at(energy_kev)
    reached = np.cumsum(parts, axis=1)
    kind = (rng.random(energy_kev.size)[:, None] * reached[:, -1:] >= reached[:, :-1]).sum(axis=1)
    after, cosine = energy_kev.copy(), 2.0 * rng.random(energy_kev.size) - 1.0
    chosen = np.flatnonzero(kind == INCOHERENT)
    cosine[chosen], after[chosen] = incoherent(stuff, energy_kev[chosen], rng)
    chosen = np.flatnonzero(kind == COHERENT)
    cosine[chosen] = coherent(stuff, energy_kev[chosen], rng)
    after[kind == PAIR] = ELECTRON_KEV
    line = kind >= LINES
    after[line] = stuff.line_kev[kind[line] - LINES]
    return after, cosine, reached[:, -1] / total


def incoherent(stuff: Matter, energy_kev: Array, rng: np.random.Generator) -> tuple[Array, Array]:
    """Cosine and energy after incoherent scattering: Kahn's rejection for free electrons, then S(x) / S(inf).

    References
    ----------
    H. Kahn, Applications of Monte Carlo (1954, RAND AECU-3259); recalled.
    """
    shape = stuff.medium.incoherent_shape
    ceiling = float(shape.electrons(np.array(1e9)))
    cosine, after = np.empty(energy_kev.size), np.empty(energy_kev.size)
    open_ = np.arange(energy_kev.size)
    while open_.size:
        energy = energy_kev[open_]
        c, ratio, good = _kahn(energy / ELECTRON_KEV, rng)
        x = energy / WAVE_KEV * np.sqrt(0.5 * (1.0 - c))
        good &= rng.random(open_.size) * ceiling < shape.electrons(x)
        cosine[open_[good]], after[open_[good]] = c[good], energy[good] / ratio[good]
        open_ = open_[~good]
    return cosine, after


def _kahn(a: Array, rng: np.random.Generator) -> tuple[Array, Array, NDArray[np.bool_]]:
    """One trial: cosine, E/E', and whether it is accepted; ``a`` is E / mc^2."""
    first, second, third = rng.random((3, a.size))
    low = first * (2 * a + 9) <= 2 * a + 1
    ratio = np.where(low, 1 + 2 * a * second, (2 * a + 1) / (2 * a * second + 1))
    cosine = np.clip(1 - (ratio - 1) / a, -1.0, 1.0)
    accept = np.where(low, 4 * (1 / ratio - 1 / ratio**2), 0.5 * (cosine**2 + 1 / ratio))
    return cosine, ratio, third <= accept


def coherent(stuff: Matter, energy_kev: Array, rng: np.random.Generator) -> Array:
    """Cosine after coherent scattering: x^2 drawn from F^2, then accepted by (1 + cos^2) / 2."""
    largest = 2.0 * np.log(energy_kev / WAVE_KEV)
    ceiling = np.exp(np.interp(largest, stuff.log_y, stuff.log_cumulative))
    cosine, open_ = np.empty(energy_kev.size), np.arange(energy_kev.size)
    while open_.size:
        drawn = np.log((1.0 - rng.random(open_.size)) * ceiling[open_])
        below = np.minimum(drawn - stuff.log_cumulative[0], 0.0)
        log_y = np.interp(drawn, stuff.log_cumulative, stuff.log_y) + below
        c = 1 - 2 * np.exp(np.minimum(log_y - largest[open_], 0.0))
        good = rng.random(open_.size) < 0.5 * (1 + c * c)
        cosine[open_[good]] = c[good]
        open_ = open_[~good]
    return cosine
