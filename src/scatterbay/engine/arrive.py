"""What scatter points and isotropic emitters give to a place: through bodies and walls, by inverse square."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.bodies import Bodies
from scatterbay.engine.energies import Ladder, Rungs
from scatterbay.engine.media import Matter, free_electron, momentum, thomson
from scatterbay.engine.points import ScatterPoints
from scatterbay.engine.walls import Walls, Way
from scatterbay.errors import UsageError
from scatterbay.physics import dose
from scatterbay.physics.constants import ELECTRON_REST_ENERGY
from scatterbay.physics.slab.grid import LOWEST_KEV

Array = NDArray[np.float64]
Ints = NDArray[np.int64]

CHUNK = 8192
"""Pairs worked on at a time: their arrays stay in the processor's cache."""
SMALL_COHERENT = 2e-3
"""Coherent scattering below this share of incoherent is carried at the incoherent energy."""


@dataclass(frozen=True)
class Surroundings:
    """What lies between points and places."""

    bodies: Bodies
    faces: Walls | None
    """None: nothing but bodies."""
    ladder: Ladder

    @property
    def walls(self) -> Walls:
        """The faces, where there must be some."""
        if self.faces is None:
            raise UsageError("these surroundings have no walls")
        return self.faces

    @cached_property
    def free_log_dose(self) -> Array:
        """ln dose per unit fluence with nothing in the way, on the ladder: (q, rungs)."""
        return np.log(dose.per_fluence(self.ladder.energy_kev))


@dataclass(frozen=True)
class Readied:
    """Scatter points with all that does not depend on the place.

    ``before``: their energies on the ladder. ``per_total``: collisions over the mass attenuation coefficient.
    ``by_matter``: numbers of the points in each matter that occurs. ``local``: photons per steradian of each
    locally made line: the points, the energy, the amount.
    """

    points: ScatterPoints
    before: Rungs
    per_total: Array
    by_matter: list[tuple[Matter, Ints | slice]]
    local: list[tuple[Ints, float, Array]]


def ready(points: ScatterPoints, around: Surroundings) -> list[Readied]:
    """Scatter points in chunks, ready for any number of places."""
    starts = range(0, len(points), CHUNK)
    return [_readied(points.some(slice(start, start + CHUNK)), around) for start in starts]


def _readied(points: ScatterPoints, around: Surroundings) -> Readied:
    before = around.ladder.rungs(points.energy_kev)
    per_total, by_matter, local = np.zeros(len(points)), [], []
    for number, matter in enumerate(around.bodies.matters):
        mine = np.flatnonzero(points.matter == number)
        if not mine.size:
            continue
        at = before.some(mine)
        per_total[mine] = points.collisions[mine] / at.of(matter.total)
        by_matter.append((matter, slice(None) if mine.size == len(points) else mine))
        for energy, row in zip(*matter.lines, strict=True):
            amount = per_total[mine] * at.of(row) / (4.0 * np.pi)
            some = np.flatnonzero(amount)
            if some.size:
                local.append((mine[some], float(energy), amount[some]))
    return Readied(points, before, per_total, by_matter, local)


def dose_from_points(readied: list[Readied], place: Array, around: Surroundings) -> Array:
    """Dose at a place from each scatter point, per unit of output: (q, n) [Gy, Sv].

    weight x (d sigma / d Omega)(E, theta) x exp(-depth in bodies) x dose per fluence behind the walls at the
    energy after scattering / r^2, for the incoherent channel, the coherent one, and locally made photons.
    """
    return np.concatenate([_from_chunk(chunk, place, around) for chunk in readied], axis=1)


def dose_from_emitters(position: Array, energy_kev: Array, place: Array, around: Surroundings) -> Array:
    """Dose at a place per photon per steradian sent its way from each position, (q, n) [Gy sr, Sv sr]."""
    return Sight.between(position, place, around).carried(around.ladder.rungs(energy_kev))


