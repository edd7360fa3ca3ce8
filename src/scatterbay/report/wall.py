"""What `wall` and `advise` print."""

from __future__ import annotations

import itertools
from typing import Any

import numpy as np

from scatterbay import __version__
from scatterbay.advice.amend import words
from scatterbay.advice.linings import Rectangle, missed
from scatterbay.advice.remedies import OVERLAP, Remedy
from scatterbay.advice.scan import PointResult, Scan
from scatterbay.advice.surfaces import Surface, spoken_point
from scatterbay.advice.whole import Advice, SurfaceAdvice, sold_mass
from scatterbay.report.cautions import CAUTIONS, NOT_COVERED
from scatterbay.report.records import FORMAT
from scatterbay.report.screen import Screen
from scatterbay.report.words import BASES, spoken, unit
from scatterbay.scenario.parts import Scenario
from scatterbay.units import significant

PROFILE_ROWS = 12
"""Rows of a profile on the screen."""


def show_wall(scenario: Scenario, one: SurfaceAdvice, screen: Screen, limit: float) -> None:
    """A scanned surface, its weakest point, and what to add."""
    _open(scenario, f"{one.scan.surface.host}: scan of the protected side", screen)
    show_scan(one, screen, limit)
    screen.line()
    _show_profile(one.scan, screen)
    if one.remedies:
        screen.line()
        show_remedies(one, screen, limit)
    _close(scenario, screen)


def show_advice(scenario: Scenario, advice: Advice, screen: Screen) -> None:
    """All surfaces, the worst first."""
    _open(scenario, "advice for the whole bay", screen)
    rows = []
    for one in advice.surfaces:
        worst = one.scan.worst
        rows.append([one.scan.surface.host, _ratio(worst.ratio), spoken_point(one.scan.surface, worst.on_face),
                     "missed" if one.missed else "kept"])  # fmt: skip
    screen.table(
        ["surface", "of goal", "worst point, by the upper end of its band", "goals"], rows, right={1}
    )
    for one in advice.surfaces:
        if one.remedies:
            screen.line()
            show_scan(one, screen, advice.limit)
            show_remedies(one, screen, advice.limit)
    screen.line()
    if advice.additions:
        screen.line(f"With all of it: {significant(advice.mass, 3)} kg added", "bold")
        for addition in advice.additions:
            screen.paragraph(f"{addition.layers} {words(addition.lining)}", indent="    ", first="  - ")
    if advice.unoccupied:
        names = ", ".join(advice.unoccupied)
        screen.paragraph(f"Not scanned, as no place of the scenario lies behind: {names}.", indent="  ")
    _close(scenario, screen)


def show_scan(one: SurfaceAdvice, screen: Screen, limit: float) -> None:
    """How a surface stands, and its worst point."""
    found, worst = one.scan, one.scan.worst
    over = int((found.ratios > limit).sum())
    count = len(found.points)
    state = f"{over} of {count} points are over it" if over else f"all {count} points are under it"
    allowed = "a goal" if limit == 1.0 else f"{limit:.2g} of a goal"
    screen.paragraph(
        f"{found.surface.host}: by the upper end of the band against {allowed}, {state}.",
        style="bold reverse" if over else "bold",
    )
    screen.paragraph(f"worst point: {_point(found, worst)}", indent="    ", first="  ")
    if found.openings:
        beyond = [p for p in found.points if p.on_face in found.openings]
        most = max(beyond, key=lambda p: p.ratio)
        screen.paragraph(
            f"{len(beyond)} points are behind openings in it, at most {_ratio(most.ratio)} of a goal; scan those",
            indent="    ", first="  ",
        )  # fmt: skip
    for reason in worst.result.reasons:
        screen.paragraph(reason, indent="    ", first="  ! ")
    for rectangle in missed(found, limit):
        screen.paragraph(f"missed: {_rectangle(found.surface, rectangle)}", indent="    ", first="  ")
    who = sorted({(s.place, s.people, s.occupancy) for s in found.standings})
    said = "; ".join(f"{place} ({people}, occupancy {significant(share, 3)})" for place, people, share in who)
    screen.paragraph(
        f"points at most {max(found.grid.spacing):.2f} m apart, {found.gap:g} m beyond the outer face (or at the "
        f"usual heights above and below); each judged as the nearest of: {said}",
        indent="    ", first="  ",
    )  # fmt: skip


