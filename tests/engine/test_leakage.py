"""Leakage: as much as stated, hardened by the housing. Kind: limit, closed form."""

from __future__ import annotations

import math

import numpy as np
import pytest

from scatterbay.engine.leakage import leaking_housing
from scatterbay.errors import OutOfRangeError
from scatterbay.physics import dose
from scatterbay.physics.medium import linear_attenuation
from scatterbay.physics.spectrum import Spectrum
from scatterbay.physics.tube import tube_spectrum
from scatterbay.tables.materials import material

LEAD = material("lead")


@pytest.mark.parametrize("quantity", dose.QUANTITIES)
def test_the_stated_rate_arrives_at_1_m(quantity: str) -> None:
    stated = 1e-3 / 3600.0
    found = leaking_housing(tube_spectrum(150.0), 5e-3, stated, quantity, LEAD)
    row = dose.QUANTITIES.index(quantity)
    assert 5e-3 * found.spectrum.dose_at_1_m()[row] == pytest.approx(stated, rel=1e-9)
    assert 1e-3 < found.thickness < 4e-3


def test_one_line_gives_the_thickness_in_closed_form() -> None:
    """exp(-mu t) = stated / bare."""
    bare = Spectrum(np.array([662.0]), np.array([1.0]), "decay")
    free = float(bare.dose_at_1_m()[0])
    found = leaking_housing(bare, 1.0, free / 1000.0, dose.AIR_KERMA, LEAD)
    mu = float(linear_attenuation(LEAD, bare.energy_kev)[0])
    assert found.thickness == pytest.approx(math.log(1000.0) / mu, rel=1e-6)


def test_leakage_is_harder_than_the_beam() -> None:
    found = leaking_housing(tube_spectrum(225.0), 4e-3, 5e-3 / 3600.0, dose.AIR_KERMA, LEAD)
    filtered = tube_spectrum(225.0, ((material("aluminium"), 3e-3),))
    assert found.spectrum.mean_energy_kev > 1.5 * filtered.mean_energy_kev


def test_more_leakage_than_the_bare_source_is_refused() -> None:
    with pytest.raises(OutOfRangeError, match="times what the bare source gives"):
        leaking_housing(tube_spectrum(100.0), 1e-3, 100.0, dose.AIR_KERMA, LEAD)


def test_a_housing_that_cannot_be_is_refused() -> None:
    with pytest.raises(OutOfRangeError, match="up to 1 m thick"):
        leaking_housing(tube_spectrum(400.0), 1e-2, 1e-9, dose.AIR_KERMA, material("air"))
