"""Diagnostic reference beams of IEC 61267, RQR series. Kind: published (recalled).

First half-value layers and homogeneity coefficients as in IEC 61267; total filtrations as one national laboratory
reports for its realisation of the series (tungsten anode, 20 degrees, window of 7 mm beryllium). All recalled.

The filtration our model needs runs from +3 % at 40 kV to -7 % at 150 kV of that laboratory's: a trend, within the
bound; no choice of one voltage hides it.
"""

from __future__ import annotations

import functools
import math

import pytest
from scipy.optimize import brentq

from scatterbay.physics.spectrum import Spectrum
from scatterbay.physics.tube import filter_for_half_value_layer, tube_spectrum
from scatterbay.tables.materials import Material, material

SERIES = {
    "RQR 2": (40.0, 2.49, 1.42, 0.81),
    "RQR 3": (50.0, 2.46, 1.78, 0.76),
    "RQR 4": (60.0, 2.68, 2.19, 0.74),
    "RQR 5": (70.0, 2.83, 2.58, 0.71),
    "RQR 6": (80.0, 2.99, 3.01, 0.69),
    "RQR 7": (90.0, 3.18, 3.48, 0.68),
    "RQR 8": (100.0, 3.36, 3.97, 0.68),
    "RQR 9": (120.0, 3.73, 5.00, 0.68),
    "RQR 10": (150.0, 4.38, 6.57, 0.72),
}
"""Quality: voltage [kV], total filtration [mm Al], first half-value layer [mm Al], homogeneity coefficient."""
BERYLLIUM = Material.from_symbols("beryllium", 1.848, {"Be": 1.0}, "the tube's window")
ANODE_ANGLE = math.radians(20.0)


@functools.cache
def windowed(voltage: float) -> Spectrum:
    return tube_spectrum(voltage, ((BERYLLIUM, 7e-3),), ANODE_ANGLE)


@functools.cache
def filtration_mm(quality: str) -> float:
    """Aluminium [mm] that gives the published first half-value layer."""
    voltage, _, layer, _ = SERIES[quality]
    aluminium = material("aluminium")

    def excess(mm: float) -> float:
        return 1e3 * windowed(voltage).filtered(((aluminium, 1e-3 * mm),)).half_value_layer(aluminium) - layer

    return float(brentq(excess, 0.1, 20.0, xtol=1e-4))


@pytest.mark.parametrize("quality", sorted(SERIES))
def test_aluminium_for_the_half_value_layer(quality: str) -> None:
    assert filtration_mm(quality) == pytest.approx(SERIES[quality][1], rel=0.10)


@pytest.mark.parametrize("quality", sorted(SERIES))
def test_homogeneity(quality: str) -> None:
    """First over second half-value layer: printed to two digits, 0.005; 2 % for the model."""
    aluminium = material("aluminium")
    spectrum = windowed(SERIES[quality][0]).filtered(((aluminium, 1e-3 * filtration_mm(quality)),))
    found = spectrum.half_value_layer(aluminium) / spectrum.half_value_layer(aluminium, 2)
    assert found == pytest.approx(SERIES[quality][3], abs=0.005 + 0.02 * SERIES[quality][3])


@pytest.mark.parametrize("quality", ["RQR 3", "RQR 8", "RQR 10"])
def test_matching_a_measured_layer(quality: str) -> None:
    """Independent route: the program's own search, without the beryllium window (worth about 0.1 mm of aluminium)."""
    voltage, _, layer, _ = SERIES[quality]
    aluminium = material("aluminium")
    found = filter_for_half_value_layer(voltage, aluminium, 1e-3 * layer, ANODE_ANGLE)
    reached = tube_spectrum(voltage, ((aluminium, found),), ANODE_ANGLE).half_value_layer(aluminium)
    assert reached == pytest.approx(1e-3 * layer, rel=1e-6)
    assert 0.0 < 1e3 * found - filtration_mm(quality) < 0.2
