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

UNIFORM_SHARE = 0.5
"""Share of depths drawn evenly over the optical depth; the rest follow the beam's own weakening."""


def first_collisions(
    origin: Array,
    field: BeamField,
    spectrum: Spectrum,
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
    energy, photons = _draw_energies(spectrum, uniform[:, 3])
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


def _towards(origin: Array, field: BeamField, bodies: Bodies, group: int, uniform: Array) -> tuple[Array, Array]:
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


def _draw_energies(spectrum: Spectrum, uniform: Array) -> tuple[Array, Array]:
    """Energies (n,) and the photons per steradian that each stands for.

    Half are drawn by the number of photons, half by photons times energy squared: what passes a barrier is the
    upper end of the spectrum.
    """
    by_number = spectrum.photons / spectrum.photons.sum()
    by_energy = spectrum.photons * spectrum.energy_kev**2
    chance = 0.5 * by_number + 0.5 * by_energy / by_energy.sum()
    drawn = np.minimum(np.searchsorted(np.cumsum(chance), uniform), chance.size - 1)
    return spectrum.energy_kev[drawn], spectrum.photons[drawn] / chance[drawn]


def _draw_depths(total: Array, uniform: Array) -> tuple[Array, Array]:
    """Optical depths (n,) below ``total``, and the density they were drawn with."""
    safe = np.maximum(total, 1e-300)
    even = uniform < UNIFORM_SHARE
    chosen = np.where(even, uniform / UNIFORM_SHARE, (uniform - UNIFORM_SHARE) / (1.0 - UNIFORM_SHARE))
    stopped = -np.expm1(-safe)
    depth = np.where(even, chosen * safe, -np.log1p(-chosen * stopped))
    density = UNIFORM_SHARE / safe + (1.0 - UNIFORM_SHARE) * np.exp(-depth) / stopped
    return np.minimum(depth, safe), density
