"""Slips in single values: units, numbers, names, and YAML itself."""

from __future__ import annotations

import pytest

from tests.scenario.edits import Edit, check_refused

UNITS = [
    Edit("height: 3 m\n", "height: §3\n", ("'3' has no unit", "'3 mm'")),
    Edit("height: 3 m\n", "height: §3,2 m\n".replace("§3", "3§"), ("comma", "decimal point")),
    Edit("height: 3 m\n", "height: 3 §msv\n", ("'msv'", "mSv")),
    Edit("height: 3 m\n", "height: §3 kV\n", ("a voltage", "a length")),
    Edit("height: 3 m\n", "height: §-3 m\n", ("above zero",)),
    Edit("height: 3 m\n", "height: §0 m\n", ("above zero",)),
    Edit("height: 3 m\n", "height: §3 m +/- 4 m\n", ("tolerance is as large",)),
    Edit("height: 3 m\n", "height: §[3 m]\n", ("a list cannot stand here",)),
    Edit("height: 3 m\n", "height: §yes\n", ("does not start with a number",)),
    Edit("height: 3 m\n", "height: §true\n", ("a truth value cannot stand here",)),
    Edit("height: 3 m\n", "§height:\n", ("no value",)),
    Edit("height: 3 m\n", "height: §.inf\n", ("does not start with a number",)),
    Edit("6 mSv/year, 20", "6 §msv/year, 20", ("'msv' is not a known unit", "did you mean 'mSv'")),
    Edit("20 uSv in an hour", "20 §R in an hour", ("roentgen", "Gy")),
    Edit("20 uSv in an hour", "§20 uSv/h in an hour", ("rate", "a goal is")),
    Edit("20 uSv in an hour", "20 uSv in §a month", ("'a month' is not a time base", "7.5 uSv/h over 8 h")),
    Edit("7.5 uSv/h over 8 h", "7.5 uSv/h over §2 h", ("over 8 h",)),
    Edit("6 mSv/year, 20", "§6 mSv, 20", ("an ambient dose equivalent", "6 mSv/year")),
    Edit("6 mSv/year, 20", "§0 mSv/year, 20", ("above zero",)),
    Edit("goals: 1 mSv/year", "goals: §[]", ("no goal",)),
    Edit("goals: 1 mSv/year", "goals: [1 mSv/year, §2 mSv/year]", ("both goals for the same",)),
    Edit("1.25 mGy/h at 2 m", "§1.25 mGy/h", ("no distance", "at 1 m")),
    Edit("1.25 mGy/h at 2 m", "§1.25 mGy at 2 m", ("an air kerma", "an air kerma rate")),
    Edit("9.8 mGy m2/(mA min) +/- 8 %", "9.8 mGy m2/mA §min", ("two ways", "parentheses")),
    Edit(
        "9.8 mGy m2/(mA min) +/- 8 %", "§9.8 mSv m2/(mA min)", ("Sv is dose equivalent and Gy is air kerma",)
    ),
    Edit("9.8 mGy m2/(mA min) +/- 8 %", "9.8 mGy m2/(mA min) at §1 m", ("needs no distance",)),
    Edit("0.05 mGy/mAs at 1 m", "§0.05 mGy/mAs", ("no distance",)),
    Edit("225 kV", "225 §kVp", ("constant potential", "kV")),
    Edit("225 kV", "§225 keV", ("an energy", "one photon")),
    Edit("current: 4 mA", "current: §4", ("'4 mA'",)),
    Edit("2.41 g/cm3", "§2.41", ("g/cm3",)),
    Edit("2.41 g/cm3", "§2410 g/cm3", ("denser than anything",)),
    Edit("2.41 g/cm3", "§0 g/cm3", ("above zero",)),
    Edit("100 Ci", "§100 Hz".replace("§100 ", "100 §"), ("'Hz' is not a known unit",)),
]

