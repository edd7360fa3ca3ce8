"""Walks on from first collisions: scatter, fly, be forced to collide again, and count every keV."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.bodies import Bodies, locate
from scatterbay.engine.energies import Ladder, Rungs
from scatterbay.engine.media import Matter
from scatterbay.engine.points import ScatterPoints
from scatterbay.engine.turning import coherent_cosines, incoherent_cosines, turned
from scatterbay.physics.compton import scattered_energy
from scatterbay.physics.constants import PAIR_THRESHOLD
from scatterbay.physics.slab.grid import LOWEST_KEV

Array = NDArray[np.float64]
Ints = NDArray[np.int64]

INCOHERENT, COHERENT, LOCAL = 0, 1, 2
LEFT_OVER = 1e-4
"""The walk ends when the photons still under way carry less than this share of the first collisions' energy."""
HIGHEST_ORDER = 60


@dataclass
class Balance:
    """Where the energy of the first collisions went [keV per unit of output], each by its own count."""

    entered: float = 0.0
    absorbed: float = 0.0
    escaped: float = 0.0
    cut_off: float = 0.0
    """Carried by photons that fell below 10 keV, or were still under way when the walk ended."""

    def add(self, other: Balance) -> None:
        """Add another balance to this one."""
        self.entered += other.entered
        self.absorbed += other.absorbed
        self.escaped += other.escaped
        self.cut_off += other.cut_off


@dataclass
class Walk:
    """Points of all orders, and the balance of their energy."""

    points: ScatterPoints
    balance: Balance = field(default_factory=Balance)


def walk_on(first: ScatterPoints, bodies: Bodies, ladder: Ladder, random: np.random.Generator) -> Walk:
    """Points of order 2 and higher that follow from first collisions, which are not repeated in the result."""
    balance = Balance(entered=float(first.collisions @ first.energy_kev))
    points, found = first, []
    for _ in range(2, HIGHEST_ORDER + 1):
        points = _next_collisions(points, bodies, ladder, random, balance)
        if not len(points):
            break
        under_way = float(points.collisions @ points.energy_kev)
        if under_way < LEFT_OVER * balance.entered:
            balance.cut_off += under_way
            break
        found.append(points)
    else:
        balance.cut_off += float(points.collisions @ points.energy_kev)
    return Walk(ScatterPoints.joined(found) if found else first.some(slice(0, 0)), balance)


def _next_collisions(
    points: ScatterPoints, bodies: Bodies, ladder: Ladder, random: np.random.Generator, balance: Balance
) -> ScatterPoints:
    """One flight: what leaves each collision, turned, flown through the bodies and collided again."""
    direction, energy, weight = _scattered(points, bodies.matters, ladder, random, balance)
    slow = energy < LOWEST_KEV
    balance.cut_off += float(weight[slow] @ energy[slow])
    fast = np.flatnonzero(~slow & (weight > 0.0))
    position, direction, energy, weight = points.position[fast], direction[fast], energy[fast], weight[fast]
    rungs = ladder.rungs(energy)
    track = bodies.track(position, direction)
    depths = track.depths(bodies.linear(rungs), np.ones(len(fast)))
    total = depths.sum(axis=1)
    stopped = -np.expm1(-total)
    balance.escaped += float((weight * np.exp(-total)) @ energy)
    wanted = -np.log1p(-random.random(len(fast)) * stopped)
    along, matter = locate(track, depths, np.minimum(wanted, total))
    collided = total > 0.0
    return ScatterPoints(
        position + along[:, None] * direction,
        direction,
        energy,
        weight * stopped,
        matter,
        points.order[fast] + 1,
        points.replicate[fast],
    ).some(collided)


def _scattered(
    points: ScatterPoints, matters: Sequence[Matter], ladder: Ladder, random: np.random.Generator,
    balance: Balance,
) -> tuple[Array, Array, Array]:  # fmt: skip
    """Direction (n, 3), energy (n,) and weight (n,) of the photon that leaves each collision.

    One channel is drawn per point, in proportion to the energy it takes on, and weighted so that the energy of
    every single point is conserved: what is not taken on is counted as absorbed, channel by channel.
    """
    direction, energy = points.direction.copy(), points.energy_kev.copy()
    weight = np.zeros(len(points))
    rungs = ladder.rungs(points.energy_kev)
    for number, matter in enumerate(matters):
        mine = np.flatnonzero(points.matter == number)
        if not mine.size:
            continue
        at, before = rungs.some(mine), points.energy_kev[mine]
        per_total = points.collisions[mine] / at.of(matter.total)
        balance.absorbed += _left_behind(matter, at, before, per_total)
        channel, weight[mine], after = _draw_channel(matter, at, before, per_total, random)
        energy[mine] = after
        balance.absorbed += _turn(matter, channel, mine, points, direction, energy, weight, random)
    return direction, energy, weight


def _left_behind(matter: Matter, at: Rungs, energy: Array, per_total: Array) -> float:
    """Energy that photoelectric absorption and pair production leave, less what comes out as photons again."""
    lines, made = matter.lines
    k_lines = (lines[:-1, None] * at.of(made[:-1])).sum(axis=0)
    photo = at.of(matter.photoelectric) * energy - k_lines
    pair = at.of(matter.pair) * (energy - PAIR_THRESHOLD)
    return float(per_total @ (photo + pair))


def _draw_channel(
    matter: Matter, at: Rungs, energy: Array, per_total: Array, random: np.random.Generator
) -> tuple[Ints, Array, Array]:
    """Channel, weight and energy before any recoil of the photon that goes on."""
    lines, made = matter.lines
    amounts = np.concatenate([[at.of(matter.incoherent), at.of(matter.coherent)], at.of(made)])
    energies = np.concatenate([[energy, energy], np.broadcast_to(lines[:, None], (lines.size, energy.size))])
    carried = amounts * energies
    total = carried.sum(axis=0)
    drawn = (np.cumsum(carried, axis=0) <= random.random(energy.size) * total).sum(axis=0)
    drawn = np.minimum(drawn, len(carried) - 1)
    after = energies[drawn, np.arange(energy.size)]
    return np.minimum(drawn, LOCAL), per_total * total / after, after


def _turn(
    matter: Matter, channel: Ints, mine: Ints, points: ScatterPoints, direction: Array, energy: Array, weight: Array,
    random: np.random.Generator,
) -> float:  # fmt: skip
    """Turn the photons of one matter, each by its channel; returns the energy left to recoiling electrons."""
    recoil = 0.0
    cosine = 2.0 * random.random(mine.size) - 1.0
    incoherent, coherent = channel == INCOHERENT, channel == COHERENT
    before = points.energy_kev[mine]
    cosine[incoherent] = incoherent_cosines(matter.medium.incoherent_shape, before[incoherent], random)
    if coherent.any():
        cosine[coherent] = coherent_cosines(matter.medium.coherent_shape, before[coherent], random)
    after = scattered_energy(before[incoherent], cosine[incoherent])
    recoil = float(weight[mine[incoherent]] @ (before[incoherent] - after))
    energy[mine[incoherent]] = after
    direction[mine] = turned(points.direction[mine], cosine, random.random(mine.size))
    return recoil
