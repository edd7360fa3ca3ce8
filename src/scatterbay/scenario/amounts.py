"""How much of a material a layer holds: thickness, varying thickness, stated density, lead equivalent."""

from __future__ import annotations

import re
from dataclasses import dataclass

from scatterbay.scenario.known import TUBE_KV, density, lead_fraction
from scatterbay.scenario.parts import Layer, LeadEquivalent
from scatterbay.units import Quantity, TextError, read
from scatterbay.units.expression import plain

THICKEST = 5.0
"""Thickest layer that is believed [m]; more is a slip of the unit."""

FARTHEST_DENSITY = 0.25
"""How far a stated density may be from the table's, as a share of it: beyond, it is another material."""

LEAST_LEAD = 0.1
"""Mass fraction of lead from which a material can be known by its lead equivalent."""

_AT = re.compile(r"\s+at\s+")
_TO = re.compile(r"\s+to\s+")
_PB = re.compile(r"\bPb\b")
_NEARLY_PB = re.compile(r"\b(?:pb|PB|[Ll]ead)\b")
_AFTER_AT = (
    "behind 'at' stands a density, as 'concrete 300 mm at 2.25 g/cm3', the voltage of a lead equivalent, as "
    "'lead glass 2 mm Pb at 150 kV', or the word 'nominal'"
)


@dataclass(frozen=True)
class _Text:
    """A piece of a longer text, and where in it the piece starts."""

    text: str
    start: int

    def cut(self, start: int, end: int | None = None) -> _Text:
        piece = self.text[start:end]
        return _Text(piece.strip(), self.start + start + len(piece) - len(piece.lstrip()))

    def read(self, kind: str) -> Quantity:
        try:
            return read(self.text, kind)
        except TextError as problem:
            raise problem.moved(self.start) from None

    def wrong(self, message: str, hint: str, outside_model: bool = False) -> TextError:
        return TextError(message, hint, self.start, outside_model)


def layer(material: str, amount: str, defined_here: bool = False) -> Layer:
    """A layer of a material from the text of its amount.

    Parameters
    ----------
    material : a known material's name.
    amount : ``300 mm +/- 10 mm``; ``60 mm to 130 mm`` (counts at its least); a thickness with a density, as
        ``300 mm at 2.25 g/cm3 +/- 2 %``; a lead equivalent, as ``2.0 mm Pb at 150 kV``.
    defined_here : whether the material is one that the scenario defines.

    Raises
    ------
    TextError : none of these, or not for this material; ``start`` counts in ``amount``.
    """
    whole = _Text(amount, 0)
    at = _AT.search(plain(amount))
    head = whole.cut(0, at.start()) if at else whole.cut(0)
    tail = whole.cut(at.end()) if at else None
    pb = _PB.search(head.text)
    if pb:
        return _by_lead_equivalent(material, head, pb, tail, defined_here)
    if tail and _NEARLY_PB.search(head.text):
        raise head.wrong(f"'{head.text}' is not a thickness", f"lead equivalent is written Pb; {_AFTER_AT}")
    thickness = _thickness(head)
    return Layer(material, thickness, None if tail is None else _density(material, tail, defined_here))


def varies(made: Layer) -> bool:
    """Whether a layer was given as running from one thickness to another."""
    return _TO.search(plain(made.thickness.text)) is not None


def _thickness(piece: _Text) -> Quantity:
    """A thickness; of one that varies, its least."""
    to = _TO.search(plain(piece.text))
    if to is None:
        return _checked(piece.read("length"), piece)
    first, last = piece.cut(0, to.start()), piece.cut(to.end())
    least, most = _checked(first.read("length"), first), _checked(last.read("length"), last)
    for one, part in ((least, first), (most, last)):
        if one.tolerance:
            raise part.wrong(
                f"'{part.text}': a thickness that varies has no tolerance", "take it off the smaller one"
            )
    if least.value >= most.value:
        hint = f"the smaller comes first and is what counts, as '{last.text} to {first.text}'"
        raise piece.wrong(f"'{piece.text}' does not run from the smaller thickness to the larger", hint)
    return Quantity(least.value, 0.0, "length", piece.text)


