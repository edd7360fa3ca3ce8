"""Partial cross sections, edges and fluorescence. Kinds: limit, closed form; published K edges and lines (recalled)."""

from __future__ import annotations

import numpy as np
import pytest

from scatterbay.errors import OutOfRangeError
from scatterbay.physics.medium import TWIN, Medium, linear_attenuation, medium, twins
from scatterbay.tables import attenuation
from scatterbay.tables.materials import material, names

K_EDGES = {50: 29.20, 56: 37.44, 74: 69.53, 82: 88.00, 92: 115.6}
"""Published: K edges [keV], rounded to the table's four digits (recalled)."""
K_ALPHA_ONE = {50: 25.27, 56: 32.19, 74: 59.32, 82: 74.97, 92: 98.44}
"""Published: K alpha 1 lines [keV] (Bearden 1967, recalled)."""

ODD_ROWS = ("tungsten", "tungsten alloy", "depleted uranium")


@pytest.mark.parametrize("z", sorted(K_EDGES))
def test_edges_and_lines(z: int) -> None:
    alone = medium(((z, 1.0),))
    assert alone.k_edges_kev[z] == pytest.approx(K_EDGES[z], abs=0.01)
    lines, _ = alone.fluorescence(np.array([150.0]))
    assert np.abs(lines - K_ALPHA_ONE[z]).min() < 0.02
    assert lines.max() < alone.k_edges_kev[z]


@pytest.mark.parametrize("z", [1, 8, 20, 26, 56, 74, 82])
def test_total_repeats_the_table_at_its_rows(z: int) -> None:
    """Limit: at tabulated energies the parts sum to the tabulated total, with one row on each side of an edge."""
    rows = attenuation.element(z)
    energy = rows.energy_kev.copy()
    upper = np.flatnonzero(np.diff(energy) == 0.0) + 1
    energy[upper] *= 1 + 2 * TWIN
    energy[upper - 1] *= 1 - 2 * TWIN
    found = medium(((z, 1.0),)).partials(energy)
    np.testing.assert_allclose(found.total, rows.attenuation, rtol=2e-4)
    assert (
        min(found.photoelectric.min(), found.incoherent.min(), found.coherent.min(), found.pair.min()) >= 0.0
    )


@pytest.mark.parametrize("name", names())
def test_shared_table_repeats_the_partials(name: str) -> None:
    """Limit: what the program reads from its fine table, against the parts themselves at energies off its grid.

    5e-4; 2 % in tungsten and uranium below 25 keV, where the even grid cuts the kinks at the NIST rows between L edges
    that lie off the smooth curve (see the tests against xraylib).
    """
    mixture = medium(material(name).fractions)
    coarse = 0.02 if name in ODD_ROWS else 5e-4
    for low, high, tolerance in ((10.05, 25.0, coarse), (25.0, 2990.0, 5e-4)):
        energy = np.geomspace(low, high, 777)
        apart = [np.abs(np.log(energy / edge)) > 1e-3 for edge in mixture.edges_kev]
        energy = energy[np.all(apart, axis=0)] if apart else energy
        np.testing.assert_allclose(
            mixture.attenuation(energy), mixture.partials(energy).total, rtol=tolerance
        )


@pytest.mark.parametrize("name", ["water", "concrete", "lead glass", "brass"])
def test_mixture_is_the_sum_of_its_elements(name: str) -> None:
    energy = np.geomspace(11.0, 2900.0, 61)
    fractions = material(name).fractions
    parts = np.sum([w * medium(((z, 1.0),)).partials(energy).total for z, w in fractions], axis=0)
    np.testing.assert_allclose(medium(fractions).partials(energy).total, parts, rtol=1e-3)


@pytest.mark.parametrize("z", [56, 74, 82])
def test_fluorescence_starts_at_the_edge(z: int) -> None:
    """Limit: none below the K edge; above it the lines share out the K vacancies, and never carry all their energy."""
    alone = medium(((z, 1.0),))
    edge = alone.k_edges_kev[z]
    energy = np.array([0.5 * edge, edge * (1 - 1e-4), edge * (1 + 1e-4), 2.0 * edge])
    lines, made = alone.fluorescence(energy)
    photo = alone.partials(energy).photoelectric
    assert (made[:, :2] == 0.0).all()
    assert (made[:, 2:] > 0.0).all()
    assert (lines @ made < photo * energy).all()
    assert made[:, 2].sum() / photo[2] == pytest.approx(made[:, 3].sum() / photo[3], rel=1e-3)
    assert 0.6 < made[:, 2].sum() / photo[2] < 0.85


def test_free_electrons_leave_out_the_rest() -> None:
    """Limit: no coherent scattering, no fluorescence, Klein-Nishina on every electron."""
    bound, free = medium(((82, 1.0),)), Medium(((82, 1.0),), free_electrons=True)
    energy = np.array([20.0, 100.0, 1000.0])
    assert (free.partials(energy).coherent == 0.0).all()
    assert free.fluorescence(energy)[0].size == 0
    assert (free.partials(energy).incoherent > bound.partials(energy).incoherent).all()
    np.testing.assert_allclose(free.partials(energy).photoelectric, bound.partials(energy).photoelectric)


def test_linear_attenuation_of_lead() -> None:
    """Published: 0.07102 cm2/g at 1 MeV (NIST) and 11.35 g/cm3: 80.6 per metre."""
    assert linear_attenuation(material("lead"), np.array([1000.0]))[0] == pytest.approx(80.6, rel=1e-3)


def test_outside_the_table_is_refused() -> None:
    for energy in (9.9, 3000.1):
        with pytest.raises(OutOfRangeError, match="10 to 3000 keV"):
            medium(material("water").fractions).attenuation(np.array([100.0, energy]))
    assert medium(material("water").fractions).attenuation(np.array([10.0, 3000.0])).size == 2


def test_twins() -> None:
    low, high = twins(88.0)
    assert low < 88.0 < high
    assert (high - low) / 88.0 == pytest.approx(2 * TWIN)
