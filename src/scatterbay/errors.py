"""Every foreseen failure of the program: one tree, one exit code each.

A foreseen failure is shown as its message, without a traceback. Anything else that escapes is our own fault
and is reported as such by the command line.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass


class ScatterbayError(Exception):
    """Base of every foreseen failure."""

    exit_code = 2


class UsageError(ScatterbayError):
    """A command or a function was asked for something that makes no sense."""


class OutOfRangeError(ScatterbayError):
    """A value lies outside the data or the model; nothing is extrapolated or clamped."""

    exit_code = 3


class DataFileError(ScatterbayError):
    """A shipped table is broken: names the file and the line."""

    exit_code = 70


@dataclass(frozen=True)
class Problem:
    """One thing wrong with a scenario file, at a place a person can find.

    Parameters
    ----------
    where : dotted path inside the file, such as ``room.sides.south``.
    message : what is wrong, in a sentence that names the offending text.
    line, column : position in the file, counted from 1 (0 when the file as a whole is meant).
    hint : what is allowed, the nearest name, or what to do instead.
    outside_model : the text is understood but lies outside the data or the model.
    """

    where: str
    message: str
    line: int = 0
    column: int = 0
    hint: str = ""
    outside_model: bool = False


class ScenarioError(ScatterbayError):
    """A scenario file cannot be used: carries every problem found, in line order."""

    def __init__(self, path: str, problems: Sequence[Problem], source_lines: Sequence[str] = ()) -> None:
        self.path = path
        self.problems = tuple(sorted(problems, key=lambda p: (p.line, p.column)))
        self.source_lines = tuple(source_lines)
        if self.problems and all(p.outside_model for p in self.problems):
            self.exit_code = 3
        super().__init__(self.render())

    def render(self) -> str:
        """All problems as text: place, message, source line with a caret, hint."""
        blocks = [self._block(problem) for problem in self.problems]
        count = len(blocks)
        closing = f"{count} problem{'s' if count != 1 else ''} in {self.path}; nothing was computed."
        return "\n".join([*blocks, closing])

    def _block(self, problem: Problem) -> str:
        place = f"{self.path}:{problem.line}:{problem.column}" if problem.line else self.path
        prefix = f"{place}: {problem.where}: " if problem.where else f"{place}: "
        lines = [prefix + problem.message]
        if 0 < problem.line <= len(self.source_lines):
            text = self.source_lines[problem.line - 1].rstrip("\n")
            number = f"{problem.line:>5} | "
            lines.append(number + text)
            lines.append(" " * (len(number) + max(problem.column - 1, 0)) + "^")
        if problem.hint:
            lines.append(f"      {problem.hint}")
        return "\n".join(lines)
