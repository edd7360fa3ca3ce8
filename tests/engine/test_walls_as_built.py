"""Walls as they are built: linings that stop, sockets, patches, windows in doors. Kind: limit, hand-worked cases."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from scatterbay.barriers.makeup import sheet
from scatterbay.engine.equivalent import equivalent_thickness
from scatterbay.engine.fabric import fabric_of
from scatterbay.engine.scene import build_scene
from scatterbay.scenario.make_ups import make_up
from scatterbay.scenario.parts import (
    Layer,
    LeadEquivalent,
    MakeUp,
    Opening,
    Panel,
    Place,
    Room,
    Scenario,
    Screen,
)
from scatterbay.tables.materials import material
from scatterbay.units import read
from tests.engine.bays import bay, computed

GYPSUM = "gypsum board 12.5 mm"
LINED = ("gypsum board 12.5 mm + lead 2 mm", "gypsum board 12.5 mm")


def leaking(
    room: Room, *places: tuple[str, tuple[float, float, float]], breadth: float = 0.1
) -> dict[str, float]:
    """Air kerma of the tube's leakage, which comes from one point, at places round a room with these faces."""
    scenario = walled(room, *places, breadth=breadth)
    rows = computed(scenario).rows
    return {r.place: float(r.values.mean(axis=0)[0]) for r in rows if r.path == "leakage"}


def walled(room: Room, *places: tuple[str, tuple[float, float, float]], breadth: float = 0.1) -> Scenario:
    scenario = bay()
    at = tuple(Place(name, point, "others", 1.0, "") for name, point in places)
    options = replace(scenario.options, breadth=breadth)
    return replace(scenario, room=room, places=at, bodies=(), options=options)


def room(**changes: object) -> Room:
    """The test bay's room with a south side of gypsum board."""
    found = bay().room
    south = replace(found.sides[0], make_up=make_up(GYPSUM))
    return replace(found, sides=(south, *found.sides[1:]), **changes)  # type: ignore[arg-type]


def panel(name: str, low: tuple[float, float], high: tuple[float, float], **what: str) -> Panel:
    ups = {key: make_up(text) for key, text in what.items()}
    return Panel(name, "south", "south", low, high, **ups)


# The source stands at (1.2, 1.8, 1.1); a place 1.8 m beyond the south side is met half way.
LOW, HIGH = (1.2, -1.8, 0.9), (1.2, -1.8, 4.1)
"""Places whose rays cross the side at 1.0 m and 2.6 m."""


def test_a_lining_that_stops_at_a_height() -> None:
    """Below it as if the whole side were lined, above it as if none of it were."""
    lining = panel("lining", (0.0, 0.0), (5.0, 2.1), inside="lead 2 mm")
    part = leaking(room(panels=(lining,)), ("low", LOW), ("high", HIGH))
    none = leaking(room(), ("low", LOW), ("high", HIGH))
    base = room()
    full_side = replace(base.sides[0], make_up=make_up("lead 2 mm + gypsum board 12.5 mm"))
    full = leaking(replace(base, sides=(full_side, *base.sides[1:])), ("low", LOW), ("high", HIGH))
    assert part["low"] == pytest.approx(full["low"], rel=1e-9)
    assert part["high"] == pytest.approx(none["high"], rel=1e-9)
    assert full["low"] < 0.2 * none["low"]


def test_a_socket_is_not_missed() -> None:
    """A box of 80 mm without the lead, 60 mm beside the ray: the place is judged through it; at 200 mm it is not."""
    lining = panel("lining", (0.0, 0.0), (5.0, 3.0), inside="lead 2 mm")
    near = panel("socket", (1.26, 0.96), (1.34, 1.04), make_up=GYPSUM)
    far = panel("socket", (1.40, 0.96), (1.48, 1.04), make_up=GYPSUM)
    none = leaking(room(), ("low", LOW))["low"]
    lined = leaking(room(panels=(lining,)), ("low", LOW))["low"]
    assert leaking(room(panels=(lining, near)), ("low", LOW))["low"] == pytest.approx(none, rel=1e-9)
    assert leaking(room(panels=(lining, near)), ("low", LOW), breadth=0.0)["low"] == pytest.approx(
        lined, rel=1e-9
    )
    assert leaking(room(panels=(lining, far)), ("low", LOW))["low"] == pytest.approx(lined, rel=1e-9)


def test_overlapping_sheets_add_up() -> None:
    sheets = [panel(f"sheet {k}", (0.0, 0.0), (2.0 + k, 3.0), inside="lead 1 mm") for k in (0, 1)]
    twice = leaking(room(panels=tuple(sheets)), ("low", LOW))["low"]
    once = panel("sheet", (0.0, 0.0), (3.0, 3.0), inside="lead 2 mm")
    assert twice == pytest.approx(leaking(room(panels=(once,)), ("low", LOW))["low"], rel=1e-9)


def test_sheets_are_put_on_the_face_that_is_named() -> None:
    fabric = fabric_of(
        room(panels=(panel("a", (0, 0), (1, 1), inside="lead 1 mm", outside="steel 2 mm"),)), []
    )
    own, both = fabric.stacks[0]
    assert own == (sheet("gypsum board", 0.0125),)
    assert both == (sheet("lead", 0.001), sheet("gypsum board", 0.0125), sheet("steel", 0.002))


def door(name: str, host: str, low: tuple[float, float], high: tuple[float, float], text: str) -> Opening:
    return Opening(name, host, low, high, make_up(text), "south")


