"""The scenarios that come with the program: readable, marked as invented, each showing its trade."""

from __future__ import annotations

from pathlib import Path

import pytest

from scatterbay import resources
from scatterbay.scenario import load
from scatterbay.scenario.parts import SealedSource, XrayTube

SHIPPED = Path(str(resources.folder("scenarios")))
EXPECTED = {
    "weld-bay": (XrayTube, "pipe"),
    "casting-cell": (SealedSource, "box"),
    "pipe-shop": (SealedSource, "pipe"),
    "radiography-room": (XrayTube, "cylinder"),
}


def test_the_four_are_there() -> None:
    assert set(EXPECTED) <= {path.stem for path in SHIPPED.glob("*.yaml")}


@pytest.mark.parametrize("name", sorted(EXPECTED))
def test_each_is_read_and_says_that_it_is_invented(name: str) -> None:
    path = SHIPPED / f"{name}.yaml"
    text = path.read_text(encoding="utf-8")
    source, shape = EXPECTED[name]
    scenario = load(path)
    assert text.startswith("# Demonstration data")
    assert max(len(line) for line in text.splitlines()) <= 120
    assert any(isinstance(entry, source) for entry in scenario.sources)
    assert shape in {body.shape for body in scenario.bodies}
    assert len(scenario.places) >= 5
    assert {goal.time_base for group in scenario.people for goal in group.goals} >= {"year", "hour"}


@pytest.mark.parametrize("name", sorted(EXPECTED))
def test_what_a_demonstration_leaves_to_defaults_is_little(name: str) -> None:
    """A file to learn from states what matters: leakage, workload and use are never assumed for it."""
    topics = {assumption.topic for assumption in load(SHIPPED / f"{name}.yaml").assumptions}
    assert not topics & {"leakage", "worst hour", "worst day", "weeks", "use factor", "occupancy", "decay"}
