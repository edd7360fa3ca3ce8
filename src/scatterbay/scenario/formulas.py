"""Chemical formulas turned into mass fractions."""

from __future__ import annotations

import re

from scatterbay.scenario.known import atomic_weight, element_symbols
from scatterbay.units import TextError

_SYMBOL = re.compile(r"[A-Z][a-z]?")
_COUNT = re.compile(r"[0-9]+(?:\.[0-9]+)?")
_HINT = "write symbols and counts, water of crystallisation in parentheses: CaSO4(H2O)2"
_LONGEST = 200


def mass_fractions(formula: str) -> dict[str, float]:
    """Mass fractions by element symbol of a formula such as ``CaSO4(H2O)2``; they sum to 1.

    Raises
    ------
    TextError : not a formula, or an element the tables do not hold.
    """
    text = formula.strip()
    if not text or len(text) > _LONGEST:
        raise TextError("a formula is missing" if not text else "a formula this long is not believed", _HINT)
    atoms, end = _group(text, 0, 0)
    if end < len(text):
        raise TextError(f"'{text[end]}' cannot stand in a formula", _HINT, end)
    weights = {symbol: count * atomic_weight(symbol) for symbol, count in atoms.items()}
    total = sum(weights.values())
    return {symbol: weight / total for symbol, weight in weights.items()}


def _group(text: str, at: int, depth: int) -> tuple[dict[str, float], int]:
    """Atoms from ``at`` to the end of the group, and where that is."""
    atoms: dict[str, float] = {}
    while at < len(text):
        if text[at] == "(" and depth < 5:
            inside, at = _group(text, at + 1, depth + 1)
            if text[at : at + 1] != ")":
                raise TextError(f"'{text}': a parenthesis is not closed", _HINT, at)
            at += 1
        else:
            match = _SYMBOL.match(text, at)
            if match is None:
                break
            inside, at = {_element(match[0], at): 1.0}, match.end()
        count, at = _count(text, at)
        for symbol, number in inside.items():
            atoms[symbol] = atoms.get(symbol, 0.0) + number * count
    if not atoms:
        raise TextError(f"'{text}' is not a formula", _HINT, at)
    return atoms, at


def _count(text: str, at: int) -> tuple[float, int]:
    match = _COUNT.match(text, at)
    if match is None:
        return 1.0, at
    if not 0.0 < float(match[0]) < 1e6:
        raise TextError(f"'{match[0]}' is not a believable number of atoms", _HINT, at)
    return float(match[0]), match.end()


def _element(symbol: str, at: int) -> str:
    if symbol not in element_symbols():
        raise TextError(f"'{symbol}' is not the symbol of an element the tables hold", "H to U", at)
    return symbol
