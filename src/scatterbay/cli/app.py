"""All commands in one application; each imports its own work when it runs."""

from __future__ import annotations

from typing import Annotated

import typer

from scatterbay import __version__
from scatterbay.cli import assess

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
app.command("assess")(assess.command)


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
