"""A body's material as the engine reads it: cross sections on the ladder, angular shapes on a fine mesh."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.energies import Ladder, Rungs
from scatterbay.physics.constants import ELECTRON_RADIUS, ELECTRON_REST_ENERGY, PLANCK_TIMES_LIGHT
from scatterbay.physics.medium import Medium, Partials
from scatterbay.physics.slab.grid import HIGHEST_KEV, LOWEST_KEV

Array = NDArray[np.float64]

MESH = 4000
"""Intervals of the mesh over the square root of the momentum transfer."""


@dataclass(frozen=True)
class Matter:
    """A medium of some density on a ladder of energies."""

    medium: Medium
    density_g_cm3: float
    ladder: Ladder

    @cached_property
    def incoherent(self) -> Array:
        """Mass cross section on the ladder [cm2/g]."""
        return self._parts.incoherent

    @cached_property
    def coherent(self) -> Array:
        """Mass cross section on the ladder [cm2/g]."""
        return self._parts.coherent

    @cached_property
    def pair(self) -> Array:
        """Mass cross section on the ladder [cm2/g]."""
        return self._parts.pair

    @cached_property
    def photoelectric(self) -> Array:
        """Mass cross section on the ladder [cm2/g]."""
        return self._parts.photoelectric

    @cached_property
    def total(self) -> Array:
        """Mass attenuation coefficient on the ladder [cm2/g]."""
        return self._parts.total

    @cached_property
    def linear(self) -> Array:
        """Linear attenuation coefficient on the ladder [1/m]."""
        return 100.0 * self.density_g_cm3 * self.total

    @cached_property
    def _parts(self) -> Partials:
        return self.medium.partials(self.ladder.energy_kev)

    @cached_property
    def lines(self) -> tuple[Array, Array]:
        """Energies (l,) [keV] of the locally made photons and the cross section for each on the ladder, (l, e).

        K lines from 10 keV up, then the annihilation line (two photons a pair).
        """
        energy, made = self.medium.fluorescence(self.ladder.energy_kev)
        kept = energy >= LOWEST_KEV
        lines = np.append(energy[kept], ELECTRON_REST_ENERGY)
        return lines, np.concatenate([made[kept], 2.0 * self.pair[None, :]])

    @cached_property
    def made_locally(self) -> Array:
        """Mass cross section for all locally made photons on the ladder [cm2/g]."""
        return self.lines[1].sum(axis=0)

    @cached_property
    def _mesh(self) -> tuple[float, Array, Array]:
        """Intervals per unit of sqrt(x); electrons and form factor squared per gram at the mesh points."""
        top = np.sqrt(HIGHEST_KEV / PLANCK_TIMES_LIGHT)
        x = np.linspace(0.0, top, MESH + 2) ** 2
        coherent = np.zeros_like(x) if self.medium.free_electrons else self.medium.coherent_shape.squared(x)
        return (MESH + 1) / top, self.medium.incoherent_shape.electrons(x), coherent

    def mesh_position(self, momentum: Array) -> Rungs:
        """Where momentum transfers (n,) [1/angstrom] lie on the mesh."""
        scaled = np.sqrt(momentum) * self._mesh[0]
        index = np.minimum(scaled.astype(np.int64), MESH)
        return Rungs(index, scaled - index)

    def electrons(self, position: Rungs) -> Array:
        """S(x) per gram [1/g]."""
        return position.of(self._mesh[1])

    def form_factor_squared(self, position: Rungs) -> Array:
        """F(x)^2 per gram [1/g]."""
        return position.of(self._mesh[2])


def momentum(energy_kev: Array, cosine: Array) -> Array:
    """Momentum transfer x [1/angstrom]."""
    return energy_kev / PLANCK_TIMES_LIGHT * np.sqrt(np.maximum(0.5 - 0.5 * cosine, 0.0))


def free_electron(ratio: Array, cosine: Array) -> Array:
    """Klein-Nishina cross section [cm2/sr] from P = E'/E and the cosine."""
    return 0.5 * ELECTRON_RADIUS**2 * ratio * ratio * (ratio + 1.0 / ratio - 1.0 + cosine * cosine)


def thomson(cosine: Array) -> Array:
    """r_e^2 (1 + cos^2) / 2 [cm2/sr]."""
    return 0.5 * ELECTRON_RADIUS**2 * (1.0 + cosine * cosine)
