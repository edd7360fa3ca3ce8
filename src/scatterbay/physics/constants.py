"""Physical constants (CODATA 2022), in the units the physics room works in."""

from __future__ import annotations

ELECTRON_REST_ENERGY = 510.99895069
"""Rest energy of the electron [keV]."""

ELECTRON_RADIUS = 2.8179403205e-13
"""Classical electron radius [cm]."""

AVOGADRO = 6.02214076e23
"""Avogadro constant [1/mol]."""

PLANCK_TIMES_LIGHT = 12.398419843320026
"""hc [keV angstrom]."""

COMPTON_WAVELENGTH = PLANCK_TIMES_LIGHT / ELECTRON_REST_ENERGY
"""Compton wavelength of the electron [angstrom]."""

FINE_STRUCTURE = 7.2973525643e-3
"""Fine-structure constant [1]."""

JOULE_PER_KEV = 1.602176634e-16
"""[J/keV]."""

PAIR_THRESHOLD = 2.0 * ELECTRON_REST_ENERGY
"""Least photon energy that makes an electron pair [keV]."""