def test_a_window_in_a_door_and_a_patch_beside_it() -> None:
    """Through the window its glass, through the door its leaf with the patch, through the wall the wall's own."""
    leaf = door("door", "south", (1.0, 0.0), (2.0, 2.0), "lead 3 mm")
    pane = door("pane", "door", (1.4, 1.2), (1.6, 1.4), "lead glass 4 mm")
    patch = Panel("patch", "door", "south", (1.0, 0.0), (2.0, 2.0), outside=make_up("lead 1 mm"))
    lining = panel("lining", (0.0, 0.0), (5.0, 3.0), inside="lead 0.5 mm")
    fabric = fabric_of(room(openings=(leaf, pane), panels=(lining, patch)), [])
    cells, kinds = fabric.cells[0], fabric.stacks[0]

    def at(x: float, y: float) -> object:
        i = int(np.searchsorted(cells.first, x, side="right"))
        j = int(np.searchsorted(cells.second, y, side="right"))
        return kinds[cells.kinds[i, j]]

    assert at(1.5, 1.3) == (sheet("lead glass", 0.004),)
    assert at(1.2, 1.3) == (sheet("lead", 0.003), sheet("lead", 0.001))
    assert at(3.0, 1.3) == (sheet("lead", 0.0005), sheet("gypsum board", 0.0125))


def test_a_window_in_a_screen() -> None:
    """A screen between source and place; the ray at 1.0 m passes its window, the one at 2.6 m does not."""
    screen = Screen("screen", (5.0, 0.5), (0.0, 0.5), 0.0, 2.9, make_up("lead 3 mm"))
    x_along = 5.0 - 1.2
    pane = Opening(
        "pane", "screen", (x_along - 0.3, 0.7), (x_along + 0.3, 1.6), make_up("lead glass 4 mm"), "screen"
    )
    solid = leaking(room(screens=(screen,)), ("low", LOW), ("high", HIGH))
    pierced = leaking(room(screens=(screen,), openings=(pane,)), ("low", LOW), ("high", HIGH))
    assert pierced["high"] == pytest.approx(solid["high"], rel=1e-9)
    assert pierced["low"] > 3.0 * solid["low"]


def test_the_thin_end_of_a_tolerance_counts_unless_told_otherwise() -> None:
    """Nominal 2 mm, guaranteed 1.8 mm: counted as 1.8 mm; at nominal as 2 mm. Density likewise."""
    lead = Layer("lead", read("2 mm +/- 0.2 mm", "length"))
    concrete = Layer("concrete", read("200 mm", "length"), density=read("2.3 g/cm3 +/- 0.1 g/cm3", "density"))
    found = room()
    for nominal, thickness, density in ((False, 0.0018, 2.2), (True, 0.002, 2.3)):
        layers = tuple(replace(one, at_nominal=nominal) for one in (lead, concrete))
        side = replace(found.sides[0], make_up=MakeUp(layers, ""))
        (stack,) = fabric_of(replace(found, sides=(side, *found.sides[1:])), []).stacks[0]
        assert stack[0].thickness == pytest.approx(thickness)
        assert stack[1].density_g_cm3 == pytest.approx(density)


def test_lead_is_equivalent_to_itself_and_glass_is_thicker() -> None:
    """2 mm of lead at 150 kV: itself; of glass with 56 % of lead at 5.2 g/cm3, near 2 x 11.35 / (5.2 x 0.56) mm."""
    assert equivalent_thickness(material("lead"), 0.002, 150.0, 0.0021) == pytest.approx(0.002, rel=1e-3)
    glass = material("lead glass")
    share = dict(glass.fractions)[82]
    by_mass = 0.002 * 11.35 / (glass.density_g_cm3 * share)
    found = equivalent_thickness(glass, 0.002, 150.0, by_mass)
    assert 0.8 * by_mass < found < 1.02 * by_mass


def test_a_layer_known_by_its_lead_is_solved_and_named() -> None:
    layer = Layer(
        "lead glass",
        read("7 mm", "length"),
        equivalent=LeadEquivalent(read("2 mm", "length"), read("150 kV", "voltage")),
    )
    found = room()
    side = replace(found.sides[0], make_up=MakeUp((layer,), "lead glass 2 mm Pb at 150 kV"))
    fabric = fabric_of(replace(found, sides=(side, *found.sides[1:])), [])
    assert fabric.stacks[0][0][0].thickness == pytest.approx(
        equivalent_thickness(material("lead glass"), 0.002, 150.0, 0.007)
    )
    assert "2 mm" in fabric.assumptions[0].text


def test_the_hands_breadth_is_named() -> None:
    assert any(a.topic == "hand's breadth" for a in build_scene(bay()).assumptions)


def test_a_lining_to_the_end_of_a_wall_has_no_edge_there() -> None:
    """Within a hand's breadth of the wall's end and of the floor, as if the whole side were made of it."""
    lining = panel("lining", (0.0, 0.0), (5.0, 3.0), inside="lead 2 mm")
    at = ("corner", (-0.02, -1.8, 0.9)), ("low", (1.2, -1.8, -1.0))
    base = room()
    full_side = replace(base.sides[0], make_up=make_up("lead 2 mm + gypsum board 12.5 mm"))
    full = leaking(replace(base, sides=(full_side, *base.sides[1:])), *at)
    assert leaking(room(panels=(lining,)), *at) == pytest.approx(full, rel=1e-9)
