"""Single scatter from a body: adaptive quadrature and the thin-body limit. Kinds: independent route, closed form.

The quadrature takes nothing from the engine: it integrates the pure functions of the physics room over the directions
of a cone of radiation and the depth in a sphere, and finds its own way in and out of the sphere.
"""

from __future__ import annotations

import functools
import math

import numpy as np
import pytest
from numpy.typing import NDArray
from scipy.integrate import quad_vec

from scatterbay.engine.fields import BeamField
from scatterbay.physics import dose
from scatterbay.physics.binding import Fractions
from scatterbay.physics.compton import scattered_energy
from scatterbay.physics.medium import medium
from scatterbay.tables.materials import Material, material
from tests.engine.one_body import ORIGIN, along_x, one_line, setting

Array = NDArray[np.float64]

BOUND = 0.003
TURNS = 12
"""Azimuths of the cone in the quadrature: the integrand is smooth and periodic in it."""
IN_SPHERE = 0.7
"""Half angle of the cone over the sphere's radius at 1 m."""
CENTRE = np.array([1.0, 0.0, 0.0])


@functools.cache
def unshifted(fractions: Fractions, energy: float) -> tuple[Array, Array, Array]:
    """Photons that leave at fixed energies, the coherent ones first, then K lines.

    Dose per fluence (q, f), mu/rho (f,) [cm2/g], and what is sent out per steradian (f,) [cm2/(sr g)] (coherent: 0).
    """
    lines, made = medium(fractions).fluorescence(np.array([energy]))
    fixed = np.concatenate([[energy], lines])
    sent = np.concatenate([[0.0], made[:, 0] / (4.0 * math.pi)])
    return dose.per_fluence(fixed), medium(fractions).attenuation(fixed), sent


def emitted(stuff: Material, energy: float, cosine: Array, out: Array) -> Array:
    """Dose per unit fluence of photons at a point, per metre of path there, at 1 m: (q, n).

    ``cosine`` of the scattering angle and ``out``, the way to the surface [m], have shape (n,).
    """
    matter, grams = medium(stuff.fractions), 100.0 * stuff.density_g_cm3
    before = np.full(cosine.size, energy)
    after = scattered_energy(before, cosine)
    passed = np.exp(-grams * matter.attenuation(after) * out)
    shifted = dose.per_fluence(after) * passed * matter.incoherent_shape.differential(before, cosine)
    per_fluence, attenuation, sent = unshifted(stuff.fractions, energy)
    strength = np.repeat(sent[:, None], cosine.size, axis=1)
    strength[0] = matter.coherent_shape.differential(before, cosine)
    return grams * (shifted + per_fluence @ (strength * np.exp(-grams * attenuation[:, None] * out)))


def by_quadrature(stuff: Material, energy: float, radius: float, place: Array) -> Array:
    """Dose (q,) at the place from a cone of one photon per steradian on the sphere."""
    mu = 100.0 * stuff.density_g_cm3 * float(medium(stuff.fractions).partials(np.array([energy])).total[0])
    turn = 2.0 * math.pi * (np.arange(TURNS) + 0.5) / TURNS

    def at(share: float, least: float) -> Array:
        """Mean over the azimuth (q,) at a share of the chord and a cosine to the axis; 1e20 of it, per steradian."""
        sine = math.sqrt(1.0 - least * least)
        direction = np.stack([np.full(TURNS, least), sine * np.cos(turn), sine * np.sin(turn)], axis=1)
        chord = 2.0 * math.sqrt(radius**2 - 1.0 + least * least)
        depth = chord * share
        point = (least - 0.5 * chord + depth) * direction
        ray = place - point
        distance = np.linalg.norm(ray, axis=1)
        unit = ray / distance[:, None]
        inward = np.einsum("ij,ij->i", point - CENTRE, unit)
        room = radius**2 - ((point - CENTRE) ** 2).sum(axis=1)
        out = -inward + np.sqrt(inward**2 + np.maximum(room, 0.0))
        cosine = np.einsum("ij,ij->i", direction, unit)
        found = emitted(stuff, energy, cosine, out) / distance**2
        return np.asarray(1e20 * found.mean(axis=1) * math.exp(-mu * depth) * chord)

    def over_depth(least: float) -> Array:
        return np.asarray(
            quad_vec(at, 0.0, 1.0, quadrature="gk15", epsabs=0.0, epsrel=3e-4, norm="max", args=(least,))[0]
        )

    whole = quad_vec(
        over_depth, math.cos(IN_SPHERE * radius), 1.0, quadrature="gk15", epsabs=0.0, epsrel=1e-3, norm="max"
    )[0]
    return np.asarray(2e-20 * math.pi * whole)


