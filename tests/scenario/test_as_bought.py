"""Make-ups as bought: stock items, thickness that varies, stated density, lead equivalent, at nominal. Kind: limit."""

from __future__ import annotations

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from scatterbay.scenario.known import Known
from scatterbay.scenario.least import least_notes
from scatterbay.scenario.make_ups import MOST_LAYERS, check_stock_name, filtration, make_up, one_layer
from scatterbay.scenario.parts import Layer
from scatterbay.units import TextError

OWN = Known(
    ("mix 2", "lead code"),
    {
        "our board": "gypsum board 12.5 mm + lead code 4",
        "our window": "lead glass 2.0 mm +/- 0.1 mm Pb at 150 kV",
        "deck": "steel 1 mm + concrete 60 mm to 130 mm",
        "snake": "snake + lead 1 mm",
        "one": "two",
        "two": "one",
        "broken": "lead 1 mm + led 2 mm",
        "x 0": " + ".join(["lead 1 mm"] * 8),
        **{f"x {n}": " + ".join([f"x {n - 1}"] * 8) for n in range(1, 20)},
    },
)


def one(text: str) -> Layer:
    (layer,) = make_up(text, OWN).layers
    return layer


def refusal(text: str, names: Known = OWN) -> TextError:
    with pytest.raises(TextError) as caught:
        make_up(text, names)
    return caught.value


def test_a_stock_item_among_layers() -> None:
    board, lead = make_up("gypsum board 12.5 mm + lead code 4").layers
    assert (board.bought_as, lead.bought_as) == ("", "lead code 4")
    assert lead.thickness.value == pytest.approx(1.80e-3)
    assert lead.counted_thickness == pytest.approx(1.71e-3)


@pytest.mark.parametrize("text", ["lead 4 mm", "lead 4mm", "lead 8 mm", "lead 2.5 mm"])
def test_lead_with_a_unit_of_length_is_lead(text: str) -> None:
    layer = one(text)
    assert (layer.material, layer.bought_as, layer.thickness.tolerance) == ("lead", "", 0.0)


def test_names_that_hold_digits_and_spaces() -> None:
    assert one("lead 4 psf").bought_as == "lead 4 psf"
    assert one("lead  code   4").bought_as == "lead code 4"
    assert one("gypsum board 5/8 in").bought_as == ""
    assert len(make_up("gypsum board 5/8 in with lead 4 psf").layers) == 2


def test_a_material_of_ones_own_that_starts_like_stock() -> None:
    """'lead code' is a material here: with an amount it is that, and 'lead code 4' is still the stock item."""
    assert one("lead code 4 mm").material == "lead code"
    assert one("lead code 4").bought_as == "lead code 4"


def test_stock_of_a_scenario_may_hold_stock() -> None:
    board, lead = make_up("our board", OWN).layers
    assert board.bought_as == lead.bought_as == "our board"
    assert lead.counted_thickness == pytest.approx(1.71e-3)
    assert refusal("our board", Known()).message


def test_a_scenario_without_materials_still_has_its_stock() -> None:
    only_stock = Known((), {"our lead": "lead 1 mm"})
    assert bool(only_stock)
    assert not Known()
    assert make_up("our lead", only_stock).layers[0].bought_as == "our lead"
    assert list(OWN) == ["mix 2", "lead code"]
    assert len(OWN) == 2
    assert "mix 2" in OWN


@pytest.mark.parametrize("text", ["snake", "one", "two + lead 1 mm"])
def test_stock_cannot_hold_itself(text: str) -> None:
    assert "is not a known material" in refusal(text).message
    assert "stock item" in refusal(text).message


def test_stock_cannot_explode() -> None:
    assert f"more than {MOST_LAYERS} layers" in refusal("x 19").message


def test_a_broken_stock_item_is_named_where_it_is_used() -> None:
    problem = refusal("concrete 300 mm + broken")
    assert problem.message == "stock item 'broken': 'led' is not a known material"
    assert problem.start == len("concrete 300 mm + ")


