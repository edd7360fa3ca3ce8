"""Air-kerma transmission of plane barriers, as the tests of published figures ask for it."""

from __future__ import annotations

import functools
import math

import numpy as np

from scatterbay.barriers.makeup import Sheet, Sheets
from scatterbay.barriers.store import answer
from scatterbay.physics.nuclide import below, nuclide_spectrum
from scatterbay.physics.slab.grid import HIGHEST_KEV
from scatterbay.physics.spectrum import Spectrum
from scatterbay.tables.materials import material
from scatterbay.tables.nuclides import nuclide


def layer(name: str, thickness_mm: float, density: float | None = None) -> Sheet:
    """A sheet of a shipped material, at another density [g/cm3] where one is given."""
    found = material(name)
    return Sheet(found.fractions, density or found.density_g_cm3, 1e-3 * thickness_mm)


def kerma_transmission(spectrum: Spectrum, sheets: Sheets) -> float:
    """Air kerma behind an infinite plane barrier over the incident, at right angles to it."""
    behind = np.exp(answer(sheets).log_dose(spectrum.energy_kev, np.array([1.0]))[0, :, 0])
    return float(behind @ spectrum.photons) / spectrum.kerma_at_1_m


def line(energy_kev: float) -> Spectrum:
    """One photon energy."""
    return Spectrum(np.array([energy_kev]), np.array([1.0]), "photon")


@functools.cache
def nuclide_beam(name: str) -> Spectrum:
    """The lines of a nuclide that barrier transport covers."""
    return below(nuclide_spectrum(nuclide(name)), HIGHEST_KEV)[0]


def tenth_value_layer_mm(spectrum: Spectrum, name: str, first_mm: float, second_mm: float) -> float:
    """Tenth-value layer [mm] from the fall between two thicknesses."""
    falls = [math.log(kerma_transmission(spectrum, (layer(name, mm),))) for mm in (first_mm, second_mm)]
    return (second_mm - first_mm) * math.log(10.0) / (falls[0] - falls[1])


def archer(thickness: float, a: float, b: float, g: float) -> float:
    """B = [(1 + b/a) exp(a g x) - b/a]^(-1/g) (Archer, Thacker and Bevelacqua, Health Phys. 44 (1983) 507)."""
    return float(((1.0 + b / a) * math.exp(a * g * thickness) - b / a) ** (-1.0 / g))


def archer_thickness(transmission: float, a: float, b: float, g: float) -> float:
    """Its inverse: the thickness that lets this much through."""
    return math.log((transmission**-g + b / a) / (1.0 + b / a)) / (a * g)
