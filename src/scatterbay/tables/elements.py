"""Elements: symbols and atomic weights."""

from __future__ import annotations

from functools import cache

from scatterbay.errors import OutOfRangeError
from scatterbay.tables.files import Table, read_table

HIGHEST_Z = 92


def _table() -> Table:
    return read_table("elements.csv", ("z", "symbol", "name", "atomic_weight"))


@cache
def symbols() -> tuple[str, ...]:
    """Symbols of the elements from Z = 1 to 92, in order."""
    return tuple(_table().texts("symbol"))


@cache
def atomic_number(symbol: str) -> int:
    """Atomic number Z of an element from its symbol.

    Raises
    ------
    OutOfRangeError : no such element between hydrogen and uranium.
    """
    if symbol not in symbols():
        raise OutOfRangeError(f"'{symbol}' is not the symbol of an element from H to U")
    return symbols().index(symbol) + 1


@cache
def atomic_weight(z: int) -> float:
    """Atomic weight [g/mol] of the element with atomic number z (1 to 92)."""
    return _table().numbers("atomic_weight")[z - 1]
