"""First collisions of a beam in a body: forced, from evenly spread directions, depths and energies."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.bodies import Bodies, locate
from scatterbay.engine.energies import Ladder
from scatterbay.engine.fields import BeamField, sample_cone
from scatterbay.engine.points import ScatterPoints
from scatterbay.engine.sequence import generator, spread_points
from scatterbay.physics.spectrum import Spectrum

Array = NDArray[np.float64]

STEEPNESS = (0.0, 1.0, 3.0)
"""Depths are drawn from a mixture of exp(-s tau) with these s, in equal parts: evenly, as the beam weakens, and
near the surface, where what is scattered back comes from."""
BY_NUMBER = 0.4
"""Share of energies drawn by the number of photons; the rest by what they may do at the places."""


def first_collisions(
    origin: Array,
    field: BeamField,
    spectrum: Spectrum,
    importance: Array,
    bodies: Bodies,
    group: int,
    ladder: Ladder,
    per_replicate: int,
    replicates: int,
    stream: tuple[int, ...],
) -> ScatterPoints:
    """First collisions in one group of parts, per unit of output, in independent replicates.

    Parameters
    ----------
    origin : where the source stands (3,) [m].
    field : directions the beam goes.
    spectrum : photons per steradian and unit of output.
    importance : chance of drawing each energy of the spectrum for what it may do at the places, (e,), sums to 1.
    bodies : all bodies; those in front of the group weaken the beam.
    group : number of the group's outermost part.
    ladder : energies of the tables.
    per_replicate, replicates : numbers of points and of replicates.
    stream : seed and numbers that name the random stream.
    """
    random = generator(*stream)
    uniform = np.concatenate([spread_points(per_replicate, 4, random.random(4)) for _ in range(replicates)])
    replicate = np.repeat(np.arange(replicates), per_replicate)
    direction, solid_angle = _towards(origin, field, bodies, group, uniform[:, :2])
    energy, photons = _draw_energies(spectrum, importance, uniform[:, 3])
    rungs = ladder.rungs(energy)
    start, unit = np.broadcast_to(origin, direction.shape), np.ones(len(direction))
    track = bodies.track(start, direction, group)
    depths = track.depths(bodies.linear(rungs), unit)
    total = depths.sum(axis=1)
    wanted, density = _draw_depths(total, uniform[:, 2])
    along, matter = locate(track, depths, wanted)
    in_front = bodies.depth(start, direction * along[:, None], along, rungs, leave_out=group)
    arriving = photons * solid_angle / per_replicate
    collisions = arriving * np.exp(-in_front - wanted) / density
    hit = (total > 0.0) & (solid_angle > 0.0)
    points = ScatterPoints(
        origin + along[:, None] * direction,
        direction,
        energy,
        np.where(hit, collisions, 0.0),
        matter,
        np.ones(len(energy), dtype=np.int64),
        replicate,
    )
    return points.some(hit)


def _towards(
    origin: Array, field: BeamField, bodies: Bodies, group: int, uniform: Array
) -> tuple[Array, Array]:
    """Directions over the field, or over the cone that holds the group if that is the narrower of the two."""
    surface = bodies.parts[group].solid.surface() - origin
    middle = bodies.parts[group].solid.centre - origin
    distance = float(np.linalg.norm(middle))
    inside = bool(bodies.parts[group].solid.contains(origin[None, :])[0])
    if not inside and distance > 0.0:
        axis = middle / distance
        least = float(((surface @ axis) / np.linalg.norm(surface, axis=1)).min())
        least = np.cos(min(np.pi, 1.02 * np.arccos(np.clip(least, -1.0, 1.0)) + 1e-3))
        if 2.0 * np.pi * (1.0 - least) < field.solid_angle:
            directions, angle = sample_cone(axis, least, uniform)
            return directions, np.where(field.holds(directions), angle, 0.0)
    return field.sample(uniform)


def _draw_energies(spectrum: Spectrum, importance: Array, uniform: Array) -> tuple[Array, Array]:
    """Energies (n,) and the photons per steradian that each stands for."""
    chance = BY_NUMBER * spectrum.photons / spectrum.photons.sum() + (1.0 - BY_NUMBER) * importance
    drawn = np.minimum(np.searchsorted(np.cumsum(chance), uniform), chance.size - 1)
    return spectrum.energy_kev[drawn], spectrum.photons[drawn] / chance[drawn]


def _draw_depths(total: Array, uniform: Array) -> tuple[Array, Array]:
    """Optical depths (n,) below ``total``, and the density they were drawn with."""
    safe = np.maximum(total, 1e-300)
    kinds = len(STEEPNESS)
    kind = np.minimum((uniform * kinds).astype(np.int64), kinds - 1)
    chosen = uniform * kinds - kind
    depth = np.empty(len(safe))
    for k, steep in enumerate(STEEPNESS):
        mine = kind == k
        depth[mine] = _inverse(steep, safe[mine], chosen[mine])
    density = sum(_density(steep, safe, depth) for steep in STEEPNESS) / kinds
    return np.minimum(depth, safe), np.asarray(density)


def _inverse(steep: float, total: Array, chosen: Array) -> Array:
    """Depth that a share ``chosen`` of the truncated exponential law lies below."""
    if steep == 0.0:
        return chosen * total
    return -np.log1p(chosen * np.expm1(-steep * total)) / steep


def _density(steep: float, total: Array, depth: Array) -> Array:
    """Density of the truncated exponential law."""
    if steep == 0.0:
        return 1.0 / total
    return steep * np.exp(-steep * depth) / -np.expm1(-steep * total)
