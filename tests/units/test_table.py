"""The table of units against another library, and the distinctions that library does not make."""

from __future__ import annotations

import math
from typing import Any

import pint
import pytest

from scatterbay.units import KINDS, WEEK_SECONDS, YEAR_WEEKS, factor_of
from scatterbay.units.expression import parse_unit
from scatterbay.units.table import BASES, REFUSED, UNITS, dims

REGISTRY: Any = pint.UnitRegistry()

# Base units in SI, as pint sees them. Week and year stand for themselves here.
SI = {
    "m": "m",
    "s": "s",
    "keV": "keV",
    "kV": "kV",
    "A": "A",
    "Bq": "Bq",
    "Gy": "Gy",
    "Sv": "Sv",
    "rad": "radian",
    "kg": "kg",
    "week": "week",
    "year": "year",
}
# Spellings that pint lacks, in words it knows.
IN_PINT = {"As": "A*s", "mAs": "mA*s", "Amin": "A*min", "mAmin": "mA*min", "°": "degree", "%": "percent"}


def _expected(what: tuple[int, ...]) -> Any:
    unit = REGISTRY.Quantity(1.0)
    for base, power in zip(BASES, what, strict=True):
        unit = unit * REGISTRY.Quantity(1.0, SI[base]) ** power
    return unit


@pytest.mark.parametrize("symbol", sorted(UNITS))
def test_every_unit_has_the_size_pint_gives_it(symbol: str) -> None:
    """Independent route: the size of each unit in our base units, against pint."""
    theirs = REGISTRY.Quantity(1.0, IN_PINT.get(symbol, symbol))
    ours = UNITS[symbol].factor * _expected(UNITS[symbol].dims)
    assert (theirs / ours).to_base_units().magnitude == pytest.approx(1.0, rel=1e-12)


@pytest.mark.parametrize("kind", sorted(KINDS))
def test_every_kind_is_printed_and_shown_in_units_of_its_own_kind(kind: str) -> None:
    assert parse_unit(KINDS[kind].base).dims == KINDS[kind].dims if kind != "number" else True
    assert factor_of(KINDS[kind].base) == pytest.approx(1.0) if kind != "number" else True
    for unit in KINDS[kind].shown:
        assert not unit or parse_unit(unit).dims == KINDS[kind].dims
    sizes = [factor_of(unit) for unit in KINDS[kind].shown]
    assert sizes == sorted(sizes)


def test_no_two_kinds_look_alike() -> None:
    assert len({kind.dims for kind in KINDS.values()}) == len(KINDS)


@pytest.mark.parametrize(
    ("one", "other"), [("Gy", "Sv"), ("keV", "kV"), ("week", "d"), ("year", "week"), ("deg", "%")]
)
def test_what_other_systems_confuse_stays_apart(one: str, other: str) -> None:
    assert UNITS[one].dims != UNITS[other].dims


def test_activity_is_not_a_frequency() -> None:
    assert UNITS["Bq"].dims != dims(s=-1)


def test_a_charge_is_a_current_for_a_time() -> None:
    assert parse_unit("mA s") == parse_unit("mAs")
    assert UNITS["C"].dims == parse_unit("A s").dims


def test_no_refused_unit_is_in_the_table() -> None:
    assert not set(REFUSED) & set(UNITS)


def test_week_and_year_in_seconds() -> None:
    assert REGISTRY.Quantity(1.0, "week").to("s").magnitude == pytest.approx(WEEK_SECONDS)
    assert REGISTRY.Quantity(1.0, "year").to("week").magnitude == pytest.approx(YEAR_WEEKS, rel=1e-4)


@pytest.mark.parametrize(
    ("text", "factor"),
    [
        ("mGy m2/(mA min)", 1e-3 / (1e-3 * 60)),
        ("mGy.m2/(mA.min)", 1e-3 / (1e-3 * 60)),
        ("mGy·m²/(mA·min)", 1e-3 / (1e-3 * 60)),
        ("mGy m^2/mA/min", 1e-3 / (1e-3 * 60)),
        ("mGy m2 mA^-1 min^-1", 1e-3 / (1e-3 * 60)),
        ("uSv/h", 1e-6 / 3600),
        ("µSv/h", 1e-6 / 3600),
        ("μSv per h", 1e-6 / 3600),
        ("mrem/h", 1e-5 / 3600),
        ("g/cm3", 1e-3 / 1e-6),
        ("deg", math.pi / 180),
        ("Sv/(h)", 1 / 3600),
    ],
)
def test_compound_units(text: str, factor: float) -> None:
    assert parse_unit(text).factor == pytest.approx(factor, rel=1e-12)
