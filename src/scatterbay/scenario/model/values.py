"""Single values of the file and how each is read: quantities, factors, dates, names, positions."""

from __future__ import annotations

import math
from collections.abc import Callable
from datetime import date

from scatterbay.scenario.known import FARTHEST
from scatterbay.scenario.model.base import Names, each
from scatterbay.scenario.yaml_tree import Data
from scatterbay.units import KINDS, Quantity, TextError, read, read_number

Reader = Callable[[Data, Names], object]
Point2 = tuple[float, float]
Point3 = tuple[float, float, float]

DIRECTIONS: dict[str, Point3] = {
    "east": (1.0, 0.0, 0.0),
    "west": (-1.0, 0.0, 0.0),
    "north": (0.0, 1.0, 0.0),
    "south": (0.0, -1.0, 0.0),
    "up": (0.0, 0.0, 1.0),
    "down": (0.0, 0.0, -1.0),
}


def written(value: Data, example: str) -> str:
    """The text of a scalar, numbers included; lists, mappings and truth values are refused."""
    if isinstance(value, str):
        return value
    if isinstance(value, bool) or not isinstance(value, int | float):
        what = (
            "a truth value"
            if isinstance(value, bool)
            else "a list"
            if isinstance(value, tuple)
            else "a mapping"
        )
        raise TextError(f"{what} cannot stand here", f"write for example {example}")
    return repr(value).removesuffix(".0")


def in_text(reader: Callable[[str], object], example: str) -> Reader:
    """A reader of values from one that takes text."""
    return lambda value, names: reader(written(value, f"'{example}'"))


def in_text_with_names(reader: Callable[[str, Names], object], example: str) -> Reader:
    """The same for a reader that must know the materials defined."""
    return lambda value, names: reader(written(value, f"'{example}'"), names)


def quantity(
    *kinds: str,
    lowest: float = 0.0,
    lowest_allowed: bool = False,
    check: Callable[[Quantity], None] | None = None,
) -> Reader:
    """Reads a quantity of one of the kinds, above ``lowest`` (or from there up)."""

    def reader(value: Data, names: Names) -> Quantity:
        found = read(written(value, f"'{KINDS[kinds[0]].example}'"), *kinds)
        if found.value < lowest or (found.value == lowest and not lowest_allowed):
            raise TextError(f"'{found.text}' must {'not be negative' if lowest_allowed else 'be above zero'}")
        if lowest == 0.0 and found.tolerance >= found.value > 0.0:
            raise TextError(f"'{found.text}': the tolerance is as large as the value", "check its unit")
        if found.kind == "length" and found.value > FARTHEST:
            raise TextError(f"'{found.text}' is longer than any bay ({FARTHEST:g} m)", "check its unit")
        if check:
            check(found)
        return found

    return reader


def factor(value: Data, names: Names) -> float:
    """A factor above 0 and up to 1: ``1``, ``0.25``, ``1/4``, ``25 %``."""
    text = written(value, "1/4")
    hint = "above 0 and at most 1, as 1, 1/4, 0.25 or 25 %"
    number = read_number(text, hint)
    if not 0.0 < number <= 1.0:
        raise TextError(f"'{text}' is not a factor above 0 and up to 1", hint)
    return number


def weeks(value: Data, names: Names) -> float:
    """Weeks a year, above 0 and up to 53: ``48`` or ``48 weeks``."""
    text = written(value, "48")
    hint = "weeks a year in which the beam is used, as 48"
    number = read_number(text.removesuffix("weeks"), hint)
    if not 0.0 < number <= 53.0:
        raise TextError(f"'{text}' weeks do not fit in a year", hint)
    return number


def iso_date(value: Data, names: Names) -> str:
    """A date as 2026-03-01."""
    text = written(value, "2026-03-01")
    try:
        found = date.fromisoformat(text)
    except ValueError:
        found = None
    if found is None or found.isoformat() != text:
        raise TextError(f"'{text}' is not a date", "write year-month-day, as 2026-03-01")
    return text


def coordinate(value: Data, names: Names) -> float:
    """A coordinate [m]: a number of metres, or a length as text."""
    if isinstance(value, int | float) and not isinstance(value, bool):
        metres = float(value)
    else:
        metres = read(written(value, "2.4 or '8 ft'"), "length").value
    if not math.isfinite(metres):
        raise TextError(f"'{value}' is not a finite number")
    if abs(metres) > FARTHEST:
        hint = f"plain numbers are metres; with a unit, write for example '{value} mm'"
        raise TextError(f"'{value}' is more than {FARTHEST:g} m away", hint)
    return metres


def _coordinates(value: Data, names: Names, count: int, form: str) -> list[float]:
    if not isinstance(value, tuple) or len(value) != count:
        said = f"a list of {len(value)}" if isinstance(value, tuple) else f"'{value}'"
        raise TextError(f"{said} stands where {form} is needed", "numbers are metres: x east, y north, z up")
    return each(enumerate(value), lambda item: coordinate(item, names))


def point(value: Data, names: Names) -> Point3:
    """A position [x, y, z] in m."""
    x, y, z = _coordinates(value, names, 3, "a position [x, y, z]")
    return x, y, z


def plan_point(value: Data, names: Names) -> Point2:
    """A position [x, y] on plan in m."""
    x, y = _coordinates(value, names, 2, "a position [x, y]")
    return x, y


def sizes(value: Data, names: Names) -> Point3:
    """Sizes [x, y, z] of a box in m, above zero."""
    found = _coordinates(value, names, 3, "a list of sizes [x, y, z]")
    each(enumerate(found), _above_zero)
    return found[0], found[1], found[2]


def _above_zero(size: float) -> None:
    if size <= 0.0:
        raise TextError("a size must be above zero")


def corners(value: Data, names: Names) -> tuple[Point2, ...]:
    """The corners of an outline on plan, three or more."""
    if not isinstance(value, tuple) or len(value) < 3:
        raise TextError(
            "an outline needs three corners or more", "write [[0, 0], [6, 0], [6, 4.5], [0, 4.5]]"
        )
    return tuple(each(enumerate(value), lambda item: plan_point(item, names)))


def direction(value: Data, names: Names) -> Point3:
    """A unit vector from [x, y, z] of any length but zero, or from a word such as ``east``."""
    if isinstance(value, str):
        if value not in DIRECTIONS:
            raise TextError(f"'{value}' is not a direction", f"{', '.join(DIRECTIONS)}, or a list [x, y, z]")
        return DIRECTIONS[value]
    x, y, z = _coordinates(value, names, 3, "a direction [x, y, z]")
    length = math.sqrt(x * x + y * y + z * z)
    if length == 0.0:
        raise TextError("a direction of zero length points nowhere", "give at least one number other than 0")
    return x / length, y / length, z / length


def point_or_name(value: Data, names: Names) -> Point3 | str:
    """A position [x, y, z], or the name of something that has one."""
    return value if isinstance(value, str) else point(value, names)
