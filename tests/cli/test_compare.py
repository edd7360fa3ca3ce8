"""`compare` as a process. Kind: limit, golden structure."""

from __future__ import annotations

import json
from pathlib import Path

from tests.cli.process import TOP, run

SHOP = "scenarios/pipe-shop.yaml"


def test_two_scenarios(tmp_path: Path) -> None:
    text = (TOP / SHOP).read_text(encoding="utf-8")
    better = tmp_path / "better.yaml"
    better.write_text(
        text.replace("north: concrete 280 mm", "north: concrete 280 mm + lead 8 mm"), encoding="utf-8"
    )
    done = run("compare", SHOP, str(better))
    assert done.returncode == 0, done.stderr
    assert "room.sides.north: concrete 280 mm -> concrete 280 mm + lead 8 mm" in done.stdout
    assert "B: below every goal at every place." in done.stdout
    assert "DRAFT for a qualified expert" in done.stdout
    found = json.loads(run("compare", SHOP, str(better), "--json").stdout)
    assert [option["meets_all_goals"] for option in found["options"]] == [False, True]
    assert run("compare", str(better), SHOP).returncode == 1
    lines = run("compare", SHOP, str(better), "--csv").stdout.splitlines()
    assert len(lines) == 1 + 2 * 5


def test_slips() -> None:
    one = run("compare", SHOP)
    assert one.returncode == 2
    assert "2 to 26" in one.stderr
    gone = run("compare", SHOP, "scenarios/pipe-shp.yaml")
    assert gone.returncode == 2
    assert "did you mean" in gone.stderr
