"""Contributions: what arrives at each place, by beam, path and order, per unit of output."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.arrive import dose_from_emitters, dose_from_points
from scatterbay.engine.first import first_collisions
from scatterbay.engine.points import ScatterPoints
from scatterbay.engine.primary import PrimaryBeam, lit_patches, primary_at
from scatterbay.engine.scene import Scene, SceneBeam
from scatterbay.engine.sequence import generator
from scatterbay.engine.walk import Balance, walk_on

Array = NDArray[np.float64]

REPLICATES = 16
FIRST_PER_REPLICATE = 512
WALKS_PER_REPLICATE = 256

PRIMARY, SCATTER, LEAKAGE = "primary", "scatter", "leakage"
PLANE_BOUND = "primary as a plane"
"""Kept beside the primary as its upper bound; never added to it."""
HIGHER = 2
"""Order that stands for two and more."""


@dataclass(frozen=True)
class Contribution:
    """One row: values (replicates, q) per unit of output [Gy or Sv per coulomb or decay].

    ``order``: 0 for what has not scattered in a body, 1 for single scatter, 2 for two and more.
    """

    place: str
    beam: str
    path: str
    order: int
    values: Array


@dataclass(frozen=True)
class Contributions:
    """All rows, and the energy balance of each beam's walk."""

    rows: tuple[Contribution, ...]
    balances: dict[str, Balance]
    drives: dict[str, float]


def contributions(scene: Scene) -> Contributions:
    """Compute every row of a scene."""
    rows: list[Contribution] = []
    balances = {}
    for number, beam in enumerate(scene.beams):
        points, balances[beam.name] = scatter_points(scene, number)
        rows += _primary_rows(scene, beam) + _scatter_rows(scene, beam, points) + _leakage_rows(scene, beam)
    return Contributions(tuple(rows), balances, {beam.name: beam.drive for beam in scene.beams})


def scatter_points(scene: Scene, number: int) -> tuple[ScatterPoints, Balance]:
    """Scatter points of all orders of one beam, and where their energy went.

    Walks start from the first half of each replicate's first collisions; their weights make up for it, since
    weights are per replicate.
    """
    beam, around = scene.beams[number], scene.around
    parts, balance = [], Balance()
    for group in around.bodies.groups:
        common = (beam.origin, beam.field, beam.spectrum, around.bodies, group, around.ladder)
        stream = (scene.seed, number, group)
        first = first_collisions(*common, FIRST_PER_REPLICATE, REPLICATES, stream)
        if not len(first):
            continue
        starts = first_collisions(*common, WALKS_PER_REPLICATE, REPLICATES, stream)
        walk = walk_on(starts, around.bodies, around.ladder, generator(*stream, 1))
        parts += [first, walk.points]
        balance.entered += walk.balance.entered
        balance.absorbed += walk.balance.absorbed
        balance.escaped += walk.balance.escaped
        balance.cut_off += walk.balance.cut_off
    return ScatterPoints.joined(parts) if parts else ScatterPoints.none(), balance


def _scatter_rows(scene: Scene, beam: SceneBeam, points: ScatterPoints) -> list[Contribution]:
    if not len(points):
        return []
    rows = []
    higher = points.order >= HIGHER
    group = points.replicate + REPLICATES * higher
    for place in scene.places:
        dose = dose_from_points(points, place.at, scene.around)
        sums = np.stack([np.bincount(group, weights=row, minlength=2 * REPLICATES) for row in dose], axis=1)
        rows.append(Contribution(place.name, beam.name, SCATTER, 1, sums[:REPLICATES]))
        rows.append(Contribution(place.name, beam.name, SCATTER, HIGHER, sums[REPLICATES:]))
    return rows


def _primary_rows(scene: Scene, beam: SceneBeam) -> list[Contribution]:
    narrow = PrimaryBeam(beam.origin, beam.field, beam.spectrum, beam.bodies_count)
    patches = lit_patches(narrow, scene.around)
    rows = []
    for place in scene.places:
        found = primary_at(narrow, patches, place.at, scene.around)
        judged = found.plane if scene.primary_by_plane and found.in_field else found.patch
        rows.append(Contribution(place.name, beam.name, PRIMARY, 0, _steady(judged)))
        if found.in_field:
            rows.append(Contribution(place.name, beam.name, PLANE_BOUND, 0, _steady(found.plane)))
    return rows


def _leakage_rows(scene: Scene, beam: SceneBeam) -> list[Contribution]:
    if beam.leakage is None:
        return []
    spectrum = beam.leakage.spectrum
    start = np.repeat(beam.origin[None, :], spectrum.energy_kev.size, axis=0)
    rows = []
    for place in scene.places:
        dose = dose_from_emitters(start, spectrum.energy_kev, place.at, scene.around) @ spectrum.photons
        rows.append(Contribution(place.name, beam.name, LEAKAGE, 0, _steady(dose)))
    return rows


def _steady(dose: Array) -> Array:
    """A value without statistics, once per replicate."""
    return np.repeat(dose[None, :], REPLICATES, axis=0)
