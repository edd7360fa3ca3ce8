"""Spectra of sealed sources, and their decay."""

from __future__ import annotations

import math

import numpy as np

from scatterbay.errors import OutOfRangeError
from scatterbay.physics.spectrum import Spectrum
from scatterbay.tables.nuclides import Nuclide

WEAKEST = 1e-6
"""Lines below this share of the photons' energy are left out."""
NEGLIGIBLE = 1e-3
"""Share of a nuclide's energy that may lie above the range of barrier transport."""


def nuclide_spectrum(nuclide: Nuclide) -> Spectrum:
    """Photon lines per steradian and decay, evenly in all directions, from 20 keV up.

    Left out: lines below 20 keV (stopped in the capsule), bremsstrahlung of beta rays, absorption in the source
    and its capsule, and lines that carry less than 1e-6 of the energy.
    """
    carried = nuclide.lines_kev * nuclide.per_decay
    kept = carried > WEAKEST * carried.sum()
    order = np.argsort(nuclide.lines_kev[kept])
    photons = nuclide.per_decay[kept][order] / (4.0 * math.pi)
    return Spectrum(nuclide.lines_kev[kept][order], photons, "decay")


def below(spectrum: Spectrum, highest_kev: float) -> tuple[Spectrum, float]:
    """The lines up to an energy, and the share of the photons' energy that lies above it and is left out.

    Raises
    ------
    OutOfRangeError : the share is more than a thousandth.
    """
    above = spectrum.energy_kev > highest_kev
    carried = spectrum.energy_kev * spectrum.photons
    share = float(carried[above].sum() / carried.sum())
    if share > NEGLIGIBLE:
        raise OutOfRangeError(
            f"{100 * share:.2g} % of the photons' energy is in lines above {highest_kev:g} keV, which barrier "
            "transport does not cover"
        )
    return Spectrum(spectrum.energy_kev[~above], spectrum.photons[~above], spectrum.per), share


def decayed(activity: float, half_life: float, elapsed: float) -> float:
    """Activity after a time: A exp(-ln 2 t / T) [Bq], half-life and time in s.

    Raises
    ------
    OutOfRangeError : the time is negative, which would make a source stronger than it was stated to be.
    """
    if elapsed < 0.0:
        raise OutOfRangeError("the date assessed lies before the date of the stated activity")
    return activity * math.exp(-math.log(2.0) * elapsed / half_life)


def mean_over_cycle(half_life: float, cycle: float) -> float:
    """Mean activity over a time between exchanges, over the activity at its start: (1 - exp(-x)) / x.

    x = ln 2 cycle / half-life; both in the same unit.

    Raises
    ------
    OutOfRangeError : the cycle is not above zero.
    """
    if cycle <= 0.0:
        raise OutOfRangeError("the time between exchanges must be above zero")
    x = math.log(2.0) * cycle / half_life
    return -math.expm1(-x) / x


def air_kerma_rate_constant(nuclide: Nuclide, lowest_kev: float = 20.0) -> float:
    """Air kerma rate constant [Gy m2 / (Bq s)] of the lines from ``lowest_kev`` up."""
    spectrum = nuclide_spectrum(nuclide)
    kept = spectrum.energy_kev >= lowest_kev
    return Spectrum(spectrum.energy_kev[kept], spectrum.photons[kept], "decay").kerma_at_1_m
