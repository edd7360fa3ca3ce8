"""The types of the file's values: what Python sees, how it is read, what the schema says."""

from __future__ import annotations

import math
from typing import Annotated, TypeAlias

from scatterbay.scenario import parts
from scatterbay.scenario.at_distance import leakage_rate, tube_output
from scatterbay.scenario.counts import amount, collimator, per_week
from scatterbay.scenario.field_text import beam_field
from scatterbay.scenario.formulas import mass_fractions
from scatterbay.scenario.make_ups import one_layer
from scatterbay.scenario.model import readers, schemas, values
from scatterbay.scenario.model.base import FromText
from scatterbay.scenario.model.readers import GROUND
from scatterbay.scenario.model.values import Point2, Point3
from scatterbay.scenario.purposes import PURPOSES, purpose, space
from scatterbay.units import Quantity


def _aim_schema() -> schemas.Schema:
    named = schemas.text("The name of a body or place, or a direction", "pipe", "down")
    return {"anyOf": [schemas.coordinates(3, "A position", [3.0, 2.2, 1.0]), named]}


_MAKE_UP = schemas.text(
    "Layers from the inside to the outside, each a material and a thickness, joined by '+'; or 'open'",
    "concrete 300 mm",
    "gypsum board 12.5 mm + lead 1.5 mm",
    "concrete 300 mm +/- 10 mm",
    "open",
)
_LAYERS = {**_MAKE_UP, "description": "Layers joined by '+'", "examples": ["aluminium 3 mm", "none"]}
_LAYER = schemas.text("A material and a thickness", "aluminium 3.2 mm")
_FLOOR = {**_MAKE_UP, "description": f"Layers from the inside down, or '{GROUND}', or both"}
_FLOOR["examples"] = [GROUND, "concrete 200 mm", f"concrete 150 mm {GROUND}"]
_GOAL = schemas.text(
    "A design goal",
    "7.5 uSv/h",
    "20 uSv in an hour",
    "7.5 uSv/h over 8 h",
    "0.1 mGy/week",
    "6 mSv/year",
)
_GOALS = {"anyOf": [{"type": "array", "items": _GOAL, "minItems": 1}, _GOAL]}
_RULE = schemas.text("A rule set and an entry of it", "NCRP 147: controlled area")
_RULES = {"anyOf": [{"type": "array", "items": _RULE, "minItems": 1}, _RULE]}
_FIELD = schemas.text(
    "The shape of the beam", "200 mm x 300 mm at 700 mm", "cone 40 deg", "panoramic 40 deg", "all round"
)
_TIME = schemas.quantity("time", "charge", examples=("25 min", "40 mA min"))
_WEEKLY = schemas.quantity("time per week", "charge per week", examples=("6 h/week", "400 mA min/week"))
_ANGLE = schemas.quantity("angle", examples=("30 deg",))
_DATE = schemas.text("A date", "2026-03-01", pattern="^[0-9]{4}-[0-9]{2}-[0-9]{2}$")
_NOTES = schemas.text("A remark", "demonstration data")
_DIRECTION = {"anyOf": [schemas.coordinates(3, "A direction", [0, 1, 0]), {"enum": list(values.DIRECTIONS)}]}
_WEEKS = schemas.number_or(schemas.text("Weeks a year", "48 weeks"), exclusiveMinimum=0, maximum=53)
_FRACTIONS = {"type": "object", "additionalProperties": schemas.FACTOR, "minProperties": 1}
_NAME_LISTS = {
    "type": "array",
    "items": {"type": "array", "items": {"type": "string"}, "minItems": 2, "uniqueItems": True},
    "examples": [[["weld shot", "panoramic shot"]]],
}
_CORNERS = {
    "type": "array",
    "items": schemas.coordinates(2, "A corner [x, y]", [0, 0]),
    "minItems": 3,
    "examples": [[[0, 0], [6, 0], [6, 4.5], [0, 4.5]]],
}


def _rate(example: str, *more: str) -> schemas.Schema:
    return schemas.text("A figure with its unit, and the distance it holds at", example, *more)


