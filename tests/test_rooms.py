"""Imports go one way, as the picture in DEVELOPERS.md says. Kind: limit (structure)."""

from __future__ import annotations

import ast
from pathlib import Path

import pytest

SOURCE = Path(__file__).parents[1] / "src" / "scatterbay"
EVERYWHERE = {"errors", "resources", "", "__version__"}
ALLOWED = {
    "tables": set[str](),
    "geometry": set[str](),
    "units": set[str](),
    "physics": {"tables"},
    "barriers": {"physics", "tables"},
    "scenario": {"units", "tables", "geometry"},
    "engine": {"scenario", "barriers", "physics", "geometry", "tables"},
    "exposure": {"units", "engine", "scenario", "physics", "tables"},
    "advice": {"exposure", "engine", "scenario", "geometry", "tables", "physics", "barriers", "units"},
    "report": {"advice", "geometry", "exposure", "engine", "scenario", "physics", "units"},
}


def imported_rooms(path: Path) -> set[str]:
    """Rooms of ours that a file imports anywhere, also inside functions."""
    found = set()
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        if isinstance(node, ast.ImportFrom) and (node.module or "").split(".")[0] == "scatterbay":
            parts = (node.module or "").split(".")
            found |= {parts[1]} if len(parts) > 1 else {alias.name for alias in node.names}
        elif isinstance(node, ast.Import):
            found |= {a.name.split(".")[1] for a in node.names if a.name.startswith("scatterbay.")}
    return found


@pytest.mark.parametrize("room", sorted(ALLOWED))
def test_a_room_imports_only_what_the_picture_allows(room: str) -> None:
    for path in (SOURCE / room).rglob("*.py"):
        beyond = imported_rooms(path) - ALLOWED[room] - EVERYWHERE - {room}
        assert not beyond, f"{path.relative_to(SOURCE)} imports {', '.join(sorted(beyond))}"


def test_reports_compute_no_physics() -> None:
    """A report may read the names of quantities, nothing else of the physics room."""
    for path in (SOURCE / "report").glob("*.py"):
        text = path.read_text(encoding="utf-8")
        for module in ("slab", "medium", "tube", "compton", "binding"):
            assert f"physics.{module}" not in text, path.name


def test_every_file_is_short_enough_to_read() -> None:
    for path in SOURCE.rglob("*.py"):
        count = len(path.read_text(encoding="utf-8").splitlines())
        assert count <= 360, f"{path.relative_to(SOURCE)} has {count} lines"
