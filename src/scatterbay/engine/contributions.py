"""Contributions: what arrives at each place, by beam, path and order, per unit of output."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.arrive import dose_from_emitters, dose_from_points, ready
from scatterbay.engine.first import first_collisions
from scatterbay.engine.looking import BEAM, STORED, STUCK, TRAVEL, ScenePlace
from scatterbay.engine.points import ScatterPoints
from scatterbay.engine.primary import PrimaryBeam, lit_patches, primary_at, with_prefix, without_bodies
from scatterbay.engine.scene import Scene, SceneBeam
from scatterbay.engine.sequence import generator
from scatterbay.engine.travel import dose_along, highest_along
from scatterbay.engine.walk import Balance, walk_on
from scatterbay.physics import dose
from scatterbay.physics.compton import scattered_energy
from scatterbay.physics.slab.grid import LOWEST_KEV
from scatterbay.physics.spectrum import Spectrum

Array = NDArray[np.float64]

REPLICATES = 16
FIRST_PER_REPLICATE = 512
WALKS_PER_REPLICATE = 256
MOST_BATCHES = 12
WANTED_ERROR = 0.02
"""Batches of points are added until the standard error of the scatter of a beam is below this share of all that
arrives from the beam, at every place, or until there are MOST_BATCHES."""

PRIMARY, SCATTER, LEAKAGE, COLLIMATOR = "primary", "scatter", "leakage", "collimator"
MINUTE = "travel in a minute"
"""Highest of a travelling source over a minute, kept beside the dose of a pass: for the instantaneous rate only."""
PLANE_BOUND = "primary as a plane"
"""Kept beside the primary as its upper bound; never added to it."""
MINUTE_SECONDS = 60.0
"""An instantaneous rate is averaged over a minute at most."""
HIGHER = 2
"""Order that stands for two and more."""


@dataclass(frozen=True)
class Contribution:
    """One row: values (replicates, q) per unit of output [Gy or Sv per coulomb or decay].

    ``beam``: name of the beam, or of the source where no beam is on. ``state``: beam, stored, travel or stuck.
    ``order``: 0 for what has not scattered in a body, 1 for single scatter, 2 for two and more.
    ``drive``: output per second, so that drive times values is a rate; of a travelling source, the dose of one pass.
    """

    place: str
    beam: str
    path: str
    order: int
    values: Array
    drive: float
    state: str = BEAM

    @property
    def bound(self) -> bool:
        """An upper bound kept beside the others, never added to them."""
        return self.path in (PLANE_BOUND, MINUTE)


@dataclass(frozen=True)
class Contributions:
    """All rows, and the energy balance of each beam's walk."""

    rows: tuple[Contribution, ...]
    balances: dict[str, Balance]


@dataclass(frozen=True)
class Effort:
    """How many first collisions and walks a replicate has, and the most batches of them."""

    first: int
    walks: int
    batches: int


FULL = Effort(FIRST_PER_REPLICATE, WALKS_PER_REPLICATE, MOST_BATCHES)
THIN = Effort(64, 32, 1)
"""For many places at once: standard errors of several per cent."""

Kept = dict[tuple[int, int], tuple[ScatterPoints, Balance]]
"""Scatter points by number of the beam and batch, to be used again with other walls."""


def contributions(scene: Scene, effort: Effort = FULL, kept: Kept | None = None) -> Contributions:
    """Compute every row of a scene.

    ``kept`` is filled with the scatter points, and those in it already are used: the same points then serve scenes
    that differ in their walls or places only, so that their results differ by that alone.
    """
    points = {} if kept is None else kept
    rows: list[Contribution] = []
    balances = {}
    for number, beam in enumerate(scene.beams):
        steady = _primary_rows(scene, beam) + _leakage_rows(scene, beam) + _collimator_rows(scene, beam)
        scattered, balances[beam.name] = _scatter_rows(scene, number, steady, effort, points)
        rows += steady + scattered
    rows += [row for place in scene.places for row in rows_without_beam(scene, place)]
    return Contributions(tuple(rows), balances)