def test_at_nominal() -> None:
    layer = one("lead code 4 at nominal")
    assert layer.at_nominal
    assert layer.counted_thickness == pytest.approx(1.80e-3)
    both = one("concrete 300 mm +/- 10 mm at 2.25 g/cm3 +/- 2 % at nominal")
    assert (both.counted_thickness, both.counted_density) == pytest.approx((0.3, 2250.0))
    first, second = make_up("lead code 3 at nominal + lead code 3").layers
    assert (first.at_nominal, second.at_nominal) == (True, False)
    assert all(
        layer.at_nominal for layer in make_up("gypsum board 12.5 mm with lead code 4 at nominal").layers
    )


def test_a_thickness_that_varies_counts_at_its_least() -> None:
    layer = one("concrete 60 mm to 130 mm")
    assert (layer.thickness.value, layer.thickness.tolerance) == pytest.approx((0.06, 0.0))
    assert layer.thickness.text == "60 mm to 130 mm"
    assert one("concrete 2 in to 0.2 m at 2.2 g/cm3").thickness.value == pytest.approx(0.0508)


def test_a_stated_density() -> None:
    layer = one("concrete 300 mm +/- 10 mm at 2.25 g/cm3 +/- 0.05 g/cm3")
    assert layer.thickness.text == "300 mm +/- 10 mm"
    assert (layer.counted_thickness, layer.counted_density) == pytest.approx((0.29, 2200.0))
    assert one("concrete 300 mm at 2.25 g/cm3 ± 2 %").counted_density == pytest.approx(2205.0)
    assert one("concrete 300 mm at 140 lb/ft3").counted_density == pytest.approx(2242.6, rel=1e-4)
    assert one("concrete 300 mm").density is None


@pytest.mark.parametrize(
    ("density", "fits"), [("2.875", True), ("2.88", False), ("1.725", True), ("1.72", False)]
)
def test_a_density_may_be_a_quarter_off_the_tables(density: str, fits: bool) -> None:
    """The table's concrete has 2.3 g/cm3."""
    text = f"ordinary concrete 300 mm at {density} g/cm3"
    if fits:
        assert one(text).counted_density == pytest.approx(1000.0 * float(density))
    else:
        problem = refusal(text)
        assert "of ordinary concrete in the table" in problem.message
        assert "define it under 'materials'" in problem.hint


def test_a_lead_equivalent() -> None:
    """The first guess holds as much lead per area as the lead does: independent route by mass."""
    layer = one("lead glass 2.0 mm Pb at 150 kV")
    assert layer.equivalent is not None
    assert (layer.equivalent.lead.value, layer.equivalent.voltage.value) == pytest.approx((2e-3, 150.0))
    assert (layer.equivalent.lead.text, layer.thickness.text) == ("2.0 mm", "2.0 mm Pb at 150 kV")
    assert layer.thickness.value * 4.8 * 0.603407 == pytest.approx(2e-3 * 11.35, rel=1e-3)
    tolerant = one("dense lead glass 2.0 mm +/- 5 % Pb at 100 kV")
    assert tolerant.equivalent is not None
    assert tolerant.equivalent.lead.tolerance == pytest.approx(1e-4)
    assert tolerant.thickness.tolerance == pytest.approx(0.05 * tolerant.thickness.value)
    assert one("lead glass 2.0 mm Pb +/- 0.1 mm at 150 kV").equivalent == one(
        "lead glass 2.0 mm +/- 0.1 mm Pb at 150 kV").equivalent  # fmt: skip


