"""A sealed source stored, on its way, exposed through a collimator, stuck. Kind: hand-worked cases, closed forms.

Air kerma rate constant of Ir-192: 109.0 uGy m2/(GBq h), lines from 30 keV up (LNHB lines times NIST mu_en/rho of air,
recomputed from the package roentgen).
"""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np
import pytest

from scatterbay.api import assess
from scatterbay.engine.contributions import COLLIMATOR, PRIMARY
from scatterbay.engine.looking import STORED, STUCK, TRAVEL
from scatterbay.errors import OutOfRangeError
from scatterbay.exposure.results import Assessment, PlaceResult
from scatterbay.physics import dose
from scatterbay.physics.nuclide import mean_over_cycle
from scatterbay.scenario import loads
from scatterbay.scenario.parts import (
    Collimator,
    Container,
    Point,
    Scenario,
    SealedSource,
    Stuck,
    Travel,
    Workload,
)
from scatterbay.units import read
from tests.engine.bays import computed

TEXT = """
format: 1
title: gamma cell
room:
  corners: [[0, 0], [12, 0], [12, 6], [0, 6]]
  height: 4 m
  sides: {south: air 1 mm, east: air 1 mm, north: air 1 mm, west: air 1 mm}
  ceiling: air 1 mm
  floor: air 1 mm
sources:
  capsule: {sealed source: Ir-192, activity: 1000 GBq}
beams:
  shot: {source: capsule, at: [10, 3, 1], aim: [10, 6, 1], field: cone 30 deg}
workload:
  shot: {beam on: 2 h/week, worst hour: 10 min, worst day: 30 min, weeks: 50}
people:
  crew: {area: controlled, goals: [20 mSv/year]}
places:
  crank: {at: [-1, 3, 1], people: crew, occupancy: 1/2}
  ahead: {at: [10, 9, 1], people: crew, occupancy: 1}
  beside: {at: [13, 3, 1], people: crew, occupancy: 1}
"""
GAMMA = 109.0
"""[uGy m2/(GBq h)]"""
GBQ = 1000.0
CYCLES = Workload("shot", 7200.0, 600.0, 1800.0, 50.0, cycles=(24.0, 2.0, 6.0))


def cell(**changes: object) -> Scenario:
    """The cell, with changes to its source and its workload in cycles."""
    scenario = loads(TEXT, "cell")
    (source,) = scenario.sources
    assert isinstance(source, SealedSource)
    return replace(scenario, sources=(replace(source, **changes),), workloads=(CYCLES,))  # type: ignore[arg-type]


def container(at: Point, hours: float) -> Container:
    return Container(
        at, read("20 uSv/h", "ambient dose equivalent rate"), "tungsten", hours * 3600.0, "class P"
    )


def place(found: Assessment, name: str) -> PlaceResult:
    return next(p for p in found.places if p.name == name)


@pytest.mark.parametrize("hours", [40.0, 168.0])
def test_a_stored_source_week(hours: float) -> None:
    """20 uSv/h at 1 m is 5 uSv/h at 2 m, and at occupancy 1/2 over 40 h 100 uSv, over 168 h 420 uSv a week.

    The worst hour counts a whole hour of it, the worst 8 h all of them; neither knows the occupancy.
    """
    before, after = assess(cell()), assess(cell(container=container((1.0, 3.0, 1.0), hours)))
    here, there = place(before, "crank"), place(after, "crank")
    more = {
        base: 1e6 * (there.figures[base, dose.AMBIENT].value - here.figures[base, dose.AMBIENT].value)
        for base in ("hour", "day", "week")
    }
    assert more["week"] == pytest.approx(5.0 * hours * 0.5, rel=1e-3)
    assert more["hour"] == pytest.approx(5.0, rel=1e-3)
    assert more["day"] * 3600.0 == pytest.approx(5.0, rel=1e-3)


def test_a_source_is_not_stored_while_it_is_exposed() -> None:
    """The highest rate is the greater of the two, not their sum."""
    stored = assess(cell(container=container((1.0, 3.0, 1.0), 168.0)))
    crank = place(stored, "crank")
    exposed = sum(s.rate[dose.AMBIENT] for s in crank.paths if s.state == "beam" and not s.bound)
    kept = next(s.rate[dose.AMBIENT] for s in crank.paths if s.state == STORED)
    assert crank.figures["rate", dose.AMBIENT].value == pytest.approx(max(exposed, kept))


