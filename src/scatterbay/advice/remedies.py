"""How much more of what: the least thickness with which every point of a surface meets every goal."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np

from scatterbay.advice.linings import (
    INSIDE,
    OUTSIDE,
    Lining,
    Rectangle,
    stock_for,
    to_line,
    whole,
    widened,
    with_lining,
    with_panel,
)
from scatterbay.advice.scan import PointResult, Scan, candidate, judged, scan
from scatterbay.engine.contributions import Kept
from scatterbay.engine.scene import Scene, build_scene
from scatterbay.scenario.parts import MakeUp, Scenario
from scatterbay.tables.sheets import SheetSold

FIRST_TRY = {"lead": 1e-3, "steel": 1e-2, "concrete": 5e-2, "barite concrete": 3e-2, "gypsum board": 5e-2}
"""Thickness tried first [m]; 20 mm of anything else."""
THICKEST = 2.0
"""[m] Nothing thicker is advised."""
CLOSE_ENOUGH = 0.004
"""The upper end of the worst figure lands this close under the goal, as a share."""
TRIES = 24
ROUNDS = 5
"""Times that a lining is tried on the whole surface and its rectangle or its points widened."""
WIDER = 0.25
"""What a rectangle is grown by on every side where points at its edge are still missed [m]."""
OVERLAP = 0.1
"""[m] beyond what must be lined, on every side: a hand's breadth (common practice for laps of sheet is less)."""


@dataclass(frozen=True)
class Remedy:
    """One way to meet every goal on a surface.

    ``lining``: with its exact thickness. ``ratio``: upper end over goal at the worst point with it. ``sold``: the
    next thickness up that is sold, its layers, and the ratio with it; None where nothing on the list is thick enough.
    ``other_face``: the ratio with the same thickness on the other face. ``why_not``: why this material does not do it;
    the rest then shows the most that was tried.
    """

    lining: Lining
    ratio: float
    sold: SheetSold | None = None
    sold_layers: MakeUp | None = None
    sold_ratio: float | None = None
    other_face: float | None = None
    why_not: str = ""


class _Trial:
    """Evaluates linings on a few points with the same scatter points every time."""

    def __init__(self, scenario: Scenario, points: Sequence[PointResult]) -> None:
        self.scenario, self.points = scenario, list(points)
        self.kept: Kept = {}
        self._known: dict[tuple[object, ...], float] = {}
        judged(
            scenario, build_scene(scenario), [candidate(p) for p in self.points], thin=False, kept=self.kept
        )

    def ratio(self, lining: Lining) -> float:
        """The worst ratio with a lining."""
        key = lining.where, lining.face, lining.material, lining.thickness, len(self.points)
        if key not in self._known:
            self._known[key] = self._worst(with_lining(self.scenario, lining))
        return self._known[key]

    def ratio_with(self, lining: Lining, layers: MakeUp) -> float:
        """The worst ratio with layers in a lining's place."""
        return self._worst(with_panel(self.scenario, lining, layers, "trial"))

    def _worst(self, amended: Scenario) -> float:
        points = [candidate(p) for p in self.points]
        return max(p.ratio for p in judged(amended, build_scene(amended), points, thin=False, kept=self.kept))


def remedy(scenario: Scenario, found: Scan, scene: Scene, material: str, limit: float = 1.0) -> Remedy:
    """The least thickness of a material, on the better face, that brings every point of a scan down to its goals.

    Solved on the real make-up by transport: each try computes the worst points again with the lining in place; the
    result is then tried on every point, and worst points that it leaves are taken in.

    Parameters
    ----------
    limit : upper end over goal that every point must reach; below 1 keeps a margin.
    """
    own = [point for point in found.close if point.on_face not in found.openings]
    if not any(point.ratio > limit for point in own):
        nothing = Lining(found.surface, whole(found.surface), INSIDE, material, 0.0)
        return Remedy(
            nothing, found.worst.ratio, why_not="what is missed is behind openings: see to those first"
        )
    where = to_line(found, scene, OVERLAP)
    trial = _Trial(scenario, own)
    result = _on_better_face(trial, found, where, material, limit)
    for _ in range(ROUNDS):
        if result.why_not:
            if where == whole(found.surface):
                return result
            where = whole(found.surface)
        else:
            again = scan(with_lining(scenario, result.lining), found.surface, found.standings, found.gap, found.step,
                         kept_close=trial.kept)  # fmt: skip
            mine = [p for p in again.close if p.on_face not in again.openings]
            left = [p for p in mine if p.ratio > limit * (1.0 + CLOSE_ENOUGH)]
            if not left:
                return replace(result, ratio=max(p.ratio for p in mine))
            inside = [p for p in left if _well_inside(where, p.on_face)]
            if len(inside) < len(left):
                where = widened(found.surface, where, WIDER)
            new = {p.on_face for p in trial.points}
            trial = _Trial(scenario, [*trial.points, *(p for p in left if p.on_face not in new)])
        result = _on_better_face(trial, found, where, material, limit, result.lining)
    return result


