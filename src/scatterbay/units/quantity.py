"""A quantity as a person writes it: a number, a unit, perhaps a tolerance."""

from __future__ import annotations

import math
import re
from dataclasses import dataclass
from itertools import pairwise

from scatterbay.units.expression import parse_unit, plain
from scatterbay.units.kinds import KINDS, Kind, kind_of
from scatterbay.units.problem import TextError
from scatterbay.units.table import NONE, REFUSED, Dims, Unit, dims

_NUMBER = r"[+-]?(?:(?:\d+\s+)?\d+/\d+|(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)"
_AMOUNT = re.compile(rf"\s*(?P<number>{_NUMBER})(?P<unit>.*?)(?=\s+[+-]?\.?\d|$)", re.ASCII)
_PLAIN_NUMBER = re.compile(rf"\s*(?P<number>{_NUMBER})\s*(?P<percent>%?)\s*", re.ASCII)
_TOLERANCE = re.compile(r"\+\s*/?\s*-|±")
_COMMA = re.compile(r"\d,\d")
_ADDS_UP = (dims(m=1), dims(s=1))


@dataclass(frozen=True)
class Quantity:
    """A quantity in its base unit.

    Parameters
    ----------
    value : size [base unit of the kind].
    tolerance : half-width of the range it may lie in [base unit of the kind], 0 if none was given.
    kind : name of the kind, a key of ``KINDS``.
    text : as the author wrote it.
    """

    value: float
    tolerance: float
    kind: str
    text: str


def read(text: str, *kinds: str) -> Quantity:
    """The quantity that a text states, which must be of one of the kinds named.

    ``300 mm``, ``5 ft 6 in``, ``5/8 in``, ``300 mm +/- 10 mm``, ``9.8 mGy m2/(mA min) ± 8 %``.

    Raises
    ------
    TextError : no unit, a wrong, unknown or refused unit, a number that cannot be read.
    """
    wanted = tuple(KINDS[name] for name in kinds)
    ready = plain(text)
    comma = _COMMA.search(ready)
    if comma:
        hint = "write a decimal point, and no separator between thousands"
        raise TextError(f"'{text}': a comma cannot stand in a number", hint, comma.start() + 1)
    parts = _TOLERANCE.split(ready)
    marks = list(_TOLERANCE.finditer(ready))
    if len(parts) > 2:
        raise TextError(f"'{text}' has two tolerances", "give one", marks[1].start())
    shared = _shared_unit(parts)
    value, unit = _amount(parts[0], text, wanted, shared)
    kind = _kind_for(unit, text, wanted)
    tolerance = 0.0 if len(parts) == 1 else _half_width(parts[1], text, value, kind, marks[0].end())
    return Quantity(value, tolerance, kind.name, text.strip())


def read_number(text: str, hint: str = "") -> float:
    """A plain number from text: ``0.25``, ``1/4``, ``25 %``.

    Raises
    ------
    TextError : anything else, a unit for example.
    """
    match = _PLAIN_NUMBER.fullmatch(plain(text))
    if match is None:
        raise TextError(f"'{text}' is not a plain number", hint)
    value = _number(match["number"], text, 0)
    return value / 100.0 if match["percent"] else value


def _shared_unit(parts: list[str]) -> str:
    """The tolerance's unit where only the tolerance has one (``300 +/- 10 mm``), else nothing."""
    if len(parts) < 2:
        return ""
    match = _AMOUNT.match(parts[1])
    unit = match["unit"].strip() if match else ""
    return "" if unit == "%" else unit


def _amount(part: str, text: str, wanted: tuple[Kind, ...], shared: str) -> tuple[float, Unit]:
    """Value [base unit] and unit of ``12 ft``, ``5 ft 6 in`` or, where a unit is shared, ``300``."""
    found: list[tuple[float, Unit]] = []
    at = 0
    while part[at:].strip() or not found:
        match = _AMOUNT.match(part, at)
        if match is None:
            raise TextError(f"'{text}' does not start with a number", _example(wanted), at)
        unit_text = match["unit"] if match["unit"].strip() else shared
        if not unit_text.strip():
            raise _no_unit(
                match["number"], text, wanted, match.start("number"), bool(part[match.end() :].strip())
            )
        try:
            unit = parse_unit(unit_text)
        except TextError as problem:
            raise problem.moved(match.start("unit")) from None
        found.append((_number(match["number"], text, match.start("number")) * unit.factor, unit))
        at = match.end()
    _check_sum(found, text)
    total = sum(value for value, _ in found)
    if not math.isfinite(total):
        raise TextError(f"'{text}' is not a finite quantity")
    return total, found[0][1]


