"""Scatter from a patient: NCRP Report 49, table B-2 (after Trout and Kelley 1972). Kind: published (recalled).

Scattered over incident exposure at 1 m from a tissue-equivalent phantom, 400 cm2 field, incident measured at the
phantom. Only the 135 degree column is a test of a model: at 90 degrees and below, the phantom's thickness and tilt
decide.

Ours: 20 x 20 cm at the entrance of a 32 cm water cylinder, source 1 m before it, place 1 m from the cylinder's axis,
air kerma of all orders over incident air kerma at the entrance. Bound 15 %.
"""

from __future__ import annotations

import math

import numpy as np
import pytest

from scatterbay.engine.points import ScatterPoints
from scatterbay.physics.tube import tube_spectrum
from scatterbay.tables.materials import material
from tests.engine.one_body import along_x, setting

AT_135_DEGREES = {100.0: 0.0022, 150.0: 0.0026, 200.0: 0.0028}
"""Tube voltage [kV]: scattered over incident."""
ENTRANCE, HALF_FIELD, RADIUS = 1.0, 0.1, 0.16
"""[m]"""


@pytest.mark.parametrize("voltage", sorted(AT_135_DEGREES))
def test_back_towards_the_tube(voltage: float) -> None:
    spectrum = tube_spectrum(voltage, ((material("aluminium"), 2.5e-3),))
    middle = np.array([ENTRANCE + RADIUS, 0.0, 0.0])
    field = along_x(HALF_FIELD / ENTRANCE)
    case = setting(("water",), "cylinder", middle.tolist(), (2.0 * RADIUS, 0.6), field, spectrum)
    first = case.first(1024)
    points = ScatterPoints.joined([first, case.walk(first).points])
    angle = math.radians(135.0)
    found, error = case.dose(points, middle + np.array([math.cos(angle), math.sin(angle), 0.0]))
    incident = spectrum.kerma_at_1_m / ENTRANCE**2
    assert error[0] < 0.02 * found[0]
    assert found[0] / incident == pytest.approx(AT_135_DEGREES[voltage], rel=0.15)
