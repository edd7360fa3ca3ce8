"""`scatterbay barrier --beam ... --layers ...`."""

from __future__ import annotations

from typing import Annotated

import typer


def command(
    beam: Annotated[
        str, typer.Option("--beam", help="'X-ray 150 kV, aluminium 3 mm', 'Ir-192' or '662 keV'.")
    ],
    layers: Annotated[
        str, typer.Option("--layers", help="Layers as met, as 'gypsum board 12.5 mm + lead 1.5 mm'.")
    ],
    angle: Annotated[
        str, typer.Option("--angle", help="Angle of the beam to the barrier's normal.")
    ] = "0 deg",
    field: Annotated[
        str, typer.Option("--field", help="Field at the barrier: side of a square, or '30 cm x 40 cm'.")
    ] = "",
    source_distance: Annotated[
        str, typer.Option("--source-distance", help="Source to barrier, on the axis.")
    ] = "",
    point_distance: Annotated[
        str, typer.Option("--point-distance", help="Far face to the point, on the axis.")
    ] = "",
    json: Annotated[bool, typer.Option("--json", help="Print JSON.")] = False,
    csv: Annotated[bool, typer.Option("--csv", help="Print CSV: a row per quantity.")] = False,
) -> int:
    """Transmission of one barrier, by air kerma and by H*(10), each over its own incident value.

    The plane figure is for radiation that floods the whole barrier. With a field and distances, the patch figure
    is for a primary beam that lights only part of it, at a point on the axis behind.

    Example: scatterbay barrier --beam "X-ray 150 kV, aluminium 3 mm" --layers "gypsum board 12.5 mm + lead 1.5 mm"
    """
    from scatterbay.api import barrier
    from scatterbay.cli.output import one_format, put
    from scatterbay.report.barrier import barrier_record, barrier_rows, show_barrier

    one_format(json, csv)
    found = barrier(beam, layers, angle, field, source_distance, point_distance)
    put(
        json,
        csv,
        lambda: barrier_record(found),
        lambda: barrier_rows(found),
        lambda s: show_barrier(found, s),
    )
    return 0
