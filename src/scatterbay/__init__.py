"""Screens stray radiation around X-ray rooms and industrial radiography bays.

Every result is a draft for a qualified expert: an estimate, not a survey. Local regulations prevail.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

__version__ = "0.1.0"

_FUNCTIONS = ("advise", "assess", "barrier", "compare", "source", "table", "wall", "worksheet")

__all__ = [
    "__version__",
    "advise",
    "assess",
    "barrier",
    "compare",
    "load",
    "source",
    "table",
    "wall",
    "worksheet",
]

if TYPE_CHECKING:
    from scatterbay.api import advise, assess, barrier, compare, source, table, wall, worksheet
    from scatterbay.scenario import load


def __getattr__(name: str) -> Any:
    """Import on first use, so that asking for the version costs nothing."""
    if name in _FUNCTIONS:
        from scatterbay import api

        return getattr(api, name)
    if name == "load":
        from scatterbay.scenario import load

        return load
    raise AttributeError(f"module 'scatterbay' has no attribute '{name}'")
