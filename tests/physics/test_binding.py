"""Bound electrons: integrals, limits and inverses of the scattering functions. Kinds: independent route, limit."""

from __future__ import annotations

import math

import numpy as np
import pytest
from numpy.typing import NDArray

from scatterbay.physics.binding import CoherentShape, IncoherentShape, momentum_transfer
from scatterbay.physics.compton import klein_nishina_total
from scatterbay.physics.constants import AVOGADRO
from scatterbay.tables.elements import atomic_weight
from scatterbay.tables.materials import material

Array = NDArray[np.float64]

MATERIALS = ("water", "concrete", "steel", "lead")
ENERGY = np.array([10.0, 15.0, 40.0, 88.0, 150.0, 511.0, 1250.0, 3000.0])


def over_angles(differential: Array, u: Array) -> Array:
    """Integral over all directions of values at cos = 1 - 2 u^4, which spreads the forward peak."""
    return np.asarray(np.trapezoid(2.0 * math.pi * differential * 8.0 * u**3, u, axis=-1))


@pytest.mark.parametrize("name", MATERIALS)
def test_coherent_total_is_the_integral_of_the_differential(name: str) -> None:
    """Independent route: a fine trapeze rule against the closed form."""
    shape, u = CoherentShape(material(name).fractions), np.linspace(0.0, 1.0, 40_001)
    whole = over_angles(shape.differential(ENERGY[:, None], 1.0 - 2.0 * u[None, :] ** 4), u)
    np.testing.assert_allclose(shape.total(ENERGY), whole, rtol=1e-6)


@pytest.mark.parametrize("name", MATERIALS)
def test_incoherent_total_is_the_integral_of_the_differential(name: str) -> None:
    """Independent route, 5e-5: the program's 64 Gauss points against a fine trapeze rule over the same kinks."""
    shape, u = IncoherentShape(material(name).fractions), np.linspace(0.0, 1.0, 40_001)
    whole = over_angles(shape.differential(ENERGY[:, None], 1.0 - 2.0 * u[None, :] ** 4), u)
    np.testing.assert_allclose(shape.total(ENERGY), whole, rtol=5e-5)


def test_free_electrons_scatter_by_klein_and_nishina() -> None:
    """Closed form: Z electrons an atom, each with the total cross section of a free one."""
    for name in MATERIALS:
        shape = IncoherentShape(material(name).fractions, free_electrons=True)
        exact = shape.electrons_per_gram * np.array([klein_nishina_total(float(e)) for e in ENERGY])
        np.testing.assert_allclose(shape.total(ENERGY), exact, rtol=1e-6)


def test_electrons_of_water() -> None:
    """Published: 3.343e23 electrons per gram of water (ICRU, to four digits; recalled)."""
    assert IncoherentShape(material("water").fractions).electrons_per_gram == pytest.approx(
        3.343e23, rel=3e-4
    )


@pytest.mark.parametrize("z", [1, 8, 26, 82])
def test_limits_of_the_scattering_functions(z: int) -> None:
    """Limit: S runs from 0 as x squared to Z, F from Z to 0."""
    alone, atoms = ((z, 1.0),), AVOGADRO / atomic_weight(z)
    s, f = IncoherentShape(alone).electrons, CoherentShape(alone).squared
    small = np.array([1e-4, 1e-3])
    assert s(small)[1] / s(small)[0] == pytest.approx(100.0, rel=1e-6)
    assert s(np.array([1e3]))[0] == pytest.approx(z * atoms, rel=1e-4)
    assert s(np.array([0.0]))[0] < 1e-6 * z * atoms
    assert f(np.array([0.0, 1e-3]))[0] == pytest.approx(z * z * atoms, rel=2e-3)
    beyond = f(np.array([100.0, 120.0, 500.0])) / (z * z * atoms)
    assert (np.diff(beyond) < 0.0).all()
    assert beyond[0] < 1e-5


@pytest.mark.parametrize("z", [1, 8, 26, 82])
def test_scattering_functions_are_monotonic(z: int) -> None:
    x = np.geomspace(1e-3, 200.0, 600)
    assert (np.diff(IncoherentShape(((z, 1.0),)).electrons(x)) >= 0.0).all()
    assert (np.diff(CoherentShape(((z, 1.0),)).squared(x)) <= 0.0).all()


@pytest.mark.parametrize("name", MATERIALS)
def test_moments_and_their_inverse(name: str) -> None:
    """Independent route: integrals of F^2 y^n by a fine rule; the inverse undoes the zeroth."""
    shape = CoherentShape(material(name).fractions)
    y = np.geomspace(1e-9, 3000.0, 60_001)
    fine = shape.squared(np.sqrt(y))
    for n, moment in enumerate(shape.moments(np.array([0.02, 1.0, 400.0]))):
        for value, top in zip(moment, (0.02, 1.0, 400.0), strict=True):
            part = y <= top
            assert value == pytest.approx(
                np.trapezoid((fine * y ** (n + 1))[part], np.log(y[part])), rel=3e-3
            )
    some = np.array([1e-6, 1e-4, 0.03, 2.0, 50.0, 2500.0, 9000.0])
    np.testing.assert_allclose(shape.inverse(shape.moments(some)[0]), some, rtol=1e-6)


def test_momentum_transfer() -> None:
    """Closed form: E/hc backwards, nothing forwards, E/hc/sqrt(2) at right angles."""
    found = momentum_transfer(np.full(3, 12.398419843320026), np.array([-1.0, 1.0, 0.0]))
    assert found.tolist() == pytest.approx([1.0, 0.0, math.sqrt(0.5)], rel=1e-12)


def test_mixtures_add_by_mass() -> None:
    """Limit: a mixture scatters as its parts do, weighted by mass."""
    mixed = material("concrete").fractions
    for kind in (IncoherentShape, CoherentShape):
        parts = np.sum([w * kind(((z, 1.0),)).total(ENERGY) for z, w in mixed], axis=0)
        np.testing.assert_allclose(kind(mixed).total(ENERGY), parts, rtol=4e-3)
