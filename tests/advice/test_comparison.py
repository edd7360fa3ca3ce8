"""Scenarios side by side. Kind: hand-worked cases, limit."""

from __future__ import annotations

from dataclasses import replace

import pytest

from scatterbay.advice.comparison import changed, compare, wall_mass
from scatterbay.advice.linings import Lining, Rectangle, with_lining
from scatterbay.advice.surfaces import surface_of
from scatterbay.scenario import loads
from tests.engine.bays import TEXT, bay


def test_changes_are_values_not_layout() -> None:
    """Comments, order of keys and layout do not count; a value, a new key and a missing key do."""
    other = TEXT.replace("height: 3 m", "height: 3 m   # higher").replace(
        "beam on: 2 h/week", "beam on: 3 h/week"
    )
    other = other.replace("area: public, goals", "goals").replace(
        "title: test bay", "title: test bay\ndrawing: plan 2"
    )
    found = {change.where: (change.before, change.after) for change in changed(TEXT, other)}
    assert found == {
        "workload.shot.beam on": ("2 h/week", "3 h/week"),
        "people.others.area": ("public", ""),
        "drawing": ("", "plan 2"),
    }
    assert changed(TEXT, TEXT) == ()


def test_what_the_walls_weigh() -> None:
    """Concrete of 2.35 g/cm3 and steel of 7.85, lead of 11.35 (as tabulated), by area and thickness.

    South and north 5 x 3 x 0.15 m3, east 4 x 3 x 0.2 of concrete and 1 mm of lead, west 4 x 3 x 0.02 of steel, ceiling
    5 x 4 x 0.12.
    """
    from scatterbay.tables.materials import material

    concrete, steel, lead = (1e3 * material(name).density_g_cm3 for name in ("concrete", "steel", "lead"))
    by_hand = concrete * (2 * 15 * 0.15 + 12 * 0.2 + 20 * 0.12) + steel * 12 * 0.02 + lead * 12 * 0.001
    assert wall_mass(bay()) == pytest.approx(by_hand)


def test_a_lining_weighs_what_it_is() -> None:
    """2 m x 1.5 m of 3 mm of lead: 2 x 1.5 x 0.003 x 11350 = 102 kg more; a patch reaches no farther than its wall."""
    scenario = bay()
    lining = Lining(surface_of(scenario, "north"), Rectangle((1.0, 0.5), (3.0, 2.0)), "inside", "lead", 3e-3)
    assert wall_mass(with_lining(scenario, lining)) - wall_mass(scenario) == pytest.approx(
        2 * 1.5 * 0.003 * 11350, rel=1e-3
    )


def test_options_and_places() -> None:
    thick = loads(TEXT.replace("north: concrete 150 mm", "north: concrete 300 mm"), "thick")
    fewer = replace(bay(), places=bay().places[1:])
    found = compare([bay(), thick, fewer])
    assert [len(option.changes) for option in found.options] == [0, 1, 0]
    north = next(row for row in found.places if row.place == "north")
    one, two, none = north.goals
    assert one is not None
    assert two is not None
    assert two.figure.value < 0.2 * one.figure.value
    assert none is None
    assert north.verdicts[2] == "not there"
    east = next(row for row in found.places if row.place == "east")
    same = [goal.figure.value for goal in east.goals if goal is not None]
    assert same[0] == pytest.approx(same[1], rel=0.02)
