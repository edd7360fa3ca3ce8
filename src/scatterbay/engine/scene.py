"""A scene: a checked scenario as numbers, faces, bodies, beams and stored sources, ready to be computed."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, field, replace

import numpy as np
from numpy.typing import NDArray

from scatterbay.barriers.makeup import Sheets
from scatterbay.engine.arrive import Surroundings
from scatterbay.engine.energies import ladder
from scatterbay.engine.fabric import Fabric, fabric_of, sheets_of
from scatterbay.engine.fields import BeamField
from scatterbay.engine.leakage import LeakingHousing
from scatterbay.engine.looking import ScenePlace, scene_places
from scatterbay.engine.sources import Output, output_of
from scatterbay.engine.standing import bodies_of, edges_of
from scatterbay.engine.states import (
    StoredSource,
    StuckSource,
    TravellingSource,
    stored,
    through_collimator,
)
from scatterbay.engine.walls import Walls
from scatterbay.geometry.enclosure import Enclosure, Upright
from scatterbay.physics.spectrum import Spectrum
from scatterbay.scenario.parts import Assumption, Beam, Field, Scenario, SealedSource, Workload
from scatterbay.tables.materials import Material

Array = NDArray[np.float64]


@dataclass(frozen=True)
class SceneBeam:
    """A beam as numbers.

    ``spectrum``: per steradian and unit of output (coulomb or decay). ``drive``: output per second while on.
    ``collimator``: what leaves in all directions outside the field. ``prefix``: sheets behind the object, in the
    primary only. ``output``: of its source.
    """

    name: str
    source: str
    origin: Array
    field: BeamField
    spectrum: Spectrum
    drive: float
    leakage: LeakingHousing | None
    bodies_count: bool
    output: Output
    collimator: Spectrum | None = None
    prefix: Sheets = ()


@dataclass(frozen=True)
class Scene:
    """Everything the engine computes with. ``workloads``: with every time known, also where a kerma-area product
    was stated."""

    around: Surroundings
    beams: tuple[SceneBeam, ...]
    places: tuple[ScenePlace, ...]
    seed: int
    primary_by_plane: bool
    assumptions: tuple[Assumption, ...]
    outputs: Mapping[str, Output]
    workloads: tuple[Workload, ...]
    stored: tuple[StoredSource, ...] = ()
    travelling: tuple[TravellingSource, ...] = ()
    stuck: tuple[StuckSource, ...] = ()
    face_numbers: Mapping[str, int] = field(default_factory=dict)
    """Number of each side, of the ceiling, the floor and each screen, by name."""
    of_opening: Mapping[str, int] = field(default_factory=dict)
    """Mask of the kinds of make-up of each opening, by name."""


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
    fabric = fabric_of(scenario.room, defined)
    prefixes = {b.name: _prefix(b, defined) for b in scenario.beams}
    stacks = [stack for kinds in fabric.stacks for stack in kinds] + list(prefixes.values())
    rungs = ladder(edges_of(stacks, scenario, defined))
    bodies = bodies_of(scenario, defined, rungs)
    room = _enclosure(scenario, fabric)
    walls = Walls(room, fabric.stacks, rungs, opened=fabric.opened)
    notes: list[Assumption] = [a for output in outputs.values() for a in output.assumptions]
    notes += fabric.assumptions
    beams = []
    for beam in scenario.beams:
        made, more = _beam(beam, outputs[beam.source], prefixes[beam.name], defined)
        beams.append(made)
        notes += more
    return Scene(
        Surroundings(bodies, walls, rungs),
        tuple(beams),
        scene_places(scenario, walls, bodies),
        scenario.options.seed,
        scenario.options.primary_by_plane,
        (*notes, *_general(beams, room)),
        outputs,
        tuple(_timed(load, beams) for load in scenario.workloads),
        *_states(scenario, outputs, defined),
        {name: number for number, name in enumerate(fabric.names)},
        fabric.of_opening,
    )


def at_places(scene: Scene, scenario: Scenario) -> Scene:
    """The same scene for the places of another scenario, which differs from the scene's own in its places only."""
    return replace(scene, places=scene_places(scenario, scene.around.walls, scene.around.bodies))


