"""Openings and screens: inside their host, clear of one another, of some size."""

from __future__ import annotations

import math
from collections.abc import Collection, Mapping, Sequence
from itertools import combinations
from typing import NamedTuple

from scatterbay.scenario import parts
from scatterbay.scenario.build.findings import Findings, names_in, usable, whole
from scatterbay.scenario.model import room as written
from scatterbay.scenario.model.base import Broken

Point = tuple[float, float]
_CLOSE = 1e-9


def build_openings(
    room: written.Room,
    sides: Sequence[parts.Side] | None,
    screens: Sequence[parts.Screen],
    corners: Sequence[Point] | None,
    findings: Findings,
) -> tuple[parts.Opening, ...]:
    """Every opening that lies where it can; what is in an opening comes after it."""
    openings: dict[str, written.SideOpening | written.FlatOpening] = usable(room.openings)
    hosts = upright_hosts(room, sides, screens)
    found: list[parts.Opening] = []
    known = None if isinstance(room.sides, Broken) else [*room.sides, *written.FLAT, *room_names(room, "screens"),
                                                         *room_names(room, "openings")]  # fmt: skip
    left = dict(openings)
    for _ in range(len(openings) + 1):
        for name, opening in list(left.items()):
            if isinstance(opening, written.SideOpening) and opening.in_ in left and opening.in_ not in hosts:
                continue
            del left[name]
            if isinstance(opening, written.FlatOpening):
                made = _flat(name, opening, corners, findings)
            else:
                made = _upright(name, opening, hosts, {s.name for s in sides or ()}, known, findings)
            if made:
                found.append(made)
                hosts.setdefault(name, Host(made.low, made.high, made.on_face))
    for name in left:
        message = f"'{name}' is in an opening that is, in the end, in itself"
        findings.wrong(("room", "openings", name, "in"), message, "put one of them in a side or a screen")
    _check_overlaps(found, findings)
    return tuple(found)


class Host(NamedTuple):
    """Something upright that openings and panels lie in: its corners on its face, and the face."""

    low: Point
    high: Point
    face: str


def upright_hosts(
    room: written.Room, sides: Sequence[parts.Side] | None, screens: Sequence[parts.Screen]
) -> dict[str, Host]:
    """Sides and screens, by name."""
    height = whole(room.height)
    top = height.value if height else math.inf
    hosts = {
        side.name: Host((0.0, 0.0), (math.dist(side.start, side.end), top), side.name) for side in sides or ()
    }
    for screen in screens:
        length = math.dist(screen.start, screen.end)
        hosts[screen.name] = Host((0.0, screen.bottom), (length, screen.top), screen.name)
    return hosts


def room_names(room: written.Room, section: str) -> tuple[str, ...]:
    """Names of a section of the room."""
    return names_in(getattr(room, section)) or ()


def _upright(
    name: str,
    opening: written.SideOpening,
    hosts: Mapping[str, Host],
    sides: Collection[str],
    known: Sequence[str] | None,
    findings: Findings,
) -> parts.Opening | None:
    path = ("room", "openings", name)
    if known is not None and opening.in_ not in known:
        findings.unknown((*path, "in"), "side, screen or opening", opening.in_, known)
        return None
    host = hosts.get(opening.in_)
    if opening.sill is None:
        findings.assume("openings", "Standing on the floor (no sill given)", name)
    bottom = opening.sill.value if opening.sill else 0.0
    start = opening.from_.value + (host.low[0] if host else 0.0)
    low, high = (start, bottom), (start + opening.width.value, bottom + opening.height.value)
    if host is None:
        return None
    if host.face in written.FLAT:
        findings.wrong((*path, "in"), f"'{opening.in_}' lies flat", f"put '{name}' in the {host.face} itself")
        return None
    if high[1] > host.high[1] + _CLOSE:
        limit = "the ceiling" if opening.in_ in sides else f"the top of '{opening.in_}'"
        message = f"'{name}' reaches {high[1]:.4g} m up, above {limit} at {host.high[1]:.4g} m"
        findings.wrong((*path, "height"), message, "sill + height must stay under the room's height")
    if low[1] < host.low[1] - _CLOSE:
        message = f"'{name}' starts {low[1]:.4g} m up, below '{opening.in_}' at {host.low[1]:.4g} m"
        findings.wrong((*path, "sill"), message, "the sill is its height above the floor", on_key=True)
    if high[0] > host.high[0] + _CLOSE:
        length = host.high[0] - host.low[0]
        end = high[0] - host.low[0]
        message = f"'{name}' ends {end:.4g} m along '{opening.in_}', which is {length:.4g} m long"
        what = "side" if opening.in_ == host.face else "opening it is in"
        findings.wrong((*path, "width"), message, f"from + width must stay within the {what}")
    return parts.Opening(name, opening.in_, low, high, opening.make_up, host.face)


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
    return parts.Opening(name, opening.in_, low, high, opening.make_up, opening.in_)


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
