"""What is read off a spectrum, and the tube's. Kinds: independent route (root finding by scipy), closed form, limit."""

from __future__ import annotations

import math

import numpy as np
import pytest
import xraylib
from scipy.optimize import brentq

from scatterbay.errors import OutOfRangeError
from scatterbay.physics.dose import air_kerma_per_fluence, ambient_per_kerma
from scatterbay.physics.medium import linear_attenuation
from scatterbay.physics.nuclide import air_kerma_rate_constant, below, decayed, nuclide_spectrum
from scatterbay.physics.spectrum import Spectrum
from scatterbay.physics.tube import LOWEST_PHOTON_KEV, filter_for_half_value_layer, tube_spectrum
from scatterbay.tables.materials import material
from scatterbay.tables.nuclides import nuclide

ALUMINIUM, COPPER, LEAD = material("aluminium"), material("copper"), material("lead")


def a_tube(voltage: float, mm_aluminium: float = 3.0) -> Spectrum:
    return tube_spectrum(voltage, ((ALUMINIUM, 1e-3 * mm_aluminium),))


@pytest.mark.parametrize(
    ("voltage", "z", "density"), [(60.0, 13, 2.699), (120.0, 13, 2.699), (225.0, 29, 8.96)]
)
def test_half_value_layers_by_brute_force(voltage: float, z: int, density: float) -> None:
    """Independent route: xraylib's attenuation, a sum over bins, and scipy's root finder; 1 % for the attenuation."""
    spectrum = a_tube(voltage)
    weight = spectrum.photons * air_kerma_per_fluence(spectrum.energy_kev)
    linear = 100.0 * density * np.array([xraylib.CS_Total(z, float(e)) for e in spectrum.energy_kev])

    def thickness(share: float) -> float:
        return float(
            brentq(lambda t: weight @ np.exp(-linear * t) / weight.sum() - share, 0.0, 0.5, xtol=1e-9)
        )

    stuff = ALUMINIUM if z == 13 else COPPER
    assert spectrum.half_value_layer(stuff) == pytest.approx(thickness(0.5), rel=0.01)
    assert spectrum.half_value_layer(stuff, 2) == pytest.approx(thickness(0.25) - thickness(0.5), rel=0.01)
    assert spectrum.layer_for(stuff, 0.1) == pytest.approx(thickness(0.1), rel=0.01)


@pytest.mark.parametrize("energy", [30.0, 100.0, 662.0, 1332.5])
def test_layers_of_one_energy(energy: float) -> None:
    """Closed form: ln 2 / mu, and every further half-value layer the same."""
    spectrum = Spectrum(np.array([energy]), np.array([5.0]), "decay")
    exact = math.log(2.0) / linear_attenuation(LEAD, np.array([energy]))[0]
    assert spectrum.half_value_layer(LEAD) == pytest.approx(exact, rel=1e-9)
    assert spectrum.half_value_layer(LEAD, 2) == pytest.approx(exact, rel=1e-9)
    assert spectrum.mean_energy_kev == energy


def test_filters_multiply_and_do_not_care_for_their_order() -> None:
    """Closed form: exp(-mu t), bin by bin."""
    bare = tube_spectrum(150.0)
    one = bare.filtered(((ALUMINIUM, 2e-3), (COPPER, 5e-4)))
    other = bare.filtered(((COPPER, 5e-4),)).filtered(((ALUMINIUM, 2e-3),))
    np.testing.assert_allclose(one.photons, other.photons, rtol=1e-12)
    depth = 2e-3 * linear_attenuation(ALUMINIUM, bare.energy_kev) + 5e-4 * linear_attenuation(
        COPPER, bare.energy_kev
    )
    np.testing.assert_allclose(one.photons, bare.photons * np.exp(-depth), rtol=1e-12)


def test_filtering_hardens_and_weakens() -> None:
    found = [a_tube(100.0, mm) for mm in (1.0, 2.0, 4.0, 8.0)]
    assert (np.diff([s.mean_energy_kev for s in found]) > 0.0).all()
    assert (np.diff([s.half_value_layer(ALUMINIUM) for s in found]) > 0.0).all()
    assert (np.diff([s.kerma_at_1_m for s in found]) < 0.0).all()
    assert all(s.half_value_layer(ALUMINIUM, 2) > s.half_value_layer(ALUMINIUM) for s in found)


def test_scaling_and_doses() -> None:
    spectrum = a_tube(120.0)
    kerma, ambient = spectrum.scaled(3.0).dose_at_1_m()
    assert kerma == pytest.approx(3.0 * spectrum.kerma_at_1_m, rel=1e-12)
    by_bin = spectrum.photons @ (
        air_kerma_per_fluence(spectrum.energy_kev) * ambient_per_kerma(spectrum.energy_kev)
    )
    assert ambient == pytest.approx(3.0 * by_bin, rel=1e-12)
    assert spectrum.scaled(3.0).mean_energy_kev == pytest.approx(spectrum.mean_energy_kev, rel=1e-12)


