"""`scatterbay source NAME`."""

from __future__ import annotations

from typing import TYPE_CHECKING, Annotated

import typer

if TYPE_CHECKING:
    from scatterbay.scenario.beam_text import NamedBeam

LAYERS = ("aluminium", "copper", "steel", "lead", "concrete")


def command(
    name: Annotated[str, typer.Argument(help="'Ir-192', 'X-ray 150 kV, aluminium 3 mm' or '662 keV'.")],
    json: Annotated[bool, typer.Option("--json", help="Print JSON, with the whole spectrum.")] = False,
    csv: Annotated[bool, typer.Option("--csv", help="Print CSV: the whole spectrum.")] = False,
) -> int:
    """Summary of a source: spectrum, mean energy, half-value layers, rate at 1 m per unit of output.

    Example: scatterbay source Ir-192
    """
    from scatterbay.cli.output import one_format, put
    from scatterbay.engine.named import spectrum_of
    from scatterbay.engine.single import narrow_value_layers
    from scatterbay.report.source import SourceReport, show_source, source_record, spectrum_rows
    from scatterbay.scenario.beam_text import named_beam
    from scatterbay.tables.materials import material

    one_format(json, csv)
    named = named_beam(name)
    spectrum = spectrum_of(named)
    layers = narrow_value_layers(spectrum, [material(one) for one in LAYERS])
    report = SourceReport(named.text, spectrum, layers, _facts(named))
    put(
        json,
        csv,
        lambda: source_record(report),
        lambda: spectrum_rows(report),
        lambda s: show_source(report, s),
    )
    return 0


def _facts(beam: NamedBeam) -> tuple[str, ...]:
    """What is behind the spectrum, in sentences."""
    from scatterbay.tables.nuclides import nuclide

    if beam.nuclide:
        found = nuclide(beam.nuclide)
        days = found.half_life / 86400.0
        half_life = f"{days:.4g} days" if days < 1000 else f"{days / 365.2422:.4g} years"
        return (
            f"Half-life {half_life}; lines from the LNHB evaluation ({found.evaluation}).",
            "Lines below 20 keV are taken as stopped in the capsule; absorption of the rest in source and capsule "
            "is left out.",
        )
    if beam.voltage:
        return (
            "Tube model at constant potential, anode angle 20 deg; its output was compared within 30 % with common "
            "practice from 60 to 120 kV. A measured output or half-value layer in a scenario replaces it.",
        )
    return ("Photons of one energy, sent out evenly in all directions.",)
