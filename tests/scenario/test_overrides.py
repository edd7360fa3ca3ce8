"""A reviewer's own figures, variants, and what a worksheet says about itself. Kind: hand-worked, limit."""

from __future__ import annotations

import pytest

from scatterbay.advice.variants import variants_of
from scatterbay.api import assess, compare
from scatterbay.errors import UsageError
from scatterbay.report.states import state_sentences
from scatterbay.scenario import loads
from tests.engine.bays import TEXT
from tests.scenario.edits import refusal

MORE = """document: {reference: WS-7, author: the author's name}
stated: {interlocks: a door switch}
overrides:
  survey of May: {place: north, figure: 5 mSv/year, by: the adviser, why: measured behind the same wall next door}
variants:
  thicker: {room.sides.north: concrete 300 mm, workload.shot.beam on: 1 h/week}
  steel: {room.sides.north: 'steel 40 mm'}
"""


def text(**changes: str) -> str:
    whole = TEXT + MORE
    for old, new in changes.items():
        assert whole.count(old) == 1
        whole = whole.replace(old, new)
    return whole


def test_the_reviewers_figure_is_judged_and_both_are_shown() -> None:
    """5 mSv a year by the adviser against a goal of 0.3 mSv a year: above, whatever was computed."""
    scenario = loads(text(), "bay")
    plain, changed = (
        next(p for p in assess(s).places if p.name == "north") for s in (loads(TEXT, "bay"), scenario)
    )
    (one,) = changed.overridden
    assert one.computed.value == pytest.approx(plain.figure("year").value)
    assert changed.figure("year").value == pytest.approx(5e-3)
    assert changed.figure("week").value == pytest.approx(plain.figure("week").value)
    assert changed.verdict == "above"
    said = " ".join(state_sentences(changed))
    assert "5.0 mSv/year by the adviser" in said
    assert "as computed" in said
    assert any(a.topic == "overrides" for a in scenario.assumptions)


def test_a_worksheet_says_what_it_is_told() -> None:
    scenario = loads(text(), "bay")
    assert scenario.document == (("reference", "WS-7"), ("author", "the author's name"))
    assert scenario.stated == (("interlocks", "a door switch"),)


def test_variants_are_scenarios_of_their_own() -> None:
    thicker, steel = variants_of(loads(text(), "bay"))
    north = [next(s for s in one.room.sides if s.name == "north").make_up.text for one in (thicker, steel)]
    assert north == ["concrete 300 mm", "steel 40 mm"]
    assert thicker.workloads[0].seconds_per_week == pytest.approx(3600.0)
    assert steel.workloads[0].seconds_per_week == pytest.approx(7200.0)
    assert variants_of(loads(TEXT, "bay")) == []


def test_one_file_compared_with_its_variants() -> None:
    found = compare(loads(text(), "bay"))
    assert [one.scenario.path for one in found.options] == ["bay", "bay: thicker", "bay: steel"]
    assert {change.where for change in found.options[1].changes} == {
        "room.sides.north",
        "workload.shot.beam on",
    }
    with pytest.raises(UsageError, match="names variants"):
        compare(loads(TEXT, "bay"))


def test_a_variant_of_something_that_is_not_there() -> None:
    wrong = text(**{"steel: {room.sides.north: 'steel 40 mm'}": "steel: {room.sides.nroth: 'steel 40 mm'}"})
    with pytest.raises(UsageError, match=r"did you mean 'room\.sides\.north'"):
        variants_of(loads(wrong, "bay"))


@pytest.mark.parametrize(
    ("old", "new", "said"),
    [
        ("place: north, figure", "place: nroth, figure", "did you mean 'north'"),
        ("figure: 5 mSv/year", "figure: 5 mSv", "5 mSv"),
        (", why: measured behind the same wall next door", "", "'why' is missing"),
        (
            "variants:\n",
            "  again: {place: north, figure: 1 mSv/year, by: x, why: y}\nvariants:\n",
            "overrides the same",
        ),
        ("steel: {room.sides.north: 'steel 40 mm'}", "steel: thick", "a variant is a mapping"),
        ("author: the author's name", "autor: x", "did you mean 'author'"),
    ],
)
def test_refused(old: str, new: str, said: str) -> None:
    error = refusal(text(**{old: new}))
    assert said in error.render(), error.render()
