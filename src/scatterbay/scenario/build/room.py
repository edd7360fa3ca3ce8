"""The room as a whole."""

from __future__ import annotations

from scatterbay.scenario import parts
from scatterbay.scenario.build.findings import Findings, whole
from scatterbay.scenario.build.openings import build_openings, build_screens
from scatterbay.scenario.build.outline import build_sides, sound_corners
from scatterbay.scenario.build.panels import build_panels
from scatterbay.scenario.model import room as written
from scatterbay.scenario.model.base import Broken

UNDER_THE_HEAD = 1.7
"""Height over the floor below at which people there are judged [m]."""


def build_room(room: written.Room, findings: Findings) -> parts.Room | None:
    """The room, if all of it could be read and fits together."""
    corners = sound_corners(room, findings)
    sides = build_sides(room, corners, findings)
    _check_names(room, findings)
    screens = build_screens(room, findings)
    openings = build_openings(room, sides, screens, corners, findings)
    panels = build_panels(room, sides, screens, openings, corners, findings)
    height, ceiling, floor = whole(room.height), whole(room.ceiling), whole(room.floor)
    above, below = whole(room.storey_above), whole(room.storey_below)
    if corners is None or sides is None or height is None or ceiling is None or floor is None:
        return None
    make_up, on_ground = floor
    if above and above.value < height.value + ceiling.thickness:
        message = f"the storey above starts {above.value:.4g} m up, inside or under the ceiling"
        hint = f"height and ceiling reach {height.value + ceiling.thickness:.4g} m; measure floor to floor"
        findings.wrong(("room", "storey above"), message, hint)
    if below and on_ground:
        message = "there is no storey below a floor on the ground"
        findings.wrong(("room", "storey below"), message, "take it out, or give the floor's make-up")
    elif below and below.value < make_up.thickness + UNDER_THE_HEAD:
        message = f"'{below.text}' leaves no room to stand under the floor"
        findings.wrong(("room", "storey below"), message, "measure floor to floor")
    return parts.Room(
        corners,
        height.value,
        sides,
        ceiling,
        make_up,
        on_ground,
        above.value if above else None,
        below.value if below else None,
        openings,
        screens,
        panels,
    )


def _check_names(room: written.Room, findings: Findings) -> None:
    """Sides, openings and screens are called by name in one breath, so the names must differ."""
    seen: dict[str, str] = dict.fromkeys(written.FLAT, "part of every room")
    for section in ("sides", "openings", "screens", "panels"):
        for name in getattr(room, section) if not isinstance(getattr(room, section), Broken) else ():
            if name in seen:
                findings.wrong(
                    ("room", section, name), f"'{name}' is already {seen[name]}", "rename one", on_key=True
                )
            seen.setdefault(name, f"one of the {section}")
