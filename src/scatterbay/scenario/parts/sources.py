"""What radiates."""

from __future__ import annotations

from dataclasses import dataclass

from scatterbay.scenario.parts.fabric import Layer, MakeUp, Point
from scatterbay.units import Quantity


@dataclass(frozen=True)
class Leakage:
    """Leakage at 1 m (air kerma rate or ambient dose equivalent rate), and the housing that hardens it.

    ``voltage`` and ``current``: the leakage technique factors it is stated at; None: at those in use.
    """

    rate: Quantity
    housing: str
    voltage: Quantity | None = None
    current: Quantity | None = None


@dataclass(frozen=True)
class XrayTube:
    """An X-ray tube: constant potential, current, filtration; measured output, half-value layer if given.

    ``voltages``: where the tube's charge is spread over several voltages, each with its share (they add up to 1);
    ``voltage`` is then the highest. ``set_name``: the tube that this is a setting of; beams of one set are never on
    together. ``output_at``, ``layer_at``: voltages at which the output and the half-value layer were measured; None:
    its own. ``per_exposure``: charge of one exposure [C] where the current is an average over a minute.
    """

    name: str
    voltage: Quantity
    current: Quantity
    filtration: MakeUp
    anode_angle: Quantity
    output: Quantity | None = None
    half_value_layer: Layer | None = None
    leakage: Leakage | None = None
    voltages: tuple[tuple[Quantity, float], ...] = ()
    set_name: str = ""
    per_exposure: float | None = None
    output_at: Quantity | None = None
    layer_at: Quantity | None = None


@dataclass(frozen=True)
class Container:
    """Where a source is stored: position, leakage at 1 m, what it is shielded with, and for how long [s/week].

    ``how``: where the leakage comes from, as it is printed ("class P", "certificate").
    """

    at: Point
    rate: Quantity
    housing: str
    seconds_per_week: float
    how: str


@dataclass(frozen=True)
class Travel:
    """The way of a source from its container to where it is exposed: corners of the way [m], and the speed."""

    path: tuple[Point, ...]
    speed: Quantity


@dataclass(frozen=True)
class Stuck:
    """What if the source does not come back: where it is stuck, and for how long."""

    at: Point
    duration: Quantity


@dataclass(frozen=True)
class SealedSource:
    """A sealed source: nuclide, activity on a date, the date assessed; both dates ISO or None.

    ``exchange_days``: time between exchanges, over which the annual figure averages the decay; None: no average.
    ``survey_date``: day on which a survey is planned. ``rate_constant``: the user's own air kerma rate constant;
    ``certificate``: the user's own dose rate at 1 m at the stated activity; either replaces the table's output.
    """

    name: str
    nuclide: str
    activity: Quantity
    activity_date: str | None = None
    assessed_date: str | None = None
    leakage: Leakage | None = None
    exchange_days: float | None = None
    survey_date: str | None = None
    rate_constant: Quantity | None = None
    certificate: Quantity | None = None
    container: Container | None = None
    travel: Travel | None = None
    stuck: Stuck | None = None


Source = XrayTube | SealedSource
