"""Turns what pydantic found into problems in the words of the file, at the place in the file."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from pydantic_core import ErrorDetails

from scatterbay.errors import Problem
from scatterbay.scenario.model.base import ItemsError
from scatterbay.scenario.model.bodies import SHAPES
from scatterbay.scenario.model.forms import form_at, keys_of
from scatterbay.scenario.yaml_tree import Data, Path, Tree, dotted
from scatterbay.units import TextError, nearest

_TAGS = ("(side)", "(flat)", "(tube)", "(sealed)", *(f"({shape})" for shape in SHAPES))
_NOT_A_MAPPING = ("model_type", "model_attributes_type", "dict_type")


def problems_of(errors: list[ErrorDetails], tree: Tree) -> list[tuple[Problem | None, Path, str]]:
    """Each problem (None for one that says nothing new), its path, and pydantic's word for it."""
    found: list[tuple[Problem | None, Path, str]] = []
    unknown = {_path(error) for error in errors if error["type"] == "extra_forbidden"}
    for error in errors:
        path = _path(error)
        kind = error["type"]
        if kind == "missing" and _misspelt(path, unknown):
            found.append((None, path, kind))
            continue
        for inside, problem in _text_problems(error, path, tree):
            whole = (*path, *inside)
            on_key = kind in ("missing", "extra_forbidden")
            spot = whole[:-1] if kind == "missing" else whole
            found.append((place(tree, spot, problem, on_key), path, kind))
    return found


def place(tree: Tree, path: Path, problem: TextError, on_key: bool = False) -> Problem:
    """A problem at its place in the file, down to the word where the text stands on one line."""
    spot = tree.spot(path, on_key)
    column = spot.inner + problem.start if spot.inner and problem.start and not on_key else spot.column
    return Problem(dotted(path), problem.message, spot.line, column, problem.hint, problem.outside_model)


def _path(error: ErrorDetails) -> Path:
    """Where in the file: pydantic's location without the tags that forms are chosen by."""
    return tuple(part for part in error["loc"] if part not in _TAGS)


def _misspelt(path: Path, unknown: set[Path]) -> bool:
    """A missing key that stands there under a name much like it is reported once, as unknown."""
    beside = [str(other[-1]) for other in unknown if other[:-1] == path[:-1]]
    return any(nearest(name, [str(path[-1])]) for name in beside)


def _text_problems(error: ErrorDetails, path: Path, tree: Tree) -> list[tuple[Path, TextError]]:
    kind, value = error["type"], error["input"]
    if kind == "text":
        problem = error["ctx"]["problem"]
        return problem.problems if isinstance(problem, ItemsError) else [((), problem)]
    if kind == "missing":
        return [((), _missing(path, value))]
    if kind == "extra_forbidden":
        return [((), _unknown(path, tree))]
    if kind == "shape":
        return [_shape(value)]
    if kind == "source":
        return [((), _source(value))]
    if kind == "literal_error":
        return [((), _choice(value, error["ctx"]["expected"]))]
    if kind in _NOT_A_MAPPING:
        hint = "write 'name: value' lines, indented, or {name: value, name: value}"
        return [((), TextError(f"{_shown(value)} stands where a mapping is needed", hint))]
    return [((), TextError(f"{_shown(value)}: {error['msg'][:1].lower()}{error['msg'][1:]}"))]


def _shown(value: Data) -> str:
    if isinstance(value, Mapping):
        return "a mapping"
    return "a list" if isinstance(value, tuple) else f"'{value}'"


def _missing(path: Path, around: Data) -> TextError:
    key = str(path[-1])
    form = form_at(path[:-1], around)
    meaning = keys_of(form).get(key, "") if form else ""
    return TextError(f"'{key}' is missing", f"{key}: {meaning[:1].lower()}{meaning[1:]}" if meaning else "")


def _unknown(path: Path, tree: Tree) -> TextError:
    key = str(path[-1])
    around: Any = tree.data
    for part in path[:-1]:
        around = around[part]
    form = form_at(path[:-1], around)
    allowed = list(keys_of(form)) if form else []
    near = nearest(key, allowed)
    hint = f"did you mean '{near}'? " if near else ""
    return TextError(f"'{key}' is not a key here", f"{hint}allowed: {', '.join(allowed)}")


def _shape(value: Data) -> tuple[Path, TextError]:
    listed = f"shapes: {', '.join(SHAPES)}"
    if not isinstance(value, Mapping):
        return (), TextError(f"{_shown(value)} stands where a mapping is needed", "write {shape: box, ...}")
    if "shape" not in value:
        return (), TextError("'shape' is missing", listed)
    near = nearest(str(value["shape"]), SHAPES)
    hint = f"did you mean '{near}'? " if near else ""
    return ("shape",), TextError(f"{_shown(value['shape'])} is not a shape", hint + listed)


def _source(value: Data) -> TextError:
    hint = "write 'x-ray tube: 225 kV' or 'sealed source: Ir-192'"
    if not isinstance(value, Mapping):
        return TextError(f"{_shown(value)} stands where a mapping is needed", hint)
    if "x-ray tube" in value:
        return TextError("a source is an X-ray tube or a sealed source, not both", hint)
    near = [key for key in value if nearest(key, ("x-ray tube", "sealed source"))]
    said = f" ('{near[0]}' is not known)" if near else ""
    return TextError(f"nothing says what this source is{said}", hint)


def _choice(value: Data, expected: str) -> TextError:
    allowed = [choice.strip("'") for choice in expected.replace(" or ", ", ").split(", ")]
    near = nearest(str(value), allowed)
    hint = f"did you mean '{near}'? " if near else ""
    return TextError(f"{_shown(value)} is not allowed here", f"{hint}allowed: {', '.join(allowed)}")