@pytest.mark.parametrize(
    ("text", "start", "said"),
    [
        ("concrete 130 mm to 60 mm", 9, "as '60 mm to 130 mm'"),
        ("concrete 60 mm to 60 mm", 9, "from the smaller thickness to the larger"),
        ("concrete 60 to 130 mm", 9, "'60' has no unit"),
        ("concrete 60 mm to 130", 18, "'130' has no unit"),
        ("concrete 60 mm to 130 mm +/- 5 mm", 18, "has no tolerance"),
        ("concrete 60 mm +/- 5 mm to 130 mm", 9, "has no tolerance"),
        ("concrete 60 mm to 13 m", 18, "not a believable thickness"),
        ("concrete 60 mm to 130 mm at nominal", 0, "has no nominal thickness"),
        ("deck at nominal", 0, "has no nominal thickness"),
        ("concrete 300 mm at 2.25", 19, "has no unit"),
        ("concrete 300 mm at 2250 mm", 19, "where a density is needed"),
        ("concrete 300 mm at 2.25 g/cm3 +/- 3 g/cm3", 19, "stays above zero"),
        ("concrete 300 mm at nominal thickness", 19, "or the word 'nominal'"),
        ("concrete 0 mm at 2.25 g/cm3", 9, "must be above zero"),
        ("mix 2 300 mm at 2.25 g/cm3", 16, "stands under 'materials'"),
        ("lead glass 2 mm Pb", 11, "as 'lead glass 2 mm Pb at 150 kV'"),
        ("lead glass 2 mm at 150 kV", 19, "where a density is needed"),
        ("lead glass 2 mm lead at 150 kV", 11, "is written Pb"),
        ("lead glass 2 mm Pb at 150 keV", 22, "keV is the energy of one photon"),
        ("lead glass 2 mm Pb at 150 kVp", 26, "write kV"),
        ("lead glass 2 mm Pb at 30 kV", 22, "40 to 450 kV"),
        ("lead glass 2 mm Pb at 150 kV +/- 5 kV", 22, "without a tolerance"),
        ("lead glass 2 mm Pb at 150 kV at 4.9 g/cm3", 22, "takes no density"),
        ("lead glass 2 mm Pb 3 at 150 kV", 19, "'2 mm Pb 3' has no unit"),
        ("lead glass 2 m Pb at 150 kV", 11, "not a believable thickness"),
        ("plate glass 2 mm Pb at 150 kV", 12, "without lead in it"),
        ("steel 2 mm Pb at 150 kV", 6, "without lead in it"),
        ("mix 2 2 mm Pb at 150 kV", 6, "a material of this scenario"),
        ("lead code 4 sheet", 0, "write 'lead code 4' alone"),
        ("lead code 4 at 11 g/cm3", 0, "write 'lead code 4' alone"),
        ("lead 4 psf 2 mm", 0, "comes with its layers"),
        ("lead cod 4", 0, "did you mean the stock item 'lead code 4'?"),
        ("Lead Code 4", 0, "did you mean the stock item 'lead code 4'?"),
        ("lead 9 psf", 7, "did you mean the stock item 'lead 8 psf'?"),
        ("our bord", 0, "did you mean the stock item 'our board'?"),
        ("led 4 mm", 0, "did you mean 'lead'?"),
        ("at nominal", 0, "is not a known material"),
    ],
)  # fmt: skip
def test_refusals_point_and_say_what_is_allowed(text: str, start: int, said: str) -> None:
    problem = refusal(f"steel 1 mm + {text}")
    assert said in str(problem)
    assert problem.start == len("steel 1 mm + ") + start


def test_a_voltage_outside_the_model_is_outside_the_model() -> None:
    assert refusal("lead glass 2 mm Pb at 500 kV").outside_model
    assert not refusal("lead glass 2 mm Pb at 150 mm").outside_model
    inside = Known((), {"pane": "lead glass 2 mm Pb at 500 kV"})
    assert refusal("pane", inside).outside_model


@pytest.mark.parametrize(
    "text",
    ["lead code 4", "aluminium 3 mm to 4 mm", "aluminium 3 mm at 2.7 g/cm3", "lead glass 2 mm Pb at 100 kV"],
)
def test_filters_are_plain(text: str) -> None:
    with pytest.raises(TextError, match="is for walls"):
        filtration(text)
    with pytest.raises(TextError, match="is for walls"):
        one_layer(text)
    assert len(filtration("aluminium 3 mm +/- 5 % + copper 0.1 mm").layers) == 2


