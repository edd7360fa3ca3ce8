"""Compton scattering off a free electron at rest: the shift and the Klein-Nishina cross section."""

from __future__ import annotations

from typing import TypeVar

import numpy as np
from numpy.typing import NDArray

from scatterbay.physics.constants import COMPTON_WAVELENGTH, ELECTRON_RADIUS, ELECTRON_REST_ENERGY

F = TypeVar("F", float, NDArray[np.float64])

SMALL_ENERGY_KEV = 1.0
"""Below this the closed form of the total cross section cancels; its series is used."""


def scattered_energy(energy_kev: F, cosine: F) -> F:
    """Energy of a photon after Compton scattering [keV].

    E' = E / (1 + (E / mc2) (1 - cos theta)).

    Parameters
    ----------
    energy_kev : energy before, any shape [keV].
    cosine : cosine of the scattering angle, broadcast against it.

    References
    ----------
    A. H. Compton, Phys. Rev. 21 (1923) 483, equation 5.
    """
    return energy_kev / (1.0 + energy_kev / ELECTRON_REST_ENERGY * (1.0 - cosine))


def wavelength_shift(cosine: F) -> F:
    """Shift of the wavelength, (h / mc) (1 - cos theta) [angstrom]."""
    return COMPTON_WAVELENGTH * (1.0 - cosine)


def klein_nishina(energy_kev: F, cosine: F) -> F:
    """Differential cross section of a free electron for unpolarised photons [cm2/sr].

    (r_e^2 / 2) P^2 (P + 1/P - sin^2 theta), with P = E'/E.

    Parameters
    ----------
    energy_kev : photon energy, any shape [keV].
    cosine : cosine of the scattering angle, broadcast against it.

    References
    ----------
    O. Klein and Y. Nishina, Z. Phys. 52 (1929) 853.
    """
    ratio = 1.0 / (1.0 + energy_kev / ELECTRON_REST_ENERGY * (1.0 - cosine))
    return 0.5 * ELECTRON_RADIUS**2 * ratio * ratio * (ratio + 1.0 / ratio - 1.0 + cosine * cosine)


def klein_nishina_total(energy_kev: F) -> F:
    """Total cross section of a free electron [cm2], by the closed form of Klein and Nishina.

    Below 1 keV the first four terms of its series in E/mc2 are used, where the closed form loses digits.
    Tends to the Thomson cross section, 8/3 pi r_e^2.
    """
    a = np.asarray(energy_kev, dtype=float) / ELECTRON_REST_ENERGY
    series = 4.0 / 3.0 * (1.0 - 2.0 * a + 5.2 * a**2 - 13.3 * a**3 + 1144.0 / 35.0 * a**4)
    b = np.where(energy_kev < SMALL_ENERGY_KEV, 1.0, a)
    log = np.log1p(2.0 * b)
    closed = (1.0 + b) / b**2 * (2.0 * (1.0 + b) / (1.0 + 2.0 * b) - log / b)
    closed = closed + log / (2.0 * b) - (1.0 + 3.0 * b) / (1.0 + 2.0 * b) ** 2
    total = 2.0 * np.pi * ELECTRON_RADIUS**2 * np.where(energy_kev < SMALL_ENERGY_KEV, series, closed)
    return total if isinstance(energy_kev, np.ndarray) else float(total)
