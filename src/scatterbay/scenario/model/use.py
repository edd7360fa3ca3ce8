"""Beams, how long they are on, the people and the places, as they are written."""

from __future__ import annotations

from typing import Literal

from pydantic import Field

from scatterbay.scenario.model.base import Form
from scatterbay.scenario.model.kinds import (
    Aim,
    Amount,
    Angle,
    AreaProductPerWeek,
    BeamField,
    Charge,
    CollimatorText,
    CountPerWeek,
    Factor,
    Goals,
    Length,
    LengthFromZero,
    Name,
    OneGoal,
    Output,
    PlanPosition,
    Position,
    RuleNames,
    Shares,
    Space,
    Text,
    Time,
    TimePerWeek,
    Voltage,
    Weeks,
)

Area = Literal["controlled", "supervised", "public"]


class Beam(Form):
    """A source at a position, pointed somewhere."""

    source: Name = Field(description="Name of the source")
    at: Position = Field(description="Position of the focal spot or the source [x, y, z]")
    aim: Aim | None = Field(
        None, description="A point on the axis [x, y, z], a body or place, or a direction word"
    )
    field: BeamField = Field(description="Shape of the beam")
    field_turned: Angle | None = Field(
        None, description="Rotation of the field about the axis; 0 if left out"
    )
    use_factor: Factor | None = Field(None, description="Share of the time it points this way; 1 if left out")
    object: Literal["in the beam", "left out"] | None = Field(
        None, description="Whether bodies weaken the primary beam; 'left out' (bare beam) if left out"
    )
    collimator: CollimatorText | None = Field(
        None, description="What stands round a sealed source everywhere but in the field"
    )
    behind: Text | None = Field(
        None, description="Preset attenuation behind the object, such as 'receptor'; none if left out"
    )


class Workload(Form):
    """How long a beam is on: give one of beam on, cycles, kerma-area product, patients."""

    beam_on: TimePerWeek | None = Field(None, description="Time or tube charge per week")
    cycles: CountPerWeek | None = Field(None, description="Exposure cycles of a sealed source per week")
    exposure: Time | None = Field(None, description="With cycles: how long the source is exposed in each")
    kerma_area_product: AreaProductPerWeek | None = Field(None, description="Kerma-area product per week")
    patients: CountPerWeek | None = Field(None, description="Patients per week")
    per_patient: Charge | None = Field(None, description="With patients: tube charge for each")
    voltages: Shares | None = Field(None, description="With patients: shares of the charge by voltage")
    worst_hour: Amount | None = Field(None, description="What falls in the worst hour, in the same terms")
    worst_day: Amount | None = Field(None, description="What falls in the worst 8 h, in the same terms")
    weeks: Weeks | None = Field(None, description="Weeks a year; 52 if left out")


class Technique(Form):
    """One kind of exposure with a beam."""

    beam: Name = Field(description="Name of the beam")
    voltage: Voltage = Field(description="Tube voltage")
    charge: Charge = Field(description="Tube charge of one exposure")
    exposures: CountPerWeek = Field(description="Exposures per week")
    worst_hour: Amount | None = Field(None, description="Exposures in the worst hour")
    worst_day: Amount | None = Field(None, description="Exposures in the worst 8 h")
    in_a_minute: int | None = Field(
        None, ge=1, le=600, description="Exposures within a minute at most; 1 if left out"
    )
    field: BeamField | None = Field(None, description="Shape of the beam; the beam's own if left out")
    output: Output | None = Field(None, description="Output measured at this voltage")
    weeks: Weeks | None = Field(None, description="Weeks a year; 52 if left out")


class People(Form):
    """A group of people and what they may receive."""

    area: Area | None = Field(None, description="The kind of area they are in, where a place does not say")
    goals: Goals | None = Field(None, description="Design goals, each with its time base")
    rules: RuleNames | None = Field(None, description="Entries of shipped rule sets to take goals from")


class Place(Form):
    """A point where someone may stand: give one of at, beyond, above, below."""

    at: Position | None = Field(None, description="The point itself [x, y, z]")
    beyond: Name | None = Field(None, description="Behind this side or opening, 0.3 m from its outer face")
    above: PlanPosition | None = Field(None, description="On the storey above [x, y], 0.5 m over its floor")
    below: PlanPosition | None = Field(None, description="On the storey below [x, y], 1.7 m over its floor")
    along: Length | None = Field(
        None, description="With beyond a side: distance from the side's first corner"
    )
    height: Length | None = Field(None, description="With beyond: height above the floor; 1.2 m if left out")
    gap: Length | None = Field(
        None, description="With beyond: distance from the outer face, instead of 0.3 m"
    )
    people: Name = Field(description="Name of the group")
    area: Area | None = Field(None, description="The kind of area it is; the group's if left out")
    space: Space | None = Field(
        None, description="Kind of space, to be told the occupancy factor suggested for it (never applied)"
    )
    occupancy: Factor | None = Field(None, description="Share of the time someone is there; 1 if left out")


class Override(Form):
    """A reviewer's own figure, judged instead of the computed one; both are shown."""

    place: Name = Field(description="Name of the place")
    figure: OneGoal = Field(description="The figure with its time base, as a goal is written")
    by: Text = Field(description="Who puts it there")
    why: Text = Field(description="Why")


class Options(Form):
    """Choices about the calculation."""

    primary_by: Literal["lit patch", "plane"] | None = Field(
        None, description="Judge the primary beam on the patch it lights, or on a wall lit everywhere"
    )
    breadth: LengthFromZero | None = Field(
        None,
        description="How far around it a ray takes the worst of a barrier or a beam's edge; 100 mm if left out",
    )
    seed: int | None = Field(None, ge=0, le=2**32 - 1, description="Seed of the sampling; 1 if left out")
