"""How much more of what. Kind: round trips, published layers, limit."""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np
import pytest

from scatterbay.advice.amend import Addition, amended_text
from scatterbay.advice.linings import Lining, Rectangle, stock_for, whole, with_lining, with_panel
from scatterbay.advice.remedies import remedy
from scatterbay.advice.scan import Scan, Standing, scan
from scatterbay.advice.surfaces import surface_of
from scatterbay.advice.whole import advise
from scatterbay.engine.scene import build_scene
from scatterbay.errors import UsageError
from scatterbay.scenario import loads
from scatterbay.scenario.make_ups import make_up
from scatterbay.scenario.parts import Scenario, Screen
from tests.engine.bays import TEXT, bay

ALL = (Standing("others", 1.0, "others", (0.0, 0.0, 0.0)),)


def looked(scenario: Scenario, name: str, step: float = 0.2) -> Scan:
    return scan(scenario, surface_of(scenario, name), ALL, step=step)


def tightened(scenario: Scenario, found: Scan, times: float) -> Scenario:
    """With an annual goal that the worst point misses by this factor."""
    group = scenario.people[0]
    goal = group.goals[0]
    tight = replace(goal, value=goal.value * found.worst.ratio / times, text="a tight goal")
    return replace(scenario, people=(replace(group, goals=(tight,)),))


def generated(seed: int) -> Scenario:
    """A bay of random size, walls, voltage and place of the source."""
    random = np.random.default_rng(seed)
    wall = random.choice(
        ["concrete 120 mm", "steel 8 mm", "gypsum board 25 mm + lead 1 mm", "clay brick 200 mm"]
    )
    text = TEXT.replace("150 kV", f"{random.integers(80, 300)} kV")
    text = text.replace("north: concrete 150 mm", f"north: {wall}")
    text = text.replace(
        "at: [1.2, 1.8, 1.1]", f"at: [{random.uniform(0.6, 1.8):.2f}, {random.uniform(1, 3):.2f}, 1.1]"
    )
    text = text.replace("leakage: 1 mGy/h", f"leakage: {random.uniform(0.5, 10):.2f} mGy/h")
    return loads(text, f"bay {seed}")


@pytest.mark.parametrize("seed", range(50))
def test_the_exact_thickness_lands_on_the_goal_and_what_is_sold_meets_it(seed: int) -> None:
    """Round trip: scanned again with the exact thickness the worst point is within 1 % under the goal.

    Every tenth bay with a body that scatters, whose sampling may differ a little the second time.
    """
    scatters = seed % 10 == 0
    scenario = generated(seed) if scatters else replace(generated(seed), bodies=())
    step = 0.6
    scenario = tightened(scenario, looked(scenario, "north", step=step), 2.0 + seed / 5.0)
    found = looked(scenario, "north", step=step)
    material = ("lead", "concrete", "steel")[seed % 3]
    one = remedy(scenario, found, build_scene(scenario), material)
    assert one.why_not == ""
    again = looked(with_lining(scenario, one.lining), "north", step=step)
    assert (0.97 if scatters else 0.99) < again.worst.ratio < (1.03 if scatters else 1.005)
    if one.sold_layers is not None:
        bought = with_panel(scenario, one.lining, one.sold_layers, "added")
        assert looked(bought, "north", step=step).worst.ratio <= (1.03 if scatters else 1.0)


def test_one_concrete_wall_against_the_tenth_value_layer() -> None:
    """A tenth of what Ir-192 gives behind concrete takes one tenth-value layer more: 140 mm (ASTM E94, as printed).

    The transport's own, for 2.35 g/cm3, lies within 15 %, as the fits of equilibrium layers do.
    """
    text = TEXT.replace("x-ray tube: 150 kV, current: 5 mA, filtration: aluminium 3 mm, leakage: 1 mGy/h at 1 m",
                        "sealed source: Ir-192, activity: 10 GBq")  # fmt: skip
    text = text.replace("field: 250 mm x 200 mm at 1.3 m", "field: all round").replace(
        "concrete 150 mm", "concrete 300 mm"
    )
    scenario = replace(loads(text, "gamma"), bodies=())
    scenario = tightened(scenario, looked(scenario, "north", step=1.0), 10.0)
    found = looked(scenario, "north", step=1.0)
    one = remedy(scenario, found, build_scene(scenario), "concrete")
    assert 1e3 * one.lining.thickness == pytest.approx(140.0, rel=0.15)


def test_one_lead_wall_against_the_tenth_value_layer() -> None:
    """Ir-192 behind 20 mm of lead: a tenth takes 20 mm more (NCRP 49 table 28, recalled), within 15 %."""
    text = TEXT.replace("x-ray tube: 150 kV, current: 5 mA, filtration: aluminium 3 mm, leakage: 1 mGy/h at 1 m",
                        "sealed source: Ir-192, activity: 10 GBq")  # fmt: skip
    text = text.replace("field: 250 mm x 200 mm at 1.3 m", "field: all round")
    text = text.replace("north: concrete 150 mm", "north: lead 30 mm")
    scenario = replace(loads(text, "gamma"), bodies=())
    scenario = tightened(scenario, looked(scenario, "north", step=1.0), 10.0)
    found = looked(scenario, "north", step=1.0)
    one = remedy(scenario, found, build_scene(scenario), "lead")
    assert 1e3 * one.lining.thickness == pytest.approx(20.0, rel=0.15)


