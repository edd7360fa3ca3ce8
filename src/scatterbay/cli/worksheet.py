"""`scatterbay worksheet FILE`."""

from __future__ import annotations

from pathlib import Path
from typing import Annotated

import typer


def command(
    file: Annotated[Path, typer.Argument(help="The scenario file (YAML).", show_default=False)],
    output: Annotated[Path, typer.Option("-o", "--output", help="HTML file to write.", show_default=False)],
    height: Annotated[str, typer.Option("--height", help="Height of the plan above the floor.")] = "1.0 m",
    points: Annotated[
        int, typer.Option("--points", min=20, max=400, help="Points along the plan's longer side.")
    ] = 120,
    advice: Annotated[
        bool, typer.Option("--advice", help="Scan every surface too, and say what to add.")
    ] = False,
    csv: Annotated[
        Path | None,
        typer.Option("--csv", help="Write the tables of places to this file too, for a spreadsheet."),
    ] = None,
    force: Annotated[bool, typer.Option("--force", help="Overwrite a file that exists.")] = False,
) -> int:
    """Write the draft worksheet: one HTML file for a qualified expert to check, change and sign against.

    Example: scatterbay worksheet weld-bay.yaml -o weld-bay.html
    """
    from scatterbay.api import assess, worksheet
    from scatterbay.cli.files import check_free, write_whole
    from scatterbay.errors import UsageError
    from scatterbay.report.records import assessment_rows
    from scatterbay.report.text import as_csv

    if output.suffix not in (".html", ".htm"):
        raise UsageError(f"{output} does not end in .html")
    check_free(output, force)
    if csv is not None:
        check_free(csv, force)
    write_whole(output, worksheet(file, height, points, advice), force)
    if csv is not None:
        write_whole(csv, as_csv(assessment_rows(assess(file))), force)
    typer.echo(f"wrote {output}: a draft for a qualified expert, as every output here", err=True)
    return 0
