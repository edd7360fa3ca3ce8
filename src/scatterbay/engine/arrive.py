"""What scatter points and isotropic emitters give to a place: through bodies and walls, by inverse square."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.bodies import Bodies
from scatterbay.engine.energies import Ladder, Rungs
from scatterbay.engine.media import Matter, free_electron, momentum, thomson
from scatterbay.engine.points import ScatterPoints
from scatterbay.engine.walls import Walls
from scatterbay.physics import dose
from scatterbay.physics.constants import ELECTRON_REST_ENERGY
from scatterbay.physics.slab.grid import LOWEST_KEV

Array = NDArray[np.float64]

CHUNK = 8192
"""Pairs worked on at a time: their arrays stay in the processor's cache."""
SMALL_COHERENT = 2e-3
"""Coherent scattering below this share of incoherent is carried at the incoherent energy."""


@dataclass(frozen=True)
class Surroundings:
    """What lies between points and places."""

    bodies: Bodies
    walls: Walls
    ladder: Ladder


def dose_from_points(points: ScatterPoints, place: Array, around: Surroundings) -> Array:
    """Dose at a place from each scatter point, per unit of output: (q, n) [Gy, Sv].

    weight x (d sigma / d Omega)(E, theta) x exp(-depth in bodies) x dose per fluence behind the walls at the
    energy after scattering / r^2, for the incoherent channel, the coherent one, and locally made photons.
    """
    result = np.zeros((len(dose.QUANTITIES), len(points)))
    for start in range(0, len(points), CHUNK):
        part = slice(start, start + CHUNK)
        result[:, part] = _from_chunk(points.some(part), place, around)
    return result


def dose_from_emitters(position: Array, energy_kev: Array, place: Array, around: Surroundings) -> Array:
    """Dose at a place per photon per steradian sent its way from each position, (q, n) [Gy sr, Sv sr]."""
    ray = place - position
    length = np.linalg.norm(ray, axis=1)
    return _carried(position, ray, length, place, around.ladder.rungs(energy_kev), around)


def _from_chunk(points: ScatterPoints, place: Array, around: Surroundings) -> Array:
    ray = place - points.position
    length = np.sqrt(np.einsum("ij,ij->i", ray, ray))
    cosine = np.einsum("ij,ij->i", ray, points.direction) / length
    ratio = 1.0 / (1.0 + points.energy_kev / ELECTRON_REST_ENERGY * (1.0 - cosine))
    before = around.ladder.rungs(points.energy_kev)
    incoherent, coherent, local = _strengths(points, before, cosine, ratio, around.bodies.matters)
    shifted = points.energy_kev * ratio
    slow = shifted < LOWEST_KEV
    small = coherent < SMALL_COHERENT * incoherent
    strength = np.where(slow, 0.0, incoherent + np.where(small, coherent, 0.0))
    rungs = around.ladder.rungs(shifted)
    result = strength * _carried(points.position, ray, length, place, rungs, around)
    large = np.flatnonzero(~small & (coherent > 0.0))
    if large.size:
        at = before.some(large)
        kept = points.position[large], ray[large], length[large]
        result[:, large] += coherent[large] * _carried(*kept, place, at, around)
    for some, energy, amount in local:
        at = around.ladder.rungs(np.full(some.size, energy))
        kept = points.position[some], ray[some], length[some]
        result[:, some] += amount * _carried(*kept, place, at, around)
    return result


def _strengths(
    points: ScatterPoints, before: Rungs, cosine: Array, ratio: Array, matters: list[Matter] | tuple[Matter, ...]
) -> tuple[Array, Array, list[tuple[NDArray[np.int64], float, Array]]]:  # fmt: skip
    """Photons per steradian sent towards the place: incoherent (n,), coherent (n,), and per local line."""
    incoherent, coherent = np.zeros(len(points)), np.zeros(len(points))
    local = []
    transfer = momentum(points.energy_kev, cosine)
    for number, matter in enumerate(matters):
        mine = np.flatnonzero(points.matter == number) if len(matters) > 1 else np.arange(len(points))
        if not mine.size:
            continue
        at = before.some(mine)
        per_total = points.collisions[mine] / at.of(matter.total)
        mesh = matter.mesh_position(transfer[mine])
        incoherent[mine] = per_total * free_electron(ratio[mine], cosine[mine]) * matter.electrons(mesh)
        coherent[mine] = per_total * thomson(cosine[mine]) * matter.form_factor_squared(mesh)
        lines, made = matter.lines
        for energy, row in zip(lines, made, strict=True):
            amount = per_total * at.of(row) / (4.0 * np.pi)
            some = np.flatnonzero(amount > 0.0)
            if some.size:
                local.append((mine[some], float(energy), amount[some]))
    return incoherent, coherent, local


def _carried(start: Array, ray: Array, length: Array, place: Array, rungs: Rungs, around: Surroundings) -> Array:
    """Dose at the place per photon per steradian, (q, n)."""
    log = around.walls.log_dose(start, place, rungs)
    if around.bodies.parts:
        log -= around.bodies.depth(start, ray, length, rungs)
    return np.exp(log) / (length * length)
