"""Where a sealed source is stored, and its way to where it is exposed."""

from __future__ import annotations

import math
from collections.abc import Mapping, Sequence
from dataclasses import replace
from typing import TYPE_CHECKING

from scatterbay.scenario import parts
from scatterbay.scenario.build.fabric import fabric_at
from scatterbay.scenario.build.findings import Findings
from scatterbay.scenario.model import sources as written
from scatterbay.scenario.rules import container_class
from scatterbay.units import WEEK_SECONDS, TextError, format_quantity

if TYPE_CHECKING:
    from scatterbay.geometry.solids import Solid

HOUSING = "lead"
UNDER_THE_SURFACE = 0.2
"""How far under a container's surface its source may lie, for limits that count from the surface [m]."""
REACH = 0.5
"""How far the ends of a way may lie from the container and from where the source is exposed [m]."""


def container_of(name: str, entry: written.SealedSource, findings: Findings) -> parts.Container | None:
    """The container of a source, by its certified leakage or by the limit of its class."""
    box, path = entry.container, ("sources", name, "container")
    if box is None:
        return None
    if (box.leakage is None) == (box.class_ is None):
        said = (
            "both a leakage and a class are given"
            if box.leakage
            else "nothing says how much the container leaks"
        )
        findings.wrong(
            path, said, "give 'leakage: 20 uSv/h at 1 m' from its certificate, or 'class: M'", on_key=True
        )
        return None
    if box.leakage is not None:
        rate, how = box.leakage, "as certified"
    else:
        try:
            limits = container_class(box.class_ or "")
        except TextError as problem:
            findings.wrong((*path, "class"), problem.message, problem.hint)
            return None
        grown = (1.0 + UNDER_THE_SURFACE) ** 2
        rate, how = replace(limits.at_1_m, value=grown * limits.at_1_m.value), limits.name
        text = (
            f"The container leaks the limit of its {limits.name}, {limits.at_1_m.text} at 1 m from its surface "
            f"({limits.source}); the source is taken to lie {UNDER_THE_SURFACE:g} m under the surface"
        )
        findings.assume("container", text, name)
    if box.housing is None:
        findings.assume("container", f"Leakage of the container taken as hardened by {HOUSING}", name)
    kept = WEEK_SECONDS if box.kept is None else box.kept.value
    if box.kept is None:
        findings.assume("container", "Stored there all week, 168 h", name)
    if kept > WEEK_SECONDS * (1.0 + 1e-9):
        findings.wrong((*path, "kept"), f"{format_quantity(kept, 'time')} a week", "a week has 168 h")
        return None
    return parts.Container(box.at, rate, box.housing or HOUSING, kept, how)


def travel_of(name: str, entry: written.SealedSource, findings: Findings) -> parts.Travel | None:
    """The way of a source, which starts at its container."""
    way, path = entry.travel, ("sources", name, "travel")
    if way is None:
        return None
    if entry.container is None:
        findings.wrong(path, "a way starts at a container, and there is none", "add 'container'", on_key=True)
        return None
    if math.dist(way.path[0], entry.container.at) > REACH:
        message = f"the way starts more than {REACH:g} m from the container"
        findings.wrong((*path, "path"), message, f"start it at {list(entry.container.at)}")
        return None
    return parts.Travel(way.path, way.speed)


def check_states(
    sources: Sequence[parts.Source],
    beams: Sequence[parts.Beam],
    room: parts.Room | None,
    solids: Mapping[str, list[Solid]],
    findings: Findings,
) -> None:
    """Ways end where the source is exposed; nothing is stored or stuck inside a wall or a body."""
    for source in sources:
        if not isinstance(source, parts.SealedSource):
            continue
        path = ("sources", source.name)
        if source.container is not None:
            _check_free((*path, "container", "at"), source.container.at, room, solids, findings)
        if source.stuck is not None:
            _check_free((*path, "stuck", "at"), source.stuck.at, room, {}, findings)
        if source.travel is None:
            continue
        for beam in beams:
            if beam.source == source.name and math.dist(beam.at, source.travel.path[-1]) > REACH:
                message = f"the way ends more than {REACH:g} m from where '{beam.name}' exposes the source"
                hint = f"end it at {list(beam.at)}; a source with two heads is two sources, never together"
                findings.wrong((*path, "travel", "path"), message, hint)


def _check_free(
    path: tuple[str, ...],
    point: parts.Point,
    room: parts.Room | None,
    solids: Mapping[str, list[Solid]],
    findings: Findings,
) -> None:
    import numpy as np

    inside = fabric_at(point, room) if room is not None else None
    if inside:
        findings.wrong(path, f"{list(point)} lies inside {inside}", "move it")
    for name, found in solids.items():
        if found and found[0].inner_distance(np.array([point]))[0] > 1e-9:
            findings.wrong(path, f"{list(point)} lies inside '{name}'", "move it")
