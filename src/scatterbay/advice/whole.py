"""Advice for a whole bay: every surface that protects someone, the worst first, and what to add."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass

from scatterbay.advice.amend import Addition
from scatterbay.advice.linings import with_panel
from scatterbay.advice.remedies import Remedy, remedy
from scatterbay.advice.scan import Scan, scan, standings_behind
from scatterbay.advice.surfaces import GAP, STEP, names_of, surface_of
from scatterbay.engine.scene import build_scene
from scatterbay.errors import UsageError
from scatterbay.scenario.make_ups import make_up
from scatterbay.scenario.parts import Scenario

Told = Callable[[str], None]
"""Takes what is being worked on."""


@dataclass(frozen=True)
class SurfaceAdvice:
    """One surface: its scan as built, and the ways to meet its goals where one is missed."""

    scan: Scan
    remedies: tuple[Remedy, ...]

    @property
    def missed(self) -> bool:
        """Is the upper end over a goal somewhere that is this surface's own?"""
        scanned = self.scan
        return any(
            ratio > 1.0 and point.on_face not in scanned.openings
            for point, ratio in zip(scanned.points, scanned.ratios, strict=True)
        )


@dataclass(frozen=True)
class Advice:
    """All surfaces, worst first; those with nobody behind; and what is added when all advice is followed."""

    surfaces: tuple[SurfaceAdvice, ...]
    unoccupied: tuple[str, ...]
    additions: tuple[Addition, ...]
    mass: float
    limit: float


def surface_advice(
    scenario: Scenario, found: Scan, materials: Sequence[str], limit: float = 1.0
) -> SurfaceAdvice:
    """The remedies for a scanned surface; none where it needs none."""
    bare = SurfaceAdvice(found, ())
    if not bare.missed and limit >= 1.0:
        return bare
    scene = build_scene(scenario)
    return SurfaceAdvice(found, tuple(remedy(scenario, found, scene, name, limit) for name in materials))


def advise(
    scenario: Scenario,
    materials: Sequence[str],
    gap: float = GAP,
    limit: float = 1.0,
    told: Told | None = None,
    step: float = STEP,
) -> Advice:
    """Scan every surface that protects someone, openings first; solve each that misses a goal, with earlier additions.

    The addition counted for a missed surface is the first of ``materials`` that is sold thick enough.
    """
    scene = build_scene(scenario)
    surfaces, unoccupied, additions, mass = [], [], [], 0.0
    names = names_of(scenario.room)
    openings = [one.name for one in scenario.room.openings][::-1]
    current = scenario
    for name in [*openings, *(n for n in names if n not in openings)]:
        surface = surface_of(scenario, name)
        try:
            standings = standings_behind(scenario, scene, surface)
        except UsageError:
            unoccupied.append(name)
            continue
        if told:
            told(name)
        found = surface_advice(current, scan(current, surface, standings, gap, step), materials, limit)
        surfaces.append(found)
        best = next((one for one in found.remedies if one.sold is not None and not one.why_not), None)
        if best is not None and best.sold is not None and best.sold_layers is not None:
            label = f"added on {name}"
            additions.append(Addition(label, best.lining, best.sold.sold_as))
            current = with_panel(current, best.lining, make_up(best.sold.sold_as), label)
            mass += sold_mass(best)
    ranked = sorted(surfaces, key=lambda one: -one.scan.worst.ratio)
    return Advice(tuple(ranked), tuple(unoccupied), tuple(additions), mass, limit)


def sold_mass(one: Remedy) -> float:
    """Mass of what is ordered, at its nominal thickness [kg]."""
    if one.sold_layers is None or one.lining.thickness <= 0.0:
        return 0.0
    nominal = one.sold_layers.thickness
    return one.lining.mass() * nominal / one.lining.thickness
