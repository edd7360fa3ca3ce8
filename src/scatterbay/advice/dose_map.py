"""Dose rate, or the dose over a time base, on a plan or a vertical section."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.contributions import Kept
from scatterbay.engine.many import COARSE, ManyRates, at_many
from scatterbay.engine.scene import Scene, build_scene
from scatterbay.errors import UsageError
from scatterbay.exposure.timebases import HOUR, Timing, timing_of
from scatterbay.geometry.outline import contains
from scatterbay.physics import dose
from scatterbay.scenario.parts import Scenario
from scatterbay.units.kinds import YEAR_WEEKS

Array = NDArray[np.float64]
Flags = NDArray[np.bool_]

MAPPED = ("rate", "hour", "week", "year")
"""Time bases that can be mapped, all at full occupancy."""
AROUND, FARTHEST = 1.2, 6.0
"""How far a map reaches beyond walls and places, and beyond walls at most [m]."""
NEAREST = 0.05
"""Nearer to a source or a body than this nothing is mapped [m]."""
SMOOTH = 0.15
"""Largest step of the logarithm between neighbours across which the map is filled in between computed points."""
CHUNK = 800

Told = Callable[[float], None]
"""Takes the share of the work that is done."""


@dataclass(frozen=True)
class Plane:
    """A plan at a height, or a section at an x or a y [m]. ``axis``: the coordinate that is fixed, 0, 1 or 2."""

    axis: int
    level: float

    def points(self, first: Array, second: Array) -> Array:
        """Points (n, 3) from the two coordinates in the plane."""
        found = np.empty((first.size, 3))
        found[:, self.axis] = self.level
        found[:, [k for k in range(3) if k != self.axis]] = np.stack([first, second], axis=1)
        return found


@dataclass(frozen=True)
class DoseMap:
    """A map.

    Parameters
    ----------
    plane : where it lies.
    first, second : coordinates in the plane, (nx,) and (ny,) [m].
    values : of ``quantity`` over ``time_base``, (ny, nx) [Gy or Sv; per second for the rate]; not a number in walls,
        in bodies, and right beside bodies and sources.
    error : standard error as a share of the value, (ny, nx), of the points computed; not a number elsewhere.
    computed : how many points were computed; the others are filled in.
    """

    plane: Plane
    time_base: str
    quantity: str
    first: Array
    second: Array
    values: Array
    error: Array
    computed: int

    @property
    def typical_error(self) -> float:
        """Median standard error of the computed points, as a share."""
        return float(np.nanmedian(self.error)) if np.isfinite(self.error).any() else 0.0


def dose_map(
    scenario: Scenario,
    plane: Plane,
    time_base: str = "rate",
    quantity: str = dose.AMBIENT,
    count: int = 200,
    told: Told | None = None,
) -> DoseMap:
    """The map of a scenario on a plane, ``count`` points along its longer side.

    Every second point each way is computed, and each point between two that differ by more than SMOOTH, or next to
    a wall; the rest is filled in by the logarithm. Where every second point would lie farther apart than what a hand's
    breadth makes of the narrowest gap in a wall, all are computed. A thousand scatter points serve all of them, so
    that the map is smooth; its error is stated. Travelling and stuck sources are left out.

    Raises
    ------
    UsageError : a plane that does not meet the bay, or a time base that cannot be mapped.
    """
    if time_base not in MAPPED:
        raise UsageError(f"'{time_base}' cannot be mapped; one of {', '.join(MAPPED)}")
    scene = build_scene(scenario)
    first, second = _axes(scenario, plane, count)
    grid = np.stack(np.meshgrid(first, second), axis=-1)
    open_to = _free(scenario, scene, plane, first, second)
    timing = timing_of(scenario, scene.workloads, {name: one.annual for name, one in scene.outputs.items()})
    row = dose.QUANTITIES.index(quantity)
    kept: Kept = {}
    values, error = np.full(open_to.shape, np.nan), np.full(open_to.shape, np.nan)

    def compute(wanted: Flags, start: float, end: float) -> None:
        where = np.argwhere(wanted & open_to & np.isnan(values))
        for begin in range(0, len(where), CHUNK):
            some = where[begin : begin + CHUNK]
            spots = grid[some[:, 0], some[:, 1]]
            rates = at_many(scene, plane.points(spots[:, 0], spots[:, 1]), COARSE, kept)
            found, spread = over(timing, rates, time_base, row)
            values[some[:, 0], some[:, 1]], error[some[:, 0], some[:, 1]] = found, spread
            if told:
                told(start + (end - start) * min(1.0, (begin + CHUNK) / max(len(where), 1)))

    wide = 2.0 * max(first[1] - first[0], second[1] - second[0])
    coarse = np.full_like(open_to, wide > 2.0 * max(scenario.options.breadth, 1e-9))
    coarse[::2, ::2] = True
    compute(coarse, 0.0, 0.5)
    compute(_steep(values, open_to), 0.5, 1.0)
    computed = int(np.isfinite(values).sum())
    return DoseMap(plane, time_base, quantity, first, second, _filled(values, open_to), error, computed)


def over(timing: Timing, rates: ManyRates, time_base: str, row: int) -> tuple[Array, Array]:
    """Figures over a time base at full occupancy, and their standard error as a share, (n,) each.

    For the error the scatter of the beams is taken by replicate, everything else as it is.
    """
    names = [beam.name for beam in timing.beams]
    whole = {name: rates.whole(name)[row] for name in names}
    stored = sum((rate[row] for rate in rates.stored.values()), np.zeros_like(whole[names[0]]))
    spread = {
        name: rates.scatter[name][:, row].std(axis=0, ddof=1) / len(rates.scatter[name]) ** 0.5
        for name in names
    }
    if time_base == "rate":
        best, error = np.zeros_like(stored), np.zeros_like(stored)
        for group in timing.sets:
            each = np.array([whole[name] for name in group])
            top = each.argmax(axis=0)
            idle = sum(
                (rates.stored[s][row] for s in {timing.source_of[n] for n in group} if s in rates.stored), 0.0
            )
            best += np.maximum(each.max(axis=0), idle)
            error += (
                np.take_along_axis(np.array([spread[name] for name in group]), top[None, :], axis=0)[0] ** 2
            )
        return best, np.sqrt(error) / np.maximum(best, 1e-300)
    if time_base == "hour":
        total = HOUR * stored
        for group in timing.sets:
            total = total + _worst_hour(np.array([whole[n] for n in group]),
                                        np.array([timing.loads[n].seconds_in_worst_hour for n in group]))  # fmt: skip
        weight = {name: timing.loads[name].seconds_in_worst_hour for name in names}
    else:
        yearly = time_base == "year"
        weight = {}
        total = np.zeros_like(stored)
        for source, rate in rates.stored.items():
            total = total + rate[row] * timing.stored[source] * (YEAR_WEEKS if yearly else 1.0)
        for beam in timing.beams:
            load = timing.loads[beam.name]
            often = load.weeks_per_year * timing.annual.get(beam.source, 1.0) if yearly else 1.0
            weight[beam.name] = load.seconds_per_week * often
            primary = rates.beams["primary", beam.name][row]
            total = total + weight[beam.name] * (whole[beam.name] + (beam.use_factor - 1.0) * primary)
    variance = sum((weight[name] * spread[name]) ** 2 for name in names)
    return total, np.sqrt(variance) / np.maximum(total, 1e-300)


def _worst_hour(rates: Array, seconds: Array) -> Array:
    """An hour filled with beams (b, n), strongest first, each for no longer than its seconds (b,)."""
    order = np.argsort(-rates, axis=0)
    left, total = np.full(rates.shape[1], HOUR), np.zeros(rates.shape[1])
    for rank in order:
        used = np.minimum(seconds[rank], left)
        total += used * np.take_along_axis(rates, rank[None, :], axis=0)[0]
        left -= used
    return total


def _axes(scenario: Scenario, plane: Plane, count: int) -> tuple[Array, Array]:
    """Coordinates of the map: the room with its walls, and the places in reach."""
    room = scenario.room
    corners = np.array(room.corners)
    thick = max(side.make_up.thickness for side in room.sides)
    low = np.append(corners.min(axis=0) - thick, -room.floor.thickness)
    high = np.append(corners.max(axis=0) + thick, room.height + room.ceiling.thickness)
    if not low[plane.axis] - FARTHEST <= plane.level <= high[plane.axis] + FARTHEST:
        raise UsageError(f"the plane at {plane.level:g} m does not meet the bay or what is around it")
    if plane.axis != 2 and not low[plane.axis] <= plane.level <= high[plane.axis]:
        raise UsageError(f"the section at {plane.level:g} m does not cut the room")
    wide_low, wide_high = low - AROUND, high + AROUND
    for place in scenario.places:
        at = np.array(place.at)
        if ((at > low - FARTHEST) & (at < high + FARTHEST)).all():
            wide_low, wide_high = (
                np.minimum(wide_low, at - 0.5 * AROUND),
                np.maximum(wide_high, at + 0.5 * AROUND),
            )
    keep = [k for k in range(3) if k != plane.axis]
    span = (wide_high - wide_low)[keep]
    numbers = np.maximum(2, np.round(count * span / span.max()).astype(int))
    first, second = (np.linspace(wide_low[k], wide_high[k], n) for k, n in zip(keep, numbers, strict=True))
    return first, second


def _free(scenario: Scenario, scene: Scene, plane: Plane, first: Array, second: Array) -> Flags:
    """Which points lie in no wall, no body, no ground, and not right beside a body or a source, (ny, nx)."""
    x, y = (part.ravel() for part in np.meshgrid(first, second))
    points = plane.points(x, y)
    free = ~in_fabric(scenario, points)
    for part in scene.around.bodies.parts:
        free &= part.solid.distance(points) > NEAREST
    for beam in scene.beams:
        free &= np.linalg.norm(points - beam.origin, axis=1) > NEAREST
    return free.reshape(second.size, first.size)


def in_fabric(scenario: Scenario, points: Array) -> Flags:
    """Which points (n, 3) lie in walls, ceiling, floor or the ground."""
    room = scenario.room
    inside = contains(room.corners, points[:, :2])
    z = points[:, 2]
    level = (z > -room.floor.thickness) & (z < room.height + room.ceiling.thickness)
    slab = inside & level & ((z >= room.height) | (z <= 0.0))
    if room.floor_on_ground:
        slab |= z <= 0.0
    return slab | (level & ~inside & _in_walls(scenario, points[:, :2]))


def _in_walls(scenario: Scenario, points: Array) -> Flags:
    """Which plan points (n, 2) outside the outline lie within the thickness of a side, corners included."""
    found = np.zeros(len(points), dtype=bool)
    for side in scenario.room.sides:
        start, end = np.array(side.start), np.array(side.end)
        along = (end - start) / np.linalg.norm(end - start)
        out = (points - start) @ np.array([along[1], -along[0]])
        share = (points - start) @ along
        thick = side.make_up.thickness
        beside = (share > -thick) & (share < np.linalg.norm(end - start) + thick)
        found |= (out >= 0.0) & (out < thick) & beside
    return found


def _steep(values: Array, open_to: Flags) -> Flags:
    """Points between computed ones that differ too much, or that touch what is not mapped; the last row and column."""
    known = np.log(np.where(values > 0.0, values, np.nan))[::2, ::2]
    wanted = np.zeros_like(open_to)
    corners = np.stack([known[:-1, :-1], known[1:, :-1], known[:-1, 1:], known[1:, 1:]])
    for steps, target in (
        (known[:, 1:] - known[:, :-1], wanted[::2, 1::2]),
        (known[1:, :] - known[:-1, :], wanted[1::2, ::2]),
        (corners.max(axis=0) - corners.min(axis=0), wanted[1::2, 1::2]),
    ):
        far = ~(np.abs(steps) <= SMOOTH)
        target[: far.shape[0], : far.shape[1]] = far
    wanted[-1, :] = wanted[:, -1] = True
    return wanted


def _filled(values: Array, open_to: Flags) -> Array:
    """The mean logarithm of the computed points beside, where it is smooth; what is not open stays out."""
    log = np.log(np.where(values > 0.0, values, np.nan))
    known = log[::2, ::2]
    for target, middle in (
        (log[::2, 1::2], 0.5 * (known[:, :-1] + known[:, 1:])),
        (log[1::2, ::2], 0.5 * (known[:-1, :] + known[1:, :])),
        (log[1::2, 1::2], 0.25 * (known[:-1, :-1] + known[1:, :-1] + known[:-1, 1:] + known[1:, 1:])),
    ):
        inner = target[: middle.shape[0], : middle.shape[1]]
        gap = np.isnan(inner)
        inner[gap] = middle[gap]
    return np.where(open_to, np.exp(log), np.nan)
