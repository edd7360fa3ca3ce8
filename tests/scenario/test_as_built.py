"""Walls as built and as bought, rules, areas, purposes in the file. Kind: hand-worked."""

from __future__ import annotations

import pytest

from scatterbay.scenario import loads
from scatterbay.scenario.parts import Opening, Panel, Scenario
from tests.scenario.edits import refusal

TEXT = """
format: 1
title: a room
purpose: radiography
notes: [one remark, another]
stock:
  our board: gypsum board 12.5 mm + lead 1.3 mm +/- 0.1 mm
room:
  corners: [[0, 0], [6, 0], [6, 4], [0, 4]]
  height: 3 m
  sides: {south: gypsum board 12.5 mm, east: our board, north: concrete 200 mm +/- 10 mm, west: lead code 4 at nominal}
  ceiling: concrete 150 mm
  floor: concrete 100 mm to 160 mm
  storey below: 3.5 m
  openings:
    pane: {in: door, from: 0.2 m, width: 0.3 m, sill: 1.4 m, height: 0.4 m, make-up: lead glass 8 mm}
    door: {in: south, from: 1 m, width: 1 m, height: 2.1 m, make-up: lead 2 mm}
    screen pane: {in: screen, from: 0.5 m, width: 0.5 m, sill: 1.2 m, height: 0.5 m, make-up: lead glass 8 mm}
  screens:
    screen: {from: [1, 3.5], to: [3, 3.5], bottom: 0.1 m, top: 2 m, make-up: lead 2 mm}
  panels:
    lining: {on: south, top: 2.1 m, add inside: lead 2 mm}
    patch: {on: door, bottom: 1 m, height: 0.5 m, add outside: lead 1 mm}
    socket: {on: south, from: 3 m, width: 80 mm, bottom: 0.3 m, height: 80 mm, make-up: gypsum board 12.5 mm}
    slab: {on: ceiling, from: [1, 1], to: [3, 2], add inside: lead 1 mm}
    roof: {on: ceiling, add outside: concrete 50 mm}
sources:
  set: {x-ray tube: 125 kV, current: 5 mA, filtration: aluminium 3 mm}
beams:
  shot: {source: set, at: [2, 2, 1], aim: south, field: cone 20 deg}
workload:
  shot: {beam on: 1 h/week}
people:
  staff: {area: controlled, rules: "NCRP 147: controlled area"}
  others: {rules: ["NCRP 147: uncontrolled area"], goals: [0.01 mGy/week, 0.3 mSv/year]}
places:
  hall: {beyond: south, along: 3 m, people: others, occupancy: 1/8, area: supervised, space: corridor}
  door side: {beyond: pane, people: others, area: public}
  office: {beyond: north, along: 2 m, people: staff}
options:
  breadth: 60 mm
"""


def changed(old: str, new: str) -> str:
    assert TEXT.count(old) == 1, old
    return TEXT.replace(old, new)


@pytest.fixture(scope="module")
def scenario() -> Scenario:
    return loads(TEXT, "room")


def opening(scenario: Scenario, name: str) -> Opening:
    return next(one for one in scenario.room.openings if one.name == name)


def panel(scenario: Scenario, name: str) -> Panel:
    return next(one for one in scenario.room.panels if one.name == name)


def test_an_opening_in_an_opening_counts_from_its_edge(scenario: Scenario) -> None:
    """0.2 m from the near edge of the door, which is 1 m along the side; sills are over the floor; doors first."""
    names = [one.name for one in scenario.room.openings]
    assert names.index("door") < names.index("pane")
    pane = opening(scenario, "pane")
    assert pane.face == "south"
    assert pane.host == "door"
    assert pane.low == pytest.approx((1.2, 1.4))
    assert pane.high == pytest.approx((1.5, 1.8))


