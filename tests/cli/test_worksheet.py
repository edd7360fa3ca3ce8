"""`worksheet` as a process. Kind: limit, golden structure."""

from __future__ import annotations

from pathlib import Path

from tests.cli.process import run

BAY = "scenarios/weld-bay.yaml"


def test_a_worksheet_is_written_once(tmp_path: Path) -> None:
    target = tmp_path / "sheet.html"
    done = run("worksheet", BAY, "--points", "20", "-o", str(target))
    assert done.returncode == 0, done.stderr
    assert done.stdout == ""
    assert "DRAFT" in target.read_text(encoding="utf-8")
    again = run("worksheet", BAY, "-o", str(target))
    assert again.returncode == 2
    assert "--force" in again.stderr


def test_slips(tmp_path: Path) -> None:
    for arguments, said in (
        (("-o", str(tmp_path / "sheet.pdf")), "does not end in .html"),
        (("-o", str(tmp_path / "no" / "sheet.html")), "no folder"),
        (("--height", "1", "-o", str(tmp_path / "sheet.html")), "unit"),
    ):
        done = run("worksheet", BAY, *arguments)
        assert done.returncode == 2
        assert said in done.stderr, done.stderr
    assert list(tmp_path.iterdir()) == []
