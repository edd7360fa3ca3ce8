"""Dose quantities per photon fluence: air kerma and ambient dose equivalent."""

from __future__ import annotations

from functools import cache

import numpy as np
from numpy.typing import NDArray

from scatterbay.errors import OutOfRangeError
from scatterbay.physics.constants import JOULE_PER_KEV
from scatterbay.physics.interpolate import cubic, cubic_slopes, hermite
from scatterbay.tables import attenuation, conversion

Array = NDArray[np.float64]

AIR_KERMA = "air kerma"
AMBIENT = "ambient dose equivalent"
QUANTITIES = (AIR_KERMA, AMBIENT)
"""Quantities the program computes, in the order of every quantity axis."""

UNITS = {AIR_KERMA: "Gy", AMBIENT: "Sv"}

_SQUARE_CM_PER_SQUARE_M = 1e-4
_KG_PER_G = 1e-3


def air_kerma_per_fluence(energy_kev: Array) -> Array:
    """Air kerma per photon fluence [Gy m2].

    K / phi = E (mu_en / rho of air). The energy radiated again by the electrons (under 0.4 % below 1.5 MeV)
    is left out.

    Parameters
    ----------
    energy_kev : any shape, 10 to 3000 [keV].

    Raises
    ------
    OutOfRangeError : an energy outside the NIST table kept here.
    """
    energy = _checked(energy_kev)
    table = attenuation.air()
    log_absorption = cubic(np.log(energy).ravel(), np.log(table.energy_kev), np.log(table.absorption))
    absorption = np.exp(log_absorption).reshape(energy.shape) / _KG_PER_G * _SQUARE_CM_PER_SQUARE_M
    return energy * JOULE_PER_KEV * absorption


def ambient_per_kerma(energy_kev: Array) -> Array:
    """Ambient dose equivalent H*(10) per air kerma [Sv/Gy], any shape, 10 to 3000 keV.

    References
    ----------
    ICRP Publication 74 (1996), table A.21; ICRU Report 57 (1998).
    """
    energy = _checked(energy_kev)
    nodes, slopes, values = _ambient_cubic()
    return np.exp(hermite(np.log(energy).ravel(), nodes, values, slopes)).reshape(energy.shape)


def per_fluence(energy_kev: Array) -> Array:
    """All quantities per photon fluence, shape (q, ...) [Gy m2, Sv m2], in the order of QUANTITIES."""
    kerma = air_kerma_per_fluence(energy_kev)
    return np.stack([kerma, kerma * ambient_per_kerma(energy_kev)])


@cache
def _ambient_cubic() -> tuple[Array, Array, Array]:
    energy, ratio = conversion.ambient_per_kerma()
    nodes, values = np.log(energy), np.log(ratio)
    return nodes, cubic_slopes(nodes, values), values


def _checked(energy_kev: Array) -> Array:
    energy = np.asarray(energy_kev, dtype=float)
    low, high = attenuation.LOWEST_KEV, attenuation.HIGHEST_KEV
    if energy.size and (energy.min() < low * (1 - 1e-9) or energy.max() > high):
        raise OutOfRangeError(
            f"dose per fluence is tabulated from {low:g} to {high:g} keV; got {energy.min():g} to {energy.max():g} keV"
        )
    return np.maximum(energy, low)
