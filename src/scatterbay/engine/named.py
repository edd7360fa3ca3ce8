"""Spectra of beams named in a text."""

from __future__ import annotations

import numpy as np

from scatterbay.errors import OutOfRangeError
from scatterbay.physics.nuclide import below, nuclide_spectrum
from scatterbay.physics.slab.grid import HIGHEST_KEV, LOWEST_KEV
from scatterbay.physics.spectrum import Spectrum
from scatterbay.physics.tube import tube_spectrum
from scatterbay.scenario.beam_text import NamedBeam
from scatterbay.tables.materials import material
from scatterbay.tables.nuclides import nuclide


def spectrum_of(beam: NamedBeam) -> Spectrum:
    """Spectrum per steradian and coulomb (tube), decay (nuclide) or photon into all directions (one energy).

    Raises
    ------
    OutOfRangeError : outside the tube model, or an energy outside 10 to 1400 keV.
    """
    if beam.nuclide is not None:
        return below(nuclide_spectrum(nuclide(beam.nuclide)), HIGHEST_KEV)[0]
    if beam.voltage is not None and beam.filtration is not None:
        layers = beam.filtration.layers
        filters = tuple((material(layer.material), layer.counted_thickness) for layer in layers)
        return tube_spectrum(beam.voltage, filters).thinned(1e-9)
    energy = beam.energy_kev or 0.0
    if not LOWEST_KEV <= energy <= HIGHEST_KEV:
        raise OutOfRangeError(
            f"photons of {LOWEST_KEV:g} to {HIGHEST_KEV:g} keV are covered; got {energy:g} keV"
        )
    return Spectrum(np.array([energy]), np.array([1.0 / (4.0 * np.pi)]), "photon")