def _well_inside(where: Rectangle, at: tuple[float, float]) -> bool:
    return all(
        low + OVERLAP <= x <= high - OVERLAP for low, x, high in zip(where.low, at, where.high, strict=True)
    )


def _on_better_face(
    trial: _Trial, found: Scan, where: Rectangle, material: str, limit: float, before: Lining | None = None
) -> Remedy:
    """Solve on the inner face; on the outer one where the same thickness does better there.

    ``before``: the answer on a smaller rectangle or for fewer points, to start from on the same face.
    """
    if before is not None:
        again = _solve(trial, replace(before, where=where), limit)
        if not again.why_not:
            return _bought(trial, replace(again, other_face=_other(trial, again)), limit)
    inner = _solve(trial, Lining(found.surface, where, INSIDE, material, 0.0), limit)
    if inner.why_not:
        return inner
    over = trial.ratio(replace(inner.lining, face=OUTSIDE))
    if over > inner.ratio * (1.0 - CLOSE_ENOUGH):
        return _bought(trial, replace(inner, other_face=over), limit)
    outer = _solve(trial, replace(inner.lining, face=OUTSIDE), limit)
    return _bought(trial, replace(outer, other_face=_other(trial, outer)), limit)


def _other(trial: _Trial, one: Remedy) -> float:
    """The ratio with the same lining on the other face."""
    return trial.ratio(replace(one.lining, face=OUTSIDE if one.lining.face == INSIDE else INSIDE))


def _solve(trial: _Trial, lining: Lining, limit: float) -> Remedy:
    """The least thickness for which the worst ratio is at most the limit, and as near it as CLOSE_ENOUGH.

    The lining's own thickness, where it has one, is tried first.
    """

    def at(thickness: float) -> float:
        return math.log(max(trial.ratio(replace(lining, thickness=thickness)), 1e-12) / limit)

    first = FIRST_TRY.get(lining.material, 2e-2)
    low, at_low = 0.0, math.log(max(p.ratio for p in trial.points) / limit)
    high = lining.thickness or first
    at_high = at(high)
    while at_high > 0.0:
        gain = (at_low - at_high) / (high - low)
        if high >= THICKEST or (gain < 1e-3 / high and high > 4.0 * first):
            stuck = math.exp(at_high)
            why = (
                f"{1e3 * high:.0f} mm of {lining.material} still leaves {stuck:.2g} times what is allowed: the rest "
                "does not cross this part of the wall"
            )
            return Remedy(replace(lining, thickness=high), stuck * limit, why_not=why)
        low, at_low = high, at_high
        high = min(THICKEST, max(2.0 * high, min(4.0 * high, high + at_high / max(gain, 1e-9) * 1.1)))
        at_high = at(high)
    for _ in range(TRIES):
        if -CLOSE_ENOUGH <= at_high <= 0.0:
            break
        share = at_low / (at_low - at_high)
        middle = low + float(np.clip(share, 0.05, 0.95)) * (high - low)
        # Aim a little below the goal, so that the upper end of the bracket is what lands on it.
        middle += 0.4 * CLOSE_ENOUGH / max((at_low - at_high) / (high - low), 1e-9)
        value = at(min(middle, high * (1.0 - 1e-9)))
        if value > 0.0:
            low, at_low = middle, value
        else:
            high, at_high = middle, value
        if high - low < 1e-7:
            break
    return Remedy(replace(lining, thickness=high), math.exp(at_high) * limit)


def _bought(trial: _Trial, exact: Remedy, limit: float) -> Remedy:
    """With the next thickness up that is sold."""
    thickness = exact.lining.thickness
    while True:
        stock = stock_for(exact.lining.material, thickness)
        if stock is None:
            return exact
        sold, layers = stock
        ratio = trial.ratio_with(exact.lining, layers)
        if ratio <= limit * (1.0 + 1e-9):
            return replace(exact, sold=sold, sold_layers=layers, sold_ratio=ratio)
        thickness = sum(layer.counted_thickness for layer in layers.layers) * (1.0 + 1e-6)
