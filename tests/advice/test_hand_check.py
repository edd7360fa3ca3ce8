"""The hand check. Kinds: limit (it adds up), independent route (factors again from closed forms and one barrier)."""

from __future__ import annotations

import math
from functools import cache

import numpy as np
import pytest

from scatterbay.advice.hand_check import Chain, hand_check
from scatterbay.engine.contributions import PLANE_BOUND, Contributions, Kept, contributions
from scatterbay.engine.fabric import sheets_of
from scatterbay.engine.scene import Scene, build_scene
from scatterbay.engine.single import transmission
from scatterbay.physics import dose
from scatterbay.scenario import load
from scatterbay.scenario.parts import Scenario

SHIPPED = ("weld-bay", "casting-cell", "pipe-shop", "projector-job", "radiography-room")


@cache
def checked(name: str) -> tuple[Scenario, Scene, Contributions, tuple[Chain, ...]]:
    scenario = load(f"scenarios/{name}.yaml")
    scene = build_scene(scenario)
    kept: Kept = {}
    found = contributions(scene, kept=kept)
    return scenario, scene, found, hand_check(scene, found, kept, [dose.AMBIENT] * len(scene.places))


@pytest.mark.parametrize("name", SHIPPED)
def test_the_factors_multiply_out_to_the_assessed_rate(name: str) -> None:
    """Within 1 % for every path laid out; and together they are all but a thousandth or so of each place's rate."""
    _, scene, found, chains = checked(name)
    row = dose.QUANTITIES.index(dose.AMBIENT)
    for chain in chains:
        rows = [r for r in found.rows if (r.place, r.beam, r.path) == (chain.place, chain.beam, chain.path)]
        rate = sum(r.drive * float(r.values[:, row].mean()) for r in rows)
        assert chain.product == pytest.approx(rate, rel=0.01), (chain.place, chain.path)
    for place in scene.places:
        rows = [
            r
            for r in found.rows
            if r.place == place.name and r.state in ("beam", "stored") and r.path != PLANE_BOUND
        ]
        whole = sum(r.drive * float(r.values[:, row].mean()) for r in rows)
        laid_out = sum(chain.product for chain in chains if chain.place == place.name)
        assert laid_out == pytest.approx(whole, rel=0.01)


def test_leakage_factor_by_factor() -> None:
    """Weld bay, aisle: 5 mGy/h at 1 m as stated; the distance by Pythagoras; the wall as one barrier at its angle."""
    scenario, scene, _, chains = checked("weld-bay")
    chain = next(c for c in chains if (c.place, c.path) == ("aisle", "leakage"))
    stated, squared, barrier, conversion = chain.steps
    place = next(p for p in scenario.places if p.name == "aisle")
    ray = np.subtract(place.at, scenario.beams[0].at)
    distance = math.sqrt(sum(x * x for x in ray))
    assert 3600e3 * stated.factor == pytest.approx(5.0, rel=1e-6)
    assert squared.factor == pytest.approx(1.0 / distance**2, rel=1e-9)
    north = next(side for side in scenario.room.sides if side.name == "north")
    leakage = scene.beams[0].leakage
    assert leakage is not None
    angle = math.acos(ray[1] / distance)
    passed = transmission(leakage.spectrum, sheets_of(north.make_up, ()), angle).plane
    kerma, ambient = (dose.QUANTITIES.index(q) for q in (dose.AIR_KERMA, dose.AMBIENT))
    assert barrier.factor == pytest.approx(float(passed[kerma]), rel=0.01)
    free = leakage.spectrum.dose_at_1_m()
    ratio = float(passed[ambient] * free[ambient] / (passed[kerma] * free[kerma]))
    assert conversion.factor == pytest.approx(ratio, rel=0.01)


def test_a_bare_gamma_source_factor_by_factor() -> None:
    """Casting cell, moulding floor: 1.85 TBq of Co-60 at 305.7 uGy m2/(GBq h) (LNHB lines, recomputed), 950 mm of
    concrete square on, as one barrier."""
    scenario, scene, _, chains = checked("casting-cell")
    chain = next(c for c in chains if (c.place, c.path) == ("moulding floor", "primary"))
    assert 3600e6 * chain.steps[0].factor == pytest.approx(305.7 * 1850.0, rel=0.01)
    ray = np.subtract(next(p for p in scenario.places if p.name == "moulding floor").at, scenario.beams[0].at)
    distance = math.sqrt(sum(x * x for x in ray))
    assert chain.steps[1].factor == pytest.approx(1.0 / distance**2, rel=1e-9)
    east = next(side for side in scenario.room.sides if side.name == "east")
    passed = transmission(
        scene.beams[0].spectrum, sheets_of(east.make_up, ()), math.acos(ray[0] / distance)
    ).plane
    assert chain.steps[2].factor == pytest.approx(
        float(passed[dose.QUANTITIES.index(dose.AIR_KERMA)]), rel=0.01
    )


def test_scatter_says_its_angle_and_energies() -> None:
    """Weld bay, office above: Compton's formula at the stated angle gives the stated energy, to the rounding."""
    _, _, _, chains = checked("weld-bay")
    chain = next(c for c in chains if (c.place, c.path) == ("office above", "scatter"))
    said = " ".join(chain.facts)
    angle = float(said.split("scattering ")[1].split(" deg")[0])
    before, after = (
        float(part.split(" keV")[0].split()[-1]) for part in said.split("mean energy")[1].split(",")
    )
    expected = before / (1.0 + before / 511.0 * (1.0 - math.cos(math.radians(angle))))
    assert after == pytest.approx(expected, abs=1.5)
    assert any("all orders" in step.what for step in chain.steps)
