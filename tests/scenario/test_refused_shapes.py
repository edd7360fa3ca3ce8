"""Slips that take more than a word to make: outlines, missing sections, several at once, tables that lack."""

from __future__ import annotations

import re

import pytest

from scatterbay.scenario import known, loads
from tests.scenario.edits import BASE, refusal

CORNERS = re.compile(r"corners: \[.*\]\n")
SIDES = re.compile(r"  sides:\n(    .*\n)+")


def with_room(corners: str, sides: str) -> str:
    """The smallest scenario with an outline of its own."""
    return f"""format: 1
title: outline
room:
  corners: {corners}
  height: 3 m
  sides: {sides}
  ceiling: open
  floor: on the ground
sources: {{tube: {{x-ray tube: 100 kV, current: 1 mA, filtration: none}}}}
beams: {{shot: {{source: tube, at: [2, 1.5, 1], aim: north, field: cone 20 deg}}}}
workload: {{shot: {{beam on: 1 h/week}}}}
people: {{all: {{area: public, goals: 0.3 mSv/year}}}}
places: {{desk: {{at: [40, 0, 1], people: all}}}}
"""


FOUR = "{a: lead 2 mm, b: lead 2 mm, c: lead 2 mm, d: lead 2 mm}"


@pytest.mark.parametrize(
    ("corners", "said"),
    [
        (
            "[[0, 0], [0, 3], [4, 3], [4, 0]]",
            ["clockwise", "[[4.0, 0.0], [4.0, 3.0], [0.0, 3.0], [0.0, 0.0]]"],
        ),
        ("[[0, 0], [4, 3], [4, 0], [0, 3]]", ["crosses or touches itself"]),
        ("[[0, 0], [4, 0], [2, 0], [2, 3]]", ["crosses or touches itself"]),
        (
            "[[0, 0], [4, 0], [4, 3], [0, 0]]",
            ["corners 4 and 1 are the same point", "joins the first by itself"],
        ),
        ("[[0, 0], [4, 0]]", ["three corners or more"]),
        ("room", ["three corners or more"]),
    ],
)
def test_outlines_that_enclose_nothing(corners: str, said: list[str]) -> None:
    error = refusal(with_room(corners, FOUR))
    assert len(error.problems) == 1, error.render()
    assert error.problems[0].line == 4
    for fragment in said:
        assert fragment in error.render()


def test_the_outline_of_these_tests_is_good_when_it_is_in_order() -> None:
    assert loads(with_room("[[0, 0], [4, 0], [4, 3], [0, 3]]", FOUR)).room.corners[2] == (4.0, 3.0)


@pytest.mark.parametrize(
    ("sides", "name"),
    [
        ("{south: open, east: open, north: open, west: open}", None),
        ("{south wall: open, East: open, north-ish: open, west end: open}", None),
        ("{south-west: open, south-east: open, north-east: open, north-west: open}", None),
        ("{east-west door side: open, b: open, c: open, d: open}", None),
        ("{south: open, west: open, north: open, east: open}", "west"),
        ("{south: open, east: open, south 2: open, west: open}", "south 2"),
        ("{east: open, b: open, c: open, d: open}", "east"),
    ],
)
def test_a_compass_word_in_a_side_is_checked(sides: str, name: str | None) -> None:
    text = with_room("[[0, 0], [4, 0], [4, 3], [0, 3]]", sides)
    if name is None:
        assert len(loads(text).room.sides) == 4
    else:
        error = refusal(text)
        assert error.problems[0].where == f"room.sides.{name}"
        assert "faces" in error.problems[0].message


def test_a_hatch_around_a_spike_of_the_outline_reaches_beyond_it() -> None:
    spiked = "[[0, 0], [4, 0], [4, 3], [2.05, 3], [2, 1], [1.95, 3], [0, 3]]"
    text = with_room(spiked, FOUR.replace("}", ", e: open, f: open, g: open}")).replace(
        "at: [2, 1.5", "at: [1, 1.5"
    )
    assert loads(text)
    hatch = "  openings: {hatch: {in: ceiling, from: [1.5, 0.5], to: [2.5, 1.5], make-up: open}}\n  ceiling"
    assert "'hatch' reaches beyond the outline" in refusal(text.replace("  ceiling", hatch)).render()


