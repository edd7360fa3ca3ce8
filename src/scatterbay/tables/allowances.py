"""Model allowances per path, with their reasons."""

from __future__ import annotations

from functools import cache
from typing import NamedTuple

from scatterbay.tables.files import read_table


class Allowance(NamedTuple):
    """The truth is taken to lie between (1 - low) and (1 + high) times the estimate."""

    low: float
    high: float
    reason: str


@cache
def allowances() -> dict[tuple[str, str], Allowance]:
    """Allowance by path (primary, scatter, leakage, collimator, stored, travel) and by what is behind."""
    table = read_table("allowances.csv", ("path", "behind", "low", "high", "reason"))
    keys = zip(table.texts("path"), table.texts("behind"), strict=True)
    values = zip(table.numbers("low"), table.numbers("high"), table.texts("reason"), strict=True)
    return {key: Allowance(*value) for key, value in zip(keys, values, strict=True)}
