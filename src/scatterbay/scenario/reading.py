"""From a file, or a text, to a scenario."""

from __future__ import annotations

import hashlib
from pathlib import Path

from scatterbay.errors import Problem, ScenarioError
from scatterbay.scenario.build.findings import Findings
from scatterbay.scenario.build.scenario import build
from scatterbay.scenario.model.reading import read_document
from scatterbay.scenario.parts import Scenario
from scatterbay.scenario.yaml_tree import read_tree
from scatterbay.units import nearest

LARGEST = 1_000_000
"""Largest file that is read [bytes]."""


def read_file(path: str | Path) -> Scenario:
    """The scenario in a file.

    Raises
    ------
    ScenarioError : the file cannot be read, or anything in it cannot be used: all problems at once.
    """
    content = _content(Path(path))
    if b"\0" in content and not content.startswith((b"\xff\xfe", b"\xfe\xff")):
        raise _refused(str(path), "is a binary file, not text")
    try:
        text = content.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        raise _not_text(str(path), content, error) from None
    return _scenario(text, str(path), content)


def read_text(text: str, name: str) -> Scenario:
    """The scenario in a text; ``name`` stands for the file in errors.

    Raises
    ------
    ScenarioError : anything in it cannot be used: all problems at once.
    """
    return _scenario(text, name, text.encode("utf-8", "surrogatepass"))


def _scenario(text: str, name: str, content: bytes) -> Scenario:
    if len(content) > LARGEST:
        raise _refused(name, f"larger than {LARGEST // 1000} kB, which no scenario is")
    lines = text.splitlines()
    tree = read_tree(text)
    if tree.data is None and tree.problems:
        raise ScenarioError(name, tree.problems, lines)
    document, problems = read_document(tree)
    findings = Findings(tree)
    digest = hashlib.sha256(content).hexdigest()
    scenario = build(document, name, text, digest, findings) if document else None
    problems = [*tree.problems, *problems, *findings.problems]
    if problems:
        raise ScenarioError(name, problems, lines)
    if scenario is None:
        raise AssertionError("a scenario without problems could not be built")
    return scenario


def _content(path: Path) -> bytes:
    try:
        if path.is_dir():
            raise _refused(str(path), "is a folder, not a scenario file")
        if not path.exists():
            raise _refused(str(path), "there is no such file", _beside(path))
        if not path.is_file():
            raise _refused(str(path), "is not a regular file")
        if path.stat().st_size > LARGEST:
            raise _refused(str(path), f"larger than {LARGEST // 1000} kB, which no scenario is")
        return path.read_bytes()
    except (OSError, ValueError) as error:
        raise _refused(str(path), f"cannot be read: {getattr(error, 'strerror', None) or error}") from None


def _beside(path: Path) -> str:
    """The file beside it that was probably meant."""
    folder = path.parent
    if not folder.is_dir():
        return f"there is no folder '{folder}' either"
    near = nearest(path.name, sorted(file.name for file in folder.glob("*.y*ml")))
    return f"did you mean '{folder / near}'?" if near else ""


def _not_text(path: str, content: bytes, error: UnicodeDecodeError) -> ScenarioError:
    line = content[: error.start].count(b"\n") + 1
    column = error.start - (content.rfind(b"\n", 0, error.start) + 1) + 1
    byte = f"0x{content[error.start]:02x}"
    message = f"the byte {byte} is not UTF-8 text"
    return ScenarioError(path, [Problem("", message, line, column, "save the file as UTF-8")])


def _refused(path: str, message: str, hint: str = "") -> ScenarioError:
    return ScenarioError(path, [Problem("", message, hint=hint)])
