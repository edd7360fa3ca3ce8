"""Counts as text: ``40/week``, ``4 cycles``, ``8 patients``; and collimators."""

from __future__ import annotations

import re
from collections.abc import Collection

from scatterbay.scenario.make_ups import check_material, one_layer
from scatterbay.scenario.parts import Collimator
from scatterbay.units import Quantity, TextError, read, read_number

COUNTED = ("cycles", "exposures", "patients")
COLLIMATOR = "tungsten"
_PER_WEEK = re.compile(r"(?P<count>[-+.\deE]+)\s*(?:(?:cycles|exposures|patients)\s*)?/\s*week")
_COUNT = re.compile(r"(?P<count>[-+.\deE]+)\s*(?P<what>cycles?|exposures?|patients?)")


def per_week(text: str) -> Quantity:
    """A number per week, of kind ``count per week``, from ``40/week`` or ``40 cycles/week``.

    Raises
    ------
    TextError : anything else, or not above zero.
    """
    match = _PER_WEEK.fullmatch(text.strip())
    if match is None:
        raise TextError(f"'{text}' is not a number per week", "write for example '40/week'")
    return Quantity(_positive(match["count"], text), 0.0, "count per week", text.strip())


def amount(text: str) -> Quantity:
    """What falls in the worst hour or day: a time, a charge, a kerma-area product, or a number of things.

    A number has kind ``cycles``, ``exposures`` or ``patients``.

    Raises
    ------
    TextError : none of these, or not above zero.
    """
    match = _COUNT.fullmatch(text.strip())
    if match is None:
        found = read(text, "time", "charge", "kerma-area product")
        if found.value <= 0.0:
            raise TextError(f"'{text}' must be above zero")
        return found
    what = match["what"].rstrip("s") + "s"
    return Quantity(_positive(match["count"], text), 0.0, what, text.strip())


def collimator(text: str, materials: Collection[str] = ()) -> Collimator:
    """A collimator from ``tungsten 20 mm``, ``1/200`` or ``tungsten, 1/200``.

    Raises
    ------
    TextError : none of these; a transmission that is not above 0 and below 1.
    """
    name, comma, rest = text.partition(",")
    hint = (
        "write 'tungsten 20 mm' (material and thickness), or its transmission as '1/200' or 'tungsten, 1/200'"
    )
    if comma or re.fullmatch(r"[-+.\deE/ %]+", text.strip()):
        figure = rest if comma else text
        material = check_material(name.strip(), materials) if comma else COLLIMATOR
        share = read_number(figure.strip(), hint)
        if not 0.0 < share < 1.0:
            raise TextError(f"'{figure.strip()}' is not a transmission above 0 and below 1", hint)
        return Collimator(material, transmission=share)
    layer = one_layer(text, materials)
    return Collimator(layer.material, thickness=layer.thickness)


def _positive(number: str, text: str) -> float:
    value = read_number(number, "write for example '40/week'")
    if not value > 0.0:
        raise TextError(f"'{text}' must be above zero")
    return value
