"""`scatterbay new KIND`."""

from __future__ import annotations

from pathlib import Path
from typing import Annotated

import typer

STARTS = {"medical": "two-tube-room", "projector": "projector-job"}
"""Shorter names for what most people start from."""


def command(
    kind: Annotated[
        str,
        typer.Argument(
            help="weld-bay, casting-cell, pipe-shop, radiography-room, two-tube-room (or medical), "
            "projector-job (or projector)."
        ),
    ],
    output: Annotated[
        Path | None, typer.Option("-o", "--output", help="File to write; KIND.yaml here if left out.")
    ] = None,
    force: Annotated[bool, typer.Option("--force", help="Overwrite a file that exists.")] = False,
) -> int:
    """Copy a commented scenario that runs, to start from. It is demonstration data: change every number.

    Example: scatterbay new weld-bay -o my-bay.yaml
    """
    from scatterbay.cli.files import write_whole
    from scatterbay.errors import OutOfRangeError, UsageError
    from scatterbay.resources import folder
    from scatterbay.scenario.purposes import not_validated
    from scatterbay.units import nearest

    kinds = sorted(
        entry.name.removesuffix(".yaml")
        for entry in folder("scenarios").iterdir()
        if entry.name.endswith(".yaml")
    )
    asked, kind = kind, STARTS.get(kind, kind)
    refused = not_validated(kind) or not_validated(kind.upper())
    if refused:
        raise OutOfRangeError(f"rooms for {refused} are refused: nothing here was validated for them")
    if kind not in kinds:
        near = nearest(kind, kinds)
        hint = f"did you mean '{near}'? " if near else ""
        raise UsageError(f"'{kind}' is not a kind of scenario; {hint}there are: {', '.join(kinds)}")
    target = output or Path(f"{asked}.yaml")
    write_whole(target, (folder("scenarios") / f"{kind}.yaml").read_text(encoding="utf-8"), force)
    typer.echo(f"wrote {target}; next: scatterbay assess {target}", err=True)
    return 0
