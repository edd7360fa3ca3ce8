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
    Leakage,
    MaterialName,
    Nuclide,
    OneLayer,
    Output,
    Voltage,
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


class SealedSource(_Source):
    """A sealed radioactive source."""

    sealed_source: Nuclide = Field(description="The nuclide")
    activity: Activity = Field(description="Its activity")
    on: Date | None = Field(None, description="Date the activity holds for")
    assessed_on: Date | None = Field(
        None, description="Date the activity is decayed to; not decayed if left out"
    )


def _which_source(value: Any) -> str | None:
    if not isinstance(value, dict) or ("x-ray tube" in value) == ("sealed source" in value):
        return None
    return "(tube)" if "x-ray tube" in value else "(sealed)"


Source = Annotated[
    Annotated[XrayTube, Tag("(tube)")] | Annotated[SealedSource, Tag("(sealed)")],
    Discriminator(_which_source, custom_error_type="source", custom_error_message="no source"),
]
