"""Slab method on a made-up medium that scatters evenly and keeps the energy. Kind: published theory, independent route.

One albedo per energy of the grid, so that a single layer answers many. Half space: plane albedo 1 - H(mu) sqrt(1 - w)
with Chandrasekhar's H function (Radiative Transfer, 1950, chapter V). Finite layers: the integral equation of the
collision density with exponential integrals, solved on cells.
"""

from __future__ import annotations

import functools

import numpy as np
import pytest
from numpy.typing import NDArray
from scipy.special import expn

from scatterbay.physics.slab import layer as thin_start
from scatterbay.physics.slab.grid import Grid, grid_for
from scatterbay.physics.slab.kernel import Kernel
from scatterbay.physics.slab.layer import Layer, build_layer

Array = NDArray[np.float64]

ALBEDOS = (1.0, 0.99, 0.9, 0.5, 0.1, 0.0)


@functools.cache
def even_medium() -> tuple[Grid, Kernel, Array]:
    """Attenuation 1 cm2/g at all energies; the albedos repeat along the grid."""
    grid = grid_for(())
    n, a, (nodes, weights) = grid.energy_kev.size, grid.cosines.size, grid.gauss
    albedo = np.resize(np.array(ALBEDOS), n)
    spread = np.zeros((n, a, n, nodes.size))
    each = np.arange(n)
    spread[each, :, each, :] = 0.5 * albedo[:, None, None] * weights
    return grid, Kernel(spread, spread.copy(), np.ones(n), np.zeros(n), albedo), albedo


@functools.cache
def layer(depth: float) -> Layer:
    grid, kernel, _ = even_medium()
    return build_layer(kernel, grid, 1.0, 0.01 * depth)


def totals(depth: float) -> tuple[Array, Array]:
    """Photons reflected and diffusely transmitted per photon in, (albedos, incoming cosines)."""
    grid, made = even_medium()[0], layer(depth)
    shape = (grid.energy_kev.size, grid.cosines.size)
    reflected, transmitted = (
        x.sum(axis=1).reshape(shape)[: len(ALBEDOS)] for x in (made.reflected, made.transmitted)
    )
    return reflected, transmitted


def h_function(albedo: float, cosines: Array) -> Array:
    """Chandrasekhar's H, by iterating 1/H = sqrt(1 - w) + w/2 integral of mu' H / (mu + mu')."""
    nodes, weights = np.polynomial.legendre.leggauss(200)
    nodes, weights = 0.5 * (nodes + 1.0), 0.5 * weights
    h, root = np.ones(nodes.size), np.sqrt(1.0 - albedo)
    for _ in range(2000):
        h = 0.5 * h + 0.5 / (root + 0.5 * albedo * (nodes * h / (nodes[:, None] + nodes)) @ weights)
    return np.asarray(1.0 / (root + 0.5 * albedo * (nodes * h / (cosines[:, None] + nodes)) @ weights))


@pytest.mark.parametrize(("albedo", "tolerance"), [(0.99, 2e-3), (0.9, 3e-4), (0.5, 3e-4), (0.1, 1e-4)])
def test_half_space(albedo: float, tolerance: float) -> None:
    """Published theory, in shares of what came in. At 0.99 photons scatter tens of times; see the loss below."""
    cosines = even_medium()[0].cosines
    reflected, transmitted = totals(120.0)
    row = ALBEDOS.index(albedo)
    exact = 1.0 - h_function(albedo, cosines) * np.sqrt(1.0 - albedo)
    np.testing.assert_allclose(reflected[row], exact, atol=tolerance)
    assert transmitted[row].max() < 1e-5


def by_integral_equation(depth: float, albedo: float, cosine: float, cells: int = 600) -> tuple[float, float]:
    """Reflected and diffusely transmitted share, from the collision density on even cells."""
    step = depth / cells
    apart = np.arange(cells) * step
    third = expn(3, np.arange(cells + 1) * step)
    row = np.empty(cells)
    row[0] = 2.0 * step - 2.0 * (third[0] - third[1])
    row[1:] = third[:-2] - 2.0 * third[1:-1] + third[2:]
    index = np.arange(cells)
    between = row[np.abs(index[:, None] - index)] / step
    first = (np.exp(-apart / cosine) - np.exp(-(apart + step) / cosine)) / step
    density = np.linalg.solve(np.eye(cells) - 0.5 * albedo * between, first)
    out = third[:-1] - third[1:]
    return 0.5 * albedo * float(density @ out), 0.5 * albedo * float(density @ out[::-1])


@pytest.mark.parametrize("depth", [0.2, 1.0, 4.0])
@pytest.mark.parametrize("albedo", ALBEDOS[:5])
def test_finite_layers(depth: float, albedo: float) -> None:
    """Independent route, 1e-3 of what came in, at 0 and 60 degrees."""
    grid = even_medium()[0]
    reflected, transmitted = totals(depth)
    row = ALBEDOS.index(albedo)
    for cosine in (1.0, 0.5):
        column = int(np.argmin(np.abs(grid.cosines - cosine)))
        back, through = by_integral_equation(depth, albedo, float(grid.cosines[column]))
        assert reflected[row, column] == pytest.approx(back, abs=1e-3)
        assert transmitted[row, column] == pytest.approx(through, abs=1e-3)


@pytest.mark.parametrize(("depth", "lost"), [(0.2, 5e-4), (1.0, 5e-4), (4.0, 2e-3)])
def test_nothing_is_lost_without_absorption(depth: float, lost: float) -> None:
    """Limit: albedo 1: every photon leaves. What is lost scattered twice in the thin start, which counts once."""
    reflected, transmitted = totals(depth)
    found = reflected[0] + transmitted[0] + np.exp(-depth / even_medium()[0].cosines)
    assert (found < 1.0 + 1e-4).all()
    assert (found > 1.0 - lost).all()


def test_loss_falls_with_the_thin_start(monkeypatch: pytest.MonkeyPatch) -> None:
    """Limit: first order in the thickness of the start: an eighth of it loses an eighth."""
    grid, kernel, _ = even_medium()
    found = []
    for share in (1.0, 0.125):
        monkeypatch.setattr(thin_start, "THIN", 3e-3 * share)
        made = build_layer(kernel, grid, 1.0, 0.04)
        row = int(np.argmin(np.abs(grid.cosines - 1.0)))
        found.append(1.0 - made.reflected[row].sum() - made.transmitted[row].sum() - made.uncollided[row])
    assert found[1] / found[0] == pytest.approx(0.125, rel=0.1)


@pytest.mark.parametrize("depth", [0.2, 4.0])
def test_pure_absorber(depth: float) -> None:
    """Limit: albedo 0: nothing but exp(-t / cos)."""
    reflected, transmitted = totals(depth)
    assert not reflected[-1].any()
    assert not transmitted[-1].any()
    grid = even_medium()[0]
    passed = layer(depth).uncollided.reshape(grid.energy_kev.size, -1)
    np.testing.assert_allclose(passed, np.tile(np.exp(-depth / grid.cosines), (len(passed), 1)), rtol=1e-9)


def test_thin_layer_in_closed_form() -> None:
    """Limit: to first order, half of what collides goes each way: w t / (2 cos)."""
    depth = 1e-6
    grid = even_medium()[0]
    reflected, transmitted = totals(depth)
    exact = 0.5 * np.array(ALBEDOS)[:, None] * depth / grid.cosines
    np.testing.assert_allclose(reflected, exact, rtol=1e-4, atol=1e-30)
    np.testing.assert_allclose(transmitted, exact, rtol=1e-4, atol=1e-30)
