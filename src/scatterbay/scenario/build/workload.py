"""How long each beam is on: hours that fit in an hour, a day and a week."""

from __future__ import annotations

from collections.abc import Collection, Mapping
from typing import NamedTuple

from scatterbay.scenario import parts
from scatterbay.scenario.build.findings import Findings, names_in, usable
from scatterbay.scenario.model import use as written
from scatterbay.scenario.model.document import Document
from scatterbay.units import WEEK_SECONDS, Quantity, format_quantity, nearest

MINUTE = 60.0
"""[s] A patient's charge is spread over one: rates are averages over a minute at most."""
HOUR = 3600.0
EIGHT_HOURS = 8.0 * HOUR
WEEKS = 52.0
_SLACK = 1.0 + 1e-9
_WAYS = ("beam on", "cycles", "kerma-area product", "patients")


class Terms(NamedTuple):
    """The terms a workload is stated in: the key of its weekly figure, what the worst hour and day are counted in,
    and seconds of beam for one of them; None where only the engine can tell.
    """

    key: str
    kinds: tuple[str, ...]
    seconds: float | None


def build_workloads(
    document: Document,
    beams: Mapping[str, parts.Beam],
    sources: Mapping[str, parts.Source],
    findings: Findings,
) -> tuple[parts.Workload, ...]:
    """The workload of every beam that has one of its own (techniques give theirs elsewhere)."""
    listed = {entry.beam for entry in usable(document.techniques).values()}
    _check_pairs(document, listed, findings)
    found = []
    for name, entry in usable(document.workload).items():
        beam = beams.get(name)
        source = sources.get(beam.source) if beam else None
        made = _workload(name, entry, beam, source, findings)
        found += [made] if made else []
    return tuple(found)


def _check_pairs(document: Document, listed: Collection[str], findings: Findings) -> None:
    """Every beam has a workload or techniques, and every workload a beam."""
    beams, workloads = names_in(document.beams), names_in(document.workload)
    if beams is None or workloads is None or names_in(document.techniques) is None:
        return
    strangers = [name for name in workloads if name not in beams]
    for name in beams:
        if name in listed and name in workloads:
            message = f"'{name}' has techniques, which are its workload"
            findings.wrong(("workload", name), message, "keep one of the two", on_key=True)
        if name not in workloads and name not in listed and not nearest(name, strangers):
            hint = f"add '{name}: {{beam on: 6 h/week, worst hour: 25 min}}' under workload, or techniques"
            findings.wrong(("beams", name), f"beam '{name}' has no workload", hint, on_key=True)
    for name in strangers:
        findings.unknown(("workload", name), "beam", name, beams, on_key=True)


def _workload(
    name: str,
    entry: written.Workload,
    beam: parts.Beam | None,
    source: parts.Source | None,
    findings: Findings,
) -> parts.Workload | None:
    path = ("workload", name)
    terms = _terms(path, entry, beam, source, findings)
    weekly = _weekly(entry)
    if terms is None or weekly is None:
        return None
    per = 1.0 if terms.seconds is None else terms.seconds
    if terms.key == "beam on" and weekly.kind == "time per week":
        per = 1.0
    week = per * weekly.value
    hour, day = (_in_terms((*path, key), given, terms, findings) for key, given in _worst(entry))
    if hour is _WRONG or day is _WRONG:
        return None
    weeks = WEEKS if entry.weeks is None else entry.weeks
    if entry.weeks is None:
        findings.assume("weeks", f"In use {WEEKS:g} weeks a year", name)
    if terms.seconds is None:
        return _by_area_product(name, entry, (week, hour, day), weeks, findings)
    hour, day = filled(name, (week, hour, day), findings)
    if not possible(path, _keys(entry, terms.key), (hour, day, week), findings):
        return None
    cycles = (week / per, hour / per, day / per) if terms.key == "cycles" else None
    return parts.Workload(name, week, hour, day, weeks, cycles)


