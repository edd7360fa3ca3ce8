"""The JSON Schema accepts what the reader accepts, knows every key, and explains each."""

from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path
from typing import Any

import pytest
from jsonschema import Draft202012Validator

from scatterbay import resources
from scatterbay.scenario import schema
from scatterbay.scenario.yaml_tree import read_tree
from tests.scenario.edits import BASE

HERE = Path(__file__).parent
SHIPPED = sorted(Path(str(resources.folder("scenarios"))).glob("*.yaml"))
GOOD = sorted((HERE / "good").glob("*.yaml"))


def plain(value: Any) -> Any:
    """Data as JSON would hold it."""
    if isinstance(value, dict):
        return {key: plain(item) for key, item in value.items()}
    return [plain(item) for item in value] if isinstance(value, tuple) else value


@pytest.fixture(scope="module")
def validator() -> Draft202012Validator:
    found = schema()
    Draft202012Validator.check_schema(found)
    return Draft202012Validator(found)


@pytest.mark.parametrize("path", [*GOOD, *SHIPPED], ids=lambda path: path.stem)
def test_good_and_shipped_files_follow_the_schema(validator: Draft202012Validator, path: Path) -> None:
    data = plain(read_tree(path.read_text(encoding="utf-8")).data)
    assert [error.message for error in validator.iter_errors(data)] == []


@pytest.mark.parametrize(
    ("old", "new"),
    [
        ("height: 3 m\n", "height: 3\n"),
        ("height: 3 m\n", "height: '3'\n"),
        ("height: 3 m\n", "height: 3 kV\n"),
        ("height: 3 m\n", "height:\n"),
        ("  storey above: 3.6 m\n", "  storey above:\n"),
        ("use factor: 1/4", "use factor: null"),
        ("title: Everything at once", "titel: Everything at once"),
        ("format: 1", "format: 2"),
        ("225 kV", "225 keV"),
        ("use factor: 1/4", "use factor: often"),
        ("use factor: 1/4", "use factor: 1.5"),
        ("shape: sphere", "shape: spere"),
        ("area: public", "area: publik"),
        ("centre: [2, 5, 1]", "centre: [2, 5]"),
        ("on: 2026-03-01", "on: March"),
        ("diameter: 30 cm", "thickness: 30 cm"),
        ("people: apprentices, ", ""),
    ],
)
def test_slips_break_the_schema_too(validator: Draft202012Validator, old: str, new: str) -> None:
    assert BASE.count(old) == 1
    data = plain(read_tree(BASE.replace(old, new)).data)
    assert list(validator.iter_errors(data))


def _properties(node: Any) -> Iterator[tuple[str, dict[str, Any]]]:
    if isinstance(node, dict):
        yield from node.get("properties", {}).items()
        for item in node.values():
            yield from _properties(item)
    elif isinstance(node, list):
        for item in node:
            yield from _properties(item)


def test_every_key_has_a_title_and_help() -> None:
    keys = list(_properties(schema()))
    assert len(keys) > 60
    for key, entry in keys:
        assert entry.get("title") == key, key
        assert entry.get("description"), key


def test_examples_in_the_schema_fit_it() -> None:
    whole = schema()
    for key, entry in _properties(whole):
        for example in entry.get("examples", []):
            bound = {**entry, "$defs": whole["$defs"]}
            assert not list(Draft202012Validator(bound).iter_errors(example)), (key, example)


def test_the_schema_says_which_dialect_it_is() -> None:
    assert schema()["$schema"] == "https://json-schema.org/draft/2020-12/schema"
    assert schema()["title"]
