"""Scatter points: places inside bodies where photons collide, with what they carry on arrival."""

from __future__ import annotations

from dataclasses import dataclass, fields

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
Ints = NDArray[np.int64]


@dataclass(frozen=True)
class ScatterPoints:
    """Collisions, all arrays of length n.

    Parameters
    ----------
    position : (n, 3) [m].
    direction : unit direction of arrival (n, 3).
    energy_kev : energy on arrival [keV].
    collisions : expected collisions per unit of output (per coulomb, per decay).
    matter : number of the matter collided with.
    order : 1 for the first collision of a source photon.
    replicate : number of the independent replicate.
    """

    position: Array
    direction: Array
    energy_kev: Array
    collisions: Array
    matter: Ints
    order: Ints
    replicate: Ints

    def __len__(self) -> int:
        return len(self.energy_kev)

    def some(self, chosen: NDArray[np.bool_] | Ints | slice) -> ScatterPoints:
        """Some of the points."""
        return ScatterPoints(*(getattr(self, f.name)[chosen] for f in fields(self)))

    @classmethod
    def joined(cls, parts: list[ScatterPoints]) -> ScatterPoints:
        """All points of several sets."""
        return cls(*(np.concatenate([getattr(p, f.name) for p in parts]) for f in fields(cls)))

    @classmethod
    def none(cls) -> ScatterPoints:
        """No points."""
        empty, whole = np.zeros(0), np.zeros(0, dtype=np.int64)
        return cls(np.zeros((0, 3)), np.zeros((0, 3)), empty, empty, whole, whole, whole)
