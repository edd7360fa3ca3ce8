"""`scatterbay wall FILE SIDE`."""

from __future__ import annotations

from pathlib import Path
from typing import Annotated

import typer


def command(
    file: Annotated[Path, typer.Argument(help="The scenario file (YAML).", show_default=False)],
    side: Annotated[
        str, typer.Argument(help="A side, ceiling, floor, opening or screen.", show_default=False)
    ],
    materials: Annotated[
        str, typer.Option("--with", help="Materials to add, with commas between.")
    ] = "lead, steel, concrete",
    gap: Annotated[str, typer.Option("--gap", help="Distance of the points from the outer face.")] = "0.3 m",
    people: Annotated[
        str, typer.Option("--people", help="Group to judge by, instead of the places behind it.")
    ] = "",
    occupancy: Annotated[
        str, typer.Option("--occupancy", help="With --people: their occupancy factor.")
    ] = "1",
    limit: Annotated[
        str, typer.Option("--limit", help="Share of each goal that the upper end may reach.")
    ] = "1",
    json: Annotated[bool, typer.Option("--json", help="Print JSON: every number with its unit.")] = False,
    csv: Annotated[bool, typer.Option("--csv", help="Print CSV: a row per point.")] = False,
) -> int:
    """Scan the protected side of a wall: where it is weakest, and how much more of what it needs.

    Exit code 0: every point keeps every goal by the upper end of its band. 1: one does not, or cannot be judged.

    Example: scatterbay wall weld-bay.yaml north --with lead
    """
    from scatterbay.api import wall
    from scatterbay.cli.output import one_format, put
    from scatterbay.report.wall import show_wall, wall_record, wall_rows
    from scatterbay.scenario import load

    one_format(json, csv)
    scenario = load(file)
    found, share = wall(scenario, side, materials, gap, people, occupancy, limit)
    put(
        json, csv, lambda: wall_record(scenario, found, share), lambda: wall_rows(found.scan),
        lambda screen: show_wall(scenario, found, screen, share),
    )  # fmt: skip
    worst = found.scan.worst
    return 0 if found.scan.ratios.max() <= share and not worst.result.reasons else 1
