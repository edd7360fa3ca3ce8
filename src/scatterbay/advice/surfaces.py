"""The protected side of a wall, ceiling, floor, opening or screen: points to stand at, and words for them."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.errors import UsageError
from scatterbay.geometry.outline import contains
from scatterbay.scenario.parts import Opening, Point, Room, Scenario
from scatterbay.units import nearest

Array = NDArray[np.float64]

GAP = 0.3
"""Default distance from the outer face [m] (common practice)."""
STEP = 0.2
"""Greatest distance between points [m]: each sees a hand's breadth around its rays, so that nothing lies between."""
OVER_THE_FLOOR, UNDER_THE_HEAD = 0.5, 1.7
"""Heights over the floor above and over the floor below at which people are judged [m] (common practice)."""
MARGIN = 0.02
"""Points keep this far from the ends of a face [m]."""


@dataclass(frozen=True)
class Surface:
    """A part of the room that protects someone, in its face's own two coordinates [m].

    ``kind``: side, ceiling, floor or screen; ``host``: its name, as a panel is put on it; ``low``, ``high``: corners of
    the part; ``area`` in m2.
    """

    kind: str
    host: str
    face: str
    low: tuple[float, float]
    high: tuple[float, float]
    area: float
    corner: str
    """What the first coordinate is measured from."""


@dataclass(frozen=True)
class ScanPoints:
    """Points on the protected side: coordinates on the face (n, 2) and positions (n, 3) [m], and the grid's cells.

    ``shape``: numbers of points along the two coordinates; ``index``: number of each point's place in that grid.
    """

    on_face: Array
    position: Array
    shape: tuple[int, int]
    index: NDArray[np.int64]
    spacing: tuple[float, float]


def surface_of(scenario: Scenario, name: str) -> Surface:
    """The surface that goes by a name: a side, ceiling, floor, opening or screen.

    Raises
    ------
    UsageError : there is none; the nearest name is suggested.
    """
    room = scenario.room
    opening = next((one for one in room.openings if one.name == name), None)
    if opening is not None:
        whole = surface_of(scenario, opening.on_face)
        return _part(whole, opening)
    for number, side in enumerate(room.sides):
        if side.name == name:
            length = float(np.hypot(*np.subtract(side.end, side.start)))
            before = room.sides[number - 1].name
            return Surface(
                "side", name, name, (0.0, 0.0), (length, room.height), length * room.height,
                f"the corner with {before}",
            )  # fmt: skip
    for screen in room.screens:
        if screen.name == name:
            length = float(np.hypot(*np.subtract(screen.end, screen.start)))
            area = length * (screen.top - screen.bottom)
            return Surface(
                "screen", name, name, (0.0, screen.bottom), (length, screen.top), area, "its first end"
            )  # fmt: skip
    if name in ("ceiling", "floor"):
        if name == "floor" and room.floor_on_ground:
            raise UsageError("the floor lies on the ground: there is nobody below it")
        low, high = np.min(room.corners, axis=0), np.max(room.corners, axis=0)
        area = _plan_area(room)
        first = (float(low[0]), float(low[1])), (float(high[0]), float(high[1]))
        return Surface(name, name, name, *first, area, "x = 0, y = 0")
    known = names_of(room)
    near = nearest(name, known)
    hint = f"did you mean '{near}'? " if near else ""
    raise UsageError(f"there is no wall, opening or screen '{name}'; {hint}there are: {', '.join(known)}")


def names_of(room: Room) -> list[str]:
    """Everything that may be scanned."""
    flat = ["ceiling"] if room.floor_on_ground else ["ceiling", "floor"]
    return [
        *(side.name for side in room.sides), *flat, *(one.name for one in room.openings),
        *(screen.name for screen in room.screens),
    ]  # fmt: skip


def _part(whole: Surface, opening: Opening) -> Surface:
    width, height = opening.high[0] - opening.low[0], opening.high[1] - opening.low[1]
    return Surface(
        whole.kind, opening.name, whole.face, opening.low, opening.high, width * height, whole.corner
    )  # fmt: skip


