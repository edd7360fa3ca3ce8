"""`lists` as a process: every topic, in every form. Kinds: limit, golden structure."""

from __future__ import annotations

import csv
import io
import json

import pytest

from scatterbay.report.lists import show_listing
from scatterbay.report.screen import Screen
from scatterbay.scenario.lists import PREVAIL, listing, topics
from tests.cli.process import run

TOPICS = ["stock", "rules", "occupancy", "containers", "receptors", "materials", "nuclides"]
HEADLINE = "DRAFT for a qualified expert"


def test_without_a_topic_the_topics_are_named() -> None:
    done = run("lists")
    assert (done.returncode, done.stderr) == (0, "")
    lines = done.stdout.splitlines()
    for topic in TOPICS:
        assert any(line.split()[:1] == [topic] for line in lines), topic
    assert list(topics()) == TOPICS
    record = json.loads(run("lists", "--json").stdout)
    assert [entry["topic"] for entry in record["topics"]] == TOPICS


@pytest.mark.parametrize("topic", TOPICS)
def test_a_list_holds_every_entry_and_its_source(topic: str) -> None:
    done = run("lists", topic)
    assert (done.returncode, done.stderr) == (0, "")
    assert done.stdout.count(HEADLINE) == 2, "before and after"
    text = " ".join(done.stdout.split())
    for source in {str(row[-1]) for row in listing(topic).rows}:
        assert source in text
    assert ("recalled" in text) == any("recalled" in str(row[-1]) for row in listing(topic).rows)


@pytest.mark.parametrize("topic", TOPICS)
def test_json_and_csv_hold_the_same_entries(topic: str) -> None:
    record = json.loads(run("lists", topic, "--json").stdout)
    assert record["topic"] == topic
    assert record["cautions"]
    assert len(record["entries"]) == len(listing(topic).rows)
    assert all(entry["source"] and entry["basis"] for entry in record["entries"])
    rows = list(csv.DictReader(io.StringIO(run("lists", topic, "--csv").stdout)))
    assert [row["source"] for row in rows] == [entry["source"] for entry in record["entries"]]
    assert all(HEADLINE in row["caution"] for row in rows)


def test_a_recalled_entry_says_so_and_a_cited_one_does_not() -> None:
    entries = json.loads(run("lists", "materials", "--json").stdout)["entries"]
    basis = {entry["material"]: entry["basis"] for entry in entries}
    assert (basis["reference concrete"], basis["steel"], basis["lead"]) == (
        "recalled",
        "common practice",
        "as cited",
    )


def test_rules_stand_under_a_banner() -> None:
    done = run("lists", "rules")
    assert " ".join(done.stdout.split()).count(PREVAIL) == 2
    assert json.loads(run("lists", "rules", "--json").stdout)["remarks"][0] == PREVAIL


class Terminal(io.StringIO):
    """A stream that says it is a terminal."""

    def isatty(self) -> bool:
        return True


@pytest.mark.parametrize("topic", TOPICS)
def test_eighty_columns_suffice_and_nothing_is_cut(topic: str, monkeypatch: pytest.MonkeyPatch) -> None:
    """The narrow screen says the same words as the wide one."""
    monkeypatch.setenv("COLUMNS", "80")
    monkeypatch.setenv("NO_COLOR", "1")
    narrow, wide = Terminal(), io.StringIO()
    show_listing(listing(topic), Screen(narrow))
    show_listing(listing(topic), Screen(wide))
    assert max(map(len, narrow.getvalue().splitlines())) <= 80
    assert narrow.getvalue().split() == wide.getvalue().split()


@pytest.mark.parametrize(
    ("arguments", "said"),
    [
        (("stok",), "did you mean 'stock'"),
        (("moon",), "topics: stock, rules"),
        (("stock", "--json", "--csv"), "exclude each other"),
    ],
)
def test_mistakes(arguments: tuple[str, ...], said: str) -> None:
    done = run("lists", *arguments)
    assert (done.returncode, done.stdout) == (2, "")
    assert said in done.stderr
    assert "Traceback" not in done.stderr