NAMES = [
    Edit(
        "east: concrete 300 mm + lead 2 mm",
        "east: concrete 300 mm + §led 2 mm",
        ("'led'", "'lead'", "gypsum board"),
    ),
    Edit("west: concrete 300 mm", "west: §2 mm lead", ("material comes first", "'lead 2 mm'")),
    Edit("west: concrete 300 mm", "west: §concrete", ("no thickness", "'concrete 2 mm'")),
    Edit("west: concrete 300 mm", "west: §300 mm", ("names no material",)),
    Edit("west: concrete 300 mm", "west: concrete §0 mm", ("above zero",)),
    Edit("west: concrete 300 mm", "west: concrete §-300 mm", ("above zero",)),
    Edit("west: concrete 300 mm", "west: concrete §300 m", ("not a believable thickness", "check the unit")),
    Edit("west: concrete 300 mm", "west: concrete §300 mm +/- 0.4 m", ("as large as the thickness",)),
    Edit("west: concrete 300 mm", "west: concrete §300", ("'300 mm'",)),
    Edit("west: concrete 300 mm", "west: concrete 300 mm +§", ("a layer is missing",)),
    Edit("east: concrete 300 mm + lead 2 mm", "east: own mix §300", ("'300 mm'",)),
    Edit(
        "storey above: 3.6 m",
        "storey above: 3.6 m\n  §celing: lead 2 mm",
        ("'celing'", "did you mean 'ceiling'"),
    ),
    Edit("title: Everything at once", "§titel: Everything at once", ("'titel'", "did you mean 'title'")),
    Edit("drawing: none", "§<<: {a: 1}\ndrawing: none", ("'<<' is not a key here",)),
    Edit("current: 4 mA", "§currrent: 4 mA", ("did you mean 'current'",)),
    Edit("use factor: 1/4", "§usefactor: 1/4", ("did you mean 'use factor'",)),
    Edit("sealed source: Ir-192", "sealed source: §Ir192", ("'Ir192'", "did you mean 'Ir-192'")),
    Edit("sealed source: Ir-192", "sealed source: §Ra-226", ("'Ra-226' is not a nuclide", "Co-60")),
    Edit(
        "  capsule: {sealed source",
        "  capsule: §{sealed sorce",
        ("nothing says what this source is", "'sealed sorce'"),
    ),
    Edit(
        "  other set: {x-ray tube: 120 kV",
        "  other set: §{x-ray tube: 120 kV, sealed source: Co-60",
        ("not both",),
    ),
    Edit("shape: sphere", "shape: §spere", ("'spere' is not a shape", "did you mean 'sphere'")),
    Edit("  ball: {shape: sphere, ", "  ball: §{", ("'shape' is missing", "box")),
    Edit("material: steel, outer", "material: §stel, outer", ("'stel'", "did you mean 'steel'")),
    Edit("filled with: water", "filled with: §wter", ("did you mean 'water'",)),
    Edit("housing: tungsten", "housing: §tungstn", ("did you mean 'tungsten'",)),
    Edit("source: capsule", "source: §capsul", ("no source 'capsul'", "did you mean 'capsule'")),
    Edit("aim: pipe", "aim: §pip", ("no body, place or direction 'pip'", "did you mean 'pipe'")),
    Edit("people: apprentices", "people: §aprentices", ("no group of people", "did you mean 'apprentices'")),
    Edit("beyond: north", "beyond: §nort", ("no side", "did you mean 'north'")),
    Edit("in: west", "in: §wets", ("no side, screen or opening 'wets'", "did you mean 'west'")),
    Edit("[down shot, weld shot]", "[down shot, §wled shot]", ("no beam", "did you mean 'weld shot'")),
    Edit("[down shot, weld shot]", "§[down shot]", ("two or more",)),
    Edit("[down shot, weld shot]", "§[down shot, down shot]", ("two or more",)),
    Edit("[down shot, weld shot]", "§[down shot, {weld: shot}]", ("two or more",)),
    Edit("area: public", "area: §publik", ("did you mean 'public'", "supervised")),
    Edit("object: in the beam", "object: §in beam", ("'in beam'", "left out")),
    Edit("primary by: plane", "primary by: §plan", ("did you mean 'plane'", "lit patch")),
    Edit("seed: 7", "seed: §-1", ("'-1'", "greater than or equal to 0")),
    Edit("seed: 7", "seed: §1.5", ("'1.5'", "integer")),
    Edit("format: 1", "format: §2", ("'2'", "1")),
    Edit("  own mix: {mass", "  §own mix: {formula: H2O, mass", ("both mass fractions and a formula",)),
    Edit("  scheelite: {formula: CaWO4, ", "  §scheelite: {", ("no composition",)),
    Edit("formula: CaWO4", "formula: CaW§·O4", ("'·' cannot stand in a formula",)),
    Edit("formula: CaWO4", "formula: Ca§Wo4", ("'Wo' is not the symbol",)),
    Edit("Ca: 0.25", "§Cx: 0.25".replace("§Cx: ", "Cx: §"), ("'Cx' is not the symbol",)),
    Edit("mass fractions: {Ca: 0.25", "mass fractions: §{Ca: 0.35", ("add up to 1.1",)),
    Edit("mass fractions: {Ca: 0.25", "mass fractions: {Ca: §-0.25", ("above 0",)),
    Edit(
        "  scheelite: {",
        "  §lead: {formula: Pb, density: 11 g/cm3}\n  scheelite: {",
        ("'lead' is already known",),
    ),
    Edit(
        "  scheelite: {",
        "  §2 mix: {formula: Pb, density: 11 g/cm3}\n  scheelite: {",
        ("cannot name a material",),
    ),
    Edit(
        "  scheelite: {",
        "  §a + b: {formula: Pb, density: 11 g/cm3}\n  scheelite: {",
        ("cannot name a material",),
    ),
    Edit(
        "  corner: {",
        f"  §{'x' * 61}: {{at: [12, 2, 1], people: staff}}\n  corner: {{",
        ("cannot be a name", "60"),
    ),
    Edit("  corner: {", "  §' corner': {at: [12, 2, 1], people: staff}\n  corner: {", ("cannot be a name",)),
    Edit("  corner: {", "  §ball: {at: [12, 2, 1], people: staff}\n  corner: {", ("is a body as well",)),
    Edit(
        "    window: {",
        "    §west: {in: south, from: 0 m, width: 1 m, height: 1 m, make-up: open}\n    window: {",
        ("'west' is already one of the sides",),
    ),
]

