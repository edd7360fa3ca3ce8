"""How long each beam is on: hours that fit in an hour, a day and a week."""

from __future__ import annotations

from collections.abc import Mapping

from scatterbay.scenario import parts
from scatterbay.scenario.build.findings import Findings, names_in, usable
from scatterbay.scenario.model import use as written
from scatterbay.scenario.model.document import Document
from scatterbay.units import WEEK_SECONDS, Quantity, format_quantity, nearest

HOUR = 3600.0
EIGHT_HOURS = 8.0 * HOUR
WEEKS = 52.0
_SLACK = 1.0 + 1e-9


def build_workloads(
    document: Document, beams: Mapping[str, parts.Beam], currents: Mapping[str, float], findings: Findings
) -> tuple[parts.Workload, ...]:
    """The workload of every beam. ``currents`` [A] by source that could be read; 0 for one without a current."""
    _check_pairs(document, findings)
    found = []
    for name, entry in usable(document.workload).items():
        source = beams[name].source if name in beams else None
        made = _workload(name, entry, currents.get(source) if source else None, findings)
        found += [made] if made else []
    return tuple(found)


def _check_pairs(document: Document, findings: Findings) -> None:
    """Every beam has a workload and every workload a beam."""
    beams, workloads = names_in(document.beams), names_in(document.workload)
    if beams is None or workloads is None:
        return
    strangers = [name for name in workloads if name not in beams]
    for name in beams:
        if name not in workloads and not nearest(name, strangers):
            hint = f"add '{name}: {{beam on: 6 h/week, worst hour: 25 min}}' under workload"
            findings.wrong(("beams", name), f"beam '{name}' has no workload", hint, on_key=True)
    for name in strangers:
        findings.unknown(("workload", name), "beam", name, beams, on_key=True)


def _workload(
    name: str, entry: written.Workload, current: float | None, findings: Findings
) -> parts.Workload | None:
    path = ("workload", name)
    week = _seconds((*path, "beam on"), entry.beam_on, current, findings)
    hour = _seconds((*path, "worst hour"), entry.worst_hour, current, findings)
    day = _seconds((*path, "worst day"), entry.worst_day, current, findings)
    if week is None or (entry.worst_hour and hour is None) or (entry.worst_day and day is None):
        return None
    if hour is None:
        hour = min(HOUR, week if day is None else min(week, day))
        shown = format_quantity(hour, "time", digits=3)
        findings.assume("worst hour", f"Beam on for {shown} of the worst hour", name)
    if day is None:
        day = min(EIGHT_HOURS, 8.0 * hour, week)
        shown = format_quantity(day, "time", digits=3)
        findings.assume("worst day", f"Beam on for {shown} of the worst 8 h", name)
    if entry.weeks is None:
        findings.assume("weeks", f"In use {WEEKS:g} weeks a year", name)
    if not _possible(path, entry, (hour, day, week), findings):
        return None
    return parts.Workload(name, week, hour, day, WEEKS if entry.weeks is None else entry.weeks)


def _seconds(
    path: tuple[str, ...], amount: Quantity | None, current: float | None, findings: Findings
) -> float | None:
    """Beam-on time [s] from a time, or from a charge and the tube's current; None where it cannot be told."""
    if amount is None:
        return None
    if not amount.kind.startswith("charge"):
        return amount.value
    if current == 0.0:
        message = f"'{amount.text}' cannot be turned into a time: the source has no tube current"
        findings.wrong(path, message, "give the time the beam is on")
        return None
    return amount.value / current if current else None


def _possible(
    path: tuple[str, ...], entry: written.Workload, times: tuple[float, float, float], findings: Findings
) -> bool:
    """Whether worst hour, worst 8 h and week fit into one another and into the clock."""
    hour, day, week = times
    hour_key = "worst hour" if entry.worst_hour else "beam on"
    day_key = "worst day" if entry.worst_day else hour_key
    checks = (
        (hour <= HOUR * _SLACK, hour_key, hour, "of beam in an hour", "at most 1 h"),
        (day <= EIGHT_HOURS * _SLACK, day_key, day, "of beam in 8 h", "the worst day is a day of 8 h"),
        (week <= WEEK_SECONDS * _SLACK, "beam on", week, "of beam in a week", "a week has 168 h"),
        (hour <= day * _SLACK, day_key, day, "in the worst 8 h is less than in the worst hour", "raise one"),
        (day <= week * _SLACK, "beam on", week, "a week is less than in the worst 8 h or hour", "raise one"),
    )
    for fits, key, time, said, hint in checks:
        if not fits:
            findings.wrong((*path, key), f"{format_quantity(time, 'time', digits=3)} {said}", hint)
            return False
    return True
