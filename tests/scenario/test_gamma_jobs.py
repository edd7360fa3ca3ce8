"""Sealed sources stored, travelling, stuck, collimated: what the file gives, and what is refused. Kind: hand-worked."""

from __future__ import annotations

import math

import pytest

from scatterbay.scenario import loads
from scatterbay.scenario.parts import Scenario, SealedSource
from tests.scenario.edits import refusal

TEXT = """
format: 1
title: gamma job
room:
  corners: [[0, 0], [9, 0], [9, 6], [0, 6]]
  height: 4 m
  sides: {south: concrete 500 mm, east: concrete 500 mm, north: concrete 500 mm, west: concrete 500 mm}
  ceiling: concrete 300 mm
  floor: on the ground
sources:
  capsule:
    sealed source: Ir-192
    activity: 3.7 TBq
    on: 2026-03-02
    survey on: 2026-04-20
    exchanged every: 90 d
    rate constant: 0.11 mGy m2/(GBq h)
    container: {at: [1, 1, 0.3], class: M, housing: tungsten}
    travel: {path: [[1, 1, 0.3], [5, 3, 1.3]], speed: 0.6 m/s}
    stuck: {at: [3, 2, 1], for: 20 min}
beams:
  shot: {source: capsule, at: [5, 3, 1.3], aim: down, field: cone 60 deg, collimator: "tungsten alloy, 1/100"}
workload:
  shot: {cycles: 60/week, exposure: 4 min, worst hour: 5 cycles, worst day: 20 cycles, weeks: 46}
people:
  crew: {area: controlled, goals: [6 mSv/year]}
places:
  crank: {at: [-3, 1, 1.2], people: crew}
"""


def source(scenario: Scenario) -> SealedSource:
    (found,) = scenario.sources
    assert isinstance(found, SealedSource)
    return found


def changed(old: str, new: str) -> str:
    assert TEXT.count(old) == 1
    return TEXT.replace(old, new)


def test_a_gamma_job_in_base_units() -> None:
    scenario = loads(TEXT, "job")
    found = source(scenario)
    assert found.exchange_days == pytest.approx(90.0)
    assert found.survey_date == "2026-04-20"
    assert found.rate_constant is not None
    assert found.rate_constant.value == pytest.approx(0.11e-3 / 1e9 / 3600.0)
    assert found.travel is not None
    assert found.travel.speed.value == pytest.approx(0.6)
    assert found.travel.path == ((1.0, 1.0, 0.3), (5.0, 3.0, 1.3))
    assert found.stuck is not None
    assert found.stuck.duration.value == pytest.approx(1200.0)
    (load,) = scenario.workloads
    assert (load.seconds_per_week, load.seconds_in_worst_hour, load.seconds_in_worst_day) == pytest.approx(
        (14400.0, 1200.0, 4800.0)
    )
    assert load.cycles == pytest.approx((60.0, 5.0, 20.0))
    (beam,) = scenario.beams
    assert beam.collimator is not None
    assert beam.collimator.material == "tungsten alloy"
    assert beam.collimator.transmission == pytest.approx(0.01)


def test_a_class_counts_from_the_surface_and_says_so() -> None:
    """Class M: 0.05 mSv/h at 1 m from the surface (ISO 3999, recalled); 0.2 m under it: 0.05 x 1.2^2 at 1 m."""
    scenario = loads(TEXT, "job")
    box = source(scenario).container
    assert box is not None
    assert box.rate.value * 3600.0 == pytest.approx(0.05e-3 * 1.44)
    assert box.seconds_per_week == pytest.approx(168 * 3600.0)
    assert any("0.2 m under the surface" in a.text for a in scenario.assumptions)
    assert any("168 h" in a.text for a in scenario.assumptions)


def test_a_certified_container_counts_as_certified() -> None:
    scenario = loads(
        changed("class: M, housing: tungsten", "leakage: 8 uSv/h at 1 m, kept: 40 h/week"), "job"
    )
    box = source(scenario).container
    assert box is not None
    assert box.rate.value * 3600.0 == pytest.approx(8e-6)
    assert box.seconds_per_week == pytest.approx(40 * 3600.0)
    assert box.housing == "lead"
    assert any("hardened by lead" in a.text for a in scenario.assumptions)


