"""Convex solids: chords of many rays, distances, and how two solids lie to each other."""

from __future__ import annotations

from abc import ABC, abstractmethod
from dataclasses import dataclass

import numpy as np
from numpy.typing import ArrayLike, NDArray

Array = NDArray[np.float64]

NOTHING = np.inf
"""Start of the chord of a ray that misses; its end is minus this."""

TOUCH = 1e-9
"""Lengths below this [m] count as touching, not as overlapping."""


class Solid(ABC):
    """A convex solid."""

    centre: Array

    @abstractmethod
    def chord(self, origin: Array, direction: Array) -> tuple[Array, Array]:
        """Where rays (n, 3) enter and leave, in units of ``direction``; (inf, -inf) where they miss."""

    @abstractmethod
    def distance(self, points: ArrayLike) -> Array:
        """Distance from points (n, 3) to the solid, 0 inside, shape (n,) [m]."""

    @abstractmethod
    def surface(self) -> Array:
        """Points spread over the surface, shape (k, 3) [m]: corners and rims included."""

    @abstractmethod
    def inner_distance(self, points: Array) -> Array:
        """Depth of points (n, 3) under the surface [m]; negative outside."""

    def contains(self, points: ArrayLike) -> NDArray[np.bool_]:
        """Which points (n, 3) lie inside."""
        return self.inner_distance(np.atleast_2d(np.asarray(points, dtype=float))) >= 0.0


@dataclass(frozen=True)
class Box(Solid):
    """A box: ``rotation`` (3, 3) has the box's own axes as rows; ``half_sizes`` (3,) [m]."""

    centre: Array
    rotation: Array
    half_sizes: Array

    def _local(self, points: ArrayLike) -> Array:
        return (np.atleast_2d(np.asarray(points, dtype=float)) - self.centre) @ self.rotation.T

    def chord(self, origin: Array, direction: Array) -> tuple[Array, Array]:
        offset, steps = (np.atleast_2d(origin) - self.centre).T, np.atleast_2d(direction).T
        near, far = np.full(steps.shape[1], -NOTHING), np.full(steps.shape[1], NOTHING)
        for axis, half in zip(self.rotation, self.half_sizes, strict=True):
            start = axis[0] * offset[0] + axis[1] * offset[1] + axis[2] * offset[2]
            along = axis[0] * steps[0] + axis[1] * steps[1] + axis[2] * steps[2]
            parallel = along == 0.0
            inverse = 1.0 / np.where(parallel, 1.0, along)
            one, two = (-half - start) * inverse, (half - start) * inverse
            enter, leave = np.minimum(one, two), np.maximum(one, two)
            if parallel.any():
                beside = np.abs(start) > half
                enter = np.where(parallel, np.where(beside, NOTHING, -NOTHING), enter)
                leave = np.where(parallel, np.where(beside, -NOTHING, NOTHING), leave)
            near, far = np.maximum(near, enter), np.minimum(far, leave)
        return _met(near, far)

    def distance(self, points: ArrayLike) -> Array:
        return np.linalg.norm(np.maximum(np.abs(self._local(points)) - self.half_sizes, 0.0), axis=1)

    def inner_distance(self, points: Array) -> Array:
        return (self.half_sizes - np.abs(self._local(points))).min(axis=1)

    def surface(self) -> Array:
        steps = np.linspace(-1.0, 1.0, 9)
        grid = np.stack(np.meshgrid(steps, steps, steps), axis=-1).reshape(-1, 3)
        shell = grid[np.abs(grid).max(axis=1) == 1.0]
        return self.centre + (shell * self.half_sizes) @ self.rotation


