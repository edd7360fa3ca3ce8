"""Solids of the shapes a scenario names."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from scatterbay.geometry.solids import Box, Cylinder, Solid, Sphere, perpendicular


def solids(
    shape: str, centre: ArrayLike, sizes: tuple[float, ...], axis: ArrayLike, turned: float
) -> list[Solid]:
    """The solids of a body, outermost first: two for a pipe (its outside, and what it encloses), else one.

    Parameters
    ----------
    shape : box, cylinder, sphere, pipe or plate.
    centre : (3,) [m].
    sizes : box (x, y, z); cylinder (diameter, length); sphere (diameter,); pipe (outer diameter, wall, length);
        plate (width, height, thickness) [m].
    axis : unit vector along a cylinder or a pipe, or the normal of a plate, (3,).
    turned : rotation of a box about the vertical [rad].
    """
    middle, along = np.asarray(centre, dtype=float), np.asarray(axis, dtype=float)
    if shape == "sphere":
        return [Sphere(middle, 0.5 * sizes[0])]
    if shape == "cylinder":
        return [Cylinder(middle, along, 0.5 * sizes[0], 0.5 * sizes[1])]
    if shape == "pipe":
        outer, wall, length = sizes
        inner = 0.5 * outer - wall
        return [
            Cylinder(middle, along, 0.5 * outer, 0.5 * length),
            Cylinder(middle, along, inner, 0.5 * length),
        ]
    if shape == "plate":
        one, two = perpendicular(along)
        return [Box(middle, np.stack([one, two, along]), 0.5 * np.array(sizes))]
    if shape == "box":
        c, s = np.cos(turned), np.sin(turned)
        rotation = np.array([[c, s, 0.0], [-s, c, 0.0], [0.0, 0.0, 1.0]])
        return [Box(middle, rotation, 0.5 * np.array(sizes))]
    raise ValueError(f"no solid is known for the shape '{shape}'")
