"""Linings: what is put on a surface, where, and the scenario with it."""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from scatterbay.advice.scan import PointResult, Scan
from scatterbay.advice.surfaces import Surface
from scatterbay.engine.scene import Scene
from scatterbay.scenario.make_ups import make_up
from scatterbay.scenario.parts import Layer, MakeUp, Panel, Scenario
from scatterbay.tables.materials import Material, material
from scatterbay.tables.sheets import SheetSold, sheets_sold
from scatterbay.units import Quantity

Array = NDArray[np.float64]

INSIDE, OUTSIDE = "inside", "outside"
MOSTLY = 0.6
"""A lining of more than this share of a surface is put all over it."""


@dataclass(frozen=True)
class Rectangle:
    """Where a lining goes, in the face's coordinates [m]."""

    low: tuple[float, float]
    high: tuple[float, float]

    @property
    def area(self) -> float:
        """[m2]"""
        return (self.high[0] - self.low[0]) * (self.high[1] - self.low[1])


@dataclass(frozen=True)
class Lining:
    """A layer of a material on one face of a rectangle of a surface; thickness in m."""

    surface: Surface
    where: Rectangle
    face: str
    material: str
    thickness: float

    def mass(self, defined: tuple[Material, ...] = ()) -> float:
        """[kg]"""
        return 1e3 * material(self.material, defined).density_g_cm3 * self.thickness * self.area

    @property
    def area(self) -> float:
        """[m2]; of a whole ceiling or floor, that of the plan."""
        whole = self.where.low == self.surface.low and self.where.high == self.surface.high
        return self.surface.area if whole else self.where.area


def with_lining(scenario: Scenario, lining: Lining, name: str = "added lining") -> Scenario:
    """The scenario with a lining, counted at exactly its thickness."""
    text = f"{lining.material} {1e3 * lining.thickness:.6g} mm"
    layer = Layer(lining.material, Quantity(lining.thickness, 0.0, "length", text), at_nominal=True)
    return with_panel(scenario, lining, MakeUp((layer,), text), name)


def with_panel(scenario: Scenario, lining: Lining, layers: MakeUp, name: str) -> Scenario:
    """The scenario with layers put where a lining goes."""
    sides = {INSIDE: layers, OUTSIDE: None} if lining.face == INSIDE else {INSIDE: None, OUTSIDE: layers}
    panel = Panel(
        name, lining.surface.host, lining.surface.face, lining.where.low, lining.where.high, None,
        sides[INSIDE], sides[OUTSIDE],
    )  # fmt: skip
    room = replace(scenario.room, panels=(*scenario.room.panels, panel))
    return replace(scenario, room=room)


def whole(surface: Surface) -> Rectangle:
    """All of a surface."""
    return Rectangle(surface.low, surface.high)


def missed(scan: Scan, limit: float = 1.0) -> list[Rectangle]:
    """The rectangles of the protected side where a goal is missed: one around each connected patch of points."""
    over = np.zeros(scan.grid.shape, dtype=bool).ravel()
    over[scan.grid.index[scan.ratios > limit]] = True
    left = over.reshape(scan.grid.shape)
    place = np.full((*scan.grid.shape, 2), np.nan)
    place.reshape(-1, 2)[scan.grid.index] = scan.grid.on_face
    found = []
    while left.any():
        i, j = (int(k) for k in np.argwhere(left)[0])
        patch = _connected(left, (i, j))
        left &= ~patch
        low, high = place[patch].min(axis=0), place[patch].max(axis=0)
        found.append(_within(scan.surface, low, high, 0.5 * np.array(scan.grid.spacing)))
    return found


def _connected(flags: NDArray[np.bool_], start: tuple[int, int]) -> NDArray[np.bool_]:
    """The patch of true cells, diagonals included, that holds one cell."""
    patch = np.zeros_like(flags)
    patch[start] = True
    while True:
        grown = np.pad(patch, 1)
        near = np.zeros_like(patch)
        for i in (0, 1, 2):
            for j in (0, 1, 2):
                near |= grown[i : i + patch.shape[0], j : j + patch.shape[1]]
        near &= flags
        if (near == patch).all():
            return patch
        patch = near


def _within(surface: Surface, low: Array, high: Array, margin: Array) -> Rectangle:
    """A rectangle grown by a margin, kept within the surface."""
    lower = np.maximum(low - margin, surface.low)
    upper = np.minimum(high + margin, surface.high)
    return Rectangle((float(lower[0]), float(lower[1])), (float(upper[0]), float(upper[1])))


def to_line(scan: Scan, scene: Scene, overlap: float) -> Rectangle:
    """The rectangle to line: where the lines to every point that misses a goal cross the face, and an overlap.

    All of the surface where that is most of it.
    """
    surface = scan.surface
    bad = [
        point
        for point, ratio in zip(scan.points, scan.ratios, strict=True)
        if ratio > 1.0 and point.on_face not in scan.openings
    ]
    crossed = [np.array([p.on_face for p in bad])]
    crossed += [found for point in bad if (found := _crossings(scan, scene, point)).size]
    spots = np.concatenate(crossed)
    spread = np.array(scan.grid.spacing) + overlap
    return widened(surface, _within(surface, spots.min(axis=0), spots.max(axis=0), spread), 0.0)


def widened(surface: Surface, where: Rectangle, by: float) -> Rectangle:
    """A rectangle grown on every side; all of the surface where that is most of it."""
    grown = _within(surface, np.array(where.low), np.array(where.high), np.array([by, by]))
    return whole(surface) if grown.area > MOSTLY * whole(surface).area else grown


def _crossings(scan: Scan, scene: Scene, point: PointResult) -> Array:
    """Where the lines from sources and bodies to a point cross the face, (n, 2), in its coordinates."""
    room, surface = scene.around.walls.enclosure, scan.surface
    looks = [beam.origin for beam in scene.beams] + [part.solid.centre for part in scene.around.bodies.parts]
    start = np.array(looks)
    end = np.array(point.result.at)
    met = room.crossings(start, end)
    number = scene_face(scene, surface)
    for hit in met.hits:
        if hit.face == number:
            at = start[hit.rays] + hit.at[:, None] * (end - start[hit.rays])
            return on_face(scene, surface, at)
    return np.zeros((0, 2))


def scene_face(scene: Scene, surface: Surface) -> int:
    """Number of the face that a surface is part of."""
    return scene.face_numbers[surface.face]


def on_face(scene: Scene, surface: Surface, points: Array) -> Array:
    """Points (n, 3) on a face in its own coordinates (n, 2)."""
    if surface.kind in ("ceiling", "floor"):
        return points[:, :2]
    room, number = scene.around.walls.enclosure, scene_face(scene, surface)
    if surface.kind == "side":
        start = room.corners[number]
        end = room.corners[(number + 1) % len(room.corners)]
    else:
        screen = room.screens[number - room.floor - 1]
        start, end = np.array(screen.start), np.array(screen.end)
    along = (end - start) / np.linalg.norm(end - start)
    return np.stack([(points[:, :2] - start) @ along, points[:, 2]], axis=1)


def stock_for(name: str, thickness: float) -> tuple[SheetSold, MakeUp] | None:
    """The thinnest sheet on the list that counts as at least this thickness; None where none does."""
    for sold in sheets_sold().get(name, ()):
        layers = make_up(sold.sold_as)
        if sum(layer.counted_thickness for layer in layers.layers) >= thickness:
            return sold, layers
    return None
