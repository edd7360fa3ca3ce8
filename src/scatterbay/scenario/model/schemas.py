"""JSON Schema of the values that are written as text."""

from __future__ import annotations

from typing import Any

from scatterbay.units import KINDS
from scatterbay.units.table import UNITS

Schema = dict[str, Any]

_NUMBER = r"[-+]?[0-9.][0-9./eE+-]*"
_TOLERANCE = r"(\s*(\+/-|\+-|±)\s*[0-9.].*)?"


def text(description: str, *examples: str, pattern: str = "") -> Schema:
    """A text, with examples and perhaps a pattern it follows."""
    found: Schema = {"type": "string", "minLength": 1, "description": description, "examples": list(examples)}
    return {**found, "pattern": pattern} if pattern else found


def quantity(*kinds: str, examples: tuple[str, ...] = ()) -> Schema:
    """A quantity of one of the kinds: a number and a unit, perhaps a tolerance."""
    shown = list(examples) or [KINDS[kind].example for kind in kinds]
    description = f"{' or '.join(kinds)}, with its unit; a tolerance may follow: +/- and a size or %"
    return text(description.capitalize(), *shown, pattern=_pattern(kinds))


def _pattern(kinds: tuple[str, ...]) -> str:
    symbols = [symbol for kind in kinds for symbol, unit in UNITS.items() if unit.dims == KINDS[kind].dims]
    compound = any(KINDS[kind].dims not in {unit.dims for unit in UNITS.values()} for kind in kinds)
    if compound or "time" in kinds or "charge" in kinds:
        return rf"^\s*{_NUMBER}\s*[^\s0-9].*$"
    units = "|".join(sorted(symbols, key=lambda symbol: (-len(symbol), symbol)))
    number = rf"{_NUMBER}(\s+[0-9]+/[0-9]+)?"
    amount = rf"{number}\s*({units})"
    shared = rf"{number}\s*(\+/-|\+-|±)\s*{amount}"
    return rf"^\s*({amount}(\s+{amount})?{_TOLERANCE}|{shared})\s*$"


def number_or(what: Schema, **limits: float) -> Schema:
    """A plain number within limits, or text."""
    return {"anyOf": [{"type": "number", **limits}, what]}


LENGTH = quantity("length", examples=("300 mm", "2.4 m", "5 ft 6 in"))
COORDINATE = number_or({**LENGTH, "description": "A length with its unit"}, minimum=-200, maximum=200)
FACTOR = number_or(
    text("A fraction or a percentage", "1/4", "25 %", pattern=r"^\s*[0-9.]+(\s*/\s*[0-9.]+|\s*%)?\s*$"),
    exclusiveMinimum=0,
    maximum=1,
)


def coordinates(count: int, description: str, *examples: list[Any]) -> Schema:
    """A list of so many coordinates in m."""
    return {
        "type": "array",
        "items": COORDINATE,
        "minItems": count,
        "maxItems": count,
        "description": description,
        "examples": list(examples),
    }
