"""Bad scenarios made from a good one: replace a piece of text, and say what must be said about it.

The replacement holds the mark ``§`` where the caret must point; it is taken out before the text is read.
"""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path

from scatterbay.errors import ScenarioError
from scatterbay.scenario import loads

BASE = (Path(__file__).parent / "good" / "everything.yaml").read_text(encoding="utf-8")
MARK = "§"


@dataclass(frozen=True)
class Edit:
    """``old`` (found once in the base) becomes ``new``; ``said`` must appear in the one problem it makes.

    ``where`` is the text the caret must point at, where ``new`` holds no mark.
    """

    old: str
    new: str
    said: tuple[str, ...]
    exit_code: int = 2
    where: str = ""

    @property
    def name(self) -> str:
        """A short name for the test's report."""
        return self.new.replace("\n", " ").strip()[:60]


def edited(edit: Edit) -> tuple[str, int, int]:
    """The text to read, and the line and column the caret must point at."""
    assert BASE.count(edit.old) == 1, f"{edit.old!r} stands {BASE.count(edit.old)} times in the base"
    marked = BASE.replace(edit.old, edit.new)
    if edit.where:
        marked = marked.replace(edit.where, MARK + edit.where, 1)
    assert marked.count(MARK) == 1, "mark where the caret must point"
    before = marked[: marked.index(MARK)]
    line, column = before.count("\n") + 1, len(before) - before.rfind("\n")
    return marked.replace(MARK, ""), line, column


def refusal(text: str) -> ScenarioError:
    """The error a text is refused with.

    Raises
    ------
    AssertionError : the text was accepted.
    """
    try:
        loads(text, "bay.yaml")
    except ScenarioError as error:
        return error
    raise AssertionError("the scenario was accepted")


def check_refused(edit: Edit) -> None:
    """One slip in a good file gives one problem, at its place, in words that name the fix."""
    text, line, column = edited(edit)
    error = refusal(text)
    assert len(error.problems) == 1, error.render()
    problem = error.problems[0]
    said = f"{problem.where}: {problem.message} {problem.hint}"
    assert edit.said
    for fragment in edit.said:
        assert fragment in said
    assert (problem.line, problem.column) == (line, column), error.render()
    assert error.exit_code == edit.exit_code
