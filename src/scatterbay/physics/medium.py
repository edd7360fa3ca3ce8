"""What a photon meets in a material: partial cross sections per gram, and their tables over energy."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache, cached_property
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from scatterbay.errors import OutOfRangeError
from scatterbay.physics.binding import CoherentShape, Fractions, IncoherentShape
from scatterbay.physics.constants import PAIR_THRESHOLD
from scatterbay.physics.interpolate import log_log
from scatterbay.tables import attenuation, shells
from scatterbay.tables.materials import Material

Array = NDArray[np.float64]

TWIN = 1e-6
"""Relative distance of the two nodes that stand for an edge."""
GRID_POINTS = 900
SMALL_SHARE = 0.03
"""Below this share of the total, photoelectric absorption is carried on by its power law: there the difference
between the tabulated total and the computed scattering is mostly their rounding."""


class Partials(NamedTuple):
    """Mass cross sections [cm2/g], all of one shape."""

    incoherent: Array
    coherent: Array
    photoelectric: Array
    pair: Array

    @property
    def total(self) -> Array:
        """Sum of all parts."""
        return self.incoherent + self.coherent + self.photoelectric + self.pair


def twins(edge_kev: Array | float, offset: float = TWIN) -> Array:
    """The two energies that stand for each edge: just below and just above it."""
    edge = np.atleast_1d(np.asarray(edge_kev, dtype=float))
    return np.sort(np.concatenate([edge * (1 - offset), edge * (1 + offset)]))


@cache
def _nodes(z: int) -> tuple[Array, Array, Array]:
    """Tabulated energies with split twins, tabulated totals, and the edges of an element."""
    table = attenuation.element(z)
    energy = table.energy_kev.copy()
    upper = np.flatnonzero(np.diff(energy) == 0.0) + 1
    edges = energy[upper].copy()
    energy[upper] *= 1 + TWIN
    energy[upper - 1] *= 1 - TWIN
    return energy, table.attenuation, edges


@cache
def _element(z: int, free_electrons: bool) -> tuple[Array, Array, Array]:
    """Energies, photoelectric part, and the factor that closes the incoherent part, at the table's rows."""
    energy, total, _ = _nodes(z)
    alone: Fractions = ((z, 1.0),)
    incoherent = IncoherentShape(alone).total(energy)
    coherent, pair = CoherentShape(alone).total(energy), _pair(z, energy)
    photo = total - incoherent - coherent - pair
    factor = np.ones(energy.size)
    small = np.flatnonzero(photo < SMALL_SHARE * total)
    if small.size:
        start = int(small[0])
        if start < 2:
            photo[start:] = np.maximum(photo[start:], 1e-12 * total[start:])
        else:
            slope = np.log(photo[start - 1] / photo[start - 2]) / np.log(
                energy[start - 1] / energy[start - 2]
            )
            photo[start:] = photo[start - 1] * (energy[start:] / energy[start - 1]) ** slope
        factor[start:] = (total - coherent - photo - pair)[start:] / incoherent[start:]
    if free_electrons:
        factor = np.ones(energy.size)
    return energy, photo, factor


def _pair(z: int, energy_kev: Array) -> Array:
    nodes, values = attenuation.pair(z)
    above, node_above = energy_kev - PAIR_THRESHOLD, nodes - PAIR_THRESHOLD
    power = np.log(values[1] / values[0]) / np.log(node_above[1] / node_above[0])
    inside = log_log(np.maximum(above, node_above[0]), node_above, values)
    below = values[0] * (np.maximum(above, 0.0) / node_above[0]) ** power
    return np.where(above >= node_above[0], inside, below)


