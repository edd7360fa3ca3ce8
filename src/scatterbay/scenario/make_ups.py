"""Wall make-ups as text: ``gypsum board 12.5 mm + lead 1.5 mm``, from the inside to the outside."""

from __future__ import annotations

import re
from collections.abc import Collection

from scatterbay.scenario.known import other_names, shipped_names
from scatterbay.scenario.parts import Layer, MakeUp
from scatterbay.units import Quantity, TextError, nearest, read
from scatterbay.units.expression import plain

THICKEST = 5.0
"""Thickest layer that is believed [m]; more is a slip of the unit."""

_STARTS_NUMBER = frozenset("+-.0123456789")
_PLUS = re.compile(r"(?<![0-9][eE])\+(?!\s*/?\s*-)")
_LAYER = re.compile(r"(?P<name>\D*?)\s*(?P<amount>[-+]?[.\d].*)", re.ASCII | re.DOTALL)
_THICKNESS_FIRST = re.compile(
    r"(?P<amount>[-+]?[.\d][\d./]*\s*(?:mm|cm|m|in|ft|inch|inches))\s+(?P<name>[A-Za-z].*)", re.ASCII
)


def make_up(text: str, materials: Collection[str] = (), open_allowed: bool = True) -> MakeUp:
    """The make-up that a text describes.

    Parameters
    ----------
    text : layers joined by ``+``, each a material and a thickness, or ``open``.
    materials : names known beside the shipped ones.
    open_allowed : whether ``open`` makes sense here.

    Raises
    ------
    TextError : unknown material, missing or impossible thickness.
    """
    if text.strip() == "open":
        if not open_allowed:
            raise TextError("'open' makes no sense here", "name the layers, for example 'concrete 200 mm'")
        return MakeUp((), "open")
    ready = plain(text)
    layers: list[Layer] = []
    start = 0
    for end in [*(match.start() for match in _PLUS.finditer(ready)), len(ready)]:
        part = text[start:end]
        indent = len(part) - len(part.lstrip())
        try:
            layers.append(_layer(part.strip(), materials))
        except TextError as problem:
            raise problem.moved(start + indent) from None
        start = end + 1
    return MakeUp(tuple(layers), text.strip())


def one_layer(text: str, materials: Collection[str] = ()) -> Layer:
    """The single layer that a text describes, such as ``aluminium 3.2 mm``."""
    found = make_up(text, materials, open_allowed=False)
    if len(found.layers) != 1:
        raise TextError(
            f"'{text}' is more than one layer", "one material and a thickness, as 'aluminium 3.2 mm'"
        )
    return found.layers[0]


def check_material(name: str, materials: Collection[str] = ()) -> str:
    """The name, if it is a known material's.

    Raises
    ------
    TextError : it is not; the nearest name is suggested.
    """
    shipped = (*shipped_names(), *other_names())
    if name in materials or name in shipped:
        return name
    near = nearest(name, [*materials, *shipped])
    hint = f"did you mean '{near}'? " if near else ""
    listed = f"known: {', '.join([*materials, *shipped_names()])}; or define it under 'materials'"
    raise TextError(f"'{name}' is not a known material", hint + listed)


def _layer(part: str, materials: Collection[str]) -> Layer:
    if not part:
        raise TextError("a layer is missing", "join layers with one '+', as 'concrete 300 mm + lead 2 mm'")
    name, amount, start = _split(part, materials)
    check_material(name, materials)
    try:
        thickness = read(amount, "length")
    except TextError as problem:
        raise problem.moved(start) from None
    _check_thickness(thickness, start)
    return Layer(name, thickness)


def _split(part: str, materials: Collection[str]) -> tuple[str, str, int]:
    """Material, thickness text, and where that text starts. Defined names may hold digits."""
    for known in sorted(materials, key=len, reverse=True):
        rest = part[len(known) :]
        if part.startswith(known) and rest[:1].isspace() and rest.strip()[:1] in _STARTS_NUMBER:
            return known, rest.strip(), len(part) - len(rest.lstrip())
    turned = _THICKNESS_FIRST.fullmatch(part)
    if turned:
        hint = f"write '{turned['name']} {turned['amount']}'"
        raise TextError(f"'{part}': the material comes first", hint)
    match = _LAYER.fullmatch(part)
    if match is None:
        check_material(part, materials)
        raise TextError(f"'{part}' has no thickness", f"write for example '{part} 2 mm'")
    if not match["name"]:
        raise TextError(f"'{part}' names no material", f"write for example 'lead {part}'")
    return " ".join(match["name"].split()), match["amount"], match.start("amount")


def _check_thickness(thickness: Quantity, start: int) -> None:
    if thickness.value <= 0.0:
        raise TextError(f"'{thickness.text}': a thickness must be above zero", "leave the layer out", start)
    if thickness.value > THICKEST:
        hint = f"no layer is thicker than {THICKEST:g} m; check the unit"
        raise TextError(f"'{thickness.text}' is not a believable thickness", hint, start)
    if thickness.tolerance >= thickness.value:
        raise TextError(
            f"'{thickness.text}': the tolerance is as large as the thickness", "check the unit", start
        )
