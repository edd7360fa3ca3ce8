"""Kind: independent route. Scatter of all orders from one body against Monte Carlo that shares only cross sections."""

from __future__ import annotations

import numpy as np
import pytest

from scatterbay.physics import dose
from tests.engine.one_body import along_x, one_line, setting
from tests.independent.body_monte_carlo import Box, Cylinder, Shape, Sphere, scatter_from_body

BOUND = 0.03
"""Largest deviation beyond three standard errors of both together."""
ANGLES_DEG = (15.0, 45.0, 90.0, 135.0, 165.0)
HALF_FIELD = 0.08
"""Half width and height of the field at the body's centre, 1 m from the source [m]."""
PER_REPLICATE = 2048

CASES: list[tuple[str, str, tuple[float, ...], Shape, float, int]] = [
    ("water", "box", (0.2, 0.3, 0.3), Box((0.2, 0.3, 0.3)), 60.0, 30_000),
    ("water", "cylinder", (0.3, 0.3), Cylinder(0.15, 0.3), 150.0, 30_000),
    ("PMMA", "sphere", (0.3,), Sphere(0.15), 100.0, 30_000),
    ("water", "box", (0.2, 0.3, 0.3), Box((0.2, 0.3, 0.3)), 1250.0, 30_000),
    ("steel", "box", (0.03, 0.3, 0.3), Box((0.03, 0.3, 0.3)), 150.0, 60_000),
    ("steel", "box", (0.03, 0.3, 0.3), Box((0.03, 0.3, 0.3)), 662.0, 60_000),
    ("concrete", "box", (0.2, 0.3, 0.3), Box((0.2, 0.3, 0.3)), 300.0, 40_000),
    ("lead", "box", (0.01, 0.3, 0.3), Box((0.01, 0.3, 0.3)), 300.0, 60_000),
]


@pytest.mark.parametrize(("name", "shape", "sizes", "same", "energy", "histories"), CASES)
def test_scatter_round_a_body(
    name: str, shape: str, sizes: tuple[float, ...], same: Shape, energy: float, histories: int
) -> None:
    """Air kerma 1 m from the centre, 15 to 165 degrees to the beam, per incident air kerma on the axis."""
    angles = np.radians(ANGLES_DEG)
    ring = np.stack([np.cos(angles), np.sin(angles), 0.1 * np.ones(angles.size)], axis=1)
    foreign = scatter_from_body(
        same, name, energy, (-1.0, 0.0, 0.0), (2 * HALF_FIELD, 2 * HALF_FIELD), ring, histories, seed=1
    )
    case = setting((name,), shape, (1.0, 0.0, 0.0), sizes, along_x(HALF_FIELD), one_line(energy))
    first = case.first(PER_REPLICATE)
    walk = case.walk(first)
    row = dose.QUANTITIES.index(dose.AIR_KERMA)
    entrance = 1.0 - float(same.span(np.array([[1.0, 0.0, 0.0]]), np.array([[-1.0, 0.0, 0.0]]))[1][0] - 1.0)
    incident = float(dose.per_fluence(np.array([energy]))[row, 0]) / entrance**2
    for k, place in enumerate(ring + np.array([1.0, 0.0, 0.0])):
        once, once_error = (values[row] / incident for values in case.dose(first, place))
        more, more_error = (values[row] / incident for values in case.dose(walk.points, place))
        error = float(np.hypot(more_error, foreign.standard_error[k]))
        assert once + more == pytest.approx(foreign.total[k], abs=BOUND * foreign.total[k] + 3.0 * error)
        assert once == pytest.approx(foreign.single[k], rel=BOUND + 3.0 * once_error / once)