@pytest.mark.parametrize(
    ("name", "said"),
    [
        ("lead", "is a material"),
        ("aluminum", "is a material"),
        ("mix 2", "is a material"),
        ("a + b", "cannot name"),
        ("4 mm plate", "cannot name"),
        ("open", "cannot name"),
        ("plate at nominal", "cannot name"),
        ("lead 2 mm", "is a layer by itself"),
        ("mix 2 30 mm", "is a layer by itself"),
    ],
)  # fmt: skip
def test_names_that_a_stock_item_cannot_have(name: str, said: str) -> None:
    with pytest.raises(TextError, match=said):
        check_stock_name(name, OWN)
    assert check_stock_name("our board", OWN) == "our board"


@pytest.mark.parametrize(
    ("text", "notes"),
    [
        ("lead 2 mm + hollow block 8 in + open space 1", None),
        ("lead 2 mm + hollow block 8 in", []),
        ("lead glass 2 mm Pb at 100 kV", []),
        ("gypsum board 12.5 mm + lead code 4",
         ["lead code 4 counted at its guaranteed minimum, 1.71 mm (nominal 1.80 mm)"]),
        ("concrete 300 mm +/- 10 mm + concrete 300 mm +/- 10 mm", ["concrete 300 mm +/- 10 mm counted at 290 mm"]),
        ("concrete 300 mm at 2.25 g/cm3 +/- 2 %", ["concrete 300 mm at 2.25 g/cm3 +/- 2 % counted at 2.205 g/cm3"]),
        ("concrete 60 mm to 130 mm", ["concrete 60 mm to 130 mm counted at its least, 60 mm"]),
        ("deck", ["deck counted at its guaranteed minimum, concrete 60 mm (nominal 60 mm to 130 mm)"]),
        ("our window", ["our window counted at its guaranteed minimum, 1.9 mm Pb (nominal 2.0 mm)"]),
        ("lead code 4 at nominal + lead code 4",
         ["lead code 4 counted at nominal, as it says; its guaranteed minimum is 1.71 mm",
          "lead code 4 counted at its guaranteed minimum, 1.71 mm (nominal 1.80 mm)"]),
        ("concrete 300 +/- 10 mm at nominal",
         ["concrete 300 +/- 10 mm counted at nominal, as it says; it may be as little as 290 mm"]),
        ("gypsum board 12.5 mm with lead code 4",
         ["gypsum board 12.5 mm with lead code 4 counted at its guaranteed minimum, gypsum board 12 mm (nominal "
          "12.5 mm), lead 1.71 mm (nominal 1.80 mm)"]),
    ],
)  # fmt: skip
def test_notes_on_what_counts_as_less(text: str, notes: list[str] | None) -> None:
    """Golden output."""
    if notes is None:
        assert refusal(text)
    else:
        assert least_notes(make_up(text, OWN)) == notes


def test_no_notes_where_nothing_is_there() -> None:
    assert least_notes(make_up("open")) == []


WORDS = st.sampled_from(
    ["lead", "code", "4", "psf", "mm", "Pb", "at", "to", "nominal", "150", "kV", "2.3", "g/cm3", "+", "+/-", "%",
     "concrete", "lead glass", "mix 2", "our board", "1/2", "in", "open"]
)  # fmt: skip


@settings(max_examples=300)
@given(st.lists(WORDS, max_size=9).map(" ".join))
def test_any_words_are_read_or_refused(text: str) -> None:
    """Whatever is read counts above zero and no more than nominal; whatever is refused points into the text."""
    start = 0
    try:
        found = make_up(text, OWN)
    except TextError as problem:
        found, start = make_up("open"), problem.start
    assert 0 <= start <= len(text)
    for layer in found.layers:
        assert 0.0 < layer.counted_thickness <= layer.thickness.value * (1 + 1e-12)
    assert all(isinstance(note, str) for note in least_notes(found))
