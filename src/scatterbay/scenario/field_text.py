"""The shape of a beam as text: ``200 mm x 300 mm at 700 mm``, ``cone 40 deg``, ``panoramic 40 deg``, ``all round``."""

from __future__ import annotations

import math
import re

from scatterbay.scenario.known import FARTHEST
from scatterbay.scenario.parts import Field
from scatterbay.units import TextError, read
from scatterbay.units.expression import plain

_FORMS = (
    "write '200 mm x 300 mm at 700 mm' (width x height at a distance from the source), "
    "'cone 40 deg' (full angle), 'cone 300 mm at 1 m' (diameter at a distance), 'panoramic 40 deg' (a band all round "
    "the axis, full angle across it) or 'all round'"
)
_RECTANGLE = re.compile(r"(?P<width>[^x*]+?)\s*[x*]\s*(?P<height>[^x*]+?)\s+at\s+(?P<distance>.+)")
_CONE = re.compile(r"cone\s+(?P<size>.+?)(?:\s+at\s+(?P<distance>.+))?")
_RING = re.compile(r"panoramic\s+(?P<size>.+)")
_BARE = re.compile(r"[-+]?[0-9.]+")


def beam_field(text: str, turned: float = 0.0) -> Field:
    """The field that a text describes, ``turned`` about the beam's axis [rad].

    Raises
    ------
    TextError : none of the forms, or a size that cannot be.
    """
    ready = plain(text).strip()
    if ready == "all round":
        return Field("everywhere", text="all round")
    match = _CONE.fullmatch(ready)
    if match:
        half_angle = _cone(match["size"], match["distance"], match.start("size"))
        return Field("cone", half_angle=half_angle, turned=turned, text=text.strip())
    match = _RING.fullmatch(ready)
    if match:
        half_angle = _cone(match["size"], None, match.start("size"))
        return Field("ring", half_angle=half_angle, turned=turned, text=text.strip())
    match = _RECTANGLE.fullmatch(ready)
    if match is None:
        raise TextError(f"'{text}' is not a field", _FORMS)
    width = match["width"]
    if _BARE.fullmatch(width):
        width += " " + match["height"].lstrip("-+.0123456789").strip()
    sizes = (
        _above_zero(width, match.start("width")),
        _above_zero(match["height"], match.start("height")),
        _above_zero(match["distance"], match.start("distance")),
    )
    return Field("rectangle", *sizes, turned=turned, text=text.strip())


def _cone(size: str, distance: str | None, start: int) -> float:
    """Half the opening angle [rad] of a cone given by its full angle, or its diameter at a distance."""
    if distance is not None:
        return math.atan(0.5 * _above_zero(size, start) / _above_zero(distance, start + len(size)))
    try:
        full = read(size, "angle").value
    except TextError as problem:
        raise problem.moved(start) from None
    if not 0.0 < full < math.pi:
        raise TextError(
            f"'{size}' is not an opening angle", "above 0 and below 180 deg, or 'all round'", start
        )
    return 0.5 * full


def _above_zero(text: str, start: int) -> float:
    try:
        value = read(text, "length").value
    except TextError as problem:
        raise problem.moved(start) from None
    if not 0.0 < value <= FARTHEST:
        raise TextError(
            f"'{text}': a length in a field is above zero and up to {FARTHEST:g} m", _FORMS, start
        )
    return value
