"""Rays through a room's faces. Kind: limit (parity, corners, order), hand-worked cases."""

from __future__ import annotations

import numpy as np
import pytest

from scatterbay.geometry.enclosure import SOLID, Enclosure, Hole, Upright

L_SHAPE = np.array([(0, 0), (6, 0), (6, 3), (3, 3), (3, 5), (0, 5)], dtype=float)
ROOM = Enclosure(L_SHAPE, 3.0, [0.3] * 8, {})
BOX = np.array([(0, 0), (6, 0), (6, 4), (0, 4)], dtype=float)


def test_a_line_changes_sides_as_often_as_its_ends_say() -> None:
    random = np.random.default_rng(1)
    start, end = (random.uniform((-2, -2, -2), (8, 7, 5), (50_000, 3)) for _ in range(2))
    crossed = np.isfinite(ROOM.crossings(start, end).at).sum(axis=0)
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
    crossed = np.isfinite(ROOM.crossings(np.broadcast_to(start, end.shape), end).at).sum(axis=0)
    assert ((crossed % 2 == 1) == ~ROOM.inside(end)).all()


def test_order_angle_and_direction() -> None:
    room = Enclosure(BOX, 3.0, [0.3] * 7, {}, (Upright((3.0, 1.0), (3.0, 3.0), 0.0, 2.0),))
    met = room.crossings(np.array([[1.0, 2.0, 1.0]]), np.array([9.0, 2.0, 1.0]))
    assert np.flatnonzero(np.isfinite(met.at[:, 0])).tolist() == [1, 6]
    assert met.at[6, 0] == pytest.approx(0.25)
    assert met.at[1, 0] == pytest.approx(0.625)
    assert met.cosine[[1, 6], 0] == pytest.approx(1.0)
    assert met.outward[1, 0]
    assert met.outward[6, 0]
    back = room.crossings(np.array([[9.0, 2.0, 1.0]]), np.array([1.0, 2.0, 1.0]))
    assert not back.outward[1, 0]
    assert not back.outward[6, 0]


def test_cosine_of_a_slanted_ray() -> None:
    room = Enclosure(BOX, 3.0, [0.3] * 6, {})
    met = room.crossings(np.array([[5.0, 2.0, 1.5]]), np.array([5.0 + 2.0, 2.0 + 1.0, 1.5]))
    assert met.cosine[1, 0] == pytest.approx(2.0 / np.sqrt(5.0))


def test_a_screen_has_ends_a_top_and_a_bottom() -> None:
    room = Enclosure(BOX, 3.0, [0.3] * 7, {}, (Upright((3.0, 1.0), (3.0, 3.0), 0.5, 2.0),))
    start = np.array([[1.0, y, z] for y, z in ((2.0, 1.0), (0.9, 1.0), (2.0, 2.1), (2.0, 0.4))])
    end = start + np.array([4.0, 0.0, 0.0])
    assert np.isfinite(room.crossings(start, end).at[6]).tolist() == [True, False, False, False]


@pytest.mark.parametrize(
    ("y", "slope", "mask"),
    [
        (2.0, 0.0, SOLID << 1),  # straight through the hole
        (0.5, 0.0, SOLID),  # beside it
        (0.9, 1.0, SOLID | SOLID << 1),  # enters the wall beside it, leaves it inside
        (2.9, 1.0, SOLID | SOLID << 1),  # enters inside, leaves beside
    ],
)
def test_an_opening_counts_if_the_ray_passes_it_at_either_plane(y: float, slope: float, mask: int) -> None:
    room = Enclosure(BOX, 3.0, [0.3] * 6, {1: (Hole((1.0, 0.5), (3.0, 2.5)),)})
    start = np.array([[6.0 - 1.0, y - slope, 1.0]])
    met = room.crossings(start, start[0] + np.array([3.0, 3.0 * slope, 0.0]))
    assert met.mask[1, 0] == mask


def test_a_narrow_hole_crossed_in_mid_wall_is_not_missed() -> None:
    """A steep ray meets a 60 mm slot neither at the inner nor at the outer plane, but in between."""
    room = Enclosure(BOX, 3.0, [0.3] * 6, {1: (Hole((1.97, 0.5), (2.03, 2.5)),)})
    start = np.array([[5.9, 2.0 - 0.25, 1.0]])
    met = room.crossings(start, start[0] + np.array([1.0, 1.0, 0.0]))
    assert met.mask[1, 0] == SOLID | SOLID << 1


def test_holes_in_the_ceiling() -> None:
    room = Enclosure(BOX, 3.0, [0.3] * 6, {4: (Hole((2.0, 1.0), (3.0, 2.0)),)})
    start = np.array([[2.5, 1.5, 1.0], [4.5, 1.5, 1.0]])
    met = room.crossings(start, start + np.array([0.0, 0.0, 4.0]))
    assert met.mask[4].tolist() == [SOLID << 1, SOLID]
