"""The room as it is written: outline, sides, ceiling, floor, openings, screens."""

from __future__ import annotations

from typing import Annotated, Any, Literal

from pydantic import Discriminator, Field, Tag

from scatterbay.scenario.model.base import Form, Maybe
from scatterbay.scenario.model.kinds import (
    Corners,
    Floor,
    Length,
    LengthFromZero,
    MakeUp,
    Name,
    PlanPosition,
)

FLAT = ("ceiling", "floor")


class SideOpening(Form):
    """A door, window or gap in a side, a screen or another opening."""

    in_: Name = Field(description="The side, screen or opening it is in")
    from_: LengthFromZero = Field(
        description="Distance to the near edge: from the first corner of the side or screen, or the opening's near edge"
    )
    width: Length = Field(description="Width along the side")
    height: Length = Field(description="Height of the opening itself")
    sill: LengthFromZero | None = Field(
        None, description="Height of the lower edge above the floor; 0 if left out"
    )
    make_up: MakeUp = Field(description="What fills it, from the inside to the outside, or 'open'")


class FlatOpening(Form):
    """A hatch or skylight in the ceiling or the floor."""

    in_: Literal["ceiling", "floor"] = Field(description="Where it is")
    from_: PlanPosition = Field(description="One corner of the rectangle on plan [x, y]")
    to: PlanPosition = Field(description="The opposite corner [x, y]")
    make_up: MakeUp = Field(description="What fills it, from the inside to the outside, or 'open'")


def _which_opening(value: Any) -> str:
    return "(flat)" if isinstance(value, dict) and value.get("in") in FLAT else "(side)"


Opening = Annotated[
    Annotated[SideOpening, Tag("(side)")] | Annotated[FlatOpening, Tag("(flat)")],
    Discriminator(_which_opening),
]


class SidePanel(Form):
    """A part of a side, a screen or an opening that holds more or less than the rest of it."""

    on: Name = Field(description="The side, screen or opening it is part of")
    from_: LengthFromZero | None = Field(
        None, description="Near edge, measured as for an opening; 0 if left out"
    )
    width: Length | None = Field(None, description="Width; to the far end of what it is on if left out")
    to: Length | None = Field(None, description="Far edge, instead of the width")
    bottom: LengthFromZero | None = Field(
        None, description="Height of the lower edge above the floor; that of what it is on if left out"
    )
    height: Length | None = Field(
        None, description="Its own height; up to the top of what it is on if left out"
    )
    top: Length | None = Field(
        None, description="Height of the upper edge above the floor, instead of the height"
    )
    make_up: MakeUp | None = Field(None, description="What is there instead, from the inside to the outside")
    add_inside: MakeUp | None = Field(None, description="Layers added on the inner face")
    add_outside: MakeUp | None = Field(None, description="Layers added on the outer face")


class FlatPanel(Form):
    """A part of the ceiling or the floor that holds more or less than the rest of it."""

    on: Literal["ceiling", "floor"] = Field(description="Where it is")
    from_: PlanPosition | None = Field(None, description="One corner on plan [x, y]; all of it if left out")
    to: PlanPosition | None = Field(None, description="The opposite corner [x, y]")
    make_up: MakeUp | None = Field(None, description="What is there instead, from the inside to the outside")
    add_inside: MakeUp | None = Field(None, description="Layers added on the inner face")
    add_outside: MakeUp | None = Field(None, description="Layers added on the outer face")


def _which_panel(value: Any) -> str:
    return "(flat)" if isinstance(value, dict) and value.get("on") in FLAT else "(side)"


Panel = Annotated[
    Annotated[SidePanel, Tag("(side)")] | Annotated[FlatPanel, Tag("(flat)")],
    Discriminator(_which_panel),
]


class Screen(Form):
    """A free-standing upright barrier from one plan point to another."""

    from_: PlanPosition = Field(description="Where it starts on plan [x, y]")
    to: PlanPosition = Field(description="Where it ends on plan [x, y]")
    bottom: LengthFromZero | None = Field(None, description="Height of the lower edge; 0 if left out")
    top: Length = Field(description="Height of the upper edge above the floor")
    make_up: MakeUp = Field(description="Layers from the left to the right of the walk from start to end")


class Room(Form):
    """The room, by its inner faces: x to the east, y to the north, z up from the floor."""

    corners: Maybe[Corners] = Field(description="Corners of the inner outline, counter-clockwise, in m")
    height: Maybe[Length] = Field(description="From the floor to the ceiling")
    sides: Maybe[dict[str, Maybe[MakeUp]]] = Field(
        description="A make-up per side in the order of the corners: the first from corner 1 to corner 2",
        examples=[{"south": "concrete 300 mm", "east": "concrete 300 mm + lead 2 mm"}],
    )
    ceiling: Maybe[MakeUp] = Field(description="Make-up of the ceiling, from the inside up, or 'open'")
    floor: Maybe[Floor] = Field(description="'on the ground', or the make-up from the inside down")
    storey_above: Maybe[Length | None] = Field(
        None, description="Height of the floor of the storey above over this floor"
    )
    storey_below: Maybe[Length | None] = Field(
        None, description="Depth of the floor of the storey below under this floor"
    )
    openings: Maybe[dict[str, Maybe[Opening]]] = Field(
        {}, description="Doors, windows, hatches, gaps, by name"
    )
    screens: Maybe[dict[str, Maybe[Screen]]] = Field({}, description="Free-standing barriers, by name")
    panels: Maybe[dict[str, Maybe[Panel]]] = Field(
        {}, description="Linings, patches, sockets, chases, joints: parts that hold more or less, by name"
    )
