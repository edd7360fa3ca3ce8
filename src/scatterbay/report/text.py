"""Writes JSON and CSV: cautions first, numbers in full, no cell that a spreadsheet would run."""

from __future__ import annotations

import csv
import io
import json
from collections.abc import Mapping, Sequence
from typing import Any

from scatterbay.report.cautions import CAUTIONS

RUNS_IN_A_SPREADSHEET = ("=", "+", "-", "@", "\t", "\r")


def as_json(record: Mapping[str, Any]) -> str:
    """A record as JSON text; floats in full, no infinities."""
    return json.dumps(record, indent=2, ensure_ascii=False, allow_nan=False) + "\n"


def as_csv(rows: Sequence[Mapping[str, Any]]) -> str:
    """Rows as CSV text; the cautions stand in a last column of every row."""
    if not rows:
        return ""
    out = io.StringIO()
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow([*rows[0], "caution"])
    for row in rows:
        writer.writerow([*(_cell(value) for value in row.values()), " ".join(CAUTIONS)])
    return out.getvalue()


def _cell(value: object) -> object:
    if value is None:
        return ""
    if isinstance(value, str) and value.startswith(RUNS_IN_A_SPREADSHEET):
        return "'" + value
    return value
