"""What `source` prints: a beam's spectrum in summary, half-value layers, and the rate at 1 m."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np

from scatterbay import __version__
from scatterbay.physics import dose
from scatterbay.physics.spectrum import Spectrum
from scatterbay.report.cautions import CAUTIONS
from scatterbay.report.records import FORMAT
from scatterbay.report.screen import Screen
from scatterbay.report.words import SYMBOLS
from scatterbay.units import significant

PER = {
    "coulomb": ("mA min", 60e-3, 1e3, "m"),
    "decay": ("GBq h", 3600e9, 1e6, "u"),
    "photon": ("1e12 photons", 1e12, 1e6, "u"),
}
"""Unit of output as people use it: its name, its size in units of output, and the prefix of the dose."""
MOST_LINES = 12
BANDS = 8


@dataclass(frozen=True)
class SourceReport:
    """A named beam: its spectrum, half-value layers (first, second) by material [m], and facts about it."""

    name: str
    spectrum: Spectrum
    layers: dict[str, tuple[float, float]]
    facts: tuple[str, ...]


def _at_1_m(report: SourceReport) -> list[tuple[str, float, str]]:
    """Quantity, value and unit of what arrives at 1 m per unit of output."""
    name, size, scale, prefix = PER[report.spectrum.per]
    values = report.spectrum.dose_at_1_m() * size * scale
    return [
        (q, float(value), f"{prefix}{dose.UNITS[q]} m2/({name})")
        for q, value in zip(dose.QUANTITIES, values, strict=True)
    ]


def spectrum_rows(report: SourceReport) -> list[dict[str, Any]]:
    """The spectrum: energy, photons per steradian and unit of output, share of photons and of air kerma."""
    spectrum = report.spectrum
    kerma = spectrum.photons * dose.air_kerma_per_fluence(spectrum.energy_kev)
    shares = spectrum.photons / spectrum.photons.sum(), kerma / kerma.sum()
    return [
        {
            "energy_kev": float(energy),
            "photons_per_steradian": float(photons),
            "per": spectrum.per,
            "share_of_photons": float(number),
            "share_of_air_kerma": float(part),
        }
        for energy, photons, number, part in zip(spectrum.energy_kev, spectrum.photons, *shares, strict=True)
    ]


def source_record(report: SourceReport) -> dict[str, Any]:
    """Everything as nested records."""
    return {
        "format": FORMAT,
        "program": f"scatterbay {__version__}",
        "cautions": list(CAUTIONS),
        "name": report.name,
        "mean_energy": {"value": report.spectrum.mean_energy_kev, "unit": "keV"},
        "at_1_m": [{"quantity": q, "value": value, "unit": unit} for q, value, unit in _at_1_m(report)],
        "half_value_layers": [
            {
                "material": name,
                "first": {"value": 1e3 * one, "unit": "mm"},
                "second": {"value": 1e3 * two, "unit": "mm"},
            }
            for name, (one, two) in report.layers.items()
        ],
        "spectrum": spectrum_rows(report),
        "facts": list(report.facts),
    }


def show_source(report: SourceReport, screen: Screen) -> None:
    """Print the summary."""
    screen.line(f"Source: {report.name}", "bold")
    for caution in CAUTIONS:
        screen.paragraph(caution, indent="  ", first="! ")
    screen.line()
    screen.paragraph(f"mean energy {report.spectrum.mean_energy_kev:.1f} keV (by number of photons)", "  ")
    for quantity, value, unit in _at_1_m(report):
        screen.paragraph(f"{SYMBOLS[quantity]} at 1 m: {significant(value, 3)} {unit}", "  ")
    screen.line()
    rows = [
        [name, significant(1e3 * a, 3), significant(1e3 * b, 3)] for name, (a, b) in report.layers.items()
    ]
    screen.table(["narrow beam, air kerma", "first HVL mm", "second HVL mm"], rows, right={1, 2})
    screen.line()
    _show_spectrum(report, screen)
    screen.line()
    for fact in report.facts:
        screen.paragraph(fact, indent="    ", first="  - ")


def _show_spectrum(report: SourceReport, screen: Screen) -> None:
    rows = spectrum_rows(report)
    headings = ["energy keV", "photons", "air kerma"]
    if report.spectrum.per == "coulomb":
        edges = np.linspace(rows[0]["energy_kev"] - 0.5, rows[-1]["energy_kev"] + 0.5, BANDS + 1)
        number = np.array([row["share_of_photons"] for row in rows])
        kerma = np.array([row["share_of_air_kerma"] for row in rows])
        band = np.clip(np.digitize([row["energy_kev"] for row in rows], edges) - 1, 0, BANDS - 1)
        cells = [
            [
                f"{edges[k]:.0f} to {edges[k + 1]:.0f}",
                _percent(number[band == k].sum()),
                _percent(kerma[band == k].sum()),
            ]
            for k in range(BANDS)
        ]
        screen.table(headings, cells, right={0, 1, 2})
        return
    strongest = sorted(
        sorted(rows, key=lambda r: -r["share_of_air_kerma"])[:MOST_LINES], key=lambda r: r["energy_kev"]
    )
    cells = [
        [f"{row['energy_kev']:.1f}", _percent(row["share_of_photons"]), _percent(row["share_of_air_kerma"])]
        for row in strongest
    ]
    screen.table(headings, cells, right={0, 1, 2})
    if len(rows) > MOST_LINES:
        screen.paragraph(f"the {MOST_LINES} lines with the most kerma, of {len(rows)}", "  ")


def _percent(share: float) -> str:
    return f"{100.0 * float(share):.1f} %"
