"""Quantities as people write them, and what is refused."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from scatterbay.errors import ScatterbayError
from scatterbay.units import KINDS, Quantity, TextError, format_quantity, read, read_number


@pytest.mark.parametrize(
    ("text", "kind", "value", "tolerance"),
    [
        ("300 mm", "length", 0.3, 0.0),
        ("300mm", "length", 0.3, 0.0),
        ("  30 cm ", "length", 0.3, 0.0),
        (".5 m", "length", 0.5, 0.0),
        ("-1.5 m", "length", -1.5, 0.0),
        ("−1.5 m", "length", -1.5, 0.0),
        ("1e3 mm", "length", 1.0, 0.0),
        ("12 ft", "length", 3.6576, 0.0),
        ("5 ft 6 in", "length", 1.6764, 0.0),
        ("5/8 in", "length", 0.015875, 0.0),
        ("1 1/2 inches", "length", 0.0381, 0.0),
        ("8 ft 6 1/2 in", "length", 8.5 * 0.3048 + 0.5 * 0.0254, 0.0),
        ("300 mm +/- 10 mm", "length", 0.3, 0.01),
        ("300 mm ± 1 cm", "length", 0.3, 0.01),
        ("300 +/- 10 mm", "length", 0.3, 0.01),
        ("300 mm +- 8 %", "length", 0.3, 0.024),
        ("1 h 30 min", "time", 5400.0, 0.0),
        ("225 kV", "voltage", 225.0, 0.0),
        ("1.25 MeV", "energy", 1250.0, 0.0),
        ("4 mA", "current", 0.004, 0.0),
        ("100 Ci", "activity", 3.7e12, 0.0),
        ("3.7 TBq", "activity", 3.7e12, 0.0),
        ("400 mA min", "charge", 24.0, 0.0),
        ("20 mAs", "charge", 0.02, 0.0),
        ("2 mrem/h", "ambient dose equivalent rate", 2e-5 / 3600, 0.0),
        ("7.5 µSv/h", "ambient dose equivalent rate", 7.5e-6 / 3600, 0.0),
        ("7.5 μSv/h", "ambient dose equivalent rate", 7.5e-6 / 3600, 0.0),
        ("6 mSv/year", "ambient dose equivalent per year", 6e-3, 0.0),
        ("0.1 mGy/week", "air kerma per week", 1e-4, 0.0),
        ("6 h/week", "time per week", 21600.0, 0.0),
        ("6 hours per week", "time per week", 21600.0, 0.0),
        ("40 deg", "angle", math.radians(40), 0.0),
        ("40°", "angle", math.radians(40), 0.0),
        ("25 %", "number", 0.25, 0.0),
        ("2.35 g/cm3", "density", 2350.0, 0.0),
        ("147 lb/ft3", "density", 2354.7, 0.0),
        ("9.8 mGy m2/(mA min) +/- 8 %", "tube output", 9.8 / 60, 9.8 / 60 * 0.08),
    ],
)
def test_reads(text: str, kind: str, value: float, tolerance: float) -> None:
    found = read(text, kind)
    assert found.value == pytest.approx(value, rel=1e-5)
    assert found.tolerance == pytest.approx(tolerance, rel=1e-5)
    assert (found.kind, found.text) == (kind, text.strip())


def test_one_of_several_kinds_is_recognised() -> None:
    kinds = ("time per week", "charge per week")
    assert read("400 mA min/week", *kinds) == Quantity(24.0, 0.0, "charge per week", "400 mA min/week")
    assert read("6 h/week", *kinds).kind == "time per week"


@pytest.mark.parametrize(
    ("text", "kind", "fragments", "start"),
    [
        ("300", "length", ["'300' has no unit", "'300 mm'"], 0),
        ("225", "voltage", ["no unit", "'225 kV'"], 0),
        ("1,5 m", "length", ["comma", "decimal point"], 1),
        ("1,500 mm", "length", ["comma"], 1),
        ("1 000 mm", "length", ["two numbers in a row"], 0),
        ("6 mSv/y", "ambient dose equivalent per year", ["'y' is not used", "write year"], 6),
        ("6 mSv/wk", "ambient dose equivalent per week", ["write week"], 6),
        ("6 mSv/month", "ambient dose equivalent per week", ["write week or year"], 6),
        ("5 msv/h", "ambient dose equivalent rate", ["'msv'", "did you mean 'mSv'"], 2),
        ("5 MSV/h", "ambient dose equivalent rate", ["'MSV'", "did you mean 'mSv'"], 2),
        ("225 KV", "voltage", ["'KV'", "did you mean 'kV'"], 4),
        ("225 kVp", "voltage", ["'kVp'", "kV", "constant potential"], 4),
        ("225 keV", "voltage", ["an energy", "a voltage", "one photon"], 0),
        ("3 furlong", "length", ["'furlong' is not a known unit", "mm"], 2),
        ("5 R/h", "air kerma rate", ["roentgen", "Gy"], 2),
        ("5 mR/h", "ambient dose equivalent rate", ["roentgen", "Gy"], 2),
        ("5 rad", "air kerma", ["ambiguous", "Gy or Sv"], 0),
        ("5 rad/h", "air kerma rate", ["ambiguous"], 0),
        ("5 mrad/h", "air kerma rate", ["ambiguous"], 2),
        ("5 mGy/h", "ambient dose equivalent rate", ["Gy is air kerma and Sv is dose equivalent"], 0),
        ("5 mSv/h", "air kerma rate", ["Sv is dose equivalent and Gy is air kerma"], 0),
        ("6 mSv/year", "ambient dose equivalent rate", ["per year", "not a rate"], 0),
        ("6 h", "time per week", ["a time", "per week"], 0),
        ("50 %", "length", ["a plain number", "a length"], 0),
        ("5 m2", "length", ["nothing that is needed here"], 0),
        ("mm", "length", ["does not start with a number"], 0),
        ("", "length", ["does not start with a number"], 0),
        ("about 3 m", "length", ["does not start with a number"], 0),
        ("3 mm 4 mm", "length", ["more than one quantity"], 0),
        ("6 in 5 ft", "length", ["more than one quantity"], 0),
        ("5 ft -6 in", "length", ["more than one quantity"], 0),
        ("5 mGy m2/mA min", "tube output", ["two ways", "parentheses"], 12),
        ("5 mGy m2/(mA min", "tube output", ["not closed"], 16),
        ("5 mGy)", "air kerma", ["never opened"], 5),
        ("5 /h", "time", ["a unit is missing"], 2),
        ("5 mGy/", "air kerma", ["a unit is missing"], 6),
        ("5 $", "length", ["'$' cannot stand in a unit"], 2),
        ('5"', "length", ["cannot stand in a unit"], 1),
        ("1e999 m", "length", ["not a finite number"], 0),
        ("5 mm^-500", "length", ["cannot stand in a unit"], 4),
        ("5 m PBq9 PBq9 PBq9/(PBq9 PBq9 PBq9)", "length", ["not a finite quantity"], 0),
        ("٣ m", "length", ["does not start with a number"], 0),
        ("1/0 in", "length", ["divides by zero"], 0),
        ("3 mm +/- 1", "length", ["tolerance has no unit", "'3 mm +/- 1'"], 8),
        ("3 mm +/- 1 s", "length", ["tolerance is not a length"], 8),
        ("3 mm +/- -1 mm", "length", ["cannot be negative"], 8),
        ("3 mm +/- some", "length", ["tolerance cannot be read"], 8),
        ("3 mm +/- 1 mm +/- 2 mm", "length", ["two tolerances"], 14),
        ("3 mm +/- 1 msv", "length", ["did you mean 'mSv'"], 11),
    ],
)
def test_refuses(text: str, kind: str, fragments: list[str], start: int) -> None:
    with pytest.raises(TextError) as caught:
        read(text, kind)
    for fragment in fragments:
        assert fragment in str(caught.value)
    assert caught.value.start == start
    assert isinstance(caught.value, ScatterbayError)
    assert caught.value.exit_code == 2


@pytest.mark.parametrize(
    ("text", "value"),
    [("0.25", 0.25), ("1/4", 0.25), ("25 %", 0.25), ("1 1/2", 1.5), (" 48 ", 48.0), ("-1", -1.0)],
)
def test_plain_numbers(text: str, value: float) -> None:
    assert read_number(text) == pytest.approx(value)


@pytest.mark.parametrize("text", ["", "often", "1 m", "1/0", "1e999", "1,5", "1/4/2"])
def test_what_is_no_plain_number(text: str) -> None:
    with pytest.raises(TextError):
        read_number(text)


@given(
    value=st.floats(min_value=1e-12, max_value=1e15),
    kind=st.sampled_from(sorted(set(KINDS) - {"number"})),
    sign=st.sampled_from([1.0, -1.0]),
)
def test_what_is_printed_reads_back(value: float, kind: str, sign: float) -> None:
    """Independent route: printing with all digits and reading give the value back, in every kind."""
    found = read(format_quantity(sign * value, kind, digits=17), kind)
    assert found.value == pytest.approx(sign * value, rel=1e-13)
    assert found.kind == kind


@given(text=st.text(max_size=30))
def test_any_text_is_read_or_refused_in_words(text: str) -> None:
    """No text at all may escape as anything but a quantity or a foreseen failure."""
    try:
        found = read(text, "length")
    except TextError:
        return
    assert math.isfinite(found.value)


_PIECES = [
    "3",
    "4.5",
    "1/2",
    " ",
    "mm",
    "m",
    "ft",
    "in",
    "/",
    "(",
    ")",
    "+/-",
    "%",
    "-",
    "1e5",
    "mGy",
    "h",
    "m2",
    "^",
]


@given(parts=st.lists(st.sampled_from(_PIECES), max_size=9))
def test_any_mix_of_pieces_is_read_or_refused_in_words(parts: list[str]) -> None:
    try:
        found = read("".join(parts), "length", "air kerma rate")
    except TextError as problem:
        start = problem.start
    else:
        start = 0
        assert math.isfinite(found.value)
    assert 0 <= start <= len("".join(parts))
