"""Wall make-ups as text: ``gypsum board 12.5 mm + lead code 4``, from the inside to the outside.

A layer is a material and an amount (``amounts.py``), or a stock item by its name alone.
"""

from __future__ import annotations

import re
from collections.abc import Collection
from dataclasses import replace
from difflib import SequenceMatcher

from scatterbay.scenario import amounts
from scatterbay.scenario.known import Known, known, other_names, shipped_names
from scatterbay.scenario.least import least_notes as least_notes
from scatterbay.scenario.parts import Layer, MakeUp
from scatterbay.units import TextError, nearest
from scatterbay.units.expression import plain

MOST_LAYERS = 60
"""Most layers of one make-up: a few stock items that name each other could make millions."""

_STARTS_NUMBER = frozenset("+-.0123456789")
_PLUS = re.compile(r"(?<![0-9][eE])\+(?!\s*/?\s*-)")
_LAYER = re.compile(r"(?P<name>\D*?)\s*(?P<amount>[-+]?[.\d].*)", re.ASCII | re.DOTALL)
_THICKNESS_FIRST = re.compile(
    r"(?P<amount>[-+]?[.\d][\d./]*\s*(?:mm|cm|m|in|ft|inch|inches))\s+(?P<name>[A-Za-z].*)", re.ASCII
)
_NOMINAL = re.compile(r"\s+at\s+nominal$")
_ALIKE = 0.85
"""How much a layer that cannot be read must look like a stock item for that to be suggested."""


def make_up(text: str, materials: Collection[str] = (), open_allowed: bool = True) -> MakeUp:
    """The make-up that a text describes.

    Parameters
    ----------
    text : layers joined by ``+``, each a material with an amount or a stock item, or ``open``. ``at nominal``
        behind a layer makes it count at its nominal thickness and density.
    materials : names known beside the shipped ones; a ``Known`` brings stock items as well.
    open_allowed : whether ``open`` makes sense here.

    Raises
    ------
    TextError : unknown material or stock item, missing or impossible amount.
    """
    if text.strip() == "open":
        if not open_allowed:
            raise TextError("'open' makes no sense here", "name the layers, for example 'concrete 200 mm'")
        return MakeUp((), "open")
    return MakeUp(_read(text, known(materials)), text.strip())


def one_layer(text: str, materials: Collection[str] = ()) -> Layer:
    """The single layer that a text describes, such as ``aluminium 3.2 mm``: a plain thickness."""
    found = filtration(text, materials)
    if len(found.layers) != 1:
        raise TextError(
            f"'{text}' is more than one layer", "one material and a thickness, as 'aluminium 3.2 mm'"
        )
    return found.layers[0]


def filtration(text: str, materials: Collection[str] = ()) -> MakeUp:
    """Layers in a beam at its source, each a plain thickness.

    A filter that counts thin is not protective everywhere, so what is made to count at its least in a wall is
    refused here.

    Raises
    ------
    TextError : as for ``make_up``; and a stock item, varying thickness, stated density or lead equivalent.
    """
    found = make_up(text, materials, open_allowed=False)
    for layer in found.layers:
        walls_only = layer.bought_as or layer.density or layer.equivalent
        if walls_only or amounts.varies(layer):
            said = layer.bought_as or layer.thickness.text
            raise TextError(
                f"'{said}' is for walls", "a filter is a material and a thickness, as 'aluminium 3 mm'"
            )
    return found


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


def check_stock_name(name: str, materials: Collection[str] = ()) -> str:
    """The name, if a stock item that the scenario defines can go by it.

    Raises
    ------
    TextError : it is a material, reads as a layer of one, or holds what joins layers.
    """
    if name in materials or name in (*shipped_names(), *other_names()):
        raise TextError(f"'{name}' is a material", "give the stock item a name of its own")
    if "+" in name or not name[:1].isalpha() or name == "open" or _NOMINAL.search(name):
        raise TextError(f"'{name}' cannot name a stock item", "start with a letter and do without '+'")
    try:
        _material_layer(" ".join(name.split()), Known(tuple(materials)))
    except TextError:
        return name
    raise TextError(f"'{name}' is a layer by itself", "give the stock item a name that is not one")


def _read(text: str, names: Known) -> tuple[Layer, ...]:
    """The layers of a text; ``names`` holds every stock item there is."""
    ready = plain(text)
    layers: list[Layer] = []
    start = 0
    for end in [*(match.start() for match in _PLUS.finditer(ready)), len(ready)]:
        part = text[start:end]
        indent = len(part) - len(part.lstrip())
        try:
            layers += _part(part.strip(), names)
        except TextError as problem:
            raise problem.moved(start + indent) from None
        if len(layers) > MOST_LAYERS:
            raise TextError(
                f"more than {MOST_LAYERS} layers", "a wall has a few; check the stock items", start
            )
        start = end + 1
    return tuple(layers)


def _part(part: str, names: Known) -> tuple[Layer, ...]:
    """What stands between two ``+``: the layers of a stock item, or one layer."""
    if not part:
        raise TextError("a layer is missing", "join layers with one '+', as 'concrete 300 mm + lead 2 mm'")
    nominal = _NOMINAL.search(plain(part))
    said = part[: nominal.start()] if nominal else part
    item = " ".join(said.split())
    layers = _bought(item, names) if item in names.stock else (_material_layer(said, names),)
    if nominal and any(amounts.varies(layer) for layer in layers):
        hint = "it counts at its least; to count more, state the thickness that is everywhere there"
        raise TextError(f"'{said}' varies and has no nominal thickness", hint)
    return tuple(replace(layer, at_nominal=True) for layer in layers) if nominal else layers


def _bought(item: str, names: Known) -> tuple[Layer, ...]:
    """The layers of a stock item. Within them its own name means nothing, so that none can hold itself."""
    try:
        layers = _read(names.stock[item], names.without(item))
    except TextError as problem:
        message = f"stock item '{item}': {problem.message}"
        raise TextError(message, problem.hint, outside_model=problem.outside_model) from None
    return tuple(replace(layer, bought_as=item) for layer in layers)


def _material_layer(part: str, names: Known) -> Layer:
    """One layer: a material and its amount."""
    try:
        name, amount, start = _split(part, names)
        check_material(name, names)
        try:
            return amounts.layer(name, amount, name in names)
        except TextError as problem:
            raise problem.moved(start) from None
    except TextError as problem:
        raise _about_stock(part, names, problem) from None


def _split(part: str, materials: Collection[str]) -> tuple[str, str, int]:
    """Material, amount as text, and where that text starts. Defined names may hold digits."""
    for own in sorted(materials, key=len, reverse=True):
        rest = part[len(own) :]
        if part.startswith(own) and rest[:1].isspace() and rest.strip()[:1] in _STARTS_NUMBER:
            return own, rest.strip(), len(part) - len(rest.lstrip())
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


def _about_stock(part: str, names: Known, problem: TextError) -> TextError:
    """A problem with a layer, said in terms of the stock item that was meant, where one was."""
    item = " ".join(part.split())
    for name in sorted(names.stock, key=len, reverse=True):
        if item.startswith(f"{name} "):
            hint = f"write '{name}' alone; only 'at nominal' may stand behind it"
            return TextError(f"'{item}': the stock item '{name}' comes with its layers", hint)
    near = nearest(item, names.stock)
    alike = SequenceMatcher(None, item.lower(), near.lower()).ratio() if near else 0.0
    if near is None or alike < _ALIKE:
        return problem
    hint = f"did you mean the stock item '{near}'? `scatterbay lists stock` names them all"
    return TextError(problem.message, hint, problem.start, problem.outside_model)
