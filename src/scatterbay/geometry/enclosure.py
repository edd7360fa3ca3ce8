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

from scatterbay.geometry.outline import contains

Array = NDArray[np.float64]
Flags = NDArray[np.bool_]
Ints = NDArray[np.int64]

SOLID = 1
"""Bit of a mask that stands for the face's own make-up; bit k + 1 stands for its k-th hole."""


@dataclass(frozen=True)
class Hole:
    """A rectangle in a face, in the face's own two coordinates [m]."""

    low: tuple[float, float]
    high: tuple[float, float]


@dataclass(frozen=True)
class Upright:
    """A free-standing upright rectangle between two plan points and two heights [m]."""

    start: tuple[float, float]
    end: tuple[float, float]
    bottom: float
    top: float


@dataclass(frozen=True)
class Crossings:
    """Where rays (n,) meet faces (f,).

    ``at``: ray parameter of the crossing, inf where there is none, shape (f, n).
    ``cosine``: of the angle to the face's normal, shape (f, n). ``outward``: True where the ray runs along the
    face's normal (out of the room; from the left of a screen to its right), shape (f, n).
    ``mask``: which make-ups the ray may meet there, shape (f, n): see ``SOLID``.
    """

    at: Array
    cosine: Array
    outward: Flags
    mask: Ints


