"""What a scenario takes by name: rule sets, occupancy, container classes, receptors. Kind: limit.

The figures themselves are compared with their sources in ``tests/tables/test_bought.py``.
"""

from __future__ import annotations

from collections.abc import Callable

import pytest

from scatterbay.scenario.lists import listing, topics
from scatterbay.scenario.rules import container_class, goals_from, occupancy_suggestion, receptor
from scatterbay.tables.containers import containers
from scatterbay.tables.occupancy import spaces
from scatterbay.tables.receptors import receptors
from scatterbay.tables.rules import rules
from scatterbay.units import TextError


@pytest.mark.parametrize("key", sorted(rules()), ids=": ".join)
def test_every_entry_gives_its_goals_with_their_source(key: tuple[str, str]) -> None:
    text = ": ".join(key)
    found = goals_from(text)
    assert [goal.text for goal in found] == [rule.goal for rule in rules()[key]]
    for goal, rule in zip(found, rules()[key], strict=True):
        assert goal.source.startswith(text)
        assert "recalled" in goal.source
        assert f"stated as {rule.stated}" in goal.source
    assert goals_from(" ".join(key)) == goals_from(f"  {key[0]} :  {key[1]} ") == found


def test_a_set_with_two_goals() -> None:
    year, hour = goals_from("US 10 CFR 20: public")
    assert (year.time_base, hour.time_base) == ("year", "hour")
    assert (year.value, hour.value) == pytest.approx((1e-3, 2e-5))
    assert {year.quantity, hour.quantity} == {"ambient dose equivalent"}
    (weekly,) = goals_from("NCRP 147: controlled area")
    assert (weekly.quantity, weekly.time_base) == ("air kerma", "week")
    assert weekly.value == pytest.approx(1e-4)


@pytest.mark.parametrize(
    ("text", "start", "said"),
    [
        ("NCRP 147: controled area", 10, "did you mean 'controlled area'"),
        ("NCRP 147: moon", 10, "known: controlled area, uncontrolled area"),
        ("NCRP 148: controlled area", 0, "did you mean 'NCRP 147'"),
        ("ncrp 147: controlled area", 0, "did you mean 'NCRP 147'"),
        ("NCRP 1470: controlled area", 0, "'NCRP 1470' is not a rule set"),
        ("NCRP 147", 0, "the name of an entry of NCRP 147 is missing"),
        ("NCRP 147:", 0, "the name of an entry of NCRP 147 is missing"),
        ("", 0, "the name of a rule set is missing"),
        ("6 mSv/year", 0, "is not a rule set"),
    ],
)
def test_rules_that_are_none(text: str, start: int, said: str) -> None:
    with pytest.raises(TextError) as caught:
        goals_from(text)
    assert said in str(caught.value)
    assert caught.value.start == start


def test_spaces_by_any_of_their_names() -> None:
    assert occupancy_suggestion("corridor").factor == "1/5"
    assert occupancy_suggestion("hallway") == occupancy_suggestion(" corridor ")
    for space, entry in spaces().items():
        assert all(occupancy_suggestion(name) == entry for name in (space, *entry.also))


def test_container_classes_in_base_units() -> None:
    found = container_class("P")
    assert found == container_class("class P") == container_class("portable")
    assert found.at_1_m.value * 3.6e9 == pytest.approx(20.0)
    assert found.at_1_m.kind == "ambient dose equivalent rate"
    assert container_class("source changer").at_50_mm is None
    assert {container_class(name).name for name in containers()} == set(containers())


def test_receptors_are_layers() -> None:
    found = receptor("table and receptor")
    assert [layer.material for layer in found.make_up.layers] == ["lead"]
    assert found.make_up.thickness == pytest.approx(0.85e-3)
    assert "recalled" in found.source
    assert {receptor(name).name for name in receptors()} == set(receptors())


@pytest.mark.parametrize(
    ("look_up", "name", "said"),
    [
        (occupancy_suggestion, "coridor", "did you mean 'corridor'"),
        (occupancy_suggestion, "", "the name of a kind of space is missing"),
        (container_class, "class Q", "did you mean 'class P'"),
        (container_class, "zzz", "known: class P, class M, class F, source changer"),
        (receptor, "tabel and receptor", "did you mean 'table and receptor'"),
    ],
)
def test_names_that_are_none(look_up: Callable[[str], object], name: str, said: str) -> None:
    with pytest.raises(TextError, match=said):
        look_up(name)


@pytest.mark.parametrize("topic", sorted(topics()))
def test_every_list_has_a_value_per_column_and_a_source(topic: str) -> None:
    found = listing(topic)
    assert found.rows
    for row in found.rows:
        assert len(row) == len(found.columns) + 1
        assert row[0]
        assert str(row[-1]).strip()
    widths = [width for _, _, width in found.columns if width]
    assert 2 + sum(widths) + 2 * len(widths) <= 68, "no room for the source on 80 columns"
