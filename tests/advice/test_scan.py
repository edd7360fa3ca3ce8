"""Scans of a protected side. Kind: limit, hand-worked cases."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from scatterbay.advice.linings import missed
from scatterbay.advice.scan import Scan, Standing, scan, standings_behind
from scatterbay.advice.surfaces import names_of, position_at, scan_points, spoken_point, surface_of
from scatterbay.engine.scene import build_scene
from scatterbay.errors import UsageError
from scatterbay.scenario.make_ups import make_up
from scatterbay.scenario.parts import Opening, Panel, Scenario
from tests.engine.bays import bay

ALL = (Standing("others", 1.0, "others", (0.0, 0.0, 0.0)),)


def scanned(scenario: Scenario, name: str) -> Scan:
    return scan(scenario, surface_of(scenario, name), ALL)


def test_points_stand_off_the_outer_face_and_cover_it() -> None:
    """North: 150 mm of concrete, so 0.45 m beyond the inner face; no two neighbours more than 0.2 m apart."""
    scenario = bay()
    grid = scan_points(scenario, surface_of(scenario, "north"))
    assert grid.position[:, 1] == pytest.approx(4.45)
    assert max(grid.spacing) <= 0.2
    assert grid.on_face.min(axis=0) == pytest.approx((0.02, 0.02))
    assert grid.on_face.max(axis=0) == pytest.approx((4.98, 2.98))
    assert len(grid.position) == grid.shape[0] * grid.shape[1]


def test_words_a_builder_can_use() -> None:
    """North runs from the corner with east, at x = 5, to the one with west."""
    scenario = bay()
    north = surface_of(scenario, "north")
    assert spoken_point(north, (2.35, 1.1)) == "2.35 m from the corner with east, 1.10 m above the floor"
    assert position_at(scenario, north, (2.35, 1.1), 0.3) == pytest.approx((5.0 - 2.35, 4.45, 1.1))


def test_the_worst_point_is_straight_behind_the_source() -> None:
    """Leakage alone, from (1.2, 1.8, 1.1): the nearest point of the wall is the worst."""
    scenario = replace(bay(), bodies=())
    at = scanned(scenario, "west").worst.result.at
    assert at[1] == pytest.approx(1.8, abs=0.11)
    assert at[2] == pytest.approx(1.1, abs=0.11)


def test_a_narrow_weak_spot_is_not_missed() -> None:
    """A duct of 60 mm through a wall of 150 mm of concrete, anywhere, is what the scan's worst point is behind."""
    scenario = replace(bay(), bodies=())
    for u, v in ((0.71, 2.33), (3.37, 0.52)):
        duct = Panel(
            "duct", "north", "north", (u - 0.03, v - 0.03), (u + 0.03, v + 0.03), make_up("gypsum board 1 mm")
        )
        pierced = replace(scenario, room=replace(scenario.room, panels=(duct,)))
        worst, plain = scanned(pierced, "north").worst, scanned(scenario, "north").worst
        assert worst.ratio > 3.0 * plain.ratio
        source = np.array(scenario.beams[0].at)
        place = np.array(worst.result.at)
        share = (4.0 - source[1]) / (place[1] - source[1])
        crossed = source + share * (place - source)
        assert 5.0 - crossed[0] == pytest.approx(u, abs=0.3)
        assert crossed[2] == pytest.approx(v, abs=0.3)


def test_the_edge_of_a_beam_is_not_missed() -> None:
    """East is hit by the beam, 250 mm x 200 mm at 1.3 m: the worst point lies in what it lights there."""
    scenario = bay()
    worst = scanned(scenario, "east").worst
    beam = scenario.beams[0]
    ray = np.array(worst.result.at) - np.array(beam.at)
    axis = np.array(beam.aim) - np.array(beam.at)
    cosine = ray @ axis / np.linalg.norm(ray) / np.linalg.norm(axis)
    assert np.degrees(np.arccos(cosine)) < 8.0


def test_openings_are_told_apart() -> None:
    door = Opening("door", "north", (1.0, 0.0), (2.0, 2.0), make_up("wood 30 mm"), "north")
    scenario = replace(bay(), room=replace(bay().room, openings=(door,)))
    found = scanned(scenario, "north")
    assert found.openings
    through = {p.on_face for p in scanned(scenario, "door").points}
    assert found.openings == through
    assert found.worst.on_face in through


def test_missed_rectangles_hold_the_points_that_miss() -> None:
    scenario = bay()
    tight = replace(scenario.people[0].goals[0], value=2e-6)
    scenario = replace(scenario, people=(replace(scenario.people[0], goals=(tight,)),))
    found = scanned(scenario, "west")
    rectangles = missed(found)
    assert rectangles
    for point, ratio in zip(found.points, found.ratios, strict=True):
        u, v = point.on_face
        held = any(r.low[0] <= u <= r.high[0] and r.low[1] <= v <= r.high[1] for r in rectangles)
        assert held or ratio <= 1.0


def test_who_stands_behind() -> None:
    scenario = bay()
    scene = build_scene(scenario)
    assert {s.place for s in standings_behind(scenario, scene, surface_of(scenario, "north"))} == {"north"}
    with pytest.raises(UsageError, match="lies behind 'south'"):
        standings_behind(scenario, scene, surface_of(scenario, "south"))


def test_names() -> None:
    scenario = bay()
    assert names_of(scenario.room) == ["south", "east", "north", "west", "ceiling"]
    with pytest.raises(UsageError, match="did you mean 'north'"):
        surface_of(scenario, "nroth")
    with pytest.raises(UsageError, match="on the ground"):
        surface_of(scenario, "floor")
