"""Chords, distances and nesting of solids. Kind: independent route (sampling), limit (closed forms)."""

from __future__ import annotations

import numpy as np
import pytest
from numpy.typing import NDArray

from scatterbay.geometry.bodies import solids
from scatterbay.geometry.solids import Solid, relation

TILTED = np.array([2.0, 1.0, 2.0]) / 3.0
SHAPES = {
    "box": solids("box", (0.1, -0.2, 0.3), (1.0, 0.6, 0.4), (0, 0, 1), 0.7)[0],
    "cylinder": solids("cylinder", (0.1, 0.2, 0.0), (0.8, 1.2), TILTED, 0.0)[0],
    "sphere": solids("sphere", (0.0, 0.1, 0.0), (0.9,), (0, 0, 1), 0.0)[0],
    "plate": solids("plate", (0.0, 0.0, 0.1), (1.0, 0.5, 0.05), TILTED, 0.0)[0],
}


def rays(count: int) -> tuple[NDArray[np.float64], NDArray[np.float64]]:
    random = np.random.default_rng(11)
    start, end = random.uniform(-2, 2, (count, 3)), random.uniform(-0.5, 0.5, (count, 3))
    return start, end - start


@pytest.mark.parametrize("name", sorted(SHAPES))
def test_chord_agrees_with_stepping_along_the_ray(name: str) -> None:
    """Independent route: count the steps of a fine walk that lie inside."""
    solid = SHAPES[name]
    start, ray = rays(300)
    near, far = solid.chord(start, ray)
    steps = np.linspace(0.0, 2.0, 4001)
    inside = np.stack([solid.contains(start + t * ray) for t in steps])
    length = np.maximum(np.minimum(far, 2.0) - np.maximum(near, 0.0), 0.0)
    assert length == pytest.approx(inside.sum(axis=0) * (steps[1] - steps[0]), abs=2e-3)


@pytest.mark.parametrize("name", sorted(SHAPES))
def test_ends_of_a_chord_lie_on_the_surface(name: str) -> None:
    solid = SHAPES[name]
    start, ray = rays(300)
    near, far = solid.chord(start, ray)
    hit = near < far
    assert hit.sum() > 50
    for t in (near, far):
        points = start[hit] + t[hit, None] * ray[hit]
        assert solid.inner_distance(points) == pytest.approx(0.0, abs=1e-9)


@pytest.mark.parametrize("name", sorted(SHAPES))
def test_distance_agrees_with_the_nearest_surface_point(name: str) -> None:
    """Independent route: the nearest of many points inside, refined; never smaller than the distance."""
    solid = SHAPES[name]
    random = np.random.default_rng(3)
    cloud = random.uniform(-1.2, 1.2, (40000, 3))
    cloud = np.concatenate([cloud[solid.contains(cloud)], solid.surface()])
    points = random.uniform(-2, 2, (40, 3))
    nearest = np.linalg.norm(points[:, None, :] - cloud[None, :, :], axis=2).min(axis=1)
    found = solid.distance(points)
    assert (found <= nearest + 1e-9).all()
    assert found == pytest.approx(nearest, abs=0.06)


def test_rays_parallel_to_faces_and_axes() -> None:
    box = solids("box", (0, 0, 0), (2, 2, 2), (0, 0, 1), 0.0)[0]
    cylinder = solids("cylinder", (0, 0, 0), (2, 4), (0, 0, 1), 0.0)[0]
    start = np.array([[-5.0, 0.5, 0.0], [-5.0, 1.5, 0.0], [0.0, 0.0, -9.0], [3.0, 0.0, -9.0]])
    ray = np.array([[1.0, 0, 0], [1.0, 0, 0], [0, 0, 1.0], [0, 0, 1.0]])
    near, far = box.chord(start, ray)
    assert (far - near)[[0, 2]] == pytest.approx([2.0, 2.0])
    assert (near > far)[[1, 3]].all()
    near, far = cylinder.chord(start[2:], ray[2:])
    assert far[0] - near[0] == pytest.approx(4.0)
    assert near[1] > far[1]


def test_nesting() -> None:
    outer, inner = solids("pipe", (0, 0, 0), (0.3, 0.01, 1.0), (0, 1, 0), 0.0)
    assert relation(inner, outer) == "inside"
    assert relation(outer, inner) == "around"
    ball = solids("sphere", (3.0, 0, 0), (0.5,), (0, 0, 1), 0.0)[0]
    assert relation(ball, outer) == "disjoint"
    crossing = solids("cylinder", (0, 0, 0), (0.05, 2.0), (1.0, 0, 0), 0.0)[0]
    assert relation(crossing, outer) == "overlap"


def test_crossing_rods_overlap_though_no_surface_point_may_show_it() -> None:
    one: Solid = solids("cylinder", (0, 0, 0), (0.02, 3.0), (1.0, 0, 0), 0.0)[0]
    two: Solid = solids("cylinder", (0, 0, 0), (0.02, 3.0), (0, 1.0, 0), 0.0)[0]
    assert relation(one, two) == "overlap"