CASES = [
    ("water", 60.0, 0.1, 135.0),
    ("water", 662.0, 0.1, 30.0),
    ("steel", 100.0, 0.01, 90.0),
    ("lead", 100.0, 0.0005, 120.0),
    ("concrete", 1250.0, 0.1, 60.0),
]
"""Material, energy [keV], radius [m], angle [degrees]."""


@pytest.mark.parametrize(("name", "energy", "radius", "degrees"), CASES)
def test_against_quadrature(name: str, energy: float, radius: float, degrees: float) -> None:
    """Independent route, 0.3 %: all channels, thick sphere, place near enough for every distance to count."""
    angle = math.radians(degrees)
    place = CENTRE + 0.5 * np.array([math.cos(angle), math.sin(angle), 0.0])
    field = BeamField("cone", np.array([1.0, 0.0, 0.0]), half_angle=IN_SPHERE * radius)
    case = setting((name,), "sphere", CENTRE.tolist(), (2.0 * radius,), field, one_line(energy))
    found, error = case.dose(case.first(4096), place)
    exact = by_quadrature(material(name), energy, radius, place)
    assert (error < 0.001 * exact).all()
    np.testing.assert_allclose(found, exact, rtol=BOUND)


@pytest.mark.parametrize(
    ("name", "energy", "degrees"),
    [("water", 60.0, 120.0), ("water", 30.0, 15.0), ("steel", 1250.0, 45.0), ("lead", 100.0, 150.0)],
)
def test_thin_body(name: str, energy: float, degrees: float) -> None:
    """Closed form, 0.3 %: a foil too thin to weaken anything, in a beam too narrow to have a width."""
    stuff, thickness, angle = material(name), 1e-7, math.radians(degrees)
    case = setting(
        (name,),
        "plate",
        (1.0, 0.0, 0.0),
        (1.0, 1.0, thickness),
        along_x(1e-4),
        one_line(energy),
        (1.0, 0.0, 0.0),
    )
    place = CENTRE + 2.0 * np.array([math.cos(angle), math.sin(angle), 0.0])
    found, _ = case.dose(case.first(256), place)
    per_metre = emitted(stuff, energy, np.array([math.cos(angle)]), np.zeros(1))
    exact = case.field.solid_angle * thickness * per_metre[:, 0] / 4.0
    np.testing.assert_allclose(found, exact, rtol=BOUND)


def test_inverse_square_far_away() -> None:
    """Limit: from 100 and 200 bodies' sizes away, doses are as 4 to 1."""
    case = setting(("water",), "sphere", CENTRE.tolist(), (0.02,), along_x(0.02), one_line(100.0))
    first = case.first(256)
    near, _ = case.dose(first, CENTRE + np.array([0.0, 2.0, 0.0]))
    far, _ = case.dose(first, CENTRE + np.array([0.0, 4.0, 0.0]))
    np.testing.assert_allclose(near / far, 4.0, rtol=2e-3)


def test_a_body_beside_the_beam_gives_nothing() -> None:
    """Limit: no first collisions where the field does not reach."""
    case = setting(("water",), "sphere", (1.0, 0.5, 0.0), (0.2,), along_x(0.1), one_line(100.0))
    assert not case.first(64).collisions.any()


def test_all_directions_are_alike_for_a_sphere_around_the_source() -> None:
    """Limit: a source in the middle of a sphere gives the same in every direction, within its errors."""
    everywhere = BeamField("everywhere", np.array([1.0, 0.0, 0.0]))
    case = setting(("water",), "sphere", ORIGIN.tolist(), (0.3,), everywhere, one_line(300.0))
    first = case.first(1024)
    places = 1.5 * np.array([[1.0, 0.0, 0.0], [0.0, 1.0, 0.0], [0.0, 0.0, -1.0], [-0.6, 0.0, 0.8]])
    found = [case.dose(first, place) for place in places]
    whole = np.mean([mean for mean, _ in found], axis=0)
    for mean, error in found:
        assert (error < 0.01 * whole).all()
        assert (np.abs(mean - whole) < 4.0 * error).all()
