"""Bodies that scatter, as they are written, one form per shape."""

from __future__ import annotations

from typing import Annotated, Any, Literal

from pydantic import Discriminator, Field, Tag

from scatterbay.scenario.model.base import Form
from scatterbay.scenario.model.kinds import Angle, Direction, Length, MaterialName, Position, Sizes

SHAPES = ("box", "cylinder", "sphere", "pipe", "plate")


class _Body(Form):
    material: MaterialName = Field(description="What it is made of")
    centre: Position = Field(description="Position of its centre [x, y, z]")


class Box(_Body):
    """A block with sides along x, y and z, turned about the vertical if need be."""

    shape: Literal["box"] = Field(description="The shape of the body")
    size: Sizes = Field(description="Sizes along x, y and z")
    turned: Angle | None = Field(
        None, description="Rotation about the vertical, counter-clockwise from above"
    )


class Cylinder(_Body):
    """A solid cylinder in any direction."""

    shape: Literal["cylinder"] = Field(description="The shape of the body")
    diameter: Length = Field(description="Diameter")
    length: Length = Field(description="Length along the axis")
    along: Direction | None = Field(None, description="Direction of the axis; upright if left out")


class Sphere(_Body):
    """A solid sphere."""

    shape: Literal["sphere"] = Field(description="The shape of the body")
    diameter: Length = Field(description="Diameter")


class Pipe(_Body):
    """A hollow cylinder in any direction, empty or filled."""

    shape: Literal["pipe"] = Field(description="The shape of the body")
    outer_diameter: Length = Field(description="Outer diameter")
    wall: Length = Field(description="Thickness of the wall")
    length: Length = Field(description="Length along the axis")
    along: Direction | None = Field(None, description="Direction of the axis; upright if left out")
    filled_with: MaterialName | None = Field(None, description="What is inside; empty if left out")


class Plate(_Body):
    """A flat rectangle."""

    shape: Literal["plate"] = Field(description="The shape of the body")
    width: Length = Field(description="Width, horizontal where it stands upright")
    height: Length = Field(description="Height")
    thickness: Length = Field(description="Thickness")
    facing: Direction = Field(description="Direction of its normal")


def _which_shape(value: Any) -> str | None:
    shape = value.get("shape") if isinstance(value, dict) else None
    return f"({shape})" if shape in SHAPES else None


Body = Annotated[
    Annotated[Box, Tag("(box)")]
    | Annotated[Cylinder, Tag("(cylinder)")]
    | Annotated[Sphere, Tag("(sphere)")]
    | Annotated[Pipe, Tag("(pipe)")]
    | Annotated[Plate, Tag("(plate)")],
    Discriminator(_which_shape, custom_error_type="shape", custom_error_message="no shape"),
]