def test_thinning_leaves_the_kerma() -> None:
    """Limit: bins under a share of the kerma go; all together they are under that share times their number."""
    spectrum = a_tube(225.0)
    thin = spectrum.thinned(1e-4)
    assert thin.energy_kev.size < spectrum.energy_kev.size
    assert 0.0 <= 1.0 - thin.kerma_at_1_m / spectrum.kerma_at_1_m < 1e-4 * spectrum.energy_kev.size


@pytest.mark.parametrize("voltage", [40.0, 69.0, 69.6, 100.0, 150.5, 450.0])
def test_tube_bins(voltage: float) -> None:
    """Limit: positive, from 10 keV to the voltage and no further; K lines of tungsten only above its edge.

    The bin at the voltage itself may be empty: the electrons' first step is 0.2 to 2.2 keV wide.
    """
    spectrum = tube_spectrum(voltage)
    assert (spectrum.photons[:-1] > 0.0).all()
    assert spectrum.photons[-1] >= 0.0
    assert (np.diff(spectrum.energy_kev) > 0.0).all()
    assert LOWEST_PHOTON_KEV < spectrum.energy_kev[0] < LOWEST_PHOTON_KEV + 1.0
    assert voltage - 1.0 < spectrum.energy_kev[-1] < voltage
    line = int(np.searchsorted(spectrum.energy_kev, 59.32 - 0.5))
    beside = 0.5 * (spectrum.photons[line - 3] + spectrum.photons[line + 3]) if voltage > 65.0 else 1.0
    stands_out = voltage > 65.0 and spectrum.photons[line] > 1.3 * beside
    assert stands_out == (voltage >= 100.0)


def test_steeper_anodes_give_more() -> None:
    """Limit: the way out of the target is x / tan(angle), so that a small angle absorbs more and hardens."""
    outputs = [tube_spectrum(100.0, (), math.radians(a)) for a in (8.0, 12.0, 20.0, 40.0)]
    assert (np.diff([s.kerma_at_1_m for s in outputs]) > 0.0).all()
    assert (np.diff([s.mean_energy_kev for s in outputs]) < 0.0).all()


@pytest.mark.parametrize("voltage", [39.9, 450.1, 0.0])
def test_voltages_outside_the_model_are_refused(voltage: float) -> None:
    with pytest.raises(OutOfRangeError, match="40 to 450 kV"):
        tube_spectrum(voltage)


def test_layers_that_cannot_be_are_refused() -> None:
    with pytest.raises(OutOfRangeError, match="does not belong to"):
        filter_for_half_value_layer(60.0, ALUMINIUM, 50e-3)
    with pytest.raises(OutOfRangeError, match="does not belong to"):
        filter_for_half_value_layer(150.0, ALUMINIUM, 1e-5)
    with pytest.raises(OutOfRangeError, match="no layer of air"):
        Spectrum(np.array([1000.0]), np.array([1.0]), "decay").layer_for(material("air"), 0.5)


def test_lines_above_the_barriers_range() -> None:
    """Limit: what is left out is named with its share, and refused above a thousandth."""
    spectrum = Spectrum(np.array([662.0, 1500.0]), np.array([1.0, 2e-4]), "decay")
    kept, share = below(spectrum, 1400.0)
    assert kept.energy_kev.tolist() == [662.0]
    assert share == pytest.approx(0.3 / 662.3, rel=1e-9)
    with pytest.raises(OutOfRangeError, match="above 1400 keV"):
        below(Spectrum(np.array([662.0, 1500.0]), np.array([1.0, 2e-3]), "decay"), 1400.0)


def test_rate_constant_counts_lines_from_its_threshold() -> None:
    """Closed form: a sum over the table's lines."""
    cobalt = nuclide("Co-60")
    strong = cobalt.lines_kev > 1000.0
    weight = cobalt.per_decay * air_kerma_per_fluence(cobalt.lines_kev) / (4.0 * math.pi)
    assert air_kerma_rate_constant(cobalt, 1000.0) == pytest.approx(
        weight[strong & (weight > 0)].sum(), rel=1e-5
    )
    assert air_kerma_rate_constant(cobalt) == pytest.approx(nuclide_spectrum(cobalt).kerma_at_1_m, rel=1e-12)


def test_no_decay_backwards() -> None:
    with pytest.raises(OutOfRangeError, match="lies before"):
        decayed(1.0, 10.0, -1e-9)
