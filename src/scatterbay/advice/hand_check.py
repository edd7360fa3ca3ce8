"""The hand check: each path to a place as a chain of factors that a reviewer can multiply out.

The product of a chain's factors is the path's rate at the place. Factors that only transport can give are named as
such; everything else is distance, output, angle and tabulated attenuation.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.arrive import Surroundings
from scatterbay.engine.bodies import Bodies
from scatterbay.engine.contributions import (
    COLLIMATOR,
    LEAKAGE,
    PLANE_BOUND,
    PRIMARY,
    SCATTER,
    Contributions,
    Kept,
    contributions,
)
from scatterbay.engine.looking import STORED
from scatterbay.engine.many import isotropic
from scatterbay.engine.scene import Scene, SceneBeam
from scatterbay.engine.walls import Walls
from scatterbay.geometry.enclosure import Enclosure
from scatterbay.physics import dose
from scatterbay.physics.compton import scattered_energy
from scatterbay.physics.spectrum import Spectrum

Array = NDArray[np.float64]

KERMA = dose.QUANTITIES.index(dose.AIR_KERMA)
NEAR = 0.05
"""A source nearer than this to the middle of a body stands in it [m]."""
SMALLEST = 1e-3
"""Paths that make up less than this share of a place's rate are not laid out."""


@dataclass(frozen=True)
class Step:
    """One factor: what it is, its value as it is multiplied, its unit, and what it rests on."""

    what: str
    factor: float
    unit: str
    rests_on: str


@dataclass(frozen=True)
class Chain:
    """One path of one beam (or stored source) to one place. ``facts``: angles and energies that go with it.

    The product of the factors is the rate at the place in ``quantity`` [Gy/s or Sv/s].
    """

    place: str
    beam: str
    path: str
    quantity: str
    steps: tuple[Step, ...]
    facts: tuple[str, ...] = ()

    @property
    def product(self) -> float:
        """What a reviewer's calculator comes to."""
        return float(np.prod([step.factor for step in self.steps]))


def hand_check(
    scene: Scene, found: Contributions, kept: Kept, quantities: Sequence[str]
) -> tuple[Chain, ...]:
    """The chains of every place, largest first; ``quantities``: the one each place is shown in.

    ``kept``: the scatter points that ``found`` was made with.
    """
    bare = contributions(_without_walls(scene), kept=kept)
    chains: list[Chain] = []
    for place, quantity in zip(scene.places, quantities, strict=True):
        row = dose.QUANTITIES.index(quantity)
        mine: list[Chain] = []
        for beam in scene.beams:
            mine += _of_beam(scene, beam, place.name, place.at, quantity, found, bare)
        for one in scene.stored:
            steps = _straight(one.spectrum, one.at, place.at, scene.around, row, "container, at 1 m")
            mine.append(Chain(place.name, one.source, STORED, quantity, steps))
        whole = sum(chain.product for chain in mine)
        mine = [chain for chain in mine if chain.product > SMALLEST * whole]
        chains += sorted(mine, key=lambda chain: -chain.product)
    return tuple(chains)


def _without_walls(scene: Scene) -> Scene:
    """The same scene with nothing but its bodies."""
    walls = scene.around.walls
    room = walls.enclosure
    none = Enclosure(room.corners, room.height, [0.0] * room.face_count, {}, room.screens, room.breadth)
    empty = Walls(none, [((),)] * room.face_count, walls.ladder)
    return replace(scene, around=Surroundings(scene.around.bodies, empty, scene.around.ladder))