def _checked(thickness: Quantity, piece: _Text) -> Quantity:
    said = f"'{thickness.text}'"
    if thickness.value <= 0.0:
        raise piece.wrong(f"{said}: a thickness must be above zero", "leave the layer out")
    if thickness.value > THICKEST:
        hint = f"no layer is thicker than {THICKEST:g} m; check the unit"
        raise piece.wrong(f"{said} is not a believable thickness", hint)
    if thickness.tolerance >= thickness.value:
        raise piece.wrong(f"{said}: the tolerance is as large as the thickness", "check the unit")
    return thickness


def _density(material: str, piece: _Text, defined_here: bool) -> Quantity:
    """A stated density, near enough to the table's to be of the same stuff."""
    try:
        found = piece.read("density")
    except TextError as problem:
        raise TextError(problem.message, f"{problem.hint}; {_AFTER_AT}", problem.start) from None
    if defined_here:
        hint = "change it there; a density at a layer is for shipped materials"
        raise piece.wrong(f"'{material}' has the density that stands under 'materials'", hint)
    if found.value <= 0.0 or found.tolerance >= found.value:
        raise piece.wrong(f"'{found.text}': a density stays above zero, with its tolerance", "check the unit")
    table = density(material)
    off = found.value / table - 1.0
    if abs(off) > FARTHEST_DENSITY + 1e-9:
        message = (
            f"'{found.text}' is {abs(off):.0%} {'above' if off > 0 else 'below'} the {table / 1000:.4g} g/cm3 of "
            f"{material} in the table"
        ).replace("%", " %")
        hint = f"beyond {FARTHEST_DENSITY:.0%} it is another material: define it under 'materials'"
        raise piece.wrong(message, hint.replace("%", " %"))
    return found


def _by_lead_equivalent(
    material: str, head: _Text, pb: re.Match[str], tail: _Text | None, defined_here: bool
) -> Layer:
    """A layer known by its lead equivalent, with the thickness that holds as much lead as a first guess."""
    share = 0.0 if defined_here else lead_fraction(material)
    if share < LEAST_LEAD:
        of = "a material of this scenario" if defined_here else "without lead in it"
        hint = (
            "a lead equivalent is for shipped materials with lead in them, as lead glass; give the thickness"
        )
        raise head.wrong(f"'{head.text}': '{material}' is {of}", hint)
    if tail is None:
        hint = f"add the tube voltage it is stated at, as '{material} {head.text} at 150 kV'"
        raise head.wrong(f"'{head.text}': a lead equivalent holds at one tube voltage only", hint)
    blanked = head.text[: pb.start()] + "  " + head.text[pb.end() :]
    try:
        lead = _checked(_Text(blanked, head.start).read("length"), head)
    except TextError as problem:
        message = problem.message.replace(blanked.strip(), head.text)
        raise TextError(message, problem.hint, problem.start) from None
    lead = Quantity(lead.value, lead.tolerance, lead.kind, " ".join(blanked.split()))
    ratio = density("lead") / (density(material) * share)
    text = f"{head.text} at {tail.text}"
    guess = Quantity(lead.value * ratio, lead.tolerance * ratio, "length", text)
    return Layer(material, _checked(guess, head), equivalent=LeadEquivalent(lead, _voltage(tail)))


def _voltage(piece: _Text) -> Quantity:
    """The voltage a lead equivalent is stated at."""
    if _AT.search(piece.text):
        raise piece.wrong(
            f"'{piece.text}': only a tube voltage stands there", "a lead equivalent takes no density"
        )
    try:
        found = piece.read("voltage")
    except TextError as problem:
        raise TextError(problem.message, f"{problem.hint}; {_AFTER_AT}", problem.start) from None
    low, high = TUBE_KV
    if found.tolerance:
        raise piece.wrong(f"'{found.text}': the voltage is a stated one", "give it without a tolerance")
    if not low <= found.value <= high:
        hint = f"tube spectra are modelled from {low:g} to {high:g} kV"
        raise piece.wrong(f"'{found.text}' lies outside the model", hint, outside_model=True)
    return found
