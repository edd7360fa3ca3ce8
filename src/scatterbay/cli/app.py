"""All commands in one application; each imports its own work when it runs."""

from __future__ import annotations

from typing import Annotated

import typer

from scatterbay import __version__
from scatterbay.cli import advise, assess, barrier, compare, lists, map, new, schema, source, wall, worksheet

app = typer.Typer(
    name="scatterbay",
    help=(
        "Screen stray radiation around X-ray rooms and industrial radiography bays. Results are drafts for a "
        "qualified expert; local regulations prevail."
    ),
    rich_markup_mode=None,
    no_args_is_help=True,
    add_completion=False,
    pretty_exceptions_enable=False,
    context_settings={"help_option_names": ["-h", "--help"], "max_content_width": 80},
)
app.command("assess", short_help="Assess every occupied place of a bay.")(assess.command)
app.command("wall", short_help="Scan the protected side of a wall; how much more of what.")(wall.command)
app.command("advise", short_help="Scan the whole bay; what to add where.")(advise.command)
app.command("compare", short_help="Scenarios side by side: changes, places, mass.")(compare.command)
app.command("map", short_help="Draw the dose over the plan or a section.")(map.command)
app.command("worksheet", short_help="Write the draft worksheet as one HTML file.")(worksheet.command)
app.command("barrier", short_help="Transmission of one barrier, plane and lit patch.")(barrier.command)
app.command("source", short_help="Spectrum, value layers and output of a source.")(source.command)
app.command("lists", short_help="Stock, rule sets, occupancy and other lists to take names from.")(
    lists.command
)
app.command("new", short_help="Copy a commented scenario to start from.")(new.command)
app.command("schema", short_help="Print the JSON Schema of the scenario file.")(schema.command)


def _version(wanted: bool) -> None:
    if wanted:
        typer.echo(f"scatterbay {__version__}")
        raise typer.Exit()


@app.callback()
def main(
    version: Annotated[
        bool, typer.Option("--version", callback=_version, is_eager=True, help="Print the version and stop.")
    ] = False,
) -> None:
    """Screen stray radiation around X-ray rooms and industrial radiography bays."""
