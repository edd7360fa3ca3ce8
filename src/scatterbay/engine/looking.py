"""Places, and what lies between them and everything that radiates."""

from __future__ import annotations

import itertools
from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.bodies import Bodies
from scatterbay.engine.walls import Walls
from scatterbay.scenario.parts import Scenario, SealedSource

Array = NDArray[np.float64]

HEAVY_Z, HEAVY_SHARE = 50, 0.4
"""A layer with this share by mass of elements from this atomic number on counts as a lining."""

BEAM, STORED, TRAVEL, STUCK = "beam", "stored", "travel", "stuck"
"""States that something may be in when it radiates."""

State = tuple[str, str]
"""Name of a beam (or of a source), and its state."""


@dataclass(frozen=True)
class ScenePlace:
    """A place as numbers.

    ``enclosed``: every way to it from where anything radiates leads through a barrier. ``behind``: what lies between
    it and each thing that radiates: open (nothing on some line), lining (a heavy layer, an opening or the edge of a
    panel on some line), or wall.
    """

    name: str
    at: Array
    enclosed: bool
    behind: Mapping[State, str]


def scene_places(scenario: Scenario, walls: Walls, bodies: Bodies) -> tuple[ScenePlace, ...]:
    """Every place of a scenario."""
    room = walls.enclosure
    looks = _looks(scenario, bodies)
    sources = np.concatenate([points for (_, state), points in looks.items() if state != STUCK])
    inside = bool(room.inside(sources).all())
    closed = all(stack for kinds in walls.stacks[: room.floor + 1] for stack in kinds)
    found = []
    for place in scenario.places:
        at = np.array(place.at)
        outside = not bool(room.inside(at[None, :])[0])
        behind = {state: _behind(walls, points, at) for state, points in looks.items()}
        found.append(ScenePlace(place.name, at, outside and closed and inside, behind))
    return tuple(found)


def _looks(scenario: Scenario, bodies: Bodies) -> dict[State, Array]:
    """The points that radiate, by what does so and when."""
    middles = [part.solid.centre for part in bodies.parts]
    looks = {(beam.name, BEAM): np.array([np.array(beam.at), *middles]) for beam in scenario.beams}
    for source in scenario.sources:
        if not isinstance(source, SealedSource):
            continue
        if source.container is not None:
            looks[source.name, STORED] = np.array([source.container.at])
        if source.travel is not None:
            corners = np.array(source.travel.path)
            looks[source.name, TRAVEL] = np.concatenate(
                [np.linspace(a, b, 20) for a, b in itertools.pairwise(corners)]
            )
        if source.stuck is not None:
            looks[source.name, STUCK] = np.array([source.stuck.at])
    return looks


def _behind(walls: Walls, points: Array, place: Array) -> str:
    """What lies on the lines from some points to a place."""
    found = "wall"
    for group in walls.groups(walls.enclosure.crossings(points, place)):
        options = walls.options(group.signature)
        if not all(options):
            return "open"
        edges = any(
            mask & (mask - 1) or mask & walls.opened.get(face, 0) for face, _, mask in group.signature
        )
        if edges or any(_is_heavy(one.fractions) for stack in options for one in stack):
            found = "lining"
    return found


def _is_heavy(fractions: tuple[tuple[int, float], ...]) -> bool:
    return sum(share for z, share in fractions if z >= HEAVY_Z) >= HEAVY_SHARE
