"""A whole bay gives the same when it is turned, mirrored, moved or cut up. Kind: limit (symmetry).

Paths without a walk agree to rounding; scatter within 3.5 standard errors of the difference (3 for a single
comparison; there are about forty here).
"""

from __future__ import annotations

import math

import numpy as np
import pytest

from scatterbay.engine.contributions import Contributions
from tests.engine.bays import bay, compare, computed, cut_side, mirrored, rotated, shifted


@pytest.fixture(scope="module")
def plain() -> Contributions:
    return computed(bay())


def test_turned(plain: Contributions) -> None:
    compare(plain, computed(rotated(bay(), math.radians(37.0))), exact=1e-7)


def test_mirrored(plain: Contributions) -> None:
    compare(plain, computed(mirrored(bay())), exact=1e-7)


def test_moved(plain: Contributions) -> None:
    compare(plain, computed(shifted(bay(), 13.0, -7.0)), exact=1e-7)


def test_a_layer_split_in_two_is_the_same_wall(plain: Contributions) -> None:
    halves = {"north:_concrete_150_mm": "north: concrete 60 mm + concrete 90 mm"}
    split = computed(bay(**halves))
    compare(plain, split, exact=1e-12)


def test_a_wall_cut_in_two_collinear_ones(plain: Contributions) -> None:
    compare(plain, computed(cut_side(bay(), "north", 0.55)), exact=1e-9)
    compare(plain, computed(cut_side(bay(), "east", 0.47)), exact=1e-9)


def test_same_input_same_numbers(plain: Contributions) -> None:
    again = computed(bay())
    for a, b in zip(plain.rows, again.rows, strict=True):
        assert np.array_equal(a.values, b.values)


def test_another_seed_agrees_within_errors_but_differs(plain: Contributions) -> None:
    other = computed(bay(**{"workload:": "options: {seed: 7}\nworkload:"}))
    compare(plain, other)
    scatter = [(a, b) for a, b in zip(plain.rows, other.rows, strict=True) if a.path == "scatter"]
    assert not any(np.array_equal(a.values, b.values) for a, b in scatter)


def test_more_concrete_gives_less_of_everything(plain: Contributions) -> None:
    thicker = computed(bay(**{"north:_concrete_150_mm": "north: concrete 250 mm"}))
    for a, b in zip(plain.rows, thicker.rows, strict=True):
        if a.place == "north" and a.values.any():
            assert (b.values.mean(axis=0) < 0.5 * a.values.mean(axis=0)).all(), a.path


def test_the_walk_accounts_for_every_kev(plain: Contributions) -> None:
    for balance in plain.balances.values():
        counted = balance.absorbed + balance.escaped + balance.cut_off
        assert counted == pytest.approx(balance.entered, rel=1e-9)
        assert balance.cut_off < 2e-3 * balance.entered
