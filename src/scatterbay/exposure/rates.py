"""Rates at one place, by what radiates."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.contributions import MINUTE, Contribution
from scatterbay.engine.looking import BEAM, STORED, TRAVEL
from scatterbay.physics import dose

Array = NDArray[np.float64]


@dataclass(frozen=True)
class Rates:
    """At one place, (replicates, q) each.

    ``beams``: rate while a beam is on, by (path, beam). ``stored``: rate of a stored source, by source. ``passes``:
    dose of one pass of a source, by source. ``minute``: highest of a source on its way, over a minute [per s].
    ``nothing``: zeros of the same shape.
    """

    beams: dict[tuple[str, str], Array]
    stored: dict[str, Array]
    passes: dict[str, Array]
    minute: dict[str, Array]
    nothing: Array

    def whole(self, beam: str) -> Array:
        """All paths of a beam."""
        return sum((rate for (_, name), rate in self.beams.items() if name == beam), self.nothing)


def by_quantity(values: Array) -> dict[str, float]:
    """Means over the replicates (replicates, q), by quantity."""
    return dict(zip(dose.QUANTITIES, map(float, values.mean(axis=0)), strict=True))


def rates_of(
    rows: Sequence[Contribution], factor: Callable[[Contribution], float], shape: tuple[int, ...]
) -> Rates:
    """Rates from the rows of one place, each times a factor."""
    found = Rates({}, {}, {}, {}, np.zeros(shape))
    for row in rows:
        value = factor(row) * row.drive * row.values
        if row.state == BEAM and not row.bound:
            key = row.path, row.beam
            found.beams[key] = found.beams.get(key, found.nothing) + value
        elif row.state == STORED:
            found.stored[row.beam] = value
        elif row.state == TRAVEL:
            (found.minute if row.path == MINUTE else found.passes)[row.beam] = value
    return found
