"""From rates to doses over each time base: what may be multiplied by what.

Occupancy enters week and year only. The use factor enters the primary beam in week and year only: in the worst
hour and the worst 8 h the beam may point at the one barrier all the time. Scatter and leakage always count in
full. Beams of one source are never on together; sources run together unless declared exclusive. A stored source
counts for the whole of the worst hour and the worst 8 h, also while it is exposed. Each exposure cycle is two passes
of the source. The mean over an exchange cycle enters the year only.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.contributions import PRIMARY, Contribution
from scatterbay.engine.looking import STORED, STUCK, TRAVEL
from scatterbay.exposure.rates import Rates
from scatterbay.scenario.parts import Beam, Scenario, SealedSource, Workload, XrayTube
from scatterbay.units.kinds import YEAR_WEEKS

Array = NDArray[np.float64]

HOUR, DAY = 3600.0, 8.0 * 3600.0
PASSES = 2.0
"""Passes of a source in one exposure cycle: out and back."""


@dataclass(frozen=True)
class Timing:
    """Who is on when. ``sets``: beams of which only one is on at a time. ``source_of``: source by beam.

    ``stored``: seconds a week, by source. ``annual``: mean output over the year, by source.
    """

    beams: tuple[Beam, ...]
    loads: Mapping[str, Workload]
    sets: list[list[str]]
    source_of: Mapping[str, str]
    stored: Mapping[str, float]
    annual: Mapping[str, float]


def timing_of(scenario: Scenario, loads: Sequence[Workload], annual: Mapping[str, float]) -> Timing:
    """The timing of a scenario; ``loads`` with every time known."""
    stored = {
        source.name: source.container.seconds_per_week
        for source in scenario.sources
        if isinstance(source, SealedSource) and source.container is not None
    }
    return Timing(
        scenario.beams, {load.beam: load for load in loads}, together(scenario),
        {beam.name: beam.source for beam in scenario.beams}, stored, annual,
    )  # fmt: skip


def together(scenario: Scenario) -> list[list[str]]:
    """Beams by sets of which only one is on at a time; sets run together."""
    owner = {
        source.name: (source.set_name if isinstance(source, XrayTube) else "") or source.name
        for source in scenario.sources
    }
    by_owner: dict[str, set[str]] = {}
    for beam in scenario.beams:
        by_owner.setdefault(owner[beam.source], set()).add(beam.name)
    sets = list(by_owner.values())
    for group in scenario.never_together:
        touched = [s for s in sets if s & set(group)]
        whole = set(group).union(*touched) if len(group) > 1 else set()
        if whole and all(s <= set(group) for s in touched):
            sets = [s for s in sets if s not in touched] + [whole]
    return [[beam.name for beam in scenario.beams if beam.name in s] for s in sets]


def time_bases(timing: Timing, occupancy: float, rates: Rates) -> dict[str, Array]:
    """Dose or rate over each time base, (replicates, q)."""
    whole = {beam.name: rates.whole(beam.name) for beam in timing.beams}
    hours = {name: load.seconds_in_worst_hour for name, load in timing.loads.items()}
    days = {name: load.seconds_in_worst_day for name, load in timing.loads.items()}
    stored = sum(rates.stored.values(), rates.nothing)
    week, year = rates.nothing, rates.nothing
    for beam_week, beam_year in by_beam(timing, rates).values():
        week, year = week + beam_week, year + beam_year
    stored_week, stored_year = stored_doses(timing, rates)
    return {
        "rate": instantaneous(whole, timing.sets, rates, timing.source_of),
        "hour": within(whole, hours, HOUR, timing.sets) + HOUR * stored + _passes(timing, rates, 1),
        "day": (within(whole, days, DAY, timing.sets) + DAY * stored + _passes(timing, rates, 2)) / DAY,
        "week": occupancy * (week + stored_week),
        "year": occupancy * (year + stored_year),
    }


def instantaneous(
    beams: Mapping[str, Array], sets: Sequence[Sequence[str]], rates: Rates, source_of: Mapping[str, str]
) -> Array:
    """Highest rate at any moment, (replicates, q): the strongest beam of each set, all sets together.

    A source is not stored while one of its beams is on. A source on its way is added, averaged over a minute.
    """
    total = sum(rates.minute.values(), rates.nothing)
    shown = dict.fromkeys(source_of.values())
    for names in sets:
        mine = [source for source in shown if source in {source_of[name] for name in names}]
        idle = sum((rates.stored[s] for s in mine if s in rates.stored), rates.nothing)
        choices = [idle]
        for name in names:
            choices.append(beams[name] + idle - rates.stored.get(source_of[name], rates.nothing))
        total = total + max(choices, key=lambda r: float(r.mean()))
    return np.asarray(total)


def within(
    rates: Mapping[str, Array], seconds: Mapping[str, float], span: float, sets: Sequence[Sequence[str]]
) -> Array:
    """Dose in the worst span of time [s], (replicates, q), of the beams alone.

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


def by_beam(timing: Timing, rates: Rates) -> dict[str, tuple[Array, Array]]:
    """Dose per week and per year of each beam at full occupancy, its passes included, (replicates, q) each."""
    found = {}
    for beam in timing.beams:
        load, source = timing.loads[beam.name], beam.source
        primary = rates.beams.get((PRIMARY, beam.name), rates.nothing)
        whole = rates.whole(beam.name)
        dose = (whole + (beam.use_factor - 1.0) * primary) * load.seconds_per_week
        if load.cycles is not None and source in rates.passes:
            dose = dose + PASSES * load.cycles[0] * rates.passes[source]
        found[beam.name] = dose, dose * load.weeks_per_year * timing.annual.get(source, 1.0)
    return found


def weekly_amount(timing: Timing, row: Contribution) -> float | None:
    """What a row's drive times values is multiplied by in a week: seconds, or passes; None where it has no part."""
    if row.bound or row.state == STUCK:
        return None
    if row.state == STORED:
        return timing.stored[row.beam]
    if row.state == TRAVEL:
        loads = [load for name, load in timing.loads.items() if timing.source_of[name] == row.beam]
        return PASSES * sum(load.cycles[0] for load in loads if load.cycles is not None)
    use = next(beam.use_factor for beam in timing.beams if beam.name == row.beam)
    return timing.loads[row.beam].seconds_per_week * (use if row.path == PRIMARY else 1.0)


def stored_doses(timing: Timing, rates: Rates) -> tuple[Array, Array]:
    """Dose per week and per year of all stored sources, (replicates, q) each: every week of the year."""
    week = sum((timing.stored[source] * rate for source, rate in rates.stored.items()), rates.nothing)
    return week, YEAR_WEEKS * week


def _passes(timing: Timing, rates: Rates, which: int) -> Array:
    """Dose of all passes in the worst hour (1) or the worst 8 h (2)."""
    total = rates.nothing
    for name, load in timing.loads.items():
        source = timing.source_of[name]
        if load.cycles is not None and source in rates.passes:
            total = total + PASSES * load.cycles[which] * rates.passes[source]
    return total
