"""511 keV through lead, concrete and iron: AAPM Task Group 108, table IV. Kind: published (read on a public page).

Madsen et al., Med. Phys. 33 (2006) 4, table IV: parameters of Archer's form, thickness in cm. Its concrete is taken at
2.35 g/cm3 (recalled); ours is NIST ordinary concrete brought to that density.

Bound 15 % of the transmission. Beyond 2e-2 in concrete and 3e-3 in lead the fit lies higher than we do, by 63 % and
21 % at 1e-3 (named residual below): 28 and 1.2 mm of 493 and 46 mm. The fit's final slope is 0.75 (concrete) of the
narrow-beam attenuation coefficient, ours 0.85. An analog Monte Carlo of ours with the same cross sections gives our
figure within its 3 %. We trust ours, and the fit errs on the protective side.
"""

from __future__ import annotations

import functools

import pytest

from scatterbay.barriers.makeup import Sheets
from scatterbay.physics.spectrum import Spectrum
from tests.published.behind import archer, archer_thickness, kerma_transmission, layer, line

FITS = {
    "lead": (1.543, -0.4408, 2.136),
    "concrete": (0.1539, -0.1161, 2.0752),
    "iron": (0.5704, -0.3063, 0.6326),
}
DENSITY = {"concrete": 2.35}
BOUND = 0.15
DEPTHS = {
    "lead": (0.5, 0.1, 0.01, 3.5e-3),
    "concrete": (0.5, 0.1, 0.03, 0.02),
    "iron": (0.5, 0.1, 0.01, 1e-3),
}
"""Published transmissions at which the two are compared."""
RESIDUALS = {"lead": (1e-3, 0.824), "concrete": (1e-3, 0.613)}
"""Published transmission, and ours over it."""
ANNIHILATION = 510.99895


@functools.cache
def beam() -> Spectrum:
    return line(ANNIHILATION)


def sheets(name: str, thickness_cm: float) -> Sheets:
    return (layer(name, 10.0 * thickness_cm, DENSITY.get(name)),)


@pytest.mark.parametrize(("name", "published"), [(n, t) for n, found in DEPTHS.items() for t in found])
def test_transmission(name: str, published: float) -> None:
    thickness = archer_thickness(published, *FITS[name])
    assert archer(thickness, *FITS[name]) == pytest.approx(published, rel=1e-9)
    assert kerma_transmission(beam(), sheets(name, thickness)) == pytest.approx(published, rel=BOUND)


@pytest.mark.parametrize("name", sorted(RESIDUALS))
def test_named_residual_at_a_thousandth(name: str) -> None:
    """Both figures are kept; the thickness that does it still agrees to 6 %."""
    published, ratio = RESIDUALS[name]
    thickness = archer_thickness(published, *FITS[name])
    assert kerma_transmission(beam(), sheets(name, thickness)) / published == pytest.approx(ratio, rel=0.02)
    assert kerma_transmission(beam(), sheets(name, 0.94 * thickness)) > published
