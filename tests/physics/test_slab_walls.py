"""Slab method: walls of layers. Kinds: limit, independent route (dense algebra)."""

from __future__ import annotations

import itertools
from collections.abc import Sequence

import numpy as np
import pytest
from numpy.typing import NDArray

from scatterbay.physics import dose
from scatterbay.physics.slab.layer import Layer
from scatterbay.physics.slab.wall import wall_answer
from tests.physics.slabs import dense, layer_of

Array = NDArray[np.float64]


def transmission(layers: Sequence[Layer]) -> Array:
    """Air-kerma transmission by energy and incoming direction, (n, a)."""
    found = wall_answer(layers)
    kerma = dose.air_kerma_per_fluence(found.grid.energy_kev)
    return np.asarray(found.diffuse[:, :, 0].sum(axis=-1) / kerma[:, None] + found.uncollided)


def seen(values: Array, least: float = 1e-12) -> NDArray[np.bool_]:
    """Where a transmission is worth comparing."""
    return values > least


STACK = (("concrete", 0.1), ("lead", 0.001), ("gypsum board", 0.0125))


def test_wall_is_dense_adding() -> None:
    """Independent route: three layers by whole matrices, then dose over cosine; the program carries doses only."""
    beside = tuple(name for name, _ in STACK)
    layers = [layer_of(name, t, beside) for name, t in STACK]
    whole = dense(layers[2]).under(dense(layers[1])).under(dense(layers[0]))
    grid = layers[0].grid
    n, a, (nodes, _) = grid.energy_kev.size, grid.cosines.size, grid.gauss
    behind = dose.per_fluence(grid.energy_kev)
    matrix = whole.transmitted.reshape(n, a, n, nodes.size)
    expected = np.einsum("iajm,qj,m->iaqm", matrix, behind, 1.0 / nodes) * grid.cosines[None, :, None, None]
    found = wall_answer(layers)
    np.testing.assert_allclose(found.diffuse, expected, rtol=1e-7, atol=1e-12 * expected.max())
    np.testing.assert_allclose(found.uncollided.ravel(), whole.uncollided, rtol=1e-12)


@pytest.mark.parametrize(
    ("name", "first", "second"), [("concrete", 0.05, 0.13), ("lead", 0.0007, 0.0013), ("steel", 0.01, 0.01)]
)
def test_a_layer_cut_in_two_is_one_layer(name: str, first: float, second: float) -> None:
    """Limit, 1e-3: each part starts from its own thin layer."""
    cut = transmission([layer_of(name, first), layer_of(name, second)])
    whole = transmission([layer_of(name, first + second)])
    np.testing.assert_allclose(cut[seen(whole)], whole[seen(whole)], rtol=1e-3)


@pytest.mark.parametrize("name", ["concrete", "lead"])
def test_almost_no_thickness(name: str) -> None:
    """Limit: 1 pm changes nothing."""
    layer = layer_of(name, 1e-12)
    assert layer.reflected.sum(axis=1).max() < 1e-4
    np.testing.assert_allclose(transmission([layer]), 1.0, atol=1e-4)
    stack = [layer_of(name, 0.002), layer]
    np.testing.assert_allclose(transmission(stack), transmission(stack[:1]), rtol=1e-3, atol=1e-15)


@pytest.mark.parametrize(
    ("name", "thicknesses"), [("concrete", (0.05, 0.1, 0.2, 0.4)), ("lead", (0.0005, 0.001, 0.002))]
)
def test_thicker_lets_less_through(name: str, thicknesses: tuple[float, ...]) -> None:
    """Limit: falls with thickness at every energy and direction, never below the uncollided beam."""
    found = [transmission([layer_of(name, t)]) for t in thicknesses]
    for thin, thick in itertools.pairwise(found):
        assert (thick < thin)[seen(thin)].all()
    for t, values in zip(thicknesses, found, strict=True):
        bare = layer_of(name, t).uncollided.reshape(values.shape)
        assert (values > bare * (1.0 - 1e-6))[seen(values)].all()


@pytest.mark.parametrize(("name", "thickness"), [("concrete", 0.2), ("lead", 0.002), ("steel", 0.03)])
def test_slanted_rays_get_through_less(name: str, thickness: float) -> None:
    """Limit: falls with the angle to the normal, and less steeply than exp(-mu t / cos) once it is deep."""
    layer = layer_of(name, thickness)
    values, order = transmission([layer]), np.argsort(-layer.grid.cosines)
    falling = values[:, order]
    deep = seen(falling[:, -1], 1e-9) & (layer.grid.energy_kev > 30.0)
    assert (np.diff(falling[deep], axis=1) < 0.0).all()


def test_order_of_layers_matters() -> None:
    """Limit: at 80 keV, concrete before lead lets less through than lead before concrete; the uncollided beam alike.

    Concrete first degrades what the lead then stops; lead first sends out K lines for which concrete is no match.
    """
    beside = ("concrete", "lead")
    concrete, lead = layer_of("concrete", 0.1, beside), layer_of("lead", 0.001, beside)
    first, last = transmission([concrete, lead]), transmission([lead, concrete])
    energy = concrete.grid.energy_kev
    normal = int(np.argmin(np.abs(concrete.grid.cosines - 1.0)))
    row = int(np.argmin(np.abs(energy - 80.0)))
    assert last[row, normal] > 1.5 * first[row, normal]
    np.testing.assert_allclose(
        wall_answer([concrete, lead]).uncollided, wall_answer([lead, concrete]).uncollided, rtol=1e-12
    )


def test_lead_glows_above_its_edge() -> None:
    """Limit: K fluorescence carries most of what passes thick lead just above 88 keV, and next to nothing below."""
    layer = layer_of("lead", 0.002)
    values, energy = transmission([layer]), layer.grid.energy_kev
    normal = int(np.argmin(np.abs(layer.grid.cosines - 1.0)))
    bare = layer.uncollided.reshape(values.shape)[:, normal]
    over = (values[:, normal] / bare)[np.abs(energy - 88.0) < 0.1]
    assert over[0] > 3.0 * over[-1] > 3.0
