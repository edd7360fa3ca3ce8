"""Shielding layers of ASTM E94 (guide for radiographic examination). Kind: published (read on a public page).

Half- and tenth-value layers for radiographic work. Gamma sources: bound 15 %. Tubes: the guide states neither the
filtration nor the depth; concrete from 150 to 400 kV agrees to 15 % between transmissions of 1e-2 and 1e-4. Left out,
for the layer keeps growing with depth where the beam hardens: concrete at 100 kV (ours 11 to 17 % thicker) and lead
(ours 0.83 to 1.26 of the guide's, by depth).
"""

from __future__ import annotations

import pytest

from scatterbay.physics.tube import tube_spectrum
from scatterbay.tables.materials import material
from tests.published.behind import nuclide_beam, tenth_value_layer_mm

SOURCES = {("Ir-192", "concrete"): 140.0, ("Co-60", "lead"): 41.0, ("Co-60", "concrete"): 220.0}
"""Tenth-value layer [mm]."""
TUBES_IN_CONCRETE = {150.0: 73.6, 200.0: 83.8, 300.0: 104.0, 400.0: 109.1}
"""Voltage [kV]: tenth-value layer [mm]."""


@pytest.mark.parametrize(("name", "stuff"), sorted(SOURCES))
def test_gamma_sources(name: str, stuff: str) -> None:
    published = SOURCES[name, stuff]
    found = tenth_value_layer_mm(nuclide_beam(name), stuff, 2.5 * published, 3.5 * published)
    assert found == pytest.approx(published, rel=0.15)


@pytest.mark.parametrize("voltage", sorted(TUBES_IN_CONCRETE))
def test_tubes_in_concrete(voltage: float) -> None:
    spectrum = tube_spectrum(voltage, ((material("aluminium"), 3e-3),))
    published = TUBES_IN_CONCRETE[voltage]
    found = tenth_value_layer_mm(spectrum, "concrete", 2.0 * published, 4.0 * published)
    assert found == pytest.approx(published, rel=0.15)
