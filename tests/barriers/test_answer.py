"""Answers of walls between their nodes. Kinds: independent route (finer grids), limit, closed form."""

from __future__ import annotations

import functools

import numpy as np
import pytest
from numpy.typing import NDArray

from scatterbay.barriers.answer import Answer, build_answer
from scatterbay.barriers.makeup import Sheets, sheet
from scatterbay.errors import OutOfRangeError
from scatterbay.physics import dose
from scatterbay.physics.medium import medium
from scatterbay.physics.slab import grid as slab_grid
from scatterbay.physics.slab.grid import Grid
from scatterbay.physics.slab.kernel import build_kernel
from scatterbay.physics.slab.layer import build_layer
from scatterbay.physics.slab.wall import wall_answer
from scatterbay.physics.tube import tube_spectrum
from scatterbay.tables.materials import material

Array = NDArray[np.float64]

WALLS = {"concrete": 0.15, "lead": 0.002, "steel": 0.03}
BETWEEN = (0.3, 0.43, 0.55, 0.66, 0.77, 0.866, 0.9, 0.985)
"""Cosines between the nodes."""


@functools.cache
def found(name: str) -> Answer:
    return build_answer((sheet(name, WALLS[name]),))


def directly(name: str, grid: Grid) -> Array:
    """Dose behind per fluence in front on some grid, (q, n, a)."""
    stuff = material(name)
    layer = build_layer(build_kernel(medium(stuff.fractions), grid), grid, stuff.density_g_cm3, WALLS[name])
    wall = wall_answer([layer])
    bare = wall.uncollided[:, :, None] * dose.per_fluence(grid.energy_kev).T[:, None, :]
    return np.asarray(wall.diffuse.sum(axis=-1) + bare).transpose(2, 0, 1)


@pytest.mark.parametrize("name", sorted(WALLS))
def test_between_directions(name: str, monkeypatch: pytest.MonkeyPatch) -> None:
    """Independent route: the same transport with more directions that carry answers; 2.5 %, 0.6 % on the average."""
    grid = Grid(tuple(sorted(medium(material(name).fractions).k_edges_kev)))
    usual = len(slab_grid.EXTRA_COSINES)
    monkeypatch.setattr(slab_grid, "EXTRA_COSINES", (*slab_grid.EXTRA_COSINES, *BETWEEN))
    exact = directly(name, grid)[:, :, slab_grid.GAUSS_ANGLES + usual :]
    energy = grid.energy_kev[grid.energy_kev > 30.0]
    off = np.exp(found(name).log_dose(energy, np.array(BETWEEN))) / exact[:, : energy.size] - 1.0
    counts = exact[0, : energy.size] / dose.air_kerma_per_fluence(energy)[:, None] > 1e-8
    assert np.abs(off[:, counts]).max() < 0.025
    assert np.sqrt((off[:, counts] ** 2).mean()) < 0.006


@pytest.mark.parametrize("name", ["concrete", "lead"])
def test_between_energies(name: str, monkeypatch: pytest.MonkeyPatch) -> None:
    """Independent route: a grid of twice as many energies: 2.5 % at every energy, 0.6 % for the beam of a tube."""
    finer = tuple((low, high, 2 * count) for low, high, count in slab_grid._DENSITY)
    monkeypatch.setattr(slab_grid, "_DENSITY", finer)
    monkeypatch.setattr(slab_grid, "_CLOSEST", 0.5 * slab_grid._CLOSEST)
    grid = Grid(tuple(sorted(medium(material(name).fractions).k_edges_kev)))
    normal = int(np.argmin(np.abs(grid.cosines - 1.0)))
    exact, energy = directly(name, grid)[0, :, normal], grid.energy_kev
    assert energy.size > 1.8 * found(name).energy_kev.size
    kerma = dose.air_kerma_per_fluence(energy)
    counts = exact / kerma > 1e-4
    close = np.exp(found(name).log_dose(energy[counts], np.array([1.0]))[0, :, 0])
    np.testing.assert_allclose(close, exact[counts], rtol=0.025)
    beam = tube_spectrum(150.0, ((material("aluminium"), 3e-3),))
    ours = np.exp(found(name).log_dose(beam.energy_kev, np.array([1.0]))[0, :, 0]) @ beam.photons
    theirs = Answer.log_dose(_answer_on(name, grid), beam.energy_kev, np.array([1.0]))[0, :, 0]
    assert ours == pytest.approx(np.exp(theirs) @ beam.photons, rel=0.006)


def _answer_on(name: str, grid: Grid) -> Answer:
    """An answer as the program keeps it, on another grid."""
    stuff = material(name)
    kernel = build_kernel(medium(stuff.fractions), grid)
    wall = wall_answer([build_layer(kernel, grid, stuff.density_g_cm3, WALLS[name])])
    order = np.argsort(grid.cosines)
    sheets: Sheets = (sheet(name, WALLS[name]),)
    return Answer(sheets, grid.energy_kev[::-1].copy(), grid.cosines[order], *grid.gauss,
                  wall.diffuse[::-1][:, order].copy(), kernel.straight[::-1][None, :])  # fmt: skip


