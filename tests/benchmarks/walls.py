"""Slabs and walls from scratch, in this process."""

from __future__ import annotations

import time

from scatterbay.barriers.answer import build_answer
from scatterbay.barriers.makeup import Sheets, merged, sheet
from scatterbay.engine.scene import build_scene
from scatterbay.engine.walls import Walls
from scatterbay.scenario import load

THREE = (sheet("concrete", 0.15), sheet("lead", 0.002), sheet("gypsum board", 0.0125))


def _seconds(sheets: Sheets) -> float:
    start = time.perf_counter()
    build_answer(sheets)
    return time.perf_counter() - start


def seconds_of_three_layers() -> float:
    """A three-layer wall whose kernels are not known yet."""
    build_answer((sheet("water", 0.01),))
    return _seconds(THREE)


def seconds_of_slabs(path: str) -> float:
    """All single slabs of the walls that a scenario's rays meet, each on its own."""
    from scatterbay.barriers import store
    from scatterbay.engine.contributions import contributions

    scene = build_scene(load(path))
    store.forget()
    contributions(scene)
    assert isinstance(scene.around.walls, Walls)
    met = list(store._memory)
    single = {(one,) for wall in met for one in merged(wall)}
    return sum(_seconds(sheets) for sheets in single)