def _states(
    scenario: Scenario, outputs: Mapping[str, Output], defined: Sequence[Material]
) -> tuple[tuple[StoredSource, ...], tuple[TravellingSource, ...], tuple[StuckSource, ...]]:
    """Sealed sources where they are stored, on their way, or stuck."""
    kept, moving, fast = [], [], []
    for source in scenario.sources:
        if not isinstance(source, SealedSource):
            continue
        output = outputs[source.name]
        if source.container is not None and source.container.rate.value > 0.0:
            kept.append(stored(source, source.container, output, defined))
        if source.travel is not None:
            speed = source.travel.speed.value - source.travel.speed.tolerance
            moving.append(
                TravellingSource(source.name, source.travel.path, speed, output.spectrum, output.drive)
            )
        if source.stuck is not None:
            where, long = np.array(source.stuck.at), source.stuck.duration.value
            fast.append(StuckSource(source.name, where, long, output.spectrum, output.drive))
    return tuple(kept), tuple(moving), tuple(fast)


def _general(beams: Iterable[SceneBeam], room: Enclosure) -> tuple[Assumption, ...]:
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
    if room.breadth > 0.0:
        notes.append(
            Assumption(
                "hand's breadth",
                f"A ray is taken at its worst within {1e3 * room.breadth:.0f} mm of where it meets a barrier (doors, "
                "panels, sockets, edges of linings) and of a beam's edge.",
            )
        )
    housed = {beam.source: beam.leakage for beam in beams}
    for name, housing in housed.items():
        if housing is not None:
            text = (
                f"source '{name}': the stated leakage goes evenly in all directions, hardened by "
                f"{1e3 * housing.thickness:.3g} mm of {housing.material.name}, whenever a beam is on"
            )
            notes.append(Assumption("leakage", text))
    return tuple(notes)


def _enclosure(scenario: Scenario, fabric: Fabric) -> Enclosure:
    room = scenario.room
    screens = tuple(Upright(s.start, s.end, s.bottom, s.top) for s in room.screens)
    corners = np.array(room.corners)
    return Enclosure(
        corners, room.height, fabric.thickness, fabric.cells, screens, scenario.options.breadth
    )  # fmt: skip


def _prefix(beam: Beam, defined: Sequence[Material]) -> Sheets:
    """Sheets of what stands behind the object."""
    return sheets_of(beam.behind_object[1], defined) if beam.behind_object else ()


def _beam(
    beam: Beam, output: Output, prefix: Sheets, defined: Sequence[Material]
) -> tuple[SceneBeam, list[Assumption]]:
    origin = np.array(beam.at)
    aim = np.array(beam.aim) - origin
    collimator, notes = None, []
    if beam.collimator is not None:
        collimator, note = through_collimator(beam.name, beam.collimator, output, defined)
        notes.append(note)
    field = _field(beam.field, aim / np.linalg.norm(aim))
    made = SceneBeam(
        beam.name, beam.source, origin, field, output.spectrum, output.drive, output.leakage, beam.object_in_beam,
        output, collimator, prefix,
    )  # fmt: skip
    return made, notes


def _field(field: Field, axis: Array) -> BeamField:
    if field.kind == "rectangle":
        half = 0.5 / field.distance
        return BeamField("rectangle", axis, half * field.width, half * field.height, turned=field.turned)
    if field.kind in ("cone", "ring"):
        return BeamField(field.kind, axis, half_angle=field.half_angle)
    return BeamField("everywhere", axis)


def _timed(load: Workload, beams: Sequence[SceneBeam]) -> Workload:
    """A workload with times: a kerma-area product over the tube's output in the field, per second.

    The product is taken as output at 1 m times the field's solid angle times the charge: up to a few per cent more
    charge for wide fields than with the plane area, which is protective.
    """
    if load.area_product is None:
        return load
    beam = next(b for b in beams if b.name == load.beam)
    per_second = beam.drive * beam.spectrum.kerma_at_1_m * beam.field.solid_angle
    week, hour, day = (amount / per_second for amount in load.area_product)
    return replace(load, seconds_per_week=week, seconds_in_worst_hour=hour, seconds_in_worst_day=day)
