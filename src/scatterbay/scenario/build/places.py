"""Places where someone may stand: as a point, or by the trade's conventions."""

from __future__ import annotations

import math
from collections.abc import Mapping, Sequence
from typing import TYPE_CHECKING

from scatterbay.scenario import parts
from scatterbay.scenario.build.fabric import fabric_at
from scatterbay.scenario.build.findings import Findings, names_in, usable, whole
from scatterbay.scenario.build.outline import outward
from scatterbay.scenario.build.room import UNDER_THE_HEAD
from scatterbay.scenario.model import use as written
from scatterbay.scenario.model.document import Document
from scatterbay.scenario.rules import occupancy_suggestion
from scatterbay.units import significant

if TYPE_CHECKING:
    from scatterbay.geometry.solids import Solid

Path = tuple[str, ...]

GAP = 0.3
HEIGHT = 1.2
OVER_THE_FLOOR = 0.5
NEAREST = 0.05
"""Places nearer to a body or a source than this are refused [m]: nobody is judged on contact."""

_WAYS = ("at", "beyond", "above", "below")
_WITH_BEYOND = ("along", "height", "gap")


def build_places(document: Document, room: parts.Room | None, findings: Findings) -> tuple[parts.Place, ...]:
    """Every place whose position can be told."""
    written_room = whole(document.room)
    broken = set(names_in(written_room.openings) or () if written_room else ())
    broken -= {opening.name for opening in room.openings} if room else set()
    groups = names_in(document.people)
    areas = {name: group.area for name, group in usable(document.people).items()}
    found = []
    for name, entry in usable(document.places).items():
        path = ("places", name)
        if groups is not None and entry.people not in groups:
            findings.unknown((*path, "people"), "group of people", entry.people, groups)
        if entry.occupancy is None:
            findings.assume("occupancy", "Occupancy factor taken as 1", name)
        spot = None if entry.beyond in broken else _spot(name, entry, room, findings)
        if spot is not None:
            at, how = spot
            occupancy = 1.0 if entry.occupancy is None else entry.occupancy
            _suggest(name, entry, occupancy, findings)
            area = entry.area or areas.get(entry.people) or ""
            found.append(parts.Place(name, at, entry.people, occupancy, how, area, entry.space or ""))
    return tuple(found)


def _suggest(name: str, entry: written.Place, occupancy: float, findings: Findings) -> None:
    """Say which occupancy factor is suggested for a kind of space; it is never applied."""
    if entry.space is None:
        return
    suggested = occupancy_suggestion(entry.space)
    text = (
        f"'{name}' counts {significant(occupancy, 3)}; for '{suggested.space}' {suggested.factor} is suggested "
        f"({suggested.source}), which is not applied"
    )
    findings.assume("occupancy", text)


def _spot(
    name: str, entry: written.Place, room: parts.Room | None, findings: Findings
) -> tuple[parts.Point, str] | None:
    """The position of a place, and how it was found."""
    path = ("places", name)
    given = [way for way in _WAYS if getattr(entry, way) is not None]
    if len(given) != 1:
        said = f"{' and '.join(given)} are given together" if given else "nothing says where it is"
        findings.wrong(path, said, f"give one of {', '.join(_WAYS)}", on_key=True)
        return None
    for key in _WITH_BEYOND:
        if entry.beyond is None and getattr(entry, key) is not None:
            findings.wrong((*path, key), f"'{key}' goes with 'beyond', not with '{given[0]}'", "take it out")
    if entry.at is not None:
        return entry.at, "as given"
    if room is None:
        return None
    if entry.above is not None:
        return _above(name, entry.above, room, findings)
    if entry.below is not None:
        return _below(name, entry.below, room, findings)
    return _beyond(name, entry, room, findings)


def _above(
    name: str, where: tuple[float, float], room: parts.Room, findings: Findings
) -> tuple[parts.Point, str]:
    floor = room.storey_above
    if floor is None:
        floor = room.height + room.ceiling.thickness
        findings.assume("storey above", "Floor above taken as the outer face of the ceiling", name)
    return (*where, floor + OVER_THE_FLOOR), f"{OVER_THE_FLOOR} m above the floor above"