def scatter_points(
    scene: Scene, number: int, batch: int = 0, effort: Effort = FULL
) -> tuple[ScatterPoints, Balance]:
    """Scatter points of all orders of one beam, and where their energy went: one batch.

    Walks start from the first half of each replicate's first collisions; their weights make up for it, since
    weights are per replicate.
    """
    beam, around = scene.beams[number], scene.around
    parts, balance = [], Balance()
    for group in around.bodies.groups:
        importance = _importance(scene, beam, group)
        common = (beam.origin, beam.field, beam.spectrum, importance, around.bodies, group, around.ladder)
        stream = (scene.seed, number, group, batch)
        first = first_collisions(*common, effort.first, REPLICATES, stream)
        if not len(first):
            continue
        starts = first_collisions(*common, effort.walks, REPLICATES, stream)
        walk = walk_on(starts, around.bodies, around.ladder, generator(*stream, 1))
        parts += [first, walk.points]
        balance.add(walk.balance)
    return ScatterPoints.joined(parts) if parts else ScatterPoints.none(), balance


def _scatter_rows(
    scene: Scene, number: int, steady: list[Contribution], effort: Effort, kept: Kept
) -> tuple[list[Contribution], Balance]:
    """Single and higher scatter at every place, from as many batches as the errors ask for."""
    beam, places = scene.beams[number], scene.places
    name, drive = beam.name, beam.drive
    other = np.zeros((len(places), len(dose.QUANTITIES)))
    for row in steady:
        if not row.bound:
            other[[p.name for p in places].index(row.place)] += row.values[0]
    sums, balance = np.zeros((len(places), 2 * REPLICATES, len(dose.QUANTITIES))), Balance()
    for batch in range(effort.batches):
        if (number, batch) not in kept:
            kept[number, batch] = scatter_points(scene, number, batch, effort)
        points, counted = kept[number, batch]
        if not len(points):
            return [], balance
        balance.add(counted)
        sums += _by_replicate(points, scene)
        if _precise(sums / (batch + 1), other):
            break
    sums /= batch + 1
    rows = []
    for place, values in zip(places, sums, strict=True):
        rows.append(Contribution(place.name, name, SCATTER, 1, values[:REPLICATES], drive))
        rows.append(Contribution(place.name, name, SCATTER, HIGHER, values[REPLICATES:], drive))
    return rows, balance


def _by_replicate(points: ScatterPoints, scene: Scene) -> Array:
    """Dose at every place by replicate, single scatter first, then higher orders: (places, 2 replicates, q)."""
    group = points.replicate + REPLICATES * (points.order >= HIGHER)
    readied = ready(points, scene.around)
    return np.array(
        [
            [
                np.bincount(group, weights=row, minlength=2 * REPLICATES)
                for row in dose_from_points(readied, place.at, scene.around)
            ]
            for place in scene.places
        ]
    ).transpose(0, 2, 1)


def _precise(sums: Array, other: Array) -> bool:
    """Is the standard error of the scatter small beside all that arrives, at every place?"""
    whole = sums[:, :REPLICATES] + sums[:, REPLICATES:]
    error = whole.std(axis=1, ddof=1) / np.sqrt(REPLICATES)
    return bool((error <= WANTED_ERROR * (whole.mean(axis=1) + other)).all())