def _number(text: str, whole: str, start: int) -> float:
    """The number in a text such as ``12.5``, ``5/8`` or ``1 1/2``."""
    sign = -1.0 if text.startswith("-") else 1.0
    value = 0.0
    for part in text.lstrip("+-").split():
        top, _, bottom = part.partition("/")
        if bottom and float(bottom) == 0.0:
            raise TextError(f"'{whole}' divides by zero", "", start)
        value += float(top) / float(bottom or "1")
    if not math.isfinite(value):
        raise TextError(f"'{text}' is not a finite number", "", start)
    return sign * value


def _check_sum(found: list[tuple[float, Unit]], text: str) -> None:
    """Several amounts must be feet and inches, or hours and minutes, in falling order."""
    for (first, above), (second, below) in pairwise(found):
        same = above.dims == below.dims and above.dims in _ADDS_UP
        if not (same and above.factor > below.factor and first >= 0.0 and second >= 0.0):
            hint = "only feet and inches, or hours, minutes and seconds, are added up"
            raise TextError(f"'{text}' holds more than one quantity", hint)


def _kind_for(unit: Unit, text: str, wanted: tuple[Kind, ...]) -> Kind:
    for kind in wanted:
        if kind.dims == unit.dims:
            return kind
    found = kind_of(unit.dims)
    named = found.article if found else "nothing that is needed here"
    if found and found.dims == NONE:
        named = "a plain number"
    names = " or ".join(kind.article for kind in wanted)
    needed = f"where {names} is needed" if len(wanted) < 3 else "which is not what is needed here"
    why = _why_not(unit.dims, wanted)
    hint = f"{why}; {_example(wanted)}" if why else _example(wanted)
    raise TextError(f"'{text}' is {named}, {needed}", hint)


def _why_not(found: Dims, wanted: tuple[Kind, ...]) -> str:
    """The reason behind a confusion people often make, or nothing."""
    gray, sievert = (dims(Gy=1).index(1), dims(Sv=1).index(1))
    grays, sieverts = (any(kind.dims[base] for kind in wanted) for base in (gray, sievert))
    if found[gray] and sieverts and not grays:
        return "Gy is air kerma and Sv is dose equivalent: they are not the same number"
    if found[sievert] and grays and not sieverts:
        return "Sv is dose equivalent and Gy is air kerma: they are not the same number"
    angle, week, year = (dims(rad=1).index(1), dims(week=1).index(1), dims(year=1).index(1))
    if found[angle] and (grays or sieverts):
        return "; ".join(REFUSED["rad as dose"])
    if (found[week] or found[year]) and not any(kind.dims[week] or kind.dims[year] for kind in wanted):
        return "an amount per week or year is not a rate at a moment"
    if any(kind.dims[week] for kind in wanted) and not found[week]:
        return "say per week"
    if found == dims(keV=1) and any(kind.dims == dims(kV=1) for kind in wanted):
        return "a tube is set in kV; keV is the energy of one photon"
    return ""


def _half_width(part: str, text: str, value: float, kind: Kind, offset: int) -> float:
    match = _AMOUNT.fullmatch(part.rstrip())
    if match is None:
        raise TextError(f"'{text}': the tolerance cannot be read", "write +/- 10 mm or +/- 8 %", offset)
    size = _number(match["number"], text, offset)
    if not match["unit"].strip():
        raise TextError(
            f"'{text}': the tolerance has no unit",
            f"write +/- {match['number']} {kind.example_unit} or %",
            offset,
        )
    try:
        unit = parse_unit(match["unit"])
    except TextError as problem:
        raise problem.moved(offset + match.start("unit")) from None
    if size < 0.0:
        raise TextError(f"'{text}': a tolerance cannot be negative", "", offset)
    if unit.dims == NONE:
        return abs(value) * size * unit.factor
    if unit.dims != kind.dims:
        raise TextError(
            f"'{text}': the tolerance is not {kind.article}", "give it in the same kind of unit", offset
        )
    return size * unit.factor


def _no_unit(number: str, text: str, wanted: tuple[Kind, ...], start: int, more: bool) -> TextError:
    if more:
        return TextError(f"'{text}': two numbers in a row", "write numbers without spaces in them", start)
    units = " or ".join(f"'{number} {kind.example_unit}'" for kind in wanted)
    return TextError(f"'{text}' has no unit", f"give a unit, for example {units}", start)


def _example(wanted: tuple[Kind, ...]) -> str:
    return "for example " + " or ".join(f"'{kind.example}'" for kind in wanted)
