"""Beams, how long they are on, who stands where, and the design goals."""

from __future__ import annotations

from dataclasses import dataclass

from scatterbay.scenario.parts.fabric import MakeUp, Point
from scatterbay.units import Quantity


@dataclass(frozen=True)
class Field:
    """The shape of a beam. ``kind``: rectangle, cone, ring or everywhere.

    rectangle: full ``width`` (horizontal where the axis is not vertical) and ``height`` at ``distance`` [m],
    turned about the axis by ``turned`` [rad]. cone: ``half_angle`` [rad]. ring: all round the axis, up to
    ``half_angle`` [rad] to either side of the plane square to it (panoramic tubes). everywhere: 4 pi.
    """

    kind: str
    width: float = 0.0
    height: float = 0.0
    distance: float = 1.0
    half_angle: float = 0.0
    turned: float = 0.0
    text: str = ""


@dataclass(frozen=True)
class Collimator:
    """What stands around a sealed source everywhere except in the beam's port.

    Its ``transmission`` (dose, 0 to 1), or the ``thickness`` of its ``material``; one of the two is None.
    """

    material: str
    thickness: Quantity | None = None
    transmission: float | None = None


@dataclass(frozen=True)
class Beam:
    """Where a source stands and where it is pointed (``aim`` is a point [m]).

    ``behind_object``: preset attenuation behind the object (image receptor, table), counted in the primary only,
    with its name; None: none.
    """

    name: str
    source: str
    at: Point
    aim: Point
    field: Field
    use_factor: float
    object_in_beam: bool
    """True: bodies weaken the primary they stand in; False: bare beam (the protective default)."""
    collimator: Collimator | None = None
    behind_object: tuple[str, MakeUp] | None = None


@dataclass(frozen=True)
class Workload:
    """How long a beam is on. Times in s per week, in the worst hour, in the worst 8 h; weeks per year.

    ``cycles``: exposures per week, in the worst hour and in the worst 8 h, where they are stated.
    ``area_product``: kerma-area product per week, in the worst hour and in the worst 8 h [Gy m2]; where it is given
    the times are 0 until the engine has found them from the tube's output.
    """

    beam: str
    seconds_per_week: float
    seconds_in_worst_hour: float
    seconds_in_worst_day: float
    weeks_per_year: float
    cycles: tuple[float, float, float] | None = None
    area_product: tuple[float, float, float] | None = None


@dataclass(frozen=True)
class Goal:
    """A design goal: a value of a quantity over a time base.

    ``quantity``: ``air kerma`` or ``ambient dose equivalent`` (H*(10)). ``time_base``: rate, hour, day, week
    or year. ``value`` in Gy or Sv for hour, week and year; in Gy/s or Sv/s for rate and day (8 h average).
    """

    time_base: str
    quantity: str
    value: float
    text: str
    source: str = ""
    """The rule set it was taken from; empty where the author states it."""


@dataclass(frozen=True)
class Override:
    """A reviewer's own figure in the place of a computed one: where, what (as a goal says it), who and why."""

    name: str
    place: str
    figure: Goal
    by: str
    why: str


@dataclass(frozen=True)
class People:
    """A group of people and their design goals. ``area``: the area they are in where a place does not say."""

    name: str
    area: str
    goals: tuple[Goal, ...]


@dataclass(frozen=True)
class Place:
    """A point where someone may stand [m], who, how much of the time, and how the point was found.

    ``area``: controlled, supervised or public, where the place itself is designated. ``space``: kind of space, for
    which an occupancy factor is suggested; never applied.
    """

    name: str
    at: Point
    people: str
    occupancy: float
    how: str
    area: str = ""
    space: str = ""
