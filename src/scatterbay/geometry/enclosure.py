"""The faces of a room and rays through them: which faces a ray crosses, in which order, at what angle.

Faces are the planes of the inner outline. A ray counts as crossing a side by signs taken at the corners, which
neighbouring sides share, so that no ray slips through a corner; the same parameter decides between a side and
the ceiling or floor, so that none slips through an upper edge.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from scatterbay.geometry.cells import Cells
from scatterbay.geometry.outline import contains

Array = NDArray[np.float64]
Flags = NDArray[np.bool_]
Ints = NDArray[np.int64]

OWN = 1
"""Mask of a ray that meets only the make-up that most of a face has, its kind 0: see ``Cells``."""


@dataclass(frozen=True)
class Upright:
    """A free-standing upright rectangle between two plan points and two heights [m]."""

    start: tuple[float, float]
    end: tuple[float, float]
    bottom: float
    top: float


@dataclass(frozen=True)
class FaceHits:
    """The rays that cross one face.

    Parameters
    ----------
    face : number of the face.
    rays : numbers of the rays (m,).
    at : where on the ray, in units of it (m,).
    cosine : of the angle to the face's normal (m,).
    outward : True where the ray runs along the normal: out of the room, from a screen's left to its right (m,).
    mask : which kinds of make-up the ray may meet there (m,): see ``Cells``.
    """

    face: int
    rays: Ints
    at: Array
    cosine: Array
    outward: Flags
    mask: Ints


@dataclass(frozen=True)
class Crossings:
    """All that ``count`` rays cross, face by face; faces that no ray crosses are left out."""

    count: int
    hits: tuple[FaceHits, ...]

    def numbers(self) -> Ints:
        """How many faces each ray crosses, (count,)."""
        total = np.zeros(self.count, dtype=np.int64)
        for hit in self.hits:
            total[hit.rays] += 1
        return total

    def on(self, face: int, rays: Ints) -> tuple[Array, Array]:
        """Where these rays cross a face that they all cross, and at what cosine, (m,) each."""
        hit = next(h for h in self.hits if h.face == face)
        position = np.searchsorted(hit.rays, rays)
        return hit.at[position], hit.cosine[position]


@dataclass(frozen=True)
class _Rays:
    """Straight lines by their columns: starts, steps from start to end, and lengths."""

    x: Array
    y: Array
    z: Array
    dx: Array
    dy: Array
    dz: Array
    length: Array

    @classmethod
    def between(cls, start: Array, end: Array) -> _Rays:
        first, last = np.atleast_2d(start).T, np.atleast_2d(end).T
        step = np.ascontiguousarray(last - first)
        x, y, z = np.ascontiguousarray(np.broadcast_to(first, step.shape))
        length = np.sqrt(np.einsum("ij,ij->j", step, step))
        return cls(x, y, z, step[0], step[1], step[2], length)

    def left_of(self, corner: Array) -> Flags:
        """Does a plan point lie to the left of each ray?"""
        return self.dx * (corner[1] - self.y) - self.dy * (corner[0] - self.x) >= 0.0


@dataclass(frozen=True)
class Enclosure:
    """A prism, and screens.

    Faces are numbered: the sides in the order of the corners, the ceiling, the floor, the screens.
    ``thickness``: of each face, from the inner plane outwards [m]. ``cells``: by number, of the faces that are not
    the same all over; in (distance from the first corner, height) of sides and screens, (x, y) of ceiling and floor.
    ``breadth``: how far around itself a ray looks for another kind of make-up [m].
    """

    corners: Array
    height: float
    thickness: Sequence[float]
    cells: dict[int, Cells]
    screens: tuple[Upright, ...] = ()
    breadth: float = 0.0

    @property
    def ceiling(self) -> int:
        """Number of the ceiling's face."""
        return len(self.corners)

    @property
    def floor(self) -> int:
        """Number of the floor's face."""
        return len(self.corners) + 1

    @property
    def face_count(self) -> int:
        """Number of all faces."""
        return len(self.corners) + 2 + len(self.screens)

    @cached_property
    def _sides(self) -> tuple[Array, Array, Array]:
        """Start (k, 2), unit direction (k, 2) and outward normal (k, 2) of the sides."""
        along = np.roll(self.corners, -1, axis=0) - self.corners
        along = along / np.linalg.norm(along, axis=1, keepdims=True)
        return self.corners, along, np.stack([along[:, 1], -along[:, 0]], axis=1)

    def normal(self, face: int) -> Array:
        """Unit normal (3,) of a face: out of the room, or to the right of a screen."""
        if face < self.ceiling:
            return np.append(self._sides[2][face], 0.0)
        if face in (self.ceiling, self.floor):
            return np.array([0.0, 0.0, 1.0 if face == self.ceiling else -1.0])
        screen = self.screens[face - self.floor - 1]
        along = np.subtract(screen.end, screen.start)
        return np.array([along[1], -along[0], 0.0]) / np.linalg.norm(along)

    def inside(self, points: Array) -> Flags:
        """Which points (n, 3) lie in the room."""
        level = (points[:, 2] > 0.0) & (points[:, 2] < self.height)
        return level & contains(self.corners, points[:, :2])

    def crossings(self, start: Array, end: Array) -> Crossings:
        """Faces met by the straight lines from start (n, 3) to end (n, 3) or (3,)."""
        rays = _Rays.between(start, end)
        enter, leave = self._level_span(rays)
        hits: list[FaceHits] = []
        side_at = self._cross_sides(rays, enter, leave, hits)
        self._cross_level(self.ceiling, self.height, rays, side_at, hits)
        self._cross_level(self.floor, 0.0, rays, side_at, hits)
        for k, screen in enumerate(self.screens):
            self._cross_screen(self.floor + 1 + k, screen, rays, hits)
        return Crossings(len(rays.x), tuple(hits))

    def _level_span(self, rays: _Rays) -> tuple[Array, Array]:
        """Ray parameters between which the ray is level with the room."""
        flat = rays.dz == 0.0
        safe = np.where(flat, 1.0, rays.dz)
        one, two = -rays.z / safe, (self.height - rays.z) / safe
        enter, leave = np.minimum(one, two), np.maximum(one, two)
        if flat.any():
            level = (rays.z > 0.0) & (rays.z < self.height)
            enter = np.where(flat, np.where(level, -np.inf, np.inf), enter)
            leave = np.where(flat, np.where(level, np.inf, -np.inf), leave)
        return enter, leave

    def _cross_sides(self, rays: _Rays, enter: Array, leave: Array, hits: list[FaceHits]) -> list[Array]:
        """Add the sides; returns where the plan view of each ray meets each side that any meets."""
        corner, along, normal = self._sides
        left: dict[int, Flags] = {}
        everywhere = []
        for k in range(len(corner)):
            before = (rays.x - corner[k, 0]) * normal[k, 0] + (rays.y - corner[k, 1]) * normal[k, 1]
            rate = rays.dx * normal[k, 0] + rays.dy * normal[k, 1]
            met = (before < 0.0) != (before + rate < 0.0)
            if not met.any():
                continue
            for end in (k, (k + 1) % len(corner)):
                if end not in left:
                    left[end] = rays.left_of(corner[end])
            met &= left[k] != left[(k + 1) % len(corner)]
            at = np.divide(-before, rate, out=np.full(rate.shape, np.inf), where=met)
            everywhere.append(at)
            found = np.flatnonzero(met & (enter <= at) & (at < leave))
            if not found.size:
                continue
            place = at[found]
            mask = np.full(found.size, OWN, dtype=np.int64)
            if k in self.cells:
                x, y = rays.x[found] + place * rays.dx[found], rays.y[found] + place * rays.dy[found]
                first = (x - corner[k, 0]) * along[k, 0] + (y - corner[k, 1]) * along[k, 1]
                level = rays.z[found] + place * rays.dz[found]
                slope = rays.dx[found] * along[k, 0] + rays.dy[found] * along[k, 1]
                mask = self._masks(k, (first, level), (slope, rays.dz[found]), rate[found])
            cosine = np.abs(rate[found]) / rays.length[found]
            hits.append(FaceHits(k, found, place, cosine, rate[found] > 0.0, mask))
        return everywhere

    def _cross_level(
        self, face: int, level: float, rays: _Rays, side_at: list[Array], hits: list[FaceHits]
    ) -> None:
        """Add the ceiling or the floor."""
        before = rays.z - level
        met = np.flatnonzero((before < 0.0) != (before + rays.dz < 0.0))
        if not met.size:
            return
        at = -before[met] / rays.dz[met]
        inside = contains(self.corners, np.stack([rays.x[met], rays.y[met]], axis=1))
        for crossed in side_at:
            inside ^= (crossed[met] > 0.0) & (crossed[met] < at)
        found, place = met[inside], at[inside]
        if not found.size:
            return
        rate = rays.dz[found] * (1.0 if face == self.ceiling else -1.0)
        mask = np.full(found.size, OWN, dtype=np.int64)
        if face in self.cells:
            position = rays.x[found] + place * rays.dx[found], rays.y[found] + place * rays.dy[found]
            mask = self._masks(face, position, (rays.dx[found], rays.dy[found]), rate)
        cosine = np.abs(rate) / rays.length[found]
        hits.append(FaceHits(face, found, place, cosine, rate > 0.0, mask))

    def _masks(
        self, face: int, position: tuple[Array, Array], slopes: tuple[Array, Array], rate: Array
    ) -> Ints:
        """Which make-ups rays may meet, from where they meet the inner plane and how they run on."""
        depth = self.thickness[face] / rate
        return self.cells[face].masks(position, (slopes[0] * depth, slopes[1] * depth), self.breadth)

    def _cross_screen(self, face: int, screen: Upright, rays: _Rays, hits: list[FaceHits]) -> None:
        """Add a screen."""
        start, end = np.array(screen.start), np.array(screen.end)
        normal = self.normal(face)
        before = (rays.x - start[0]) * normal[0] + (rays.y - start[1]) * normal[1]
        rate = rays.dx * normal[0] + rays.dy * normal[1]
        met = (before < 0.0) != (before + rate < 0.0)
        if not met.any():
            return
        met &= rays.left_of(start) != rays.left_of(end)
        found = np.flatnonzero(met)
        place = -before[found] / rate[found]
        level = rays.z[found] + place * rays.dz[found]
        kept = (level >= screen.bottom) & (level < screen.top)
        found, place = found[kept], place[kept]
        if found.size:
            cosine = np.abs(rate[found]) / rays.length[found]
            mask = np.full(found.size, OWN, dtype=np.int64)
            if face in self.cells:
                along = (end - start) / np.linalg.norm(end - start)
                slope = rays.dx[found] * along[0] + rays.dy[found] * along[1]
                first = (rays.x[found] - start[0]) * along[0] + (rays.y[found] - start[1]) * along[1]
                slopes = slope, rays.dz[found]
                mask = self._masks(face, (first + place * slope, level[kept]), slopes, rate[found])
            hits.append(FaceHits(face, found, place, cosine, rate[found] > 0.0, mask))