def test_an_opening_in_a_screen(scenario: Scenario) -> None:
    pane = opening(scenario, "screen pane")
    assert pane.face == "screen"
    assert pane.low == pytest.approx((0.5, 1.2))
    assert pane.high == pytest.approx((1.0, 1.7))


def test_panels_fill_what_is_left_out(scenario: Scenario) -> None:
    lining, patch, socket = (panel(scenario, name) for name in ("lining", "patch", "socket"))
    assert (lining.low, lining.high) == ((0.0, 0.0), (6.0, 2.1))
    assert lining.inside is not None
    assert lining.make_up is None
    assert patch.face == "south"
    assert patch.low == pytest.approx((1.0, 1.0))
    assert patch.high == pytest.approx((2.0, 1.5))
    assert patch.outside is not None
    assert socket.low == pytest.approx((3.0, 0.3))
    assert socket.high == pytest.approx((3.08, 0.38))
    assert socket.make_up is not None
    assert (panel(scenario, "roof").low, panel(scenario, "roof").high) == ((0.0, 0.0), (6.0, 4.0))
    assert (panel(scenario, "slab").low, panel(scenario, "slab").high) == ((1.0, 1.0), (3.0, 2.0))


def test_what_counts_at_its_least_is_said(scenario: Scenario) -> None:
    sides = {side.name: side.make_up for side in scenario.room.sides}
    assert sides["north"].layers[0].counted_thickness == pytest.approx(0.19)
    assert sides["east"].layers[1].counted_thickness == pytest.approx(1.2e-3)
    assert sides["west"].layers[0].counted_thickness == pytest.approx(1.8e-3)
    assert scenario.room.floor.layers[0].counted_thickness == pytest.approx(0.1)
    said = " ".join(a.text for a in scenario.assumptions if a.topic == "least thickness")
    for part in ("our board", "counted at 190 mm", "nominal", "counted at its least, 100 mm"):
        assert part in said


def test_rules_give_goals_and_the_authors_own_go_before_them(scenario: Scenario) -> None:
    """NCRP Report 147 (2004), recalled: 0.1 mGy a week in controlled areas, 0.02 elsewhere."""
    goals = {group.name: {goal.text: goal.source for goal in group.goals} for group in scenario.people}
    assert list(goals["staff"]) == ["0.1 mGy/week"]
    assert goals["staff"]["0.1 mGy/week"].startswith("NCRP 147: controlled area")
    assert goals["others"] == {"0.01 mGy/week": "", "0.3 mSv/year": ""}
    assert any("judged instead of '0.02 mGy/week'" in a.text for a in scenario.assumptions)


def test_areas_of_places(scenario: Scenario) -> None:
    areas = {place.name: place.area for place in scenario.places}
    assert areas == {"hall": "supervised", "door side": "public", "office": "controlled"}


def test_an_occupancy_is_suggested_and_not_applied(scenario: Scenario) -> None:
    hall = next(place for place in scenario.places if place.name == "hall")
    assert hall.occupancy == pytest.approx(1 / 8)
    said = [a.text for a in scenario.assumptions if a.topic == "occupancy"]
    assert any("1/5 is suggested" in text and "not applied" in text for text in said)


def test_purpose_notes_and_breadth(scenario: Scenario) -> None:
    assert scenario.purpose == "radiography"
    assert scenario.notes == ("one remark", "another")
    assert scenario.options.breadth == pytest.approx(0.06)
    assert any("within 60 mm only" in a.text for a in scenario.assumptions)


@pytest.mark.parametrize("title", ["CT room 3", "Dental suite", "Fluoroscopy", "Mammography 1"])
def test_a_title_that_speaks_of_what_is_not_validated(title: str) -> None:
    found = loads(changed("title: a room", f"title: {title}"), "room")
    assert any("nothing here was validated" in a.text for a in found.assumptions)


