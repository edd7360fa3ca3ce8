"""What the commands share about their output."""

from __future__ import annotations

from scatterbay.errors import UsageError


def one_format(json: bool, csv: bool) -> None:
    """Refuse two formats at once."""
    if json and csv:
        raise UsageError("--json and --csv exclude each other: choose one")