_WRONG = -1.0


def _worst(entry: written.Workload) -> tuple[tuple[str, Quantity | None], tuple[str, Quantity | None]]:
    return ("worst hour", entry.worst_hour), ("worst day", entry.worst_day)


def _weekly(entry: written.Workload) -> Quantity | None:
    return entry.beam_on or entry.cycles or entry.kerma_area_product or entry.patients


def _terms(
    path: tuple[str, ...],
    entry: written.Workload,
    beam: parts.Beam | None,
    source: parts.Source | None,
    findings: Findings,
) -> Terms | None:
    """The one way in which this workload is stated; None where it is stated wrongly, or cannot be told."""
    given = dict(
        zip(_WAYS, (entry.beam_on, entry.cycles, entry.kerma_area_product, entry.patients), strict=True)
    )
    ways = [key for key, value in given.items() if value is not None]
    if len(ways) != 1:
        said = f"{' and '.join(ways)} are given" if ways else "nothing says how much the beam is used"
        findings.wrong(path, said, f"give one of {', '.join(_WAYS)}", on_key=True)
        return None
    (way,) = ways
    stray = [
        key
        for key, value, belongs in (
            ("exposure", entry.exposure, "cycles"),
            ("per patient", entry.per_patient, "patients"),
            ("voltages", entry.voltages, "patients"),
        )
        if value is not None and belongs != way
    ]
    for key in stray:
        owner = "cycles" if key == "exposure" else "patients"
        findings.wrong((*path, key), f"'{key}' goes with {owner}", "take it out", on_key=True)
    if stray or source is None or beam is None:
        return None
    tube = isinstance(source, parts.XrayTube)
    if tube and way == "cycles":
        findings.wrong((*path, way), "cycles are of sealed sources", "give 'beam on' for a tube", on_key=True)
        return None
    if not tube and way in ("kerma-area product", "patients"):
        findings.wrong((*path, way), f"'{way}' is of X-ray tubes", "give 'beam on' or 'cycles'", on_key=True)
        return None
    return _checked(path, entry, way, beam, source, findings)


def _checked(
    path: tuple[str, ...],
    entry: written.Workload,
    way: str,
    beam: parts.Beam,
    source: parts.Source,
    findings: Findings,
) -> Terms | None:
    """The terms of one way, where what goes with it is there."""
    if way == "cycles":
        if entry.exposure is None:
            hint = "add 'exposure: 5 min', how long the source is out in each cycle"
            findings.wrong(path, "'exposure' is missing", hint, on_key=True)
            return None
        return Terms(way, ("cycles",), entry.exposure.value)
    if isinstance(source, parts.SealedSource) and source.travel is not None:
        hint = "write 'cycles: 40/week, exposure: 5 min', as each cycle is two passes of the source"
        findings.wrong((*path, way), "the source travels, so its cycles must be known", hint, on_key=True)
        return None
    if way == "kerma-area product":
        if beam.field.kind == "everywhere":
            findings.wrong(
                (*path, way), "a field all round has no kerma-area product", "give 'beam on'", on_key=True
            )
            return None
        return Terms(way, ("kerma-area product",), None)
    current = source.current.value if isinstance(source, parts.XrayTube) else 0.0
    if way == "patients":
        if entry.per_patient is None:
            findings.wrong(path, "'per patient' is missing", "add 'per patient: 1.9 mA min'", on_key=True)
            return None
        return Terms(way, ("patients",), MINUTE)
    if entry.beam_on is not None and entry.beam_on.kind == "charge per week" and not current:
        message = f"'{entry.beam_on.text}' cannot be turned into a time: the source has no tube current"
        findings.wrong((*path, way), message, "give the time the beam is on")
        return None
    return Terms(way, ("time", "charge"), 1.0 / current if current else 1.0)


