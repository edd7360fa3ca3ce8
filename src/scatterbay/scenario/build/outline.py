"""The room's outline and sides: closed, counter-clockwise, one make-up a side, named the way it faces."""

from __future__ import annotations

import math
import re
from collections.abc import Sequence

from scatterbay.scenario import parts
from scatterbay.scenario.build.findings import Findings, usable
from scatterbay.scenario.model.base import Broken
from scatterbay.scenario.model.room import Room

Point = tuple[float, float]
SHORTEST = 1e-3
"""Sides shorter than this [m] are taken for a corner given twice."""

_COMPASS = {"north": (0.0, 1.0), "south": (0.0, -1.0), "east": (1.0, 0.0), "west": (-1.0, 0.0)}
_WORD = re.compile("|".join(_COMPASS))
_ORDER = "sides are listed in the order of the corners: the first runs from corner 1 to corner 2"


def sound_corners(room: Room, findings: Findings) -> tuple[Point, ...] | None:
    """The corners, if they make an outline."""
    from scatterbay.geometry.outline import crosses_itself, signed_area

    if isinstance(room.corners, Broken):
        return None
    corners = room.corners
    path = ("room", "corners")
    sound = True
    for i, (here, there) in enumerate(zip(corners, (*corners[1:], corners[0]), strict=True)):
        if math.dist(here, there) < SHORTEST:
            following = (i + 1) % len(corners)
            message = f"corners {i + 1} and {following + 1} are the same point"
            findings.wrong((*path, following), message, "the last corner joins the first by itself")
            sound = False
    if sound and crosses_itself(corners):
        findings.wrong(
            path, "the outline crosses or touches itself", "list the corners in order around the room"
        )
        return None
    if sound and signed_area(corners) < 0.0:
        turned = [list(corner) for corner in reversed(corners)]
        message = "the corners run clockwise"
        hint = f"list them counter-clockwise seen from above, and the sides with them: {turned}"
        findings.wrong(path, message, hint)
        return None
    return corners if sound else None


def build_sides(
    room: Room, corners: Sequence[Point] | None, findings: Findings
) -> tuple[parts.Side, ...] | None:
    """The sides along the outline, if there is one for each and all could be read."""
    if isinstance(room.sides, Broken) or corners is None:
        return None
    names = list(room.sides)
    if len(names) != len(corners):
        message = f"{len(names)} sides are given for {len(corners)} corners"
        findings.wrong(("room", "sides"), message, f"{_ORDER}, and so on around", on_key=True)
        return None
    ends = [*corners[1:], corners[0]]
    made = usable(room.sides)
    sides = []
    for name, start, end in zip(names, corners, ends, strict=True):
        _check_compass(name, start, end, findings)
        if name in made:
            sides.append(parts.Side(name, start, end, made[name]))
    return tuple(sides) if len(sides) == len(names) else None


def outward(start: Point, end: Point) -> Point:
    """Unit normal of a side that points out of the room."""
    length = math.dist(start, end)
    return (end[1] - start[1]) / length, (start[0] - end[0]) / length


def _check_compass(name: str, start: Point, end: Point, findings: Findings) -> None:
    """A side called north must look north, within 60 degrees."""
    words = _WORD.findall(name.lower())
    east, north = (sum(_COMPASS[word][axis] for word in words) for axis in (0, 1))
    if not words or math.hypot(east, north) == 0.0:
        return
    facing = outward(start, end)
    cosine = (east * facing[0] + north * facing[1]) / math.hypot(east, north)
    if cosine < 0.5:
        message = f"'{name}' faces {_bearing(facing)}: it runs from {list(start)} to {list(end)}"
        findings.wrong(("room", "sides", name), message, f"{_ORDER}; x is east and y is north", on_key=True)


def _bearing(facing: Point) -> str:
    """The nearest of eight compass words."""
    words = ("east", "north-east", "north", "north-west", "west", "south-west", "south", "south-east")
    return words[round(math.atan2(facing[1], facing[0]) / (math.pi / 4)) % 8]
