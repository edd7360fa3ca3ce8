"""Air-kerma rate constants of sealed sources from two decay data sets. Kinds: published, independent route.

- LNHB lines times NIST mu_en/rho of air, recomputed from the package roentgen by others (how = library): a check of
  our reading of the same data.
- ICRP Publication 107 emissions, as carried by the package icrp107-database: another evaluation.
"""

from __future__ import annotations

import functools
import json
from pathlib import Path

import icrp107_database
import numpy as np
import pytest
from numpy.typing import NDArray

from scatterbay.physics.dose import air_kerma_per_fluence
from scatterbay.physics.nuclide import air_kerma_rate_constant, decayed, nuclide_spectrum
from scatterbay.tables.nuclides import names, nuclide

Array = NDArray[np.float64]

BOUND = 0.02
TO_PRINTED = 1e6 * 1e9 * 3600.0
"""Gy m2/(Bq s) to uGy m2/(GBq h)."""
PRINTED = {
    "Ir-192": (30.0, 109.0),
    "Co-60": (30.0, 305.7),
    "Cs-137": (30.0, 76.9),
    "Se-75": (30.0, 47.7),
    "Yb-169": (60.0, 26.1),
}
"""Lowest line counted [keV], constant [uGy m2/(GBq h)]: reference values recomputed from LNHB and NIST data."""

FOLDER = Path(icrp107_database.__file__).parent / "icrp107"
SECONDS = {"s": 1.0, "m": 60.0, "h": 3600.0, "d": 86400.0, "y": 365.25 * 86400.0}
DAUGHTERS = {"Cs-137": ("Ba-137m", 0.944)}
"""In equilibrium with the parent: name and branch (0.944 per decay in ICRP 107)."""
THULIUM_X_RAYS = (30.0, -0.057, "K X-rays of thulium: 1.85 per decay in LNHB, 2.07 in ICRP 107")
RESIDUALS = {"Yb-169": THULIUM_X_RAYS}
"""Lowest line counted [keV], difference, cause."""


@functools.cache
def icrp107(name: str) -> tuple[float, Array, Array]:
    """Half-life [s], photon energies [keV] and photons per decay."""
    entry = json.loads(json.loads((FOLDER / f"{name}.json").read_text(encoding="utf-8")))
    kinds = ("gamma", "X", "annihilation")
    lines = [line for kind in kinds for line in entry["emissions"].get(kind, [])]
    energy, share = np.array(lines).reshape(-1, 2).T
    return float(entry["half_life"]) * SECONDS[entry["time_unit"]], 1e3 * energy, share


def their_constant(name: str, lowest_kev: float) -> float:
    """Rate constant from their emissions with our kerma per fluence [uGy m2/(GBq h)]."""
    total = 0.0
    for member, branch in ((name, 1.0), *([DAUGHTERS[name]] if name in DAUGHTERS else [])):
        _, energy, share = icrp107(member)
        kept = (energy >= lowest_kev) & (energy < 3000.0)
        total += branch * float(share[kept] @ air_kerma_per_fluence(energy[kept]))
    return total / (4.0 * np.pi) * TO_PRINTED


@pytest.mark.parametrize("name", sorted(PRINTED))
def test_against_reference_values(name: str) -> None:
    lowest, value = PRINTED[name]
    ours = air_kerma_rate_constant(nuclide(name), lowest) * TO_PRINTED
    assert ours == pytest.approx(value, rel=BOUND)


@pytest.mark.parametrize("name", names())
def test_against_icrp_107(name: str) -> None:
    """From 30 keV, from 60 keV for Yb-169 (see the residual). Am-241 without its L X-rays, which end at 22 keV."""
    lowest = PRINTED.get(name, (30.0, 0.0))[0]
    ours = air_kerma_rate_constant(nuclide(name), lowest) * TO_PRINTED
    assert ours == pytest.approx(their_constant(name, lowest), rel=BOUND)


@pytest.mark.parametrize("name", sorted(RESIDUALS))
def test_named_residuals(name: str) -> None:
    """Both are kept: ours follows the measured evaluation."""
    lowest, off, _ = RESIDUALS[name]
    ours = air_kerma_rate_constant(nuclide(name), lowest) * TO_PRINTED
    assert ours / their_constant(name, lowest) - 1.0 == pytest.approx(off, abs=0.003)


@pytest.mark.parametrize("name", names())
def test_half_lives(name: str) -> None:
    """ICRP 107, 1 %; the largest difference is 0.5 % (Cs-137, evaluated anew since)."""
    assert nuclide(name).half_life == pytest.approx(icrp107(name)[0], rel=0.01)


@pytest.mark.parametrize("name", names())
def test_strong_gamma_lines(name: str) -> None:
    """Every gamma line with a twentieth of the photons from 65 keV up: within 0.2 keV, strength within 3 %."""
    own = nuclide(name)
    members = [(name, 1.0), *([DAUGHTERS[name]] if name in DAUGHTERS else [])]
    found = [
        (float(e), branch * float(s))
        for member, branch in members
        for e, s in zip(*icrp107(member)[1:], strict=True)
        if e >= 65.0
    ]
    whole = sum(share for _, share in found)
    strong = [line for line in found if line[1] > 0.05 * whole]
    assert strong
    for energy, share in strong:
        mine = own.per_decay[np.abs(own.lines_kev - energy) < 0.2].sum()
        assert mine == pytest.approx(share, rel=0.03), energy


@pytest.mark.parametrize("name", names())
def test_spectrum_keeps_the_energy_of_its_lines(name: str) -> None:
    """Limit: what is dropped as weak is together under 1e-4 of the energy; all directions are alike."""
    own, spectrum = nuclide(name), nuclide_spectrum(nuclide(name))
    assert (np.diff(spectrum.energy_kev) >= 0.0).all()
    whole = own.lines_kev @ own.per_decay
    assert 4.0 * np.pi * (spectrum.energy_kev @ spectrum.photons) == pytest.approx(whole, rel=1e-4)


def test_decay_in_closed_form() -> None:
    """Closed form: halves after one half-life, a thousand and twenty-fourth after ten."""
    life = nuclide("Ir-192").half_life
    assert decayed(3.7e12, life, 0.0) == 3.7e12
    assert decayed(3.7e12, life, life) == pytest.approx(1.85e12, rel=1e-12)
    assert decayed(1.0, life, 10.0 * life) == pytest.approx(2.0**-10, rel=1e-12)
    assert decayed(1.0, life, 1.3 * life) == pytest.approx(2.0**-1.3, rel=1e-12)