def _below(
    name: str, where: tuple[float, float], room: parts.Room, findings: Findings
) -> tuple[parts.Point, str] | None:
    path = ("places", name, "below")
    if room.floor_on_ground:
        findings.wrong(path, "there is nothing below a floor on the ground", "give the floor's make-up")
        return None
    if room.storey_below is None:
        hint = "add 'storey below: 3.6 m' (floor to floor) to the room"
        findings.wrong(path, "how far down the floor below lies is not known", hint)
        return None
    return (*where, UNDER_THE_HEAD - room.storey_below), f"{UNDER_THE_HEAD} m above the floor below"


def _beyond(
    name: str, entry: written.Place, room: parts.Room, findings: Findings
) -> tuple[parts.Point, str] | None:
    found = _side_and_along(name, entry, room, findings)
    if found is None:
        return None
    side, along = found
    if entry.height is None:
        findings.assume("height", f"Height over the floor taken as {HEIGHT} m", name)
    if entry.gap is None:
        findings.assume("gap", f"Standing {GAP} m beyond the outer face", name)
    gap, up = entry.gap.value if entry.gap else GAP, entry.height.value if entry.height else HEIGHT
    normal, length = outward(side.start, side.end), math.dist(side.start, side.end)
    out, share = side.make_up.thickness + gap, along / length
    x, y = (side.start[i] + share * (side.end[i] - side.start[i]) + out * normal[i] for i in (0, 1))
    how = (
        f"{gap:.4g} m beyond the outer face of {entry.beyond}, {along:.4g} m along {side.name}, {up:.4g} m up"
    )
    return (x, y, up), how


def _side_and_along(
    name: str, entry: written.Place, room: parts.Room, findings: Findings
) -> tuple[parts.Side, float] | None:
    """The side a place is beyond, and how far along; beyond an opening it is the opening's middle."""
    path = ("places", name)
    sides = {side.name: side for side in room.sides}
    openings = {opening.name: opening for opening in room.openings if opening.on_face in sides}
    beyond = str(entry.beyond)
    if beyond in openings:
        if entry.along is not None:
            message = f"'along' is not needed: the place is behind the middle of '{beyond}'"
            findings.wrong((*path, "along"), message, "take it out, or name the side")
        opening = openings[beyond]
        return sides[opening.on_face], 0.5 * (opening.low[0] + opening.high[0])
    if beyond not in sides:
        findings.unknown((*path, "beyond"), "side, or opening in a side,", beyond, [*sides, *openings])
        return None
    side = sides[beyond]
    length = math.dist(side.start, side.end)
    if entry.along is None:
        hint = f"add 'along': distance from {list(side.start)}, the first corner of '{beyond}', up to {length:.4g} m"
        findings.wrong(path, "'along' is missing", hint, on_key=True)
        return None
    if entry.along.value > length:
        message = f"'{entry.along.text}' is past the end of '{beyond}', which is {length:.4g} m long"
        findings.wrong((*path, "along"), message, f"it is measured from {list(side.start)}")
        return None
    return side, entry.along.value


def check_places(
    places: Sequence[parts.Place],
    room: parts.Room | None,
    solids: Mapping[str, list[Solid]],
    beams: Sequence[parts.Beam],
    findings: Findings,
) -> None:
    """Refuses places inside the building's fabric, and in or right beside bodies and sources."""
    import numpy as np

    for place in places:
        path = ("places", place.name)
        where = [round(value, 4) for value in place.at]
        inside = fabric_at(place.at, room) if room else None
        if inside:
            hint = "stand in front of it or behind it; 'beyond: side' finds the outer face"
            findings.wrong(path, f"the place at {where} lies inside {inside}", hint, on_key=True)
        for name, outer in solids.items():
            distance = float(outer[0].distance(np.array([place.at]))[0])
            if distance < NEAREST:
                said = (
                    f"lies inside '{name}'"
                    if distance == 0.0
                    else f"is {1000 * distance:.0f} mm from '{name}'"
                )
                hint = f"stay {1000 * NEAREST:.0f} mm or more away from bodies"
                findings.wrong(path, f"the place at {where} {said}", hint, on_key=True)
        for beam in beams:
            if math.dist(beam.at, place.at) < NEAREST:
                hint = f"stay {1000 * NEAREST:.0f} mm or more away from sources"
                findings.wrong(
                    path, f"the place at {where} is where '{beam.name}' comes from", hint, on_key=True
                )
