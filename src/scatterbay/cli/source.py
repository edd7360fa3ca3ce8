"""`scatterbay source NAME`."""

from __future__ import annotations

from typing import Annotated

import typer


def command(
    name: Annotated[str, typer.Argument(help="'Ir-192', 'X-ray 150 kV, aluminium 3 mm' or '662 keV'.")],
    json: Annotated[bool, typer.Option("--json", help="Print JSON, with the whole spectrum.")] = False,
    csv: Annotated[bool, typer.Option("--csv", help="Print CSV: the whole spectrum.")] = False,
) -> int:
    """Summary of a source: spectrum, mean energy, half-value layers, rate at 1 m per unit of output.

    Example: scatterbay source Ir-192
    """
    from scatterbay.api import source
    from scatterbay.cli.output import one_format, put
    from scatterbay.report.source import show_source, source_record, spectrum_rows

    one_format(json, csv)
    found = source(name)
    put(
        json, csv, lambda: source_record(found), lambda: spectrum_rows(found), lambda s: show_source(found, s)
    )
    return 0