def _point(found: Scan, point: PointResult) -> str:
    goal = point.goal
    if goal is None:
        return f"{spoken_point(found.surface, point.on_face)}: no goal to judge it by"
    figure = goal.figure
    value = spoken(figure.value, figure.time_base, figure.quantity)
    upper = spoken(figure.high, figure.time_base, figure.quantity)
    return (
        f"{spoken_point(found.surface, point.on_face)}: {BASES[figure.time_base]} {value}, upper end {upper}, "
        f"{_ratio(point.ratio)} of {goal.text}"
    )


def _rectangle(surface: Surface, one: Rectangle) -> str:
    (left, low), (right, high) = one.low, one.high
    if surface.kind in ("ceiling", "floor"):
        return f"x {left:.2f} to {right:.2f} m, y {low:.2f} to {high:.2f} m ({one.area:.2g} m2)"
    return (
        f"from {left:.2f} to {right:.2f} m from {surface.corner}, {low:.2f} to {high:.2f} m above the floor "
        f"({one.area:.2g} m2)"
    )


def _show_profile(found: Scan, screen: Screen) -> None:
    """The worst along the first coordinate."""
    along = "x" if found.surface.kind in ("ceiling", "floor") else f"from {found.surface.corner}"
    rows = [[f"{u:.2f} m", f"{v:.2f} m", _ratio(ratio), _bar(ratio)] for u, v, ratio in profile(found)]
    up = "y" if found.surface.kind in ("ceiling", "floor") else "height"
    screen.table([along, up, "of goal", "0 to 1 and over, upper end of the band"], rows, right={0, 1, 2})


def profile(found: Scan, rows: int = PROFILE_ROWS) -> list[tuple[float, float, float]]:
    """The worst point (along, up, ratio) in each of a few stretches along the surface."""
    first = np.array([p.on_face[0] for p in found.points])
    edges = np.linspace(first.min(), first.max() + 1e-9, rows + 1)
    worst = []
    for low, high in itertools.pairwise(edges):
        inside = np.flatnonzero((first >= low) & (first < high))
        if inside.size:
            k = int(inside[np.argmax(found.ratios[inside])])
            worst.append((*found.points[k].on_face, float(found.ratios[k])))
    return worst


def _bar(ratio: float) -> str:
    filled = min(20, round(20 * ratio))
    return "#" * filled + ("+" if ratio > 1.0 else "." * (20 - filled))


def show_remedies(one: SurfaceAdvice, screen: Screen, limit: float) -> None:
    """What to add, material by material."""
    screen.paragraph(
        "To add, so that every point keeps every goal by the upper end of its band:", style="bold"
    )
    for found in one.remedies:
        for k, sentence in enumerate(remedy_sentences(found)):
            screen.paragraph(sentence, indent="    ", first="  - " if k == 0 else "    ")


def remedy_sentences(one: Remedy) -> list[str]:
    """One remedy as an instruction, with what it rests on."""
    lining = one.lining
    if one.why_not:
        return [f"{lining.material}: {one.why_not}."]
    thick = f"{significant(1e3 * lining.thickness, 3)} mm"
    if one.sold is None or one.sold_ratio is None:
        return [
            f"{lining.material} {thick} {words(lining)}: thicker than anything on the list; in layers, or ask."
        ]
    found = [
        f"{one.sold.sold_as} {words(lining)}: {significant(lining.area, 3)} m2, {significant(sold_mass(one), 3)} kg; "
        f"leaves {_ratio(one.sold_ratio)} of the goal.",
        f"Exact: {thick}, which leaves {_ratio(one.ratio)}. Laps of {1e3 * OVERLAP:.0f} mm are in the rectangle.",
    ]
    if one.other_face is not None:
        other = "outer" if lining.face == "inside" else "inner"
        if one.other_face > one.ratio * 1.02:
            found.append(f"On the {other} face the same thickness would leave {_ratio(one.other_face)}.")
        else:
            found.append(f"The {other} face does as well.")
    return found


def _ratio(value: float) -> str:
    return "< 0.001" if value < 1e-3 else significant(value, 3 if 0.95 < value < 1.05 else 2)


