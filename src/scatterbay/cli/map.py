"""`scatterbay map FILE`."""

from __future__ import annotations

import sys
from collections.abc import Callable
from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

if TYPE_CHECKING:
    from scatterbay.advice.dose_map import Plane


def command(
    file: Annotated[Path, typer.Argument(help="The scenario file (YAML).", show_default=False)],
    output: Annotated[
        Path, typer.Option("-o", "--output", help="File to write: .svg or .png.", show_default=False)
    ],
    height: Annotated[str, typer.Option("--height", help="Height of the plan above the floor.")] = "1.0 m",
    section: Annotated[
        str, typer.Option("--section", help="A vertical section instead, as 'x=2.5 m' or 'y=1 m'.")
    ] = "",
    time: Annotated[
        str, typer.Option("--time", help="rate, hour, week or year; all at full occupancy.")
    ] = "rate",
    kerma: Annotated[bool, typer.Option("--kerma", help="Air kerma instead of H*(10).")] = False,
    points: Annotated[
        int, typer.Option("--points", min=20, max=400, help="Points along the longer side.")
    ] = 200,
    force: Annotated[bool, typer.Option("--force", help="Overwrite a file that exists.")] = False,
) -> int:
    """Draw the dose rate, or a time base's dose, over the plan or a section, with the goals as lines.

    Example: scatterbay map weld-bay.yaml --height 1.2m -o weld-bay.svg
    """
    from scatterbay.api import assess
    from scatterbay.cli.files import check_free, write_whole
    from scatterbay.errors import UsageError
    from scatterbay.physics.dose import AIR_KERMA, AMBIENT

    if output.suffix not in (".svg", ".png"):
        raise UsageError(f"{output} ends neither in .svg nor in .png")
    check_free(output, force)
    from scatterbay.advice.dose_map import dose_map
    from scatterbay.report.plan import plan_png, plan_svg
    from scatterbay.scenario import load

    plane = plane_of(height, section)
    scenario = load(file)
    found = dose_map(scenario, plane, time, AIR_KERMA if kerma else AMBIENT, points, progress())
    assessed = assess(scenario)
    drawn: str | bytes
    drawn = (plan_svg if output.suffix == ".svg" else plan_png)(scenario, plane, found, assessed)
    write_whole(output, drawn, force)
    typer.echo(f"wrote {output}: a draft for a qualified expert, as every output here", err=True)
    return 0


def plane_of(height: str, section: str) -> Plane:
    """The plane that the options describe.

    Raises
    ------
    UsageError : a section that is not of the form 'x=2.5 m'.
    """
    from scatterbay.advice.dose_map import Plane
    from scatterbay.errors import UsageError
    from scatterbay.units import read

    if not section:
        return Plane(2, read(height, "length").value)
    name, equals, level = section.partition("=")
    if not equals or name.strip() not in ("x", "y"):
        raise UsageError(f"'{section}' is not a section; write 'x=2.5 m' or 'y=1 m'")
    return Plane("xy".index(name.strip()), read(level.strip(), "length").value)


def progress() -> Callable[[float], None] | None:
    """A bar on the error stream, where that is a terminal."""
    if not sys.stderr.isatty():
        return None
    from time import monotonic

    start = monotonic()

    def told(share: float) -> None:
        if monotonic() - start > 1.0:
            filled = round(40 * share)
            end = "\n" if share >= 1.0 else ""
            sys.stderr.write(f"\r[{'#' * filled}{'.' * (40 - filled)}] {100 * share:3.0f} %{end}")
            sys.stderr.flush()

    return told
