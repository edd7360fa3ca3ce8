"""What a good file turns into, worked by hand: base units, conventions, defaults that are named."""

from __future__ import annotations

import math

import numpy as np
import pytest

from scatterbay.scenario import loads
from scatterbay.scenario.parts import Scenario, SealedSource, XrayTube
from tests.scenario.edits import BASE

SMALLEST = """format: 1
title: Smallest
room:
  corners: [[0, 0], [4, 0], [4, 3], [0, 3]]
  height: 2.8 m
  sides: {a: lead 2 mm, b: lead 2 mm, c: lead 2 mm, d: open}
  ceiling: concrete 200 mm
  floor: on the ground
sources: {tube: {x-ray tube: 100 kV, current: 2 mA, filtration: none}}
beams: {shot: {source: tube, at: [2, 1.5, 1], aim: north, field: cone 20 deg}}
workload: {shot: {beam on: 1 h/week}}
people: {all: {area: public, goals: 0.3 mSv/year}}
places: {desk: {beyond: c, along: 1 m, people: all}}
"""


@pytest.fixture(scope="module")
def everything() -> Scenario:
    return loads(BASE)


def assumed(scenario: Scenario, topic: str) -> list[str]:
    return [assumption.text for assumption in scenario.assumptions if assumption.topic == topic]


def place(scenario: Scenario, name: str) -> tuple[float, float, float]:
    return next(place.at for place in scenario.places if place.name == name)


def test_the_room_in_metres(everything: Scenario) -> None:
    room = everything.room
    assert np.array(room.corners) == pytest.approx(
        np.array([[0, 0], [8, 0], [8, 3], [5, 3], [5, 6.096], [0, 6.096]])
    )
    assert [side.name for side in room.sides] == [
        "south",
        "east",
        "inner north",
        "inner east",
        "north",
        "west",
    ]
    assert room.sides[2].start == (8, 3)
    assert room.sides[2].end == (5, 3)
    assert room.sides[2].make_up.thickness == pytest.approx(0.3048)
    assert room.sides[3].make_up.layers[0].thickness.tolerance == pytest.approx(0.005)
    assert (room.storey_above, room.storey_below, room.floor_on_ground) == (3.6, 3.4, False)


def test_openings_by_their_near_and_far_corner(everything: Scenario) -> None:
    openings = {opening.name: opening for opening in everything.room.openings}
    assert openings["window"].low == pytest.approx((1.0, 0.9144))
    assert openings["window"].high == pytest.approx((1.8, 1.5144))
    assert (openings["skylight"].low, openings["skylight"].high) == ((1, 1), (2, 2))
    assert openings["gap"].make_up.is_open
    assert assumed(everything, "openings") == ["Standing on the floor (no sill given): door, gap."]


def test_sources_at_one_metre(everything: Scenario) -> None:
    sources = {source.name: source for source in everything.sources}
    tube, other, capsule = sources["set"], sources["other set"], sources["capsule"]
    assert isinstance(tube, XrayTube)
    assert isinstance(other, XrayTube)
    assert isinstance(capsule, SealedSource)
    assert tube.leakage is not None
    # 1.25 mGy/h at 2 m is 5 mGy/h at 1 m
    assert tube.leakage.rate.value == pytest.approx(5e-3 / 3600)
    assert (tube.leakage.rate.kind, tube.leakage.housing) == ("air kerma rate", "tungsten")
    assert tube.output is not None
    assert tube.output.value == pytest.approx(9.8e-3 / (1e-3 * 60))
    assert tube.output.tolerance == pytest.approx(0.08 * tube.output.value)
    assert other.output is not None
    assert other.output.value == pytest.approx(0.05e-3 / 1e-3)
    assert other.half_value_layer is not None
    assert other.half_value_layer.thickness.value == pytest.approx(4.1e-3)
    assert other.anode_angle.value == pytest.approx(math.radians(20))
    assert capsule.activity.value == pytest.approx(3.7e12)
    assert (capsule.activity_date, capsule.assessed_date) == ("2026-03-01", "2026-06-01")
    assert capsule.leakage is not None
    assert capsule.leakage.rate.kind == "ambient dose equivalent rate"


def test_places_by_the_conventions(everything: Scenario) -> None:
    # north runs from (5, 6.096) to (0, 6.096), 12.7 + 1.5 + 12.7 mm thick
    assert place(everything, "aisle") == pytest.approx((5 - 2.4, 6.096 + 0.0269 + 0.3, 1.2))
    # the door's middle is 0.6 + 0.6 m from (0, 6.096) down the west side, 300 mm thick
    assert place(everything, "behind the door") == pytest.approx((-0.3 - 0.5, 6.096 - 1.2, 1.0))
    assert place(everything, "loft") == pytest.approx((3, 2.2, 3.6 + 0.5))
    assert place(everything, "store") == pytest.approx((3, 2.2, -3.4 + 1.7))
    assert {p.name: p.occupancy for p in everything.places} == {
        "console": 1.0,
        "aisle": 0.25,
        "behind the door": 0.5,
        "loft": 1.0,
        "store": 0.125,
        "corner": 1.0,
    }


def test_beams_and_fields(everything: Scenario) -> None:
    beams = {beam.name: beam for beam in everything.beams}
    assert beams["weld shot"].aim == (3, 2.2, 1)
    assert (beams["weld shot"].field.width, beams["weld shot"].field.height) == (0.2, 0.3)
    assert beams["weld shot"].field.turned == pytest.approx(math.radians(-10))
    assert beams["weld shot"].object_in_beam
    assert beams["down shot"].aim == (2, 3, 1)
    assert beams["down shot"].field.half_angle == pytest.approx(math.radians(20))
    assert beams["at the console"].aim == place(everything, "console")
    assert beams["at the console"].field.half_angle == pytest.approx(math.atan(0.15))
    assert beams["gamma shot"].field.kind == "everywhere"
    assert not beams["check"].object_in_beam