@dataclass(frozen=True)
class Cylinder(Solid):
    """A cylinder with flat ends: unit ``axis`` (3,), ``radius`` and ``half_length`` [m]."""

    centre: Array
    axis: Array
    radius: float
    half_length: float

    def _split(self, points: ArrayLike) -> tuple[Array, Array]:
        """Position along the axis (n,), and the offset from it (n, 3)."""
        offset = np.atleast_2d(np.asarray(points, dtype=float)) - self.centre
        along = offset[:, 0] * self.axis[0] + offset[:, 1] * self.axis[1] + offset[:, 2] * self.axis[2]
        return along, offset - along[:, None] * self.axis

    def chord(self, origin: Array, direction: Array) -> tuple[Array, Array]:
        ux, uy, uz = self.axis
        px, py, pz = (np.atleast_2d(origin) - self.centre).T
        dx, dy, dz = direction.T
        along, rate = px * ux + py * uy + pz * uz, dx * ux + dy * uy + dz * uz
        a = dx * dx + dy * dy + dz * dz - rate * rate
        b = dx * px + dy * py + dz * pz - rate * along
        c = px * px + py * py + pz * pz - along * along - self.radius**2
        root = b * b - a * c
        parallel = a <= 1e-12 * (a + rate * rate)
        spread = np.sqrt(np.maximum(root, 0.0)) / np.where(parallel, 1.0, a)
        middle = -b / np.where(parallel, 1.0, a)
        missed = np.where(parallel, c > 0.0, root <= 0.0)
        near = np.where(parallel, -NOTHING, middle - spread)
        far = np.where(parallel, NOTHING, middle + spread)
        with np.errstate(divide="ignore", invalid="ignore"):
            one, two = (-self.half_length - along) / rate, (self.half_length - along) / rate
        flat, beyond = rate == 0.0, np.abs(along) > self.half_length
        cap_near = np.where(flat, np.where(beyond, NOTHING, -NOTHING), np.minimum(one, two))
        cap_far = np.where(flat, np.where(beyond, -NOTHING, NOTHING), np.maximum(one, two))
        near, far = np.maximum(near, cap_near), np.minimum(far, cap_far)
        return _met(np.where(missed, NOTHING, near), np.where(missed, -NOTHING, far))

    def distance(self, points: ArrayLike) -> Array:
        along, offset = self._split(points)
        outside = np.maximum(np.linalg.norm(offset, axis=1) - self.radius, 0.0)
        return np.hypot(outside, np.maximum(np.abs(along) - self.half_length, 0.0))

    def inner_distance(self, points: Array) -> Array:
        along, offset = self._split(points)
        return np.minimum(self.radius - np.linalg.norm(offset, axis=1), self.half_length - np.abs(along))

    def surface(self) -> Array:
        angles = np.linspace(0.0, 2.0 * np.pi, 48, endpoint=False)
        one, two = perpendicular(self.axis)
        rim = self.radius * (np.cos(angles)[:, None] * one + np.sin(angles)[:, None] * two)
        mantle = [rim + z * self.axis for z in np.linspace(-self.half_length, self.half_length, 17)]
        caps = [s * rim + e * self.half_length * self.axis for s in (0.0, 0.4, 0.8) for e in (-1.0, 1.0)]
        return self.centre + np.concatenate([*mantle, *caps])


@dataclass(frozen=True)
class Sphere(Solid):
    """A sphere."""

    centre: Array
    radius: float

    def chord(self, origin: Array, direction: Array) -> tuple[Array, Array]:
        offset = np.atleast_2d(origin) - self.centre
        a, b = np.einsum("ij,ij->i", direction, direction), np.einsum("ij,ij->i", direction, offset)
        root = b * b - a * (np.einsum("ij,ij->i", offset, offset) - self.radius**2)
        spread = np.sqrt(np.maximum(root, 0.0))
        missed = root <= 0.0
        return _met(
            np.where(missed, NOTHING, (-b - spread) / a), np.where(missed, -NOTHING, (-b + spread) / a)
        )

    def distance(self, points: ArrayLike) -> Array:
        offset = np.atleast_2d(np.asarray(points, dtype=float)) - self.centre
        return np.maximum(np.linalg.norm(offset, axis=1) - self.radius, 0.0)

    def inner_distance(self, points: Array) -> Array:
        return self.radius - np.linalg.norm(points - self.centre, axis=1)

    def surface(self) -> Array:
        count = 600
        height = 1.0 - (2.0 * np.arange(count) + 1.0) / count
        turn = np.pi * (3.0 - np.sqrt(5.0)) * np.arange(count)
        ring = np.sqrt(1.0 - height * height)
        unit = np.stack([ring * np.cos(turn), ring * np.sin(turn), height], axis=1)
        return self.centre + self.radius * unit


def perpendicular(axis: Array) -> tuple[Array, Array]:
    """Two unit vectors that make a right-handed frame with a unit vector: the first is level where it can be."""
    level = np.array([-axis[1], axis[0], 0.0])
    length = float(np.linalg.norm(level))
    one = level / length if length > 1e-12 else np.array([1.0, 0.0, 0.0])
    return one, np.cross(axis, one)


def relation(a: Solid, b: Solid) -> str:
    """How a lies to b: ``disjoint``, ``inside``, ``around`` or ``overlap``.

    Decided on points spread over both surfaces and the chords between them: solids that overlap by less than
    the spacing of these points may be called disjoint.
    """
    b_on_a, a_on_b = b.inner_distance(a.surface()), a.inner_distance(b.surface())
    if (b_on_a >= -TOUCH).all():
        return "inside"
    if (a_on_b >= -TOUCH).all():
        return "around"
    if (b_on_a > TOUCH).any() or (a_on_b > TOUCH).any() or _chords_overlap(a, b) or _chords_overlap(b, a):
        return "overlap"
    return "disjoint"


def _chords_overlap(a: Solid, b: Solid) -> bool:
    """Does a straight line between surface points of a run through b for more than a touch?"""
    points = a.surface()
    opposite = points[::-1]
    near, far = b.chord(points, opposite - points)
    return bool((np.minimum(far, 1.0) - np.maximum(near, 0.0) > 1e-6).any())


def _met(near: Array, far: Array) -> tuple[Array, Array]:
    missed = near >= far
    return np.where(missed, NOTHING, near), np.where(missed, -NOTHING, far)
