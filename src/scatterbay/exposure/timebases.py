"""From rates to doses over each time base: what may be multiplied by what.

Occupancy enters week and year only. The use factor enters the primary beam in week and year only: in the worst
hour and the worst 8 h the beam may point at the one barrier all the time. Scatter and leakage always count in
full. Beams of one source are never on together; sources run together unless declared exclusive.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence

import numpy as np
from numpy.typing import NDArray

from scatterbay.scenario.parts import Beam, Scenario, Workload

Array = NDArray[np.float64]

HOUR, DAY = 3600.0, 8.0 * 3600.0


def together(scenario: Scenario) -> list[list[str]]:
    """Beams by sets of which only one is on at a time; sets run together."""
    sets: list[set[str]] = []
    for source in scenario.sources:
        names = {beam.name for beam in scenario.beams if beam.source == source.name}
        if names:
            sets.append(names)
    for group in scenario.never_together:
        touched = [s for s in sets if s & set(group)]
        whole = set(group).union(*touched) if len(group) > 1 else set()
        if whole and all(s <= set(group) for s in touched):
            sets = [s for s in sets if s not in touched] + [whole]
    return [[beam.name for beam in scenario.beams if beam.name in s] for s in sets]


def instantaneous(rates: Mapping[str, Array], sets: Sequence[Sequence[str]]) -> Array:
    """Highest rate at any moment, (replicates,): the strongest beam of each set, all sets together."""
    return np.asarray(sum(max((rates[b] for b in names), key=lambda r: float(r.mean())) for names in sets))


def within(
    rates: Mapping[str, Array], seconds: Mapping[str, float], span: float, sets: Sequence[Sequence[str]]
) -> Array:
    """Dose in the worst span of time [s], (replicates,).

    Each set fills the span with its beams, strongest first, each for no longer than its stated time.
    """
    total = np.zeros_like(next(iter(rates.values())))
    for names in sets:
        left = span
        for name in sorted(names, key=lambda b: -float(rates[b].mean())):
            used = min(seconds[name], left)
            total = total + used * rates[name]
            left -= used
    return total


def weekly(
    primary: Mapping[str, Array],
    other: Mapping[str, Array],
    beams: Sequence[Beam],
    loads: Mapping[str, Workload],
) -> tuple[Array, Array]:
    """Dose per week and per year at full occupancy, (replicates,) each."""
    week = year = np.zeros_like(next(iter(other.values())))
    for beam in beams:
        load = loads[beam.name]
        dose = (beam.use_factor * primary[beam.name] + other[beam.name]) * load.seconds_per_week
        week, year = week + dose, year + dose * load.weeks_per_year
    return week, year
