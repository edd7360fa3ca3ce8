"""The assessment of a scenario from its contributions."""

from __future__ import annotations

from collections.abc import Callable, Sequence

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.contributions import PRIMARY, SCATTER, Contribution, Contributions
from scatterbay.engine.looking import STUCK, ScenePlace
from scatterbay.engine.scene import Scene
from scatterbay.exposure.capacity import Judged, capacities
from scatterbay.exposure.cycles import cycle_doses, stuck_doses, survey_rate
from scatterbay.exposure.rates import Rates, by_quantity, rates_of
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
    Overridden,
    PathShare,
    PlaceResult,
)
from scatterbay.exposure.timebases import Timing, time_bases, timing_of, weekly_amount
from scatterbay.physics import dose
from scatterbay.scenario.parts import Place, Scenario
from scatterbay.tables.allowances import allowances

Array = NDArray[np.float64]

NOT_ENCLOSED = (
    "not fully enclosed from the sources by barriers: scatter from walls, floor and ceiling is not computed yet, "
    "so no figure here can be called below a goal"
)
_WORST_FIRST = ("open", "lining", "wall")


def assess(scenario: Scenario, scene: Scene, found: Contributions) -> Assessment:
    """Figures, goals and verdicts for every place."""
    timing = timing_of(scenario, scene.workloads, {name: one.annual for name, one in scene.outputs.items()})
    places, judged = [], []
    for place, spot in zip(scenario.places, scene.places, strict=True):
        rows = [row for row in found.rows if row.place == place.name]
        factors = _Factors(scenario, scene, spot)
        result = _place(scenario, scene, place, spot, rows, timing, factors)
        places.append(result)
        if spot.enclosed:
            high = rates_of(rows, factors.at(1), _shape(rows))
            judged.append(Judged(place.name, place.occupancy, high, result.goals))
    return Assessment(
        scenario.title, scenario.drawing, scenario.path, scenario.sha256, scenario.options.seed, tuple(places),
        (*scenario.assumptions, *scene.assumptions), capacities(timing, judged, scenario.sources),
        tuple(p.name for p in places if p.reasons and p.goals),
        tuple(dict.fromkeys(goal.source for group in scenario.people for goal in group.goals if goal.source)),
    )  # fmt: skip


class _Factors:
    """What every row of a place is multiplied by at the ends of its band: model allowance and output's tolerance."""

    def __init__(self, scenario: Scenario, scene: Scene, spot: ScenePlace) -> None:
        self._source_of = {beam.name: beam.source for beam in scenario.beams}
        self._outputs, self._behind = scene.outputs, spot.behind

    def behind(self, row: Contribution) -> str:
        """What lies between the place and what a row is from."""
        return self._behind[row.beam, row.state]

    def at(self, end: int) -> Callable[[Contribution], float]:
        """The factor at the low end (-1), the middle (0) or the high end (1)."""

        def factor(row: Contribution) -> float:
            if end == 0 or (row.bound and row.path.startswith(PRIMARY)):
                return 1.0
            allowed = allowances()[PRIMARY if row.state == STUCK else _path(row), self.behind(row)]
            source = self._source_of.get(row.beam, row.beam)
            spread = self._outputs[source].tolerance
            return (1.0 - allowed.low) * (1.0 - spread) if end < 0 else (1.0 + allowed.high) * (1.0 + spread)

        return factor


def _path(row: Contribution) -> str:
    """The path whose allowance a row takes."""
    return row.state if row.bound else row.path


def _shape(rows: Sequence[Contribution]) -> tuple[int, ...]:
    return next((row.values.shape for row in rows), (1, len(dose.QUANTITIES)))


