"""What plan-review rules ask a submission to show."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

from scatterbay.tables.files import read_table


@dataclass(frozen=True)
class ReviewItem:
    """An item of a plan review: what the program looks for, the item in words, and who asks for it."""

    key: str
    item: str
    asked_by: str


@cache
def review_items() -> tuple[ReviewItem, ...]:
    """Every item, in the order of the table."""
    return tuple(ReviewItem(*row) for row in read_table("checklist.csv", ("key", "item", "asked_by")).rows)