def _of_beam(
    scene: Scene,
    beam: SceneBeam,
    name: str,
    at: Array,
    quantity: str,
    found: Contributions,
    bare: Contributions,
) -> list[Chain]:
    """The paths of one beam to one place."""
    row = dose.QUANTITIES.index(quantity)
    chains = []
    if beam.leakage is not None:
        spectrum = beam.leakage.spectrum.scaled(beam.drive)
        steps = _straight(spectrum, beam.origin, at, scene.around, row, "leakage, at 1 m")
        chains.append(Chain(name, beam.name, LEAKAGE, quantity, steps))
    if beam.collimator is not None and not beam.field.holds((at - beam.origin)[None, :])[0]:
        spectrum = beam.collimator.scaled(beam.drive)
        steps = _straight(spectrum, beam.origin, at, scene.around, row, "through the collimator, at 1 m")
        chains.append(Chain(name, beam.name, COLLIMATOR, quantity, steps))
    chains += _primary(scene, beam, name, at, quantity, found)
    chains += _scatter(scene, beam, name, at, quantity, found, bare)
    return chains


def _straight(
    spectrum: Spectrum, origin: Array, at: Array, around: Surroundings, row: int, what: str
) -> tuple[Step, ...]:
    """From a point, evenly in all directions: rate at 1 m, distance, bodies, barrier, conversion."""
    distance = float(np.linalg.norm(at - origin))
    free = spectrum.kerma_at_1_m
    here = at[None, :]
    open_room = Surroundings(around.bodies, None, around.ladder)
    behind_bodies = float(isotropic(origin, spectrum, here, open_room)[KERMA, 0])
    arriving = isotropic(origin, spectrum, here, around)[:, 0]
    bodies = behind_bodies * distance**2 / free
    return (
        Step(f"air kerma rate, {what}", free, "Gy/s", "as stated, or the model's output"),
        Step(f"distance {distance:.3f} m, 1 / d2", distance**-2, "1/m2", "inverse square"),
        *(
            [Step("bodies on the line", bodies, "", "narrow beam, tabulated attenuation")]
            if bodies < 0.999
            else []
        ),
        Step(
            f"barrier {_crossed(origin, at, around)}",
            float(arriving[KERMA]) / behind_bodies,
            "",
            "transmission of air kerma by transport, lit all over, at this angle",
        ),
        *_converted(arriving, row),
    )


def _converted(arriving: Array, row: int) -> list[Step]:
    """H*(10) over air kerma of what arrives; nothing for air kerma."""
    if row == KERMA or arriving[KERMA] <= 0.0:
        return []
    ratio = float(arriving[row] / arriving[KERMA])
    return [Step("H*(10) over air kerma behind it", ratio, "Sv/Gy", "ICRP 74, for the spectrum that arrives")]


def _crossed(origin: Array, at: Array, around: Surroundings) -> str:
    """The faces on a line, by number of layers and angle."""
    met = around.walls.enclosure.crossings(origin[None, :], at)
    said = [
        f"{float(np.degrees(np.arccos(min(1.0, float(hit.cosine[0]))))):.0f} deg to its normal"
        for hit in met.hits
    ]
    return f"({', '.join(said)})" if said else "(none)"


def _primary(
    scene: Scene, beam: SceneBeam, name: str, at: Array, quantity: str, found: Contributions
) -> list[Chain]:
    """In the field: output, distance, plane transmission, and the lit patch's share of it; beside it one ratio."""
    row = dose.QUANTITIES.index(quantity)
    judged = _rate(found, name, beam.name, PRIMARY)
    if judged[row] <= 0.0:
        return []
    bodies = scene.around.bodies if beam.bodies_count else Bodies((), ())
    around = Surroundings(bodies, scene.around.walls, scene.around.ladder)
    if not beam.field.holds((at - beam.origin)[None, :], scene.around.walls.enclosure.breadth)[0]:
        output = beam.drive * beam.spectrum.kerma_at_1_m
        distance = float(np.linalg.norm(at - beam.origin))
        beside = (
            Step("air kerma rate in the beam, at 1 m", output, "Gy/s", "as measured, or the model's output"),
            Step(f"distance {distance:.3f} m, 1 / d2", distance**-2, "1/m2", "inverse square"),
            Step("beside the beam: what the lit patch sends here", float(judged[row]) * distance**2 / output,
                 "Sv/Gy" if row != KERMA else "", "transport, over the patch"),
        )  # fmt: skip
        return [Chain(name, beam.name, PRIMARY, quantity, beside, ("beside the field",))]
    steps = _straight(beam.spectrum.scaled(beam.drive), beam.origin, at, around, row, "in the beam, at 1 m")
    plane = float(np.prod([step.factor for step in steps]))
    share = float(judged[row]) / plane
    lit = Step(
        "share of it with only the field lit, and what stands in it", share, "", "transport, over the patch"
    )
    return [Chain(name, beam.name, PRIMARY, quantity, (*steps, lit), ("in the field",))]


