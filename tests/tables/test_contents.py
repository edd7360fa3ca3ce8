"""What the tables hold: sums, order, ranges, names. Kinds: limit; published values beside the tests."""

from __future__ import annotations

import numpy as np
import pytest

from scatterbay.errors import OutOfRangeError, UsageError
from scatterbay.physics.medium import medium
from scatterbay.tables import attenuation, conversion, elements, materials, nuclides, scattering, shells
from scatterbay.tables.allowances import allowances
from scatterbay.tables.files import read_table
from scatterbay.tables.fits import fits
from scatterbay.tables.materials import Material, material

MATERIALS = read_table("materials.csv", ("name", "also", "density", "composition", "source"))
FORMULAS = {"water": "H2O1", "PMMA": "C5H8O2", "polyethylene": "C1H2", "gypsum board": "Ca1S1O6H4"}
DENSITIES = {
    "water": 1.0, "lead": 11.35, "tungsten": 19.3, "iron": 7.874, "copper": 8.96, "aluminium": 2.699, "tin": 7.31,
    "air": 1.205e-3,
}  # fmt: skip
"""Published: NIST (NISTIR 5632), table 1 and 2 [g/cm3] (recalled), to their digits."""

MOLYBDENUM = 42
"""Its K edge, 19.9995 keV, rounds to the row of 20 keV: three rows at one energy."""


def parts(composition: str) -> dict[str, float]:
    return {symbol: float(share) for symbol, share in (part.split(":") for part in composition.split())}


@pytest.mark.parametrize(
    ("name", "composition"), list(zip(MATERIALS.texts("name"), MATERIALS.texts("composition"), strict=True))
)
def test_fractions_sum_to_one(name: str, composition: str) -> None:
    """As written in the table, to their rounding; as used, exactly."""
    written = parts(composition)
    assert sum(written.values()) == pytest.approx(1.0, abs=1e-4)
    used = material(name).fractions
    assert sum(share for _, share in used) == pytest.approx(1.0, abs=1e-12)
    assert [z for z, _ in used] == sorted(elements.atomic_number(symbol) for symbol in written)


@pytest.mark.parametrize("name", sorted(FORMULAS))
def test_formulas_give_the_fractions(name: str) -> None:
    """Closed form: mass fractions from the formula and the atomic weights, 2e-4."""
    text, counts = FORMULAS[name], dict[int, int]()
    symbol = ""
    for character in text:
        if character.isdigit():
            counts[elements.atomic_number(symbol)] = int(character)
            symbol = ""
        else:
            symbol += character
    whole = sum(n * elements.atomic_weight(z) for z, n in counts.items())
    for z, share in material(name).fractions:
        assert share == pytest.approx(counts[z] * elements.atomic_weight(z) / whole, abs=2e-4)


@pytest.mark.parametrize("name", sorted(DENSITIES))
def test_densities(name: str) -> None:
    assert material(name).density_g_cm3 == pytest.approx(DENSITIES[name], rel=1e-3)


def test_other_names_lead_to_one_material_each() -> None:
    shipped, others = set(materials.names()), materials.other_names()
    assert len(shipped) == len(materials.names())
    assert not shipped & set(others)
    assert set(others.values()) <= shipped
    assert len(others) == sum(len(text.split(";")) for text in MATERIALS.texts("also") if text)
    assert material("aluminum") is material("aluminium")


def test_a_scenarios_own_material_comes_first() -> None:
    own = Material.from_symbols("lead", 5.0, {"Pb": 3.0, "Sn": 1.0, "H": 0.0}, "test")
    assert material("lead", [own]) is own
    assert own.fractions == ((50, 0.25), (82, 0.75))
    with pytest.raises(UsageError, match="'led' is not a known material"):
        material("led", [own])


@pytest.mark.parametrize("z", range(1, 93))
def test_attenuation_rows(z: int) -> None:
    """Rising energies from 10 keV to 3 MeV, twins only at edges (a step up), absorption below attenuation."""
    rows = attenuation.element(z)
    steps = np.diff(rows.energy_kev)
    assert (rows.energy_kev[0], rows.energy_kev[-1]) == (attenuation.LOWEST_KEV, attenuation.HIGHEST_KEV)
    assert (steps >= 0.0).all()
    twin = np.flatnonzero(steps == 0.0)
    rises = rows.attenuation[twin + 1] > rows.attenuation[twin]
    assert (~rises).sum() == (z == MOLYBDENUM)
    assert (rows.absorption < rows.attenuation).all()
    assert (rows.absorption > 0.0).all()
    energies, pair = attenuation.pair(z)
    assert (np.diff(energies) > 0.0).all()
    assert (np.diff(pair) > 0.0).all()


