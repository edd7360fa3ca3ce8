"""Photons through plane layers by Monte Carlo: air kerma behind and in front, with standard errors.

Each flight is forced to end inside the wall; what would have left by either face is scored as its expectation.
Photons are split and thinned at every collision so that their number stays about even through the wall.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from scatterbay.physics.medium import medium
from scatterbay.tables.materials import material
from tests.independent.collisions import LOWEST_KEV, Array, Matter, collide, kerma, matter

BINS = 10
"""Equal bins of the cosine of outgoing directions."""
MOST_COPIES = 100.0
_QUANTITIES = 2


@dataclass(frozen=True)
class Estimate:
    """Means of independent batches, each with its standard error, as (value, error).

    ``transmission``: air kerma on the far face per incident air kerma, uncollided photons included.
    ``reflection``: air kerma on the near face of what comes back, per incident.
    ``through``, ``back``: photons crossing those faces per incident photon.
    ``angles``: scattered part of ``transmission`` by outgoing cosine, shape (2, BINS).
    ``angles_back``: ``reflection`` likewise.
    """

    transmission: tuple[float, float]
    reflection: tuple[float, float]
    through: tuple[float, float]
    back: tuple[float, float]
    angles: Array
    angles_back: Array


@dataclass(frozen=True)
class _Wall:
    stuff: list[Matter]
    linear: list[float]
    thickness: list[float]
    push: float

    def depths(self, energy: Array) -> Array:
        """Optical depth of each layer along the normal, (layers, n)."""
        rows = zip(self.stuff, self.linear, self.thickness, strict=True)
        return np.array([stuff.totals(energy) * linear * t for stuff, linear, t in rows])

    def worth(self, energy: Array, place: Array) -> Array:
        """ln of how much a photon matters for the far face: the easiest way out at or below its energy.

        ``place``: layer number plus the fraction of that layer passed.
        """
        result = np.zeros(energy.size)
        for k, (stuff, linear, t) in enumerate(zip(self.stuff, self.linear, self.thickness, strict=True)):
            least = np.minimum.accumulate(stuff.total)
            ahead = 1.0 - np.clip(place - k, 0.0, 1.0)
            result -= np.interp(np.log(energy), stuff.log_energy, least) * linear * t * ahead
        return self.push * result


def transport(
    layers: Sequence[tuple[str, float]],
    energy_kev: float,
    angle_deg: float,
    histories: int,
    seed: int,
    *,
    batches: int = 20,
    push: float = 0.7,
    free_electrons: bool = False,
) -> Estimate:
    """Monte Carlo of a wall of (material, thickness in m), from the inside to the outside.

    ``push`` sets how strongly photons are split on their way through: 0 suits reflection.
    """
    named = [(material(name), t) for name, t in layers]
    stuff = [matter(medium(one.fractions)) for one, _ in named]
    wall = _Wall(stuff, [100.0 * one.density_g_cm3 for one, _ in named], [t for _, t in named], push)
    streams = np.random.default_rng(seed).spawn(batches)
    mu = float(np.cos(np.radians(angle_deg)))
    tallies = np.array([_batch(wall, energy_kev, mu, histories // batches, rng) for rng in streams])
    depth = float(wall.depths(np.array([energy_kev])).sum())
    alone = float(np.exp(-depth / mu))
    mean, error = tallies.mean(axis=0), tallies.std(axis=0, ddof=1) / np.sqrt(batches)
    totals = tallies.sum(axis=-1)
    pairs = [
        (float(totals[:, q, side].mean()), float(totals[:, q, side].std(ddof=1) / np.sqrt(batches)))
        for q in range(_QUANTITIES)
        for side in range(2)
    ]
    through, back = (pairs[2][0] + alone, pairs[2][1]), pairs[3]
    angles = np.stack([mean[0], error[0]], axis=1)
    return Estimate((pairs[0][0] + alone, pairs[0][1]), pairs[1], through, back, angles[0], angles[1])


def _batch(wall: _Wall, energy_kev: float, mu: float, histories: int, rng: np.random.Generator) -> Array:
    """Scattered (kerma, number) leaving by the (far, near) face, per bin of cosine: (2, 2, BINS)."""
    tally = np.zeros((_QUANTITIES, 2, BINS))
    energy, cosine = np.full(histories, energy_kev), np.full(histories, mu)
    place, weight = np.zeros(histories), np.full(histories, 1.0 / histories)
    first = float(wall.worth(energy[:1], place[:1])[0])
    incident = float(kerma(energy[:1])[0]) / mu
    while energy.size:
        depths = wall.depths(energy)
        before, whole = _depth_at(depths, place), depths.sum(axis=0)
        ahead = np.where(cosine > 0, whole - before, before) / np.abs(cosine)
        inside = -np.expm1(-ahead)
        weight = weight * inside
        flown = -np.log1p(-rng.random(energy.size) * inside)
        place = _place_at(depths, before + cosine * flown)
        energy, cosine, weight = _after(wall, energy, cosine, weight, place, rng)
        kept = (energy >= LOWEST_KEV) & (weight > 0)
        energy, cosine, weight, place = energy[kept], cosine[kept], weight[kept], place[kept]
        _score(tally, wall, energy, cosine, weight, place, incident)
        wanted = weight * histories * np.exp(wall.worth(energy, place) - first)
        copies = np.minimum(wanted, MOST_COPIES) + rng.random(energy.size)
        number = copies.astype(np.int64)
        chosen = np.repeat(np.arange(energy.size), number)
        weight = (weight / np.minimum(wanted, MOST_COPIES))[chosen]
        energy, cosine, place = energy[chosen], cosine[chosen], place[chosen]
    return tally


def _depth_at(depths: Array, place: Array) -> Array:
    """Optical depth from the near face to a place."""
    return np.array(sum(row * np.clip(place - k, 0.0, 1.0) for k, row in enumerate(depths)))


def _place_at(depths: Array, depth: Array) -> Array:
    """Place at an optical depth from the near face."""
    place, left = np.zeros(depth.size), depth
    for row in depths:
        place += np.clip(left / row, 0.0, 1.0)
        left = left - row
    return place


def _after(
    wall: _Wall, energy: Array, cosine: Array, weight: Array, place: Array, rng: np.random.Generator
) -> tuple[Array, Array, Array]:
    """Energy, direction and weight after a collision."""
    after, turned, factor = np.empty_like(energy), np.empty_like(energy), np.empty_like(energy)
    layer = np.minimum(place.astype(np.int64), len(wall.stuff) - 1)
    for k, stuff in enumerate(wall.stuff):
        mine = np.flatnonzero(layer == k)
        if mine.size:
            after[mine], c, factor[mine] = collide(stuff, energy[mine], rng)
            phi = 2 * np.pi * rng.random(mine.size)
            sines = np.sqrt((1 - cosine[mine] ** 2) * (1 - c * c))
            turned[mine] = cosine[mine] * c + sines * np.cos(phi)
    return after, np.clip(turned, -1.0, 1.0), weight * factor


def _score(
    tally: Array, wall: _Wall, energy: Array, cosine: Array, weight: Array, place: Array, incident: float
) -> None:
    """Expected crossings of the face that each photon heads for."""
    depths = wall.depths(energy)
    before, whole = _depth_at(depths, place), depths.sum(axis=0)
    steep = np.abs(cosine)
    ahead = np.where(cosine > 0, whole - before, before) / np.maximum(steep, 1e-12)
    number = weight * np.exp(-ahead)
    dosed = number * kerma(energy) / np.maximum(steep, 1e-12) / incident
    cell = np.where(cosine > 0, 0, BINS) + np.minimum((steep * BINS).astype(np.int64), BINS - 1)
    for q, value in enumerate((dosed, number)):
        tally[q] += np.bincount(cell, weights=value, minlength=2 * BINS).reshape(2, BINS)
