"""Says where a make-up counts as less than its nominal layers, and where it was told not to."""

from __future__ import annotations

import re
from itertools import groupby

from scatterbay.scenario.amounts import varies
from scatterbay.scenario.parts import Layer, MakeUp
from scatterbay.units import Quantity

_TOLERANCE = re.compile(r"\s*(?:\+\s*/?\s*-|±)")


def least_notes(make_up: MakeUp) -> list[str]:
    """Sentences, without repeats, on every layer that counts as less than its nominal, or that was told not to.

    ``lead code 4 counted at its guaranteed minimum, 1.71 mm (nominal 1.80 mm)``,
    ``concrete 300 mm +/- 10 mm counted at 290 mm``. Nothing where all layers count as they are written.
    """
    notes: dict[str, None] = {}
    for (item, nominal), layers in groupby(make_up.layers, key=lambda one: (one.bought_as, one.at_nominal)):
        own = list(layers)
        found = [_bought(item, own, nominal)] if item else [_single(layer) for layer in own]
        notes.update(dict.fromkeys(note for note in found if note))
    return list(notes)


def _single(layer: Layer) -> str:
    """On one layer that is not a stock item's."""
    stated = "" if layer.density is None else f" at {layer.density.text}"
    whole = f"{layer.material} {layer.thickness.text}{stated}"
    said = " and ".join(least for least, _ in _lessened(layer))
    if not said:
        return ""
    if layer.at_nominal:
        return f"{whole} counted at nominal, as it says; it may be as little as {said}"
    return f"{whole} counted at {'its least, ' if varies(layer) else ''}{said}"


def _bought(item: str, layers: list[Layer], nominal: bool) -> str:
    """On a stock item."""
    lessened = [(layer, found) for layer in layers if (found := _lessened(layer))]
    texts = []
    for layer, found in lessened:
        figures = [least if nominal else f"{least} (nominal {stated})" for least, stated in found]
        texts.append(("" if len(layers) == 1 else f"{layer.material} ") + " and ".join(figures))
    if not texts:
        return ""
    said = ", ".join(dict.fromkeys(texts))
    if nominal:
        return f"{item} counted at nominal, as it says; its guaranteed minimum is {said}"
    return f"{item} counted at its guaranteed minimum, {said}"


def _lessened(layer: Layer) -> list[tuple[str, str]]:
    """The least and what was written, as text, of whatever may be less: thickness, density, lead equivalent."""
    found = []
    if layer.equivalent is not None:
        lead = layer.equivalent.lead
        if lead.tolerance:
            found.append((f"{_mm(_low(lead))} Pb", _nominal(lead, _mm(lead.value))))
    elif layer.thickness.tolerance or varies(layer):
        found.append((_mm(_low(layer.thickness)), _nominal(layer.thickness, _mm(layer.thickness.value))))
    if layer.density is not None and layer.density.tolerance:
        stated = _nominal(layer.density, f"{layer.density.value / 1000:.4g} g/cm3")
        found.append((f"{_low(layer.density) / 1000:.4g} g/cm3", stated))
    return found


def _low(quantity: Quantity) -> float:
    return quantity.value - quantity.tolerance


def _nominal(quantity: Quantity, otherwise: str) -> str:
    """As written, less the tolerance; where the unit stands behind the tolerance only, from the value."""
    written = _TOLERANCE.split(quantity.text)[0].strip()
    return written if re.search(r"[A-Za-z]", written) else otherwise


def _mm(metres: float) -> str:
    return f"{1e3 * metres:.4g} mm"
