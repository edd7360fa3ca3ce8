"""Finds the shipped folders, in an installed package and in a checkout alike."""

from __future__ import annotations

from importlib import resources
from importlib.resources.abc import Traversable
from pathlib import Path

from scatterbay.errors import DataFileError


def folder(name: str) -> Traversable:
    """Folder ``data`` or ``scenarios``: inside the package when installed, at the top of a checkout otherwise."""
    inside = resources.files("scatterbay") / name
    if inside.is_dir():
        return inside
    checkout = Path(__file__).resolve().parents[2]
    if (checkout / "pyproject.toml").is_file() and (checkout / name).is_dir():
        return checkout / name
    raise DataFileError(f"the shipped folder '{name}' is missing from this installation")
