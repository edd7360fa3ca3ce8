"""`scatterbay barrier --beam ... --layers ...`."""

from __future__ import annotations

from typing import TYPE_CHECKING, Annotated

import typer

if TYPE_CHECKING:
    from scatterbay.engine.single import PatchGeometry
    from scatterbay.report.barrier import Published
    from scatterbay.scenario.beam_text import NamedBeam
    from scatterbay.scenario.parts import MakeUp


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
    from scatterbay.barriers.makeup import sheet
    from scatterbay.cli.output import one_format, put
    from scatterbay.engine.named import spectrum_of
    from scatterbay.engine.single import transmission
    from scatterbay.report.barrier import BarrierReport, barrier_record, barrier_rows, show_barrier
    from scatterbay.scenario import make_up
    from scatterbay.scenario.beam_text import named_beam
    from scatterbay.units import read

    one_format(json, csv)
    named, built = named_beam(beam), make_up(layers)
    tilt = read(angle, "angle")
    patch = _patch(field, source_distance, point_distance)
    sheets = tuple(sheet(layer.material, layer.thickness.value) for layer in built.layers)
    found = transmission(spectrum_of(named), sheets, tilt.value, patch)
    report = BarrierReport(
        named.text,
        built.text,
        angle,
        f"{field} at {source_distance} from the source; point {point_distance} behind" if patch else "",
        built.layers[-1].material,
        found,
        _published(named, built, tilt.value),
        _notes(named, found.patch is not None),
    )
    put(
        json,
        csv,
        lambda: barrier_record(report),
        lambda: barrier_rows(report),
        lambda s: show_barrier(report, s),
    )
    return 0


def _patch(field: str, source: str, point: str) -> PatchGeometry | None:
    from scatterbay.engine.single import PatchGeometry
    from scatterbay.errors import UsageError
    from scatterbay.units import read

    if not field and not source and not point:
        return None
    if not (field and source and point):
        raise UsageError("a lit patch needs all three: --field, --source-distance and --point-distance")
    sides = [read(side, "length").value for side in field.split("x")]
    distances = read(source, "length").value, read(point, "length").value
    if len(sides) > 2 or min(*sides, *distances) <= 0.0:
        raise UsageError(f"field '{field}' and distances must be lengths above 0, the field one side or two")
    return PatchGeometry(sides[0], sides[-1], *distances)


def _published(beam: NamedBeam, layers: MakeUp, angle: float) -> Published | None:
    """The published fit for the same beam and a single layer of the same material, where there is one."""
    from scatterbay.report.barrier import Published
    from scatterbay.tables.fits import fits

    if len(layers.layers) != 1 or angle != 0.0:
        return None
    layer = layers.layers[0]
    for fit in fits():
        same = (
            beam.voltage == fit.voltage
            if beam.voltage
            else abs((beam.energy_kev or 0.0) - fit.energy_kev) < 0.5
        )
        if same and layer.material == fit.material:
            return Published(fit.transmission(layer.thickness.value), fit.beam, fit.source)
    return None


def _notes(beam: NamedBeam, with_patch: bool) -> tuple[str, ...]:
    notes = ["Stray radiation floods a barrier: judge it by the plane figure. A primary beam lights a patch."]
    if not with_patch:
        notes.append("No patch: give --field, --source-distance and --point-distance.")
    if beam.voltage:
        notes.append("The spectrum is the tube model's, at constant potential, anode angle 20 deg.")
    if beam.nuclide:
        notes.append("Lines below 20 keV are taken as stopped in the capsule.")
    return tuple(notes)
