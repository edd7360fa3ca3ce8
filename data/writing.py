"""Shared by the scripts that make the tables: writes a CSV with the header the reader checks."""

from __future__ import annotations

import csv
from collections.abc import Iterable, Sequence
from pathlib import Path

HERE = Path(__file__).parent


def write_table(
    name: str,
    header: dict[str, str],
    columns: Sequence[str],
    rows: Iterable[Sequence[object]],
    where: Path = HERE,
) -> None:
    """Write ``name`` with ``# key: value`` lines, the column names, and the rows."""
    with (where / name).open("w", encoding="utf-8", newline="") as out:
        for key, value in header.items():
            out.write(f"# {key}: {value}\n")
        writer = csv.writer(out, lineterminator="\n")
        writer.writerow(columns)
        writer.writerows(rows)
