"""The program from Python: the same answers as the command line."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

from scatterbay.exposure.results import Assessment
from scatterbay.scenario.parts import MakeUp, Scenario

if TYPE_CHECKING:
    import pandas as pd

    from scatterbay.advice.comparison import Comparison
    from scatterbay.advice.whole import Advice, SurfaceAdvice
    from scatterbay.barriers.makeup import Sheets
    from scatterbay.engine.single import PatchGeometry
    from scatterbay.report.barrier import BarrierReport, Published
    from scatterbay.report.source import SourceReport
    from scatterbay.scenario.beam_text import NamedBeam

LAYERS = ("aluminium", "copper", "steel", "lead", "concrete")
"""Materials for which ``source`` gives half-value layers."""


def assess(scenario: Scenario | str | Path) -> Assessment:
    """Assess a scenario, or the file it stands in.

    Raises
    ------
    ScenarioError : the file cannot be used. OutOfRangeError : something lies outside the data or the model.
    """
    from scatterbay.engine.contributions import contributions
    from scatterbay.engine.scene import build_scene
    from scatterbay.exposure.assess import assess as judge

    checked = _checked(scenario)
    scene = build_scene(checked)
    return judge(checked, scene, contributions(scene))


def barrier(
    beam: str,
    layers: str,
    angle: str = "0 deg",
    field: str = "",
    source_distance: str = "",
    point_distance: str = "",
) -> BarrierReport:
    """Transmission of one barrier, by air kerma and by H*(10), each over its own incident value.

    Parameters
    ----------
    beam : such as ``X-ray 150 kV, aluminium 3 mm``, ``Ir-192`` or ``662 keV``.
    layers : in the order they are met, such as ``gypsum board 12.5 mm + lead 1.5 mm``.
    angle : of the beam to the barrier's normal, such as ``45 deg``.
    field : side of the square that the beam lights on the barrier, or two sides as ``30 cm x 40 cm``; with it go
        ``source_distance`` (to the barrier, on the axis) and ``point_distance`` (behind it, on the axis).

    Raises
    ------
    UsageError : a text that cannot be used. OutOfRangeError : outside the data or the model.
    """
    from scatterbay.engine.fabric import sheets_of
    from scatterbay.engine.named import spectrum_of
    from scatterbay.engine.single import transmission
    from scatterbay.report.barrier import BarrierReport
    from scatterbay.scenario import make_ups
    from scatterbay.scenario.beam_text import named_beam
    from scatterbay.units import read

    named, built = named_beam(beam), make_ups.make_up(layers, open_allowed=False)
    tilt = read(angle, "angle").value
    patch = _patch(field, source_distance, point_distance)
    sheets = sheets_of(built, ())
    return BarrierReport(
        named.text,
        built.text,
        angle,
        f"{field} at {source_distance} from the source; point {point_distance} behind" if patch else "",
        built.layers[-1].material,
        transmission(spectrum_of(named), sheets, tilt, patch),
        _published(named, built, tilt),
        (*_barrier_notes(named, patch is not None), *_counted_notes(built, sheets)),
    )


def source(name: str) -> SourceReport:
    """Spectrum, mean energy, half-value layers and output of a source, named as for ``barrier``.

    Raises
    ------
    UsageError : a text that cannot be used. OutOfRangeError : outside the data or the model.
    """
    from scatterbay.engine.named import spectrum_of
    from scatterbay.engine.single import narrow_value_layers
    from scatterbay.report.source import SourceReport
    from scatterbay.scenario.beam_text import named_beam
    from scatterbay.tables.materials import material

    named = named_beam(name)
    spectrum = spectrum_of(named)
    layers = narrow_value_layers(spectrum, [material(one) for one in LAYERS])
    return SourceReport(named.text, spectrum, layers, _source_facts(named))


def wall(
    scenario: Scenario | str | Path,
    side: str,
    materials: str = "lead, steel, concrete",
    gap: str = "0.3 m",
    people: str = "",
    occupancy: str = "1",
    limit: str = "1",
) -> tuple[SurfaceAdvice, float]:
    """Scan the protected side of a surface, with remedies where a goal is missed; and the limit as a number.

    Parameters
    ----------
    side : name of a side, an opening or a screen, ``ceiling`` or ``floor``.
    materials : to add, with commas between.
    gap : distance of the points from the outer face.
    people, occupancy : a group to judge by, instead of the places behind the surface.
    limit : share of each goal that the upper end of a figure's band may reach.

    Raises
    ------
    UsageError : a name or a text that cannot be used, or nobody behind the surface.
    """
    from scatterbay.advice.scan import Standing, scan, standings_behind
    from scatterbay.advice.surfaces import surface_of
    from scatterbay.advice.whole import surface_advice
    from scatterbay.engine.scene import build_scene
    from scatterbay.errors import UsageError
    from scatterbay.units import nearest

    checked = _checked(scenario)
    surface, names, share = surface_of(checked, side), _materials(materials), _share(limit, "limit")
    scene = build_scene(checked)
    if people:
        groups = [group.name for group in checked.people]
        if people not in groups:
            near = nearest(people, groups)
            hint = f"did you mean '{near}'? " if near else ""
            raise UsageError(f"there is no group '{people}'; {hint}there are: {', '.join(groups)}")
        standings: tuple[Standing, ...] = (
            Standing(people, _share(occupancy, "occupancy"), people, (0.0, 0.0, 0.0)),
        )
    else:
        standings = standings_behind(checked, scene, surface)
    found = scan(checked, surface, standings, _gap(gap), scene=scene)
    return surface_advice(checked, found, names, share), share


def advise(
    scenario: Scenario | str | Path, materials: str = "lead, steel, concrete", limit: str = "1"
) -> Advice:
    """Scan every surface that protects someone, and what to add where; parameters and errors as for ``wall``."""
    from scatterbay.advice.whole import advise as all_surfaces

    return all_surfaces(_checked(scenario), _materials(materials), limit=_share(limit, "limit"))


def worksheet(
    scenario: Scenario | str | Path, height: str = "1.0 m", points: int = 120, with_advice: bool = False
) -> str:
    """The draft worksheet of a scenario, as HTML.

    Parameters
    ----------
    height : of the plan above the floor. points : of the plan, along its longer side.
    with_advice : whether every surface is scanned, and what to add is said.
    """
    from scatterbay.advice.barrier_facts import barrier_facts
    from scatterbay.advice.dose_map import Plane, dose_map
    from scatterbay.advice.hand_check import hand_check
    from scatterbay.engine.contributions import Kept, contributions
    from scatterbay.engine.scene import build_scene
    from scatterbay.exposure.assess import assess as judge
    from scatterbay.report.plan import plan_svg
    from scatterbay.report.worksheet.sheet import Paper
    from scatterbay.report.worksheet.sheet import worksheet as written
    from scatterbay.tables.files import titles
    from scatterbay.units import read

    checked = _checked(scenario)
    scene = build_scene(checked)
    kept: Kept = {}
    rows = contributions(scene, kept=kept)
    found = judge(checked, scene, rows)
    chains = hand_check(scene, rows, kept, [place.quantity for place in found.places])
    plane = Plane(2, read(height, "length").value)
    plan = plan_svg(checked, plane, dose_map(checked, plane, count=points), found)
    advised = advise(checked) if with_advice else None
    return written(Paper(checked, found, barrier_facts(checked, scene), plan, titles(), chains, advised))


def compare(*scenarios: Scenario | str | Path) -> Comparison:
    """Scenarios side by side, or one with the variants it names; the first is what the others are compared with.

    Raises
    ------
    UsageError : fewer than two, or more than there are letters for.
    """
    from scatterbay.advice.comparison import compare as side_by_side
    from scatterbay.advice.variants import variants_of
    from scatterbay.errors import UsageError

    options = [_checked(one) for one in scenarios]
    if len(options) == 1:
        options += variants_of(options[0])
    if not 2 <= len(options) <= 26:
        raise UsageError("compare takes 2 to 26 scenarios, or one that names variants")
    return side_by_side(options)


def _checked(scenario: Scenario | str | Path) -> Scenario:
    from scatterbay.scenario import load

    return scenario if isinstance(scenario, Scenario) else load(scenario)


def _materials(text: str) -> list[str]:
    from scatterbay.scenario.make_ups import check_material

    return [check_material(" ".join(name.split())) for name in text.split(",") if name.strip()]


def _share(text: str, what: str) -> float:
    from scatterbay.errors import UsageError
    from scatterbay.units import read_number

    value = read_number(text, f"{what}: above 0 and at most 1, as 1, 1/4, 0.25 or 25 %")
    if not 0.0 < value <= 1.0:
        raise UsageError(f"{what} {text} is not above 0 and at most 1")
    return value


def _gap(text: str) -> float:
    from scatterbay.errors import UsageError
    from scatterbay.units import read

    value = read(text, "length").value
    if not 0.05 <= value <= 10.0:
        raise UsageError(f"a gap of {text} is not between 50 mm and 10 m")
    return value


def table(result: Assessment | BarrierReport | SourceReport) -> pd.DataFrame:
    """A result as a tidy pandas table, a unit beside every number; the cautions stand in its ``attrs``."""
    from scatterbay.report.frame import frame

    return frame(result)


def _patch(field: str, source: str, point: str) -> PatchGeometry | None:
    from scatterbay.engine.single import PatchGeometry
    from scatterbay.errors import UsageError
    from scatterbay.units import read

    if not field and not source and not point:
        return None
    if not (field and source and point):
        raise UsageError("a lit patch needs all three: a field, a source distance and a point distance")
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
        if same and layer.material == fit.material and layer.density is None:
            return Published(fit.transmission(layer.counted_thickness), fit.beam, fit.source)
    return None


def _counted_notes(built: MakeUp, sheets: Sheets) -> list[str]:
    """Where a layer counts as something else than is written: at its least, or by its lead equivalent."""
    from scatterbay.scenario.least import least_notes

    found = [
        f"{layer.material} {layer.thickness.text} counted as {1e3 * sheet.thickness:.3g} mm, which stops as much of "
        "that beam by transport"
        for layer, sheet in zip(built.layers, sheets, strict=True)
        if layer.equivalent is not None
    ]
    return [f"{note}." for note in dict.fromkeys([*least_notes(built), *found])]


def _barrier_notes(beam: NamedBeam, with_patch: bool) -> tuple[str, ...]:
    notes = ["Stray radiation floods a barrier: judge it by the plane figure. A primary beam lights a patch."]
    if not with_patch:
        notes.append("No patch: that needs a field, a source distance and a point distance.")
    if beam.voltage:
        notes.append("The spectrum is the tube model's, at constant potential, anode angle 20 deg.")
    if beam.nuclide:
        notes.append("Lines below 20 keV are taken as stopped in the capsule.")
    return tuple(notes)


def _source_facts(beam: NamedBeam) -> tuple[str, ...]:
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
