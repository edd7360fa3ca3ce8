"""The small languages in the file: make-ups, fields, goals, formulas, figures at a distance, scalars."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from scatterbay.scenario import beam_field, layer, make_up
from scatterbay.scenario.at_distance import leakage_rate, tube_output
from scatterbay.scenario.formulas import mass_fractions
from scatterbay.scenario.goals import goal
from scatterbay.scenario.scalars import plain_scalar
from scatterbay.units import TextError


@pytest.mark.parametrize(
    ("text", "layers"),
    [
        ("concrete 300 mm", [("concrete", 0.3, 0.0)]),
        ("gypsum board 12.5 mm + lead 1.5 mm", [("gypsum board", 0.0125, 0.0), ("lead", 0.0015, 0.0)]),
        ("concrete 300 mm +/- 10 mm + lead 2 mm", [("concrete", 0.3, 0.01), ("lead", 0.002, 0.0)]),
        ("concrete 300 mm +- 10 %+lead 2mm", [("concrete", 0.3, 0.03), ("lead", 0.002, 0.0)]),
        ("barite concrete 1 ft 2 in", [("barite concrete", 0.3556, 0.0)]),
        ("gypsum board 5/8 in + lead 1/16 in", [("gypsum board", 0.015875, 0.0), ("lead", 0.0015875, 0.0)]),
        ("ordinary  concrete 1e+2 mm", [("ordinary concrete", 0.1, 0.0)]),
        ("mix 2/B 30 mm + mix 2 40 mm", [("mix 2/B", 0.03, 0.0), ("mix 2", 0.04, 0.0)]),
        ("lead glass 8 mm", [("lead glass", 0.008, 0.0)]),
        ("open", []),
    ],
)
def test_make_ups(text: str, layers: list[tuple[str, float, float]]) -> None:
    found = make_up(text, ("mix 2/B", "mix 2", "lead"))
    assert [entry.material for entry in found.layers] == [material for material, _, _ in layers]
    thicknesses = [(entry.thickness.value, entry.thickness.tolerance) for entry in found.layers]
    expected: object = [(pytest.approx(value), pytest.approx(half)) for _, value, half in layers]
    assert thicknesses == expected
    assert found.text == text
    assert found.thickness == pytest.approx(sum(value for _, value, _ in layers))


def test_a_problem_points_into_the_make_up() -> None:
    with pytest.raises(TextError) as caught:
        make_up("concrete 300 mm + led 2 mm")
    assert caught.value.start == len("concrete 300 mm + ")
    with pytest.raises(TextError) as caught:
        make_up("concrete 300 mm + lead 2 msv")
    assert caught.value.start == len("concrete 300 mm + lead 2 ")


def test_one_layer_is_one_layer() -> None:
    assert layer("aluminium 3.2 mm").thickness.value == pytest.approx(3.2e-3)
    with pytest.raises(TextError, match="more than one layer"):
        layer("aluminium 3 mm + copper 1 mm")


@pytest.mark.parametrize(
    ("text", "kind", "numbers"),
    [
        ("200 mm x 300 mm at 700 mm", "rectangle", (0.2, 0.3, 0.7)),
        ("200 x 300 mm at 70 cm", "rectangle", (0.2, 0.3, 0.7)),
        ("200mm×300mm at 0.7m", "rectangle", (0.2, 0.3, 0.7)),
        ("14 in * 17 in at 40 in", "rectangle", (0.3556, 0.4318, 1.016)),
        ("cone 40 deg", "cone", math.radians(20)),
        ("cone 300 mm at 1 m", "cone", math.atan(0.15)),
        ("all round", "everywhere", None),
    ],
)
def test_fields(text: str, kind: str, numbers: object) -> None:
    field = beam_field(text)
    assert (field.kind, field.text) == (kind, text)
    if kind == "rectangle":
        assert (field.width, field.height, field.distance) == pytest.approx(numbers)
    elif kind == "cone":
        assert field.half_angle == pytest.approx(numbers)


@pytest.mark.parametrize(
    "text", ["", "wide", "200 mm", "200 mm x 300 mm", "cone", "cone 0 deg", "cone 180 deg", "x at"]
)
def test_fields_that_are_none(text: str) -> None:
    with pytest.raises(TextError):
        beam_field(text)


@pytest.mark.parametrize(
    ("text", "time_base", "quantity", "value"),
    [
        ("6 mSv/year", "year", "ambient dose equivalent", 6e-3),
        ("6 mSv per year", "year", "ambient dose equivalent", 6e-3),
        ("1 mSv in a year", "year", "ambient dose equivalent", 1e-3),
        ("0.1 mGy/week", "week", "air kerma", 1e-4),
        ("100 uSv in any week", "week", "ambient dose equivalent", 1e-4),
        ("20 µSv in an hour", "hour", "ambient dose equivalent", 2e-5),
        ("2 mrem in any one hour", "hour", "ambient dose equivalent", 2e-5),
        ("7.5 uSv/h", "rate", "ambient dose equivalent", 7.5e-6 / 3600),
        ("7.5 uSv/h over 8 h", "day", "ambient dose equivalent", 7.5e-6 / 3600),
        ("60 uSv in 8 h", "day", "ambient dose equivalent", 7.5e-6 / 3600),
        ("10 uGy/min", "rate", "air kerma", 1e-5 / 60),
    ],
)
def test_goals(text: str, time_base: str, quantity: str, value: float) -> None:
    found = goal(text)
    assert (found.time_base, found.quantity, found.text) == (time_base, quantity, text)
    assert found.value == pytest.approx(value)


@pytest.mark.parametrize(
    "text",
    [
        "",
        "6",
        "6 mSv",
        "6 mSv/y",
        "6 mSv/month",
        "1 h",
        "20 uSv/h in an hour",
        "1 mSv/year +/- 5 %",
        "-1 mSv/year",
    ],
)
def test_goals_that_are_none(text: str) -> None:
    with pytest.raises(TextError):
        goal(text)


@pytest.mark.parametrize(
    ("formula", "expected"),
    [
        ("H2O", {"H": 2 * 1.008 / 18.015, "O": 15.999 / 18.015}),
        ("CaSO4(H2O)2", {"Ca": 40.078 / 172.17, "S": 32.06 / 172.17, "O": 96 / 172.17, "H": 4.032 / 172.17}),
        ("Ca(OH)2", {"Ca": 40.078 / 74.09, "O": 32 / 74.09, "H": 2.016 / 74.09}),
        ("W", {"W": 1.0}),
        ("Fe0.95O", {"Fe": 0.95 * 55.845 / 69.05, "O": 16 / 69.05}),
    ],
)
def test_formulas(formula: str, expected: dict[str, float]) -> None:
    assert mass_fractions(formula) == pytest.approx(expected, abs=2e-4)


@given(st.text(alphabet="CaHOW()0123. ·x", max_size=12))
def test_any_formula_is_read_or_refused_in_words(formula: str) -> None:
    try:
        found = mass_fractions(formula)
    except TextError:
        return
    assert sum(found.values()) == pytest.approx(1.0)


def test_figures_at_a_distance_come_to_one_metre() -> None:
    assert leakage_rate("5 mGy/h at 1 m").value == pytest.approx(5e-3 / 3600)
    assert leakage_rate("5 mGy/h at 50 cm").value == pytest.approx(1.25e-3 / 3600)
    assert leakage_rate("5 mGy/h at 2 m +/- 10 %").tolerance == pytest.approx(2e-3 / 3600)
    assert leakage_rate("5 mGy/h ± 10 % at 2 m").tolerance == pytest.approx(2e-3 / 3600)
    assert tube_output("0.05 mGy/mAs at 2 m").value == pytest.approx(0.2)
    assert tube_output("0.05 mGy/mAs at 2 m").kind == "tube output"


@pytest.mark.parametrize(
    ("text", "value"),
    [
        ("No", "No"),
        ("yes", "yes"),
        ("on", "on"),
        ("12:30", "12:30"),
        ("010", 10),
        ("0o10", 8),
        ("0x1F", 31),
        ("1e3", 1000.0),
        ("-1.5", -1.5),
        (".5", 0.5),
        ("5.", 5.0),
        ("1_000", "1_000"),
        ("2026-03-01", "2026-03-01"),
        ("true", True),
        ("FALSE", False),
        ("True-ish", "True-ish"),
        ("~", None),
        ("", None),
        ("null", None),
        ("1/4", "1/4"),
        ("-", "-"),
        ("1.2.3", "1.2.3"),
        ("=", "="),
        ("<<", "<<"),
    ],
)
def test_plain_scalars_follow_yaml_1_2(text: str, value: object) -> None:
    found = plain_scalar(text)
    assert found == value
    assert type(found) is type(value)


def test_numbers_that_are_not_numbers() -> None:
    assert plain_scalar(".inf") == math.inf
    assert plain_scalar("-.INF") == -math.inf
    assert math.isnan(float(str(plain_scalar(".NaN"))))
    assert plain_scalar("9" * 400) == math.inf
