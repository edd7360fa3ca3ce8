"""Figures stated at a distance, brought to 1 m by the inverse square: leakage and tube output."""

from __future__ import annotations

import re
from dataclasses import replace

from scatterbay.scenario.parts import Leakage
from scatterbay.units import Quantity, TextError, read
from scatterbay.units.expression import plain

_TOLERANCE = re.compile(r"\+\s*/?\s*-|±")
_AT = re.compile(r"(?P<figure>.+?)\s+at\s+(?P<distance>.+)")


_FACTORS = re.compile(r"(?P<rate>.+)\s+at\s+(?P<voltage>[^,]*V)\s*,\s*(?P<current>.+)")


def leakage(text: str) -> Leakage:
    """Leakage from ``5 mGy/h at 1 m``, or with its technique factors, ``1 mGy/h at 1 m at 150 kV, 3.3 mA``.

    The housing's material is left empty.

    Raises
    ------
    TextError : no distance, a wrong unit, a value that is not above zero, one technique factor without the other.
    """
    ready = plain(text).strip()
    match = _FACTORS.fullmatch(ready)
    if match is None:
        if re.search(r"\d\s*k?V", ready) or re.search(r"\d\s*[um]?A\b", ready):
            hint = "write '1 mGy/h at 1 m at 150 kV, 3.3 mA' (the current it may run at continuously)"
            raise TextError(f"'{text}' does not give both leakage technique factors", hint)
        return Leakage(leakage_rate(ready), "")
    voltage = _above_zero(match["voltage"], match.start("voltage"), "voltage")
    current = _above_zero(match["current"], match.start("current"), "current")
    return Leakage(replace(leakage_rate(match["rate"]), text=text.strip()), "", voltage, current)


def leakage_rate(text: str, example: str = "5 mGy/h at 1 m") -> Quantity:
    """A dose rate at 1 m from ``5 mGy/h at 1 m``: an air kerma rate or an ambient dose equivalent rate.

    Raises
    ------
    TextError : no distance, a wrong unit, a value that is not above zero.
    """
    example = f"say where: '{example}' (or in Sv), or 'none'"
    figure, distance, start = _parts(text)
    rate = _above_zero(figure, 0, "air kerma rate", "ambient dose equivalent rate")
    if distance is None:
        raise TextError(f"'{text}' has no distance", example)
    return _at_one_metre(rate, distance, start, text)


def tube_output(text: str) -> Quantity:
    """Tube output at 1 m [Gy m2/C] from ``9.8 mGy m2/(mA min)`` or ``0.05 mGy/(mA s) at 1 m``.

    Raises
    ------
    TextError : a wrong unit, a missing or needless distance, a value that is not above zero.
    """
    figure, distance, start = _parts(text)
    output = _above_zero(figure, 0, "tube output", "air kerma per charge")
    if output.kind == "tube output":
        if distance is not None:
            raise TextError(
                f"'{text}': an output in m2 needs no distance", "leave out the distance, or the m2", start
            )
        return replace(output, text=text.strip())
    if distance is None:
        raise TextError(f"'{text}' has no distance", "say where: '0.05 mGy/(mA s) at 1 m'")
    return replace(_at_one_metre(output, distance, start, text), kind="tube output")


def _parts(text: str) -> tuple[str, str | None, int]:
    """Figure, distance (None if not given), and where the distance starts; a tolerance may follow either."""
    ready = plain(text).strip()
    match = _AT.fullmatch(ready)
    if match is None:
        return ready, None, 0
    mark = _TOLERANCE.search(match["distance"])
    end = mark.start() if mark else len(match["distance"])
    distance, tolerance = match["distance"][:end], match["distance"][end:]
    return f"{match['figure']} {tolerance}".strip(), distance.strip(), match.start("distance")


def _above_zero(text: str, start: int, *kinds: str) -> Quantity:
    try:
        found = read(text, *kinds)
    except TextError as problem:
        raise problem.moved(start) from None
    if found.value <= 0.0:
        raise TextError(f"'{text}' must be above zero", "", start)
    return found


def _at_one_metre(figure: Quantity, distance: str, start: int, text: str) -> Quantity:
    metres = _above_zero(distance, start, "length").value
    square = metres * metres
    return replace(
        figure, value=figure.value * square, tolerance=figure.tolerance * square, text=text.strip()
    )
