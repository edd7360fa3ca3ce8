"""`scatterbay assess FILE`."""

from __future__ import annotations

from pathlib import Path
from typing import Annotated

import typer


def command(
    file: Annotated[Path, typer.Argument(help="The scenario file (YAML).", show_default=False)],
    json: Annotated[bool, typer.Option("--json", help="Print JSON: every number with its unit.")] = False,
    csv: Annotated[
        bool, typer.Option("--csv", help="Print CSV: a row per place, time base and goal.")
    ] = False,
) -> int:
    """Assess every occupied place of a bay: what arrives, by which path, against which goal.

    Exit code 0: every place is below its goals. 1: one is above, or too close to call. 2: bad input.
    3: outside the data or the model.

    Example: scatterbay assess weld-bay.yaml
    """
    from scatterbay.api import assess
    from scatterbay.cli.output import one_format, put
    from scatterbay.exposure.results import BELOW
    from scatterbay.report.records import assessment_record, assessment_rows
    from scatterbay.report.terminal import show_assessment

    one_format(json, csv)
    found = assess(file)
    put(
        json, csv, lambda: assessment_record(found), lambda: assessment_rows(found),
        lambda screen: show_assessment(found, screen),
    )  # fmt: skip
    return 0 if found.worst == BELOW else 1
