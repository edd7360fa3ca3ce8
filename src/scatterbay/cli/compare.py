"""`scatterbay compare FILE FILE [...]`."""

from __future__ import annotations

from pathlib import Path
from typing import Annotated

import typer


def command(
    files: Annotated[
        list[Path],
        typer.Argument(help="Two scenario files or more, or one that names variants.", show_default=False),
    ],
    json: Annotated[bool, typer.Option("--json", help="Print JSON: every number with its unit.")] = False,
    csv: Annotated[bool, typer.Option("--csv", help="Print CSV: a row per place and scenario.")] = False,
) -> int:
    """Set scenarios side by side: what changed in the input and at each place, and which keep every goal.

    Exit code 0: the last one is below every goal. 1: it is not.

    Example: scatterbay compare pipe-shop.yaml pipe-shop-amended.yaml
    """
    from scatterbay.api import compare
    from scatterbay.cli.output import one_format, put
    from scatterbay.report.comparison import comparison_record, comparison_rows, show_comparison

    one_format(json, csv)
    found = compare(*files)
    put(
        json, csv, lambda: comparison_record(found), lambda: comparison_rows(found),
        lambda screen: show_comparison(found, screen),
    )  # fmt: skip
    return 0 if found.options[-1].meets_all else 1
