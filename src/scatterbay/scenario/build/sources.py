"""Sources: tubes with what filters them, sealed sources with their dates, leakage with its housing."""

from __future__ import annotations

from dataclasses import replace
from datetime import date

from scatterbay.scenario import parts
from scatterbay.scenario.build.findings import Findings, usable
from scatterbay.scenario.build.states import container_of, travel_of
from scatterbay.scenario.known import TUBE_KV
from scatterbay.scenario.model import sources as written
from scatterbay.scenario.model.document import Document
from scatterbay.units import Quantity, read

ANODE_ANGLE = "20 deg"
HOUSING = "lead"
DAY = 86400.0


def build_sources(document: Document, findings: Findings) -> tuple[parts.Source, ...]:
    """Every source whose statements fit together."""
    entries: dict[str, written.XrayTube | written.SealedSource] = usable(document.sources)
    found: list[parts.Source] = []
    for name, entry in entries.items():
        made = (
            _tube(name, entry, findings)
            if isinstance(entry, written.XrayTube)
            else _sealed(name, entry, findings)
        )
        found += [made] if made else []
    return tuple(found)


def _tube(name: str, entry: written.XrayTube, findings: Findings) -> parts.XrayTube | None:
    path = ("sources", name)
    layer = entry.half_value_layer
    if (entry.filtration is None) == (layer is None):
        said = (
            "both a filtration and a half-value layer are given"
            if layer
            else "nothing says how the beam is filtered"
        )
        hint = "give 'filtration: aluminium 3 mm' or a measured 'half-value layer: aluminium 3.2 mm'"
        findings.wrong(path, said, hint, on_key=True)
        return None
    if entry.output is None:
        findings.assume("output", "No measured output given, so the spectrum model's own is used", name)
    angle = entry.anode_angle
    if angle is None:
        angle = read(ANODE_ANGLE, "angle")
        findings.assume("anode angle", f"Anode angle taken as {ANODE_ANGLE}", name)
    matched = parts.MakeUp(
        (), f"matched to a half-value layer of {layer.material} {layer.thickness.text}" if layer else ""
    )
    return parts.XrayTube(
        name,
        entry.x_ray_tube,
        entry.current,
        entry.filtration or matched,
        angle,
        entry.output,
        layer,
        _leakage(name, entry, findings),
    )


def _sealed(name: str, entry: written.SealedSource, findings: Findings) -> parts.SealedSource | None:
    path = ("sources", name)
    if entry.assessed_on and not entry.on:
        message = "a date to decay to is given, but not the date the activity holds for"
        findings.wrong((*path, "assessed on"), message, "add 'on: 2026-03-01'")
        return None
    if (
        entry.on
        and entry.assessed_on
        and date.fromisoformat(entry.assessed_on) < date.fromisoformat(entry.on)
    ):
        message = f"'{entry.assessed_on}' is before the date of the activity, {entry.on}"
        findings.wrong(
            (*path, "assessed on"), message, "a source is not assessed before its activity was stated"
        )
        return None
    if not entry.assessed_on:
        findings.assume("decay", "Activity taken as stated, without decay", name)
    if entry.survey_on and (
        not entry.on or date.fromisoformat(entry.survey_on) < date.fromisoformat(entry.on)
    ):
        message = "a survey needs the date the activity holds for, and comes after it"
        findings.wrong((*path, "survey on"), message, "add 'on: 2026-03-01', or correct the dates")
        return None
    if entry.rate_constant and entry.certificate:
        message = "both a rate constant and a certified output are given"
        findings.wrong((*path, "certificate"), message, "keep the one to be used", on_key=True)
        return None
    leakage = _leakage(name, entry, findings)
    return parts.SealedSource(
        name,
        entry.sealed_source,
        entry.activity,
        entry.on,
        entry.assessed_on,
        leakage,
        entry.exchanged_every.value / DAY if entry.exchanged_every else None,
        entry.survey_on,
        entry.rate_constant,
        entry.certificate,
        container_of(name, entry, findings),
        travel_of(name, entry, findings),
        parts.Stuck(entry.stuck.at, entry.stuck.for_) if entry.stuck else None,
    )


def _leakage(
    name: str, entry: written.XrayTube | written.SealedSource, findings: Findings
) -> parts.Leakage | None:
    if "leakage" not in entry.model_fields_set:
        findings.assume("leakage", "No leakage given, so none is counted", name)
    stated = entry.leakage
    if stated is None:
        if entry.housing:
            message = "a housing is given, but no leakage that it hardens"
            findings.wrong(
                ("sources", name, "housing"), message, "add 'leakage: 5 mGy/h at 1 m', or take it out"
            )
        return None
    if entry.housing is None:
        findings.assume("housing", f"Leakage taken as hardened by {HOUSING}", name)
    if stated.voltage is not None and isinstance(entry, written.SealedSource):
        message = "a sealed source has no leakage technique factors"
        findings.wrong(("sources", name, "leakage"), message, "write '2 mGy/h at 1 m'")
        return None
    if stated.voltage is not None and isinstance(entry, written.XrayTube):
        if stated.voltage.value < entry.x_ray_tube.value:
            message = (
                f"the leakage is stated at {stated.voltage.text}, below the tube's {entry.x_ray_tube.text}"
            )
            findings.wrong(
                ("sources", name, "leakage"), message, "technique factors are the highest it may be run at"
            )
            return None
        tube_voltage_problem(findings, ("sources", name, "leakage"), stated.voltage)
    return replace(stated, housing=entry.housing or HOUSING)


def tube_voltage_problem(findings: Findings, path: tuple[str, ...], voltage: Quantity) -> None:
    """Notes a voltage outside the tube model."""
    low, high = TUBE_KV
    if not low <= voltage.value <= high:
        hint = f"tube spectra are modelled from {low:g} to {high:g} kV"
        findings.wrong(path, f"'{voltage.text}' lies outside the model", hint)
