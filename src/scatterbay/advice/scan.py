"""A scan of the protected side of a surface: how near its goals every point comes, and which is the worst."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from scatterbay.advice.surfaces import GAP, STEP, ScanPoints, Surface, scan_points
from scatterbay.engine.contributions import FULL, THIN, Kept, contributions
from scatterbay.engine.scene import Scene, at_places, build_scene
from scatterbay.errors import UsageError
from scatterbay.exposure.assess import assess
from scatterbay.exposure.results import GoalResult, PlaceResult
from scatterbay.scenario.parts import Place, Scenario

Array = NDArray[np.float64]

CLOSELY = 8
"""Points that are looked at again with all scatter points."""
CHUNK = 64
"""Points assessed at a time."""

Told = Callable[[float], None]
"""Takes the share of the work that is done."""


@dataclass(frozen=True)
class Standing:
    """Who may stand behind a surface: a group, for a share of the time. ``place``: where that was taken from."""

    people: str
    occupancy: float
    place: str
    at: tuple[float, float, float]


@dataclass(frozen=True)
class PointResult:
    """One point: coordinates on the face, and its assessment."""

    on_face: tuple[float, float]
    result: PlaceResult
    standing: Standing

    @property
    def goal(self) -> GoalResult | None:
        """The goal it comes nearest to, or exceeds most, by the upper end of the figure's band."""
        return max(self.result.goals, key=lambda g: g.figure.high / g.goal, default=None)

    @property
    def ratio(self) -> float:
        """Upper end of that figure over its goal."""
        return self.goal.figure.high / self.goal.goal if self.goal else 0.0

    @property
    def best_ratio(self) -> float:
        """The figure itself over its goal."""
        return max((g.fraction for g in self.result.goals), default=0.0)


@dataclass(frozen=True)
class Scan:
    """A scanned surface. ``points``: the grid, with few scatter points; ``close``: its worst ones with all of them."""

    surface: Surface
    grid: ScanPoints
    points: tuple[PointResult, ...]
    close: tuple[PointResult, ...]
    standings: tuple[Standing, ...]
    gap: float
    step: float
    openings: frozenset[tuple[float, float]] = frozenset()
    """Points, by their coordinates on the face, some of whose rays pass an opening in it."""

    @property
    def worst(self) -> PointResult:
        """The worst point, looked at closely."""
        return max(self.close, key=lambda p: p.ratio)

    @property
    def ratios(self) -> Array:
        """Upper end over goal at every point of the grid, (n,); where looked at closely, from that."""
        found = {p.on_face: p.ratio for p in self.close}
        return np.array([found.get(p.on_face, p.ratio) for p in self.points])


def standings_behind(scenario: Scenario, scene: Scene, surface: Surface) -> tuple[Standing, ...]:
    """The places whose lines from anything that radiates cross a surface.

    Raises
    ------
    UsageError : nobody stands behind it.
    """
    walls = scene.around.walls
    face = scene.face_numbers[surface.face]
    looks = [np.array(beam.at) for beam in scenario.beams]
    looks += [part.solid.centre for part in scene.around.bodies.parts]
    start = np.array(looks)
    found = []
    for place in scenario.places:
        met = walls.enclosure.crossings(start, np.array(place.at))
        if any(hit.face == face for hit in met.hits):
            found.append(Standing(place.people, place.occupancy, place.name, place.at))
    if not found:
        raise UsageError(
            f"no place of the scenario lies behind '{surface.host}': say who may stand there with --people and "
            "--occupancy"
        )
    return tuple(found)