def test_more_never_gives_more() -> None:
    """The figure itself falls with every millimetre on either face."""
    scenario = bay()
    surface = surface_of(scenario, "north")
    for face in ("inside", "outside"):
        figures = []
        for thickness in (0.0, 0.5e-3, 1e-3, 2e-3, 4e-3):
            lining = Lining(surface, whole(surface), face, "lead", thickness)
            amended = with_lining(scenario, lining) if thickness else scenario
            figures.append(looked(amended, "north", step=1.0).worst.best_ratio)
        assert (np.diff(figures) < 0.0).all()


def test_what_does_not_cross_the_wall_is_not_blamed_on_it() -> None:
    """A screen of 1 m with the source 2.5 m up: points behind its upper edge are lit over it, whatever is put on it."""
    scenario = replace(bay(), bodies=())
    screen = Screen("screen", (4.0, 0.5), (4.0, 3.5), 0.0, 1.0, make_up("lead 1 mm"))
    beams = tuple(replace(beam, at=(1.2, 1.8, 2.5), aim=(1.2, 1.8, 0.0)) for beam in scenario.beams)
    scenario = replace(scenario, room=replace(scenario.room, screens=(screen,)), beams=beams)
    scenario = tightened(scenario, looked(scenario, "screen"), 4.0)
    found = looked(scenario, "screen")
    one = remedy(scenario, found, build_scene(scenario), "lead")
    assert "does not cross this part of the wall" in one.why_not
    assert one.sold is None


def test_stock_counts_at_its_least() -> None:
    """1.72 mm is more than the 1.71 mm that code 4 guarantees (EN 12588, recalled): the next code up is named."""
    assert stock_for("lead", 1.70e-3) is not None
    sold = [found[0].sold_as for t in (1.70e-3, 1.72e-3) if (found := stock_for("lead", t))]
    assert sold == ["lead code 4", "lead code 5"]
    assert stock_for("lead", 1.0) is None


def test_the_file_as_amended_says_what_was_advised() -> None:
    """Comments stay, the panel is where it was put, and the rest of the file is as it was."""
    base = TEXT.replace("  ceiling:", "  # the roof leaks\n  ceiling:")
    surface = surface_of(loads(base, "bay"), "north")
    part = Lining(surface, Rectangle((1.0, 0.0), (3.0, 2.0)), "outside", "lead", 1e-3)
    all_over = replace(part, where=whole(surface))
    added = [Addition("one", part, "lead code 3"), Addition('two: "x"', all_over, "lead 1 mm +/- 0.1 mm")]
    both = amended_text(base, added)
    found = loads(both, "amended")
    one, two = found.room.panels
    assert (one.low, one.high) == ((1.0, 0.0), (3.0, 2.0))
    assert one.outside is not None
    assert one.outside.text == "lead code 3"
    assert (two.name, two.low, two.high) == ('two: "x"', (0.0, 0.0), (5.0, 3.0))
    assert "# the roof leaks" in both
    kept = [
        line for line in both.splitlines() if "one" not in line and "two" not in line and "panels" not in line
    ]
    assert kept == [line for line in base.splitlines() if "one" not in line]


def test_a_room_in_flow_style_is_amended_too() -> None:
    flow = TEXT.replace(
        TEXT[TEXT.index("room:") : TEXT.index("bodies:")],
        "room: {corners: [[0, 0], [5, 0], [5, 4], [0, 4]], height: 3 m, sides: {south: concrete 150 mm, "
        "east: concrete 200 mm, north: concrete 150 mm, west: steel 20 mm}, ceiling: concrete 120 mm, "
        "floor: on the ground}\n",
    )
    surface = surface_of(loads(flow, "bay"), "north")
    lining = Lining(surface, whole(surface), "inside", "lead", 1e-3)
    text = amended_text(flow, [Addition("a", lining, "lead code 3"), Addition("b", lining, "lead code 3")])
    assert [p.name for p in loads(text, "amended").room.panels] == ["a", "b"]


def test_a_file_without_a_room_is_refused() -> None:
    surface = surface_of(bay(), "north")
    with pytest.raises(UsageError, match="no room"):
        amended_text(
            "title: x\n",
            [Addition("a", Lining(surface, whole(surface), "inside", "lead", 1e-3), "lead code 3")],
        )


def test_advice_for_a_whole_bay_is_enough() -> None:
    """What is advised for every surface, added to the file, leaves none missed."""
    text = TEXT.replace("0.3 mSv/year", "0.03 mSv/year")
    scenario = loads(text, "bay")
    found = advise(scenario, ["lead"], step=0.6)
    assert any(one.missed for one in found.surfaces)
    assert set(found.unoccupied) == {"south"}
    amended = loads(amended_text(text, found.additions), "amended")
    again = advise(amended, ["lead"], step=0.6)
    assert not any(one.missed for one in again.surfaces)
    assert math.isclose(again.mass, 0.0)
    assert found.mass > 0.0
