"""The faces of a scene with their make-ups, and dose per fluence behind whatever a ray crosses."""

from __future__ import annotations

import itertools
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from scatterbay.barriers.answer import Answer
from scatterbay.barriers.makeup import Sheets
from scatterbay.barriers.store import answer
from scatterbay.engine.energies import Ladder, Rungs
from scatterbay.errors import OutOfRangeError
from scatterbay.geometry.cells import MOST_KINDS
from scatterbay.geometry.enclosure import Crossings, Enclosure, FaceHits
from scatterbay.physics import dose

Array = NDArray[np.float64]
Ints = NDArray[np.int64]

COSINES = 48
MOST_CROSSED = 6
"""More faces than this on one ray are refused rather than cut short."""
SIDES = 2**MOST_KINDS
"""Room for a mask in the number that stands for a crossing."""

Crossing = tuple[int, bool, int]
"""Face number, outward or not, and mask of the kinds of make-up the ray may meet there."""
Signature = tuple[Crossing, ...]
"""The faces a ray crosses, in order."""


@dataclass(frozen=True)
class Behind:
    """ln dose per unit fluence behind one signature, on a mesh: values (q, cosines, rungs)."""

    inverse_cosines: Array
    values: Array

    def log_dose(self, rungs: Rungs, cosines: Array) -> Array:
        """(q, n) for energies (n,) and cosines (n,): linear in 1/cos and in ln E between mesh points.

        Rays more grazing than the most grazing mesh point (88 degrees) take its value, which is higher.
        """
        inverse = np.minimum(1.0 / cosines, self.inverse_cosines[-1])
        row = np.minimum(np.searchsorted(self.inverse_cosines, inverse, side="right") - 1, COSINES - 2)
        low = self.inverse_cosines[row]
        share = (inverse - low) / (self.inverse_cosines[row + 1] - low)
        first, last = self._at(row, rungs), self._at(row + 1, rungs)
        return first + share * (last - first)

    def _at(self, row: Ints, rungs: Rungs) -> Array:
        columns = self.values.shape[-1]
        flat = self.values.reshape(self.values.shape[0], -1)
        position = row * columns + rungs.index
        low = flat.take(position, axis=1)
        return low + rungs.share * (flat.take(position + 1, axis=1) - low)


@dataclass(frozen=True)
class Group:
    """Rays that cross the same faces in the same order: their numbers, and the least slanted of their cosines."""

    signature: Signature
    rays: Ints
    cosine: Array | None


@dataclass(frozen=True)
class Way:
    """Rays of one signature: their numbers, the mesh behind their walls (None: nothing there), their cosines."""

    rays: Ints
    behind: Behind | None
    cosine: Array | None


