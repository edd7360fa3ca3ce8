"""Reads a tree into the models: all problems at once, and as much of the document as can be used."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from pydantic import ValidationError

from scatterbay.errors import Problem
from scatterbay.scenario.known import Known
from scatterbay.scenario.model.base import BROKEN
from scatterbay.scenario.model.document import NAMED, NAMED_IN_ROOM, Document
from scatterbay.scenario.model.messages import place, problems_of
from scatterbay.scenario.yaml_tree import Data, Path, Tree
from scatterbay.units import TextError

_ROUNDS = 5


def read_document(tree: Tree) -> tuple[Document | None, list[Problem]]:
    """The document, with ``BROKEN`` where an entry was refused, and every problem found on the way."""
    if not isinstance(tree.data, dict):
        hint = "a scenario is lines of 'name: value'; `scatterbay new` writes one to start from"
        return None, [place(tree, (), TextError("this is not a scenario", hint))]
    problems = [_empty(tree, path) for path in _nothings(tree.data, ())]
    names = _defined(tree.data)
    for _ in range(_ROUNDS):
        try:
            return Document.model_validate(tree.data, context=names), problems
        except ValidationError as failure:
            for problem, path, kind in problems_of(failure.errors(include_url=False), tree):
                problems += [problem] if problem else []
                _set_aside(tree.data, path, kind)
    raise AssertionError("a scenario did not settle although its broken entries were set aside")


def _defined(data: Mapping[str, Data]) -> Known:
    """The materials and the stock items that the scenario defines."""
    materials, stock = data.get("materials"), data.get("stock")
    return Known(
        tuple(materials) if isinstance(materials, Mapping) else (),
        {name: text for name, text in stock.items() if isinstance(text, str)}
        if isinstance(stock, Mapping)
        else {},
    )


def _nothings(value: Data, path: Path) -> list[Path]:
    """Paths of keys and items that stand there without a value."""
    if isinstance(value, Mapping):
        return [found for key, item in value.items() for found in _nothings(item, (*path, key))]
    if isinstance(value, tuple):
        return [found for i, item in enumerate(value) for found in _nothings(item, (*path, i))]
    return [path] if value is None else []


def _empty(tree: Tree, path: Path) -> Problem:
    _set_aside(tree.data, path, "empty")
    problem = TextError("there is no value", "give it one, or take the line out")
    return place(tree, path, problem, on_key=isinstance(path[-1], str))


def _set_aside(data: Any, path: Path, kind: str) -> None:
    """Takes a refused entry out of the data, so that what is left can be read."""
    if kind != "extra_forbidden":
        path = _entry(path)
    for part in path[:-1]:
        if not isinstance(data, dict) or part not in data:
            return
        data = data[part]
    if not isinstance(data, dict):
        return
    if kind == "extra_forbidden":
        data.pop(path[-1], None)
    else:
        data[path[-1]] = BROKEN


def _entry(path: Path) -> Path:
    """The entry that a path belongs to: the smallest piece that can be set aside on its own."""
    if path[0] == "room":
        return path[: 3 if len(path) > 2 and path[1] in NAMED_IN_ROOM else 2]
    return path[: 2 if path[0] in NAMED else 1]
