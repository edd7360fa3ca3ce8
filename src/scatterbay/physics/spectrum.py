"""A photon spectrum as lines or narrow bins, and what is read off it: kerma, mean energy, half-value layer."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from scatterbay.errors import OutOfRangeError
from scatterbay.physics import dose
from scatterbay.physics.medium import linear_attenuation
from scatterbay.tables.materials import Material

Array = NDArray[np.float64]

Filter = tuple[Material, float]
"""A material and its thickness [m]."""

THICKEST_HALF_VALUE_LAYER = 10.0
"""[m] of any material; beyond it the search for a layer gives up."""


@dataclass(frozen=True)
class Spectrum:
    """Photons by energy, per steradian and per unit of what drives the source.

    Parameters
    ----------
    energy_kev : energies, shape (n,), ascending [keV].
    photons : photons per steradian at each energy, shape (n,): per coulomb of tube charge, or per decay.
    per : what the photons are counted by: ``coulomb`` or ``decay``.
    """

    energy_kev: Array
    photons: Array
    per: str

    @property
    def mean_energy_kev(self) -> float:
        """Mean energy by number of photons [keV]."""
        return float(self.energy_kev @ self.photons / self.photons.sum())

    @property
    def kerma_at_1_m(self) -> float:
        """Air kerma at 1 m per unit of ``per``, nothing in the way [Gy]."""
        return float(self.photons @ dose.air_kerma_per_fluence(self.energy_kev))

    def dose_at_1_m(self) -> Array:
        """All quantities at 1 m per unit of ``per``, shape (q,) [Gy, Sv]."""
        return dose.per_fluence(self.energy_kev) @ self.photons

    def filtered(self, filters: tuple[Filter, ...]) -> Spectrum:
        """The spectrum behind filters, as a narrow beam."""
        optical = np.zeros(self.energy_kev.size)
        for material, thickness in filters:
            optical += linear_attenuation(material, self.energy_kev) * thickness
        return replace(self, photons=self.photons * np.exp(-optical))

    def scaled(self, factor: float) -> Spectrum:
        """The spectrum with every photon counted ``factor`` times."""
        return replace(self, photons=self.photons * factor)

    def layer_for(self, material: Material, transmission: float) -> float:
        """Thickness [m] of a material that lets this fraction of the air kerma pass, as a narrow beam.

        Raises
        ------
        OutOfRangeError : no thickness up to 10 m does it.
        """
        attenuation = linear_attenuation(material, self.energy_kev)
        weight = self.photons * dose.air_kerma_per_fluence(self.energy_kev)
        target = transmission * weight.sum()
        low, high = 0.0, 1e-4
        while weight @ np.exp(-attenuation * high) > target:
            low, high = high, 2.0 * high
            if high > THICKEST_HALF_VALUE_LAYER:
                raise OutOfRangeError(
                    f"no layer of {material.name} lets only {transmission:g} of this beam pass"
                )
        for _ in range(80):
            middle = 0.5 * (low + high)
            low, high = (middle, high) if weight @ np.exp(-attenuation * middle) > target else (low, middle)
        return 0.5 * (low + high)

    def half_value_layer(self, material: Material, which: int = 1) -> float:
        """First or second half-value layer of a material [m], as a narrow beam by air kerma."""
        if which == 1:
            return self.layer_for(material, 0.5)
        return self.layer_for(material, 0.25) - self.layer_for(material, 0.5)

    def thinned(self, share: float = 1e-6) -> Spectrum:
        """Without the energies that carry less than this share of the kerma, at the ends or in between."""
        weight = self.photons * dose.air_kerma_per_fluence(self.energy_kev)
        kept = weight > share * weight.sum()
        return replace(self, energy_kev=self.energy_kev[kept], photons=self.photons[kept])


def mixed(spectra: Sequence[Spectrum], shares: Sequence[float]) -> Spectrum:
    """Several spectra at once, each counted by its share."""
    energy = np.unique(np.concatenate([one.energy_kev for one in spectra]))
    photons = np.zeros(energy.size)
    for one, share in zip(spectra, shares, strict=True):
        photons[np.searchsorted(energy, one.energy_kev)] += share * one.photons
    return Spectrum(energy, photons, spectra[0].per)
