"""X-ray reference radiation of ISO 4037-1, narrow-spectrum series. Kind: published (recalled).

Added filtration, mean energy and first half-value layer in copper as in ISO 4037-1 (the standard was not at hand: all
figures recalled, to three digits). Bounds: mean energy 2 %, half-value layer 5 %.
"""

from __future__ import annotations

import pytest

from scatterbay.physics.spectrum import Filter, Spectrum
from scatterbay.physics.tube import tube_spectrum
from scatterbay.tables.materials import material

NARROW = {
    "N-60": (60.0, {"aluminium": 4.0, "copper": 0.6}, 47.9, 0.234),
    "N-80": (80.0, {"aluminium": 4.0, "copper": 2.0}, 65.2, 0.578),
    "N-100": (100.0, {"aluminium": 4.0, "copper": 5.0}, 83.3, 1.09),
    "N-120": (120.0, {"aluminium": 4.0, "copper": 5.0, "tin": 1.0}, 100.4, 1.67),
    "N-200": (200.0, {"aluminium": 4.0, "copper": 2.0, "tin": 3.0, "lead": 1.0}, 164.8, 3.92),
    "N-300": (300.0, {"aluminium": 4.0, "tin": 3.0, "lead": 5.0}, 248.4, 5.96),
}
"""Quality: tube voltage [kV], filtration added to the tube's own [mm], mean energy [keV], half-value layer [mm Cu]."""


def beam(quality: str) -> Spectrum:
    voltage, filtration, _, _ = NARROW[quality]
    filters: tuple[Filter, ...] = tuple((material(name), 1e-3 * mm) for name, mm in filtration.items())
    return tube_spectrum(voltage, filters)


@pytest.mark.parametrize("quality", sorted(NARROW))
def test_mean_energy(quality: str) -> None:
    assert beam(quality).mean_energy_kev == pytest.approx(NARROW[quality][2], rel=0.02)


@pytest.mark.parametrize("quality", sorted(NARROW))
def test_half_value_layer(quality: str) -> None:
    found = 1e3 * beam(quality).half_value_layer(material("copper"))
    assert found == pytest.approx(NARROW[quality][3], rel=0.05)
