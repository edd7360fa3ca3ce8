"""Absolute output of X-ray tubes at 1 m. Kind: published (recalled).

In uGy/mAs behind 2.5 mm of aluminium, anode 12 degrees: common practice, no single source; tubes differ by a third
among themselves. Bound 30 %. Found: +20, +8, -1, -3 %; the figures grow as the 1.98th power of the voltage, the
model as the 1.67th, so that the model is high below 80 kV: protective.
"""

from __future__ import annotations

import math

import pytest

from scatterbay.physics.tube import tube_spectrum
from scatterbay.tables.materials import material

OUTPUT = {60.0: 38.0, 80.0: 70.0, 100.0: 110.0, 120.0: 150.0}
"""Tube voltage [kV]: air kerma at 1 m [uGy/mAs]."""


@pytest.mark.parametrize("voltage", sorted(OUTPUT))
def test_output_at_one_metre(voltage: float) -> None:
    spectrum = tube_spectrum(voltage, ((material("aluminium"), 2.5e-3),), math.radians(12.0))
    assert 1e3 * spectrum.kerma_at_1_m == pytest.approx(OUTPUT[voltage], rel=0.30)
