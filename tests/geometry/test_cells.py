"""Faces cut into cells, and what a ray may meet. Kind: hand-worked cases, limit."""

from __future__ import annotations

import numpy as np

from scatterbay.geometry.cells import Cells, Rectangle, cut, middles

LINED = Cells(np.array([0.0, 6.0]), np.array([0.0, 2.1]), np.array([[0, 0, 0], [0, 1, 0], [0, 0, 0]]))
"""Six metres of a wall lined up to 2.1 m."""


def mask(
    cells: Cells, at: tuple[float, float], shift: tuple[float, float] = (0.0, 0.0), breadth: float = 0.0
) -> int:
    position = np.array([at[0]]), np.array([at[1]])
    return int(cells.masks(position, (np.array([shift[0]]), np.array([shift[1]])), breadth)[0])


def test_a_ray_meets_what_is_there() -> None:
    assert mask(LINED, (3.0, 1.0)) == 0b10
    assert mask(LINED, (3.0, 2.5)) == 0b01


def test_a_slanted_ray_meets_both() -> None:
    assert mask(LINED, (3.0, 2.0), (0.0, 0.3)) == 0b11
    assert mask(LINED, (3.0, 2.4), (0.0, -0.4)) == 0b11


def test_a_hands_breadth_finds_the_edge() -> None:
    assert mask(LINED, (3.0, 2.04), breadth=0.05) == 0b10
    assert mask(LINED, (3.0, 2.06), breadth=0.05) == 0b11
    assert mask(LINED, (3.0, 2.14), breadth=0.05) == 0b11
    assert mask(LINED, (3.0, 2.16), breadth=0.05) == 0b01


def test_blocks_never_hold_less_than_fine_steps_along_the_ray_meet() -> None:
    """Independent route: the kinds met at 200 points along each ray are all in its mask."""
    random = np.random.default_rng(3)
    rectangles = [Rectangle(tuple(low), tuple(low + size)) for low, size in random.random((5, 2, 2))]
    first, second = cut(rectangles)
    kinds = [[sum(r.holds(x, y) for r in rectangles) for y in middles(second)] for x in middles(first)]
    cells = Cells(first, second, np.array(kinds))
    start, shift = random.random((2, 500)) * 2.0, random.normal(0.0, 0.3, (2, 500))
    found = cells.masks((start[0], start[1]), (shift[0], shift[1]), 0.0)
    for along in np.linspace(0.0, 1.0, 200):
        i = np.searchsorted(first, start[0] + along * shift[0], side="right")
        j = np.searchsorted(second, start[1] + along * shift[1], side="right")
        assert ((found >> cells.kinds[i, j]) & 1 == 1).all()


def test_no_wider_than_the_block_around_the_ray() -> None:
    assert mask(LINED, (-0.5, 1.0), (0.4, 0.0)) == 0b01
