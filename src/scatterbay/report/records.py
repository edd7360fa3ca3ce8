"""An assessment as nested records for JSON, and as flat rows for CSV and pandas."""

from __future__ import annotations

import math
from typing import Any

from scatterbay import __version__
from scatterbay.engine.looking import TRAVEL
from scatterbay.exposure.results import (
    TIME_BASES,
    Assessment,
    Capacity,
    Figure,
    GoalResult,
    PathShare,
    PlaceResult,
)
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
        "capacities": [_capacity(one) for one in assessment.capacities],
        "left_out_of_capacity": list(assessment.left_out_of_capacity),
        "rule_sets": list(assessment.rule_sets),
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


def _dose(value: float, quantity: str) -> dict[str, Any]:
    return {"value": in_unit(value, "hour"), "unit": unit("hour", quantity), "quantity": quantity}


def _path(share: PathShare, quantity: str) -> dict[str, Any]:
    record: dict[str, Any] = {
        "beam": share.beam, "state": share.state, "path": share.path, "order": share.order, "behind": share.behind
    }  # fmt: skip
    if share.week:
        record["week_at_full_occupancy"] = {
            "value": in_unit(share.week[quantity], "week"), "unit": unit("week", quantity), "quantity": quantity
        }  # fmt: skip
    if share.state == TRAVEL and not share.bound:
        return {**record, "dose_of_a_pass": _dose(share.rate[quantity], quantity)}
    return {**record, "rate": _rate(share.rate[quantity], quantity, share.standard_error[quantity])}


def _capacity(one: Capacity) -> dict[str, Any]:
    limited = math.isfinite(one.factor)
    return {
        "beam": one.beam or "all",
        "times_stated": one.factor if limited else None,
        "greatest": {"value": one.factor * one.stated, "unit": one.unit} if limited and one.unit else None,
        "limited_by": {"place": one.place, "goal": one.goal} if limited else None,
    }


def _states(place: PlaceResult, quantity: str) -> dict[str, Any]:
    """Overrides, exposure cycles, a source that is stuck, the day of a survey."""
    return {
        "overridden": [
            {
                "time_base": one.figure.time_base,
                "computed": _figure(one.computed),
                "used": _figure(one.figure),
                "by": one.by,
                "why": one.why,
            }
            for one in place.overridden
        ],
        "cycles": [
            {
                "beam": one.beam,
                "exposure": {"value": one.seconds, "unit": "s"},
                "exposed": _dose(one.exposed[quantity], quantity),
                "out_and_back": _dose(one.passes[quantity], quantity),
            }
            for one in place.cycles
        ],
        "stuck": [
            {
                "source": one.source,
                "time": {"value": one.seconds, "unit": "s"},
                "dose": _dose(one.dose[quantity], quantity),
            }
            for one in place.stuck
        ],
        "survey_rate": None if place.survey_rate is None else _rate(place.survey_rate[quantity], quantity),
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
        **_states(place, quantity),
        "factors": [
            {
                "beam": f.beam,
                "beam_on": {**{base: {"value": s, "unit": "s"} for base, s in f.seconds.items()}},
                "use_factor": f.use_factor,
                "weeks": f.weeks,
                "cycles": None
                if f.cycles is None
                else dict(zip(("week", "hour", "day"), f.cycles, strict=True)),
                "annual_mean": f.annual,
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
