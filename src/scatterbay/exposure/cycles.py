"""What a sealed source gives per exposure cycle, if it is stuck, and on the day of a survey."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.contributions import Contribution
from scatterbay.engine.looking import STUCK
from scatterbay.engine.scene import Scene
from scatterbay.exposure.rates import Rates, by_quantity
from scatterbay.exposure.results import CycleDose, StuckDose
from scatterbay.exposure.timebases import PASSES, Timing, instantaneous

Array = NDArray[np.float64]


def cycle_doses(timing: Timing, rates: Rates) -> tuple[CycleDose, ...]:
    """Dose of one cycle of each beam for which cycles are stated: the exposure, and two passes."""
    found = []
    for name, load in timing.loads.items():
        if load.cycles is None:
            continue
        seconds = load.seconds_per_week / load.cycles[0]
        passes = PASSES * rates.passes.get(timing.source_of[name], rates.nothing)
        found.append(CycleDose(name, seconds, by_quantity(seconds * rates.whole(name)), by_quantity(passes)))
    return tuple(found)


def stuck_doses(scene: Scene, rows: Sequence[Contribution]) -> tuple[StuckDose, ...]:
    """Dose of every source that is asked about as stuck."""
    seconds = {one.source: one.seconds for one in scene.stuck}
    return tuple(
        StuckDose(row.beam, seconds[row.beam], by_quantity(seconds[row.beam] * row.drive * row.values))
        for row in rows
        if row.state == STUCK
    )


def survey_rate(scene: Scene, timing: Timing, rates: Rates) -> dict[str, float] | None:
    """Highest rate on the day of a survey, from what its sources have decayed to; containers as stated."""
    share = {name: one.survey for name, one in scene.outputs.items() if one.survey is not None}
    if not share:
        return None
    source_of = timing.source_of
    scaled = replace(
        rates,
        beams={key: share.get(source_of[key[1]], 1.0) * rate for key, rate in rates.beams.items()},
        minute={name: share.get(name, 1.0) * rate for name, rate in rates.minute.items()},
    )
    whole = {beam.name: scaled.whole(beam.name) for beam in timing.beams}
    return by_quantity(instantaneous(whole, timing.sets, scaled, source_of))
