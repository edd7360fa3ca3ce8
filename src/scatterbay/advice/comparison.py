"""Several scenarios side by side: what differs in the input, what that does to each place, and what it weighs."""

from __future__ import annotations

import itertools
from collections.abc import Sequence
from dataclasses import dataclass

import yaml

from scatterbay.engine.contributions import contributions
from scatterbay.engine.fabric import fabric_of
from scatterbay.engine.scene import build_scene
from scatterbay.exposure.assess import assess
from scatterbay.exposure.results import BELOW, Assessment, GoalResult
from scatterbay.geometry.outline import signed_area
from scatterbay.scenario.parts import Scenario
from scatterbay.tables.materials import Material


@dataclass(frozen=True)
class Change:
    """A value of the file that differs from the first scenario's: where it stands, before and after, as text.

    Empty text stands for a value that is not there.
    """

    where: str
    before: str
    after: str


@dataclass(frozen=True)
class Option:
    """One of the scenarios: its assessment, its changes against the first, and what its walls weigh [kg]."""

    scenario: Scenario
    assessment: Assessment
    changes: tuple[Change, ...]
    mass: float

    @property
    def meets_all(self) -> bool:
        """Is every place below its goals?"""
        return self.assessment.worst == BELOW


@dataclass(frozen=True)
class PlaceRow:
    """A place across the options: its deciding goal in each, None where an option lacks the place or has no goal."""

    place: str
    goals: tuple[GoalResult | None, ...]
    verdicts: tuple[str, ...]


@dataclass(frozen=True)
class Comparison:
    """The options, the first being what the others are compared with, and the places of all of them."""

    options: tuple[Option, ...]
    places: tuple[PlaceRow, ...]


def compare(scenarios: Sequence[Scenario]) -> Comparison:
    """Assess scenarios and set them side by side."""
    options = tuple(_option(one, scenarios[0]) for one in scenarios)
    names = list(dict.fromkeys(place.name for option in options for place in option.assessment.places))
    return Comparison(options, tuple(_row(name, options) for name in names))


def _option(scenario: Scenario, first: Scenario) -> Option:
    scene = build_scene(scenario)
    found = assess(scenario, scene, contributions(scene))
    changes = () if scenario is first else changed(first.text, scenario.text)
    return Option(scenario, found, changes, wall_mass(scenario))


def _row(name: str, options: Sequence[Option]) -> PlaceRow:
    goals: list[GoalResult | None] = []
    verdicts = []
    for option in options:
        place = next((p for p in option.assessment.places if p.name == name), None)
        goals.append(max(place.goals, key=lambda g: g.figure.high / g.goal, default=None) if place else None)
        verdicts.append(place.verdict if place else "not there")
    return PlaceRow(name, tuple(goals), tuple(verdicts))


def changed(before: str, after: str) -> tuple[Change, ...]:
    """Values that differ between two scenario texts, by where they stand; comments and layout do not count."""
    one, two = (
        _flat(yaml.compose(before, Loader=yaml.SafeLoader)),
        _flat(yaml.compose(after, Loader=yaml.SafeLoader)),
    )
    found = []
    for where in dict.fromkeys([*one, *two]):
        if one.get(where) != two.get(where) and not where.startswith("variants."):
            found.append(Change(where, one.get(where, ""), two.get(where, "")))
    return tuple(found)


def _flat(node: yaml.Node | None, path: str = "") -> dict[str, str]:
    """Values by their path, lists of plain values as one text."""
    if isinstance(node, yaml.MappingNode):
        found: dict[str, str] = {}
        for key, value in node.value:
            found |= _flat(value, f"{path}.{key.value}" if path else str(key.value))
        return found
    if isinstance(node, yaml.SequenceNode):
        return {path: _listed(node)}
    return {path: str(node.value)} if node is not None else {}


def _listed(node: yaml.Node) -> str:
    if isinstance(node, yaml.SequenceNode):
        return "[" + ", ".join(_listed(item) for item in node.value) + "]"
    return str(node.value) if isinstance(node, yaml.ScalarNode) else "..."


def wall_mass(scenario: Scenario) -> float:
    """What sides, ceiling, screens, openings and panels weigh [kg], at the thickness and density that count.

    The floor on the ground is left out; corners are not counted twice.
    """
    defined = [
        Material.from_symbols(m.name, m.density_g_cm3, m.mass_fractions, "defined in the scenario")
        for m in scenario.materials
    ]
    fabric, room = fabric_of(scenario.room, defined), scenario.room
    total = 0.0
    for number, stacks in enumerate(fabric.stacks):
        name = fabric.names[number]
        if name == "floor" and room.floor_on_ground:
            continue
        weights = [1e3 * sum(s.density_g_cm3 * s.thickness for s in stack) for stack in stacks]
        width, height, area = _size(scenario, number)
        if number not in fabric.cells:
            total += weights[0] * area
            continue
        cells = fabric.cells[number]
        across = _lengths(cells.first.tolist(), *width)
        upward = _lengths(cells.second.tolist(), *height)
        share = area / ((width[1] - width[0]) * (height[1] - height[0]))
        for i, x in enumerate(across):
            for j, y in enumerate(upward):
                total += share * weights[int(cells.kinds[i, j])] * x * y
    return total


def _size(scenario: Scenario, number: int) -> tuple[tuple[float, float], tuple[float, float], float]:
    """Extent of a face in its two coordinates [m], and its area [m2]."""
    room = scenario.room
    if number < len(room.sides):
        side = room.sides[number]
        length = ((side.end[0] - side.start[0]) ** 2 + (side.end[1] - side.start[1]) ** 2) ** 0.5
        return (0.0, length), (0.0, room.height), length * room.height
    if number < len(room.sides) + 2:
        x, y = zip(*room.corners, strict=True)
        return (min(x), max(x)), (min(y), max(y)), abs(signed_area(room.corners))
    screen = room.screens[number - len(room.sides) - 2]
    length = ((screen.end[0] - screen.start[0]) ** 2 + (screen.end[1] - screen.start[1]) ** 2) ** 0.5
    return (0.0, length), (screen.bottom, screen.top), length * (screen.top - screen.bottom)


def _lengths(edges: Sequence[float], low: float, high: float) -> list[float]:
    """Length of each cell within an extent."""
    bounds = [low, *(min(max(float(e), low), high) for e in edges), high]
    return [after - before for before, after in itertools.pairwise(bounds)]
