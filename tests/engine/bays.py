"""Small bays as scenarios, and ways to turn, mirror, move and cut them."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import replace

import numpy as np

from scatterbay.engine.contributions import Contributions, contributions
from scatterbay.engine.scene import build_scene
from scatterbay.scenario import loads
from scatterbay.scenario.parts import Point, Scenario, Side

TEXT = """
format: 1
title: test bay
room:
  corners: [[0, 0], [5, 0], [5, 4], [0, 4]]
  height: 3 m
  sides: {south: concrete 150 mm, east: concrete 200 mm + lead 1 mm, north: concrete 150 mm, west: steel 20 mm}
  ceiling: concrete 120 mm
  floor: on the ground
bodies:
  block: {shape: box, material: water, size: [0.3, 0.3, 0.4], centre: [2.5, 2.0, 1.0], turned: 20 deg}
sources:
  set: {x-ray tube: 150 kV, current: 5 mA, filtration: aluminium 3 mm, leakage: 1 mGy/h at 1 m}
beams:
  shot: {source: set, at: [1.2, 1.8, 1.1], aim: block, field: 250 mm x 200 mm at 1.3 m}
workload:
  shot: {beam on: 2 h/week}
people:
  others: {area: public, goals: [0.3 mSv/year]}
places:
  north: {at: [2.0, 4.8, 1.2], people: others, occupancy: 1}
  east: {at: [5.7, 2.1, 1.1], people: others, occupancy: 1}
  beside: {at: [5.7, 3.3, 1.1], people: others, occupancy: 1}
  west: {at: [-0.8, 1.0, 1.2], people: others, occupancy: 1}
  above: {at: [2.5, 2.5, 3.9], people: others, occupancy: 1}
"""


def bay(**changes: str) -> Scenario:
    """The test bay; ``old=new`` pairs of text are replaced (underscores stand for spaces in the old text)."""
    text = TEXT
    for old, new in changes.items():
        assert old.replace("_", " ") in text
        text = text.replace(old.replace("_", " "), new)
    return loads(text, "test bay")


def computed(scenario: Scenario) -> Contributions:
    """All contributions of a scenario."""
    return contributions(build_scene(scenario))


def moved(
    scenario: Scenario, at: Callable[[Point], Point], turn: float = 0.0, mirror: bool = False
) -> Scenario:
    """The scenario with every point sent through ``at``, which turns by ``turn`` [rad] and may mirror x."""

    def plan(point: tuple[float, float]) -> tuple[float, float]:
        x, y, _ = at((*point, 0.0))
        return x, y

    def along(vector: Point) -> Point:
        zero = at((0.0, 0.0, 0.0))
        x, y, z = (a - b for a, b in zip(at(vector), zero, strict=True))
        return x, y, z

    room = scenario.room
    sides = [replace(s, start=plan(s.start), end=plan(s.end)) for s in room.sides]
    corners = [plan(c) for c in room.corners]
    if mirror:
        sides = [Side(s.name, s.end, s.start, s.make_up) for s in sides[::-1]]
        corners = [s.start for s in sides]
    bodies = [
        replace(b, centre=at(b.centre), axis=along(b.axis), turned=(-b.turned if mirror else b.turned) + turn)
        for b in scenario.bodies
    ]
    return replace(
        scenario,
        room=replace(room, corners=tuple(corners), sides=tuple(sides)),
        bodies=tuple(bodies),
        beams=tuple(replace(b, at=at(b.at), aim=at(b.aim)) for b in scenario.beams),
        places=tuple(replace(p, at=at(p.at)) for p in scenario.places),
    )


def rotated(scenario: Scenario, angle: float) -> Scenario:
    """Turned about the vertical."""
    c, s = math.cos(angle), math.sin(angle)
    return moved(scenario, lambda p: (c * p[0] - s * p[1], s * p[0] + c * p[1], p[2]), angle)


def mirrored(scenario: Scenario) -> Scenario:
    """Seen in a mirror that stands on the y axis."""
    return moved(scenario, lambda p: (-p[0], p[1], p[2]), 0.0, mirror=True)


def shifted(scenario: Scenario, dx: float, dy: float) -> Scenario:
    """Moved in the plan."""
    return moved(scenario, lambda p: (p[0] + dx, p[1] + dy, p[2]))


def cut_side(scenario: Scenario, name: str, share: float) -> Scenario:
    """One side cut into two collinear ones."""
    sides: list[Side] = []
    for side in scenario.room.sides:
        if side.name != name:
            sides.append(side)
            continue
        middle = tuple(float(a + share * (b - a)) for a, b in zip(side.start, side.end, strict=True))
        assert len(middle) == 2
        sides += [
            Side(f"{name} 1", side.start, middle, side.make_up),
            Side(f"{name} 2", middle, side.end, side.make_up),
        ]
    room = replace(scenario.room, sides=tuple(sides), corners=tuple(s.start for s in sides))
    return replace(scenario, room=room)


def compare(one: Contributions, other: Contributions, exact: float = 1e-9) -> None:
    """Rows without a walk agree exactly, scatter within three standard errors of the difference."""
    assert [(r.place, r.beam, r.path, r.order) for r in one.rows] == [
        (r.place, r.beam, r.path, r.order) for r in other.rows
    ]
    for a, b in zip(one.rows, other.rows, strict=True):
        first, second = a.values.mean(axis=0), b.values.mean(axis=0)
        if a.path == "scatter":
            variance = a.values.var(axis=0, ddof=1) + b.values.var(axis=0, ddof=1)
            error = np.sqrt(variance / len(a.values))
            assert (np.abs(first - second) <= 3.5 * error).all(), (a.place, a.order, first / second)
        else:
            assert np.allclose(first, second, rtol=exact, atol=0.0), (a.place, a.path, first / second)