def _place(
    scenario: Scenario,
    scene: Scene,
    place: Place,
    spot: ScenePlace,
    rows: Sequence[Contribution],
    timing: Timing,
    factors: _Factors,
) -> PlaceResult:
    middle, low, high = (rates_of(rows, factors.at(end), _shape(rows)) for end in (0, -1, 1))
    computed = _figures(timing, place, middle, low, high)
    replaced = _overridden(scenario, place, computed)
    figures = computed | {(one.figure.time_base, one.figure.quantity): one.figure for one in replaced}
    people = next(group for group in scenario.people if group.name == place.people)
    goals = tuple(
        GoalResult(goal.text, figure := figures[goal.time_base, goal.quantity], goal.value,
                   _verdict(figure, goal.value, spot.enclosed))
        for goal in people.goals
    )  # fmt: skip
    order = (ABOVE, CLOSE, BELOW)
    verdict = min((g.verdict for g in goals), key=order.index, default=NO_GOAL)
    quantities = {goal.quantity for goal in people.goals}
    shares = _shares(rows, factors, timing)
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
        area=place.area or people.area,
        occupancy=place.occupancy,
        quantity=dose.AIR_KERMA if quantities == {dose.AIR_KERMA} else dose.AMBIENT,
        figures=figures,
        goals=goals,
        verdict=verdict,
        reasons=() if spot.enclosed else (NOT_ENCLOSED,),
        paths=shares,
        single_scatter={q: pair[0] for q, pair in scatter.items()},
        all_scatter={q: pair[1] for q, pair in scatter.items()},
        factors=_multiplied(timing),
        behind=min(spot.behind.values(), key=_WORST_FIRST.index),
        cycles=cycle_doses(timing, middle),
        stuck=stuck_doses(scene, rows),
        overridden=replaced,
        survey_rate=survey_rate(scene, timing, middle),
    )


def _overridden(
    scenario: Scenario, place: Place, computed: dict[tuple[str, str], Figure]
) -> tuple[Overridden, ...]:
    """A reviewer's own figures for a place, which have no band of ours."""
    found = []
    for one in scenario.overrides:
        if one.place == place.name:
            base, quantity, value = one.figure.time_base, one.figure.quantity, one.figure.value
            mine = Figure(base, quantity, value, 0.0, value, value)
            found.append(Overridden(computed[base, quantity], mine, one.by, one.why))
    return tuple(found)


def _figures(
    timing: Timing, place: Place, middle: Rates, low: Rates, high: Rates
) -> dict[tuple[str, str], Figure]:
    """Each figure as it is, and at both ends of its band."""
    variants = [time_bases(timing, place.occupancy, rates) for rates in (middle, low, high)]
    figures = {}
    for base in TIME_BASES:
        for k, quantity in enumerate(dose.QUANTITIES):
            values, lower, upper = (v[base][:, k] for v in variants)
            count = len(values)
            error = float(values.std(ddof=1) / np.sqrt(count)) if count > 1 else 0.0
            figures[base, quantity] = Figure(
                base, quantity, float(values.mean()), error,
                max(0.0, float(lower.mean()) - 2.0 * error), float(upper.mean()) + 2.0 * error,
            )  # fmt: skip
    return figures


def _verdict(figure: Figure, goal: float, enclosed: bool) -> str:
    if figure.low > goal:
        return ABOVE
    if figure.high < goal and enclosed:
        return BELOW
    return CLOSE


def _shares(rows: Sequence[Contribution], factors: _Factors, timing: Timing) -> tuple[PathShare, ...]:
    shares = []
    for row in rows:
        seconds = weekly_amount(timing, row)
        rate = row.drive * row.values
        error = rate.std(axis=0, ddof=1) / np.sqrt(len(rate))
        shares.append(
            PathShare(
                row.beam,
                row.path,
                row.order,
                by_quantity(rate),
                dict(zip(dose.QUANTITIES, map(float, error), strict=True)),
                row.bound,
                row.state,
                factors.behind(row),
                {} if seconds is None else by_quantity(seconds * rate),
            )
        )
    main = dose.AMBIENT
    return tuple(sorted(shares, key=lambda s: (s.bound, -s.week.get(main, 0.0), -s.rate[main])))


def _multiplied(timing: Timing) -> tuple[Factors, ...]:
    uses = {beam.name: beam.use_factor for beam in timing.beams}
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
            load.cycles,
            timing.annual.get(timing.source_of[load.beam], 1.0),
        )
        for load in timing.loads.values()
    )
