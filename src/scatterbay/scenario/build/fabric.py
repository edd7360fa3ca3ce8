"""What a point lies in: the thickness of a wall, of the ceiling, of the floor, the ground."""

from __future__ import annotations

import math

from scatterbay.scenario.build.outline import outward
from scatterbay.scenario.parts import Point, Room, Side

_CLOSE = 1e-6


def fabric_at(point: Point, room: Room) -> str | None:
    """Name of the part of the building that a point lies inside of; None where it lies free."""
    from scatterbay.geometry.outline import contains

    x, y, z = point
    if contains(room.corners, [(x, y)])[0]:
        if room.height + _CLOSE < z < room.height + room.ceiling.thickness - _CLOSE:
            return "the ceiling"
        if room.floor_on_ground and z < -_CLOSE:
            return "the ground"
        return "the floor" if -room.floor.thickness + _CLOSE < z < -_CLOSE else None
    if not -room.floor.thickness < z < room.height + room.ceiling.thickness:
        return None
    return _wall_at((x, y), room.sides)


def _wall_at(where: tuple[float, float], sides: tuple[Side, ...]) -> str | None:
    """The wall that a point outside the outline lies inside of, corners included."""
    spots = [_along_and_out(where, side) for side in sides]
    within = [
        _CLOSE < out < side.make_up.thickness - _CLOSE for (_, out), side in zip(spots, sides, strict=True)
    ]
    lengths = [math.dist(side.start, side.end) for side in sides]
    for i, side in enumerate(sides):
        along = spots[i][0]
        if within[i] and -_CLOSE <= along <= lengths[i] + _CLOSE:
            return f"the wall '{side.name}'"
        following = (i + 1) % len(sides)
        if within[i] and within[following] and along > lengths[i] and spots[following][0] < 0.0:
            return f"the corner of '{side.name}' and '{sides[following].name}'"
    return None


def _along_and_out(where: tuple[float, float], side: Side) -> tuple[float, float]:
    """Distance along a side from its first corner, and out of the room from its inner face [m]."""
    normal = outward(side.start, side.end)
    dx, dy = where[0] - side.start[0], where[1] - side.start[1]
    return normal[0] * dy - normal[1] * dx, normal[0] * dx + normal[1] * dy
