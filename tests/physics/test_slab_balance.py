"""Slab method: energy balance, reciprocity, doubling against adding. Kinds: limit, independent route (dense algebra).

The dense route shares the thin starting layer and nothing else: no blocks, no triangular shape, and its own count of
the energy left behind at each collision.
"""

from __future__ import annotations

import functools

import numpy as np
import pytest
from numpy.typing import NDArray

from scatterbay.physics.medium import medium
from scatterbay.physics.slab.layer import build_layer
from scatterbay.tables.materials import material
from tests.physics.slabs import Dense, dense, doublings, kernel_of, layer_of, left_per_gram

Array = NDArray[np.float64]

CASES = {
    "water": 0.1,
    "concrete": 0.2,
    "steel": 0.02,
    "lead": 0.002,
    "barite concrete": 0.1,
    "tungsten": 0.005,
}
"""Thicknesses [m]."""


@functools.cache
def by_adding(name: str) -> Dense:
    """The slab by plain adding, with the energy left in it."""
    grid, kernel = kernel_of(name)
    stuff = material(name)
    times = doublings(kernel, grid, stuff.density_g_cm3, CASES[name])
    thin = build_layer(kernel, grid, stuff.density_g_cm3, CASES[name] / 2**times)
    collided = 1.0 - thin.uncollided.reshape(grid.energy_kev.size, -1)
    left = left_per_gram(medium(stuff.fractions), grid.energy_kev) / kernel.attenuation
    slab = dense(thin, (left[:, None] * collided).ravel())
    for _ in range(times):
        slab = slab.under(slab)
    return slab


@pytest.mark.parametrize("name", sorted(CASES))
def test_kernel_conserves_energy(name: str) -> None:
    """Limit: what a collision sends out and what it leaves sum to the photon's energy, 2.5e-3 for every direction.

    The worst is the node nearest to the normal at high energies, where 24 azimuths see the forward peak unevenly.
    """
    grid, kernel = kernel_of(name)
    energy, parts = grid.energy_kev, medium(material(name).fractions).partials(grid.energy_kev)
    sent = (kernel.forward + kernel.backward).sum(axis=3) @ energy
    left = left_per_gram(medium(material(name).fractions), energy) + kernel.straight * parts.coherent * energy
    off = (sent + left[:, None]) / (parts.total * energy)[:, None] - 1.0
    assert np.abs(off).max() < 2.5e-3
    assert np.sqrt((off**2).mean()) < 7e-4


@pytest.mark.parametrize("name", sorted(CASES))
def test_energy_balance_of_a_slab(name: str) -> None:
    """Limit: transmitted, reflected, uncollided and left inside sum to what came in: 1e-3 for the directions that carry
    answers and in the mean of all; 2e-3 for every single energy and direction (see the kernel)."""
    slab, grid = by_adding(name), layer_of(name, CASES[name]).grid
    energy, m = grid.energy_kev, grid.gauss[0].size
    out = np.repeat(energy, m)
    entered = np.repeat(energy, grid.cosines.size)
    left = slab.absorbed + slab.uncollided * entered + slab.transmitted @ out + slab.reflected @ out
    off = (left / entered - 1.0).reshape(energy.size, -1)
    assert np.abs(off).max() < 2e-3
    assert np.abs(off[:, m:]).max() < 1e-3
    assert np.sqrt((off**2).mean()) < 1e-3


@pytest.mark.parametrize("name", sorted(CASES))
def test_doubling_in_blocks_is_dense_adding(name: str) -> None:
    """Independent route: the program's blocked doubling against dense solutions from the same thin start."""
    layer, slab = layer_of(name, CASES[name]), by_adding(name)
    scale = slab.transmitted.max()
    np.testing.assert_allclose(layer.transmitted, slab.transmitted, rtol=0.0, atol=1e-12 * scale)
    np.testing.assert_allclose(layer.reflected, slab.reflected, rtol=0.0, atol=1e-12 * scale)
    np.testing.assert_allclose(layer.uncollided, slab.uncollided, rtol=1e-9)


@pytest.mark.parametrize("name", sorted(CASES))
def test_reciprocity(name: str) -> None:
    """Limit: at one energy, what goes from one direction to another goes back alike: 2e-3 of the largest.

    Photons that keep their energy (coherent scattering, and what stays on its node) obey it; rescaling every row to its
    cross section breaks it by 1e-3 or so.
    """
    layer = layer_of(name, CASES[name])
    grid = layer.grid
    n, a, (nodes, weights) = grid.energy_kev.size, grid.cosines.size, grid.gauss
    each, m = np.arange(n), nodes.size
    for matrix in (layer.transmitted, layer.reflected):
        same = matrix.reshape(n, a, n, m)[each, :m, each, :]
        there = same * nodes[None, :, None] / weights
        largest = np.abs(there).max(axis=(1, 2), keepdims=True)
        assert (np.abs(there - there.transpose(0, 2, 1)) < 2e-3 * largest + 1e-30).all()


def test_photons_never_gain_energy() -> None:
    """Limit: above the diagonal there is nothing, so that blocks can be left out."""
    for name in CASES:
        layer = layer_of(name, CASES[name])
        n, a, m = layer.grid.energy_kev.size, layer.grid.cosines.size, layer.grid.gauss[0].size
        for matrix in (layer.transmitted, layer.reflected):
            by_energy = np.abs(matrix.reshape(n, a, n, m)).sum(axis=(1, 3))
            assert (np.tril(by_energy, -1) == 0.0).all()
