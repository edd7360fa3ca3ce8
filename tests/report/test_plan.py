"""The plan as a drawing. Kind: golden structure, limit."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from scatterbay.advice.dose_map import DoseMap, Plane, dose_map
from scatterbay.api import assess
from scatterbay.physics import dose
from scatterbay.report.plan import TINT, goal_lines, levels, plan_png, plan_svg
from tests.engine.bays import bay

PLAN = Plane(2, 1.0)


def test_the_same_input_gives_the_same_bytes_and_holds_the_words() -> None:
    scenario = replace(bay(), title="bay with $100 & <signs>")
    found, assessed = dose_map(scenario, PLAN, count=24), assess(scenario)
    one, two = (plan_svg(scenario, PLAN, found, assessed) for _ in range(2))
    assert one == two
    for words in ("bay with $100 &amp; &lt;signs&gt;", "DRAFT", "north: concrete 150 mm", "block", "above (z 3.9 m)",
                  "5.00 m", "1 m", "Local regulations", "Statistical error"):  # fmt: skip
        assert words in one, words
    assert "<dc:date>" not in one


def test_a_plan_without_doses() -> None:
    drawn = plan_svg(bay(), PLAN)
    assert "west: steel 20 mm" in drawn
    assert "Statistical error" not in drawn


def test_a_picture() -> None:
    assert plan_png(bay(), Plane(0, 2.0), None, None).startswith(b"\x89PNG")


def test_the_tint_only_gets_darker() -> None:
    """Readable by anyone and on a photocopy: luminance falls all the way."""
    colours = TINT(np.linspace(0.0, 1.0, 50))[:, :3]
    luminance = colours @ np.array([0.2126, 0.7152, 0.0722])
    assert (np.diff(luminance) < 0.0).all()


def test_levels_and_goal_lines() -> None:
    values = np.geomspace(1e-9, 1e-4, 400).reshape(20, 20) / 3600.0
    found = DoseMap(PLAN, "rate", dose.AMBIENT, np.arange(20.0), np.arange(20.0), values, 0.0 * values, 400)
    chosen = levels(found)
    assert (np.diff(np.log10(chosen)) < 0.6).all()
    assert (np.diff(chosen) > 0.0).all()
    yearly = replace(found, time_base="year")
    assert [(line.value, line.text) for line in goal_lines(bay(), yearly)] == [
        (0.3e-3, "0.3 mSv/year (others)")
    ]
    assert goal_lines(bay(), found) == []