@dataclass(frozen=True)
class Enclosure:
    """A prism with holes in its faces, and screens.

    Faces are numbered: the sides in the order of the corners, the ceiling, the floor, the screens.
    ``thickness``: of each face, from the inner plane outwards [m]. ``holes``: by face number.
    """

    corners: Array
    height: float
    thickness: Sequence[float]
    holes: dict[int, tuple[Hole, ...]]
    screens: tuple[Upright, ...] = ()

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
        start, end = np.broadcast_arrays(np.atleast_2d(start), np.atleast_2d(end))
        count = len(start)
        ray = end - start
        length = np.linalg.norm(ray, axis=1)
        result = Crossings(
            np.full((self.face_count, count), np.inf),
            np.ones((self.face_count, count)),
            np.ones((self.face_count, count), dtype=bool),
            np.full((self.face_count, count), SOLID, dtype=np.int64),
        )
        enter, leave = self._level_span(start, ray)
        side_at = self._cross_sides(start, end, ray, length, enter, leave, result)
        self._cross_level(self.ceiling, self.height, start, ray, length, side_at, result)
        self._cross_level(self.floor, 0.0, start, ray, length, side_at, result)
        for k, screen in enumerate(self.screens):
            self._cross_screen(self.floor + 1 + k, screen, start, ray, length, result)
        return result

    def _level_span(self, start: Array, ray: Array) -> tuple[Array, Array]:
        """Ray parameters between which the ray is level with the room."""
        rise = ray[:, 2]
        safe = np.where(rise == 0.0, 1.0, rise)
        one, two = -start[:, 2] / safe, (self.height - start[:, 2]) / safe
        level = (start[:, 2] > 0.0) & (start[:, 2] < self.height)
        flat = rise == 0.0
        enter = np.where(flat, np.where(level, -np.inf, np.inf), np.minimum(one, two))
        leave = np.where(flat, np.where(level, np.inf, -np.inf), np.maximum(one, two))
        return enter, leave

    def _cross_sides(
        self,
        start: Array,
        end: Array,
        ray: Array,
        length: Array,
        enter: Array,
        leave: Array,
        result: Crossings,
    ) -> Array:
        """Fill in the sides; returns where the plan view of each ray meets each side, shape (k, n)."""
        corner, along, normal = self._sides
        left: dict[int, Flags] = {}
        everywhere = np.full((len(corner), len(start)), np.inf)
        for k in range(len(corner)):
            offset = corner[k] @ normal[k]
            before = start[:, 0] * normal[k, 0] + start[:, 1] * normal[k, 1] - offset
            after = end[:, 0] * normal[k, 0] + end[:, 1] * normal[k, 1] - offset
            met = (before < 0.0) != (after < 0.0)
            if not met.any():
                continue
            following = (k + 1) % len(corner)
            met &= self._left(k, start, ray, left) != self._left(following, start, ray, left)
            at = np.where(met, before / np.where(met, before - after, 1.0), np.inf)
            everywhere[k] = at
            met &= (enter <= at) & (at < leave)
            result.at[k] = np.where(met, at, np.inf)
            rate = after - before
            result.cosine[k] = np.where(met, np.abs(rate) / length, 1.0)
            result.outward[k] = rate > 0.0
            if self.holes.get(k):
                reach = np.where(met, at, 0.0)
                position = start[:, :2] + reach[:, None] * ray[:, :2]
                first = (position - corner[k]) @ along[k], start[:, 2] + reach * ray[:, 2]
                slopes = ray[:, :2] @ along[k], ray[:, 2]
                self._look_into_holes(k, met, first, slopes, rate, result)
        return everywhere

    def _left(self, corner: int, start: Array, ray: Array, known: dict[int, Flags]) -> Flags:
        """Does a corner lie to the left of each ray in the plan? Asked twice per corner, computed once."""
        if corner not in known:
            x, y = self.corners[corner]
            known[corner] = ray[:, 0] * (y - start[:, 1]) - ray[:, 1] * (x - start[:, 0]) >= 0.0
        return known[corner]

    def _cross_level(
        self,
        face: int,
        level: float,
        start: Array,
        ray: Array,
        length: Array,
        side_at: Array,
        result: Crossings,
    ) -> None:
        """Fill in the ceiling or the floor."""
        before, after = start[:, 2] - level, start[:, 2] + ray[:, 2] - level
        met = (before < 0.0) != (after < 0.0)
        if not met.any():
            return
        at = np.where(met, before / np.where(met, before - after, 1.0), np.inf)
        changes = np.count_nonzero((side_at > 0.0) & (side_at < at), axis=0)
        met &= contains(self.corners, start[:, :2]) != (changes % 2 == 1)
        result.at[face] = np.where(met, at, np.inf)
        result.cosine[face] = np.where(met, np.abs(ray[:, 2]) / length, 1.0)
        upward = 1.0 if face == self.ceiling else -1.0
        result.outward[face] = ray[:, 2] * upward > 0.0
        if self.holes.get(face):
            position = start[:, :2] + np.where(met, at, 0.0)[:, None] * ray[:, :2]
            rate = ray[:, 2] * upward
            self._look_into_holes(
                face, met, (position[:, 0], position[:, 1]), (ray[:, 0], ray[:, 1]), rate, result
            )

    def _look_into_holes(
        self,
        face: int,
        met: Flags,
        position: tuple[Array, Array],
        slopes: tuple[Array, Array],
        rate: Array,
        result: Crossings,
    ) -> None:
        """Set the masks of rays that pass a hole, wholly or partly, between the inner and the outer plane."""
        depth = np.where(met, self.thickness[face] / np.where(rate == 0.0, 1.0, rate), 0.0)
        shift = slopes[0] * depth, slopes[1] * depth
        mask = np.full(met.shape, SOLID, dtype=np.int64)
        for k, hole in enumerate(self.holes[face]):
            touched, within = _passes(position, shift, hole)
            bit = SOLID << (k + 1)
            mask = np.where(met & within, bit, np.where(met & touched, mask | bit, mask))
        result.mask[face] = mask

    def _cross_screen(
        self, face: int, screen: Upright, start: Array, ray: Array, length: Array, result: Crossings
    ) -> None:
        """Fill in a screen."""
        a, b = np.array(screen.start), np.array(screen.end)
        normal = self.normal(face)[:2]
        left_a = ray[:, 0] * (a[1] - start[:, 1]) - ray[:, 1] * (a[0] - start[:, 0]) >= 0.0
        left_b = ray[:, 0] * (b[1] - start[:, 1]) - ray[:, 1] * (b[0] - start[:, 0]) >= 0.0
        before = (start[:, :2] - a) @ normal
        rate = ray[:, :2] @ normal
        met = (left_a != left_b) & ((before < 0.0) != (before + rate < 0.0))
        at = np.where(met, -before / np.where(met, rate, 1.0), 0.0)
        height = start[:, 2] + at * ray[:, 2]
        met &= (height >= screen.bottom) & (height < screen.top)
        result.at[face] = np.where(met, at, np.inf)
        result.cosine[face] = np.where(met, np.abs(rate) / length, 1.0)
        result.outward[face] = rate > 0.0


def _passes(position: tuple[Array, Array], shift: tuple[Array, Array], hole: Hole) -> tuple[Flags, Flags]:
    """Which rays pass a hole anywhere between the planes, and which stay within it from plane to plane."""
    enter, leave = np.zeros(position[0].shape), np.ones(position[0].shape)
    within = np.ones(position[0].shape, dtype=bool)
    for axis in (0, 1):
        low, high = hole.low[axis], hole.high[axis]
        first, last = position[axis], position[axis] + shift[axis]
        within &= (first >= low) & (first < high) & (last >= low) & (last < high)
        step = np.where(shift[axis] == 0.0, 1e-300, shift[axis])
        one, two = (low - first) / step, (high - first) / step
        enter = np.maximum(enter, np.minimum(one, two))
        leave = np.minimum(leave, np.maximum(one, two))
    return enter < leave, within
