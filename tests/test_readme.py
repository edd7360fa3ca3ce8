"""The README shows only what is really printed. Kind: golden output."""

from __future__ import annotations

import re
from pathlib import Path

import pytest

from scatterbay.api import assess
from scatterbay.cli.app import app
from scatterbay.report.screen import Screen
from scatterbay.report.terminal import show_assessment

ROOT = Path(__file__).parents[1]
README = (ROOT / "README.md").read_text(encoding="utf-8")


def test_the_first_result_is_what_is_printed(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """The block stands in the output, digit for digit."""
    (block,) = re.findall(r"```text\n(office above.*?)```", README, re.DOTALL)
    monkeypatch.chdir(ROOT)
    with (tmp_path / "out.txt").open("w", encoding="utf-8") as out:
        show_assessment(assess("scenarios/weld-bay.yaml"), Screen(out))
    assert block in (tmp_path / "out.txt").read_text(encoding="utf-8")


def test_every_command_has_a_line() -> None:
    names = {command.name for command in app.registered_commands}
    assert names == set(re.findall(r"^\| `scatterbay (\w+)", README, re.MULTILINE))