def _plan_area(room: Room) -> float:
    x, y = np.array(room.corners).T
    return float(0.5 * abs(np.sum(x * np.roll(y, -1) - np.roll(x, -1) * y)))


def scan_points(scenario: Scenario, surface: Surface, gap: float = GAP, step: float = STEP) -> ScanPoints:
    """A grid of points at most ``step`` apart, at ``gap`` from the outer face; for an opening all of its face's.

    Over a ceiling and under a floor people are judged at the trade's heights where the storeys are given, else at
    the gap. Points inside the building's own fabric are left out.
    """
    if surface.host != surface.face:
        surface = surface_of(scenario, surface.face)
    axes, spacing = [], []
    for low, high in zip(surface.low, surface.high, strict=True):
        margin = min(MARGIN, 0.25 * (high - low))
        count = max(2, int(np.ceil((high - low - 2.0 * margin) / step)) + 1)
        axes.append(np.linspace(low + margin, high - margin, count))
        spacing.append(float(axes[-1][1] - axes[-1][0]))
    first, second = (part.ravel() for part in np.meshgrid(*axes, indexing="ij"))
    on_face = np.stack([first, second], axis=1)
    position = np.array([position_at(scenario, surface, (float(u), float(v)), gap) for u, v in on_face])
    free = np.flatnonzero(_free(scenario.room, surface, on_face, position))
    return ScanPoints(
        on_face[free], position[free], (axes[0].size, axes[1].size), free, (spacing[0], spacing[1])
    )  # fmt: skip


def position_at(scenario: Scenario, surface: Surface, at: tuple[float, float], gap: float) -> Point:
    """Where one stands behind a point of a face."""
    room = scenario.room
    if surface.kind == "ceiling":
        floor = room.storey_above
        up = room.height + room.ceiling.thickness + gap if floor is None else floor + OVER_THE_FLOOR
        return at[0], at[1], up
    if surface.kind == "floor":
        depth = room.storey_below
        down = -room.floor.thickness - gap if depth is None else UNDER_THE_HEAD - depth
        return at[0], at[1], down
    start, along, out, thickness = _frame(scenario, surface)
    x, y = start + at[0] * along + (thickness + gap) * out
    return float(x), float(y), at[1]


def _frame(scenario: Scenario, surface: Surface) -> tuple[Array, Array, Array, float]:
    """First corner, direction, outward normal and thickness of an upright face, on plan."""
    room = scenario.room
    if surface.kind == "side":
        side = next(one for one in room.sides if one.name == surface.face)
        start, end, thickness = np.array(side.start), np.array(side.end), side.make_up.thickness
    else:
        screen = next(one for one in room.screens if one.name == surface.face)
        start, end, thickness = np.array(screen.start), np.array(screen.end), screen.make_up.thickness
    along = (end - start) / np.linalg.norm(end - start)
    out = np.array([along[1], -along[0]])
    if surface.kind == "screen":
        out, thickness = _away_from_sources(scenario, start, out), 0.5 * thickness
    return start, along, out, thickness


def _away_from_sources(scenario: Scenario, start: Array, out: Array) -> Array:
    """The side of a screen that most sources do not stand on."""
    sides = sum(float(np.sign((np.array(beam.at[:2]) - start) @ out)) for beam in scenario.beams)
    return -out if sides > 0.0 else out


def _free(room: Room, surface: Surface, on_face: Array, position: Array) -> NDArray[np.bool_]:
    """Which points stand free: over the plan for ceiling and floor, outside the walls' fabric for the rest."""
    if surface.kind in ("ceiling", "floor"):
        return contains(room.corners, on_face)
    inside = contains(room.corners, position[:, :2])
    return inside if surface.kind == "screen" else ~inside


def spoken_point(surface: Surface, at: Sequence[float]) -> str:
    """A point of a surface in words a builder can use."""
    if surface.kind in ("ceiling", "floor"):
        return f"at x = {at[0]:.2f} m, y = {at[1]:.2f} m"
    return f"{at[0]:.2f} m from {surface.corner}, {at[1]:.2f} m above the floor"
