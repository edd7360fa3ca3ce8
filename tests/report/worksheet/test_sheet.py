"""The draft worksheet: what it holds, as text, in a browser and on paper. Kind: golden structure, limit."""

from __future__ import annotations

import re
from functools import cache
from pathlib import Path

import pypdf
import pytest

from scatterbay.advice.checklist import checklist
from scatterbay.api import assess, worksheet
from scatterbay.report.cautions import CAUTIONS
from scatterbay.report.words import spoken
from scatterbay.scenario import load, loads
from tests.engine.bays import TEXT
from tests.report.worksheet.browser import measured, run

SHIPPED = ("weld-bay", "pipe-shop", "projector-job")


@cache
def sheet(name: str) -> str:
    return worksheet(f"scenarios/{name}.yaml", points=24)


@pytest.mark.parametrize("name", SHIPPED)
def test_it_holds_all_that_it_must(name: str) -> None:
    page, scenario = sheet(name), load(f"scenarios/{name}.yaml")
    found = assess(scenario)
    for caution in CAUTIONS:
        assert caution in page
    for number in range(1, 13):
        assert f"<h2>{number} " in page
    for place in found.places:
        assert place.name in page
        for base in ("rate", "hour", "week", "year"):
            assert spoken(place.figure(base).value, base, place.quantity) in page
    assert scenario.sha256 in page
    assert "concrete" in page
    assert "Signature" in page
    assert "<svg" in page
    for assumption in found.assumptions:
        assert assumption.topic.replace("'", "&#39;") in page


def test_it_needs_nothing_from_outside_and_no_script() -> None:
    page = sheet("weld-bay")
    assert "<script" not in page
    assert not re.search(r"""(?:src|href)\s*=\s*["'](?!#|data:)""", page)
    assert "@import" not in page
    outside = set(re.findall(r"https?://[^\s\"'<)]+", page))
    assert all("w3.org" in one or "purl.org" in one or "creativecommons" in one for one in outside), outside


def test_the_same_input_gives_the_same_bytes() -> None:
    assert worksheet("scenarios/weld-bay.yaml", points=24) == sheet("weld-bay")


def test_text_from_the_scenario_is_escaped() -> None:
    evil = TEXT.replace(
        "title: test bay", 'title: <b>bay</b> & "x"\nstated: {interlocks: <script>alert(1)</script>}'
    )
    page = worksheet(loads(evil, "evil"), points=20)
    assert "<script" not in page
    assert "&lt;script&gt;" in page
    assert "<b>bay</b>" not in page


def test_the_checklist_finds_and_misses() -> None:
    """Of the projector's items everything that is stated is found; of the weld bay's the interlocks are missing."""
    stated = {one.item: one.found for one in checklist(load("scenarios/projector-job.yaml"))}
    bare = {one.item: one.found for one in checklist(load("scenarios/weld-bay.yaml"))}
    (interlocks,) = (item for item in stated if item.startswith("interlocks"))
    assert "door switch" in stated[interlocks]
    assert bare[interlocks] == ""
    assert "MISSING" in sheet("weld-bay")
    assert len(stated) >= 18


@pytest.mark.parametrize("name", SHIPPED)
@pytest.mark.parametrize("width", [1280, 390])
def test_nothing_overflows_in_a_browser(name: str, width: int, tmp_path: Path) -> None:
    content, window, drawings = measured(tmp_path, sheet(name), width)
    assert window == width
    assert content <= width
    assert drawings == 1


def test_it_opens_without_errors(tmp_path: Path) -> None:
    page = tmp_path / "sheet.html"
    page.write_text(sheet("weld-bay"), encoding="utf-8")
    done = run(tmp_path, "--dump-dom", page.as_uri())
    assert "CONSOLE" not in done.stderr, done.stderr
    assert done.stdout.count("<h2>") == 12


@pytest.mark.parametrize("name", SHIPPED)
def test_it_prints(name: str, tmp_path: Path) -> None:
    """Pages with DRAFT and their number on each, and the tables' figures in the text."""
    page, target = tmp_path / "sheet.html", tmp_path / "sheet.pdf"
    page.write_text(sheet(name), encoding="utf-8")
    run(tmp_path, "--no-pdf-header-footer", f"--print-to-pdf={target}", page.as_uri())
    pages = [one.extract_text() for one in pypdf.PdfReader(target).pages]
    assert len(pages) >= 3
    for number, text in enumerate(pages, start=1):
        assert "DRAFT" in text
        assert f"{number} of {len(pages)}" in text
    whole = " ".join(" ".join(pages).split())
    for place in assess(f"scenarios/{name}.yaml").places:
        assert spoken(place.figure("year").value, "year", place.quantity) in whole
