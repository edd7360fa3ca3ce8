"""Slips in the room and in what stands in it."""

from __future__ import annotations

import pytest

from tests.scenario.edits import Edit, check_refused

ROOM = [
    Edit(
        "[8, 0], [8, 3]",
        "§[8, 0], [8, 0]".replace("§[8, 0], ", "[8, 0], §"),
        ("corners 2 and 3 are the same point",),
    ),
    Edit("corners: [[0, 0], [8, 0]", "corners: [[0, 0], [8, §x]", ("does not start with a number",)),
    Edit("corners: [[0, 0], [8, 0]", "corners: [[0, 0], [§8000, 0]", ("more than 200 m away", "'8000 mm'")),
    Edit("corners: [[0, 0], [8, 0]", "corners: [[0, 0], [§.nan, 0]", ("finite",)),
    Edit("corners: [[0, 0], [8, 0]", "corners: [[0, 0], §[8, 0, 0]", ("a position [x, y]",)),
    Edit(
        "  sides:\n",
        "  §sides:\n    extra: lead 2 mm\n",
        ("7 sides are given for 6 corners", "corner 1 to corner 2"),
    ),
    Edit(
        "    inner north: concrete 12 in\n",
        "    §inner south: concrete 12 in\n",
        ("'inner south' faces north", "north"),
    ),
    Edit("storey above: 3.6 m", "storey above: §3.1 m", ("inside or under the ceiling", "3.2 m")),
    Edit("storey below: 3.4 m", "storey below: §0.34 m", ("no room to stand",)),
    Edit("floor: concrete 250 mm", "floor: §open", ("'open' makes no sense",)),
    Edit(
        "from: 0.6 m, width: 1.2 m", "from: 5 m, width: §1.2 m", ("ends 6.2 m along 'west'", "6.096 m long")
    ),
    Edit("width: 1.2 m, height: 2.1 m", "width: 1.2 m, height: §3.1 m", ("above the ceiling",)),
    Edit("from: 0.6 m", "from: §-0.6 m", ("must not be negative",)),
    Edit(
        "    window: {",
        "    §flap: {in: west, from: 1 m, width: 1 m, height: 10 cm, make-up: open}\n    window: {",
        ("'flap' overlaps 'door' in 'west'",),
    ),
    Edit(
        "  skylight: {in: ceiling, from: [2, 2]",
        "  §skylight: {in: ceiling, from: [6, 4]",
        ("beyond the outline",),
    ),
    Edit(
        "skylight: {in: ceiling, from: [2, 2], to: [1, 1]",
        "skylight: {in: ceiling, from: [2, 2], to: §[2, 1]",
        ("no size",),
    ),
    Edit("from: [1, 1], to: [2.5, 1]", "from: [1, 1], to: §[1, 1]", ("no length",)),
    Edit("bottom: 0 m, top: 2 m", "bottom: 2 m, top: §2 m", ("not above its bottom",)),
    Edit("bottom: 0 m, top: 2 m", "bottom: 0 m, top: §3.2 m", ("above the ceiling",)),
    Edit("top: 2 m, make-up: lead 2 mm", "top: 2 m, make-up: §open", ("stops nothing",)),
]

THINGS = [
    Edit("wall: 12.7 mm", "wall: §162 mm", ("leaves no bore", "cylinder")),
    Edit("size: [0.3, 200 mm, 0.5]", "size: [0.3, §0, 0.5]", ("above zero",)),
    Edit("size: [0.3, 200 mm, 0.5]", "size: §[0.3, 0.5]", ("a list of sizes [x, y, z]",)),
    Edit("facing: [0, 2, 0]", "facing: §[0, 0, 0]", ("zero length",)),
    Edit("along: north", "along: §northish", ("not a direction", "north")),
    Edit(
        "  ball: {shape: sphere, material: water, diameter: 30 cm, centre: [2, 5, 1]}",
        "  §ball: {shape: sphere, material: water, diameter: 30 cm, centre: [3.1, 2.2, 1.2]}",
        ("'ball' overlaps 'pipe' in part", "wholly inside"),
    ),
    Edit(
        "  core: {shape: cylinder, material: scheelite, diameter: 20 mm",
        "  §core: {shape: cylinder, material: scheelite, diameter: 310 mm",
        ("'core' overlaps 'pipe' in part",),
    ),
    Edit(
        "  block: {shape: box, material: steel, size: [0.3, 200 mm, 0.5], centre: [7, 1, 0.25]",
        "  §block: {shape: box, material: steel, size: [0.3, 200 mm, 0.5], centre: [7, 1, 0.2]",
        ("out of the room",),
    ),
    Edit(
        "  block: {shape: box, material: steel, size: [0.3, 200 mm, 0.5], centre: [7, 1, 0.25]",
        "  §block: {shape: box, material: steel, size: [0.3, 200 mm, 0.5], centre: [9, 1, 0.25]",
        ("out of the room",),
    ),
    Edit(
        "centre: [4, 5, 1], facing: [0, 2, 0]",
        "centre: [5, 2.9, 1], facing: [1, 0, 0]",
        ("'sheet' reaches out of the room",),
        where="sheet:",
    ),
    Edit(  # a corner of the wall pokes 20 mm into a face
        "size: [0.3, 200 mm, 0.5], centre: [7, 1, 0.25], turned: 30 deg",
        "size: [2, 200 mm, 0.5], centre: [5.0318, 2.855, 0.25], turned: -45 deg",
        ("'block' reaches out of the room",),
        where="block:",
    ),
    Edit("225 kV", "§500 kV", ("outside the model", "40 to 450 kV"), 3),
    Edit("225 kV", "§30 kV", ("outside the model",), 3),
    Edit("anode angle: 22 deg", "anode angle: §95 deg", ("not an anode angle",)),
    Edit(
        "  other set: {x-ray tube: 120 kV, ",
        "  §other set: {x-ray tube: 120 kV, filtration: aluminium 3 mm, ",
        ("both a filtration and a half-value layer",),
    ),
    Edit(
        "    filtration: aluminium 3 mm + copper 0.5 mm\n",
        "    half-value layer: §aluminium 3 mm + copper 0.5 mm\n",
        ("more than one layer",),
    ),
    Edit(
        "  other set: {x-ray tube: 120 kV, current: 10 mA, half-value layer: aluminium 4.1 mm",
        "  §other set: {x-ray tube: 120 kV, current: 10 mA",
        ("how the beam is filtered",),
    ),
    Edit("on: 2026-03-01", "on: §2026-13-01", ("not a date", "2026-03-01")),
    Edit("on: 2026-03-01", "on: §1/3/2026", ("not a date",)),
    Edit("assessed on: 2026-06-01", "assessed on: §2025-06-01", ("before the date of the activity",)),
    Edit("on: 2026-03-01, assessed on: 2026-06-01", "assessed on: §2026-06-01", ("add 'on:",)),
    Edit("leakage: none}", "leakage: none, housing: §lead}", ("no leakage that it hardens",)),
]


@pytest.mark.parametrize("edit", [*ROOM, *THINGS], ids=lambda edit: edit.name)
def test_one_slip_is_one_problem_at_its_place(edit: Edit) -> None:
    check_refused(edit)
