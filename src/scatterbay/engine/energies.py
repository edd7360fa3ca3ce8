"""One fine ladder of energies for a scene: every table of the engine stands on it, and is looked up by index."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from scatterbay.physics.slab.grid import HIGHEST_KEV, LOWEST_KEV, TWIN_OFFSET

Array = NDArray[np.float64]
Ints = NDArray[np.int64]

STEPS = 500
BINS = 16384
CLOSEST = 2e-3


@dataclass(frozen=True)
class Rungs:
    """Where energies lie on the ladder: lower rung (n,), share of the step above it (n,)."""

    index: Ints
    share: Array

    def of(self, values: Array) -> Array:
        """A table over the ladder, shape (..., rungs), read at these energies: (..., n)."""
        low = values.take(self.index, axis=-1)
        high = values.take(self.index + 1, axis=-1)
        high -= low
        high *= self.share
        high += low
        return high

    def some(self, chosen: NDArray[np.bool_] | Ints) -> Rungs:
        """The rungs of some of the energies."""
        return Rungs(self.index[chosen], self.share[chosen])


@dataclass(frozen=True)
class Ladder:
    """Even steps of ln E from 10 to 1400 keV, with twin rungs at the edges given [keV]."""

    edges_kev: tuple[float, ...]

    @cached_property
    def energy_kev(self) -> Array:
        """The rungs, rising [keV]."""
        twins = np.array([e * f for e in self.edges_kev for f in (1 - TWIN_OFFSET, 1 + TWIN_OFFSET)])
        even = np.geomspace(LOWEST_KEV, HIGHEST_KEV, STEPS)
        even[0], even[-1] = LOWEST_KEV, HIGHEST_KEV
        if not twins.size:
            return even
        far = np.abs(np.log(even[:, None] / twins[None, :])).min(axis=1) > CLOSEST
        far[[0, -1]] = True
        return np.unique(np.concatenate([even[far], twins]))

    @cached_property
    def _log(self) -> Array:
        return np.log(self.energy_kev)

    @cached_property
    def _bins(self) -> tuple[Ints, float]:
        """Lower rung at the start of each of many narrow bins of ln E, and bins per unit of ln E."""
        scale = BINS / (self._log[-1] - self._log[0])
        starts = self._log[0] + np.arange(BINS + 1) / scale
        return np.clip(np.searchsorted(self._log, starts, side="right") - 1, 0, self._log.size - 2), scale

    def rungs(self, energy_kev: Array) -> Rungs:
        """Places on the ladder of energies inside it, shape (n,); below the lowest rung: the lowest."""
        bins, scale = self._bins
        log = np.log(np.maximum(energy_kev, LOWEST_KEV))
        index = bins[((log - self._log[0]) * scale).astype(np.int64)]
        top = self._log.size - 2
        for _ in range(3):
            index = np.minimum(index + (log >= self._log[index + 1]), top)
        below = self._log[index]
        return Rungs(index, (log - below) / (self._log[index + 1] - below))


def ladder(edges_kev: Iterable[float]) -> Ladder:
    """The ladder with these edges, each once, in order."""
    inside = (float(e) for e in edges_kev if LOWEST_KEV * 1.001 < e < HIGHEST_KEV)
    return Ladder(tuple(sorted(set(inside))))
