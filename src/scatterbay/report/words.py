"""Words and units in which results are printed, the same in every report."""

from __future__ import annotations

import re

from scatterbay.exposure.results import Figure, GoalResult, PathShare, PlaceResult
from scatterbay.physics import dose
from scatterbay.units import choose_unit, factor_of, format_quantity, significant

SYMBOLS = {dose.AIR_KERMA: "air kerma", dose.AMBIENT: "H*(10)"}

BASES = {
    "rate": "beam on",
    "hour": "worst hour",
    "day": "8 h average",
    "week": "week",
    "year": "year",
}

_PER_HOUR, _MICRO = 3600.0, 1e6


def unit(time_base: str, quantity: str) -> str:
    """The fixed unit of a time base in machine-readable output: micro-units, per hour for rates."""
    symbol = f"u{dose.UNITS[quantity]}"
    return {"rate": f"{symbol}/h", "hour": symbol, "day": f"{symbol}/h", "week": f"{symbol}/week"}.get(
        time_base, f"{symbol}/year"
    )


def in_unit(value: float, time_base: str) -> float:
    """A base value (Gy, Sv, per second for rates) in that unit."""
    return value * _MICRO * (_PER_HOUR if time_base in ("rate", "day") else 1.0)


def kind(time_base: str, quantity: str) -> str:
    """The kind of quantity that a figure of this time base is."""
    suffix = {"rate": " rate", "day": " rate", "hour": "", "week": " per week", "year": " per year"}[
        time_base
    ]
    return quantity + suffix


def spoken(value: float, time_base: str, quantity: str) -> str:
    """A base value with a unit that suits its size, two significant digits."""
    return format_quantity(value, kind(time_base, quantity))


def band(figure: Figure) -> str:
    """The band of a figure, low to high, in the unit the figure is spoken in."""
    factor = factor_of(choose_unit(figure.value, kind(figure.time_base, figure.quantity)))
    return f"{significant(figure.low / factor)} to {significant(figure.high / factor)}"


def goal_words(goal: GoalResult) -> str:
    """A goal as its author wrote it, less the time base, which the row it stands in names."""
    return re.split(r" in an? | over ", goal.text)[0]


MOST_PARTS = 6
"""Parts that a place's dose is broken down into before the rest is lumped."""


def made_of(place: PlaceResult) -> list[str]:
    """What the dose of a week is made of, largest first."""
    quantity = place.quantity
    added = sorted((s for s in place.paths if s.week), key=lambda s: -s.week[quantity])
    total = sum(share.week[quantity] for share in added)
    counted = [share for share in added if share.week[quantity] > 0.0]
    parts = [
        f"{percent(share.week[quantity], total)} {path_words(share)} ({share.beam})" for share in counted
    ]
    if len(parts) <= MOST_PARTS + 1:
        return parts
    rest = sum(share.week[quantity] for share in counted[MOST_PARTS:])
    return [*parts[:MOST_PARTS], f"{percent(rest, total)} in {len(counted) - MOST_PARTS} smaller parts"]


def path_words(share: PathShare) -> str:
    """What a path is, in words."""
    order = {1: ", single", 2: ", two and more"}.get(share.order, "")
    return f"{share.path}{order}"


def percent(part: float, whole: float) -> str:
    """A share as a percentage with two digits where it is small."""
    share = 100.0 * part / whole if whole > 0.0 else 0.0
    if 0.0 < share < 0.1:
        return "< 0.1 %"
    return f"{share:.0f} %" if share >= 9.5 else f"{share:.2g} %"


def fraction(goal: GoalResult) -> str:
    """A figure over its goal, two digits."""
    return "< 0.001" if goal.fraction < 1e-3 else significant(goal.fraction)
