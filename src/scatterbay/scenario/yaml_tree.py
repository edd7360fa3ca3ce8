"""Reads YAML text into plain data, keeping the line and column of every key and value.

Only what a scenario needs: mappings, lists, text, numbers. Tags are refused, aliases are few, size and depth
are limited, and a key that appears twice is an error.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import TypeAlias

import yaml
from yaml.composer import Composer
from yaml.parser import Parser
from yaml.reader import Reader, ReaderError
from yaml.resolver import BaseResolver
from yaml.scanner import Scanner

from scatterbay.errors import Problem
from scatterbay.scenario.scalars import Scalar, plain_scalar

DEEPEST = 12
MOST_NODES = 20_000
MOST_ALIASES = 50

Data: TypeAlias = Scalar | tuple["Data", ...] | Mapping[str, "Data"]
Path = tuple[str | int, ...]


@dataclass(frozen=True)
class Spot:
    """A place in the file, counted from 1. ``inner``: where the text itself starts, 0 if it spans lines."""

    line: int
    column: int
    inner: int = 0


@dataclass
class Tree:
    """The data of a file, where each key and each value stands, and what was wrong on the way."""

    data: Data = None
    keys: dict[Path, Spot] = field(default_factory=dict)
    values: dict[Path, Spot] = field(default_factory=dict)
    problems: list[Problem] = field(default_factory=list)

    def spot(self, path: Path, key: bool = False) -> Spot:
        """Where a value (or its key) stands; the nearest thing around it where it is missing."""
        while path:
            found = (self.keys.get(path) or self.values.get(path)) if key else self.values.get(path)
            if found:
                return found
            path, key = path[:-1], True
        return self.values.get((), Spot(0, 0))


def dotted(path: Path) -> str:
    """A path as it is shown: ``room.corners[2]``, list items counted from 1."""
    text = ""
    for part in path:
        text += f"[{part + 1}]" if isinstance(part, int) else f"{'.' if text else ''}{part}"
    return text


def read_tree(text: str) -> Tree:
    """The tree of a YAML text. ``Tree.problems`` holds everything wrong with it as YAML."""
    tree = Tree()
    try:
        root = _Loader(text).get_single_node()
    except _RefusedError as error:
        tree.problems.append(error.problem)
    except ReaderError as error:
        tree.problems.append(_unreadable(text, error))
    except yaml.MarkedYAMLError as error:
        tree.problems.append(_syntax(error))
    else:
        if root is None:
            tree.problems.append(
                Problem("", "the file is empty", 1, 1, "`scatterbay new` writes one to start from")
            )
        else:
            _Walk(tree).start(root)
    return tree


class _RefusedError(Exception):
    """Something YAML allows and a scenario does not."""

    def __init__(self, message: str, mark: yaml.Mark, hint: str = "") -> None:
        self.problem = Problem("", message, mark.line + 1, mark.column + 1, hint)
        super().__init__(message)


class _Loader(Reader, Scanner, Parser, Composer, BaseResolver):
    """Composes nodes only: no implicit types, no constructors, a limit on depth, number and aliases."""

    def __init__(self, text: str) -> None:
        Reader.__init__(self, text)
        Scanner.__init__(self)
        Parser.__init__(self)
        Composer.__init__(self)
        BaseResolver.__init__(self)
        self.depth = 0
        self.nodes = 0
        self.aliases = 0

    def compose_node(self, parent: yaml.Node | None, index: object) -> yaml.Node | None:
        event = self.peek_event()  # type: ignore[no-untyped-call]
        self.nodes += 1
        self.depth += 1
        self.aliases += isinstance(event, yaml.AliasEvent)
        if self.depth > DEEPEST:
            raise _RefusedError(f"nested more than {DEEPEST} deep", event.start_mark)
        if self.nodes > MOST_NODES:
            raise _RefusedError(f"more than {MOST_NODES} entries", event.start_mark)
        if self.aliases > MOST_ALIASES:
            raise _RefusedError(f"more than {MOST_ALIASES} aliases (*name)", event.start_mark, "write it out")
        tag = getattr(event, "tag", None)
        if tag:
            hint = "write text, numbers, lists and mappings without tags"
            raise _RefusedError(f"the tag '{tag}' has no place in a scenario", event.start_mark, hint)
        node = super().compose_node(parent, index)  # type: ignore[arg-type]
        self.depth -= 1
        return node


class _Walk:
    """Turns nodes into data, following aliases within the limits."""

    def __init__(self, tree: Tree) -> None:
        self.tree = tree
        self.count = 0
        self.open: list[int] = []

    def start(self, root: yaml.Node) -> None:
        try:
            self.tree.data = self.value(root, ())
        except _RefusedError as error:
            self.tree.data = None
            self.tree.problems.append(error.problem)

    def value(self, node: yaml.Node, path: Path) -> Data:
        self.count += 1
        self.tree.values[path] = _spot(node)
        if self.count > MOST_NODES:
            raise _RefusedError(f"aliases blow this up to more than {MOST_NODES} entries", node.start_mark)
        if id(node) in self.open or len(self.open) > DEEPEST:
            raise _RefusedError("an alias that contains itself, or nests too deep", node.start_mark)
        if isinstance(node, yaml.ScalarNode):
            return plain_scalar(node.value) if node.style is None else str(node.value)
        self.open.append(id(node))
        if isinstance(node, yaml.SequenceNode):
            found: Data = tuple(self.value(item, (*path, i)) for i, item in enumerate(node.value))
        else:
            found = self.mapping(node, path)
        self.open.pop()
        return found

    def mapping(self, node: yaml.Node, path: Path) -> Mapping[str, Data]:
        found: dict[str, Data] = {}
        for key_node, value_node in node.value:
            spot = _spot(key_node)
            if not isinstance(key_node, yaml.ScalarNode) or not key_node.value.strip():
                self.wrong(path, "a name must be a piece of text", spot)
                continue
            key = str(key_node.value)
            if key in found:
                first = self.tree.keys[(*path, key)].line
                message = f"'{key}' is given twice (first in line {first})"
                self.wrong((*path, key), message, spot, "keep one, or rename one")
                continue
            self.tree.keys[(*path, key)] = spot
            found[key] = self.value(value_node, (*path, key))
        return found

    def wrong(self, path: Path, message: str, spot: Spot, hint: str = "") -> None:
        self.tree.problems.append(Problem(dotted(path), message, spot.line, spot.column, hint))


def _spot(node: yaml.Node) -> Spot:
    mark = node.start_mark
    line, column = mark.line + 1, mark.column + 1
    if not isinstance(node, yaml.ScalarNode) or node.end_mark.line != mark.line or node.style in ("|", ">"):
        return Spot(line, column)
    return Spot(line, column, column + (node.style is not None))


def _unreadable(text: str, error: ReaderError) -> Problem:
    position = error.position if isinstance(error.position, int) else 0
    before = text[:position]
    line, column = before.count("\n") + 1, len(before) - (before.rfind("\n") + 1) + 1
    code = f"U+{ord(text[position]):04X}" if position < len(text) else "?"
    hint = "save the file as plain text in UTF-8"
    return Problem("", f"the character {code} cannot stand in a scenario", line, column, hint)


_IN_WORDS = (
    (r"'\t'", "a tab cannot start a word or indent a line", "indent with spaces"),
    (
        "mapping values are not allowed",
        "a ':' that does not fit here",
        "quote text that holds ': ', or check the indentation",
    ),
    (
        "expected <block end>",
        "this line does not fit the lines above it",
        "check the indentation, and quotes left open",
    ),
    ("could not find expected ':'", "a ':' is missing after a name", "write 'name: value'"),
    ("expected ',' or '}'", "a '{' is not closed, or a comma is missing", "write {name: value, name: value}"),
    ("expected ',' or ']'", "a '[' is not closed, or a comma is missing", "write [1, 2, 3]"),
    ("unexpected end of stream", "a quotation mark is not closed", "close it"),
    (
        "but found another document",
        "the file holds more than one document ('---')",
        "keep one scenario to a file",
    ),
    ("found undefined alias", "an alias (*name) that stands for nothing", "quote text that starts with '*'"),
    ("found duplicate anchor", "an anchor (&name) is given twice", "give each its own name"),
    ("cannot start any token", "a character that cannot start a word", "put the text in quotes"),
)


def _syntax(error: yaml.MarkedYAMLError) -> Problem:
    mark = error.problem_mark or error.context_mark
    line, column = (mark.line + 1, mark.column + 1) if mark else (1, 1)
    said = error.problem or error.context or "unknown trouble"
    for fragment, message, hint in _IN_WORDS:
        if fragment in f"{error.context} {said}":
            return Problem("", message, line, column, hint)
    return Problem("", f"not readable as YAML: {said}", line, column)
