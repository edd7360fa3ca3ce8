"""Outlines in the plan against hand-worked cases. Kind: limit, independent route."""

from __future__ import annotations

import numpy as np
import pytest

from scatterbay.geometry.outline import contains, crosses_itself, distance_to_edges, signed_area

SQUARE = [(0.0, 0.0), (6.0, 0.0), (6.0, 4.0), (0.0, 4.0)]
L_SHAPE = [(0.0, 0.0), (6.0, 0.0), (6.0, 3.0), (3.0, 3.0), (3.0, 5.0), (0.0, 5.0)]


def test_area_has_the_sign_of_the_turn() -> None:
    assert signed_area(SQUARE) == pytest.approx(24.0)
    assert signed_area(SQUARE[::-1]) == pytest.approx(-24.0)
    assert signed_area(L_SHAPE) == pytest.approx(24.0)


@pytest.mark.parametrize(
    ("corners", "crosses"),
    [
        (SQUARE, False),
        (L_SHAPE, False),
        ([(0, 0), (4, 4), (4, 0), (0, 4)], True),
        ([(0, 0), (4, 0), (2, 0), (2, 3)], True),
        ([(0, 0), (4, 0), (4, 4), (2, 0), (0, 4)], True),
    ],
)
def test_self_crossing(corners: list[tuple[float, float]], crosses: bool) -> None:
    assert crosses_itself(corners) is crosses


def test_inside_agrees_with_winding_angles() -> None:
    """Independent route: a point is inside where the corners' directions turn once around it."""
    random = np.random.default_rng(5)
    points = random.uniform(-1.0, 7.0, (400, 2))
    corners = np.array(L_SHAPE)
    angle = np.zeros(len(points))
    for a, b in zip(corners, np.roll(corners, -1, axis=0), strict=True):
        one, two = a - points, b - points
        angle += np.arctan2(one[:, 0] * two[:, 1] - one[:, 1] * two[:, 0], (one * two).sum(axis=1))
    assert (contains(L_SHAPE, points) == (np.abs(angle) > np.pi)).all()


def test_distance_to_edges() -> None:
    found = distance_to_edges(SQUARE, [(1.0, 1.5), (7.0, 5.0), (3.0, -2.0)])
    assert found == pytest.approx([1.0, np.sqrt(2.0), 2.0])
