"""A scene: a checked scenario as numbers, faces, bodies and beams, ready to be computed."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.barriers.makeup import SMALLEST_SHARE, Sheets, sheet
from scatterbay.engine.arrive import Surroundings
from scatterbay.engine.bodies import VOID, Bodies, Part
from scatterbay.engine.energies import Ladder, ladder
from scatterbay.engine.fields import BeamField
from scatterbay.engine.leakage import LeakingHousing, leaking_housing
from scatterbay.engine.media import Matter
from scatterbay.engine.sources import Output, output_of
from scatterbay.engine.walls import Walls
from scatterbay.geometry.bodies import solids
from scatterbay.geometry.enclosure import SOLID, Enclosure, Hole, Upright
from scatterbay.geometry.solids import relation
from scatterbay.physics.medium import medium
from scatterbay.physics.spectrum import Spectrum
from scatterbay.scenario.parts import Assumption, Beam, Field, MakeUp, Scenario
from scatterbay.tables.materials import Material, material

Array = NDArray[np.float64]

GROUND = ("earth", 3.0)
"""What stands for the ground under a floor that lies on it."""


HEAVY_Z, HEAVY_SHARE = 50, 0.4
"""A layer with this share by mass of elements from this atomic number on counts as a lining."""


@dataclass(frozen=True)
class SceneBeam:
    """A beam as numbers.

    ``spectrum``: per steradian and unit of output (coulomb or decay). ``drive``: output per second while on.
    """

    name: str
    source: str
    origin: Array
    field: BeamField
    spectrum: Spectrum
    drive: float
    leakage: LeakingHousing | None
    bodies_count: bool


@dataclass(frozen=True)
class ScenePlace:
    """A place as numbers.

    ``enclosed``: every way to it from inside the room leads through a barrier. ``behind``: what lies between it
    and the sources: open (nothing on some line), lining (a heavy layer or an opening on some line), or wall.
    """

    name: str
    at: Array
    enclosed: bool
    behind: str


@dataclass(frozen=True)
class Scene:
    """Everything the engine computes with."""

    around: Surroundings
    beams: tuple[SceneBeam, ...]
    places: tuple[ScenePlace, ...]
    seed: int
    primary_by_plane: bool
    assumptions: tuple[Assumption, ...]


def build_scene(scenario: Scenario) -> Scene:
    """The scene of a checked scenario.

    Raises
    ------
    OutOfRangeError : a spectrum, leakage or energy outside the models.
    """
    defined = [
        Material.from_symbols(m.name, m.density_g_cm3, m.mass_fractions, "defined in the scenario")
        for m in scenario.materials
    ]
    outputs = {source.name: output_of(source, defined) for source in scenario.sources}
    make_ups, holes = _sheets(scenario, defined)
    rungs = ladder(_edges([*make_ups, *(s for found in holes.values() for s in found)], scenario, defined))
    bodies = _bodies(scenario, defined, rungs)
    room = _enclosure(scenario, make_ups)
    walls = Walls(room, make_ups, holes, rungs)
    closed = all(make_ups[: room.floor + 1]) and all(s for found in holes.values() for s in found)
    looks = [np.array(beam.at) for beam in scenario.beams] + [part.solid.centre for part in bodies.parts]
    places = tuple(
        ScenePlace(
            p.name, np.array(p.at), _outside(room, p.at) and closed, _behind(walls, looks, np.array(p.at))
        )
        for p in scenario.places
    )
    beams = tuple(_beam(beam, outputs[beam.source], scenario, defined) for beam in scenario.beams)
    assumptions = (*(a for output in outputs.values() for a in output.assumptions), *_general(beams))
    return Scene(
        Surroundings(bodies, walls, rungs), beams, places, scenario.options.seed, scenario.options.primary_by_plane,
        assumptions,
    )  # fmt: skip


def _general(beams: Iterable[SceneBeam]) -> tuple[Assumption, ...]:
    """What holds for every bay."""
    notes = [
        Assumption(
            "air", "The air between source, bodies and places is left out: a few per cent either way."
        ),
        Assumption(
            "stray radiation",
            "Scatter and leakage are taken to flood a barrier: its transmission is that of an unbounded plane.",
        ),
    ]
    housed = [beam for beam in beams if beam.leakage is not None]
    for name, housing in {b.source: b.leakage for b in housed if b.leakage is not None}.items():
        notes.append(
            Assumption(
                "leakage",
                f"source '{name}': the stated leakage goes evenly in all directions, hardened by "
                f"{1e3 * housing.thickness:.3g} mm of {housing.material.name}, whenever a beam is on",
            )
        )
    return tuple(notes)


def _outside(room: Enclosure, at: Sequence[float]) -> bool:
    return not bool(room.inside(np.array([at]))[0])


def _behind(walls: Walls, looks: list[Array], place: Array) -> str:
    """What lies on the lines from the sources and bodies to a place."""
    start = np.array(looks)
    found = "wall"
    for group in walls.groups(walls.enclosure.crossings(start, place)):
        options = walls.options(group.signature)
        if not all(options):
            return "open"
        opened = any(mask != SOLID for _, _, mask in group.signature)
        if opened or any(_is_heavy(one.fractions) for stack in options for one in stack):
            found = "lining"
    return found


def _is_heavy(fractions: tuple[tuple[int, float], ...]) -> bool:
    return sum(share for z, share in fractions if z >= HEAVY_Z) >= HEAVY_SHARE


def _layers(make_up: MakeUp, defined: Iterable[Material]) -> Sheets:
    return tuple(sheet(layer.material, layer.thickness.value, defined) for layer in make_up.layers)


def _sheets(
    scenario: Scenario, defined: list[Material]
) -> tuple[list[Sheets], dict[int, tuple[Sheets, ...]]]:
    """Sheets by face number, and those of the holes in each face."""
    room = scenario.room
    floor = (sheet(*GROUND),) if room.floor_on_ground else _layers(room.floor, defined)
    make_ups = [
        *(_layers(side.make_up, defined) for side in room.sides),
        _layers(room.ceiling, defined),
        floor,
    ]
    make_ups += [_layers(screen.make_up, defined) for screen in room.screens]
    numbers = _face_numbers(scenario)
    holes: dict[int, tuple[Sheets, ...]] = {}
    for opening in room.openings:
        face = numbers[opening.host]
        holes[face] = (*holes.get(face, ()), _layers(opening.make_up, defined))
    return make_ups, holes


def _face_numbers(scenario: Scenario) -> dict[str, int]:
    names = [side.name for side in scenario.room.sides]
    return {name: number for number, name in enumerate([*names, "ceiling", "floor"])}


def _enclosure(scenario: Scenario, make_ups: list[Sheets]) -> Enclosure:
    room, numbers = scenario.room, _face_numbers(scenario)
    holes: dict[int, tuple[Hole, ...]] = {}
    for opening in room.openings:
        face = numbers[opening.host]
        holes[face] = (*holes.get(face, ()), Hole(opening.low, opening.high))
    thickness = [sum(one.thickness for one in sheets) for sheets in make_ups]
    screens = tuple(Upright(s.start, s.end, s.bottom, s.top) for s in room.screens)
    return Enclosure(np.array(room.corners), room.height, thickness, holes, screens)


def _edges(stacks: Iterable[Sheets], scenario: Scenario, defined: list[Material]) -> list[float]:
    """K edges of everything in the scene that matters."""
    named = [body.material for body in scenario.bodies] + [b.inside for b in scenario.bodies if b.inside]
    fractions = {one.fractions for stack in stacks for one in stack}
    fractions |= {material(name, defined).fractions for name in named}
    found = set()
    for mixture in fractions:
        for z, edge in medium(mixture).k_edges_kev.items():
            if dict(mixture)[z] >= SMALLEST_SHARE:
                found.add(edge)
    return sorted(found)


def _bodies(scenario: Scenario, defined: list[Material], rungs: Ladder) -> Bodies:
    matters: list[Matter] = []
    numbers: dict[str, int] = {}

    def number(name: str | None) -> int:
        if name is None:
            return VOID
        if name not in numbers:
            found = material(name, defined)
            numbers[name] = len(matters)
            matters.append(Matter(medium(found.fractions), found.density_g_cm3, rungs))
        return numbers[name]

    found = []
    for body in scenario.bodies:
        shapes = solids(body.shape, body.centre, body.sizes, body.axis, body.turned)
        found.append((shapes[0], number(body.material)))
        found += [(inner, number(body.inside)) for inner in shapes[1:]]
    parents = [_parent(k, [solid for solid, _ in found]) for k in range(len(found))]
    parts = [
        Part(solid, matter, parents[k], _outermost(k, parents)) for k, (solid, matter) in enumerate(found)
    ]
    return Bodies(tuple(parts), tuple(matters))


def _parent(k: int, shapes: list) -> int | None:  # type: ignore[type-arg]
    """The smallest solid around the k-th."""
    around = [j for j, other in enumerate(shapes) if j != k and relation(shapes[k], other) == "inside"]
    if not around:
        return None
    return next(
        j for j in around if all(i == j or relation(shapes[j], shapes[i]) == "inside" for i in around)
    )


def _outermost(k: int, parents: list[int | None]) -> int:
    parent = parents[k]
    return k if parent is None else _outermost(parent, parents)


def _beam(beam: Beam, output: Output, scenario: Scenario, defined: list[Material]) -> SceneBeam:
    origin = np.array(beam.at)
    aim = np.array(beam.aim) - origin
    leakage = None
    source = next(s for s in scenario.sources if s.name == beam.source)
    if source.leakage is not None and source.leakage.rate.value > 0.0:
        housing = material(source.leakage.housing, defined)
        quantity = "air kerma" if "kerma" in source.leakage.rate.kind else "ambient dose equivalent"
        leakage = leaking_housing(output.bare, output.drive, source.leakage.rate.value, quantity, housing)
    return SceneBeam(
        beam.name,
        beam.source,
        origin,
        _field(beam.field, aim / np.linalg.norm(aim)),
        output.spectrum,
        output.drive,
        leakage,
        beam.object_in_beam,
    )


def _field(field: Field, axis: Array) -> BeamField:
    if field.kind == "rectangle":
        half = 0.5 / field.distance
        return BeamField("rectangle", axis, half * field.width, half * field.height, turned=field.turned)
    if field.kind == "cone":
        return BeamField("cone", axis, half_angle=field.half_angle)
    return BeamField("everywhere", axis)
