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


@pytest.mark.parametrize(
    ("written", "plain"),
    [("lead code 4", "lead 1.71 mm"), ("lead code 4 at nominal", "lead 1.80 mm"),
     ("lead 1.9 mm +/- 10 %", "lead 1.71 mm"),
     ("lead 1.71 mm to 3 mm", "lead 1.71 mm"), ("lead 2 mm at 10 g/cm3 +/- 0.295 g/cm3", "lead 1.71 mm")],
)  # fmt: skip
def test_barrier_counts_layers_as_bought_at_their_least(written: str, plain: str) -> None:
    """Limit: the same transmission as the plain layer of as much mass, and a note where something counts as less."""
    beam = "X-ray 100 kV, aluminium 3 mm"
    found, expected = scatterbay.barrier(beam, written), scatterbay.barrier(beam, plain)
    assert found.found.plane == pytest.approx(expected.found.plane, rel=1e-3)
    assert any("counted at" in note for note in found.notes) == (written != plain)
    assert not any("counted at" in note for note in expected.notes)


def test_barrier_of_a_lead_equivalent() -> None:
    """Limit: at its own voltage it lets through what the lead does, and the thickness it counts as is said."""
    beam = "X-ray 100 kV, aluminium 3 mm"
    glass, lead = (
        scatterbay.barrier(beam, text) for text in ("lead glass 1.71 mm Pb at 100 kV", "lead 1.71 mm")
    )
    assert glass.found.plane[0] == pytest.approx(lead.found.plane[0], rel=0.02)
    assert any("lead glass 1.71 mm Pb at 100 kV counted as" in note for note in glass.notes)
