"""Wording that must not appear: promises of safety. Kind: limit."""

from __future__ import annotations

import re
from pathlib import Path

import pytest

TOP = Path(__file__).parents[1]
PROMISES = re.compile(
    r"\b(is|are|stay|stays|be) safe\b|\bsafe (to|for|dose|level|limit)\b|\bsafely\b", re.IGNORECASE
)


@pytest.mark.parametrize("folder", ["src", "scenarios", "data"])
def test_nothing_promises_safety(folder: str) -> None:
    for path in (TOP / folder).rglob("*"):
        if path.suffix in {".py", ".yaml", ".csv"}:
            assert not PROMISES.search(path.read_text(encoding="utf-8")), path.name


def test_readme_defers_in_its_first_paragraph() -> None:
    first = (TOP / "README.md").read_text(encoding="utf-8").split("\n\n")[1]
    assert "draft for a qualified expert" in first
    assert "Local regulations" in first
