"""What is sold under a name: the layers a stock item counts as, as text, with its source."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

from scatterbay.tables.files import read_table


@dataclass(frozen=True)
class StockItem:
    """A stock item: name, make-up as a scenario would write it (nominal, with tolerance), and its source."""

    name: str
    make_up: str
    source: str


@cache
def items() -> dict[str, StockItem]:
    """Stock items by name, in the order of the table."""
    table = read_table("stock.csv", ("name", "make_up", "source"))
    return {row[0]: StockItem(*row) for row in table.rows}
