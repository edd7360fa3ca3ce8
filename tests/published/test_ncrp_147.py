"""Lead under diagnostic beams: NCRP Report 147, table A.1 (Simpkin 1995). Kind: published (recalled).

Parameters of Archer's form, thickness in mm. The beams behind them were not at hand: ours are tubes at constant
potential, anode 14 degrees, 2.8 mm of aluminium in all. Bound 25 % from 1e-1 to 1e-4; found -22 to +14 %.

The concrete rows describe a limited field and are no test of a plane barrier (see the lit patch in DEVELOPERS.md).
"""

from __future__ import annotations

import functools
import math

import pytest

from scatterbay.physics.spectrum import Spectrum
from scatterbay.physics.tube import tube_spectrum
from scatterbay.tables.fits import fits
from scatterbay.tables.materials import material
from tests.published.behind import archer, kerma_transmission, layer

PRIMARY_IN_LEAD = {
    100.0: (2.500, 15.28, 0.7557),
    125.0: (2.219, 7.923, 0.5386),
    150.0: (1.757, 5.177, 0.3156),
}
THICKNESSES_MM = (0.25, 0.5, 1.0, 1.5, 2.0, 2.6)


@functools.cache
def beam(voltage: float) -> Spectrum:
    return tube_spectrum(voltage, ((material("aluminium"), 2.8e-3),), math.radians(14.0))


@pytest.mark.parametrize("voltage", sorted(PRIMARY_IN_LEAD))
@pytest.mark.parametrize("thickness_mm", THICKNESSES_MM)
def test_lead(voltage: float, thickness_mm: float) -> None:
    published = archer(thickness_mm, *PRIMARY_IN_LEAD[voltage])
    assert 9e-5 < published < 0.25
    assert kerma_transmission(beam(voltage), (layer("lead", thickness_mm),)) == pytest.approx(
        published, rel=0.25
    )


@pytest.mark.parametrize("voltage", sorted(PRIMARY_IN_LEAD))
def test_shipped_fit_is_the_published_one(voltage: float) -> None:
    """The table the program prints beside its own figures holds these parameters, and evaluates them alike."""
    shipped = next(fit for fit in fits() if fit.voltage == voltage and fit.material == "lead")
    assert shipped.transmission(1.3e-3) == pytest.approx(archer(1.3, *PRIMARY_IN_LEAD[voltage]), rel=1e-12)
    assert shipped.transmission(0.0) == pytest.approx(1.0, rel=1e-12)
