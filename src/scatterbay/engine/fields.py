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

RING_TURNS = 8
"""Mesh points round a ring, for each across it: its far side lies no denser than a wall's thickness."""


@dataclass(frozen=True)
class BeamField:
    """A field around a unit axis: ``kind`` is rectangle, cone, ring or everywhere.

    rectangle: half width and half height at distance 1 (tangents), turned about the axis [rad];
    the width is level where the axis is not vertical. cone: half angle [rad]. ring: all round the axis, up to the
    half angle [rad] to either side of the plane square to it.
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
        if self.kind == "ring":
            return 4.0 * math.pi * math.sin(self.half_angle)
        return 2.0 * math.pi * (1.0 - math.cos(self.half_angle))

    def holds(self, directions: Array, breadth: float = 0.0) -> Flags:
        """Which points (n, 3), seen from the source [m], lie in the field or within ``breadth`` [m] of it."""
        if self.kind == "everywhere":
            return np.ones(len(directions), dtype=bool)
        forward = directions @ self.axis
        if self.kind == "rectangle":
            wide, high = self.frame
            inside = np.abs(directions @ wide) <= self.half_width * forward + breadth
            return (
                (forward > 0.0) & inside & (np.abs(directions @ high) <= self.half_height * forward + breadth)
            )
        sideways = np.sqrt(np.maximum(np.einsum("ij,ij->i", directions, directions) - forward * forward, 0.0))
        angle = np.arctan2(sideways, forward)
        middle, half = (0.5 * math.pi, self.half_angle) if self.kind == "ring" else (0.0, self.half_angle)
        beyond = np.abs(angle - middle) - half
        away = np.hypot(sideways, forward) * np.sin(np.minimum(beyond, 0.5 * math.pi))
        return (beyond <= 1e-12) | (away <= breadth)

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
        if self.kind == "ring":
            top = math.sin(self.half_angle)
            directions = _around(self.axis, top * (1.0 - 2.0 * uniform[:, 0]), uniform[:, 1])
            return directions, np.full(len(uniform), self.solid_angle)
        return sample_cone(self.axis, math.cos(self.half_angle), uniform)

    def mesh(self, across: int) -> tuple[Array, Array]:
        """Directions (k, 3) and solid angles (k,) that sum to the field's: Gauss points, ``across`` each way."""
        nodes, weights = np.polynomial.legendre.leggauss(across)
        uniform, share = 0.5 * (nodes + 1.0), 0.5 * weights
        if self.kind == "rectangle":
            u, v = (part.ravel() for part in np.meshgrid(uniform, uniform, indexing="ij"))
            weight = np.outer(share, share).ravel()
        else:
            turns = (RING_TURNS if self.kind == "ring" else 2) * across
            u, v = (p.ravel() for p in np.meshgrid(uniform, (np.arange(turns) + 0.5) / turns, indexing="ij"))
            weight = np.repeat(share / turns, turns)
        directions, angle = self.sample(np.stack([u, v], axis=1))
        return directions, angle * weight


def sample_cone(axis: Array, least_cosine: float, uniform: Array) -> tuple[Array, Array]:
    """Unit directions (n, 3) evenly over a cone, and the solid angle each stands for (n,)."""
    cosine = 1.0 - (1.0 - least_cosine) * uniform[:, 0]
    directions = _around(axis, cosine, uniform[:, 1])
    return directions, np.full(len(uniform), 2.0 * np.pi * (1.0 - least_cosine))


def _around(axis: Array, cosine: Array, turns: Array) -> Array:
    """Unit directions (n, 3) at these cosines to an axis, turned about it by these shares of a full turn."""
    one, two = perpendicular(axis)
    sine, turn = np.sqrt(np.maximum(1.0 - cosine * cosine, 0.0)), 2.0 * np.pi * turns
    across = np.cos(turn)[:, None] * one + np.sin(turn)[:, None] * two
    return cosine[:, None] * axis + sine[:, None] * across
