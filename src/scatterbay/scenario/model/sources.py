"""Sources as they are written: X-ray tubes and sealed sources."""

from __future__ import annotations

from typing import Annotated, Any

from pydantic import Discriminator, Field, Tag

from scatterbay.scenario.model.base import Form
from scatterbay.scenario.model.kinds import (
    Activity,
    AnodeAngle,
    Current,
    Date,
    Filtration,
    HoursPerWeek,
    Leakage,
    MaterialName,
    Nuclide,
    OneLayer,
    Output,
    Position,
    RateAtOneMetre,
    RateConstant,
    Speed,
    Text,
    Time,
    Voltage,
    Way,
)


class _Source(Form):
    leakage: Leakage = Field(None, description="What comes through the housing, at a distance, or 'none'")
    housing: MaterialName | None = Field(
        None, description="Material that hardens the leakage; lead if left out"
    )


class XrayTube(_Source):
    """An X-ray tube at constant potential."""

    x_ray_tube: Voltage = Field(description="Tube voltage")
    current: Current = Field(description="Tube current")
    filtration: Filtration | None = Field(
        None, description="All that filters the beam, the tube's own included"
    )
    half_value_layer: OneLayer | None = Field(
        None, description="Measured first half-value layer, instead of filtration"
    )
    anode_angle: AnodeAngle | None = Field(None, description="Angle of the target; 20 deg if left out")
    output: Output | None = Field(None, description="Measured output; the model's is used if left out")


class Container(Form):
    """Where a source is stored: a projector, a source changer."""

    at: Position = Field(description="Where it stands [x, y, z]")
    leakage: RateAtOneMetre | None = Field(
        None, description="Dose rate at 1 m from the source in it, as certified"
    )
    class_: Text | None = Field(None, description="Class whose limit is taken instead of a certified leakage")
    housing: MaterialName | None = Field(None, description="What it is shielded with; lead if left out")
    kept: HoursPerWeek | None = Field(None, description="How long it is stored there; 168 h/week if left out")


class Travel(Form):
    """The way of the bare source from its container to where it is exposed, and back."""

    path: Way = Field(description="Corners of the way, from the container outwards [[x, y, z], ...]")
    speed: Speed = Field(description="Speed on the way")


class Stuck(Form):
    """What if the source does not come back: a figure of its own, in no other."""

    at: Position = Field(description="Where it is stuck [x, y, z]")
    for_: Time = Field(description="For how long")


class SealedSource(_Source):
    """A sealed radioactive source."""

    sealed_source: Nuclide = Field(description="The nuclide")
    activity: Activity = Field(description="Its activity")
    on: Date | None = Field(None, description="Date the activity holds for")
    assessed_on: Date | None = Field(
        None, description="Date the activity is decayed to; not decayed if left out"
    )
    survey_on: Date | None = Field(None, description="Day of a planned survey: its readings are predicted")
    exchanged_every: Time | None = Field(
        None, description="Time between exchanges; the annual figure takes the mean over it"
    )
    rate_constant: RateConstant | None = Field(
        None, description="Your own rate constant, instead of the table's"
    )
    certificate: RateAtOneMetre | None = Field(
        None, description="Your own dose rate at 1 m at the stated activity, instead of the table's output"
    )
    container: Container | None = Field(None, description="Where it is stored")
    travel: Travel | None = Field(None, description="How it gets to where it is exposed")
    stuck: Stuck | None = Field(None, description="What if it is stuck")


def _which_source(value: Any) -> str | None:
    if not isinstance(value, dict) or ("x-ray tube" in value) == ("sealed source" in value):
        return None
    return "(tube)" if "x-ray tube" in value else "(sealed)"


Source = Annotated[
    Annotated[XrayTube, Tag("(tube)")] | Annotated[SealedSource, Tag("(sealed)")],
    Discriminator(_which_source, custom_error_type="source", custom_error_message="no source"),
]
