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
    """A door, window or gap in a side."""

    in_: Name = Field(description="The side it is in")
    from_: LengthFromZero = Field(description="Distance from the side's first corner to the near edge")
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
