"""Spectra of X-ray tubes with a thick tungsten target, with absolute output."""

from __future__ import annotations

import math
from functools import cache

import numpy as np
from numpy.typing import NDArray

from scatterbay.errors import OutOfRangeError
from scatterbay.physics.bremsstrahlung import TUNGSTEN_Z, radiated, stopping_power
from scatterbay.physics.medium import medium
from scatterbay.physics.spectrum import Filter, Spectrum
from scatterbay.tables import shells
from scatterbay.tables.elements import atomic_weight
from scatterbay.tables.materials import Material, material

Array = NDArray[np.float64]

LOWEST_KV, HIGHEST_KV = 40.0, 450.0
LOWEST_PHOTON_KEV = 10.0
ANODE_ANGLE = math.radians(20.0)
STEPS = 200

DEPTH_SHARE = 0.25
"""Depth at which photons are made, as a share of the path travelled: electrons in tungsten turn back and forth,
so it is less than the half that straight paths with even turning would give."""
SURFACE = 1.5e-3
"""Tungsten in the way of every photon, from the roughness of the anode [g/cm2] (0.8 um)."""
BACKSCATTERED = 0.5
"""Share of the electrons that leave the tungsten again, most of them early (Darlington, J. Phys. D 8 (1975) 85,
recalled)."""
EFFICIENCY = 0.85
"""Output of real tubes over this calculation; chosen once, against common practice at 60 to 120 kV."""
K_PHOTONS = 2.2e-3
"""K photons that leave the target per electron, at twice the K edge: chosen so that they are about 8 % of the
photons at 100 kV behind 2.5 mm of aluminium (common practice)."""
K_EXPONENT = 1.63
"""Growth of the K lines with voltage over the K edge (Green and Cosslett, J. Phys. D 1 (1968) 425)."""

_CHARGE = 1.602176634e-19


def tube_spectrum(
    voltage_kv: float, filters: tuple[Filter, ...] = (), anode_angle: float = ANODE_ANGLE
) -> Spectrum:
    """Spectrum of a tube at constant potential, in bins of 1 keV from 10 keV up, per coulomb.

    Electrons slow down continuously in tungsten, radiate by ``bremsstrahlung.radiated``, and what they radiate
    at a share of their path is weakened by the tungsten on its way out; K lines are added; filters follow as a
    narrow beam. Emission is taken as the same in all directions. Left out: the heel effect across the field,
    voltage ripple (a rippling voltage gives a softer and weaker beam), off-focus radiation.

    Parameters
    ----------
    voltage_kv : 40 to 450 [kV].
    filters : (material, thickness [m]) in any order.
    anode_angle : between the target's face and the axis of the beam [rad].

    Raises
    ------
    OutOfRangeError : a voltage outside the range in which the model was compared with published beams.
    """
    if not LOWEST_KV <= voltage_kv <= HIGHEST_KV:
        raise OutOfRangeError(
            f"the tube model covers {LOWEST_KV:g} to {HIGHEST_KV:g} kV at constant potential; got {voltage_kv:g} kV"
        )
    energy, photons = _unfiltered(float(voltage_kv), float(anode_angle))
    return Spectrum(energy, photons, "coulomb").filtered(filters)


def filter_for_half_value_layer(
    voltage_kv: float, filter_material: Material, half_value_layer: float, anode_angle: float = ANODE_ANGLE
) -> float:
    """Total filtration [m] of the material that gives a measured first half-value layer [m] in it.

    Raises
    ------
    OutOfRangeError : the layer is thinner than the bare tube's, or thicker than heavy filtration reaches.
    """
    bare = tube_spectrum(voltage_kv, (), anode_angle)

    def layer(filtration: float) -> float:
        return bare.filtered(((filter_material, filtration),)).half_value_layer(filter_material)

    low, high = 0.0, 60.0 * half_value_layer
    if not layer(low) < half_value_layer < layer(high):
        raise OutOfRangeError(
            f"a half-value layer of {1e3 * half_value_layer:.3g} mm {filter_material.name} does not belong to "
            f"{voltage_kv:g} kV: the model gives {1e3 * layer(low):.3g} to {1e3 * layer(high):.3g} mm"
        )
    for _ in range(40):
        middle = 0.5 * (low + high)
        low, high = (middle, high) if layer(middle) < half_value_layer else (low, middle)
    return 0.5 * (low + high)


@cache
def _unfiltered(voltage_kv: float, anode_angle: float) -> tuple[Array, Array]:
    """Bin centres [keV] and photons per steradian and coulomb, as they leave the target."""
    edges = np.append(np.arange(LOWEST_PHOTON_KEV, voltage_kv - 1e-9, 1.0), voltage_kv)
    photon, width = 0.5 * (edges[1:] + edges[:-1]), np.diff(edges)
    electron_edges = np.linspace(voltage_kv, LOWEST_PHOTON_KEV, STEPS + 1)
    electron = 0.5 * (electron_edges[1:] + electron_edges[:-1])
    step = electron_edges[:-1] - electron_edges[1:]
    path_step = step / stopping_power(electron)
    path = np.cumsum(path_step) - 0.5 * path_step
    tungsten = medium(material("tungsten").fractions).attenuation(photon)
    way_out = (SURFACE + DEPTH_SHARE * path) / math.tan(anode_angle)
    escaping = np.exp(-way_out[:, None] * tungsten[None, :])
    still_inside = 1.0 - BACKSCATTERED * (1.0 - (electron / voltage_kv) ** 3)
    atoms_per_gram = 6.02214076e23 / atomic_weight(TUNGSTEN_Z)
    made = radiated(electron[:, None], photon[None, :]) / photon * atoms_per_gram
    per_electron = ((still_inside * path_step)[:, None] * made * escaping).sum(axis=0) * width
    lines = _k_lines(voltage_kv, edges)
    return photon, (per_electron + lines) * EFFICIENCY / (4.0 * np.pi * _CHARGE)


def _k_lines(voltage_kv: float, edges: Array) -> Array:
    """K photons per electron, in the bins they fall into."""
    tungsten = medium(material("tungsten").fractions)
    edge = tungsten.k_edges_kev[TUNGSTEN_Z]
    shell = shells.k_shell(TUNGSTEN_Z)
    if voltage_kv <= edge or shell is None:
        return np.zeros(edges.size - 1)
    total = K_PHOTONS * (voltage_kv / edge - 1.0) ** K_EXPONENT
    return np.histogram(shell.energies_kev, bins=edges, weights=total * np.array(shell.shares))[0]
