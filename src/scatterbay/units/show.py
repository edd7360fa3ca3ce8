"""Prints base values in units that people read."""

from __future__ import annotations

import math
from functools import cache

from scatterbay.units.expression import parse_unit
from scatterbay.units.kinds import KINDS


def significant(value: float, digits: int = 2) -> str:
    """A number with so many significant digits: ``8.3``, ``120``, ``0.012``, ``1.2e-07``.

    Raises
    ------
    ValueError : the value is not finite.
    """
    if not math.isfinite(value):
        raise ValueError(f"{value} cannot be printed as a quantity")
    if value == 0.0:
        return "0"
    scientific = f"{value:.{digits - 1}e}"
    exponent = int(scientific.split("e")[1])
    if not -4 <= exponent < max(6, digits):
        return scientific
    return f"{float(scientific):.{max(digits - 1 - exponent, 0)}f}"


@cache
def factor_of(unit: str) -> float:
    """Size of a unit, such as ``uSv/h``, in base units; ``value / factor_of(unit)`` is what to print."""
    return parse_unit(unit).factor if unit else 1.0


def choose_unit(value: float, kind: str, digits: int = 2) -> str:
    """The largest unit of the kind in which the value as printed is 1 or more, else the smallest."""
    units = KINDS[kind].shown
    if value == 0.0:
        return KINDS[kind].example_unit if KINDS[kind].example_unit in units else units[0]
    fitting = [unit for unit in units if abs(float(significant(value / factor_of(unit), digits))) >= 1.0]
    return max(fitting, key=factor_of, default=units[0])


def format_quantity(value: float, kind: str, digits: int = 2) -> str:
    """A base value as text, in a unit that suits its size: 2.3e-9 Sv/s is ``8.3 uSv/h``.

    Parameters
    ----------
    value : size [base unit of the kind], finite.
    kind : a key of ``KINDS``.
    digits : significant digits.
    """
    unit = choose_unit(value, kind, digits)
    return f"{significant(value / factor_of(unit), digits)} {unit}".strip()
