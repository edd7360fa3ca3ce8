"""What a wall lets through, as stored: dose behind it per unit fluence in front, by energy and angle."""

from __future__ import annotations

import io
from dataclasses import dataclass
from functools import cached_property, lru_cache

import numpy as np
from numpy.typing import NDArray

from scatterbay.barriers.makeup import Sheet, Sheets, k_elements
from scatterbay.errors import OutOfRangeError
from scatterbay.physics import dose
from scatterbay.physics.interpolate import cubic, spline_matrix
from scatterbay.physics.medium import medium
from scatterbay.physics.slab.grid import HIGHEST_KEV, LOWEST_KEV, Grid, grid_for
from scatterbay.physics.slab.kernel import Kernel, build_kernel
from scatterbay.physics.slab.layer import Layer, build_layer
from scatterbay.physics.slab.wall import wall_answer

Array = NDArray[np.float64]

FLOOR = 1e-80
"""Dose per fluence below which a value counts as this: keeps logarithms finite, far below any dose that matters."""


@dataclass(frozen=True)
class Answer:
    """Transmission of one wall.

    Parameters
    ----------
    sheets : the layers, in the order in which the radiation meets them.
    energy_kev : rising energies, shape (n,) [keV].
    cosines : rising cosines of incoming directions, shape (a,).
    outgoing : cosines of outgoing directions, shape (m,), and their weights.
    diffuse : scattered dose on the far face per unit fluence in front, shape (n, a, q, m), weights included.
    straight : share of coherent scattering counted as going straight on, per sheet and energy, shape (s, n).
    """

    sheets: Sheets
    energy_kev: Array
    cosines: Array
    outgoing: Array
    outgoing_weights: Array
    diffuse: Array
    straight: Array

    def optical_depth(self, energy_kev: Array) -> Array:
        """Depth of the wall along its normal for the uncollided beam, shape of the energies."""
        checked = check_energy(energy_kev)
        result = np.zeros(checked.shape)
        log, nodes = np.log(checked), np.log(self.energy_kev)
        for one, straight in zip(self.sheets, self.straight, strict=True):
            matter = medium(one.fractions)
            coherent = np.interp(log, np.log(matter.grid_kev), matter.table.coherent)
            left = matter.attenuation(checked) - coherent * np.interp(log, nodes, straight)
            result += 100.0 * one.density_g_cm3 * one.thickness * left
        return result

    @cached_property
    def _log_straight(self) -> Array:
        """ln of the uncollided share at the nodes, (n, a): never too small to be told."""
        return -self.optical_depth(self.energy_kev)[:, None] / self.cosines

    def _log_scattered(self, values: Array) -> Array:
        """ln of scattered values at the nodes (n, a, ...), also where they are too small to be told.

        There the value of the nearest steeper direction is taken, which is higher: a floor instead, far under its
        neighbours, would send the spline over the cosine astray.
        """
        log = np.log(np.maximum(values, FLOOR))
        for k in range(log.shape[1] - 2, -1, -1):
            log[:, k] = np.where(values[:, k] > FLOOR, log[:, k], log[:, k + 1])
        return log

    @cached_property
    def stretches(self) -> list[slice]:
        """Runs of energies between K edges: nothing is interpolated from one to the next."""
        falling = grid_for(k_elements(self.sheets)).stretch_of(self.energy_kev)
        bounds = np.flatnonzero(np.diff(falling)) + 1
        return [slice(a, b) for a, b in zip([0, *bounds], [*bounds, falling.size], strict=True)]

    def log_dose(self, energy_kev: Array, cosines: Array) -> Array:
        """ln of the dose behind the wall, uncollided and scattered, per unit fluence in front: (q, e, c).

        Cubic in ln E between K edges, spline over the cosine of (cosine times ln dose).

        Raises
        ------
        OutOfRangeError : an energy outside 10 to 1400 keV.
        """
        energy = check_energy(energy_kev)
        straight = self._log_straight[:, :, None] + np.log(dose.per_fluence(self.energy_kev).T)[:, None, :]
        log = np.logaddexp(straight, self._log_scattered(self.diffuse.sum(axis=-1)))
        fine = np.einsum("ca,naq->ncq", spline_matrix(self.cosines, cosines), log * self.cosines[:, None])
        return self._over_energy(energy, np.moveaxis(fine / cosines[:, None], 0, -1)).transpose(1, 2, 0)

    def emergent(self, energy_kev: Array, incoming: Array, outgoing: Array) -> Array:
        """Scattered dose per unit cosine out and per unit fluence in front: shape (q, e, i, o).

        The azimuth is averaged. Interpolated like ``log_dose``, and over the outgoing cosine by a cubic.
        """
        energy = check_energy(energy_kev)
        log = self._log_scattered(self.diffuse / self.outgoing_weights)
        fine = np.einsum(
            "ca,naqm->ncqm", spline_matrix(self.cosines, incoming), log * self.cosines[:, None, None]
        )
        fine /= incoming[:, None, None]
        over_out = cubic(outgoing, *_to_both_ends(self.outgoing, fine))
        return np.exp(self._over_energy(energy, np.moveaxis(over_out, 0, -1))).transpose(1, 3, 0, 2)

    def _over_energy(self, energy: Array, values: Array) -> Array:
        """Shape-preserving cubic over ln E, stretch by stretch: values (..., n) to (..., e)."""
        log, nodes = np.log(energy), np.log(self.energy_kev)
        result = np.empty((*values.shape[:-1], energy.size))
        ends = [nodes[piece.stop - 1] for piece in self.stretches[:-1]]
        number = np.searchsorted(np.array(ends), log, side="left")
        for k, piece in enumerate(self.stretches):
            mine = number == k
            inside = np.clip(log[mine], nodes[piece.start], nodes[piece.stop - 1])
            result[..., mine] = cubic(inside, nodes[piece], values[..., piece])
        return result

    def to_bytes(self) -> bytes:
        """The computed arrays in numpy's own format."""
        buffer = io.BytesIO()
        np.savez(buffer, energy=self.energy_kev, cosines=self.cosines, outgoing=self.outgoing,
                 weights=self.outgoing_weights, diffuse=self.diffuse, straight=self.straight)  # fmt: skip
        return buffer.getvalue()

    @classmethod
    def from_bytes(cls, content: bytes, sheets: Sheets) -> Answer:
        """The inverse of ``to_bytes``; raises ValueError, KeyError or OSError on anything else."""
        with np.load(io.BytesIO(content), allow_pickle=False) as kept:
            arrays = [
                kept[name] for name in ("energy", "cosines", "outgoing", "weights", "diffuse", "straight")
            ]
        return cls(sheets, *arrays)


