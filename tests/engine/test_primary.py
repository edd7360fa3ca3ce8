"""The lit patch and the plane. Kind: limit, independent route (brute sum over a patch)."""

from __future__ import annotations

import itertools

import numpy as np
import pytest

from scatterbay.barriers.makeup import sheet
from scatterbay.barriers.store import answer
from scatterbay.engine.named import spectrum_of
from scatterbay.engine.single import PatchGeometry, transmission
from scatterbay.errors import OutOfRangeError, UsageError
from scatterbay.physics import dose
from scatterbay.scenario.beam_text import named_beam
from tests.engine.bays import bay, computed

CONCRETE = (sheet("concrete", 0.13),)
TUBE = spectrum_of(named_beam("X-ray 100 kV, aluminium 3 mm"))


def patch(side: float, point: float = 1.0) -> float:
    found = transmission(TUBE, CONCRETE, 0.0, PatchGeometry(side, side, 2.0, point))
    assert found.patch is not None
    return float(found.patch[0])


def test_patch_grows_with_the_field_from_the_uncollided_beam_to_the_plane() -> None:
    plane = transmission(TUBE, CONCRETE)
    values = [patch(side) for side in (0.005, 0.1, 0.4, 1.0, 3.0, 8.0)]
    assert values[0] == pytest.approx(float(plane.uncollided[0]), rel=0.02)
    assert all(a <= b * (1 + 1e-9) for a, b in itertools.pairwise(values))
    assert values[-1] == pytest.approx(float(plane.plane[0]), rel=1e-3)


def test_patch_against_a_brute_sum_over_the_far_face() -> None:
    """Independent route: one energy, normal incidence all over, a fine square mesh on the far face.

    T = E + sum of g(mu) / 2 pi  x  (d_point / d_face)^2  x  mu dA / rho^2, with g the emergent dose per unit cosine.
    """
    beam = spectrum_of(named_beam("662 keV"))
    wall = (sheet("concrete", 0.2),)
    side, near, behind = 0.3, 2.0, 0.8
    found = transmission(beam, wall, 0.0, PatchGeometry(side, side, near, behind))
    half = 0.5 * side * (near + 0.2) / near
    steps = 400
    x = (np.arange(steps) + 0.5) / steps * 2 * half - half
    square = x[:, None] ** 2 + x[None, :] ** 2 + behind**2
    outgoing = behind / np.sqrt(square)
    emergent = answer(wall).emergent(beam.energy_kev, np.array([1.0]), np.linspace(0, 1, 201))[0, 0, 0]
    bright = np.interp(outgoing, np.linspace(0, 1, 201), emergent) / dose.per_fluence(beam.energy_kev)[0, 0]
    area = (2 * half / steps) ** 2
    face = (x[:, None] ** 2 + x[None, :] ** 2 + (near + 0.2) ** 2) / (near + 0.2 + behind) ** 2
    scattered = float((bright / (2 * np.pi) * outgoing / square / face).sum() * area)
    assert found.patch is not None
    assert found.patch[0] - found.uncollided[0] == pytest.approx(scattered, rel=0.01)


def test_a_slanted_beam_is_stopped_more_but_not_as_by_slant_thickness() -> None:
    beam = spectrum_of(named_beam("Co-60"))
    wall = (sheet("concrete", 0.3),)
    straight = transmission(beam, wall).plane[0]
    slanted = transmission(beam, wall, np.radians(60.0)).plane[0]
    doubled = transmission(beam, (sheet("concrete", 0.6),)).plane[0]
    assert doubled < slanted < straight
    assert slanted > 1.5 * doubled


def test_angles_and_layers_that_make_no_sense() -> None:
    with pytest.raises(UsageError):
        transmission(TUBE, ())
    with pytest.raises(OutOfRangeError):
        transmission(TUBE, CONCRETE, np.radians(86.0))
    with pytest.raises(OutOfRangeError):
        transmission(TUBE, CONCRETE, np.radians(80.0), PatchGeometry(2.0, 2.0, 1.0, 1.0))


def primary(scenario_text: dict[str, str], place: str) -> float:
    rows = [r for r in computed(bay(**scenario_text)).rows if r.place == place and r.path == "primary"]
    return float(rows[0].values.mean(axis=0)[0])


def test_places_beside_the_beam_get_light_from_the_patch_less_the_farther_they_are() -> None:
    east, beside, north = (primary({}, name) for name in ("east", "beside", "north"))
    assert east > beside > 0.0
    assert north == 0.0


def test_a_body_in_the_beam_counts_only_when_the_scenario_says_so() -> None:
    bare = primary({}, "east")
    weakened = primary({"at:_[1.2,_1.8,_1.1],": "object: in the beam, at: [1.2, 1.8, 1.1],"}, "east")
    assert 0.0 < weakened < 0.2 * bare


def test_primary_by_plane_on_request() -> None:
    lit = primary({}, "east")
    plane = primary({"workload:": "options: {primary by: plane}\nworkload:"}, "east")
    bound = next(r for r in computed(bay()).rows if r.place == "east" and r.path == "primary as a plane")
    assert plane == pytest.approx(float(bound.values.mean(axis=0)[0]), rel=1e-12)
    assert plane >= lit