def test_travel_straight_past_the_operator_in_closed_form() -> None:
    """In line with the operator from 2 m to 9 m at 0.7 m/s, out and back: 2 (Gamma A / v) (1/d1 - 1/d2).

    2 x (109.0 uGy/h x 1000 / (0.7 x 3600 m/h)) x (1/2 - 1/9) = 33.6 uGy.
    """
    path = ((1.0, 3.0, 1.0), (4.0, 3.0, 1.0), (8.0, 3.0, 1.0))
    found = place(assess(cell(travel=Travel(path, read("0.7 m/s", "speed")))), "crank")
    closed = 2.0 * GAMMA * GBQ / (0.7 * 3600.0) * (1.0 / 2.0 - 1.0 / 9.0)
    (cycle,) = found.cycles
    assert 1e6 * cycle.passes[dose.AIR_KERMA] == pytest.approx(closed, rel=0.02)


def test_travel_past_the_side_in_closed_form() -> None:
    """Past a place h to the side of the way: (Gamma A / (v h)) (atan(b/h) - atan(a/h)) a pass."""
    path = ((1.0, 3.0, 1.0), (10.0, 3.0, 1.0))
    scenario = cell(travel=Travel(path, read("1 m/s", "speed")))
    aside = replace(scenario.places[0], at=(5.0, 6.5, 1.0))
    found = assess(replace(scenario, places=(aside,))).places[0]
    closed = GAMMA * GBQ / (3600.0 * 3.5) * (math.atan(5.0 / 3.5) + math.atan(4.0 / 3.5))
    assert 1e6 * found.cycles[0].passes[dose.AIR_KERMA] == pytest.approx(2.0 * closed, rel=0.01)


def test_cycles_enter_each_time_base_twice_a_cycle() -> None:
    """24 cycles a week, 2 in the worst hour, 6 in the worst 8 h: 48, 4 and 12 passes."""
    path = ((1.0, 3.0, 1.0), (8.0, 3.0, 1.0))
    still, moving = assess(cell()), assess(cell(travel=Travel(path, read("0.7 m/s", "speed"))))
    passes = place(moving, "crank").cycles[0].passes[dose.AMBIENT]
    for base, cycles, scale in (
        ("hour", 2.0, 1.0),
        ("day", 6.0, 8 * 3600.0),
        ("week", 24.0, 2.0),
        ("year", 1200.0, 2.0),
    ):
        key = base, dose.AMBIENT
        more = place(moving, "crank").figures[key].value - place(still, "crank").figures[key].value
        assert more * scale == pytest.approx(cycles * passes, rel=1e-6), base


def test_a_short_pass_is_averaged_over_a_minute() -> None:
    """7 m at 0.7 m/s take 10 s: the instantaneous rate gets a sixtieth of the dose of the pass a second."""
    path = ((1.0, 3.0, 1.0), (8.0, 3.0, 1.0))
    still, moving = assess(cell()), assess(cell(travel=Travel(path, read("0.7 m/s", "speed"))))
    key = "rate", dose.AMBIENT
    more = place(moving, "crank").figures[key].value - place(still, "crank").figures[key].value
    assert more == pytest.approx(0.5 * place(moving, "crank").cycles[0].passes[dose.AMBIENT] / 60.0, rel=1e-6)


def test_a_path_over_a_place_is_refused() -> None:
    path = ((-3.0, 3.0, 1.0), (8.0, 3.0, 1.0))
    with pytest.raises(OutOfRangeError, match="within 50 mm"):
        computed(cell(travel=Travel(path, read("0.7 m/s", "speed"))))


def test_exchange_cycle() -> None:
    """Loaded every 73.83 days, the half-life (LNHB): mean 0.5 / ln 2 = 0.7213 of the loading, in the year only."""
    always, cycled = assess(cell()), assess(cell(exchange_days=73.83))
    for base, ratio in (("rate", 1.0), ("hour", 1.0), ("week", 1.0), ("year", 0.5 / math.log(2.0))):
        key = base, dose.AMBIENT
        found = place(cycled, "ahead").figures[key].value / place(always, "ahead").figures[key].value
        assert found == pytest.approx(ratio, rel=1e-4), base


def test_mean_over_a_cycle_is_the_mean_of_the_decay() -> None:
    """Independent route: the mean of 2^(-t / T) over a fine mesh; no time at all leaves all of it."""
    times = (np.arange(100_000) + 0.5) / 100_000 * 90.0
    assert mean_over_cycle(73.8, 90.0) == pytest.approx(float((2.0 ** (-times / 73.8)).mean()), rel=1e-9)
    assert mean_over_cycle(73.8, 1e-6) == pytest.approx(1.0)