def _importance(scene: Scene, beam: SceneBeam, group: int) -> Array:
    """Chance of drawing each energy: what it gives to each place when scattered in the group's middle, shared
    evenly among the places; evenly spread over the kerma where there is no place."""
    around = without_bodies(scene.around)
    energy, photons = beam.spectrum.energy_kev, beam.spectrum.photons
    middle = scene.around.bodies.parts[group].solid.centre
    arriving = middle - beam.origin
    chances = []
    for place in scene.places:
        ray = place.at - middle
        norm = float(np.linalg.norm(ray) * np.linalg.norm(arriving))
        cosine = float(ray @ arriving) / norm if norm > 0.0 else 0.0
        after = np.maximum(scattered_energy(energy, np.full(energy.size, cosine)), LOWEST_KEV)
        given = (
            photons
            * dose_from_emitters(np.repeat(middle[None, :], energy.size, axis=0), after, place.at, around)[-1]
        )
        if given.sum() > 0.0:
            chances.append(given / given.sum())
    return np.mean(chances, axis=0) if chances else photons / photons.sum()


def _primary_rows(scene: Scene, beam: SceneBeam) -> list[Contribution]:
    narrow = PrimaryBeam(beam.origin, beam.field, beam.spectrum, beam.bodies_count)
    around = with_prefix(narrow, beam.prefix, scene.around)
    patches = lit_patches(narrow, around)
    rows = []
    for place in scene.places:
        found = primary_at(narrow, patches, place.at, around)
        judged = found.plane if scene.primary_by_plane and found.in_field else found.patch
        rows.append(Contribution(place.name, beam.name, PRIMARY, 0, _steady(judged), beam.drive))
        if found.in_field and beam.field.kind != "everywhere":
            rows.append(Contribution(place.name, beam.name, PLANE_BOUND, 0, _steady(found.plane), beam.drive))
    return rows


def _leakage_rows(scene: Scene, beam: SceneBeam) -> list[Contribution]:
    if beam.leakage is None:
        return []
    rows = []
    for place in scene.places:
        given = _from_point(beam.origin, beam.leakage.spectrum, place, scene)
        rows.append(Contribution(place.name, beam.name, LEAKAGE, 0, _steady(given), beam.drive))
    return rows


def _collimator_rows(scene: Scene, beam: SceneBeam) -> list[Contribution]:
    """What comes through a collimator, everywhere but in its port."""
    if beam.collimator is None:
        return []
    rows = []
    for place in scene.places:
        given = _from_point(beam.origin, beam.collimator, place, scene)
        if beam.field.holds((place.at - beam.origin)[None, :])[0]:
            given = np.zeros_like(given)
        rows.append(Contribution(place.name, beam.name, COLLIMATOR, 0, _steady(given), beam.drive))
    return rows


def rows_without_beam(scene: Scene, place: ScenePlace) -> list[Contribution]:
    """Sealed sources stored, on their way and stuck, at one place."""
    rows = []
    for one in scene.stored:
        given = _from_point(one.at, one.spectrum, place, scene)
        rows.append(Contribution(place.name, one.source, STORED, 0, _steady(given), 1.0, STORED))
    for way in scene.travelling:
        whole = dose_along(way.path, way.spectrum, place.at, scene.around) / way.speed
        minute = whole / MINUTE_SECONDS
        if way.seconds > MINUTE_SECONDS:
            minute = highest_along(way.path, way.spectrum, place.at, scene.around)
        rows.append(Contribution(place.name, way.source, TRAVEL, 0, _steady(whole), way.drive, TRAVEL))
        rows.append(Contribution(place.name, way.source, MINUTE, 0, _steady(minute), way.drive, TRAVEL))
    for fast in scene.stuck:
        given = _from_point(fast.at, fast.spectrum, place, scene)
        rows.append(Contribution(place.name, fast.source, STUCK, 0, _steady(given), fast.drive, STUCK))
    return rows


def _from_point(origin: Array, spectrum: Spectrum, place: ScenePlace, scene: Scene) -> Array:
    """What leaves a point evenly in all directions gives to a place, (q,)."""
    start = np.repeat(origin[None, :], spectrum.energy_kev.size, axis=0)
    return dose_from_emitters(start, spectrum.energy_kev, place.at, scene.around) @ spectrum.photons


def _steady(value: Array) -> Array:
    """A value without statistics (q,), once per replicate."""
    return np.repeat(value[None, :], REPLICATES, axis=0)
