"""`wall` and `advise` as processes. Kind: limit, golden structure."""

from __future__ import annotations

import json
from pathlib import Path

from scatterbay.scenario import load
from tests.cli.process import TOP, run

SHOP = "scenarios/pipe-shop.yaml"


def test_a_wall_that_misses_a_goal() -> None:
    done = run("wall", SHOP, "north", "--with", "lead", "--json")
    assert done.returncode == 1, done.stderr
    found = json.loads(done.stdout)
    assert found["worst"]["upper_end_over_goal"] > 3.0
    (lead,) = found["remedies"]
    assert lead["material"] == "lead"
    assert lead["exact"]["unit"] == "mm"
    assert lead["leaves"] <= 1.0
    assert lead["sold_leaves"] <= 1.0
    assert any("DRAFT" in caution for caution in found["cautions"])


def test_a_wall_that_keeps_its_goals_has_a_profile_and_cautions() -> None:
    done = run("wall", SHOP, "east")
    assert done.returncode == 0, done.stderr
    assert "all" in done.stdout
    assert "DRAFT for a qualified expert" in done.stdout
    assert "of goal" in done.stdout
    assert max(map(len, done.stdout.splitlines())) <= 100


def test_every_point_as_csv() -> None:
    lines = run("wall", SHOP, "door", "--csv").stdout.splitlines()
    assert lines[0].startswith("surface,first_m,second_m")
    assert len(lines) > 20


def test_slips() -> None:
    for arguments, said in (
        (("nroth",), "did you mean 'north'"),
        (("floor",), "on the ground"),
        (("north", "--with", "led"), "did you mean 'lead'"),
        (("north", "--gap", "0.3"), "unit"),
        (("north", "--gap", "30 m"), "between 50 mm and 10 m"),
        (("north", "--people", "shop staf"), "did you mean 'shop staff'"),
        (("north", "--limit", "2"), "at most 1"),
        (("north", "--json", "--csv"), "exclude each other"),
    ):
        done = run("wall", SHOP, *arguments)
        assert done.returncode == 2, (arguments, done.stdout[-500:])
        assert said in done.stderr, done.stderr
        assert done.stdout == ""


def test_the_scenario_as_amended(tmp_path: Path) -> None:
    """Written whole, read again, with the panel that was advised; never over a file that exists."""
    target = tmp_path / "amended.yaml"
    done = run("advise", SHOP, "--with", "lead", "-o", str(target))
    assert done.returncode == 1, done.stderr
    assert "kg added" in done.stdout
    added = load(target).room.panels
    assert [panel.host for panel in added] == ["north"]
    assert (TOP / SHOP).read_text(encoding="utf-8").splitlines()[0] in target.read_text(encoding="utf-8")
    again = run("advise", SHOP, "-o", str(target))
    assert again.returncode == 2
    assert "--force" in again.stderr
    nowhere = run("advise", SHOP, "-o", str(tmp_path / "none" / "x.yaml"))
    assert nowhere.returncode == 2
    assert "no folder" in nowhere.stderr
