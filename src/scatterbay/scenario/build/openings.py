"""Openings and screens: inside their host, clear of one another, of some size."""

from __future__ import annotations

import math
from collections.abc import Sequence
from itertools import combinations

from scatterbay.scenario import parts
from scatterbay.scenario.build.findings import Findings, usable, whole
from scatterbay.scenario.model import room as written
from scatterbay.scenario.model.base import Broken

Point = tuple[float, float]
_CLOSE = 1e-9


def build_openings(
    room: written.Room,
    sides: Sequence[parts.Side] | None,
    corners: Sequence[Point] | None,
    findings: Findings,
) -> tuple[parts.Opening, ...]:
    """Every opening that lies where it can."""
    found = []
    openings: dict[str, written.SideOpening | written.FlatOpening] = usable(room.openings)
    for name, opening in openings.items():
        if isinstance(opening, written.FlatOpening):
            made = _flat(name, opening, corners, findings)
        else:
            made = _in_side(name, opening, room, sides, findings)
        found += [made] if made else []
    _check_overlaps(found, findings)
    return tuple(found)


def _in_side(
    name: str,
    opening: written.SideOpening,
    room: written.Room,
    sides: Sequence[parts.Side] | None,
    findings: Findings,
) -> parts.Opening | None:
    path = ("room", "openings", name)
    known = None if isinstance(room.sides, Broken) else [*room.sides, *written.FLAT]
    if known is not None and opening.in_ not in known:
        findings.unknown((*path, "in"), "side", opening.in_, known)
        return None
    if opening.sill is None:
        findings.assume("openings", "Standing on the floor (no sill given)", name)
    bottom = opening.sill.value if opening.sill else 0.0
    start = opening.from_.value
    low, high = (start, bottom), (start + opening.width.value, bottom + opening.height.value)
    height, side = whole(room.height), next((side for side in sides or () if side.name == opening.in_), None)
    if height and high[1] > height.value + _CLOSE:
        message = f"'{name}' reaches {high[1]:.4g} m up, above the ceiling at {height.value:.4g} m"
        findings.wrong((*path, "height"), message, "sill + height must stay under the room's height")
    if side and high[0] > math.dist(side.start, side.end) + _CLOSE:
        length = math.dist(side.start, side.end)
        message = f"'{name}' ends {high[0]:.4g} m along '{side.name}', which is {length:.4g} m long"
        findings.wrong((*path, "width"), message, "from + width must stay within the side")
    return parts.Opening(name, opening.in_, low, high, opening.make_up)


def _flat(
    name: str, opening: written.FlatOpening, corners: Sequence[Point] | None, findings: Findings
) -> parts.Opening | None:
    from scatterbay.geometry.outline import contains, distance_to_edges

    path = ("room", "openings", name)
    (x1, y1), (x2, y2) = opening.from_, opening.to
    low, high = (min(x1, x2), min(y1, y2)), (max(x1, x2), max(y1, y2))
    if high[0] - low[0] <= _CLOSE or high[1] - low[1] <= _CLOSE:
        findings.wrong((*path, "to"), f"'{name}' has no size", "'from' and 'to' are opposite corners")
        return None
    if corners is not None:
        points = [low, (high[0], low[1]), high, (low[0], high[1])]
        inside = contains(corners, points) | (distance_to_edges(corners, points) <= _CLOSE)
        pierced = any(low[0] < x < high[0] and low[1] < y < high[1] for x, y in corners)
        if pierced or not inside.all():
            findings.wrong(
                path, f"'{name}' reaches beyond the outline of the room", "move or shrink it", on_key=True
            )
            return None
    return parts.Opening(name, opening.in_, low, high, opening.make_up)


def _check_overlaps(openings: Sequence[parts.Opening], findings: Findings) -> None:
    for one, other in combinations(openings, 2):
        apart = any(
            one.high[axis] <= other.low[axis] + _CLOSE or other.high[axis] <= one.low[axis] + _CLOSE
            for axis in (0, 1)
        )
        if one.host == other.host and not apart:
            message = f"'{other.name}' overlaps '{one.name}' in '{one.host}'"
            findings.wrong(
                ("room", "openings", other.name), message, "move or shrink one of them", on_key=True
            )


def build_screens(room: written.Room, findings: Findings) -> tuple[parts.Screen, ...]:
    """Every screen of some length and height."""
    found = []
    height = whole(room.height)
    for name, screen in usable(room.screens).items():
        path = ("room", "screens", name)
        if screen.bottom is None:
            findings.assume("screens", "Standing on the floor (no bottom given)", name)
        bottom, top = screen.bottom.value if screen.bottom else 0.0, screen.top.value
        if math.dist(screen.from_, screen.to) < 1e-3:
            findings.wrong(
                (*path, "to"), f"'{name}' has no length", "'from' and 'to' are its two ends on plan"
            )
        elif top <= bottom:
            findings.wrong((*path, "top"), f"the top of '{name}' is not above its bottom", "")
        elif height and top > height.value + _CLOSE:
            message = f"'{name}' reaches {top:.4g} m up, above the ceiling at {height.value:.4g} m"
            findings.wrong((*path, "top"), message, "its top must stay under the room's height")
        elif screen.make_up.is_open:
            findings.wrong((*path, "make-up"), f"'{name}' is open: it stops nothing", "leave it out")
        else:
            found.append(parts.Screen(name, screen.from_, screen.to, bottom, top, screen.make_up))
    return tuple(found)