@dataclass
class Walls:
    """Faces, their make-ups as sheets from the inside (of a screen: its left) outwards, and answers kept.

    ``stacks``: by face number, the sheets of each kind of ``enclosure.cells``, its own (kind 0) first. No sheets
    stand for an open face. ``prefix``: sheets that stand in front of everything, in the beam itself.
    """

    enclosure: Enclosure
    stacks: Sequence[tuple[Sheets, ...]]
    ladder: Ladder
    prefix: Sheets = ()
    opened: Mapping[int, int] = field(default_factory=dict)
    """Mask of the kinds that are in openings, by face number."""
    _behind: dict[Signature, Behind] = field(default_factory=dict)

    def options(self, signature: Signature) -> list[Sheets]:
        """Every make-up that a ray of this signature may have met, as one stack of sheets each."""
        choices = [[self.prefix]]
        for face, outward, mask in signature:
            kinds = dict.fromkeys(stack for k, stack in enumerate(self.stacks[face]) if mask >> k & 1)
            choices.append([stack if outward else stack[::-1] for stack in kinds])
        return [tuple(itertools.chain(*combination)) for combination in itertools.product(*choices)]

    def answers(self, signature: Signature) -> list[Answer]:
        """The answers of those make-ups that hold anything."""
        return [answer(sheets) for sheets in self.options(signature) if sheets]

    def behind(self, signature: Signature) -> Behind:
        """The mesh of a signature; where a ray may meet several make-ups, the one that lets most through."""
        if signature not in self._behind:
            self._behind[signature] = self._mesh(signature)
        return self._behind[signature]

    def _mesh(self, signature: Signature) -> Behind:
        options = self.options(signature)
        energy = self.ladder.energy_kev
        least = answer(next(s for s in options if s)).cosines[0] if any(options) else 0.03
        cosines = np.exp(np.linspace(0.0, np.log(least), COSINES))
        cosines[-1] = least
        layers = []
        for sheets in options:
            if sheets:
                layers.append(answer(sheets).log_dose(energy, cosines).transpose(0, 2, 1))
            else:
                free = np.log(dose.per_fluence(energy))
                layers.append(np.broadcast_to(free[:, None, :], (free.shape[0], COSINES, free.shape[1])))
        return Behind(1.0 / cosines, np.ascontiguousarray(np.maximum.reduce(layers)))

    def ways(self, start: Array, end: Array) -> list[Way]:
        """Which walls lie between start (n, 3) and end (3,) or (n, 3) [m], for all rays, by signature."""
        found = []
        for group in self.groups(self.enclosure.crossings(start, end)):
            if not group.signature and not self.prefix:
                found.append(Way(group.rays, None, None))
                continue
            cosine = np.ones(group.rays.size) if group.cosine is None else group.cosine
            found.append(Way(group.rays, self.behind(group.signature), cosine))
        return found

    def groups(self, met: Crossings) -> list[Group]:
        """The rays of each signature that occurs."""
        numbers = met.numbers()
        most = int(numbers.max(initial=0))
        if most > MOST_CROSSED:
            raise OutOfRangeError(
                f"a straight line crosses {most} barriers; at most {MOST_CROSSED} are followed"
            )
        free = np.flatnonzero(numbers == 0)
        found = [Group((), free, None)] if free.size or not met.count else []
        if most <= 1:
            return found + [group for hit in met.hits for group in _by_code(hit)]
        return found + _in_order(met, np.flatnonzero(numbers > 0))


def _by_code(hit: FaceHits) -> list[Group]:
    """Rays that cross one face only, by direction and mask."""
    code = hit.outward * SIDES + hit.mask
    left, found = np.arange(len(hit.rays)), []
    while left.size:
        first = int(left[0])
        same = code[left] == code[first]
        rows = left[same]
        crossing = (hit.face, bool(hit.outward[first]), int(hit.mask[first]))
        found.append(Group((crossing,), hit.rays[rows], hit.cosine[rows]))
        left = left[~same]
    return found


def _in_order(met: Crossings, rays: Ints) -> list[Group]:
    """Rays that cross several faces, by the order in which they do."""
    shape = (len(met.hits), met.count)
    at, code, cosine = np.full(shape, np.inf), np.full(shape, -1, dtype=np.int64), np.zeros(shape)
    for k, hit in enumerate(met.hits):
        at[k, hit.rays] = hit.at
        code[k, hit.rays] = (hit.face * 2 + hit.outward) * SIDES + hit.mask
        cosine[k, hit.rays] = hit.cosine
    code = np.take_along_axis(code, np.argsort(at, axis=0, kind="stable"), axis=0)
    least_slanted = cosine.max(axis=0)
    left, found = rays, []
    while left.size:
        first = code[:, left[0]]
        same = (code[:, left] == first[:, None]).all(axis=0)
        signature = tuple(_decoded(int(one)) for one in first if one >= 0)
        found.append(Group(signature, left[same], least_slanted[left[same]]))
        left = left[~same]
    return found


def _decoded(code: int) -> Crossing:
    face, mask = divmod(code, SIDES)
    return face // 2, bool(face % 2), mask
