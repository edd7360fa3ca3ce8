"""What may be multiplied by what. Kind: hand-worked cases, common practice."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from scatterbay.exposure.rates import Rates
from scatterbay.exposure.timebases import HOUR, instantaneous, together, within
from scatterbay.scenario import loads
from tests.engine.bays import TEXT

ONE = np.ones(4)


NONE = Rates({}, {}, {}, {}, 0.0 * ONE)
SOURCES = {"a": "one", "b": "one", "c": "two"}


def test_beams_of_one_source_are_never_on_together() -> None:
    rates = {"a": 3.0 * ONE, "b": 5.0 * ONE, "c": 2.0 * ONE}
    assert instantaneous(rates, [["a", "b"], ["c"]], NONE, SOURCES) == pytest.approx(7.0 * ONE)
    assert instantaneous(rates, [["a", "b", "c"]], NONE, SOURCES) == pytest.approx(5.0 * ONE)


def test_a_source_is_stored_or_exposed_but_another_may_be_stored_meanwhile() -> None:
    """One stored at 4, two stored at 1; both in one set: 5 + 1 beats 4 + 1 and 2 + 4. On its way, 7 more."""
    rates = {"a": 3.0 * ONE, "b": 5.0 * ONE, "c": 2.0 * ONE}
    around = replace(NONE, stored={"one": 4.0 * ONE, "two": 1.0 * ONE})
    assert instantaneous(rates, [["a", "b", "c"]], around, SOURCES) == pytest.approx(6.0 * ONE)
    assert instantaneous(rates, [["a", "b"], ["c"]], around, SOURCES) == pytest.approx((5.0 + 2.0) * ONE)
    moving = replace(around, minute={"one": 7.0 * ONE})
    assert instantaneous(rates, [["a", "b", "c"]], moving, SOURCES) == pytest.approx(13.0 * ONE)


def test_the_worst_hour_is_filled_strongest_first() -> None:
    """b for 40 min at 5, then a for the 20 min left of its 30: 40 x 5 + 20 x 3 = 260 per 60 s."""
    rates = {"a": 3.0 * ONE, "b": 5.0 * ONE}
    seconds = {"a": 1800.0, "b": 2400.0}
    assert within(rates, seconds, HOUR, [["a", "b"]]) == pytest.approx((2400.0 * 5.0 + 1200.0 * 3.0) * ONE)
    assert within(rates, seconds, HOUR, [["a"], ["b"]]) == pytest.approx((2400.0 * 5.0 + 1800.0 * 3.0) * ONE)


SECOND = """sources:
  other: {sealed source: Co-60, activity: 1 GBq}
  third: {sealed source: Cs-137, activity: 1 GBq}
"""
BEAMS = """beams:
  gamma: {source: other, at: [1, 1, 1], aim: [2, 2, 1], field: all round}
  delta: {source: third, at: [1, 1, 1], aim: [2, 2, 1], field: all round}
  again: {source: set, at: [1, 1, 1], aim: [2, 2, 1], field: cone 5 deg}
"""


def scenario_with(extra: str) -> list[list[str]]:
    text = TEXT.replace("sources:\n", SECOND).replace("beams:\n", BEAMS)
    loads_text = "  gamma: {beam on: 1 h/week}\n  delta: {beam on: 1 h/week}\n  again: {beam on: 1 h/week}\n"
    text = text.replace("workload:\n", "workload:\n" + loads_text) + extra
    return [sorted(names) for names in together(loads(text, "sets"))]


def test_sources_run_together_unless_declared_exclusive() -> None:
    assert sorted(scenario_with("")) == [["again", "shot"], ["delta"], ["gamma"]]
    assert sorted(scenario_with("never together: [[gamma, delta]]\n")) == [
        ["again", "shot"],
        ["delta", "gamma"],
    ]


def test_an_exclusive_group_that_splits_a_source_is_not_used_to_lower_anything() -> None:
    """gamma may not run with shot, but may with the same tube's other beam: all still counted together."""
    sets = scenario_with("never together: [[gamma, shot]]\n")
    assert sorted(sets) == [["again", "shot"], ["delta"], ["gamma"]]