YAML = [
    Edit(
        "  staff: {area: controlled", "  staff: {area: controlled, §area: public", ("'area' is given twice",)
    ),
    Edit(
        "  check: {beam on",
        "  §down shot: {beam on: 1 h/week}\n  check: {beam on",
        ("'down shot' is given twice", "line 65"),
    ),
    Edit("  height: 3 m", "§\theight: 3 m", ("a tab",)),
    Edit("title: Everything at once", "title: Everything§: at once", ("a ':' that does not fit",)),
    Edit("title: Everything at once", "title: §!!python/name:os.system Everything", ("the tag",)),
    Edit("title: Everything at once", "title: §*nothing", ("an alias",)),
    Edit("title: Everything at once", "title: §@home", ("cannot start a word",)),
    Edit("title: Everything at once", "title: §{a: b}", ("a mapping cannot stand here",)),
    Edit("format: 1", "§[1, 2]: 3\nformat: 1", ("a name must be a piece of text",)),
    Edit("notes:\n", "---\nnotes:\n".replace("---", "§---"), ("more than one document",)),
    Edit("Everything at once", "Everything §\x07", ("U+0007", "UTF-8")),
]


@pytest.mark.parametrize("edit", [*UNITS, *NAMES, *YAML], ids=lambda edit: edit.name)
def test_one_slip_is_one_problem_at_its_place(edit: Edit) -> None:
    check_refused(edit)