Text: TypeAlias = Annotated[str, FromText(readers.name, schemas.text("A piece of text"))]
Notes: TypeAlias = Annotated[
    tuple[str, ...], FromText(readers.notes, {"anyOf": [_NOTES, {"type": "array", "items": _NOTES}]})
]
Purpose: TypeAlias = Annotated[
    str,
    FromText(
        values.in_text(purpose, "radiography"), {"enum": list(PURPOSES), "description": "What a room is for"}
    ),
]
RuleNames: TypeAlias = Annotated[
    tuple[tuple[str, tuple[parts.Goal, ...]], ...], FromText(readers.rule_goals, _RULES)
]
Space: TypeAlias = Annotated[
    str, FromText(values.in_text(space, "corridor"), schemas.text("A kind of space", "corridor", "office"))
]
Name: TypeAlias = Annotated[str, FromText(readers.name, schemas.text("A name given in this file"))]
MaterialName: TypeAlias = Annotated[
    str, FromText(readers.material, schemas.text("A material", "steel", "water"))
]

Length: TypeAlias = Annotated[Quantity, FromText(values.quantity("length"), schemas.LENGTH)]
LengthFromZero: TypeAlias = Annotated[
    Quantity, FromText(values.quantity("length", lowest_allowed=True), schemas.LENGTH)
]
Angle: TypeAlias = Annotated[Quantity, FromText(values.quantity("angle", lowest=-math.inf), _ANGLE)]
AnodeAngle: TypeAlias = Annotated[Quantity, FromText(values.quantity("angle", check=readers.acute), _ANGLE)]
Density: TypeAlias = Annotated[
    Quantity, FromText(values.quantity("density", check=readers.believable), schemas.quantity("density"))
]
Voltage: TypeAlias = Annotated[
    Quantity, FromText(values.quantity("voltage", check=readers.tube_voltage), schemas.quantity("voltage"))
]
Current: TypeAlias = Annotated[Quantity, FromText(values.quantity("current"), schemas.quantity("current"))]
Activity: TypeAlias = Annotated[
    Quantity,
    FromText(values.quantity("activity"), schemas.quantity("activity", examples=("3.7 TBq", "100 Ci"))),
]
TimePerWeek: TypeAlias = Annotated[
    Quantity, FromText(values.quantity("time per week", "charge per week"), _WEEKLY)
]
Duration: TypeAlias = Annotated[Quantity, FromText(values.quantity("time", "charge"), _TIME)]

Factor: TypeAlias = Annotated[float, FromText(values.factor, schemas.FACTOR)]
Weeks: TypeAlias = Annotated[float, FromText(values.weeks, _WEEKS)]
Date: TypeAlias = Annotated[str, FromText(values.iso_date, _DATE)]

Position: TypeAlias = Annotated[
    Point3, FromText(values.point, schemas.coordinates(3, "A position [x, y, z]", [3.0, 2.2, 1.0]))
]
PlanPosition: TypeAlias = Annotated[
    Point2, FromText(values.plan_point, schemas.coordinates(2, "A position on plan [x, y]", [3.0, 2.2]))
]
Corners: TypeAlias = Annotated[tuple[Point2, ...], FromText(values.corners, _CORNERS)]
Sizes: TypeAlias = Annotated[
    Point3, FromText(values.sizes, schemas.coordinates(3, "Sizes along x, y and z", [0.3, 0.2, 0.5]))
]
Direction: TypeAlias = Annotated[Point3, FromText(values.direction, _DIRECTION)]
Aim: TypeAlias = Annotated[Point3 | str, FromText(values.point_or_name, _aim_schema())]

