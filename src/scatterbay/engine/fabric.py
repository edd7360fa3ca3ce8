"""What the faces of a room are made of, rectangle by rectangle, as sheets."""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence
from dataclasses import dataclass

import numpy as np

from scatterbay.barriers.makeup import Sheet, Sheets, sheet
from scatterbay.engine.equivalent import equivalent_thickness
from scatterbay.errors import OutOfRangeError
from scatterbay.geometry.cells import MOST_EDGES, MOST_KINDS, Cells, Rectangle, cut, middles
from scatterbay.scenario.parts import Assumption, Layer, MakeUp, Opening, Panel, Room
from scatterbay.tables.materials import Material, material

GROUND = ("earth", 3.0)
"""What stands for the ground under a floor that lies on it."""


WITHIN = 1e-3
"""How far within its ends a face is looked at for what lies beyond them [m]."""
_Kind = tuple[Sheets, str]
"""A make-up, and the opening it is in; empty in none."""


@dataclass(frozen=True)
class Fabric:
    """The faces by number: sides, ceiling, floor, screens.

    ``stacks``: the make-ups of each face, by kind; kind 0 is what most of it is made of. ``cells``: where which kind
    is, of the faces that have several. ``opened``: mask of the kinds that are in openings, of the same faces;
    ``of_opening``: by the opening's name, what is in openings of its own left out.
    """

    stacks: tuple[tuple[Sheets, ...], ...]
    cells: dict[int, Cells]
    opened: dict[int, int]
    of_opening: dict[str, int]
    names: tuple[str, ...]
    assumptions: tuple[Assumption, ...]

    @property
    def thickness(self) -> list[float]:
        """Of each face's kind 0 [m]."""
        return [sum(one.thickness for one in kinds[0]) for kinds in self.stacks]


@dataclass(frozen=True)
class _Sheeter:
    """Make-ups as sheets, with notes on layers known by a lead equivalent."""

    defined: Sequence[Material]
    notes: dict[str, Assumption]

    def sheets(self, make_up: MakeUp | None) -> Sheets:
        return tuple(self._sheet(layer) for layer in make_up.layers) if make_up else ()

    def _sheet(self, layer: Layer) -> Sheet:
        stuff = material(layer.material, self.defined)
        density = layer.counted_density
        stuff_density = stuff.density_g_cm3 if density is None else 1e-3 * density
        if layer.equivalent is None:
            return Sheet(stuff.fractions, stuff_density, layer.counted_thickness)
        lead, voltage = layer.equivalent.lead, layer.equivalent.voltage
        least = lead.value - (0.0 if layer.at_nominal else lead.tolerance)
        guess = layer.thickness.value * least / lead.value
        thickness = equivalent_thickness(stuff, least, voltage.value, guess)
        self.notes[f"{lead.text} {voltage.text} {stuff.name}"] = Assumption(
            "lead equivalent",
            f"{stuff.name} of {lead.text} lead equivalent at {voltage.text} is counted as {1e3 * thickness:.3g} mm, "
            "which stops as much of that beam by transport",
        )
        return Sheet(stuff.fractions, stuff_density, thickness)


def fabric_of(room: Room, defined: Sequence[Material]) -> Fabric:
    """Every face of a room.

    Raises
    ------
    OutOfRangeError : a face is cut into more pieces than are followed.
    """
    sheeter = _Sheeter(defined, {})
    floor = (sheet(*GROUND),) if room.floor_on_ground else sheeter.sheets(room.floor)
    own: list[tuple[str, Sheets]] = [(side.name, sheeter.sheets(side.make_up)) for side in room.sides]
    own += [("ceiling", sheeter.sheets(room.ceiling)), ("floor", floor)]
    own += [(screen.name, sheeter.sheets(screen.make_up)) for screen in room.screens]
    stacks: list[tuple[Sheets, ...]] = []
    cells, opened = {}, {}
    of_opening: dict[str, int] = {one.name: 0 for one in room.openings}
    for number, (name, base) in enumerate(own):
        openings = [one for one in room.openings if one.on_face == name]
        panels = [one for one in room.panels if one.face == name]
        if not openings and not panels:
            stacks.append((base,))
            continue
        kinds, cells[number] = _cells(name, base, openings, panels, sheeter, _extent(room, number))
        stacks.append(tuple(stack for stack, _ in kinds))
        opened[number] = sum(1 << k for k, (_, opening) in enumerate(kinds) if opening)
        for k, (_, opening) in enumerate(kinds):
            if opening:
                of_opening[opening] |= 1 << k
    names = tuple(name for name, _ in own)
    return Fabric(tuple(stacks), cells, opened, of_opening, names, tuple(sheeter.notes.values()))


