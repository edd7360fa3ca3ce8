"""An assessment as nested records for JSON, and as flat rows for CSV and pandas."""

from __future__ import annotations

from typing import Any

from scatterbay import __version__
from scatterbay.exposure.results import TIME_BASES, Assessment, Figure, GoalResult, PathShare, PlaceResult
from scatterbay.report.cautions import CAUTIONS, NOT_COVERED
from scatterbay.report.words import in_unit, unit

FORMAT = 1
"""Version of the JSON and CSV layout."""


def assessment_record(assessment: Assessment) -> dict[str, Any]:
    """The whole assessment; every number beside its unit."""
    return {
        "format": FORMAT,
        "program": f"scatterbay {__version__}",
        "cautions": list(CAUTIONS),
        "not_covered": list(NOT_COVERED),
        "title": assessment.title,
        "drawing": assessment.drawing,
        "scenario": {"path": assessment.path, "sha256": assessment.sha256, "seed": assessment.seed},
        "verdict": assessment.worst,
        "places": [_place(place) for place in assessment.places],
        "assumptions": [{"topic": a.topic, "text": a.text} for a in assessment.assumptions],
    }


def _figure(figure: Figure) -> dict[str, Any]:
    base = figure.time_base
    return {
        "value": in_unit(figure.value, base),
        "unit": unit(base, figure.quantity),
        "quantity": figure.quantity,
        "standard_error": in_unit(figure.standard_error, base),
        "low": in_unit(figure.low, base),
        "high": in_unit(figure.high, base),
    }


def _rate(value: float, quantity: str, error: float | None = None) -> dict[str, Any]:
    record = {"value": in_unit(value, "rate"), "unit": unit("rate", quantity), "quantity": quantity}
    return record if error is None else {**record, "standard_error": in_unit(error, "rate")}


def _goal(result: GoalResult) -> dict[str, Any]:
    figure = result.figure
    return {
        "text": result.text,
        "time_base": figure.time_base,
        "quantity": figure.quantity,
        "value": in_unit(result.goal, figure.time_base),
        "unit": unit(figure.time_base, figure.quantity),
        "figure": _figure(figure),
        "fraction": result.fraction,
        "verdict": result.verdict,
    }


def _path(share: PathShare, quantity: str) -> dict[str, Any]:
    return {
        "beam": share.beam,
        "path": share.path,
        "order": share.order,
        "rate": _rate(share.rate[quantity], quantity, share.standard_error[quantity]),
    }


def _place(place: PlaceResult) -> dict[str, Any]:
    quantity = place.quantity
    other = {q for _, q in place.figures} - {quantity}
    return {
        "name": place.name,
        "at": {"value": list(place.at), "unit": "m"},
        "how": place.how,
        "people": place.people,
        "area": place.area,
        "occupancy": place.occupancy,
        "verdict": place.verdict,
        "reasons": list(place.reasons),
        **{base: _figure(place.figures[base, quantity]) for base in TIME_BASES},
        "other_quantities": {
            q: {base: _figure(place.figures[base, q]) for base in TIME_BASES} for q in sorted(other)
        },
        "single_scatter_rate": _rate(place.single_scatter[quantity], quantity),
        "all_scatter_rate": _rate(place.all_scatter[quantity], quantity),
        "goals": [_goal(goal) for goal in place.goals],
        "paths": [_path(share, quantity) for share in place.paths if not share.bound],
        "upper_bounds": [_path(share, quantity) for share in place.paths if share.bound],
        "factors": [
            {
                "beam": f.beam,
                "beam_on": {**{base: {"value": s, "unit": "s"} for base, s in f.seconds.items()}},
                "use_factor": f.use_factor,
                "weeks": f.weeks,
            }
            for f in place.factors
        ],
    }


def assessment_rows(assessment: Assessment) -> list[dict[str, Any]]:
    """One row per place and time base, with its goal where there is one; several goals give several rows."""
    rows = []
    for place in assessment.places:
        stated = {(g.figure.time_base, g.figure.quantity) for g in place.goals}
        figures = [
            (figure, None)
            for (base, quantity), figure in place.figures.items()
            if quantity == place.quantity and (base, quantity) not in stated
        ]
        goals = [(goal.figure, goal) for goal in place.goals]
        order = {base: k for k, base in enumerate(TIME_BASES)}
        for figure, goal in sorted([*figures, *goals], key=lambda pair: order[pair[0].time_base]):
            rows.append(_row(place, figure, goal))
    return rows


def _row(place: PlaceResult, figure: Figure, goal: GoalResult | None) -> dict[str, Any]:
    base = figure.time_base
    return {
        "place": place.name,
        "people": place.people,
        "occupancy": place.occupancy,
        "time_base": base,
        "quantity": figure.quantity,
        "unit": unit(base, figure.quantity),
        "value": in_unit(figure.value, base),
        "standard_error": in_unit(figure.standard_error, base),
        "low": in_unit(figure.low, base),
        "high": in_unit(figure.high, base),
        "goal": in_unit(goal.goal, base) if goal else None,
        "fraction": goal.fraction if goal else None,
        "verdict": goal.verdict if goal else "",
        "place_verdict": place.verdict,
    }
