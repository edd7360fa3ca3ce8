"""Scattering off bound electrons: incoherent functions and form factors of a mixture, per gram."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from scatterbay.physics.compton import klein_nishina
from scatterbay.physics.constants import AVOGADRO, ELECTRON_RADIUS, PLANCK_TIMES_LIGHT
from scatterbay.tables import scattering
from scatterbay.tables.elements import atomic_weight

Array = NDArray[np.float64]
Fractions = tuple[tuple[int, float], ...]

_GAUSS_NODES, _GAUSS_WEIGHTS = np.polynomial.legendre.leggauss(64)


def momentum_transfer(energy_kev: Array, cosine: Array) -> Array:
    """x = sin(theta/2) / wavelength [1/angstrom]."""
    return energy_kev / PLANCK_TIMES_LIGHT * np.sqrt(np.maximum(0.5 * (1.0 - cosine), 0.0))


@dataclass(frozen=True)
class IncoherentShape:
    """Klein-Nishina times the incoherent scattering function of a mixture, per gram.

    ``free_electrons`` replaces S(x, Z) by Z, as the older published calculations do.
    """

    fractions: Fractions
    free_electrons: bool = False

    @cached_property
    def electrons_per_gram(self) -> float:
        """N_A sum(w Z / A) [1/g]."""
        return AVOGADRO * sum(w * z / atomic_weight(z) for z, w in self.fractions)

    @cached_property
    def _log_nodes(self) -> tuple[Array, Array]:
        x = scattering.momentum_nodes()
        s = np.sum(
            [w / atomic_weight(z) * scattering.incoherent_function(z) for z, w in self.fractions], axis=0
        )
        first = np.array([x[0] * 1e-4])
        x, s = np.concatenate([first, x]), np.concatenate([[s[0] * 1e-8], s])
        return np.log(x), np.log(AVOGADRO * s)

    def electrons(self, x: Array) -> Array:
        """S(x) per gram [1/g]: log-log, proportional to x squared below the table, constant above it."""
        if self.free_electrons:
            return np.full(np.shape(x), self.electrons_per_gram)
        log_x, log_s = self._log_nodes
        return np.exp(np.interp(np.log(np.maximum(x, 1e-30)), log_x, log_s))

    def differential(self, energy_kev: Array, cosine: Array) -> Array:
        """Incoherent differential cross section [cm2/(sr g)]; shapes broadcast."""
        x = momentum_transfer(energy_kev, cosine)
        return klein_nishina(energy_kev, cosine) * self.electrons(x)

    def total(self, energy_kev: Array) -> Array:
        """Incoherent cross section, energies (n,) -> (n,) [cm2/g]: Gauss quadrature over sin(theta/2)."""
        half_sine = 0.5 * (_GAUSS_NODES + 1.0)
        cosine = 1.0 - 2.0 * half_sine**2
        weight = 0.5 * _GAUSS_WEIGHTS * 4.0 * half_sine
        return 2.0 * np.pi * self.differential(np.asarray(energy_kev)[:, None], cosine[None, :]) @ weight


@dataclass(frozen=True)
class CoherentShape:
    """Form factor squared of a mixture per gram, as pieces F^2 = a y^b of y = x^2; integrals are closed."""

    fractions: Fractions

    @cached_property
    def pieces(self) -> tuple[Array, Array, Array]:
        """Lower ends y (m,), exponents b (m,), and ln a (m,): the last piece is open upwards."""
        x = scattering.momentum_nodes()
        parts = [w / atomic_weight(z) * scattering.form_factor(z) ** 2 for z, w in self.fractions]
        f2 = AVOGADRO * np.sum(parts, axis=0)
        log_y, log_f = 2.0 * np.log(x), np.log(f2)
        slope = np.diff(log_f) / np.diff(log_y)
        exponent = np.concatenate([[0.0], slope, slope[-1:]])
        anchor_y, anchor_f = np.concatenate([log_y[:1], log_y]), np.concatenate([log_f[:1], log_f])
        return np.concatenate([[0.0], x**2]), exponent, anchor_f - exponent * anchor_y

    @cached_property
    def _cumulative(self) -> Array:
        """Integrals of F^2 y^n dy from 0 to the lower end of each piece, shape (3, m)."""
        low, _, _ = self.pieces
        full = self._piece_integrals(np.arange(low.size - 1), low[1:])
        return np.concatenate([np.zeros((3, 1)), np.cumsum(full, axis=1)], axis=1)

    def _piece_integrals(self, index: NDArray[np.int64], upper: Array) -> Array:
        low, exponent, log_a = self.pieces
        power = exponent[index] + 1.0 + np.arange(3)[:, None]
        start = np.where(low[index] > 0, low[index], 1e-300)
        return np.exp(log_a[index]) * (upper**power - start**power) / power

    def squared(self, x: Array) -> Array:
        """F(x)^2 summed over the mixture, per gram [1/g]."""
        low, exponent, log_a = self.pieces
        y = np.maximum(x * x, 1e-300)
        index = np.searchsorted(low, y, side="right") - 1
        return np.exp(log_a[index] + exponent[index] * np.log(y))

    def moments(self, y: Array) -> Array:
        """Integrals of F^2 y^n dy from 0 to y for n = 0, 1, 2: shape (3, k)."""
        low, _, _ = self.pieces
        index = np.searchsorted(low, y, side="right") - 1
        return self._cumulative[:, index] + self._piece_integrals(index, y)

    def inverse(self, integral: Array) -> Array:
        """y at which the integral of F^2 dy from 0 reaches the given value; shape (k,)."""
        low, exponent, log_a = self.pieces
        index = np.searchsorted(self._cumulative[0], integral, side="right") - 1
        power = exponent[index] + 1.0
        start = np.where(low[index] > 0, low[index], 1e-300) ** power
        rest = (integral - self._cumulative[0, index]) * power * np.exp(-log_a[index])
        return np.maximum(start + rest, 1e-300) ** (1.0 / power)

    def differential(self, energy_kev: Array, cosine: Array) -> Array:
        """Coherent differential cross section, r_e^2 (1 + cos^2)/2 F^2 [cm2/(sr g)]; shapes broadcast."""
        x = momentum_transfer(energy_kev, cosine)
        return 0.5 * ELECTRON_RADIUS**2 * (1.0 + cosine * cosine) * self.squared(x)

    def total(self, energy_kev: Array) -> Array:
        """Coherent cross section, energies (n,) -> (n,) [cm2/g], in closed form."""
        y = (np.asarray(energy_kev) / PLANCK_TIMES_LIGHT) ** 2
        zeroth, first, second = self.moments(y)
        return 4.0 * np.pi * ELECTRON_RADIUS**2 * (zeroth / y - 2.0 * first / y**2 + 2.0 * second / y**3)
