"""Reports hold what the assessment holds, and nothing a spreadsheet or a terminal would trip over.

Kind: golden structure, limit.
"""

from __future__ import annotations

import csv
import io
import json

import pytest

from scatterbay.api import assess, table
from scatterbay.exposure.results import TIME_BASES, Assessment
from scatterbay.report.cautions import CAUTIONS
from scatterbay.report.records import assessment_record, assessment_rows
from scatterbay.report.screen import Screen
from scatterbay.report.terminal import show_assessment
from scatterbay.report.text import as_csv, as_json
from scatterbay.scenario import loads
from tests.engine.bays import TEXT


@pytest.fixture(scope="module")
def found() -> Assessment:
    text = TEXT.replace("goals: [0.3 mSv/year]", "goals: [0.3 mSv/year, 0.1 mGy/week, 2 mrem in an hour]")
    return assess(loads(text.replace("title: test bay", "title: '=SUM(A1) [bold]bay[/bold]'"), "bay.yaml"))


def test_json_holds_every_promised_key(found: Assessment) -> None:
    record = json.loads(as_json(assessment_record(found)))
    assert record["cautions"] == list(CAUTIONS)
    assert len(record["places"]) == 5
    for place in record["places"]:
        for base in TIME_BASES:
            assert set(place[base]) >= {"value", "unit", "quantity", "standard_error"}
        assert set(place["single_scatter_rate"]) == {"value", "unit", "quantity"}
        assert {g["time_base"] for g in place["goals"]} == {"year", "week", "hour"}
        for goal in place["goals"]:
            assert set(goal) >= {"time_base", "value", "unit", "fraction", "verdict"}
        assert {p["path"] for p in place["paths"]} <= {"primary", "scatter", "leakage"}
        assert all(set(p) >= {"beam", "path", "order", "rate"} for p in place["paths"])


def test_json_paths_add_up_to_the_rate(found: Assessment) -> None:
    for place in assessment_record(found)["places"]:
        total = sum(path["rate"]["value"] for path in place["paths"])
        assert total == pytest.approx(place["rate"]["value"], rel=1e-9)
        single = sum(p["rate"]["value"] for p in place["paths"] if p["path"] == "scatter" and p["order"] == 1)
        assert single == pytest.approx(place["single_scatter_rate"]["value"], rel=1e-9)


def test_goal_units_and_values(found: Assessment) -> None:
    """0.3 mSv/year = 300 uSv/year; 0.1 mGy/week = 100 uGy/week; 2 mrem = 20 uSv."""
    goals = {g["time_base"]: (g["value"], g["unit"]) for g in assessment_record(found)["places"][0]["goals"]}
    assert goals["year"] == (pytest.approx(300.0), "uSv/year")
    assert goals["week"] == (pytest.approx(100.0), "uGy/week")
    assert goals["hour"] == (pytest.approx(20.0), "uSv")


def test_csv_reads_back_and_runs_nothing(found: Assessment) -> None:
    rows = assessment_rows(found)
    rows[0]["place"] = "=HYPERLINK(1)"
    back = list(csv.DictReader(io.StringIO(as_csv(rows))))
    assert len(back) == len(rows)
    assert back[0]["place"] == "'=HYPERLINK(1)"
    assert float(back[1]["value"]) == pytest.approx(rows[1]["value"], rel=1e-15)
    assert CAUTIONS[0] in back[-1]["caution"]


def test_pandas_table(found: Assessment) -> None:
    frame = table(found)
    assert len(frame) == len(assessment_rows(found))
    assert frame.attrs["cautions"] == list(CAUTIONS)
    assert set(frame["time_base"]) == set(TIME_BASES)


def test_screen_in_a_pipe_is_plain_complete_and_says_everything(found: Assessment) -> None:
    out = io.StringIO()
    show_assessment(found, Screen(out))
    text = out.getvalue()
    assert "\x1b" not in text
    assert "=SUM(A1) [bold]bay[/bold]" in text
    before, after = text.split(found.places[0].name, 1)
    for part in (before, after):
        joined = " ".join(part.replace("! ", "").split())
        for caution in CAUTIONS:
            assert caution in joined
    for place in found.places:
        assert f"{place.name}: {place.verdict}" in text
        for goal in place.goals:
            assert goal.text.split(" in ")[0] in text
    for assumption in found.assumptions:
        assert assumption.text in " ".join(text.split())


def test_screen_at_80_columns_cuts_nothing(found: Assessment, monkeypatch: pytest.MonkeyPatch) -> None:
    class Terminal(io.StringIO):
        def isatty(self) -> bool:
            return True

    monkeypatch.setenv("COLUMNS", "80")
    monkeypatch.setenv("NO_COLOR", "1")
    narrow, wide = Terminal(), io.StringIO()
    show_assessment(found, Screen(narrow))
    show_assessment(found, Screen(wide))
    assert max(map(len, narrow.getvalue().splitlines())) <= 80
    assert narrow.getvalue().split() == wide.getvalue().split()
    assert "\u2026" not in narrow.getvalue()
