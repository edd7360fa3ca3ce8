"""The map of doses. Kind: limit, independent route (place by place)."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from scatterbay.advice.dose_map import SMOOTH, Plane, dose_map, in_fabric
from scatterbay.engine.contributions import PLANE_BOUND, Effort, Kept, contributions
from scatterbay.engine.many import at_many
from scatterbay.engine.scene import build_scene
from scatterbay.errors import UsageError
from scatterbay.exposure.assess import assess
from scatterbay.physics import dose
from scatterbay.scenario import load
from scatterbay.scenario.parts import Place
from tests.engine.bays import bay

FEW = Effort(64, 32, 1)


def test_many_places_at_once_give_what_one_by_one_gives() -> None:
    """The same scatter points: every path of every beam agrees to rounding."""
    scene = build_scene(bay())
    kept: Kept = {}
    rows = contributions(scene, FEW, kept).rows
    found = at_many(scene, np.array([p.at for p in scene.places]), FEW, kept)
    for k, place in enumerate(scene.places):
        for (path, beam), values in found.beams.items():
            same = [
                r
                for r in rows
                if (r.place, r.beam, r.path) == (place.name, beam, path) and r.path != PLANE_BOUND
            ]
            expected = sum(r.drive * r.values.mean(axis=0) for r in same)
            assert values[:, k] == pytest.approx(expected, rel=1e-9)


@pytest.mark.parametrize("time_base", ["rate", "hour", "week", "year"])
def test_the_map_against_the_assessment(time_base: str) -> None:
    """At points of the map, assessed as places at full occupancy: within three standard errors and 2 %."""
    scenario = bay()
    found = dose_map(scenario, Plane(2, 1.2), time_base, count=40)
    picked = np.argwhere(np.isfinite(found.error))[::97]
    places = tuple(
        Place(f"{i} {j}", (float(found.first[j]), float(found.second[i]), 1.2), "others", 1.0, "")
        for i, j in picked
    )
    moved = replace(scenario, places=places)
    scene = build_scene(moved)
    for place, (i, j) in zip(assess(moved, scene, contributions(scene)).places, picked, strict=True):
        figure = place.figures[time_base, dose.AMBIENT]
        allowed = 0.02 + 3.0 * found.error[i, j] + 3.0 * figure.standard_error / figure.value
        assert found.values[i, j] == pytest.approx(figure.value, rel=allowed), place.name


def test_what_is_filled_in_lies_close_to_what_is_computed() -> None:
    """Filled points computed after all: within the step that is taken for smooth, nine in ten within 1 %."""
    scenario = replace(bay(), bodies=())
    found = dose_map(scenario, Plane(2, 1.2), count=100)
    filled = np.argwhere(np.isfinite(found.values) & np.isnan(found.error))[::5]
    assert 0 < found.computed < np.isfinite(found.values).sum()
    spots = np.array([(found.first[j], found.second[i], 1.2) for i, j in filled])
    exact = at_many(build_scene(scenario), spots).whole("shot")[dose.QUANTITIES.index(dose.AMBIENT)]
    off = np.abs(found.values[filled[:, 0], filled[:, 1]] / exact - 1.0)
    assert off.max() < SMOOTH
    assert np.quantile(off, 0.9) < 0.01


def test_a_coarse_map_skips_nothing() -> None:
    """Points farther apart than a gap in a wall could be are all computed."""
    found = dose_map(replace(bay(), bodies=()), Plane(2, 1.2), count=30)
    assert found.computed == int(np.isfinite(found.values).sum())


def test_walls_and_bodies_are_left_out() -> None:
    scenario = bay()
    found = dose_map(scenario, Plane(2, 1.0), count=60)
    x, y = np.meshgrid(found.first, found.second)
    points = np.column_stack([x.ravel(), y.ravel(), np.ones(x.size)])
    out = np.isnan(found.values).ravel()
    assert out[in_fabric(scenario, points)].all()
    middle = np.hypot(x - 2.5, y - 2.0).ravel()
    assert out[middle < 0.14].all()
    assert not out[(np.abs(x.ravel() - 1.0) < 0.4) & (np.abs(y.ravel() - 3.0) < 0.4)].any()


def test_a_section_shows_floor_and_ceiling() -> None:
    found = dose_map(bay(), Plane(1, 2.2), count=60)
    assert found.second.min() < 0.0
    assert found.second.max() > 3.12
    in_ceiling = (found.second > 3.0) & (found.second < 3.12)
    inside = (found.first > 0.2) & (found.first < 4.8)
    assert np.isnan(found.values[np.ix_(in_ceiling, inside)]).all()


@pytest.mark.parametrize(
    ("plane", "time_base", "said"),
    [
        (Plane(2, 50.0), "rate", "does not meet"),
        (Plane(0, 7.0), "rate", "does not cut the room"),
        (Plane(2, 1.0), "day", "cannot be mapped"),
    ],
)
def test_refused(plane: Plane, time_base: str, said: str) -> None:
    with pytest.raises(UsageError, match=said):
        dose_map(bay(), plane, time_base, count=20)


def test_stored_sources_are_on_the_map() -> None:
    """Right beside the container the stored source is most of the week."""
    scenario = load("scenarios/projector-job.yaml")
    found = dose_map(scenario, Plane(2, 0.3), "week", count=30)
    i, j = (int(np.argmin(np.abs(axis - 1.3))) for axis in (found.second, found.first))
    assert np.isfinite(found.values[i, j])
    assert found.values[i, j] > 1e-6


@pytest.mark.parametrize("name", ["projector-job", "pipe-shop", "weld-bay"])
def test_nowhere_is_more_than_scatter_could_add_to_the_bare_sources(name: str) -> None:
    """Limit: three times what the sources would give with no walls and no bodies, anywhere on the plan."""
    scenario = load(f"scenarios/{name}.yaml")
    plane = Plane(2, 1.0)
    found, scene = dose_map(scenario, plane, count=44), build_scene(scenario)
    x, y = np.meshgrid(found.first, found.second)
    points = plane.points(x.ravel(), y.ravel()).reshape(*x.shape, 3)
    row = dose.QUANTITIES.index(dose.AMBIENT)
    bare = np.zeros(x.shape)
    for beam in scene.beams:
        square = np.maximum(((points - beam.origin) ** 2).sum(axis=-1), 0.05**2)
        bare += beam.drive * beam.spectrum.dose_at_1_m()[row] / square
    mapped = np.isfinite(found.values)
    assert (found.values[mapped] <= 3.0 * bare[mapped]).all()