MakeUp: TypeAlias = Annotated[parts.MakeUp, FromText(readers.make_up(open_allowed=True), _MAKE_UP)]
Floor: TypeAlias = Annotated[tuple[parts.MakeUp, bool], FromText(readers.floor, _FLOOR)]
Filtration: TypeAlias = Annotated[parts.MakeUp, FromText(readers.filtration, _LAYERS)]
OneLayer: TypeAlias = Annotated[
    parts.Layer, FromText(values.in_text_with_names(one_layer, "aluminium 3.2 mm"), _LAYER)
]
Leakage: TypeAlias = Annotated[
    parts.Leakage | None,
    FromText(
        readers.leakage,
        _rate("5 mGy/h at 1 m", "20 uSv/h at 1 m", "1 mGy/h at 1 m at 150 kV, 3.3 mA", "none"),
    ),
]
Output: TypeAlias = Annotated[
    Quantity,
    FromText(
        values.in_text(tube_output, "9.8 mGy m2/(mA min)"),
        _rate("9.8 mGy m2/(mA min) +/- 8 %", "0.05 mGy/(mA s) at 1 m"),
    ),
]
BeamField: TypeAlias = Annotated[parts.Field, FromText(values.in_text(beam_field, "cone 40 deg"), _FIELD)]
Nuclide: TypeAlias = Annotated[str, FromText(readers.nuclide, schemas.text("A nuclide", "Ir-192", "Co-60"))]
MassFractions: TypeAlias = Annotated[dict[str, float], FromText(readers.mass_fractions, _FRACTIONS)]
Formula: TypeAlias = Annotated[
    dict[str, float],
    FromText(
        values.in_text(mass_fractions, "CaSO4(H2O)2"), schemas.text("A formula", "CaSO4(H2O)2", "CaWO4")
    ),
]
NameLists: TypeAlias = Annotated[tuple[tuple[str, ...], ...], FromText(readers.name_lists, _NAME_LISTS)]
RateAtOneMetre: TypeAlias = Annotated[
    Quantity,
    FromText(values.in_text(leakage_rate, "20 uSv/h at 1 m"), _rate("20 uSv/h at 1 m", "45 mGy/h at 1 m")),
]
RateConstant: TypeAlias = Annotated[
    Quantity,
    FromText(
        values.quantity("air kerma rate constant", "ambient dose equivalent rate constant"),
        schemas.text("A rate constant", "0.11 mGy m2/(GBq h)", "0.14 mSv m2/(GBq h)"),
    ),
]
Speed: TypeAlias = Annotated[Quantity, FromText(values.quantity("speed"), schemas.quantity("speed"))]
Time: TypeAlias = Annotated[
    Quantity, FromText(values.quantity("time"), schemas.quantity("time", examples=("30 min", "90 d")))
]
HoursPerWeek: TypeAlias = Annotated[
    Quantity,
    FromText(values.quantity("time per week"), schemas.quantity("time per week", examples=("168 h/week",))),
]
Charge: TypeAlias = Annotated[
    Quantity,
    FromText(values.quantity("charge"), schemas.quantity("charge", examples=("2 mA s", "1.9 mA min"))),
]
AreaProductPerWeek: TypeAlias = Annotated[
    Quantity,
    FromText(values.quantity("kerma-area product per week"), schemas.quantity("kerma-area product per week")),
]
CountPerWeek: TypeAlias = Annotated[
    Quantity, FromText(values.in_text(per_week, "40/week"), schemas.text("A number per week", "40/week"))
]
Amount: TypeAlias = Annotated[
    Quantity,
    FromText(
        values.in_text(amount, "25 min"),
        schemas.text(
            "What falls in it, in the terms of the weekly figure", "25 min", "40 mA min", "4 cycles", "8 patients",
            "20 exposures", "20 Gy cm2",
        ),
    ),
]  # fmt: skip
Way: TypeAlias = Annotated[
    tuple[Point3, ...],
    FromText(
        readers.path,
        {
            "type": "array",
            "items": schemas.coordinates(3, "A position [x, y, z]", [0.5, 0.5, 0.3]),
            "minItems": 2,
            "examples": [[[0.5, 0.5, 0.3], [3, 2, 1]]],
        },
    ),
]
Shares: TypeAlias = Annotated[
    tuple[tuple[Quantity, float], ...],
    FromText(
        readers.shares,
        {
            "type": "object",
            "additionalProperties": schemas.FACTOR,
            "minProperties": 1,
            "examples": [{"70 kV": 0.3, "85 kV": 0.5, "100 kV": 0.2}],
        },
    ),
]
CollimatorText: TypeAlias = Annotated[
    parts.Collimator,
    FromText(
        values.in_text_with_names(collimator, "tungsten 20 mm"),
        schemas.text("Material and thickness, or transmission", "tungsten 20 mm", "1/200", "tungsten, 1/200"),
    ),
]
Variant: TypeAlias = Annotated[
    dict[str, str],
    FromText(
        readers.variant,
        {
            "type": "object",
            "minProperties": 1,
            "description": "Where a value stands, as keys joined by dots, and the text that stands there instead",
            "examples": [{"room.sides.north": "concrete 300 mm + lead 2 mm"}],
        },
    ),
]
OneGoal: TypeAlias = Annotated[parts.Goal, FromText(readers.one_goal, _GOAL)]
Goals: TypeAlias = Annotated[tuple[parts.Goal, ...], FromText(readers.goals, _GOALS)]
