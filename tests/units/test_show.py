"""Base values as people read them."""

from __future__ import annotations

import math

import pytest

from scatterbay.units import choose_unit, factor_of, format_quantity, significant


@pytest.mark.parametrize(
    ("value", "kind", "text"),
    [
        (2.3e-9, "ambient dose equivalent rate", "8.3 uSv/h"),
        (999.7e-9 / 3600, "ambient dose equivalent rate", "1.0 uSv/h"),
        (4e-13 / 3600, "ambient dose equivalent rate", "0.00040 nSv/h"),
        (12.34 / 3600, "air kerma rate", "12 Gy/h"),
        (6e-3, "ambient dose equivalent per year", "6.0 mSv/year"),
        (0.3, "length", "300 mm"),
        (-0.3, "length", "-300 mm"),
        (0.0, "length", "0 mm"),
        (0.0, "ambient dose equivalent rate", "0 uSv/h"),
        (3.7e12, "activity", "3.7 TBq"),
        (5400.0, "time", "1.5 h"),
        (2350.0, "density", "2.4 g/cm3"),
        (math.pi / 2, "angle", "90 deg"),
        (0.25, "number", "0.25"),
        (1250.0, "energy", "1.2 MeV"),
        (9.8 / 60, "tube output", "9.8 mGy m2/(mA min)"),
    ],
)
def test_formats(value: float, kind: str, text: str) -> None:
    assert format_quantity(value, kind) == text


@pytest.mark.parametrize(
    ("value", "digits", "text"),
    [
        (8.349, 2, "8.3"),
        (0.0123, 2, "0.012"),
        (123.4, 2, "120"),
        (99.96, 3, "100"),
        (123456.0, 3, "123000"),
        (1.5e-7, 2, "1.5e-07"),
        (2.5e9, 2, "2.5e+09"),
        (0.0, 2, "0"),
    ],
)
def test_significant_digits(value: float, digits: int, text: str) -> None:
    assert significant(value, digits) == text


@pytest.mark.parametrize("value", [math.nan, math.inf, -math.inf])
def test_what_is_not_finite_is_never_printed(value: float) -> None:
    with pytest.raises(ValueError, match="cannot be printed"):
        format_quantity(value, "length")


def test_a_column_shares_the_unit_of_its_largest_value() -> None:
    unit = choose_unit(8.3e-6 / 3600, "ambient dose equivalent rate")
    assert unit == "uSv/h"
    assert 4.2e-7 / 3600 / factor_of(unit) == pytest.approx(0.42)
