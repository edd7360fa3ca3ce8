"""Cases worked by hand, the arithmetic in the test. Kind: published constants and closed forms.

Air kerma rate constants: lines of the LNHB evaluation times NIST mu_en/rho of air, recomputed from the package
roentgen (Ir-192: 109.0, Co-60: 305.7 uGy m2/(GBq h), lines from 30 keV up).
"""

from __future__ import annotations

import math

import numpy as np
import pytest

from scatterbay.api import assess
from scatterbay.engine.contributions import Contributions
from scatterbay.exposure.results import ABOVE, Assessment
from scatterbay.scenario import loads
from tests.engine.bays import computed

GAMMA = """
format: 1
title: bare source
room:
  corners: [[0, 0], [10, 0], [10, 8], [0, 8]]
  height: 4 m
  sides: {south: concrete 500 mm, east: concrete 500 mm, north: open, west: concrete 500 mm}
  ceiling: concrete 500 mm
  floor: concrete 500 mm
  storey above: 4.5 m
  storey below: 3.5 m
sources:
  capsule: {sealed source: Ir-192, activity: 100 Ci, on: 2030-01-01, assessed on: 2030-01-01}
beams:
  shot: {source: capsule, at: [5, 4, 1], aim: [5, 8, 1], field: all round, use factor: 1}
workload:
  shot: {beam on: 2 h/week, worst hour: 30 min, worst day: 1 h, weeks: 50}
people:
  crew: {area: controlled, goals: [20 mSv/year]}
places:
  five metres: {at: [5, 9, 1], people: crew, occupancy: 1}
  yard: {at: [5, 14, 1], people: crew, occupancy: 1/4}
"""


def rate(found: Contributions, place: str, path: str, quantity: int = 0) -> float:
    """Rate at a place by one path, all orders, per hour [uGy/h or uSv/h]."""
    rows = [r for r in found.rows if r.place == place and r.path == path]
    return sum(r.drive * float(r.values.mean(axis=0)[quantity]) for r in rows) * 3600e6


def assessed(text: str) -> Assessment:
    return assess(loads(text, "hand-worked"))


def test_bare_source_by_inverse_square() -> None:
    """100 Ci = 3700 GBq of Ir-192: 109.0 x 3700 / 25 = 16132 uGy/h at 5 m, a quarter of it at 10 m."""
    found = computed(loads(GAMMA, "bare"))
    near, far = rate(found, "five metres", "primary"), rate(found, "yard", "primary")
    assert near == pytest.approx(109.0 * 3700.0 / 25.0, rel=0.01)
    assert near / far == pytest.approx(4.0, rel=1e-9)


def test_decay_over_one_half_life() -> None:
    """Ir-192, 73.83 days (LNHB): after 74 days 2^(-74/73.83) = 0.4992 of the activity is left."""
    later = GAMMA.replace("assessed on: 2030-01-01", "assessed on: 2030-03-16")
    ratio = rate(computed(loads(later, "a")), "yard", "primary") / rate(
        computed(loads(GAMMA, "b")), "yard", "primary"
    )
    assert ratio == pytest.approx(2.0 ** (-74.0 / 73.83), rel=1e-4)


def test_time_bases() -> None:
    """Rate R on for 30 min of the worst hour, 1 h of the worst 8, 2 h a week, 50 weeks, occupancy 1/4.

    Hour: R/2. 8 h average: R/8. Week: 2 R/4. Year: 100 R/4. Occupancy must not touch the rate, hour or day.
    """
    place = next(p for p in assessed(GAMMA).places if p.name == "yard")
    r = place.figure("rate").value * 3600.0
    assert place.figure("hour").value == pytest.approx(0.5 * r)
    assert place.figure("day").value * 3600.0 == pytest.approx(r / 8.0)
    assert place.figure("week").value == pytest.approx(2.0 * r / 4.0)
    assert place.figure("year").value == pytest.approx(100.0 * r / 4.0)


def test_an_open_side_is_never_below_and_says_why() -> None:
    place = next(p for p in assessed(GAMMA.replace("100 Ci", "1 MBq")).places if p.name == "yard")
    assert place.goals[0].fraction < 1e-4
    assert place.verdict == "too close to call"
    assert "not fully enclosed" in place.reasons[0]


def test_too_much_is_above_even_in_the_open() -> None:
    assert assessed(GAMMA).worst == ABOVE


