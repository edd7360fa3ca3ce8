"""Slips in beams, workload and places."""

from __future__ import annotations

import pytest

from tests.scenario.edits import Edit, check_refused

USE = [
    Edit("at: [2.2, 2.2, 1.0], aim", "at: §[-2.2, 2.2, 1.0], aim", ("outside the room",)),
    Edit("at: [2.2, 2.2, 1.0], aim", "at: §[2.2, 2.2, 3.1], aim", ("not between floor and ceiling",)),
    Edit("at: [2.2, 2.2, 1.0], aim", "at: §[3.0, 2.2, 1.1], aim", ("stands inside 'pipe' (water)",)),
    Edit(
        "at: [1, 5.5, 1], aim: [1, 1, 1]",
        "at: [1, 5.5, 1], aim: §[1, 5.5, 1]",
        ("aimed at the point it comes from",),
    ),
    Edit(
        "  check: {source: old capsule, at: [1, 5.5, 1], aim: [1, 1, 1]",
        "  §check: {source: old capsule, at: [1, 5.5, 1]",
        ("'aim' is missing",),
    ),
    Edit("field: cone 40 deg", "field: cone §200 deg", ("below 180 deg",)),
    Edit("field: cone 40 deg", "field: §40 deg", ("not a field", "cone 40 deg")),
    Edit("200 mm x 300 mm at 700 mm", "200 mm x §0 mm at 700 mm", ("above zero",)),
    Edit("200 mm x 300 mm at 700 mm", "§200 mm x 300 mm", ("not a field",)),
    Edit("use factor: 1/4", "use factor: §1.5", ("above 0 and up to 1",)),
    Edit("use factor: 1/4", "use factor: §0", ("above 0 and up to 1",)),
    Edit("use factor: 1/4", "use factor: §-0.25", ("above 0 and up to 1",)),
    Edit("use factor: 1/4", "use factor: §often", ("not a plain number", "1/4")),
    Edit("use factor: 1/4", "use factor: §1/0", ("divides by zero",)),
    Edit("occupancy: 1/4", "occupancy: §2", ("above 0 and up to 1",)),
    Edit("occupancy: 1/4", "occupancy: §0", ("above 0 and up to 1",)),
    Edit("beam on: 6 h/week", "beam on: §6 h", ("per week", "'6 h/week'")),
    Edit("beam on: 6 h/week", "beam on: §169 h/week", ("168 h",)),
    Edit("beam on: 6 h/week", "beam on: §10 min/week", ("less than in the worst 8 h",)),
    Edit("worst hour: 25 min", "worst hour: §61 min", ("in an hour", "at most 1 h")),
    Edit("worst day: 2 h", "worst day: §9 h", ("8 h",)),
    Edit("worst day: 2 h", "worst day: §20 min", ("less than in the worst hour",)),
    Edit("beam on: 10 h per week", "beam on: §10 mA min/week", ("no tube current",)),
    Edit("weeks: 48 weeks", "weeks: §60", ("do not fit in a year",)),
    Edit("weeks: 48 weeks", "weeks: §48 h", ("not a plain number",)),
    Edit(
        "  gamma shot: {beam on",
        "  §gama shot: {beam on",
        ("no beam 'gama shot'", "did you mean 'gamma shot'"),
    ),
    Edit(
        "  gamma shot: {beam on",
        "  §spare: {beam on: 1 h/week}\n  gamma shot: {beam on",
        ("no beam 'spare'",),
    ),
    Edit(
        "  check: {source: old",
        "  §spare: {source: set, at: [4, 1, 1], aim: up, field: cone 9 deg}\n  check: {source: old",
        ("beam 'spare' has no workload", "beam on: 6 h/week"),
    ),
    Edit(
        "  old capsule: {",
        "  §spare: {sealed source: Co-60, activity: 1 GBq}\n  old capsule: {",
        ("no beam uses 'spare'",),
    ),
]

PLACES = [
    Edit(
        "  console: {at: [-1.5, 3.0, 1.2]",
        "  §console: {at: [-0.1, 3.0, 1.2]",
        ("inside the wall 'west'", "outer face"),
    ),
    Edit(
        "  corner: {at: [7, 2, 5 ft 6 in]",
        "  §corner: {at: [-0.1, -0.1, 1]",
        ("inside the corner of 'west' and 'south'",),
    ),
    Edit("  corner: {at: [7, 2, 5 ft 6 in]", "  §corner: {at: [2, 2, 3.1]", ("inside the ceiling",)),
    Edit("  corner: {at: [7, 2, 5 ft 6 in]", "  §corner: {at: [2, 2, -0.1]", ("inside the floor",)),
    Edit("  corner: {at: [7, 2, 5 ft 6 in]", "  §corner: {at: [2, 5, 1.1]", ("inside 'ball'",)),
    Edit(
        "  corner: {at: [7, 2, 5 ft 6 in]",
        "  §corner: {at: [2, 5, 1.19]",
        ("40 mm from 'ball'", "50 mm or more"),
    ),
    Edit(
        "  corner: {at: [7, 2, 5 ft 6 in]", "  §corner: {at: [2, 3, 2.01]", ("where 'down shot' comes from",)
    ),
    Edit(
        "  corner: {at: [7, 2, 5 ft 6 in]",
        "  §corner: {at: [7, 2, 1], above: [1, 1]",
        ("at and above are given together",),
    ),
    Edit(
        "  corner: {at: [7, 2, 5 ft 6 in], people",
        "  §corner: {people",
        ("nothing says where", "at, beyond, above, below"),
    ),
    Edit(
        "beyond: north, along: 2.4 m", "beyond: north, along: §24 m", ("past the end of 'north'", "5 m long")
    ),
    Edit("  aisle: {beyond: north, along: 2.4 m", "  §aisle: {beyond: north", ("'along' is missing", "5 m")),
    Edit("beyond: door, height", "beyond: door, along: §1 m, height", ("'along' is not needed",)),
    Edit("at: [-1.5, 3.0, 1.2]", "at: [-1.5, 3.0, 1.2], gap: §1 m", ("'gap' goes with 'beyond'",)),
    Edit("at: [-1.5, 3.0, 1.2]", "at: §[-1.5, 3.0]", ("a position [x, y, z]",)),
    Edit("at: [-1.5, 3.0, 1.2]", "at: §over there", ("a position [x, y, z]",)),
    Edit(
        "  aisle: {beyond: north, along: 2.4 m, people: visitors",
        "  §aisle: {beyond: north, along: 2.4 m",
        ("'people' is missing", "name of the group"),
    ),
]


@pytest.mark.parametrize("edit", [*USE, *PLACES], ids=lambda edit: edit.name)
def test_one_slip_is_one_problem_at_its_place(edit: Edit) -> None:
    check_refused(edit)
