"""Reads one shipped CSV table and checks its header and every row."""

from __future__ import annotations

import csv
from collections.abc import Sequence
from dataclasses import dataclass
from functools import cache

from scatterbay.errors import DataFileError
from scatterbay.resources import folder

HEADER_KEYS = (
    "title",
    "columns",
    "interpolation",
    "range",
    "source",
    "obtained",
    "licence",
    "version",
    "gaps",
)


@dataclass(frozen=True)
class Table:
    """A table as text: what its header says of it, its column names, and rows of equal length."""

    name: str
    header: dict[str, str]
    columns: tuple[str, ...]
    rows: tuple[tuple[str, ...], ...]
    first_line: int

    def numbers(self, column: str) -> list[float]:
        """One column as floats; an entry that is not a number is an error naming file and line."""
        position = self.columns.index(column)
        try:
            return [float(row[position]) for row in self.rows]
        except ValueError:
            raise self._broken_number(position) from None

    def texts(self, column: str) -> list[str]:
        """One column as text."""
        position = self.columns.index(column)
        return [row[position] for row in self.rows]

    def _broken_number(self, position: int) -> DataFileError:
        for number, row in enumerate(self.rows, start=self.first_line):
            try:
                float(row[position])
            except ValueError:
                column = self.columns[position]
                return DataFileError(
                    f"data/{self.name}:{number}: '{row[position]}' is not a number ({column})"
                )
        return DataFileError(f"data/{self.name}: broken column")


@cache
def read_table(name: str, columns: tuple[str, ...]) -> Table:
    """Table ``data/<name>`` with exactly these columns.

    Raises
    ------
    DataFileError : a header key is missing, the columns differ, or a row is too short or too long.
    """
    text = (folder("data") / name).read_text(encoding="utf-8")
    lines = text.splitlines()
    header, start = _read_header(name, lines)
    rows = list(csv.reader(lines[start:]))
    if not rows or tuple(rows[0]) != columns:
        raise DataFileError(f"data/{name}:{start + 1}: the columns should be {', '.join(columns)}")
    first_line = start + 2
    for number, row in enumerate(rows[1:], start=first_line):
        if len(row) != len(columns):
            raise DataFileError(f"data/{name}:{number}: {len(row)} entries where {len(columns)} belong")
    return Table(name, header, columns, tuple(tuple(row) for row in rows[1:]), first_line)


def _read_header(name: str, lines: Sequence[str]) -> tuple[dict[str, str], int]:
    """Header lines ``# key: value`` and the number of lines they take."""
    header: dict[str, str] = {}
    count = 0
    for line in lines:
        if not line.startswith("#"):
            break
        count += 1
        key, separator, value = line[1:].partition(":")
        if not separator or not value.strip():
            raise DataFileError(f"data/{name}:{count}: a header line reads '# key: value'")
        header[key.strip()] = value.strip()
    missing = [key for key in HEADER_KEYS if key not in header]
    if missing:
        raise DataFileError(f"data/{name}: the header lacks {', '.join(missing)}")
    return header, count


def split_names(text: str) -> tuple[str, ...]:
    """The names in a cell that lists them with semicolons."""
    return tuple(name.strip() for name in text.split(";") if name.strip())


def titles() -> list[tuple[str, str]]:
    """Title of each shipped table, and its source with how it was obtained, by file name."""
    found = []
    for entry in sorted(folder("data").iterdir(), key=lambda one: one.name):
        if entry.name.endswith(".csv"):
            header, _ = _read_header(entry.name, entry.read_text(encoding="utf-8").splitlines())
            found.append((header["title"], f"{header['source']}; obtained: {header['obtained']}"))
    return found
