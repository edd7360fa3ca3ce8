"""`python -m tests.benchmarks`: prints every measurement beside what it is compared with."""

from __future__ import annotations

import os

os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")

import tempfile

from tests.benchmarks import engine, walls
from tests.benchmarks.processes import FLOOR, scatterbay, timed

WELD_BAY = "scenarios/weld-bay.yaml"


def line(what: str, value: str, asked: str = "") -> None:
    """One measurement."""
    print(f"{what:<58} {value:>22}   {asked}")


def whole_processes() -> None:
    """Start-up, and the weld bay with walls kept and with nothing kept."""
    floor = timed(FLOOR)
    line("floor: import numpy, yaml, pydantic, typer, rich.table", f"{floor.seconds:.2f} s")
    version = timed(scatterbay("--version"))
    line("--version", f"{version.seconds / floor.seconds:.2f} floors", "at most 0.5")
    with tempfile.TemporaryDirectory() as folder:
        kept = timed(scatterbay("assess", WELD_BAY), SCATTERBAY_CACHE=folder)
    line("assess weld bay, walls kept", f"{kept.seconds / floor.seconds:.2f} floors", "at most 5")
    fresh = timed(scatterbay("assess", WELD_BAY), runs=3, SCATTERBAY_CACHE="off")
    slabs = walls.seconds_of_slabs(WELD_BAY)
    allowed = kept.seconds + 1.5 * slabs
    line("assess weld bay, nothing kept", f"{fresh.seconds:.2f} s")
    line("  over (kept + 1.5 x its slabs alone)", f"{fresh.seconds / allowed:.2f}", "at most 1")
    line("peak memory of assess, nothing kept", f"{fresh.megabytes:.0f} MB", "at most 400")


def drawings() -> None:
    """The plan of the weld bay, 200 points along its longer side, walls kept: against assessing it."""
    with tempfile.TemporaryDirectory() as folder:
        drawn = ("map", WELD_BAY, "-o", f"{folder}/plan.svg", "--force")
        found = timed(scatterbay(*drawn), runs=1, SCATTERBAY_CACHE=folder)
        kept = timed(scatterbay("assess", WELD_BAY), SCATTERBAY_CACHE=folder)
    line("map of the weld bay, 200 points", f"{found.seconds:.1f} s", "at most 20")
    line("  over assessing it", f"{found.seconds / kept.seconds:.1f}")
    line("peak memory of map", f"{found.megabytes:.0f} MB", "at most 600")


def main() -> None:
    """Everything."""
    whole_processes()
    drawings()
    line("three-layer wall from scratch", f"{walls.seconds_of_three_layers():.2f} s", "at most 1 on one core")
    bare, faced = engine.pairs_per_second()
    line("(scatter point, place) pairs, no barriers", f"{bare / 1e6:.2f} million/s", "at least 4")
    line("  cost with eight faces, over none", f"{bare / faced:.2f}", "at most 3")
    for what, slope in engine.slopes().items():
        line(f"cost against number of {what}, slope of log over log", f"{slope:.2f}", "about 1 or less")


main()
