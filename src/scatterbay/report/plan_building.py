"""Walls, openings, panels and screens on a drawing, to scale."""

from __future__ import annotations

import numpy as np
from matplotlib.axes import Axes
from matplotlib.patches import Polygon, Rectangle
from numpy.typing import NDArray

from scatterbay.advice.dose_map import Plane
from scatterbay.scenario.parts import MakeUp, Opening, Panel, Room, Scenario, Screen, Side

Array = NDArray[np.float64]

WALL, HEAVY, EDGE = "#4a4a4a", "#111111", "#000000"
LEAD = 0.035
"""Thickness that a lining is drawn with [m], for it to be seen."""
ROOMY = 0.2
"""Thickness from which a wall holds its label [m]."""
LONGEST = 46


def draw_building(axes: Axes, scenario: Scenario, plane: Plane) -> None:
    """The building where the plane cuts it."""
    room = scenario.room
    if plane.axis == 2:
        _plan(axes, room, plane.level)
    else:
        _section(axes, room, plane)


def _plan(axes: Axes, room: Room, level: float) -> None:
    for number, side in enumerate(room.sides):
        _wall(axes, room, number, side)
        for opening in room.openings:
            if opening.on_face == side.name and opening.low[1] <= level < opening.high[1]:
                _gap(axes, side, opening)
        for panel in room.panels:
            if panel.face == side.name and panel.low[1] <= level < panel.high[1]:
                _lining(axes, side, panel)
        _label(axes, side)
    for screen in room.screens:
        if screen.bottom <= level < screen.top:
            _screen(axes, screen)
    _dimensions(axes, room)


def _frame(side: Side) -> tuple[Array, Array, Array, float]:
    start, end = np.array(side.start), np.array(side.end)
    along = (end - start) / np.linalg.norm(end - start)
    return start, along, np.array([along[1], -along[0]]), float(np.linalg.norm(end - start))


def _wall(axes: Axes, room: Room, number: int, side: Side) -> None:
    """A side with its corners filled to its neighbours' thicknesses."""
    start, along, out, length = _frame(side)
    before, after = room.sides[number - 1], room.sides[(number + 1) % len(room.sides)]
    thick = max(side.make_up.thickness, 0.02)
    left = start - along * _overlap(before, side)
    right = start + along * (length + _overlap(side, after))
    corners = np.array([left, right, right + out * thick, left + out * thick])
    if side.make_up.is_open:
        axes.add_patch(
            Polygon(
                corners, closed=True, fill=False, edgecolor="#888888", linestyle=":", linewidth=0.8, zorder=4
            )
        )
        return
    axes.add_patch(Polygon(corners, closed=True, facecolor=WALL, edgecolor=EDGE, linewidth=0.5, zorder=4))


def _overlap(one: Side, other: Side) -> float:
    """How far a wall runs on round a corner: the other's thickness where the room turns out there."""
    _, along, out, _ = _frame(one)
    _, beyond, _, _ = _frame(other)
    turns_left = along[0] * beyond[1] - along[1] * beyond[0] > 0.0
    return (
        max(other.make_up.thickness, one.make_up.thickness) if turns_left and abs(out @ beyond) > 0.5 else 0.0
    )


def _gap(axes: Axes, side: Side, opening: Opening) -> None:
    """A door or window: the wall cut open, its leaf drawn."""
    start, along, out, _ = _frame(side)
    thick = max(side.make_up.thickness, 0.02)
    first, last = (start + along * x for x in (opening.low[0], opening.high[0]))
    cut = np.array([first, last, last + out * thick, first + out * thick])
    axes.add_patch(Polygon(cut, closed=True, facecolor="white", edgecolor=EDGE, linewidth=0.6, zorder=5))
    leaf = min(max(opening.make_up.thickness, 0.03), thick)
    if not opening.make_up.is_open:
        body = np.array([first, last, last + out * leaf, first + out * leaf])
        axes.add_patch(
            Polygon(
                body, closed=True, facecolor="#9a9a9a", edgecolor=EDGE, linewidth=0.5, hatch="////", zorder=6
            )
        )
    middle = 0.5 * (first + last) + out * (thick + 0.12)
    if opening.host == side.name:
        axes.text(
            float(middle[0]),
            float(middle[1]),
            opening.name,
            fontsize=6,
            ha="center",
            va="center",
            style="italic",
            zorder=8,
            clip_on=True,
        )


def _lining(axes: Axes, side: Side, panel: Panel) -> None:
    """A panel as a dark line on the face that it is put on; one with less as a light one."""
    start, along, out, _ = _frame(side)
    thick = side.make_up.thickness
    for layers, offset, colour in (
        (panel.inside, -LEAD, HEAVY), (panel.outside, thick, HEAVY), (panel.make_up, 0.3 * thick, "white")
    ):  # fmt: skip
        if layers is None:
            continue
        first, last = (start + along * x + out * offset for x in (panel.low[0], panel.high[0]))
        body = np.array([first, last, last + out * LEAD, first + out * LEAD])
        axes.add_patch(Polygon(body, closed=True, facecolor=colour, edgecolor=EDGE, linewidth=0.4, zorder=7))