def _cells(
    name: str,
    base: Sheets,
    openings: Sequence[Opening],
    panels: Sequence[Panel],
    sheeter: _Sheeter,
    extent: Rectangle,
) -> tuple[tuple[_Kind, ...], Cells]:
    """The kinds of a face, its own first, and where they are.

    Beyond the ends of the face it is as it is just within them: what a ray finds there is another face's.
    """
    rectangles = [Rectangle(one.low, one.high) for one in openings]
    rectangles += [Rectangle(one.low, one.high) for one in panels]
    first, second = cut(rectangles)
    if max(first.size, second.size) > MOST_EDGES:
        raise OutOfRangeError(f"'{name}' is cut along more than {MOST_EDGES} edges in one direction")
    kinds: dict[_Kind, int] = {(base, ""): 0}
    numbers = np.zeros((first.size + 1, second.size + 1), dtype=np.int64)
    columns = np.clip(middles(first), extent.low[0] + WITHIN, extent.high[0] - WITHIN)
    rows = np.clip(middles(second), extent.low[1] + WITHIN, extent.high[1] - WITHIN)
    for i, x in enumerate(columns):
        for j, y in enumerate(rows):
            kind = _kind_at(name, base, (float(x), float(y)), openings, panels, sheeter)
            numbers[i, j] = kinds.setdefault(kind, len(kinds))
    if len(kinds) > MOST_KINDS:
        raise OutOfRangeError(f"'{name}' has more than {MOST_KINDS} different make-ups")
    return tuple(kinds), Cells(first, second, numbers)


def _extent(room: Room, number: int) -> Rectangle:
    """The corners of a face in its own coordinates; of ceiling and floor, the box around the plan."""
    if number < len(room.sides):
        side = room.sides[number]
        return Rectangle((0.0, 0.0), (math.dist(side.start, side.end), room.height))
    if number < len(room.sides) + 2:
        x, y = zip(*room.corners, strict=True)
        return Rectangle((min(x), min(y)), (max(x), max(y)))
    screen = room.screens[number - len(room.sides) - 2]
    return Rectangle((0.0, screen.bottom), (math.dist(screen.start, screen.end), screen.top))


def _kind_at(
    name: str,
    base: Sheets,
    point: tuple[float, float],
    openings: Iterable[Opening],
    panels: Iterable[Panel],
    sheeter: _Sheeter,
) -> _Kind:
    """What is there at a point of a face: the innermost opening, and the panels on it."""
    host, stack = name, base
    for opening in openings:
        if Rectangle(opening.low, opening.high).holds(*point):
            host, stack = opening.name, sheeter.sheets(opening.make_up)
    for panel in panels:
        if panel.host != host or not Rectangle(panel.low, panel.high).holds(*point):
            continue
        if panel.make_up is not None:
            stack = sheeter.sheets(panel.make_up)
        stack = (*sheeter.sheets(panel.inside), *stack, *sheeter.sheets(panel.outside))
    return stack, "" if host == name else host


def sheets_of(make_up: MakeUp, defined: Sequence[Material]) -> Sheets:
    """The sheets of one make-up on its own."""
    return _Sheeter(defined, {}).sheets(make_up)
