"""Whole files: good ones are read, bad ones are refused where and how their comments say.

A bad file says what is expected in comments: ``# expect LINE: fragment | fragment``.
"""

from __future__ import annotations

import re
from pathlib import Path

import pytest

from scatterbay.errors import ScenarioError
from scatterbay.scenario import load

HERE = Path(__file__).parent
EXPECT = re.compile(r"# expect (?P<line>\d+): (?P<fragments>.+)")


@pytest.mark.parametrize("path", sorted((HERE / "good").glob("*.yaml")), ids=lambda path: path.stem)
def test_good_files_are_read(path: Path) -> None:
    scenario = load(path)
    assert scenario.text == path.read_text(encoding="utf-8")
    assert scenario.places
    assert scenario.path == str(path)


@pytest.mark.parametrize("path", sorted((HERE / "bad").glob("*.yaml")), ids=lambda path: path.stem)
def test_bad_files_are_refused_where_and_how_they_say(path: Path) -> None:
    expected = [(int(m["line"]), m["fragments"].split(" | ")) for m in EXPECT.finditer(path.read_text())]
    assert expected, "a bad example must say what is expected"
    with pytest.raises(ScenarioError) as caught:
        load(path)
    problems = caught.value.problems
    found = [(problem.line, f"{problem.where}: {problem.message} {problem.hint}") for problem in problems]
    assert [line for line, _ in found] == [line for line, _ in expected], caught.value.render()
    for (_, said), (_, fragments) in zip(found, expected, strict=True):
        for fragment in fragments:
            assert fragment in said
    assert f"{len(problems)} problem" in caught.value.render()
