"""The program from Python: the same answers as the command line."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

from scatterbay.exposure.results import Assessment
from scatterbay.scenario.parts import Scenario

if TYPE_CHECKING:
    import pandas as pd


def assess(scenario: Scenario | str | Path) -> Assessment:
    """Assess a scenario, or the file it stands in.

    Raises
    ------
    ScenarioError : the file cannot be used. OutOfRangeError : something lies outside the data or the model.
    """
    from scatterbay.engine.contributions import contributions
    from scatterbay.engine.scene import build_scene
    from scatterbay.exposure.assess import assess as judge
    from scatterbay.scenario import load

    checked = scenario if isinstance(scenario, Scenario) else load(scenario)
    scene = build_scene(checked)
    return judge(checked, scene, contributions(scene))


def table(assessment: Assessment) -> pd.DataFrame:
    """An assessment as a tidy pandas table: one row per place, time base and goal, a unit beside every number."""
    from scatterbay.report.records import assessment_frame

    return assessment_frame(assessment)
