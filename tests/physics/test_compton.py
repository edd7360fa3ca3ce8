"""Compton scattering against CODATA and quadrature. Kinds: published constants, independent route, limit."""

from __future__ import annotations

import math

import numpy as np
import pytest
from scipy import constants as codata
from scipy.integrate import quad

from scatterbay.physics import constants
from scatterbay.physics.compton import (
    klein_nishina,
    klein_nishina_total,
    scattered_energy,
    wavelength_shift,
)

TOLERANCE = 1e-6
ENERGIES = (0.5, 0.999, 1.001, 10.0, 59.5, 511.0, 662.0, 1250.0, 3000.0)
KEV = 1e3 * codata.e
"""[J]"""

IN_SI = {
    "electron rest energy": (constants.ELECTRON_REST_ENERGY * KEV, codata.m_e * codata.c**2),
    "electron radius": (
        constants.ELECTRON_RADIUS * 1e-2,
        codata.physical_constants["classical electron radius"][0],
    ),
    "Avogadro": (constants.AVOGADRO, codata.N_A),
    "hc": (constants.PLANCK_TIMES_LIGHT * KEV * 1e-10, codata.h * codata.c),
    "Compton wavelength": (
        constants.COMPTON_WAVELENGTH * 1e-10,
        codata.physical_constants["Compton wavelength"][0],
    ),
    "fine structure": (constants.FINE_STRUCTURE, codata.fine_structure),
    "joule per keV": (constants.JOULE_PER_KEV, KEV),
}


@pytest.mark.parametrize("name", sorted(IN_SI))
def test_constants_are_those_of_codata(name: str) -> None:
    """Published: CODATA, as carried by scipy.constants (an older or newer adjustment differs by under 1e-8)."""
    ours, theirs = IN_SI[name]
    assert ours == pytest.approx(theirs, rel=1e-8)


def test_pair_threshold_is_twice_the_rest_energy() -> None:
    assert pytest.approx(2 * constants.ELECTRON_REST_ENERGY, rel=1e-12) == constants.PAIR_THRESHOLD


@pytest.mark.parametrize("energy", ENERGIES)
@pytest.mark.parametrize("degrees", [0.0, 1.0, 45.0, 90.0, 135.0, 180.0])
def test_shift_follows_from_the_wavelengths(energy: float, degrees: float) -> None:
    """Independent route: h/mc (1 - cos) added to the wavelength, all from CODATA."""
    cosine = math.cos(math.radians(degrees))
    before = codata.h * codata.c / (energy * KEV)
    after = before + codata.physical_constants["Compton wavelength"][0] * (1.0 - cosine)
    assert scattered_energy(energy, cosine) == pytest.approx(codata.h * codata.c / after / KEV, rel=TOLERANCE)
    shift = (after - before) * 1e10
    assert wavelength_shift(cosine) == pytest.approx(shift, rel=TOLERANCE, abs=1e-9)


def test_compton_wavelength() -> None:
    """Published: 2.42631 pm (CODATA, by way of scipy.constants), to its last digit."""
    assert 100.0 * wavelength_shift(0.0) == pytest.approx(2.42631, abs=5e-6)


@pytest.mark.parametrize("energy", ENERGIES)
def test_total_is_the_integral_of_the_differential(energy: float) -> None:
    """Independent route: adaptive quadrature. Just below 1 keV the total is a series, just above it is closed."""
    whole, _ = quad(lambda c: 1e25 * klein_nishina(energy, c), -1.0, 1.0, epsabs=0.0, epsrel=1e-11)
    assert klein_nishina_total(energy) == pytest.approx(2.0 * math.pi * 1e-25 * whole, rel=TOLERANCE)


def test_thomson_limit() -> None:
    """Published: the Thomson cross section of CODATA, at an energy where a/mc2 = 2e-9."""
    thomson = codata.physical_constants["Thomson cross section"][0] * 1e4
    assert klein_nishina_total(1e-6) == pytest.approx(thomson, rel=TOLERANCE)
    angles = np.linspace(0.0, math.pi, 7)
    exact = 0.5 * constants.ELECTRON_RADIUS**2 * (1.0 + np.cos(angles) ** 2)
    np.testing.assert_allclose(klein_nishina(np.full(7, 1e-6), np.cos(angles)), exact, rtol=TOLERANCE)


def test_first_order_fall_from_thomson() -> None:
    """Closed form: sigma / sigma_Thomson = 1 - 2a + O(a^2), the first term of the series of Klein and Nishina."""
    thomson, a = klein_nishina_total(1e-6), 1e-4
    fall = 1.0 - klein_nishina_total(a * constants.ELECTRON_REST_ENERGY) / thomson
    assert fall == pytest.approx(2.0 * a - 5.2 * a * a, rel=1e-4)


def test_forward_is_thomson_at_any_energy() -> None:
    """Limit: nothing is shifted straight on, and the cross section there is the square of the electron radius."""
    energy = np.array(ENERGIES)
    np.testing.assert_allclose(
        klein_nishina(energy, np.ones(energy.size)), constants.ELECTRON_RADIUS**2, rtol=1e-12
    )
    np.testing.assert_allclose(scattered_energy(energy, np.ones(energy.size)), energy, rtol=1e-12)


def test_scalars_and_arrays_agree() -> None:
    many = klein_nishina_total(np.array(ENERGIES))
    assert many.tolist() == pytest.approx([klein_nishina_total(e) for e in ENERGIES], rel=1e-14)
