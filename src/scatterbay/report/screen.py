"""A place to print to: a terminal as wide as it is, or plain wide text in a pipe; never cut, never marked up."""

from __future__ import annotations

import os
import shutil
import sys
import textwrap
from typing import TextIO

from rich.console import Console
from rich.text import Text

NARROWEST = 80
IN_A_PIPE = 100
STYLES = {
    "above": "bold reverse",
    "too close to call": "bold",
    "too close": "bold",
    "below": "",
    "no goal": "dim",
}
"""How verdicts stand out on a terminal; the word itself always says it."""


class Screen:
    """Prints paragraphs and tables to a stream, with colour only on a terminal."""

    def __init__(self, stream: TextIO | None = None) -> None:
        self.stream = stream or sys.stdout
        terminal = self.stream.isatty()
        width = max(NARROWEST, shutil.get_terminal_size((NARROWEST, 24)).columns) if terminal else IN_A_PIPE
        self.width = width
        plain = not terminal or bool(os.environ.get("NO_COLOR"))
        self.console = Console(
            file=self.stream, width=width, markup=False, highlight=False, emoji=False, no_color=plain,
            force_terminal=terminal and not plain, soft_wrap=False,
        )  # fmt: skip

    def line(self, text: str = "", style: str = "") -> None:
        """One line, never wrapped."""
        self.console.print(Text(text, style=style), soft_wrap=True)

    def paragraph(self, text: str, indent: str = "", first: str | None = None, style: str = "") -> None:
        """Text wrapped to the width, with an indent, and another one for its first line."""
        lines = textwrap.wrap(
            text, self.width, initial_indent=indent if first is None else first, subsequent_indent=indent,
            break_long_words=False, break_on_hyphens=False,
        )  # fmt: skip
        for line in lines:
            self.line(line, style)

    def table(self, headings: list[str], rows: list[list[str]], right: set[int], indent: int = 2) -> None:
        """A table without lines; ``right``: columns that are aligned right. Cells are never cut."""
        widths = [max(len(row[k]) for row in [headings, *rows]) for k in range(len(headings))]
        last = len(headings) - 1
        for number, row in enumerate([headings, *rows]):
            line = Text(" " * indent)
            for k, cell in enumerate(row):
                padded = cell.rjust(widths[k]) if k in right else cell.ljust(widths[k])
                style = "bold" if number == 0 else STYLES.get(cell, "")
                line.append(padded.rstrip() if k == last else padded, style)
                line.append("" if k == last else "  ")
            line.rstrip()
            self.console.print(line, soft_wrap=True)