def _open(scenario: Scenario, what: str, screen: Screen) -> None:
    screen.line(f"{scenario.title}; {what}", "bold")
    for caution in CAUTIONS:
        screen.paragraph(caution, indent="  ", first="! ")
    screen.line()


def _close(scenario: Scenario, screen: Screen) -> None:
    screen.line()
    screen.paragraph(
        "The band of a place behind a heavy lining or near its edge is wider, as scatter in the room is not computed: "
        "a thin heavy sheet can raise the upper end while it lowers the figure.",
        indent="  ", first="! ",
    )  # fmt: skip
    for text in (*NOT_COVERED, *CAUTIONS):
        screen.paragraph(text, indent="  ", first="! ")
    screen.line()
    digest = scenario.sha256[:16]
    screen.paragraph(
        f"scatterbay {__version__}; scenario {scenario.path}, SHA-256 {digest}...; seed {scenario.options.seed}"
    )


def wall_record(scenario: Scenario, one: SurfaceAdvice, limit: float) -> dict[str, Any]:
    """A scanned surface for JSON."""
    return {**_head(scenario), "limit": limit, **_surface_record(one, limit)}


def advice_record(scenario: Scenario, advice: Advice) -> dict[str, Any]:
    """All surfaces for JSON."""
    return {
        **_head(scenario),
        "limit": advice.limit,
        "surfaces": [_surface_record(one, advice.limit) for one in advice.surfaces],
        "not_scanned": list(advice.unoccupied),
        "added": [{"name": a.name, "layers": a.layers, "where": words(a.lining)} for a in advice.additions],
        "added_mass": {"value": advice.mass, "unit": "kg"},
    }


def _head(scenario: Scenario) -> dict[str, Any]:
    return {
        "format": FORMAT,
        "program": f"scatterbay {__version__}",
        "cautions": list(CAUTIONS),
        "title": scenario.title,
        "scenario": {"path": scenario.path, "sha256": scenario.sha256, "seed": scenario.options.seed},
    }


def _surface_record(one: SurfaceAdvice, limit: float) -> dict[str, Any]:
    found = one.scan
    return {
        "surface": found.surface.host,
        "points": len(found.points),
        "worst": {
            "where": spoken_point(found.surface, found.worst.on_face),
            "on_face": {"value": list(found.worst.on_face), "unit": "m"},
            "at": {"value": list(found.worst.result.at), "unit": "m"},
            "upper_end_over_goal": found.worst.ratio,
            "goal": found.worst.goal.text if found.worst.goal else None,
        },
        "missed": [{"low": list(r.low), "high": list(r.high), "unit": "m"} for r in missed(found, limit)],
        "remedies": [_remedy_record(r) for r in one.remedies],
    }


def _remedy_record(one: Remedy) -> dict[str, Any]:
    lining = one.lining
    return {
        "material": lining.material,
        "face": lining.face,
        "where": {"low": list(lining.where.low), "high": list(lining.where.high), "unit": "m"},
        "exact": {"value": 1e3 * lining.thickness, "unit": "mm"},
        "leaves": one.ratio,
        "sold_as": one.sold.sold_as if one.sold else None,
        "sold_leaves": one.sold_ratio,
        "same_on_the_other_face_leaves": one.other_face,
        "area": {"value": lining.area, "unit": "m2"},
        "mass": {"value": sold_mass(one), "unit": "kg"},
        "why_not": one.why_not,
    }


def wall_rows(found: Scan) -> list[dict[str, Any]]:
    """Every point of a scan, for CSV."""
    rows = []
    for point, ratio in zip(found.points, found.ratios, strict=True):
        goal = point.goal
        rows.append(
            {
                "surface": found.surface.host,
                "first_m": point.on_face[0],
                "second_m": point.on_face[1],
                "x_m": point.result.at[0],
                "y_m": point.result.at[1],
                "z_m": point.result.at[2],
                "judged_as": point.standing.place,
                "goal": goal.text if goal else "",
                "unit": unit(goal.figure.time_base, goal.figure.quantity) if goal else "",
                "upper_end_over_goal": float(ratio),
                "behind_opening": point.on_face in found.openings,
            }
        )
    return rows