def test_three_rows_at_one_energy() -> None:
    """Limit: molybdenum steps up once at its K edge, and both rows above it are read."""
    found = medium(((MOLYBDENUM, 1.0),)).attenuation(np.array([19.99, 20.01]))
    assert found.tolist() == pytest.approx([13.08, 80.54], rel=3e-3)
    assert medium(((MOLYBDENUM, 1.0),)).k_edges_kev == {MOLYBDENUM: 20.0}


def test_published_rows() -> None:
    """Published: NIST (NISTIR 5632), table 3, mu/rho and mu_en/rho [cm2/g] (recalled)."""
    lead, iron = attenuation.element(82), attenuation.element(26)
    for rows, energy, total, absorbed in ((lead, 100.0, 5.549, 1.976), (lead, 1000.0, 0.07102, 0.03654),
                                          (iron, 100.0, 0.3717, 0.2177), (iron, 1000.0, 0.05995, 0.02603)):  # fmt: skip
        row = int(np.flatnonzero(rows.energy_kev == energy)[0])
        assert rows.attenuation[row] == pytest.approx(total, rel=1e-3)
        assert rows.absorption[row] == pytest.approx(absorbed, rel=2e-3)


@pytest.mark.parametrize("z", [1, 6, 26, 56, 74, 82, 92])
def test_scattering_functions(z: int) -> None:
    """S rises to Z, F falls from Z; at the same x, S is at most Z and F squared at most Z squared."""
    s, f = scattering.incoherent_function(z), scattering.form_factor(z)
    assert (np.diff(scattering.momentum_nodes()) > 0.0).all()
    assert (np.diff(s) >= 0.0).all()
    assert (np.diff(f) <= 0.0).all()
    assert s[-1] == pytest.approx(z, rel=1e-3)
    assert f[0] == pytest.approx(z, rel=1e-3)


@pytest.mark.parametrize("z", range(40, 93))
def test_k_shells(z: int) -> None:
    """Shares sum to 1; lines lie in their order below the K edge; the yield rises to 0.97."""
    shell = shells.k_shell(z)
    assert shell is not None
    assert sum(shell.shares) == pytest.approx(1.0, abs=2e-4)
    assert list(shell.energies_kev) == sorted(shell.energies_kev)
    rows = attenuation.element(z).energy_kev
    edge = rows[1:][np.diff(rows) == 0.0].max()
    assert shell.energies_kev[-1] < edge * (1 + 1e-3)
    assert 0.7 < shell.fluorescence_yield < 0.98
    before = shells.k_shell(z - 1)
    assert before is None or shell.fluorescence_yield >= before.fluorescence_yield


def test_no_k_shells_of_light_elements() -> None:
    assert shells.k_shell(39) is None


@pytest.mark.parametrize("name", nuclides.names())
def test_nuclides(name: str) -> None:
    found = nuclides.nuclide(name)
    assert found.half_life > 3600.0
    assert found.evaluation
    assert found.lines_kev.min() >= 20.0
    assert (found.per_decay >= 0.0).all()
    assert 0.0 < found.per_decay.sum() < 5.0
    assert nuclides.highest_line_kev(name) <= found.lines_kev.max()


def test_dose_conversion_covers_its_range() -> None:
    energy, ratio = conversion.ambient_per_kerma()
    assert (energy[0], energy[-1]) == (attenuation.LOWEST_KEV, attenuation.HIGHEST_KEV)
    assert (np.diff(energy) > 0.0).all()
    assert (ratio > 0.0).all()


def test_allowances_have_reasons() -> None:
    found = allowances()
    assert {path for path, _ in found} >= {"primary", "scatter", "leakage"}
    assert all(0.0 < entry.low < 1.0 and entry.high > 0.0 and entry.reason for entry in found.values())


def test_fits_start_at_one_and_fall() -> None:
    for fit in fits():
        assert fit.transmission(0.0) == pytest.approx(1.0, rel=1e-12)
        values = [fit.transmission(t) for t in (0.001, 0.002, 0.004)]
        assert values == sorted(values, reverse=True)
        assert (fit.voltage > 0.0) != (fit.energy_kev > 0.0)
        assert fit.material in materials.names()
        assert fit.source


def test_unknown_names_are_refused() -> None:
    with pytest.raises(OutOfRangeError, match="'Xx' is not the symbol"):
        elements.atomic_number("Xx")
    with pytest.raises(UsageError, match=r"'Ir192' is not in the table"):
        nuclides.nuclide("Ir192")
