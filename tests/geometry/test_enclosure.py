"""Rays through a room's faces. Kind: limit (parity, corners, order), hand-worked cases."""

from __future__ import annotations

import numpy as np
import pytest

from scatterbay.geometry.cells import Cells, Rectangle, cut, middles
from scatterbay.geometry.enclosure import OWN, Enclosure, FaceHits, Upright

L_SHAPE = np.array([(0, 0), (6, 0), (6, 3), (3, 3), (3, 5), (0, 5)], dtype=float)
ROOM = Enclosure(L_SHAPE, 3.0, [0.3] * 8, {})
BOX = np.array([(0, 0), (6, 0), (6, 4), (0, 4)], dtype=float)
OTHER = 2
"""Mask of the second kind of make-up of a face."""


def hole(low: tuple[float, float], high: tuple[float, float]) -> Cells:
    """A face of one kind with one rectangle of another."""
    one = Rectangle(low, high)
    first, second = cut([one])
    kinds = [[int(one.holds(x, y)) for y in middles(second)] for x in middles(first)]
    return Cells(first, second, np.array(kinds))


def test_a_line_changes_sides_as_often_as_its_ends_say() -> None:
    random = np.random.default_rng(1)
    start, end = (random.uniform((-2, -2, -2), (8, 7, 5), (50_000, 3)) for _ in range(2))
    crossed = ROOM.crossings(start, end).numbers()
    assert ((crossed % 2 == 1) == (ROOM.inside(start) != ROOM.inside(end))).all()
    assert crossed.max() > 2


def test_nothing_leaks_through_corners_and_edges() -> None:
    """Rays aimed exactly at corners, at upper edges and at the corners of the ceiling."""
    start = np.array([1.0, 1.0, 1.0])
    ends = [
        (1 + (x - 1) * s, 1 + (y - 1) * s, 1 + rise * s)
        for x, y in L_SHAPE
        for s in (1.0 + 1e-12, 1.5, 2.0, 7.0)
        for rise in (0.0, 0.3, 2.0, -1.0)
    ]
    end = np.array(ends)
    crossed = ROOM.crossings(np.broadcast_to(start, end.shape), end).numbers()
    assert ((crossed % 2 == 1) == ~ROOM.inside(end)).all()


def hits_of(room: Enclosure, start: list[float], end: list[float]) -> dict[int, FaceHits]:
    """What one ray crosses, by face."""
    return {hit.face: hit for hit in room.crossings(np.array([start]), np.array(end)).hits}


def test_order_angle_and_direction() -> None:
    room = Enclosure(BOX, 3.0, [0.3] * 7, {}, (Upright((3.0, 1.0), (3.0, 3.0), 0.0, 2.0),))
    met = hits_of(room, [1.0, 2.0, 1.0], [9.0, 2.0, 1.0])
    assert sorted(met) == [1, 6]
    assert met[6].at[0] == pytest.approx(0.25)
    assert met[1].at[0] == pytest.approx(0.625)
    assert met[1].cosine[0] == met[6].cosine[0] == pytest.approx(1.0)
    assert met[1].outward[0]
    assert met[6].outward[0]
    back = hits_of(room, [9.0, 2.0, 1.0], [1.0, 2.0, 1.0])
    assert not back[1].outward[0]
    assert not back[6].outward[0]


def test_cosine_of_a_slanted_ray() -> None:
    room = Enclosure(BOX, 3.0, [0.3] * 6, {})
    met = hits_of(room, [5.0, 2.0, 1.5], [7.0, 3.0, 1.5])
    assert met[1].cosine[0] == pytest.approx(2.0 / np.sqrt(5.0))


def test_a_screen_has_ends_a_top_and_a_bottom() -> None:
    room = Enclosure(BOX, 3.0, [0.3] * 7, {}, (Upright((3.0, 1.0), (3.0, 3.0), 0.5, 2.0),))
    start = np.array([[1.0, y, z] for y, z in ((2.0, 1.0), (0.9, 1.0), (2.0, 2.1), (2.0, 0.4))])
    end = start + np.array([4.0, 0.0, 0.0])
    (hit,) = room.crossings(start, end).hits
    assert hit.face == 6
    assert hit.rays.tolist() == [0]


@pytest.mark.parametrize(
    ("y", "slope", "mask"),
    [
        (2.0, 0.0, OTHER),  # straight through the hole
        (0.5, 0.0, OWN),  # beside it
        (0.9, 1.0, OWN | OTHER),  # enters the wall beside it, leaves it inside
        (2.9, 1.0, OWN | OTHER),  # enters inside, leaves beside
    ],
)
def test_an_opening_counts_if_the_ray_passes_it_at_either_plane(y: float, slope: float, mask: int) -> None:
    room = Enclosure(BOX, 3.0, [0.3] * 6, {1: hole((1.0, 0.5), (3.0, 2.5))})
    met = hits_of(room, [5.0, y - slope, 1.0], [8.0, y + 2.0 * slope, 1.0])
    assert met[1].mask[0] == mask


def test_a_narrow_hole_crossed_in_mid_wall_is_not_missed() -> None:
    """A steep ray meets a 60 mm slot neither at the inner nor at the outer plane, but in between."""
    room = Enclosure(BOX, 3.0, [0.3] * 6, {1: hole((1.97, 0.5), (2.03, 2.5))})
    met = hits_of(room, [5.9, 1.75, 1.0], [6.9, 2.75, 1.0])
    assert met[1].mask[0] == OWN | OTHER


def test_holes_in_the_ceiling() -> None:
    room = Enclosure(BOX, 3.0, [0.3] * 6, {4: hole((2.0, 1.0), (3.0, 2.0))})
    for x, mask in ((2.5, OTHER), (4.5, OWN)):
        assert hits_of(room, [x, 1.5, 1.0], [x, 1.5, 5.0])[4].mask[0] == mask
