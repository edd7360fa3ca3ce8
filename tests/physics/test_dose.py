"""Dose quantities per fluence. Kinds: published (ICRP 74, recalled), independent route, limit."""

from __future__ import annotations

import numpy as np
import pytest
from scipy.interpolate import PchipInterpolator

from scatterbay.errors import OutOfRangeError
from scatterbay.physics import dose
from scatterbay.tables.attenuation import air

PRINTED = {
    10.0: 0.008, 15.0: 0.26, 20.0: 0.61, 30.0: 1.10, 40.0: 1.47, 50.0: 1.67, 60.0: 1.74, 80.0: 1.72, 100.0: 1.65,
    150.0: 1.49, 200.0: 1.40, 300.0: 1.31, 400.0: 1.26, 500.0: 1.23, 600.0: 1.21, 800.0: 1.19, 1000.0: 1.17,
    1500.0: 1.15, 2000.0: 1.14, 3000.0: 1.13,
}  # fmt: skip
"""H*(10)/Ka [Sv/Gy] by energy [keV]: ICRP Publication 74 (1996), table A.21, the same as ICRU 57 (recalled)."""
NODES, VALUES = np.array(list(PRINTED)), np.array(list(PRINTED.values()))


def test_ambient_dose_at_the_printed_energies() -> None:
    np.testing.assert_allclose(dose.ambient_per_kerma(NODES), VALUES, rtol=1e-9)


def test_ambient_dose_between_them() -> None:
    """Independent route: scipy's shape-preserving cubic through the printed values in log-log."""
    energy = np.geomspace(10.0, 3000.0, 400)
    expected = np.exp(PchipInterpolator(np.log(NODES), np.log(VALUES))(np.log(energy)))
    np.testing.assert_allclose(dose.ambient_per_kerma(energy), expected, rtol=1e-9)


def test_ambient_dose_never_overshoots() -> None:
    """Limit: one hump, at the printed 60 keV."""
    found = dose.ambient_per_kerma(np.geomspace(10.0, 3000.0, 2000))
    assert found.max() <= 1.74 * (1 + 1e-9)
    assert (np.diff(np.sign(np.diff(found))) != 0).sum() <= 2


def test_kerma_at_the_rows_of_air() -> None:
    """Closed form: 1 keV cm2/g is 1.602e-16 J per 1e-3 kg per 1e4 m-2."""
    table = air()
    exact = table.energy_kev * 1.602176634e-16 * table.absorption * 1e-4 / 1e-3
    np.testing.assert_allclose(dose.air_kerma_per_fluence(table.energy_kev), exact, rtol=1e-9)


@pytest.mark.parametrize(("energy", "published"), [(100.0, 0.371), (1000.0, 4.47)])
def test_kerma_per_fluence(energy: float, published: float) -> None:
    """Published: air kerma per fluence [pGy cm2], ICRP 74, table A.1 (recalled), 1 %."""
    found = 1e16 * dose.air_kerma_per_fluence(np.array([energy]))[0]
    assert found == pytest.approx(published, rel=0.01)


def test_all_quantities_in_order() -> None:
    energy = np.array([[20.0, 60.0], [662.0, 1250.0]])
    kerma, ambient = dose.per_fluence(energy)
    assert dose.QUANTITIES == (dose.AIR_KERMA, dose.AMBIENT)
    np.testing.assert_allclose(kerma, dose.air_kerma_per_fluence(energy))
    np.testing.assert_allclose(ambient / kerma, dose.ambient_per_kerma(energy), rtol=1e-12)


@pytest.mark.parametrize("energy", [9.99, 3000.5, 0.0])
def test_outside_the_tables_is_refused(energy: float) -> None:
    for function in (dose.air_kerma_per_fluence, dose.ambient_per_kerma, dose.per_fluence):
        with pytest.raises(OutOfRangeError, match="10 to 3000 keV"):
            function(np.array([100.0, energy]))


def test_ends_of_the_tables_are_inside() -> None:
    assert (dose.per_fluence(np.array([10.0, 3000.0])) > 0.0).all()
