"""What each barrier is made of, and how much it lets through of each source, square on."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from scatterbay.barriers.makeup import Sheets
from scatterbay.barriers.store import answer
from scatterbay.engine.scene import Scene
from scatterbay.physics import dose
from scatterbay.physics.spectrum import Spectrum
from scatterbay.scenario.parts import MakeUp, Scenario


@dataclass(frozen=True)
class Passed:
    """What a barrier lets through of one spectrum: air kerma behind over in front, square on, lit all over."""

    source: str
    what: str
    share: float


@dataclass(frozen=True)
class BarrierFacts:
    """A side, ceiling, floor, opening or screen: its make-up as text, what counts of it [mm], and what it passes."""

    name: str
    kind: str
    make_up: str
    counted_mm: float
    passed: tuple[Passed, ...]


def barrier_facts(scenario: Scenario, scene: Scene) -> tuple[BarrierFacts, ...]:
    """Every barrier of a scenario; of openings what is in them where no panel lies."""
    room = scenario.room
    found = []
    named: list[tuple[str, str, MakeUp]] = [(side.name, "side", side.make_up) for side in room.sides]
    named += [("ceiling", "ceiling", room.ceiling), ("floor", "floor", room.floor)]
    named += [(screen.name, "screen", screen.make_up) for screen in room.screens]
    for number, (name, kind, make_up) in enumerate(named):
        found.append(_facts(name, kind, make_up.text, scene.around.walls.stacks[number][0], scene))
    for opening in room.openings:
        number = scene.face_numbers[opening.on_face]
        mask = scene.of_opening[opening.name]
        stacks = [stack for k, stack in enumerate(scene.around.walls.stacks[number]) if mask >> k & 1]
        if stacks:
            found.append(
                _facts(opening.name, f"opening in {opening.host}", opening.make_up.text, stacks[0], scene)
            )
    return tuple(found)


def _facts(name: str, kind: str, text: str, sheets: Sheets, scene: Scene) -> BarrierFacts:
    counted = 1e3 * sum(one.thickness for one in sheets)
    passed = []
    if sheets:
        for source, output in scene.outputs.items():
            passed.append(Passed(source, "primary", transmitted(output.spectrum, sheets)))
            if output.leakage is not None:
                passed.append(Passed(source, "leakage", transmitted(output.leakage.spectrum, sheets)))
    return BarrierFacts(name, kind, text, counted, tuple(passed))


def transmitted(spectrum: Spectrum, sheets: Sheets) -> float:
    """Air kerma behind sheets over in front, square on, lit all over."""
    row = dose.QUANTITIES.index(dose.AIR_KERMA)
    behind = np.exp(answer(sheets).log_dose(spectrum.energy_kev, np.array([1.0]))[row, :, 0])
    return float(behind @ spectrum.photons / spectrum.kerma_at_1_m)