def _scatter(
    scene: Scene,
    beam: SceneBeam,
    name: str,
    at: Array,
    quantity: str,
    found: Contributions,
    bare: Contributions,
) -> list[Chain]:
    """To the middle of the bodies, scattered once, on to the place; all orders as one ratio."""
    row = dose.QUANTITIES.index(quantity)
    every = _rate(found, name, beam.name, SCATTER)
    single = _rate(found, name, beam.name, SCATTER, 1)
    free = _rate(bare, name, beam.name, SCATTER, 1)
    if every[row] <= 0.0 or single[KERMA] <= 0.0 or free[KERMA] <= 0.0:
        return []
    middle = _middle(scene, beam)
    one, two = float(np.linalg.norm(middle - beam.origin)), float(np.linalg.norm(at - middle))
    output = beam.drive * beam.spectrum.kerma_at_1_m
    steps = [Step("air kerma rate in the beam, at 1 m", output, "Gy/s", "as measured, or the model's output")]
    scattered = float(free[KERMA]) * two**2 / output
    facts = [f"field of {beam.field.solid_angle:.4f} sr"]
    rests = "Klein-Nishina, bound electrons, over the body and the field"
    if one > NEAR:
        cosine = float((middle - beam.origin) @ (at - middle) / (one * two))
        before = beam.spectrum.mean_energy_kev
        after = float(scattered_energy(np.array([before]), np.array([cosine]))[0])
        angle = float(np.degrees(np.arccos(np.clip(cosine, -1.0, 1.0))))
        facts += [
            f"angle of scattering {angle:.0f} deg",
            f"mean energy {before:.0f} keV before, {after:.0f} keV after",
        ]
        steps.append(Step(f"to the body, {one:.3f} m, 1 / d2", one**-2, "1/m2", "inverse square"))
        steps.append(Step("scattered once towards the place, at 1 m", scattered * one**2, "m2", rests))
    else:
        facts.append("the source stands in the middle of the body")
        steps.append(Step("scattered once towards the place, at 1 m", scattered, "", rests))
    steps += [
        Step(f"to the place, {two:.3f} m, 1 / d2", two**-2, "1/m2", "inverse square"),
        Step("barrier", float(single[KERMA] / free[KERMA]), "", "transport, at the scattered energies and angles"),
        Step("all orders of scattering over the first", float(every[KERMA] / single[KERMA]), "", "walk of the photons"),
    ]  # fmt: skip
    return [Chain(name, beam.name, SCATTER, quantity, (*steps, *_converted(every, row)), tuple(facts))]


def _middle(scene: Scene, beam: SceneBeam) -> Array:
    """Centre of the body that the beam's axis passes nearest to."""
    centres = [scene.around.bodies.parts[group].solid.centre for group in scene.around.bodies.groups]

    def off_axis(centre: Array) -> float:
        along = float((centre - beam.origin) @ beam.field.axis)
        return float(np.linalg.norm(centre - beam.origin - max(along, 0.0) * beam.field.axis))

    return min(centres, key=off_axis)


def _rate(found: Contributions, place: str, beam: str, path: str, order: int | None = None) -> Array:
    """Rate of a path (q,), all orders or one."""
    rows = [
        r for r in found.rows if (r.place, r.beam, r.path) == (place, beam, path) and r.path != PLANE_BOUND
    ]
    chosen = [r for r in rows if order is None or r.order == order]
    return (
        np.sum([r.drive * r.values.mean(axis=0) for r in chosen], axis=0)
        if chosen
        else np.zeros(len(dose.QUANTITIES))
    )
