"""Verdicts from bands. Kind: limit, hand-worked."""

from __future__ import annotations

import pytest

from scatterbay.api import assess
from scatterbay.exposure.results import ABOVE, BELOW, CLOSE, Assessment, PlaceResult
from scatterbay.scenario import loads
from scatterbay.tables.allowances import allowances
from tests.engine.bays import TEXT


def assessed(goal: str, text: str = TEXT) -> Assessment:
    return assess(loads(text.replace("0.3 mSv/year", goal), "verdicts"))


def place(assessment: Assessment, name: str) -> PlaceResult:
    return next(p for p in assessment.places if p.name == name)


@pytest.fixture(scope="module")
def year() -> PlaceResult:
    return place(assessed("0.3 mSv/year"), "north")


def test_the_band_is_the_allowance_of_each_path_and_two_standard_errors(year: PlaceResult) -> None:
    """Recomputed from the paths: single beam, use factor 1, so that every path scales alike."""
    figure = year.figure("rate")
    low = high = 0.0
    for share in year.paths:
        allowed = allowances()[share.path, year.behind]
        low += (1.0 - allowed.low) * share.rate[figure.quantity]
        high += (1.0 + allowed.high) * share.rate[figure.quantity]
    assert figure.high == pytest.approx(high + 2.0 * figure.standard_error, rel=1e-9)
    assert figure.low == pytest.approx(low - 2.0 * figure.standard_error, rel=1e-9)


@pytest.mark.parametrize(("factor", "verdict"), [(1.02, BELOW), (0.98, CLOSE)])
def test_at_the_upper_end(year: PlaceResult, factor: float, verdict: str) -> None:
    goal = f"{1e6 * year.figure('year').high * factor:.6g} uSv/year"
    assert place(assessed(goal), "north").verdict == verdict


@pytest.mark.parametrize(("factor", "verdict"), [(1.02, CLOSE), (0.98, ABOVE)])
def test_at_the_lower_end(year: PlaceResult, factor: float, verdict: str) -> None:
    goal = f"{1e6 * year.figure('year').low * factor:.6g} uSv/year"
    assert place(assessed(goal), "north").verdict == verdict


def test_each_goal_is_judged_in_its_own_quantity() -> None:
    found = place(assessed("0.3 mSv/year, 0.1 mGy/week"), "north")
    kerma = next(g for g in found.goals if g.figure.quantity == "air kerma")
    dose = next(g for g in found.goals if g.figure.quantity == "ambient dose equivalent")
    assert kerma.figure.time_base == "week"
    assert 52.0 * kerma.figure.value < dose.figure.value < 2.0 * 52.0 * kerma.figure.value


def test_heavy_layers_and_openings_widen_the_scatter_allowance() -> None:
    found = assessed("0.3 mSv/year")
    assert place(found, "north").behind == "wall"
    assert place(found, "east").behind == "lining"


def test_a_place_inside_the_room_is_never_below() -> None:
    text = TEXT + "  corner: {at: [0.4, 3.6, 1.2], people: others, occupancy: 1}\n"
    found = place(assessed("1000000 mSv/year", text), "corner")
    assert found.goals[0].fraction < 1e-3
    assert found.verdict == CLOSE
    assert found.reasons


def test_an_open_opening_takes_below_away_from_every_place() -> None:
    door = "  openings:\n    door: {in: west, from: 1 m, width: 1 m, height: 2 m, make-up: open}\nbodies:"
    found = assessed("1000 mSv/year", TEXT.replace("bodies:", door, 1))
    assert {p.verdict for p in found.places} == {CLOSE}
