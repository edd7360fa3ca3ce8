"""The field of a beam: directions in it, solid angles, and whether a point lies in it."""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from scatterbay.geometry.solids import perpendicular

Array = NDArray[np.float64]
Flags = NDArray[np.bool_]


@dataclass(frozen=True)
class BeamField:
    """A field around a unit axis: ``kind`` is rectangle, cone or everywhere.

    rectangle: half width and half height at distance 1 (tangents), turned about the axis [rad];
    the width is level where the axis is not vertical. cone: half angle [rad].
    """

    kind: str
    axis: Array
    half_width: float = 0.0
    half_height: float = 0.0
    half_angle: float = math.pi
    turned: float = 0.0

    @cached_property
    def frame(self) -> tuple[Array, Array]:
        """Unit vectors across the field: along its width and its height."""
        one, two = perpendicular(self.axis)
        c, s = math.cos(self.turned), math.sin(self.turned)
        return c * one + s * two, c * two - s * one

    @property
    def solid_angle(self) -> float:
        """[sr]"""
        if self.kind == "rectangle":
            a, b = self.half_width, self.half_height
            return 4.0 * math.atan(a * b / math.sqrt(1.0 + a * a + b * b))
        return 2.0 * math.pi * (1.0 - math.cos(self.half_angle))

    def holds(self, directions: Array) -> Flags:
        """Which directions (n, 3), of any length, lie in the field."""
        if self.kind == "everywhere":
            return np.ones(len(directions), dtype=bool)
        forward = directions @ self.axis
        if self.kind == "cone":
            return forward >= np.linalg.norm(directions, axis=1) * math.cos(self.half_angle)
        wide, high = self.frame
        inside = np.abs(directions @ wide) <= self.half_width * forward
        return (forward > 0.0) & inside & (np.abs(directions @ high) <= self.half_height * forward)

    def sample(self, uniform: Array) -> tuple[Array, Array]:
        """Unit directions (n, 3) from points of the unit square (n, 2), and the solid angle each stands for.

        The mean of a function times these solid angles is its integral over the field.
        """
        if self.kind == "rectangle":
            x = self.half_width * (2.0 * uniform[:, 0] - 1.0)
            y = self.half_height * (2.0 * uniform[:, 1] - 1.0)
            wide, high = self.frame
            length = np.sqrt(1.0 + x * x + y * y)
            directions = (self.axis + x[:, None] * wide + y[:, None] * high) / length[:, None]
            return directions, 4.0 * self.half_width * self.half_height / length**3
        return sample_cone(self.axis, math.cos(self.half_angle), uniform)

    def mesh(self, across: int) -> tuple[Array, Array]:
        """Directions (k, 3) and solid angles (k,) that sum to the field's: Gauss points, ``across`` each way."""
        nodes, weights = np.polynomial.legendre.leggauss(across)
        uniform, share = 0.5 * (nodes + 1.0), 0.5 * weights
        if self.kind == "rectangle":
            u, v = (part.ravel() for part in np.meshgrid(uniform, uniform, indexing="ij"))
            weight = np.outer(share, share).ravel()
        else:
            turns = 2 * across
            u, v = (p.ravel() for p in np.meshgrid(uniform, (np.arange(turns) + 0.5) / turns, indexing="ij"))
            weight = np.repeat(share / turns, turns)
        directions, angle = self.sample(np.stack([u, v], axis=1))
        return directions, angle * weight


def sample_cone(axis: Array, least_cosine: float, uniform: Array) -> tuple[Array, Array]:
    """Unit directions (n, 3) evenly over a cone, and the solid angle each stands for (n,)."""
    one, two = perpendicular(axis)
    cosine = 1.0 - (1.0 - least_cosine) * uniform[:, 0]
    sine, turn = np.sqrt(np.maximum(1.0 - cosine * cosine, 0.0)), 2.0 * np.pi * uniform[:, 1]
    across = np.cos(turn)[:, None] * one + np.sin(turn)[:, None] * two
    directions = cosine[:, None] * axis + sine[:, None] * across
    return directions, np.full(len(uniform), 2.0 * np.pi * (1.0 - least_cosine))
