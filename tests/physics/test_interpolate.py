"""Interpolators against scipy's. Kind: independent route."""

from __future__ import annotations

import numpy as np
import pytest
from numpy.typing import NDArray
from scipy.interpolate import CubicSpline, PchipInterpolator

from scatterbay.physics.interpolate import cubic, hermite, log_log, spline_matrix

Array = NDArray[np.float64]

RANDOM = np.random.default_rng(7)
NODES = np.cumsum(RANDOM.uniform(0.1, 2.0, 14))
VALUES = RANDOM.normal(size=(3, NODES.size))
INSIDE = np.linspace(NODES[0], NODES[-1], 301)
SHAPES = {
    "rough": VALUES,
    "rising": np.cumsum(np.abs(VALUES), axis=1),
    "with a level stretch": np.round(VALUES),
}


@pytest.mark.parametrize("shape", sorted(SHAPES))
def test_cubic_is_pchip(shape: str) -> None:
    values = SHAPES[shape]
    expected = PchipInterpolator(NODES, values, axis=-1)(INSIDE)
    np.testing.assert_allclose(cubic(INSIDE, NODES, values), expected, rtol=1e-11, atol=1e-12)


@pytest.mark.parametrize("count", [2, 3])
def test_cubic_of_few_nodes_is_pchip(count: int) -> None:
    nodes, values = NODES[:count], VALUES[:, :count]
    x = np.linspace(nodes[0], nodes[-1], 31)
    expected = PchipInterpolator(nodes, values, axis=-1)(x)
    np.testing.assert_allclose(cubic(x, nodes, values), expected, rtol=1e-11, atol=1e-12)


def test_cubic_never_leaves_the_range_of_its_neighbours() -> None:
    """Limit: shape-preserving means no overshoot between two nodes."""
    index = np.clip(np.searchsorted(NODES, INSIDE, side="right") - 1, 0, NODES.size - 2)
    low = np.minimum(VALUES[:, index], VALUES[:, index + 1])
    high = np.maximum(VALUES[:, index], VALUES[:, index + 1])
    found = cubic(INSIDE, NODES, VALUES)
    assert (found >= low - 1e-12).all()
    assert (found <= high + 1e-12).all()


@pytest.mark.parametrize("count", [4, 5, 9, 14])
def test_spline_matrix_is_the_not_a_knot_spline(count: int) -> None:
    nodes, values = NODES[:count], VALUES[0, :count]
    x = np.linspace(nodes[0], nodes[-1], 101)
    expected = CubicSpline(nodes, values, bc_type="not-a-knot")(x)
    np.testing.assert_allclose(spline_matrix(nodes, x) @ values, expected, rtol=1e-9, atol=1e-10)


def test_hermite_repeats_a_cubic_exactly() -> None:
    """Closed form: any cubic is its own interpolant when its slopes are given."""

    def polynomial(x: Array) -> Array:
        return 2.0 - x + 0.5 * x**2 - 0.1 * x**3

    slopes = -1.0 + NODES - 0.3 * NODES**2
    found = hermite(INSIDE, NODES, polynomial(NODES), slopes)
    np.testing.assert_allclose(found, polynomial(INSIDE), rtol=1e-11, atol=1e-11)


def test_log_log_repeats_a_power_law_exactly() -> None:
    """Closed form."""
    x = np.geomspace(NODES[0], NODES[-1], 57)
    np.testing.assert_allclose(log_log(x, NODES, 3.0 * NODES**-2.7), 3.0 * x**-2.7, rtol=1e-12)
