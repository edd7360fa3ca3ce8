"""Panels: parts of sides, ceilings, floors, screens and openings that hold more or less than the rest."""

from __future__ import annotations

import math
from collections.abc import Mapping, Sequence

from scatterbay.scenario import parts
from scatterbay.scenario.build.findings import Findings, usable
from scatterbay.scenario.build.openings import Host, room_names, upright_hosts
from scatterbay.scenario.model import room as written
from scatterbay.scenario.model.base import Broken

Point = tuple[float, float]
SLACK = 1e-3
"""What a panel may reach beyond what it is on [m]."""


def build_panels(
    room: written.Room,
    sides: Sequence[parts.Side] | None,
    screens: Sequence[parts.Screen],
    openings: Sequence[parts.Opening],
    corners: Sequence[Point] | None,
    findings: Findings,
) -> tuple[parts.Panel, ...]:
    """Every panel that lies within what it is on."""
    hosts = upright_hosts(room, sides, screens)
    hosts |= {one.name: Host(one.low, one.high, one.on_face) for one in openings}
    known = None
    if not isinstance(room.sides, Broken):
        known = [*room.sides, *written.FLAT, *room_names(room, "screens"), *room_names(room, "openings")]
    found = []
    panels: dict[str, written.SidePanel | written.FlatPanel] = usable(room.panels)
    for name, panel in panels.items():
        path = ("room", "panels", name)
        if not _one_content(path, panel, findings):
            continue
        if isinstance(panel, written.FlatPanel):
            where, face = _flat(path, panel, corners, findings), str(panel.on)
        else:
            where, face = _upright(path, panel, hosts, known, findings)
        if where is not None:
            low, high = where
            found.append(
                parts.Panel(
                    name, panel.on, face, low, high, panel.make_up, panel.add_inside, panel.add_outside
                )
            )
    return tuple(found)


def _one_content(
    path: tuple[str, ...], panel: written.SidePanel | written.FlatPanel, findings: Findings
) -> bool:
    added = panel.add_inside is not None or panel.add_outside is not None
    if added == (panel.make_up is not None):
        said = "both a make-up and additions are given" if added else "nothing says what is there"
        hint = "give 'make-up' (instead of the rest), or 'add inside' and 'add outside' (on top of it)"
        findings.wrong(path, said, hint, on_key=True)
        return False
    for key, layers in (("add inside", panel.add_inside), ("add outside", panel.add_outside)):
        if layers is not None and layers.is_open:
            findings.wrong((*path, key), "'open' adds nothing", "leave it out, or write 'make-up: open'")
            return False
    return True


def _upright(
    path: tuple[str, ...],
    panel: written.SidePanel,
    hosts: Mapping[str, Host],
    known: Sequence[str] | None,
    findings: Findings,
) -> tuple[tuple[Point, Point] | None, str]:
    """Its corners on its face, and the face."""
    if known is not None and panel.on not in known:
        findings.unknown((*path, "on"), "side, screen or opening", panel.on, known)
        return None, ""
    for one, other in (("width", "to"), ("height", "top")):
        if getattr(panel, one) is not None and getattr(panel, other) is not None:
            findings.wrong((*path, other), f"both '{one}' and '{other}' are given", "keep one", on_key=True)
            return None, ""
    host = hosts.get(panel.on)
    if host is None:
        return None, ""
    start = host.low[0] + (panel.from_.value if panel.from_ else 0.0)
    end = (
        host.low[0] + panel.to.value
        if panel.to
        else start + panel.width.value
        if panel.width
        else host.high[0]
    )
    bottom = panel.bottom.value if panel.bottom else host.low[1]
    top = panel.top.value if panel.top else bottom + panel.height.value if panel.height else host.high[1]
    if host.face in written.FLAT and any(
        (panel.from_, panel.width, panel.to, panel.bottom, panel.height, panel.top)
    ):
        findings.wrong(
            (*path, "on"), f"'{panel.on}' lies flat: a panel covers all of it", "take the position out"
        )
        return None, ""
    if math.inf in (end, top):
        return None, ""
    low, high = (start, bottom), (end, top)
    keys = (("from", "to" if panel.to else "width"), ("bottom", "top" if panel.top else "height"))
    for axis in (0, 1):
        if high[axis] - low[axis] < SLACK:
            findings.wrong(path, "it has no size", "its far edges must lie beyond its near ones", on_key=True)
            return None, ""
        if low[axis] < host.low[axis] - SLACK or high[axis] > host.high[axis] + SLACK:
            first = host.low[0] if axis == 0 else 0.0
            span = f"{host.low[axis] - first:.4g} to {host.high[axis] - first:.4g} m"
            reach = f"{low[axis] - first:.4g} to {high[axis] - first:.4g} m"
            message = f"it reaches from {reach}, beyond '{panel.on}', which goes from {span}"
            given = [
                key for key in keys[axis] if getattr(panel, "from_" if key == "from" else key) is not None
            ]
            findings.wrong((*path, *given[-1:]), message, "move or shrink it", on_key=not given)
            return None, ""
    return (low, high), host.face


def _flat(
    path: tuple[str, ...], panel: written.FlatPanel, corners: Sequence[Point] | None, findings: Findings
) -> tuple[Point, Point] | None:
    """Its corners on plan; all of the outline where none are given."""
    if (panel.from_ is None) != (panel.to is None):
        findings.wrong(
            path, "one corner is given without the other", "give 'from' and 'to', or neither", on_key=True
        )
        return None
    if corners is None:
        return None
    x, y = zip(*corners, strict=True)
    if panel.from_ is None or panel.to is None:
        return (min(x), min(y)), (max(x), max(y))
    (x1, y1), (x2, y2) = panel.from_, panel.to
    low, high = (min(x1, x2), min(y1, y2)), (max(x1, x2), max(y1, y2))
    if high[0] - low[0] < SLACK or high[1] - low[1] < SLACK:
        findings.wrong((*path, "to"), "it has no size", "'from' and 'to' are opposite corners")
        return None
    if (
        low[0] < min(x) - SLACK
        or low[1] < min(y) - SLACK
        or high[0] > max(x) + SLACK
        or high[1] > max(y) + SLACK
    ):
        findings.wrong(path, "it reaches beyond the outline of the room", "move or shrink it", on_key=True)
        return None
    return low, high