@pytest.mark.parametrize(
    ("text", "material", "transmission", "thickness"),
    [
        ("1/200", "tungsten", 1 / 200, None),
        ("tungsten 20 mm", "tungsten", None, 0.02),
        ('"lead, 2 %"', "lead", 0.02, None),
    ],
)
def test_collimators(text: str, material: str, transmission: float | None, thickness: float | None) -> None:
    found = loads(changed('"tungsten alloy, 1/100"', text), "job").beams[0].collimator
    assert found is not None
    assert found.material == material
    assert (found.transmission or 0.0) == pytest.approx(transmission or 0.0)
    assert (found.thickness.value if found.thickness else None) == thickness


def test_a_panoramic_field_is_a_band() -> None:
    field = loads(changed("cone 60 deg", "panoramic 40 deg"), "job").beams[0].field
    assert field.kind == "ring"
    assert field.half_angle == pytest.approx(math.radians(20.0))


REFUSED = [
    ("survey on: 2026-04-20", "survey on: 2026-01-01", "comes after it"),
    ("    on: 2026-03-02\n", "", "a survey needs the date"),
    ("exchanged every: 90 d", "exchanged every: 90 mm", "90 mm"),
    ("rate constant: 0.11 mGy m2/(GBq h)", "rate constant: 0.11 mGy/h", "rate constant"),
    ("exchanged every: 90 d", "certificate: 400 mGy/h at 1 m", "both a rate constant and a certified output"),
    ("class: M, ", "", "nothing says how much the container leaks"),
    ("class: M, ", "class: M, leakage: 8 uSv/h at 1 m, ", "both a leakage and a class"),
    ("class: M, ", "class: Q, ", "'Q'"),
    ("housing: tungsten}", "housing: tungsten, kept: 169 h/week}", "168 h"),
    ("at: [1, 1, 0.3], class", "at: [5, 6.2, 0.3], class", "inside the wall"),
    ("path: [[1, 1, 0.3], [5, 3, 1.3]]", "path: [[2, 1, 0.3], [5, 3, 1.3]]", "from the container"),
    (
        "path: [[1, 1, 0.3], [5, 3, 1.3]]",
        "path: [[1, 1, 0.3], [5, 4, 1.3]]",
        "where 'shot' exposes the source",
    ),
    ("path: [[1, 1, 0.3], [5, 3, 1.3]]", "path: [[1, 1, 0.3]]", "two points or more"),
    ("path: [[1, 1, 0.3], [5, 3, 1.3]]", "path: [[1, 1, 0.3], [1, 1, 0.3], [5, 3, 1.3]]", "are the same"),
    ("    container: {at: [1, 1, 0.3], class: M, housing: tungsten}\n", "", "a way starts at a container"),
    ("speed: 0.6 m/s", "speed: 0.6 m", "speed"),
    ("speed: 0.6 m/s", "speed: 0 m/s", "above zero"),
    ('"tungsten alloy, 1/100"', "1.5", "transmission above 0 and below 1"),
    ('"tungsten alloy, 1/100"', '"tungstn, 1/100"', "tungsten"),
    ("aim: down, field: cone 60 deg", "field: all round", "leaves nothing for it to stop"),
    ("cone 60 deg", "panoramic 200 deg", "below 180 deg"),
    ("cycles: 60/week, exposure: 4 min", "cycles: 60/week", "'exposure' is missing"),
    ("cycles: 60/week, exposure: 4 min", "beam on: 4 h/week", "its cycles must be known"),
    ("cycles: 60/week, exposure: 4 min", "cycles: 60/week, beam on: 4 h/week, exposure: 4 min", "are given"),
    ("cycles: 60/week", "cycles: 60", "not a number per week"),
    ("worst hour: 5 cycles", "worst hour: 20 min", "not stated like 'cycles'"),
    ("worst hour: 5 cycles", "worst hour: 20 cycles", "of beam in an hour"),
    ("worst day: 20 cycles", "worst day: 4 cycles", "less than in the worst hour"),
    ("cycles: 60/week, exposure: 4 min", "patients: 60/week, per patient: 2 mA min", "of X-ray tubes"),
    ("stuck: {at: [3, 2, 1], for: 20 min}", "stuck: {at: [3, 2, 1]}", "'for' is missing"),
]


@pytest.mark.parametrize(("old", "new", "said"), REFUSED)
def test_refused(old: str, new: str, said: str) -> None:
    error = refusal(changed(old, new))
    assert said in error.render(), error.render()
    assert all(problem.line for problem in error.problems)
