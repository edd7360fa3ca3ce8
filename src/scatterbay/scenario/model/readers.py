"""Values of the file that take more than a number and a unit to read."""

from __future__ import annotations

import itertools
import math
from collections.abc import Mapping

from scatterbay.scenario import at_distance, make_ups, parts
from scatterbay.scenario import goals as goal_text
from scatterbay.scenario.known import (
    HIGHEST_LINE_KEV,
    TUBE_KV,
    element_symbols,
    highest_line_kev,
    nuclide_names,
)
from scatterbay.scenario.model.base import Names, each
from scatterbay.scenario.model.values import Point3, Reader, factor, point, written
from scatterbay.scenario.rules import goals_from
from scatterbay.scenario.yaml_tree import Data
from scatterbay.units import Quantity, TextError, nearest, read

GROUND = "on the ground"
_TOGETHER = "write [[beam a, beam b]]: each inner list names beams of which only one is on at a time"


def tube_voltage(found: Quantity) -> None:
    """Refuses voltages outside the spectrum model."""
    low, high = TUBE_KV
    if not low <= found.value <= high:
        hint = f"tube spectra are modelled from {low:g} to {high:g} kV"
        raise TextError(f"'{found.text}' lies outside the model", hint, outside_model=True)


def acute(found: Quantity) -> None:
    """Refuses angles of 90 deg and more."""
    if found.value >= math.pi / 2:
        raise TextError(f"'{found.text}' is not an anode angle", "below 90 deg, commonly 10 to 20 deg")


def believable(found: Quantity) -> None:
    """Refuses densities beyond those of solids."""
    if found.value > 25_000.0:
        raise TextError(f"'{found.text}' is denser than anything", "the densest solids have about 22.6 g/cm3")


def make_up(open_allowed: bool) -> Reader:
    """A reader of make-ups."""
    return lambda value, names: make_ups.make_up(written(value, "'concrete 300 mm'"), names, open_allowed)


def filtration(value: Data, names: Names) -> parts.MakeUp:
    """The filters of a beam, or ``none``."""
    text = written(value, "'aluminium 3 mm'")
    return parts.MakeUp((), "none") if text.strip() == "none" else make_ups.filtration(text, names)


def floor(value: Data, names: Names) -> tuple[parts.MakeUp, bool]:
    """The floor's make-up, and whether it lies on the ground."""
    text = written(value, f"'{GROUND}'").strip()
    if text == GROUND:
        return parts.MakeUp((), GROUND), True
    layers = text.removesuffix(GROUND).strip()
    return make_ups.make_up(layers, names, open_allowed=False), layers != text


def leakage(value: Data, names: Names) -> parts.Leakage | None:
    """Leakage at 1 m, perhaps with its technique factors, or nothing for ``none``."""
    text = written(value, "'5 mGy/h at 1 m'")
    return None if text.strip() == "none" else at_distance.leakage(text)


def path(value: Data, names: Names) -> tuple[Point3, ...]:
    """Two or more positions [x, y, z], no two in a row the same."""
    if not isinstance(value, tuple) or len(value) < 2:
        raise TextError("a way needs two points or more", "write [[0.5, 0.5, 0.3], [3, 2, 1]]")
    found = tuple(each(enumerate(value), lambda item: point(item, names)))
    if any(math.dist(one, other) < 1e-3 for one, other in itertools.pairwise(found)):
        raise TextError("two points in a row of the way are the same", "leave one out")
    return found


def shares(value: Data, names: Names) -> tuple[tuple[Quantity, float], ...]:
    """Shares of the tube charge by voltage, which add up to 1."""
    if not isinstance(value, Mapping) or not value:
        raise TextError("voltages are a mapping", "write {70 kV: 0.3, 85 kV: 0.5, 100 kV: 0.2}")
    volts = each(((name, name) for name in value), _tube_voltage)
    found = each(value.items(), lambda part: factor(part, names))
    total = sum(found)
    if abs(total - 1.0) > 0.005:
        raise TextError(f"the shares add up to {total:.4g}", "they must add up to 1 within 0.005")
    return tuple((voltage, share / total) for voltage, share in zip(volts, found, strict=True))


def rule_goals(value: Data, names: Names) -> tuple[tuple[str, tuple[parts.Goal, ...]], ...]:
    """One entry of a rule set, or a list of them, each with its goals."""
    if not isinstance(value, tuple):
        return (_rule(value),)
    if not value:
        raise TextError("no rule is named", "write for example 'NCRP 147: controlled area'")
    return tuple(each(enumerate(value), _rule))


