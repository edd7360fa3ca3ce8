"""Technique lists and patients: each becomes a beam with a setting of the tube and a workload of its own."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, replace

from scatterbay.scenario import parts
from scatterbay.scenario.build.findings import Findings, names_in, usable
from scatterbay.scenario.build.workload import MINUTE, WEEKS, filled, possible
from scatterbay.scenario.model import use as written
from scatterbay.scenario.model.document import Document
from scatterbay.units import Quantity, format_quantity

_Made = tuple[parts.Source, parts.Beam, parts.Workload]


@dataclass(frozen=True)
class Expanded:
    """Beams, sources and workloads with every technique written out; ``named``: beams by the beam as written."""

    sources: tuple[parts.Source, ...]
    beams: tuple[parts.Beam, ...]
    workloads: tuple[parts.Workload, ...]
    named: dict[str, tuple[str, ...]]


def expand(
    document: Document,
    sources: tuple[parts.Source, ...],
    beams: tuple[parts.Beam, ...],
    workloads: tuple[parts.Workload, ...],
    findings: Findings,
) -> Expanded:
    """Write out technique lists, and charge that is spread over several voltages."""
    by_name = {source.name: source for source in sources}
    lists = _lists(document, {beam.name: beam for beam in beams}, by_name, findings)
    patients = {name: entry for name, entry in usable(document.workload).items() if entry.per_patient}
    made_sources: dict[str, parts.Source] = {}
    made_beams, made_loads, named = [], [], {}
    loads = {load.beam: load for load in workloads}
    for beam in beams:
        source = by_name.get(beam.source)
        found: list[_Made] = []
        for name, entry in lists.get(beam.name, {}).items():
            one = (
                _technique(name, entry, beam, source, findings)
                if isinstance(source, parts.XrayTube)
                else None
            )
            found += [one] if one else []
        if not found and beam.name in loads:
            found = _plain(beam, source, loads[beam.name], patients.get(beam.name), findings)
        for setting, made, load in found:
            made_sources[setting.name] = setting
            made_beams.append(made)
            made_loads.append(load)
        named[beam.name] = tuple(made.name for _, made, _ in found)
    unused = [s for s in sources if s.name not in made_sources and all(b.source != s.name for b in beams)]
    kept = [*made_sources.values(), *unused]
    return Expanded(tuple(kept), tuple(made_beams), tuple(made_loads), named)


def _plain(
    beam: parts.Beam,
    source: parts.Source | None,
    load: parts.Workload,
    entry: written.Workload | None,
    findings: Findings,
) -> list[_Made]:
    """A beam without techniques; with patients, a setting whose charge is theirs."""
    if entry is not None and entry.per_patient is not None and isinstance(source, parts.XrayTube):
        setting = _patients(beam, source, entry.per_patient, entry.voltages or (), findings)
        return [(setting, replace(beam, source=setting.name), load)] if setting else []
    return [(source, beam, load)] if source else []


def _lists(
    document: Document,
    beams: Mapping[str, parts.Beam],
    sources: Mapping[str, parts.Source],
    findings: Findings,
) -> dict[str, dict[str, written.Technique]]:
    """Techniques by beam, where beam and source can take them."""
    found: dict[str, dict[str, written.Technique]] = {}
    known = names_in(document.beams)
    for name, entry in usable(document.techniques).items():
        path = ("techniques", name)
        if known is not None and entry.beam not in known:
            findings.unknown((*path, "beam"), "beam", entry.beam, known)
            continue
        source = sources.get(beams[entry.beam].source) if entry.beam in beams else None
        if isinstance(source, parts.SealedSource):
            findings.wrong(
                (*path, "beam"), f"'{source.name}' is a sealed source", "techniques are of X-ray tubes"
            )
            continue
        found.setdefault(entry.beam, {})[name] = entry
    return found


def _technique(
    name: str, entry: written.Technique, beam: parts.Beam, tube: parts.XrayTube, findings: Findings
) -> _Made | None:
    """A technique as a setting of the tube, a beam and a workload.

    The current is the charge of the exposures within a minute over 60 s, so that a rate is the average over a minute;
    times are counted in such minutes.
    """
    path = ("techniques", name)
    if not _may_run(path, entry.voltage, tube, findings):
        return None
    if entry.in_a_minute is None:
        findings.assume(
            "short exposures", "At most one exposure a minute; rates are averages over a minute", name
        )
    per_minute = entry.in_a_minute or 1
    weekly, hour, day = (
        entry.exposures.value,
        *(_count((*path, key), q, findings) for key, q in _worst(entry)),
    )
    if hour == _WRONG or day == _WRONG:
        return None
    seconds = MINUTE / per_minute
    times = (
        seconds * weekly,
        None if hour is None else seconds * hour,
        None if day is None else seconds * day,
    )
    worst = filled(name, times, findings)
    keys = (
        "worst hour" if entry.worst_hour else "exposures",
        "worst day" if entry.worst_day else "exposures",
        "exposures",
    )
    if not possible(path, keys, (*worst, times[0]), findings):
        return None
    if entry.weeks is None:
        findings.assume("weeks", f"In use {WEEKS:g} weeks a year", name)
    charge = entry.charge.value
    setting = _setting(tube, f"{tube.name}: {name}", entry.voltage, findings)
    setting = replace(
        setting,
        current=_over_a_minute(charge * per_minute),
        per_exposure=charge,
        output=entry.output or setting.output,
        output_at=None if entry.output else setting.output_at,
    )
    field = beam.field if entry.field is None else replace(entry.field, turned=beam.field.turned)
    made = replace(beam, name=f"{beam.name}: {name}", source=setting.name, field=field)
    weeks = WEEKS if entry.weeks is None else entry.weeks
    return setting, made, parts.Workload(made.name, times[0], *worst, weeks)


_WRONG = -1.0


def _worst(entry: written.Technique) -> tuple[tuple[str, Quantity | None], ...]:
    return ("worst hour", entry.worst_hour), ("worst day", entry.worst_day)


def _count(path: tuple[str, ...], given: Quantity | None, findings: Findings) -> float | None:
    """A number of exposures; None where none is given, ``_WRONG`` where it is something else."""
    if given is None:
        return None
    if given.kind != "exposures":
        findings.wrong(path, f"'{given.text}' is not a number of exposures", "write '20 exposures'")
        return _WRONG
    return given.value


def _patients(
    beam: parts.Beam,
    tube: parts.XrayTube,
    charge: Quantity,
    shares: tuple[tuple[Quantity, float], ...],
    findings: Findings,
) -> parts.XrayTube | None:
    """The tube with the charge of one patient a minute, spread over voltages where shares are given."""
    path = ("workload", beam.name, "voltages")
    if not all(_may_run(path, voltage, tube, findings) for voltage, _ in shares):
        return None
    highest = max((voltage for voltage, _ in shares), key=lambda v: v.value, default=tube.voltage)
    findings.assume(
        "short exposures", "At most one patient a minute; rates are averages over a minute", beam.name
    )
    setting = _setting(tube, f"{tube.name}: {beam.name}", highest, findings)
    return replace(setting, voltages=shares, current=_over_a_minute(charge.value))


def _over_a_minute(charge: float) -> Quantity:
    """The mean current of a charge [C] within a minute."""
    mean = charge / MINUTE
    return Quantity(mean, 0.0, "current", f"{format_quantity(mean, 'current')} averaged over a minute")


def _may_run(path: tuple[str, ...], voltage: Quantity, tube: parts.XrayTube, findings: Findings) -> bool:
    """The tube's own voltage is the highest it may be run at, and its leakage must hold at any."""
    if voltage.value > tube.voltage.value * (1.0 + 1e-9):
        message = f"'{voltage.text}' is more than the {tube.voltage.text} of '{tube.name}'"
        findings.wrong(path, message, "raise the voltage of the source, its highest, or correct this")
        return False
    if tube.leakage is not None and tube.leakage.voltage is None:
        message = f"the leakage of '{tube.name}' is stated without technique factors"
        hint = "write 'leakage: 1 mGy/h at 1 m at 150 kV, 3.3 mA' (voltage and continuous current it is stated for)"
        findings.wrong(("sources", tube.name, "leakage"), message, hint)
        return False
    return True


def _setting(tube: parts.XrayTube, name: str, voltage: Quantity, findings: Findings) -> parts.XrayTube:
    """The tube at another voltage; what was measured on it was measured at its own."""
    if tube.output is not None and voltage.value != tube.voltage.value:
        text = f"The output measured at {tube.voltage.text} scales the model at other voltages"
        findings.assume("output", text, tube.name)
    return replace(
        tube, name=name, voltage=voltage, set_name=tube.name, output_at=tube.voltage, layer_at=tube.voltage
    )