def test_workloads_in_seconds(everything: Scenario) -> None:
    loads_ = {
        w.beam: (w.seconds_per_week, w.seconds_in_worst_hour, w.seconds_in_worst_day, w.weeks_per_year)
        for w in everything.workloads
    }
    assert loads_["weld shot"] == pytest.approx((6 * 3600, 25 * 60, 2 * 3600, 48))
    # 400 and 100 mA min at 10 mA; the worst 8 h hold no more than the week
    assert loads_["down shot"] == pytest.approx((2400, 600, 2400, 48))
    # half an hour a week, all of it in one hour if nothing else is said
    assert loads_["at the console"] == pytest.approx((1800, 1800, 1800, 52))
    # 50 min in the worst hour, 8 times that in the worst 8 h
    assert loads_["gamma shot"] == pytest.approx((36000, 3000, 24000, 52))
    # the worst hour cannot hold more than the worst day
    assert loads_["check"] == pytest.approx((36000, 1800, 1800, 52))


def test_goals_by_time_base_and_quantity(everything: Scenario) -> None:
    goals = {
        group.name: {(g.time_base, g.quantity): g.value for g in group.goals} for group in everything.people
    }
    sievert, gray = "ambient dose equivalent", "air kerma"
    assert goals["staff"] == pytest.approx(
        {("year", sievert): 6e-3, ("hour", sievert): 20e-6, ("week", gray): 1e-4}
    )
    assert goals["visitors"] == pytest.approx(
        {
            ("year", sievert): 0.3e-3,
            ("rate", sievert): 7.5e-6 / 3600,
            ("day", sievert): 7.5e-6 / 3600,
            ("week", gray): 2e-3,
        }
    )


def test_materials_of_ones_own(everything: Scenario) -> None:
    mix, scheelite = everything.materials
    assert mix.mass_fractions == pytest.approx({"Ca": 0.25, "C": 0.06, "O": 0.5, "Si": 0.19})
    assert (mix.density_g_cm3, scheelite.density_g_cm3) == (2.41, 6.1)
    # CaWO4: 40.078 + 183.84 + 4 x 15.999 = 287.91
    assert scheelite.mass_fractions["W"] == pytest.approx(183.84 / 287.914, rel=1e-4)


def test_fractions_a_little_off_are_scaled_and_it_is_said() -> None:
    scenario = loads(BASE.replace("Ca: 0.25", "Ca: 0.254"))
    assert sum(scenario.materials[0].mass_fractions.values()) == pytest.approx(1.0, abs=1e-12)
    assert assumed(scenario, "materials") == ["Mass fractions adding up to 1.0040 scaled to 1: own mix."]


def test_bodies_keep_sizes_axis_and_filling(everything: Scenario) -> None:
    bodies = {body.name: body for body in everything.bodies}
    assert bodies["pipe"].sizes == pytest.approx((0.324, 0.0127, 1.2))
    assert (bodies["pipe"].axis, bodies["pipe"].inside) == ((0, 1, 0), "water")
    assert bodies["core"].axis == (0, 0, 1)
    assert bodies["block"].turned == pytest.approx(math.radians(30))
    assert bodies["sheet"].axis == (0, 1, 0)
    assert bodies["ball"].sizes == (0.3,)


def test_everything_left_out_is_named() -> None:
    scenario = loads(SMALLEST)
    assert {assumption.topic for assumption in scenario.assumptions} == {
        "output",
        "anode angle",
        "leakage",
        "occupancy",
        "height",
        "gap",
        "use factor",
        "bare beam",
        "worst hour",
        "worst day",
        "weeks",
        "primary",
        "bodies",
    }
    assert scenario.workloads[0].seconds_in_worst_day == 3600
    assert scenario.beams[0].use_factor == 1.0
    assert assumed(scenario, "height") == ["Height over the floor taken as 1.2 m: desk."]


def test_what_is_stated_is_not_assumed(everything: Scenario) -> None:
    assert assumed(everything, "primary") == []
    assert "aisle" not in assumed(everything, "occupancy")[0]
    assert everything.options.primary_by_plane
    assert everything.options.seed == 7


def test_above_without_a_storey_is_measured_from_the_ceiling_and_said() -> None:
    scenario = loads(SMALLEST.replace("{beyond: c, along: 1 m, ", "{above: [1, 1], "))
    assert place(scenario, "desk") == pytest.approx((1, 1, 2.8 + 0.2 + 0.5))
    assert assumed(scenario, "storey above") == ["Floor above taken as the outer face of the ceiling: desk."]


def test_a_place_in_the_doorway_of_an_open_side_or_far_outside_is_free() -> None:
    for where in ("[-0.1, 1, 1]", "[1, 1, 0.5]", "[50, 50, 30]"):
        assert loads(SMALLEST.replace("{beyond: c, along: 1 m, ", f"{{at: {where}, "))


def test_a_source_in_the_bore_of_an_empty_pipe_is_free() -> None:
    text = BASE.replace("at: [2.2, 2.2, 1.0], aim: pipe", "at: [3, 2.7, 1.0], aim: pipe").replace(
        ", filled with: water", ""
    )
    assert loads(text).beams[0].at == (3, 2.7, 1)