def scan(
    scenario: Scenario,
    surface: Surface,
    standings: Sequence[Standing],
    gap: float = GAP,
    step: float = STEP,
    scene: Scene | None = None,
    told: Told | None = None,
    kept_close: Kept | None = None,
) -> Scan:
    """Scan a surface: every point of a grid, then the worst ones closely.

    Each point is judged by the goals and the occupancy of the nearest of ``standings``. ``kept_close``: scatter points
    to look closely with, from another scan.
    """
    built = scene or build_scene(scenario)
    grid = scan_points(scenario, surface, gap, step)
    met = _met(built, surface, grid)
    mine = built.of_opening.get(surface.host)
    if mine is not None:
        grid, met = _some(grid, (met & mine) != 0), met[(met & mine) != 0]
    if not len(grid.position):
        raise UsageError(f"no point behind '{surface.host}' stands free")
    places = [_place(k, grid, standings) for k in range(len(grid.position))]
    kept: Kept = {}
    points: list[PointResult] = []
    for first in range(0, len(places), CHUNK):
        some = places[first : first + CHUNK]
        points += judged(scenario, built, some, thin=True, kept=kept)
        if told:
            told(0.9 * len(points) / len(places))
    close = judged(scenario, built, [places[k] for k in worst_of(points, grid)], thin=False, kept=kept_close)
    if told:
        told(1.0)
    other = built.around.walls.opened.get(built.face_numbers[surface.face], 0) & ~(mine or 0)
    passed = frozenset(p.on_face for p, mask in zip(points, met, strict=True) if int(mask) & other)
    return Scan(surface, grid, tuple(points), tuple(close), tuple(standings), gap, step, passed)


def _met(scene: Scene, surface: Surface, grid: ScanPoints) -> NDArray[np.int64]:
    """Kinds of make-up that the lines from sources and bodies to each point meet on the face, as masks (n,)."""
    room, number = scene.around.walls.enclosure, scene.face_numbers[surface.face]
    found = np.zeros(len(grid.position), dtype=np.int64)
    looks = [beam.origin for beam in scene.beams] + [part.solid.centre for part in scene.around.bodies.parts]
    for look in looks:
        for hit in room.crossings(np.broadcast_to(look, grid.position.shape), grid.position).hits:
            if hit.face == number:
                found[hit.rays] |= hit.mask
    return found


def _some(grid: ScanPoints, kept: NDArray[np.bool_]) -> ScanPoints:
    return replace(grid, on_face=grid.on_face[kept], position=grid.position[kept], index=grid.index[kept])


Candidate = tuple[tuple[float, float], Place, Standing]
"""A point to be judged: where on the face, as a place, and who stands there."""


def judged(
    scenario: Scenario, scene: Scene, candidates: Sequence[Candidate], thin: bool, kept: Kept | None = None
) -> list[PointResult]:
    """Points assessed as places of the scenario."""
    moved = replace(scenario, places=tuple(place for _, place, _ in candidates))
    at = at_places(scene, moved)
    found = assess(moved, at, contributions(at, THIN if thin else FULL, kept))
    return [
        PointResult(on_face, result, standing)
        for (on_face, _, standing), result in zip(candidates, found.places, strict=True)
    ]


def candidate(point: PointResult) -> Candidate:
    """A point again, to be judged anew."""
    result, who = point.result, point.standing
    return point.on_face, Place(result.name, result.at, who.people, who.occupancy, ""), who


def _place(k: int, grid: ScanPoints, standings: Sequence[Standing]) -> Candidate:
    at = tuple(float(x) for x in grid.position[k])
    who = min(standings, key=lambda s: float(np.linalg.norm(np.subtract(s.at, at))))
    u, v = grid.on_face[k]
    point = at[0], at[1], at[2]
    return (float(u), float(v)), Place(f"point {k + 1}", point, who.people, who.occupancy, ""), who


def worst_of(points: Sequence[PointResult], grid: ScanPoints) -> list[int]:
    """Numbers of the points to look at closely: those that no neighbour exceeds, worst first, then the next worst."""
    table = np.full(grid.shape, -1.0).ravel()
    ratios = np.array([point.ratio for point in points])
    table[grid.index] = ratios
    around = np.pad(table.reshape(grid.shape), 1, constant_values=-1.0)
    shifts = [(i, j) for i in (0, 1, 2) for j in (0, 1, 2) if (i, j) != (1, 1)]
    n, m = grid.shape
    peak = np.all([around[1:-1, 1:-1] >= around[i : i + n, j : j + m] for i, j in shifts], axis=0)
    peaks = peak.ravel()[grid.index]
    order = np.lexsort((-ratios, ~peaks))
    found = [int(k) for k in order[:CLOSELY]]
    top = int(np.argmax(ratios))
    return found if top in found else [top, *found[:-1]]
