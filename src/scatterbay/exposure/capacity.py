"""Capacity: the greatest weekly workload that keeps every weekly and annual goal."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from scatterbay.exposure.rates import Rates
from scatterbay.exposure.results import Capacity, GoalResult
from scatterbay.exposure.timebases import Timing, by_beam, stored_doses
from scatterbay.physics import dose
from scatterbay.scenario.parts import Source, Workload, XrayTube

Array = NDArray[np.float64]


@dataclass(frozen=True)
class Judged:
    """A place that can be judged: its occupancy, its rates at the upper end of their bands, and its goals."""

    place: str
    occupancy: float
    high: Rates
    goals: tuple[GoalResult, ...]


@dataclass(frozen=True)
class _Load:
    """One goal at one place: what each beam adds to its figure, what is there without any, and the goal."""

    place: str
    goal: str
    value: float
    beams: dict[str, float]
    always: float


def capacities(timing: Timing, judged: Sequence[Judged], sources: Sequence[Source]) -> tuple[Capacity, ...]:
    """For all beams together, then for each beam with the others as stated.

    The figures are the upper ends of the bands, so that a workload up to the capacity would still be judged below.
    Statistics are taken per beam and added up, which is a little more than the band of the sum.
    """
    loads = [load for one in judged for load in _loads(timing, one)]
    names = [beam.name for beam in timing.beams]
    found = [_limit("", [(load, load.always, sum(load.beams.values())) for load in loads])]
    by_name = {source.name: source for source in sources}
    for name in names:
        cases = [
            (load, load.always + sum(load.beams.values()) - load.beams[name], load.beams[name])
            for load in loads
        ]
        stated, unit = _stated(timing.loads[name], by_name[timing.source_of[name]])
        found.append(replace(_limit(name, cases), stated=stated, unit=unit))
    return tuple(found)


def _stated(load: Workload, source: Source) -> tuple[float, str]:
    """A weekly workload in the terms it is spoken of."""
    if load.area_product is not None:
        return 1e4 * load.area_product[0], "Gy cm2/week"
    if load.cycles is not None:
        return load.cycles[0], "cycles/week"
    if not isinstance(source, XrayTube):
        return load.seconds_per_week / 3600.0, "h/week"
    charge = load.seconds_per_week * source.current.value
    if source.per_exposure is not None:
        return charge / source.per_exposure, "exposures/week"
    return charge * 1e3 / 60.0, "mA min/week"


def _limit(beam: str, cases: list[tuple[_Load, float, float]]) -> Capacity:
    """The smallest factor on the second figure that brings the sum of both up to a goal."""
    best = Capacity(beam, math.inf, "", "")
    for load, rest, mine in cases:
        if mine <= 0.0 and rest < load.value:
            continue
        factor = max(0.0, (load.value - rest) / mine) if mine > 0.0 else 0.0
        if factor < best.factor:
            best = Capacity(beam, factor, load.place, load.goal)
    return best


def _loads(timing: Timing, one: Judged) -> list[_Load]:
    """The weekly and annual goals of a place."""
    doses, stored = by_beam(timing, one.high), stored_doses(timing, one.high)
    found = []
    for goal in one.goals:
        base = {"week": 0, "year": 1}.get(goal.figure.time_base)
        if base is None:
            continue
        row = dose.QUANTITIES.index(goal.figure.quantity)
        beams = {name: one.occupancy * _upper(both[base][:, row]) for name, both in doses.items()}
        always = one.occupancy * _upper(stored[base][:, row])
        found.append(_Load(one.place, goal.text, goal.goal, beams, always))
    return found


def _upper(values: Array) -> float:
    """Mean and two standard errors."""
    error = float(values.std(ddof=1)) / math.sqrt(len(values)) if len(values) > 1 else 0.0
    return float(values.mean()) + 2.0 * error
