"""`map` as a process. Kind: limit, golden structure."""

from __future__ import annotations

from pathlib import Path

from tests.cli.process import run

BAY = "scenarios/weld-bay.yaml"


def test_a_map_is_written_once(tmp_path: Path) -> None:
    target = tmp_path / "plan.svg"
    done = run("map", BAY, "--points", "24", "-o", str(target))
    assert done.returncode == 0, done.stderr
    assert done.stdout == ""
    text = target.read_text(encoding="utf-8")
    assert "Pipe-weld bay, south hall" in text
    assert "console" in text
    again = run("map", BAY, "-o", str(target))
    assert again.returncode == 2
    assert "--force" in again.stderr
    assert target.read_text(encoding="utf-8") == text


def test_slips(tmp_path: Path) -> None:
    for arguments, said in (
        (("-o", str(tmp_path / "plan.pdf")), "neither in .svg nor in .png"),
        (("-o", str(tmp_path / "no" / "plan.svg")), "no folder"),
        (("--section", "z=1 m", "-o", str(tmp_path / "a.svg")), "not a section"),
        (("--section", "x=1", "-o", str(tmp_path / "a.svg")), "unit"),
        (("--height", "1 kg", "-o", str(tmp_path / "a.svg")), "length"),
        (("--time", "day", "-o", str(tmp_path / "a.svg")), "cannot be mapped"),
        (("--section", "x=40 m", "-o", str(tmp_path / "a.svg")), "does not"),
    ):
        done = run("map", BAY, *arguments)
        assert done.returncode == 2, (arguments, done.stderr)
        assert said in done.stderr, done.stderr
    assert list(tmp_path.iterdir()) == []
