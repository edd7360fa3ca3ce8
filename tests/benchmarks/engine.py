"""Pairs a second, and how the cost grows."""

from __future__ import annotations

import time
from dataclasses import replace

import numpy as np

from scatterbay.barriers.makeup import sheet
from scatterbay.engine.arrive import Surroundings, dose_from_points, ready
from scatterbay.engine.bodies import Bodies, Part
from scatterbay.engine.contributions import contributions
from scatterbay.engine.energies import ladder
from scatterbay.engine.fields import BeamField
from scatterbay.engine.first import first_collisions
from scatterbay.engine.media import Matter
from scatterbay.engine.points import ScatterPoints
from scatterbay.engine.scene import build_scene
from scatterbay.engine.walls import Walls
from scatterbay.geometry.bodies import solids
from scatterbay.geometry.enclosure import Enclosure, Upright
from scatterbay.physics.medium import medium
from scatterbay.physics.tube import tube_spectrum
from scatterbay.scenario import load
from scatterbay.tables.materials import material

PLACE = np.array([1.0, 3.6, 1.2])


def _points(replicates: int) -> tuple[ScatterPoints, Surroundings]:
    water = material("water")
    steps = ladder([])
    matter = Matter(medium(water.fractions), water.density_g_cm3, steps)
    block = solids("box", (1.0, 0.0, 1.5), (0.3, 0.3, 0.3), (0, 0, 1), 0.0)[0]
    bodies = Bodies((Part(block, 0, None, 0),), (matter,))
    spectrum = tube_spectrum(225.0, ((material("aluminium"), 3e-3),))
    field = BeamField("rectangle", np.array([1.0, 0, 0]), 0.12, 0.12)
    importance = spectrum.photons / spectrum.photons.sum()
    origin = np.array([0.0, 0.0, 1.5])
    points = first_collisions(origin, field, spectrum, importance, bodies, 0, steps, 4096, replicates, (1,))
    return points, Surroundings(bodies, None, steps)


def _eight_faces(around: Surroundings) -> Surroundings:
    corners = np.array([(-3, -3), (3, -3), (3, 3), (-3, 3)], dtype=float)
    screens = (Upright((-2, 2), (2, 2), 0, 2.9), Upright((-2, -2), (2, -2), 0, 2.9))
    room = Enclosure(corners, 3.0, [0.3] * 8, {}, screens)
    stacks = [((sheet("concrete", 0.3),),)] * 6 + [((sheet("lead", 1e-3),),)] * 2
    return Surroundings(around.bodies, Walls(room, stacks, around.ladder), around.ladder)


def _rate(points: ScatterPoints, around: Surroundings) -> float:
    readied = ready(points, around)
    dose_from_points(readied, PLACE, around)
    best = np.inf
    for _ in range(7):
        start = time.perf_counter()
        dose_from_points(readied, PLACE, around)
        best = min(best, time.perf_counter() - start)
    return len(points) / best


def pairs_per_second() -> tuple[float, float]:
    """Without barriers, and with eight faces of which two are crossed."""
    points, around = _points(16)
    return _rate(points, around), _rate(points, _eight_faces(around))


def slopes() -> dict[str, float]:
    """Slope of ln time over ln number, for points, places and beams."""
    found = {}
    sizes = (4, 16, 64)
    times = []
    for replicates in sizes:
        points, around = _points(replicates)
        times.append(len(points) / _rate(points, around))
    found["points"] = _slope(sizes, times)
    scenario = load("scenarios/weld-bay.yaml")
    contributions(build_scene(scenario))
    for what in ("places", "beams"):
        times = []
        for count in (1, 4, 16):
            if what == "places":
                several = tuple(replace(scenario.places[0], name=f"place {k}") for k in range(count))
                changed = replace(scenario, places=several)
            else:
                beams = tuple(replace(scenario.beams[0], name=f"beam {k}") for k in range(count))
                loads = tuple(replace(scenario.workloads[0], beam=beam.name) for beam in beams)
                changed = replace(scenario, beams=beams, workloads=loads)
            start = time.perf_counter()
            contributions(build_scene(changed))
            times.append(time.perf_counter() - start)
        found[what] = _slope((1, 4, 16), times)
    return found


def _slope(sizes: tuple[int, ...], times: list[float]) -> float:
    return float(np.polyfit(np.log(sizes), np.log(times), 1)[0])