@pytest.mark.parametrize("title", ["Act 3 corridor", "direct view room", "Accidental room"])
def test_a_title_that_does_not(title: str) -> None:
    found = loads(changed("title: a room", f"title: {title}"), "room")
    assert not any("nothing here was validated" in a.text for a in found.assumptions)


@pytest.mark.parametrize(
    "purpose", ["CT", "ct", "fluoroscopy", "Mammography", "dental", "computed tomography"]
)
def test_what_is_not_validated_is_refused_by_name(purpose: str) -> None:
    error = refusal(changed("purpose: radiography", f"purpose: {purpose}"))
    assert "refused" in error.render()
    assert error.exit_code == 3


REFUSED = [
    ("purpose: radiography", "purpose: radiographie", "did you mean 'radiography'"),
    ("our board: gypsum board 12.5 mm + lead", "our board: gypsum bord 12.5 mm + lead", "gypsum bord"),
    ("  our board: gypsum", "  lead: gypsum", "is a material"),
    ("east: our board", "east: our bord", "our bord"),
    ("in: door, from: 0.2 m", "in: doors, from: 0.2 m", "did you mean 'door'"),
    ("in: door, from: 0.2 m", "in: pane, from: 0.2 m", "in itself"),
    ("in: door, from: 0.2 m", "in: door, from: 0.8 m", "ends 1.1 m along 'door'"),
    ("sill: 1.4 m, height: 0.4 m", "sill: 1.9 m, height: 0.4 m", "above the top of 'door'"),
    ("sill: 1.2 m, height: 0.5 m", "sill: 0.05 m, height: 0.5 m", "below 'screen'"),
    ("on: south, top: 2.1 m", "on: sooth, top: 2.1 m", "did you mean 'south'"),
    ("on: south, top: 2.1 m", "on: south, top: 3.1 m", "beyond 'south'"),
    ("on: south, top: 2.1 m", "on: south, to: 7 m", "beyond 'south'"),
    ("on: south, top: 2.1 m", "on: south, bottom: 2 m, top: 1 m", "no size"),
    ("on: south, top: 2.1 m", "on: south, top: 2.1 m, height: 2 m", "both 'height' and 'top'"),
    ("on: south, top: 2.1 m, add inside: lead 2 mm", "on: south, top: 2.1 m", "nothing says what is there"),
    ("on: south, top: 2.1 m, add inside: lead 2 mm", "on: south, add inside: lead 2 mm, make-up: open",
     "both a make-up and additions"),
    ("on: door, bottom: 1 m, height: 0.5 m", "on: door, bottom: 1 m, height: 1.5 m", "beyond 'door'"),
    ("from: [1, 1], to: [3, 2]", "from: [1, 1], to: [3, 5]", "beyond the outline"),
    ("from: [1, 1], to: [3, 2]", "from: [1, 1]", "without the other"),
    ("  panels:\n    lining", "  panels:\n    door", "already one of the openings"),
    ('rules: "NCRP 147: controlled area"', "rules: NCRP 147 controled area", "did you mean"),
    ('rules: ["NCRP 147: uncontrolled area"]', "rules: [NCRP 147: uncontrolled area]", "put it in quotes"),
    ('area: controlled, rules: "NCRP 147: controlled area"', "area: controlled", "'goals' is missing"),
    ('area: controlled, rules: "NCRP 147: controlled area"', 'rules: "NCRP 147: controlled area"', "'area' is missing"),
    ("space: corridor", "space: coridor", "did you mean 'corridor'"),
    ("area: supervised", "area: supervized", "supervised"),
    ("breadth: 60 mm", "breadth: 0.6 m", "more than 0.5 m"),
    ("breadth: 60 mm", "breadth: -1 mm", "negative"),
]  # fmt: skip


@pytest.mark.parametrize(("old", "new", "said"), REFUSED)
def test_refused(old: str, new: str, said: str) -> None:
    error = refusal(changed(old, new))
    assert said in error.render(), error.render()
    assert all(problem.line for problem in error.problems)
