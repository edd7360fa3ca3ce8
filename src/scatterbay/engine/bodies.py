"""The bodies of a scene: how much matter lies on a ray, and where along it."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.energies import Rungs
from scatterbay.engine.media import Matter
from scatterbay.geometry.solids import Solid

Array = NDArray[np.float64]
Ints = NDArray[np.int64]

VOID = -1


@dataclass(frozen=True)
class Part:
    """A solid filled with the matter of that number (VOID: nothing), inside the part ``parent`` (or None)."""

    solid: Solid
    matter: int
    parent: int | None
    group: int
    """Number of the outermost part around it (its own, if it is outermost)."""


@dataclass(frozen=True)
class Track:
    """Rays cut at the surfaces they cross: ends (n, k + 1) in units of the ray, matter (n, k) of each piece."""

    ends: Array
    matter: Ints

    def depths(self, linear: Array, length: Array) -> Array:
        """Optical depth of each piece, shape (n, k), for attenuation (matters, n) [1/m] and ray length (n,) [m]."""
        padded = np.concatenate([linear, np.zeros((1, linear.shape[1]))])
        rows = np.arange(self.matter.shape[0])[:, None]
        return padded[self.matter, rows] * np.diff(self.ends, axis=1) * length[:, None]


@dataclass(frozen=True)
class Bodies:
    """Convex solids, disjoint or fully nested; where they nest, the innermost counts."""

    parts: Sequence[Part]
    matters: Sequence[Matter]

    @cached_property
    def groups(self) -> list[int]:
        """Numbers of the outermost parts."""
        return [k for k, part in enumerate(self.parts) if part.parent is None]

    def depth(
        self, start: Array, ray: Array, length: Array, rungs: Rungs, leave_out: int | None = None
    ) -> Array:
        """Optical depth from start (n, 3) along the ray (n, 3) to its end, shape (n,).

        ``leave_out``: number of a group that is not counted.
        """
        total = np.zeros(len(start))
        for excess, rays, inside in self.on_the_way(start, ray, length, leave_out):
            total[rays] += rungs.some(rays).of(excess) * inside
        return total

    def on_the_way(
        self, start: Array, ray: Array, length: Array, leave_out: int | None = None
    ) -> list[tuple[Array, Ints, Array]]:
        """What rays meet before their end: per part, its attenuation over its surroundings on the ladder [1/m],
        the numbers of the rays that meet it, and how far they run in it [m]."""
        found = []
        for part in self.parts:
            excess = self._excess(part)
            if part.group == leave_out or excess is None:
                continue
            near, far = part.solid.chord(start, ray)
            inside = np.minimum(far, 1.0) - np.maximum(near, 0.0)
            hit = np.flatnonzero(inside > 0.0)
            if hit.size:
                found.append((excess, hit, inside[hit] * length[hit]))
        return found

    def _excess(self, part: Part) -> Array | None:
        """Attenuation of a part over its surroundings on the ladder [1/m]; None where they are the same."""
        around = VOID if part.parent is None else self.parts[part.parent].matter
        if part.matter == around:
            return None
        own = self.matters[part.matter].linear if part.matter != VOID else 0.0
        other = self.matters[around].linear if around != VOID else 0.0
        return np.asarray(own - other)

    def track(self, start: Array, ray: Array, group: int | None = None) -> Track:
        """The pieces that rays are cut into ahead of their start; ``group`` limits it to one group's parts."""
        chosen = [part for part in self.parts if group is None or part.group == group]
        count = len(start)
        near, far = np.empty((len(chosen), count)), np.empty((len(chosen), count))
        for k, part in enumerate(chosen):
            enter, leave = part.solid.chord(start, ray)
            missed = leave <= 0.0
            near[k] = np.where(missed, 0.0, np.maximum(enter, 0.0))
            far[k] = np.where(missed, 0.0, leave)
        near, far = np.where(np.isfinite(near), near, 0.0), np.where(np.isfinite(far), far, 0.0)
        ends = np.sort(np.concatenate([near, far]).T, axis=1)
        middle = 0.5 * (ends[:, 1:] + ends[:, :-1])
        matter = np.full(middle.shape, VOID, dtype=np.int64)
        for k in self._outermost_first(chosen):
            inside = (middle > near[k][:, None]) & (middle < far[k][:, None])
            matter[inside] = chosen[k].matter
        return Track(ends, matter)

    def _outermost_first(self, chosen: Sequence[Part]) -> list[int]:
        def level(part: Part) -> int:
            return 0 if part.parent is None else 1 + level(self.parts[part.parent])

        return sorted(range(len(chosen)), key=lambda k: level(chosen[k]))

    def linear(self, rungs: Rungs) -> Array:
        """Linear attenuation of every matter at these energies, shape (matters, n) [1/m]."""
        return np.stack([rungs.of(matter.linear) for matter in self.matters])


def locate(track: Track, depths: Array, wanted: Array) -> tuple[Array, Ints]:
    """Ray parameter and matter where the optical depth from the start reaches ``wanted`` (n,)."""
    ends = np.cumsum(depths, axis=1)
    piece = np.minimum((ends <= wanted[:, None]).sum(axis=1), depths.shape[1] - 1)
    rows = np.arange(len(wanted))
    piece = _last_filled(depths, piece)
    before = np.where(piece > 0, ends[rows, piece - 1], 0.0)
    share = np.clip((wanted - before) / np.maximum(depths[rows, piece], 1e-300), 0.0, 1.0)
    low, high = track.ends[rows, piece], track.ends[rows, piece + 1]
    return low + share * (high - low), track.matter[rows, piece]


def _last_filled(depths: Array, piece: Ints) -> Ints:
    """Rounding may point behind the last piece that holds matter: step back to it."""
    rows = np.arange(len(piece))
    for _ in range(depths.shape[1]):
        empty = (depths[rows, piece] <= 0.0) & (piece > 0)
        if not empty.any():
            break
        piece = piece - empty
    return piece