def _rule(value: Data) -> tuple[str, tuple[parts.Goal, ...]]:
    if isinstance(value, Mapping) and len(value) == 1:
        ((rule_set, entry),) = value.items()
        raise TextError("a colon makes a mapping of this", f'put it in quotes: "{rule_set}: {entry}"')
    text = written(value, "'NCRP 147: controlled area'")
    return text, goals_from(text)


def _tube_voltage(text: str) -> Quantity:
    found = read(text, "voltage")
    tube_voltage(found)
    return found


def goals(value: Data, names: Names) -> tuple[parts.Goal, ...]:
    """One design goal, or a list of them."""
    if not isinstance(value, tuple):
        return (_goal(value),)
    if not value:
        raise TextError("no goal is given", "write for example [6 mSv/year, 20 uSv in an hour]")
    return tuple(each(enumerate(value), _goal))


def variant(value: Data, names: Names) -> dict[str, str]:
    """Values to be put elsewhere in the file, by where they stand."""
    if not isinstance(value, Mapping) or not value:
        raise TextError("a variant is a mapping", "write {room.sides.north: concrete 300 mm + lead 2 mm}")
    return dict(zip(value, each(value.items(), lambda one: written(one, "'concrete 300 mm'")), strict=True))


def one_goal(value: Data, names: Names) -> parts.Goal:
    """A figure with its time base, written as a design goal is."""
    return _goal(value)


def _goal(value: Data) -> parts.Goal:
    return goal_text.goal(written(value, "'6 mSv/year'"))


def notes(value: Data, names: Names) -> tuple[str, ...]:
    """One remark, or a list of them."""
    items = value if isinstance(value, tuple) else (value,)
    return tuple(written(item, "a sentence") for item in items)


def name(value: Data, names: Names) -> str:
    """A name or another short text."""
    text = written(value, "a name")
    if not text.strip():
        raise TextError("a name is empty")
    return text.strip()


def material(value: Data, names: Names) -> str:
    """The name of a known material."""
    return make_ups.check_material(written(value, "'steel'").strip(), names)


def nuclide(value: Data, names: Names) -> str:
    """The name of a nuclide whose lines the model covers."""
    text = written(value, "'Ir-192'").strip()
    known = nuclide_names()
    if text not in known:
        near = nearest(text, known)
        hint = f"did you mean '{near}'? " if near else ""
        raise TextError(f"'{text}' is not a nuclide the tables hold", f"{hint}known: {', '.join(known)}")
    highest = highest_line_kev(text)
    if highest > HIGHEST_LINE_KEV:
        message = f"'{text}' has a line at {highest:.0f} keV, outside the model"
        raise TextError(
            message, f"barriers are worked out up to {HIGHEST_LINE_KEV:g} keV", outside_model=True
        )
    return text


def mass_fractions(value: Data, names: Names) -> dict[str, float]:
    """Mass fractions by element symbol, adding up to 1."""
    if not isinstance(value, Mapping) or not value:
        raise TextError("mass fractions are a mapping", "write {Ca: 0.4, C: 0.12, O: 0.48}")
    each(((symbol, symbol) for symbol in value), _known_element)
    found = dict(zip(value, each(value.items(), lambda part: factor(part, names)), strict=True))
    total = sum(found.values())
    if abs(total - 1.0) > 0.005:
        raise TextError(f"the mass fractions add up to {total:.4g}", "they must add up to 1 within 0.005")
    return found


def _known_element(symbol: str) -> None:
    if symbol not in element_symbols():
        raise TextError(f"'{symbol}' is not the symbol of an element from H to U")


def name_lists(value: Data, names: Names) -> tuple[tuple[str, ...], ...]:
    """Lists of names, two or more different ones in each."""
    if not isinstance(value, tuple):
        raise TextError("a list of lists is needed", _TOGETHER)
    return tuple(each(enumerate(value), _name_list))


def _name_list(item: Data) -> tuple[str, ...]:
    listed = tuple(name for name in item if isinstance(name, str)) if isinstance(item, tuple) else ()
    if not isinstance(item, tuple) or len(listed) < len(item) or len(set(listed)) < 2:
        raise TextError("a list of two or more different beams is needed", _TOGETHER)
    return listed