def test_a_place_under_a_floor_on_the_ground_lies_in_the_ground() -> None:
    text = with_room("[[0, 0], [4, 0], [4, 3], [0, 3]]", FOUR).replace("at: [40, 0, 1]", "at: [2, 2, -3]")
    assert "inside the ground" in refusal(text).render()


def test_no_workload_at_all_is_missed_at_every_beam() -> None:
    """It may be left out where every beam has techniques."""
    missing = refusal(re.sub(r"^workload:\n(  .*\n)+", "", BASE, flags=re.MULTILINE))
    assert {p.message.split("' ", 1)[1] for p in missing.problems} == {"has no workload"}


@pytest.mark.parametrize("section", ["sources", "beams", "people", "places"])
def test_a_section_that_is_missing_or_empty(section: str) -> None:
    pattern = re.compile(rf"^{section}:\n(  .*\n)+", re.MULTILINE)
    assert len(pattern.findall(BASE)) == 1
    missing = refusal(pattern.sub("", BASE))
    assert [p.message for p in missing.problems] == [f"'{section}' is missing"]
    empty = refusal(pattern.sub(f"{section}: {{}}\n", BASE))
    assert f"there are no {section}" in empty.render()


@pytest.mark.parametrize(
    "section", ["room", "sources", "beams", "workload", "people", "places", "bodies", "materials"]
)
def test_a_section_that_is_a_list_makes_no_further_noise(section: str) -> None:
    pattern = re.compile(rf"^{section}:\n(  .*\n)+", re.MULTILINE)
    error = refusal(pattern.sub(f"{section}: [1, 2]\n", BASE))
    about = [problem for problem in error.problems if problem.where == section]
    assert len(about) == 1
    assert "a mapping is needed" in about[0].message
    assert len(error.problems) == 1 or section == "materials", error.render()


def test_all_problems_are_told_in_line_order() -> None:
    text = BASE.replace("height: 3 m\n", "height: 3\n").replace("occupancy: 1/4", "occupancy: 2")
    text = text.replace("people: apprentices", "people: nobody").replace("area: public", "area: publik")
    text = text.replace("[8, 0], [8, 3]", "[8, 3], [8, 0]")
    error = refusal(text)
    lines = [problem.line for problem in error.problems]
    assert lines == sorted(lines)
    assert {problem.where for problem in error.problems} == {
        "room.corners",
        "room.height",
        "people.visitors.area",
        "places.aisle.occupancy",
        "places.behind the door.people",
    }
    assert error.render().count("^") == 5


def test_one_entry_refused_leaves_the_others_checked() -> None:
    """A broken beam must not hide that another stands outside the room, nor be called unknown elsewhere."""
    text = BASE.replace("field: 200 mm x 300 mm at 700 mm", "field: wide").replace(
        "at: [2, 3, 2]", "at: [20, 3, 2]"
    )
    assert {p.where for p in refusal(text).problems} == {"beams.weld shot.field", "beams.down shot.at"}


def test_a_nuclide_with_lines_above_the_grid_lies_outside_the_model(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr("scatterbay.scenario.model.readers.highest_line_kev", lambda name: 2754.0)
    error = refusal(BASE)
    assert {p.where for p in error.problems} == {
        "sources.capsule.sealed source",
        "sources.old capsule.sealed source",
    }
    assert "2754 keV" in error.render()
    assert error.exit_code == 3


def test_problems_of_both_kinds_are_bad_input() -> None:
    assert refusal(BASE.replace("225 kV", "500 kV").replace("height: 3 m\n", "height: 3\n")).exit_code == 2


def test_every_nuclide_in_the_table_is_inside_the_model_or_refused() -> None:
    for name in known.nuclide_names():
        text = BASE.replace("sealed source: Cs-137", f"sealed source: {name}")
        if known.highest_line_kev(name) > known.HIGHEST_LINE_KEV:
            assert refusal(text).exit_code == 3
        else:
            assert loads(text)