@pytest.mark.parametrize("name", sorted(WALLS))
def test_nodes_are_repeated(name: str) -> None:
    """Limit: at its own nodes an answer is what transport gave."""
    grid = Grid(tuple(sorted(medium(material(name).fractions).k_edges_kev)))
    exact = directly(name, grid)
    energy, cosines = grid.energy_kev, grid.cosines
    order = np.argsort(cosines)
    got = np.exp(found(name).log_dose(energy, cosines[order]))
    counts = exact[0][:, order] / dose.air_kerma_per_fluence(energy)[:, None] > 1e-12
    np.testing.assert_allclose(got[:, counts], exact[:, :, order][:, counts], rtol=2e-3)


@pytest.mark.parametrize("name", sorted(WALLS))
def test_uncollided_beam(name: str) -> None:
    """Closed form: depth mu t, less the coherent scattering that is counted as going straight on."""
    stuff, energy = material(name), np.array([30.0, 60.0, 150.0, 662.0, 1250.0])
    parts = medium(stuff.fractions).partials(energy)
    depth = found(name).optical_depth(energy) / (100.0 * stuff.density_g_cm3 * WALLS[name])
    assert (depth <= parts.total * (1 + 1e-4)).all()
    assert (depth >= (parts.total - parts.coherent) * (1 - 1e-4)).all()
    assert depth[-1] == pytest.approx(parts.total[-1], rel=3e-2)


@pytest.mark.parametrize("name", sorted(WALLS))
def test_light_of_the_far_face_sums_to_the_scattered_dose(name: str) -> None:
    """Limit: the emergent dose, summed over the outgoing nodes, is the scattered part of the whole."""
    answer = found(name)
    energy, cosines = np.array([60.0, 100.0, 300.0]), np.array([0.6, 1.0])
    spread = answer.emergent(energy, cosines, answer.outgoing) @ answer.outgoing_weights
    bare = np.exp(-answer.optical_depth(energy)[:, None] / cosines) * dose.per_fluence(energy)[:, :, None]
    whole = np.exp(answer.log_dose(energy, cosines))
    np.testing.assert_allclose(spread + bare, whole, rtol=0.02)


def test_bytes_and_back() -> None:
    """Limit: what is kept is read again to the last bit."""
    answer = found("steel")
    again = Answer.from_bytes(answer.to_bytes(), answer.sheets)
    np.testing.assert_array_equal(again.diffuse, answer.diffuse)
    np.testing.assert_array_equal(again.straight, answer.straight)
    assert again.to_bytes() == answer.to_bytes()


@pytest.mark.parametrize("energy", [9.9, 1400.5])
def test_outside_the_grid_is_refused(energy: float) -> None:
    for ask in (found("lead").optical_depth, lambda e: found("lead").log_dose(e, np.array([1.0]))):
        with pytest.raises(OutOfRangeError, match="10 to 1400 keV"):
            ask(np.array([100.0, energy]))


def test_no_interpolation_across_the_edge() -> None:
    """Limit: just below and just above 88 keV the answers belong to their own side."""
    low, high = np.exp(found("lead").log_dose(np.array([87.9, 88.1]), np.array([1.0]))[0, :, 0])
    below, above = np.exp(found("lead").log_dose(np.array([87.0, 89.0]), np.array([1.0]))[0, :, 0])
    assert low / high > 2.0
    assert low == pytest.approx(below, rel=0.2)
    assert high == pytest.approx(above, rel=0.2)


@pytest.mark.parametrize(
    "layers",
    [
        (("lead", 0.06),),
        (("steel", 0.01), ("lead", 0.08), ("steel", 0.01)),
        (("concrete", 2.0),),
        (("earth", 3.0),),
        (("tungsten", 0.05),),
    ],
)
def test_a_thick_wall_lets_less_through_at_a_slant(layers: tuple[tuple[str, float], ...]) -> None:
    """Limit: down to 88 degrees no direction beats square on, also where what passes is too little to be told."""
    found = build_answer(tuple(sheet(name, thickness) for name, thickness in layers))
    cosines = np.exp(np.linspace(0.0, np.log(found.cosines[0]), 60))
    energy = np.geomspace(12.0, 1390.0, 80)
    log = found.log_dose(energy, cosines)
    assert (log <= np.maximum(log[:, :, :1] + 1e-6, np.log(1e-65))).all()
    emergent = found.emergent(energy, cosines, np.array([0.2, 0.6, 0.95]))
    assert (emergent.sum(axis=-1) <= 1.05 * emergent.sum(axis=-1)[:, :, :1] + 1e-65).all()