@dataclass(frozen=True)
class Medium:
    """A mixture as photons meet it. ``free_electrons`` leaves out binding and coherent scattering.

    Photoelectric absorption is the tabulated total less incoherent, coherent and pair parts; where it is small
    it follows its power law and the incoherent part closes the balance. Between tabulated energies each part is
    interpolated on its own, which follows the total better than the total's own rows do.
    """

    fractions: Fractions
    free_electrons: bool = False

    @cached_property
    def incoherent_shape(self) -> IncoherentShape:
        """Angular shape of incoherent scattering."""
        return IncoherentShape(self.fractions, self.free_electrons)

    @cached_property
    def coherent_shape(self) -> CoherentShape:
        """Angular shape of coherent scattering."""
        return CoherentShape(self.fractions)

    @cached_property
    def edges_kev(self) -> Array:
        """All absorption edges of the mixture above 10 keV [keV]."""
        return np.unique(np.concatenate([_nodes(z)[2] for z, _ in self.fractions]))

    @cached_property
    def k_edges_kev(self) -> dict[int, float]:
        """K edge [keV] of each element that has K-shell data."""
        found = {z: _nodes(z)[2] for z, _ in self.fractions if shells.k_shell(z) is not None}
        return {z: float(edges.max()) for z, edges in found.items() if edges.size}

    @cached_property
    def grid_kev(self) -> Array:
        """Energies of the tables below: even steps of ln E, with twins at the edges."""
        low, high = attenuation.LOWEST_KEV, attenuation.HIGHEST_KEV
        even = np.geomspace(low, high, GRID_POINTS)
        even[0], even[-1] = low, high
        inside = self.edges_kev[self.edges_kev > low]
        return np.unique(np.concatenate([even, twins(inside)]) if inside.size else even)

    @cached_property
    def table(self) -> Partials:
        """Partial cross sections on ``grid_kev``."""
        return self.partials(self.grid_kev)

    def partials(self, energy_kev: Array) -> Partials:
        """Partial cross sections at energies (n,), each of shape (n,) [cm2/g]. Edges: see ``twins``.

        Raises
        ------
        OutOfRangeError : an energy outside 10 to 3000 keV.
        """
        energy = _checked(energy_kev)
        incoherent, photo, pair = np.zeros(energy.size), np.zeros(energy.size), np.zeros(energy.size)
        for z, weight in self.fractions:
            nodes, values, factor = _element(z, self.free_electrons)
            shape = IncoherentShape(((z, weight),), self.free_electrons)
            incoherent += shape.total(energy) * np.interp(np.log(energy), np.log(nodes), factor)
            photo += weight * log_log(energy, nodes, values)
            pair += weight * _pair(z, energy)
        coherent = np.zeros(energy.size) if self.free_electrons else self.coherent_shape.total(energy)
        return Partials(incoherent, coherent, photo, pair)

    def attenuation(self, energy_kev: Array) -> Array:
        """Total mass attenuation coefficient, any shape [cm2/g]: from ``table``, linear over ln E."""
        energy = _checked(energy_kev)
        return np.interp(np.log(energy), np.log(self.grid_kev), self.table.total)

    def fluorescence(self, energy_kev: Array) -> tuple[Array, Array]:
        """Energies of the K lines (l,) [keV] and the cross section for making each, (l, n) [cm2/g]."""
        energy = _checked(energy_kev)
        lines: list[float] = []
        values: list[Array] = []
        for z, weight in self.fractions:
            shell = shells.k_shell(z)
            if shell is None or self.free_electrons or z not in self.k_edges_kev:
                continue
            made = weight * _k_vacancies(z, energy) * shell.fluorescence_yield
            lines += shell.energies_kev
            values += [made * share for share in shell.shares]
        return np.array(lines), np.array(values).reshape(len(lines), energy.size)


def _k_vacancies(z: int, energy_kev: Array) -> Array:
    """Photoelectric absorption in the K shell [cm2/g]: the edge's jump, kept at all energies above it."""
    nodes, photo, _ = _element(z, False)
    edge = float(_nodes(z)[2].max())
    upper = int(np.searchsorted(nodes, edge))
    share = 1.0 - photo[upper - 1] / photo[upper]
    return np.where(energy_kev > edge, share * log_log(energy_kev, nodes, photo), 0.0)


@cache
def medium(fractions: Fractions) -> Medium:
    """The medium of a composition; one instance, and one set of tables, per composition."""
    return Medium(fractions)


def linear_attenuation(material: Material, energy_kev: Array) -> Array:
    """Linear attenuation coefficient of a material [1/m], any shape of energies [keV]."""
    return 100.0 * material.density_g_cm3 * medium(material.fractions).attenuation(energy_kev)


def _checked(energy_kev: Array) -> Array:
    energy = np.asarray(energy_kev, dtype=float)
    low, high = attenuation.LOWEST_KEV, attenuation.HIGHEST_KEV
    if energy.size and (energy.min() < low * (1 - 1e-5) or energy.max() > high * (1 + 1e-9)):
        raise OutOfRangeError(
            f"attenuation is tabulated from {low:g} to {high:g} keV; got {energy.min():g} to {energy.max():g} keV"
        )
    return np.clip(energy, low, high)
