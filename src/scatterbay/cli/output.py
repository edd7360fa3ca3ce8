"""What the commands share about their output."""

from __future__ import annotations

from collections.abc import Callable
from typing import TYPE_CHECKING, Any

import typer

from scatterbay.errors import UsageError

if TYPE_CHECKING:
    from scatterbay.report.screen import Screen


def one_format(json: bool, csv: bool) -> None:
    """Refuse two formats at once."""
    if json and csv:
        raise UsageError("--json and --csv exclude each other: choose one")


def put(
    json: bool,
    csv: bool,
    record: Callable[[], dict[str, Any]],
    rows: Callable[[], list[dict[str, Any]]],
    show: Callable[[Screen], None],
) -> None:
    """Print a result to stdout in the form asked for."""
    if json or csv:
        from scatterbay.report.text import as_csv, as_json

        typer.echo(as_json(record()) if json else as_csv(rows()), nl=False)
    else:
        from scatterbay.report.screen import Screen

        show(Screen())