FLOORS = """
format: 1
title: leakage to the floors
room:
  corners: [[0, 0], [6, 0], [6, 5], [0, 5]]
  height: 3 m
  sides: {south: concrete 300 mm, east: concrete 300 mm, north: concrete 300 mm, west: concrete 300 mm}
  ceiling: {CEILING}
  floor: {FLOOR}
  storey above: 3.4 m
  storey below: 3.2 m
sources:
  set: {x-ray tube: 150 kV, current: 5 mA, filtration: aluminium 3 mm, leakage: 1 mGy/h at 1 m}
beams:
  shot: {source: set, at: [3, 2.5, 1.2], aim: [6, 2.5, 1.2], field: cone 10 deg}
workload:
  shot: {beam on: 1 h/week}
people:
  others: {area: public, goals: [0.02 mGy/week]}
places:
  over: {above: [3, 2.5], people: others, occupancy: 1}
  under: {below: [3, 2.5], people: others, occupancy: 1}
"""


def floors(ceiling: str, floor: str) -> Contributions:
    return computed(loads(FLOORS.replace("{CEILING}", ceiling).replace("{FLOOR}", floor), "floors"))


def test_leakage_to_the_floors_above_and_below_through_nothing() -> None:
    """1 mGy/h at 1 m. Above: 3.4 + 0.5 - 1.2 = 2.7 m up; below: 3.2 - 1.7 + 1.2 = 2.7 m down: 137.2 uGy/h each.

    The floor must be of something: 1 mm of air takes and adds less than 1e-4.
    """
    found = floors("open", "air 1 mm")
    for place in ("over", "under"):
        assert rate(found, place, "leakage") == pytest.approx(1000.0 / 2.7**2, rel=1e-4)


def test_leakage_through_equal_floors_is_equal_up_and_down() -> None:
    found = floors("concrete 150 mm", "concrete 150 mm")
    over, under = rate(found, "over", "leakage"), rate(found, "under", "leakage")
    assert over == pytest.approx(under, rel=1e-9)
    assert over < 0.2 * 1000.0 / 2.7**2


def test_pencil_beam_unshielded_by_inverse_square() -> None:
    """A measured output of 6 mGy m2/(mA min) at 5 mA is 1.8 Gy m2/h: 1.8e6 / 3.35^2 = 1.60e5 uGy/h at 3.35 m."""
    text = (
        FLOORS.replace("{CEILING}", "open")
        .replace("{FLOOR}", "air 1 mm")
        .replace("east: concrete 300 mm", "east: open")
    )
    text = text.replace("leakage: 1 mGy/h at 1 m", "output: 6 mGy m2/(mA min)").replace(
        "cone 10 deg", "cone 1 deg"
    )
    text += "  in line: {at: [6.35, 2.5, 1.2], people: others, occupancy: 1}\n"
    found = computed(loads(text, "pencil"))
    assert rate(found, "in line", "primary") == pytest.approx(1.8e6 / 3.35**2, rel=1e-6)


def test_use_factor_enters_week_and_year_of_the_primary_only() -> None:
    full = GAMMA
    tenth = GAMMA.replace("use factor: 1", "use factor: 0.1")
    for name in ("rate", "hour", "day"):
        values = [
            next(p for p in assessed(t).places if p.name == "yard").figure(name).value for t in (full, tenth)
        ]
        assert values[0] == pytest.approx(values[1])
    for name in ("week", "year"):
        values = [
            next(p for p in assessed(t).places if p.name == "yard").figure(name).value for t in (full, tenth)
        ]
        assert values[1] / values[0] == pytest.approx(0.1)


def test_half_lives_are_the_evaluations() -> None:
    """Co-60, 5.2711 a (LNHB): one year leaves 2^(-1/5.2711) of it, whatever the day count of the year."""
    text = GAMMA.replace("Ir-192", "Co-60").replace("assessed on: 2030-01-01", "assessed on: 2031-01-01")
    now, later = computed(loads(GAMMA.replace("Ir-192", "Co-60"), "a")), computed(loads(text, "b"))
    ratio = rate(later, "yard", "primary") / rate(now, "yard", "primary")
    assert ratio == pytest.approx(2.0 ** (-365.0 / (5.2711 * 365.2422)), rel=2e-4)
    assert math.isclose(ratio, 0.8768, abs_tol=5e-4)


def test_h_star_is_taken_after_the_barrier_not_before() -> None:
    """Behind lead the spectrum is harder: H*(10) per kerma differs from the bare beam's by more than 10 %."""
    found = floors("lead 1 mm", "air 1 mm")
    behind = rate(found, "over", "leakage", 1) / rate(found, "over", "leakage", 0)
    bare = rate(found, "under", "leakage", 1) / rate(found, "under", "leakage", 0)
    assert np.isfinite(behind)
    assert abs(behind / bare - 1.0) > 0.001
