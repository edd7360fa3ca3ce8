"""The program from Python. Kind: golden structure, limit."""

from __future__ import annotations

import json

import pytest

import scatterbay
from tests.cli.process import run


def test_barrier_gives_what_the_command_gives() -> None:
    found = scatterbay.barrier("Cs-137", "concrete 200 mm", "30 deg")
    done = run("barrier", "--beam", "Cs-137", "--layers", "concrete 200 mm", "--angle", "30 deg", "--json")
    printed = json.loads(done.stdout)["transmission"]["air_kerma"]["plane"]
    assert printed == pytest.approx(float(found.found.plane[0]), rel=1e-12)
    frame = scatterbay.table(found)
    assert frame["plane"].tolist() == found.found.plane.tolist()
    assert frame.attrs["cautions"]


def test_source_as_a_table() -> None:
    frame = scatterbay.table(scatterbay.source("Co-60"))
    assert frame["share_of_photons"].sum() == pytest.approx(1.0)
    strong = frame[frame["share_of_air_kerma"] > 0.1]
    assert strong["energy_kev"].tolist() == pytest.approx([1173.2, 1332.5], abs=0.1)


def test_assess_and_load() -> None:
    scenario = scatterbay.load("scenarios/weld-bay.yaml")
    frame = scatterbay.table(scatterbay.assess(scenario))
    assert set(frame["place"]) == {place.name for place in scenario.places}


def test_unknown_names_are_attribute_errors() -> None:
    with pytest.raises(AttributeError, match="no attribute 'asses'"):
        _ = scatterbay.asses
