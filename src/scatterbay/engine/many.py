"""What arrives at many places at once: the same sums as for one place, over all pairs of points and places."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.arrive import Readied, Sight, Surroundings, from_pairs, ready
from scatterbay.engine.contributions import (
    COLLIMATOR,
    LEAKAGE,
    PRIMARY,
    REPLICATES,
    SCATTER,
    Effort,
    Kept,
    scatter_points,
)
from scatterbay.engine.primary import (
    PrimaryBeam,
    lit_patches,
    primary_straight,
    shine_on_many,
    with_prefix,
)
from scatterbay.engine.scene import Scene, SceneBeam
from scatterbay.physics import dose
from scatterbay.physics.spectrum import Spectrum

Array = NDArray[np.float64]

PAIRS = 16384
"""Pairs of points and places worked on at a time."""
COARSE = Effort(24, 10, 1)
"""A thousand scatter points or so: standard errors of ten per cent, the same everywhere."""


@dataclass(frozen=True)
class ManyRates:
    """At n places: rates while a beam is on, by (path, beam), (q, n) [Gy/s, Sv/s]; of stored sources, by source.

    ``scatter``: scatter of each beam by replicate, (replicates, q, n).
    """

    beams: dict[tuple[str, str], Array]
    stored: dict[str, Array]
    scatter: dict[str, Array]

    def whole(self, beam: str) -> Array:
        """All paths of a beam (q, n)."""
        found = [rate for (_, name), rate in self.beams.items() if name == beam]
        return np.sum(found, axis=0)


def at_many(scene: Scene, places: Array, effort: Effort = COARSE, kept: Kept | None = None) -> ManyRates:
    """Rates at many places (n, 3) [m] from one batch of scatter points; travelling and stuck sources are left out."""
    known = {} if kept is None else kept
    found = ManyRates({}, {}, {})
    for number, beam in enumerate(scene.beams):
        found.beams[PRIMARY, beam.name] = beam.drive * _primary(scene, beam, places)
        if beam.leakage is not None:
            found.beams[LEAKAGE, beam.name] = beam.drive * isotropic(
                beam.origin, beam.leakage.spectrum, places, scene.around
            )
        if beam.collimator is not None:
            given = isotropic(beam.origin, beam.collimator, places, scene.around)
            given[:, beam.field.holds(places - beam.origin)] = 0.0
            found.beams[COLLIMATOR, beam.name] = beam.drive * given
        if (number, 0) not in known:
            known[number, 0] = scatter_points(scene, number, 0, effort)
        each = beam.drive * _scatter(ready(known[number, 0][0], scene.around), places, scene.around)
        found.scatter[beam.name] = each
        found.beams[SCATTER, beam.name] = each.mean(axis=0)
    for one in scene.stored:
        found.stored[one.source] = isotropic(one.at, one.spectrum, places, scene.around)
    return found


def isotropic(origin: Array, spectrum: Spectrum, places: Array, around: Surroundings) -> Array:
    """What leaves a point evenly in all directions gives to places, (q, n), per unit of output."""
    energy, photons = spectrum.energy_kev, spectrum.photons
    result = np.zeros((len(dose.QUANTITIES), len(places)))
    size = max(1, PAIRS // energy.size)
    for first in range(0, len(places), size):
        some = places[first : first + size]
        end = np.repeat(some, energy.size, axis=0)
        start = np.broadcast_to(origin, end.shape)
        rungs = around.ladder.rungs(np.tile(energy, len(some)))
        carried = Sight.between(start, end, around).carried(rungs)
        result[:, first : first + size] = carried.reshape(len(result), len(some), energy.size) @ photons
    return result


def _scatter(readied: Sequence[Readied], places: Array, around: Surroundings) -> Array:
    """Scatter by replicate (replicates, q, n), per unit of output."""
    result = np.zeros((REPLICATES, len(dose.QUANTITIES), len(places)))
    for chunk in readied:
        size = max(1, PAIRS // len(chunk.points))
        for first in range(0, len(places), size):
            some = places[first : first + size]
            given = from_pairs(chunk, some, around)
            for replicate in range(REPLICATES):
                mine = chunk.points.replicate == replicate
                result[replicate, :, first : first + size] += given[:, :, mine].sum(axis=2)
    return result


def _primary(scene: Scene, beam: SceneBeam, places: Array) -> Array:
    """The primary at places (q, n), per unit of output: straight on, and from the patches it lights."""
    narrow = PrimaryBeam(beam.origin, beam.field, beam.spectrum, beam.bodies_count)
    around = with_prefix(narrow, beam.prefix, scene.around)
    breadth = around.walls.enclosure.breadth
    inside = np.flatnonzero(beam.field.holds(places - beam.origin, breadth))
    patches = lit_patches(narrow, around)
    shine = np.zeros((len(dose.QUANTITIES), len(places)))
    for patch in patches:
        shine += shine_on_many(narrow, patch, places, around)
    for k in inside:
        uncollided, plane = primary_straight(narrow, places[k], around)
        whole = scene.primary_by_plane or not patches
        shine[:, k] = plane if whole else np.minimum(uncollided + shine[:, k], plane)
    return shine