def _in_terms(
    path: tuple[str, ...], given: Quantity | None, terms: Terms, findings: Findings
) -> float | None:
    """Seconds (or kerma-area product) in the worst hour or day; None where not given, ``_WRONG`` where refused."""
    if given is None:
        return None
    if given.kind not in terms.kinds:
        said = {"time": "a time, as '25 min'", "charge": "a charge, as '40 mA min'"}
        wanted = " or ".join(said.get(kind, f"in {kind}") for kind in terms.kinds)
        if terms.kinds == ("kerma-area product",):
            wanted = "a kerma-area product, as '20 Gy cm2'"
        findings.wrong(path, f"'{given.text}' is not stated like '{terms.key}'", f"give {wanted}")
        return _WRONG
    if given.kind == "charge" and terms.seconds == 1.0:
        message = f"'{given.text}' cannot be turned into a time: the source has no tube current"
        findings.wrong(path, message, "give the time the beam is on")
        return _WRONG
    per = 1.0 if given.kind == "time" or terms.seconds is None else terms.seconds
    return per * given.value


def _by_area_product(
    name: str,
    entry: written.Workload,
    amounts: tuple[float, float | None, float | None],
    weeks: float,
    findings: Findings,
) -> parts.Workload | None:
    """A workload whose times only the engine can tell."""
    week, hour, day = amounts
    missing = [key for key, value in (("worst hour", hour), ("worst day", day)) if value is None]
    path = ("workload", name)
    if hour is None or day is None:
        hint = "give it in Gy cm2, as 'worst hour: 20 Gy cm2'"
        findings.wrong(path, f"'{missing[0]}' is missing", hint, on_key=True)
        return None
    if not hour <= day * _SLACK <= week * _SLACK * _SLACK:
        message = "the worst hour, the worst day and the week do not fit into one another"
        findings.wrong((*path, "worst day"), message, "hour at most day, day at most week")
        return None
    return parts.Workload(name, 0.0, 0.0, 0.0, weeks, area_product=(week, hour, day))


def filled(
    name: str, times: tuple[float, float | None, float | None], findings: Findings
) -> tuple[float, float]:
    """Times in the worst hour and the worst 8 h, assumed aloud where they are not stated."""
    week, hour, day = times
    if hour is None:
        hour = min(HOUR, week if day is None else min(week, day))
        shown = format_quantity(hour, "time", digits=3)
        findings.assume("worst hour", f"Beam on for {shown} of the worst hour", name)
    if day is None:
        day = min(EIGHT_HOURS, 8.0 * hour, week)
        shown = format_quantity(day, "time", digits=3)
        findings.assume("worst day", f"Beam on for {shown} of the worst 8 h", name)
    return hour, day


def _keys(entry: written.Workload, weekly: str) -> tuple[str, str, str]:
    """Keys to blame for the hour, the day and the week."""
    hour = "worst hour" if entry.worst_hour else weekly
    return hour, "worst day" if entry.worst_day else hour, weekly


def possible(
    path: tuple[str, ...], keys: tuple[str, str, str], times: tuple[float, float, float], findings: Findings
) -> bool:
    """Whether worst hour, worst 8 h and week fit into one another and into the clock."""
    hour, day, week = times
    hour_key, day_key, week_key = keys
    checks = (
        (hour <= HOUR * _SLACK, hour_key, hour, "of beam in an hour", "at most 1 h"),
        (day <= EIGHT_HOURS * _SLACK, day_key, day, "of beam in 8 h", "the worst day is a day of 8 h"),
        (week <= WEEK_SECONDS * _SLACK, week_key, week, "of beam in a week", "a week has 168 h"),
        (hour <= day * _SLACK, day_key, day, "in the worst 8 h is less than in the worst hour", "raise one"),
        (day <= week * _SLACK, week_key, week, "a week is less than in the worst 8 h or hour", "raise one"),
    )
    for fits, key, time, said, hint in checks:
        if not fits:
            findings.wrong((*path, key), f"{format_quantity(time, 'time', digits=3)} {said}", hint)
            return False
    return True
