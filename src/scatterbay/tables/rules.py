"""Rule sets as they are often quoted: goals as text, what each was stated as, and its source."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

from scatterbay.tables.files import read_table

COLUMNS = ("rule_set", "entry", "area", "goal", "stated", "averaging", "source")


@dataclass(frozen=True)
class Rule:
    """One goal of an entry of a rule set.

    ``area``: controlled, supervised or public: where the entry is used. ``goal``: as a scenario writes it.
    ``stated``: the quantity of the rule itself. ``averaging``: over what the rule takes it.
    """

    rule_set: str
    entry: str
    area: str
    goal: str
    stated: str
    averaging: str
    source: str


@cache
def rules() -> dict[tuple[str, str], tuple[Rule, ...]]:
    """The goals of every entry, by rule set and entry, in the order of the table."""
    found: dict[tuple[str, str], tuple[Rule, ...]] = {}
    for row in read_table("rules.csv", COLUMNS).rows:
        rule = Rule(*row)
        key = (rule.rule_set, rule.entry)
        found[key] = (*found.get(key, ()), rule)
    return found
