"""What `barrier` prints: one barrier's transmission, plane and patch, with value layers and published fits."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from scatterbay import __version__
from scatterbay.engine.single import Transmission
from scatterbay.physics import dose
from scatterbay.report.cautions import CAUTIONS
from scatterbay.report.records import FORMAT
from scatterbay.report.screen import Screen
from scatterbay.report.words import SYMBOLS
from scatterbay.units import significant

KEYS = {dose.AIR_KERMA: "air_kerma", dose.AMBIENT: "ambient_dose_equivalent"}


@dataclass(frozen=True)
class Published:
    """A published fit's transmission for the same beam and barrier, and where it stands."""

    transmission: float
    beam: str
    source: str


@dataclass(frozen=True)
class BarrierReport:
    """The question as asked, and its answer."""

    beam: str
    layers: str
    angle: str
    field: str
    last_material: str
    found: Transmission
    published: Published | None
    notes: tuple[str, ...]


def barrier_record(report: BarrierReport) -> dict[str, Any]:
    """The answer as nested records; transmissions are plain numbers."""
    found = report.found
    transmission = {
        KEYS[q]: {
            "plane": float(found.plane[k]),
            "patch": None if found.patch is None else float(found.patch[k]),
            "uncollided": float(found.uncollided[k]),
        }
        for k, q in enumerate(dose.QUANTITIES)
    }
    layers = {
        KEYS[q]: {
            "half_value_layer": {"value": 1e3 * float(found.half[k]), "unit": "mm"},
            "tenth_value_layer": {"value": 1e3 * float(found.tenth[k]), "unit": "mm"},
        }
        for k, q in enumerate(dose.QUANTITIES)
    }
    published = report.published
    return {
        "format": FORMAT,
        "program": f"scatterbay {__version__}",
        "cautions": list(CAUTIONS),
        "beam": report.beam,
        "layers": report.layers,
        "angle": report.angle,
        "field": report.field or None,
        "transmission": transmission,
        "last_material": report.last_material,
        "further_layers": layers,
        "published_fit": None
        if published is None
        else {"air_kerma": published.transmission, "beam": published.beam, "source": published.source},
        "notes": list(report.notes),
    }


def barrier_rows(report: BarrierReport) -> list[dict[str, Any]]:
    """One row per quantity."""
    found = report.found
    return [
        {
            "beam": report.beam,
            "layers": report.layers,
            "angle": report.angle,
            "field": report.field,
            "quantity": q,
            "plane": float(found.plane[k]),
            "patch": "" if found.patch is None else float(found.patch[k]),
            "uncollided": float(found.uncollided[k]),
            "material": report.last_material,
            "half_value_layer_mm": 1e3 * float(found.half[k]),
            "tenth_value_layer_mm": 1e3 * float(found.tenth[k]),
        }
        for k, q in enumerate(dose.QUANTITIES)
    ]


def show_barrier(report: BarrierReport, screen: Screen) -> None:
    """Print the answer."""
    found = report.found
    screen.line("Barrier on its own", "bold")
    for caution in CAUTIONS:
        screen.paragraph(caution, indent="  ", first="! ")
    screen.line()
    screen.paragraph(f"beam: {report.beam}")
    screen.paragraph(f"layers, in the order they are met: {report.layers}")
    screen.paragraph(f"angle to the normal: {report.angle}")
    if report.field:
        screen.paragraph(f"lit patch: {report.field}")
    screen.line()
    rows = []
    for k, q in enumerate(dose.QUANTITIES):
        patch = "" if found.patch is None else significant(float(found.patch[k]), 3)
        rows.append(
            [
                SYMBOLS[q],
                significant(float(found.plane[k]), 3),
                patch,
                significant(float(found.uncollided[k]), 3),
                significant(1e3 * float(found.half[k]), 3),
                significant(1e3 * float(found.tenth[k]), 3),
            ]
        )
    headings = ["transmission of", "plane", "patch", "uncollided", "half mm", "tenth mm"]
    screen.table(headings, rows, right={1, 2, 3, 4, 5})
    screen.line()
    screen.paragraph(
        f"half, tenth: further {report.last_material} that takes the plane transmission to a half, to a tenth",
        "  ",
    )
    if report.published is not None:
        ratio = float(found.plane[0]) / report.published.transmission
        screen.paragraph(
            f"published fit, air kerma, {report.published.beam}: {significant(report.published.transmission, 3)}; "
            f"plane over fit {significant(ratio, 2)} ({report.published.source})",
            "  ",
        )
    for note in report.notes:
        screen.paragraph(note, indent="    ", first="  - ")
