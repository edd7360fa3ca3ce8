"""The assessment of a scenario from its contributions."""

from __future__ import annotations

from collections.abc import Mapping

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.contributions import PLANE_BOUND, SCATTER, Contribution, Contributions
from scatterbay.engine.scene import Scene, ScenePlace
from scatterbay.exposure.results import (
    ABOVE,
    BELOW,
    CLOSE,
    NO_GOAL,
    TIME_BASES,
    Assessment,
    Factors,
    Figure,
    GoalResult,
    PathShare,
    PlaceResult,
)
from scatterbay.exposure.timebases import DAY, HOUR, instantaneous, together, weekly, within
from scatterbay.physics import dose
from scatterbay.scenario.parts import Place, Scenario
from scatterbay.tables.allowances import allowances

Array = NDArray[np.float64]
Rates = dict[str, dict[str, Array]]
"""By path, then beam: (replicates, q) while the beam is on."""

NOT_ENCLOSED = (
    "not fully enclosed from the sources by barriers: scatter from walls, floor and ceiling is not computed yet, "
    "so no figure here can be called below a goal"
)


def assess(scenario: Scenario, scene: Scene, found: Contributions) -> Assessment:
    """Figures, goals and verdicts for every place."""
    places = tuple(
        _place(scenario, place, spot, [row for row in found.rows if row.place == place.name], found)
        for place, spot in zip(scenario.places, scene.places, strict=True)
    )
    return Assessment(
        scenario.title, scenario.drawing, scenario.path, scenario.sha256, scenario.options.seed, places,
        (*scenario.assumptions, *scene.assumptions),
    )  # fmt: skip


def _place(
    scenario: Scenario, place: Place, spot: ScenePlace, rows: list[Contribution], found: Contributions
) -> PlaceResult:
    rates = _rates(scenario, rows, found.drives)
    figures = _figures(scenario, place, spot.behind, rates)
    people = next(group for group in scenario.people if group.name == place.people)
    goals = tuple(
        GoalResult(goal.text, figure := figures[goal.time_base, goal.quantity], goal.value,
                   _verdict(figure, goal.value, spot.enclosed))
        for goal in people.goals
    )  # fmt: skip
    order = (ABOVE, CLOSE, BELOW)
    verdict = min((g.verdict for g in goals), key=order.index, default=NO_GOAL)
    quantities = {goal.quantity for goal in people.goals}
    shares = _shares(rows, found.drives)
    scatter = {
        q: (
            sum(s.rate[q] for s in shares if s.path == SCATTER and s.order == 1),
            sum(s.rate[q] for s in shares if s.path == SCATTER),
        )
        for q in dose.QUANTITIES
    }
    return PlaceResult(
        name=place.name,
        at=place.at,
        how=place.how,
        people=place.people,
        area=people.area,
        occupancy=place.occupancy,
        quantity=dose.AIR_KERMA if quantities == {dose.AIR_KERMA} else dose.AMBIENT,
        figures=figures,
        goals=goals,
        verdict=verdict,
        reasons=() if spot.enclosed else (NOT_ENCLOSED,),
        paths=shares,
        single_scatter={q: pair[0] for q, pair in scatter.items()},
        all_scatter={q: pair[1] for q, pair in scatter.items()},
        factors=_factors(scenario),
        behind=spot.behind,
    )


def _rates(scenario: Scenario, rows: list[Contribution], drives: Mapping[str, float]) -> Rates:
    """Rates by path and beam; zero where a beam has no such path."""
    names = [beam.name for beam in scenario.beams]
    shape = next((row.values.shape for row in rows), (1, len(dose.QUANTITIES)))
    rates: Rates = {
        path: {name: np.zeros(shape) for name in names} for path in ("primary", "scatter", "leakage")
    }
    for row in rows:
        if row.path != PLANE_BOUND:
            rates[row.path][row.beam] = rates[row.path][row.beam] + drives[row.beam] * row.values
    return rates


def _figures(scenario: Scenario, place: Place, behind: str, rates: Rates) -> dict[tuple[str, str], Figure]:
    """Each figure three times: as it is, and at both ends of the model allowance."""
    variants = []
    for end in (0, -1, 1):
        scaled: Rates = {}
        for path, beams in rates.items():
            allowed = allowances()[path, behind]
            factor = {0: 1.0, -1: 1.0 - allowed.low, 1: 1.0 + allowed.high}[end]
            scaled[path] = {name: factor * value for name, value in beams.items()}
        variants.append(_time_bases(scenario, place.occupancy, scaled))
    figures = {}
    for base in TIME_BASES:
        for k, quantity in enumerate(dose.QUANTITIES):
            middle, low, high = (v[base][:, k] for v in variants)
            count = len(middle)
            error = float(middle.std(ddof=1) / np.sqrt(count)) if count > 1 else 0.0
            mean = float(middle.mean())
            figures[base, quantity] = Figure(
                base, quantity, mean, error,
                max(0.0, float(low.mean()) - 2.0 * error), float(high.mean()) + 2.0 * error,
            )  # fmt: skip
    return figures


def _time_bases(scenario: Scenario, occupancy: float, rates: Rates) -> dict[str, Array]:
    """Dose or rate over each time base, (replicates, q)."""
    loads = {load.beam: load for load in scenario.workloads}
    names = [beam.name for beam in scenario.beams]
    primary = rates["primary"]
    other = {name: rates["scatter"][name] + rates["leakage"][name] for name in names}
    whole = {name: primary[name] + other[name] for name in names}
    sets = together(scenario)
    hours = {name: loads[name].seconds_in_worst_hour for name in names}
    days = {name: loads[name].seconds_in_worst_day for name in names}
    week, year = weekly(primary, other, scenario.beams, loads)
    return {
        "rate": instantaneous(whole, sets),
        "hour": within(whole, hours, HOUR, sets),
        "day": within(whole, days, DAY, sets) / DAY,
        "week": occupancy * week,
        "year": occupancy * year,
    }


def _verdict(figure: Figure, goal: float, enclosed: bool) -> str:
    if figure.low > goal:
        return ABOVE
    if figure.high < goal and enclosed:
        return BELOW
    return CLOSE


def _shares(rows: list[Contribution], drives: Mapping[str, float]) -> tuple[PathShare, ...]:
    shares = []
    for row in rows:
        rate = drives[row.beam] * row.values
        error = rate.std(axis=0, ddof=1) / np.sqrt(len(rate))
        bound = row.path == PLANE_BOUND
        shares.append(
            PathShare(
                row.beam,
                row.path,
                row.order,
                dict(zip(dose.QUANTITIES, map(float, rate.mean(axis=0)), strict=True)),
                dict(zip(dose.QUANTITIES, map(float, error), strict=True)),
                bound,
            )
        )
    main = dose.AMBIENT
    return tuple(sorted(shares, key=lambda s: (s.bound, -s.rate[main])))


def _factors(scenario: Scenario) -> tuple[Factors, ...]:
    uses = {beam.name: beam.use_factor for beam in scenario.beams}
    return tuple(
        Factors(
            load.beam,
            {
                "hour": load.seconds_in_worst_hour,
                "day": load.seconds_in_worst_day,
                "week": load.seconds_per_week,
            },
            uses[load.beam],
            load.weeks_per_year,
        )
        for load in scenario.workloads
    )