def _label(axes: Axes, side: Side) -> None:
    """The make-up in the wall where it is thick enough to hold it, else along the outer face."""
    start, along, out, length = _frame(side)
    thick = side.make_up.thickness
    within = thick >= ROOMY
    at = start + along * 0.5 * length + out * (0.5 * thick if within else thick + 0.18)
    axes.text(
        float(at[0]),
        float(at[1]),
        f"{side.name}: {shortened(side.make_up)}",
        fontsize=6,
        ha="center",
        va="center",
        rotation=_upright(along),
        rotation_mode="anchor",
        color="white" if within else "black",
        zorder=8,
        clip_on=True,
    )


def _upright(along: Array) -> float:
    """Turn of a text along a direction, never upside down [deg]."""
    turn = float(np.degrees(np.arctan2(along[1], along[0])))
    return turn - 180.0 if turn > 90.0 else turn + 180.0 if turn <= -90.0 else turn


def shortened(make_up: MakeUp) -> str:
    """A make-up's text, cut where it is too long for a drawing."""
    return make_up.text if len(make_up.text) <= LONGEST else make_up.text[: LONGEST - 3] + "..."


def _screen(axes: Axes, screen: Screen) -> None:
    axes.plot(
        *zip(screen.start, screen.end, strict=True),
        color=HEAVY,
        linewidth=2.4,
        solid_capstyle="butt",
        zorder=6,
    )
    x, y = 0.5 * (np.array(screen.start) + np.array(screen.end))
    axes.text(x + 0.08, y, screen.name, fontsize=6, va="center", style="italic", zorder=8, clip_on=True)


def _dimensions(axes: Axes, room: Room) -> None:
    """Length of each side, inside."""
    for side in room.sides:
        start, along, out, length = _frame(side)
        at = start + along * 0.5 * length - out * 0.16
        turn = _upright(along)
        axes.text(
            float(at[0]),
            float(at[1]),
            f"{length:.2f} m",
            fontsize=6,
            ha="center",
            va="center",
            rotation=turn,
            color="#222222",
            rotation_mode="anchor",
            zorder=8,
            clip_on=True,
        )


def _section(axes: Axes, room: Room, plane: Plane) -> None:
    """Walls, ceiling and floor where a vertical plane cuts them."""
    keep = 1 - plane.axis
    cuts = sorted(_cuts(room, plane))
    for low, high in cuts:
        axes.add_patch(
            Rectangle(
                (low, 0.0), high - low, room.height, facecolor=WALL, edgecolor=EDGE, linewidth=0.5, zorder=4
            )
        )
    spots = np.array(room.corners)[:, keep]
    left = min([low for low, _ in cuts], default=float(spots.min()))
    right = max([high for _, high in cuts], default=float(spots.max()))
    top = room.ceiling.thickness
    if not room.ceiling.is_open:
        axes.add_patch(
            Rectangle(
                (left, room.height),
                right - left,
                top,
                facecolor=WALL,
                edgecolor=EDGE,
                linewidth=0.5,
                zorder=4,
            )
        )
        axes.text(
            0.5 * (left + right),
            room.height + top + 0.15,
            f"ceiling: {shortened(room.ceiling)}",
            fontsize=6.5,
            ha="center",
            zorder=8,
            clip_on=True,
        )
    depth = max(room.floor.thickness, 0.1)
    hatch = "...." if room.floor_on_ground else None
    axes.add_patch(
        Rectangle(
            (left, -depth),
            right - left,
            depth,
            facecolor="#cfcfcf" if hatch else WALL,
            edgecolor=EDGE,
            linewidth=0.5,
            hatch=hatch,
            zorder=4,
        )
    )
    axes.text(
        0.5 * (left + right),
        -depth - 0.2,
        f"floor: {shortened(room.floor)}",
        fontsize=6.5,
        ha="center",
        zorder=8,
        clip_on=True,
    )
    for storey in (room.storey_above, -room.storey_below if room.storey_below else None):
        if storey is not None:
            axes.axhline(storey, color="#555555", linewidth=0.7, linestyle=(0, (6, 3)), zorder=3)


def _cuts(room: Room, plane: Plane) -> list[tuple[float, float]]:
    """Where a vertical plane cuts the sides: from the inner to the outer face, along the plane."""
    keep = 1 - plane.axis
    found = []
    for side in room.sides:
        start, _, out, _ = _frame(side)
        a, b = side.start[plane.axis], side.end[plane.axis]
        if (a < plane.level) != (b < plane.level):
            share = (plane.level - a) / (b - a)
            at = start[keep] + share * (side.end[keep] - start[keep])
            ends = at, at + side.make_up.thickness * float(np.sign(out[keep]))
            found.append((min(ends), max(ends)))
    return found