def test_survey_on_a_later_day() -> None:
    """74 days after it was stated 2^(-74/73.83) = 0.4992 is left: the predicted reading is that of the design rate."""
    found = assess(cell(activity_date="2030-01-01", survey_date="2030-03-16"))
    ahead = place(found, "ahead")
    assert ahead.survey_rate is not None
    design = ahead.figures["rate", dose.AMBIENT].value
    assert ahead.survey_rate[dose.AMBIENT] == pytest.approx(design * 2.0 ** (-74.0 / 73.83), rel=1e-4)


def test_a_users_own_output_replaces_the_tables() -> None:
    """130 uGy m2/(GBq h) stated where the table has 109; 65 mGy/h at 1 m for 1000 GBq stated where it has 109."""
    table = place(assess(cell()), "ahead").figures["rate", dose.AIR_KERMA].value
    own = replace(read("130 uGy", "air kerma"), value=130e-6 / 3600.0 / 1e9, kind="air kerma rate constant")
    rate = read("65 mGy/h", "air kerma rate")
    for changes, ratio in (({"rate_constant": own}, 130.0 / 109.0), ({"certificate": rate}, 65.0 / 109.0)):
        found = assess(cell(**changes))
        assert place(found, "ahead").figures["rate", dose.AIR_KERMA].value / table == pytest.approx(
            ratio, rel=0.005
        )
        assert any(a.topic == "source output" for a in found.assumptions)


@pytest.mark.parametrize(
    ("collimator", "low", "high"),
    [
        (Collimator("tungsten", transmission=1.0 / 200.0), 1.0 / 200.0, 1.0 / 200.0),
        # tenth-value layer for Ir-192: 10 to 12 mm of alloy of 17 to 18 g/cm3 (common practice), 9 to 11 of the metal
        (Collimator("tungsten", read("22 mm", "length")), 10.0 ** (-22.0 / 9.0), 10.0 ** (-22.0 / 11.0)),
    ],
)
def test_a_collimator_is_everywhere_but_in_the_port(collimator: Collimator, low: float, high: float) -> None:
    """Beside the port its transmission of the bare source's kerma, in the port nothing on top of the beam."""
    scenario = cell()
    scenario = replace(scenario, beams=(replace(scenario.beams[0], collimator=collimator),))
    rows = {(r.place, r.path): 3600e6 * r.drive * r.values.mean(axis=0)[0] for r in computed(scenario).rows}
    bare = GAMMA * GBQ / 9.0
    assert 0.985 * low <= rows["beside", COLLIMATOR] / bare <= 1.015 * high
    assert rows["ahead", COLLIMATOR] == 0.0
    assert rows["ahead", PRIMARY] == pytest.approx(GAMMA * GBQ / 36.0, rel=0.01)
    assert rows["beside", PRIMARY] == pytest.approx(0.0, abs=1e-3 * bare)


def test_stuck_is_in_no_other_figure() -> None:
    """Stuck for half an hour 4 m from the operator: 109.0 x 1000 / 16 / 2 uGy."""
    before, after = assess(cell()), assess(cell(stuck=Stuck((3.0, 3.0, 1.0), read("30 min", "time"))))
    crank = place(after, "crank")
    assert 1e6 * crank.stuck[0].dose[dose.AIR_KERMA] == pytest.approx(GAMMA * GBQ / 16.0 / 2.0, rel=0.01)
    for key, figure in place(before, "crank").figures.items():
        assert crank.figures[key].value == pytest.approx(figure.value, rel=1e-12)
    assert {s.state for s in crank.paths} == {"beam", STUCK}


def test_walls_stand_in_the_way_of_every_state() -> None:
    """Behind 100 mm of lead instead of air everything from a stored or travelling source is far less."""
    path = ((1.0, 3.0, 1.0), (8.0, 3.0, 1.0))
    changes = {
        "container": container((1.0, 3.0, 1.0), 168.0),
        "travel": Travel(path, read("0.7 m/s", "speed")),
    }
    thin = cell(**changes)
    thick_sides = loads(TEXT.replace("west: air 1 mm", "west: lead 100 mm"), "cell").room
    thick = replace(thin, room=thick_sides)
    values = [
        {(r.state, r.path): float(r.values.mean(axis=0)[0]) for r in computed(s).rows if r.place == "crank"}
        for s in (thin, thick)
    ]
    for key in ((STORED, STORED), (TRAVEL, TRAVEL)):
        assert values[1][key] < 1e-3 * values[0][key]