def _to_both_ends(cosines: Array, values: Array) -> tuple[Array, Array]:
    """Gauss nodes and logarithms at them (..., m), carried straight on to the cosines 0 and 1."""
    first = values[..., 0] - cosines[0] * (values[..., 1] - values[..., 0]) / (cosines[1] - cosines[0])
    slope = (values[..., -1] - values[..., -2]) / (cosines[-1] - cosines[-2])
    last = values[..., -1] + (1.0 - cosines[-1]) * slope
    ends = np.concatenate([first[..., None], values, last[..., None]], axis=-1)
    return np.concatenate([[0.0], cosines, [1.0]]), ends


def build_answer(sheets: Sheets) -> Answer:
    """Transport through the sheets, from scratch."""
    grid = grid_for(k_elements(sheets))
    kernels = {one.fractions: _kernel(one.fractions, grid) for one in sheets}
    layers = [_layer(one, grid.k_elements) for one in sheets]
    result = wall_answer(layers)
    order = np.argsort(grid.cosines)
    return Answer(
        sheets,
        grid.energy_kev[::-1].copy(),
        grid.cosines[order],
        grid.gauss[0],
        grid.gauss[1],
        result.diffuse[::-1][:, order].copy(),
        np.stack([kernels[one.fractions].straight[::-1] for one in sheets]),
    )


def check_energy(energy_kev: Array) -> Array:
    """Energies inside the slab grid.

    Raises
    ------
    OutOfRangeError : any outside it.
    """
    energy = np.asarray(energy_kev, dtype=float)
    if energy.size and (energy.min() < LOWEST_KEV * (1 - 1e-9) or energy.max() > HIGHEST_KEV):
        raise OutOfRangeError(
            f"barrier transport covers {LOWEST_KEV:g} to {HIGHEST_KEV:g} keV; "
            f"got {energy.min():g} to {energy.max():g} keV"
        )
    return energy


@lru_cache(maxsize=16)
def _layer(one: Sheet, k_elements: tuple[int, ...]) -> Layer:
    """A layer; the last few are kept, as walls that are tried out share most of theirs."""
    grid = grid_for(k_elements)
    return build_layer(_kernel(one.fractions, grid), grid, one.density_g_cm3, one.thickness)


_KERNELS: dict[tuple[object, ...], Kernel] = {}


def _kernel(fractions: tuple[tuple[int, float], ...], grid: Grid) -> Kernel:
    key = (fractions, grid.k_elements)
    if key not in _KERNELS:
        _KERNELS[key] = build_kernel(medium(fractions), grid)
    return _KERNELS[key]
