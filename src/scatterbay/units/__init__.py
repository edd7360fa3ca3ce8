"""Quantities with units: read from text against a closed table of our own, and printed again.

Base units: m, s, keV, kV, A, C (= A s), Bq, Gy (air kerma), Sv (ambient dose equivalent), rad (angle),
kg/m3, week and year (which stay apart from seconds, so that a goal per year is never taken for a rate).
"""

from __future__ import annotations

from scatterbay.units.kinds import KINDS, WEEK_SECONDS, YEAR_WEEKS, Kind
from scatterbay.units.problem import TextError, nearest
from scatterbay.units.quantity import Quantity, read, read_number
from scatterbay.units.show import choose_unit, factor_of, format_quantity, significant

__all__ = [
    "KINDS",
    "WEEK_SECONDS",
    "YEAR_WEEKS",
    "Kind",
    "Quantity",
    "TextError",
    "choose_unit",
    "factor_of",
    "format_quantity",
    "nearest",
    "read",
    "read_number",
    "significant",
]
