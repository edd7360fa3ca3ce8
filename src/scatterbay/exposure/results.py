"""An assessment as plain records: what every report is made from."""

from __future__ import annotations

from dataclasses import dataclass, field

from scatterbay.scenario.parts import Assumption

TIME_BASES = ("rate", "hour", "day", "week", "year")
"""Instantaneous rate; dose in the worst hour; rate averaged over the worst 8 h; dose in a week; in a year."""

BELOW, ABOVE, CLOSE, NO_GOAL = "below", "above", "too close to call", "no goal"


@dataclass(frozen=True)
class Figure:
    """A value of one quantity over one time base, in base units (Gy or Sv; per second for rate and day).

    ``low`` and ``high``: the band of the model allowance and two standard errors.
    """

    time_base: str
    quantity: str
    value: float
    standard_error: float
    low: float
    high: float


@dataclass(frozen=True)
class PathShare:
    """One path's instantaneous rate while its beam is on [Gy/s, Sv/s]; ``bound`` marks a plane bound, not added.

    ``state``: beam; stored (``beam`` then names the source); travel and stuck, whose figures are the dose of one pass
    and of the whole time stuck [Gy, Sv], not rates. ``behind``: what lies in between.
    """

    beam: str
    path: str
    order: int
    rate: dict[str, float]
    standard_error: dict[str, float]
    bound: bool = False
    state: str = "beam"
    behind: str = "wall"
    week: dict[str, float] = field(default_factory=dict)
    """Dose of a week at full occupancy, by quantity [Gy, Sv]; empty for bounds and for what is stuck."""


@dataclass(frozen=True)
class GoalResult:
    """A design goal beside the figure of its own quantity and time base."""

    text: str
    figure: Figure
    goal: float
    verdict: str

    @property
    def fraction(self) -> float:
        """Figure over goal."""
        return self.figure.value / self.goal


@dataclass(frozen=True)
class Factors:
    """The multiplications behind a place's figures, one entry per beam: seconds on, use factor, weeks.

    ``cycles``: exposure cycles per week, in the worst hour and in the worst 8 h; None where they are not stated.
    ``annual``: mean output over the year over that of the design.
    """

    beam: str
    seconds: dict[str, float]
    use_factor: float
    weeks: float
    cycles: tuple[float, float, float] | None = None
    annual: float = 1.0


@dataclass(frozen=True)
class CycleDose:
    """Dose of one exposure cycle at a place, by quantity [Gy, Sv]: the exposure, and the passes out and back."""

    beam: str
    seconds: float
    exposed: dict[str, float]
    passes: dict[str, float]


@dataclass(frozen=True)
class StuckDose:
    """Dose at a place if a source is stuck for a time [s], by quantity [Gy, Sv]: in no other figure."""

    source: str
    seconds: float
    dose: dict[str, float]


@dataclass(frozen=True)
class Capacity:
    """The greatest weekly workload that keeps every weekly and annual goal, by the upper end of each figure's band.

    ``beam``: the beam, the others staying as stated; empty for all beams together. ``factor``: over the stated
    workload; infinite where nothing limits it. ``place`` and ``goal``: what limits it; empty where nothing does.
    """

    beam: str
    factor: float
    place: str
    goal: str
    stated: float = 1.0
    """The stated workload, in ``unit``."""
    unit: str = ""


@dataclass(frozen=True)
class Overridden:
    """A figure that a reviewer replaced: the computed one, the reviewer's, who and why."""

    computed: Figure
    figure: Figure
    by: str
    why: str


@dataclass(frozen=True)
class PlaceResult:
    """Everything about one place."""

    name: str
    at: tuple[float, float, float]
    how: str
    people: str
    area: str
    occupancy: float
    quantity: str
    """The quantity its figures are shown in first."""
    figures: dict[tuple[str, str], Figure]
    """By (time base, quantity)."""
    goals: tuple[GoalResult, ...]
    verdict: str
    reasons: tuple[str, ...]
    """Why the verdict is not what the figures alone would give."""
    paths: tuple[PathShare, ...]
    single_scatter: dict[str, float]
    """Rate of single scatter alone, by quantity."""
    all_scatter: dict[str, float]
    factors: tuple[Factors, ...]
    behind: str
    """The worst of what lies between the place and anything that radiates: open, lining, wall."""
    cycles: tuple[CycleDose, ...] = ()
    stuck: tuple[StuckDose, ...] = ()
    overridden: tuple[Overridden, ...] = ()
    """Figures that a reviewer replaced, with the computed ones."""
    survey_rate: dict[str, float] | None = None
    """Highest rate on the day of a planned survey; None where no day is stated."""

    def figure(self, time_base: str) -> Figure:
        """The figure of a time base in the place's own quantity."""
        return self.figures[time_base, self.quantity]


@dataclass(frozen=True)
class Assessment:
    """A whole bay, assessed."""

    title: str
    drawing: str
    path: str
    sha256: str
    seed: int
    places: tuple[PlaceResult, ...]
    assumptions: tuple[Assumption, ...]
    capacities: tuple[Capacity, ...] = ()
    left_out_of_capacity: tuple[str, ...] = ()
    """Places that could not be judged below a goal, and so do not count in the capacities."""
    rule_sets: tuple[str, ...] = ()
    """Rule sets that goals were taken from."""

    @property
    def worst(self) -> str:
        """The worst verdict of all places."""
        order = (ABOVE, CLOSE, NO_GOAL, BELOW)
        return min((place.verdict for place in self.places), key=order.index, default=NO_GOAL)
