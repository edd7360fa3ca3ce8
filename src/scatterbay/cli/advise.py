"""`scatterbay advise FILE`."""

from __future__ import annotations

from pathlib import Path
from typing import Annotated

import typer


def command(
    file: Annotated[Path, typer.Argument(help="The scenario file (YAML).", show_default=False)],
    materials: Annotated[
        str, typer.Option("--with", help="Materials to add, the preferred one first.")
    ] = "lead, steel, concrete",
    limit: Annotated[
        str, typer.Option("--limit", help="Share of each goal that the upper end may reach.")
    ] = "1",
    output: Annotated[
        Path | None, typer.Option("-o", "--output", help="Write the scenario as amended to this file.")
    ] = None,
    force: Annotated[bool, typer.Option("--force", help="Overwrite a file that exists.")] = False,
    json: Annotated[bool, typer.Option("--json", help="Print JSON: every number with its unit.")] = False,
) -> int:
    """Scan every surface that protects someone, and say what to add where, the worst first.

    Exit code 0: every point keeps every goal by the upper end of its band. 1: one does not, or cannot be judged.

    Example: scatterbay advise pipe-shop.yaml --with lead -o pipe-shop-amended.yaml
    """
    from scatterbay.advice.amend import amended_text
    from scatterbay.api import advise
    from scatterbay.cli.files import check_free, write_whole
    from scatterbay.cli.output import put
    from scatterbay.report.wall import advice_record, show_advice
    from scatterbay.scenario import load, loads

    if output is not None:
        check_free(output, force)
    scenario = load(file)
    found = advise(scenario, materials, limit)
    if output is not None:
        text = amended_text(scenario.text, found.additions)
        loads(text, str(output))
        write_whole(output, text, force)
        typer.echo(f"wrote {output}; next: scatterbay assess {output}", err=True)
    put(
        json, False, lambda: advice_record(scenario, found), list, lambda screen: show_advice(scenario, found, screen)
    )  # fmt: skip
    kept = all(not one.missed and not one.scan.worst.result.reasons for one in found.surfaces)
    return 0 if kept else 1
