"""`scatterbay schema`."""

from __future__ import annotations

import typer


def command() -> int:
    """Print the JSON Schema (2020-12) of the scenario file, with help for every key.

    Example: scatterbay schema > scenario.schema.json
    """
    from scatterbay.report.text import as_json
    from scatterbay.scenario import schema

    typer.echo(as_json(schema()), nl=False)
    return 0
