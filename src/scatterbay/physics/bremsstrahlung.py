"""Electrons in a tungsten target: how they slow down, and what they radiate."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from scatterbay.physics.constants import (
    AVOGADRO,
    ELECTRON_RADIUS,
    ELECTRON_REST_ENERGY,
    FINE_STRUCTURE,
)
from scatterbay.tables.elements import atomic_weight

Array = NDArray[np.float64]

TUNGSTEN_Z = 74
TUNGSTEN_MEAN_EXCITATION = 0.727
"""Mean excitation energy of tungsten [keV] (ICRU Report 37, 1984)."""
BLEND_ENERGY = 100.0
"""Electron energy [keV] at which the two shapes count alike."""


def stopping_power(energy_kev: Array) -> Array:
    """Collision stopping power of tungsten for electrons [keV cm2/g].

    Bethe's formula with Moeller's cross section, without density correction.

    Parameters
    ----------
    energy_kev : kinetic energy, any shape, 10 to 1000 [keV].

    References
    ----------
    ICRU Report 37 (1984), section 2; for tungsten at 100 keV it prints 2.05 MeV cm2/g (recalled).
    """
    tau = energy_kev / ELECTRON_REST_ENERGY
    beta2 = 1.0 - 1.0 / (1.0 + tau) ** 2
    shape = 1.0 - beta2 + (tau**2 / 8.0 - (2.0 * tau + 1.0) * np.log(2.0)) / (tau + 1.0) ** 2
    excitation = TUNGSTEN_MEAN_EXCITATION / ELECTRON_REST_ENERGY
    constant = 2.0 * np.pi * ELECTRON_RADIUS**2 * ELECTRON_REST_ENERGY * AVOGADRO
    constant *= TUNGSTEN_Z / atomic_weight(TUNGSTEN_Z)
    return constant / beta2 * (np.log(tau**2 * (tau + 2.0) / (2.0 * excitation**2)) + shape)


def bethe_heitler(energy_kev: Array, photon_kev: Array) -> Array:
    """Photon energy times the cross section for radiating it, per Z^2 [cm2].

    Born approximation without screening, times Elwert's factor for the attraction of the nucleus. It overstates
    soft photons (no screening) and understates the flatness of the true shape for heavy nuclei below 100 keV.

    Parameters
    ----------
    energy_kev : electron kinetic energy [keV].
    photon_kev : photon energy, below the electron's, broadcast against it [keV].

    References
    ----------
    H. W. Koch and J. W. Motz, Rev. Mod. Phys. 31 (1959) 920, formula 3BN; G. Elwert, Ann. Phys. 34 (1939) 178.
    """
    k = photon_kev / ELECTRON_REST_ENERGY
    e0 = 1.0 + energy_kev / ELECTRON_REST_ENERGY
    e1 = e0 - k
    p0, p1 = np.sqrt(e0 * e0 - 1.0), np.sqrt(np.maximum(e1 * e1 - 1.0, 1e-12))
    log0, log1 = np.log((e0 + p0) / (e0 - p0)), np.log((e1 + p1) / (e1 - p1))
    log = 2.0 * np.log((e0 * e1 + p0 * p1 - 1.0) / k)
    bracket = 4.0 / 3.0 - 2.0 * e0 * e1 * (p1 * p1 + p0 * p0) / (p0 * p1) ** 2
    bracket += log0 * e1 / p0**3 + log1 * e0 / p1**3 - log0 * log1 / (p0 * p1)
    inner = log0 * (e0 * e1 + p0 * p0) / p0**3 - log1 * (e0 * e1 + p1 * p1) / p1**3
    inner += 2.0 * k * e0 * e1 / (p0 * p1) ** 2
    bracket += log * (
        8.0 * e0 * e1 / (3.0 * p0 * p1)
        + k * k * (e0 * e0 * e1 * e1 + p0 * p0 * p1 * p1) / (p0 * p1) ** 3
        + k / (2.0 * p0 * p1) * inner
    )
    return FINE_STRUCTURE * ELECTRON_RADIUS**2 * p1 / p0 * bracket * _elwert(p0 / e0, p1 / e1)


def radiated(energy_kev: Array, photon_kev: Array) -> Array:
    """Photon energy times the cross section for radiating it in tungsten, per atom [cm2].

    A blend of two published shapes of equal radiated energy: Kramers' (flat in photon energy), which fits slow
    electrons in heavy nuclei, and Bethe and Heitler's with Elwert's factor, which fits fast ones. The share of
    the second is T / (T + 100 keV).

    Parameters
    ----------
    energy_kev : electron kinetic energies, shape (t, 1) [keV].
    photon_kev : photon energies, shape (1, k) [keV]. Photons above the electron's energy get 0.

    References
    ----------
    H. A. Kramers, Phil. Mag. 46 (1923) 836; for the other shape see ``bethe_heitler``.
    """
    possible = photon_kev < energy_kev
    exact = bethe_heitler(energy_kev, np.where(possible, photon_kev, 0.5 * energy_kev))
    fractions = (np.arange(40) + 0.5) / 40
    flat = bethe_heitler(energy_kev, energy_kev * fractions).mean(axis=1, keepdims=True)
    share = energy_kev / (energy_kev + BLEND_ENERGY)
    return np.where(possible, TUNGSTEN_Z**2 * ((1.0 - share) * flat + share * exact), 0.0)


def _elwert(beta0: Array, beta1: Array) -> Array:
    strength = 2.0 * np.pi * TUNGSTEN_Z * FINE_STRUCTURE
    return beta0 / beta1 * np.expm1(-strength / beta0) / np.expm1(-strength / beta1)
