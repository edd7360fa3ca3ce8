"""Design goals as text: ``6 mSv/year``, ``20 uSv in an hour``, ``7.5 uSv/h``, ``7.5 uSv/h over 8 h``."""

from __future__ import annotations

import re

from scatterbay.scenario.parts import Goal
from scatterbay.units import TextError, read
from scatterbay.units.expression import plain

_FORMS = (
    "a goal is '7.5 uSv/h' (at any moment), '20 uSv in an hour', '7.5 uSv/h over 8 h' (8 h average), "
    "'0.1 mSv/week' or '6 mSv/year'; Gy for air kerma, Sv for ambient dose equivalent"
)
_IN = re.compile(r"(?P<amount>.+?)\s+in\s+(?P<base>.+)")
_OVER = re.compile(r"(?P<amount>.+?)\s+over\s+(?P<base>.+)")
_BASES = {
    f"{article} {unit}": unit
    for article in ("a", "an", "any", "any one", "one", "1", "the worst", "each")
    for unit in ("hour", "week", "year")
} | {"1 h": "hour", "8 h": "day", "8 hours": "day", "any 8 h": "day"}
_EIGHT_HOURS = 8 * 3600.0
_DOSES = ("ambient dose equivalent", "air kerma")


def goal(text: str) -> Goal:
    """The design goal that a text states.

    Raises
    ------
    TextError : none of the forms, a wrong unit, a value that is not above zero.
    """
    ready = plain(text).strip()
    match = _OVER.fullmatch(ready)
    if match:
        if match["base"] not in ("8 h", "8 hours"):
            raise TextError(f"'{text}': an average is taken over 8 h", _FORMS, match.start("base"))
        return _goal("day", match["amount"], text, [f"{dose} rate" for dose in _DOSES])
    match = _IN.fullmatch(ready)
    if match:
        base = _BASES.get(match["base"])
        if base is None:
            raise TextError(f"'{match['base']}' is not a time base", _FORMS, match.start("base"))
        return _goal(base, match["amount"], text, list(_DOSES))
    kinds = [f"{dose} {base}" for base in ("rate", "per week", "per year") for dose in _DOSES]
    return _goal("", ready, text, kinds)


def _goal(base: str, amount: str, text: str, kinds: list[str]) -> Goal:
    try:
        found = read(amount, *kinds)
    except TextError as problem:
        why, example, _ = problem.hint.partition("for example")
        hint = why + _FORMS if example else problem.hint
        raise TextError(problem.message, hint, problem.start) from None
    if found.value <= 0.0:
        raise TextError(f"'{text}': a goal must be above zero", _FORMS)
    if found.tolerance:
        raise TextError(f"'{text}': a goal has no tolerance", _FORMS)
    quantity = next(dose for dose in _DOSES if found.kind.startswith(dose))
    in_eight_hours = base == "day" and not found.kind.endswith("rate")
    value = found.value / _EIGHT_HOURS if in_eight_hours else found.value
    time_base = base or found.kind.removeprefix(quantity).replace(" per ", "").strip()
    return Goal(time_base, quantity, value, text.strip())