@dataclass(frozen=True)
class Sight:
    """The straight lines from n positions to one place, and all that lies on them.

    ``ray`` (n, 3) and ``length`` (n,) [m]; ``ways``: rays by the walls they cross; ``matter``: per part of a body
    its attenuation over its surroundings on the ladder [1/m], the rays that meet it, and how far they run in it.
    """

    ray: Array
    length: Array
    ways: list[Way]
    matter: list[tuple[Array, Ints, Array]]
    around: Surroundings

    @classmethod
    def between(cls, position: Array, place: Array, around: Surroundings) -> Sight:
        """Look from positions (n, 3) to a place (3,), or each to its own (n, 3)."""
        ray = place - position
        length = np.sqrt(np.einsum("ij,ij->i", ray, ray))
        everything = np.arange(len(ray))
        ways = around.faces.ways(position, place) if around.faces else [Way(everything, None, None)]
        return cls(ray, length, ways, around.bodies.on_the_way(position, ray, length), around)

    def carried(self, rungs: Rungs) -> Array:
        """Dose at the place per photon per steradian at these energies (n,): (q, n)."""
        log = np.empty((len(dose.QUANTITIES), len(self.length)))
        for way in self.ways:
            at = rungs if len(self.ways) == 1 else rungs.some(way.rays)
            if way.behind is None or way.cosine is None:
                found = at.of(self.around.free_log_dose)
            else:
                found = way.behind.log_dose(at, way.cosine)
            if len(self.ways) == 1:
                log = found
            else:
                log[:, way.rays] = found
        for excess, rays, inside in self.matter:
            if rays.size == self.length.size:
                log -= rungs.of(excess) * inside
            else:
                log[:, rays] -= rungs.some(rays).of(excess) * inside
        np.exp(log, out=log)
        log /= self.length * self.length
        return log

    def some(self, chosen: Ints) -> Sight:
        """The sight of some of the positions, in the same order."""
        number = np.full(len(self.length), -1)
        number[chosen] = np.arange(chosen.size)
        ways = []
        for way in self.ways:
            if way.behind is None and len(self.ways) == 1:
                ways.append(Way(np.arange(chosen.size), None, None))
                continue
            mine = number[way.rays]
            kept = mine >= 0
            if kept.any():
                ways.append(Way(mine[kept], way.behind, None if way.cosine is None else way.cosine[kept]))
        matter = []
        for excess, rays, inside in self.matter:
            mine = number[rays]
            kept = mine >= 0
            matter.append((excess, mine[kept], inside[kept]))
        return Sight(self.ray[chosen], self.length[chosen], ways, matter, self.around)


def from_pairs(chunk: Readied, places: Array, around: Surroundings) -> Array:
    """Dose at places (m, 3) from each scatter point of a chunk, per unit of output: (q, m, n)."""
    count, many = len(chunk.points), len(places)
    numbers = np.tile(np.arange(count), many)
    shift = (count * np.arange(many))[:, None]
    by_matter: list[tuple[Matter, Ints | slice]] = []
    for matter, mine in chunk.by_matter:
        whole = isinstance(mine, slice)
        by_matter.append((matter, mine if whole else (shift + np.asarray(mine)).ravel()))
    local = [((shift + rays).ravel(), energy, np.tile(amount, many)) for rays, energy, amount in chunk.local]
    tiled = Readied(
        chunk.points.some(numbers), chunk.before.some(numbers), chunk.per_total[numbers], by_matter, local
    )  # fmt: skip
    found = _from_chunk(tiled, np.repeat(places, count, axis=0), around)
    return found.reshape(len(found), many, count)


def _from_chunk(chunk: Readied, place: Array, around: Surroundings) -> Array:
    """``place``: one (3,), or one for each point (n, 3)."""
    points = chunk.points
    sight = Sight.between(points.position, place, around)
    cosine = np.einsum("ij,ij->i", sight.ray, points.direction) / sight.length
    ratio = 1.0 / (1.0 + points.energy_kev / ELECTRON_REST_ENERGY * (1.0 - cosine))
    incoherent, coherent = _strengths(chunk, cosine, ratio)
    shifted = points.energy_kev * ratio
    small = coherent < SMALL_COHERENT * incoherent
    strength = (incoherent + np.where(small, coherent, 0.0)) * (shifted >= LOWEST_KEV)
    result = sight.carried(around.ladder.rungs(shifted))
    result *= strength
    large = np.flatnonzero(~small)
    if large.size:
        result[:, large] += coherent[large] * sight.some(large).carried(chunk.before.some(large))
    for rays, energy, amount in chunk.local:
        at = around.ladder.rungs(np.full(rays.size, energy))
        result[:, rays] += amount * sight.some(rays).carried(at)
    return result


def _strengths(chunk: Readied, cosine: Array, ratio: Array) -> tuple[Array, Array]:
    """Photons per steradian sent towards the place, incoherent and coherent, (n,) each."""
    incoherent, coherent = chunk.per_total * free_electron(ratio, cosine), chunk.per_total * thomson(cosine)
    transfer = momentum(chunk.points.energy_kev, cosine)
    for matter, mine in chunk.by_matter:
        mesh = matter.mesh_position(transfer[mine])
        incoherent[mine] *= matter.electrons(mesh)
        coherent[mine] *= matter.form_factor_squared(mesh)
    return incoherent, coherent
