"""Beams: a source at a point inside the room, pointed somewhere."""

from __future__ import annotations

import math
from collections.abc import Mapping, Sequence
from dataclasses import replace
from typing import TYPE_CHECKING

from scatterbay.scenario import parts
from scatterbay.scenario.build.findings import Findings, names_in, usable, whole
from scatterbay.scenario.model import use as written
from scatterbay.scenario.model.document import Document
from scatterbay.scenario.model.sources import SealedSource, XrayTube
from scatterbay.scenario.model.values import DIRECTIONS
from scatterbay.scenario.rules import receptor
from scatterbay.units import TextError

if TYPE_CHECKING:
    from scatterbay.geometry.solids import Solid

_SHORTEST_AIM = 1e-6


def build_beams(
    document: Document,
    room: parts.Room | None,
    targets: Mapping[str, parts.Point | None],
    findings: Findings,
) -> tuple[parts.Beam, ...]:
    """Every beam that can be.

    ``targets``: where the bodies and places are that a beam may be aimed at; None where that is not known.
    """
    sources = names_in(document.sources)
    all_named = names_in(document.bodies) is not None and names_in(document.places) is not None
    found = []
    for name, beam in usable(document.beams).items():
        path = ("beams", name)
        if sources is not None and beam.source not in sources:
            findings.unknown((*path, "source"), "source", beam.source, sources)
        if room is not None:
            _check_inside(path, beam.at, room, findings)
        aim = _aim(path, beam, targets, all_named, findings)
        behind = _behind(path, beam, findings)
        if aim is not None and _fits_source(path, beam, usable(document.sources), findings):
            found.append(_beam(name, beam, aim, behind, findings))
    _check_sources_used(document, sources, findings)
    return tuple(found)


def _fits_source(
    path: tuple[str, ...], beam: written.Beam, sources: Mapping[str, object], findings: Findings
) -> bool:
    """Collimators stand round sealed sources, presets behind the objects of X-ray tubes."""
    source = sources.get(beam.source)
    if beam.collimator is not None and isinstance(source, XrayTube):
        message = "a collimator stands round a sealed source; a tube's is its housing"
        findings.wrong((*path, "collimator"), message, "give the tube's leakage instead")
        return False
    if beam.collimator is not None and beam.field.kind == "everywhere":
        message = "a collimator with a field all round leaves nothing for it to stop"
        findings.wrong(
            (*path, "collimator"), message, "give the field of its port, or leave the collimator out"
        )
        return False
    if beam.behind is not None and isinstance(source, SealedSource):
        message = "presets behind the object are for X-ray tubes"
        findings.wrong((*path, "behind"), message, "add the layers to the barrier, or a body")
        return False
    return True


def _behind(path: tuple[str, ...], beam: written.Beam, findings: Findings) -> tuple[str, parts.MakeUp] | None:
    """The preset behind the object."""
    if beam.behind is None:
        return None
    try:
        preset = receptor(beam.behind)
    except TextError as problem:
        findings.wrong((*path, "behind"), problem.message, problem.hint)
        return None
    text = (
        f"The primary is weakened by {preset.make_up.text} for '{preset.name}' ({preset.source}): only right where it "
        "always stands in the whole beam"
    )
    findings.assume("behind the object", text, path[-1])
    return preset.name, preset.make_up


def _beam(
    name: str,
    beam: written.Beam,
    aim: parts.Point,
    behind: tuple[str, parts.MakeUp] | None,
    findings: Findings,
) -> parts.Beam:
    if beam.use_factor is None:
        findings.assume("use factor", "Use factor taken as 1", name)
    if beam.object is None:
        findings.assume("bare beam", "Bodies are left out of the primary beam (bare beam)", name)
    turned = beam.field_turned.value if beam.field_turned else 0.0
    use = 1.0 if beam.use_factor is None else beam.use_factor
    field = replace(beam.field, turned=turned)
    in_beam = beam.object == "in the beam"
    return parts.Beam(name, beam.source, beam.at, aim, field, use, in_beam, beam.collimator, behind)


def _aim(
    path: tuple[str, ...],
    beam: written.Beam,
    targets: Mapping[str, parts.Point | None],
    all_named: bool,
    findings: Findings,
) -> parts.Point | None:
    """The point aimed at. A field that goes all round needs none, and gets one straight up."""
    x, y, z = beam.at
    if beam.aim is None:
        if beam.field.kind == "everywhere":
            return x, y, z + 1.0
        hint = "a point [x, y, z], the name of a body or place, or a direction such as down"
        findings.wrong(path, "'aim' is missing", hint, on_key=True)
        return None
    if isinstance(beam.aim, str):
        if beam.aim not in targets and beam.aim not in DIRECTIONS:
            if all_named:
                findings.unknown(
                    (*path, "aim"), "body, place or direction", beam.aim, [*targets, *DIRECTIONS]
                )
            return None
        dx, dy, dz = DIRECTIONS.get(beam.aim, (0.0, 0.0, 0.0))
        aim = targets[beam.aim] if beam.aim in targets else (x + dx, y + dy, z + dz)
    else:
        aim = beam.aim
    if aim is not None and math.dist(aim, beam.at) < _SHORTEST_AIM:
        message = "the beam is aimed at the point it comes from"
        findings.wrong((*path, "aim"), message, "aim at another point, or write 'field: all round'")
        return None
    return aim


def _check_inside(path: tuple[str, ...], at: parts.Point, room: parts.Room, findings: Findings) -> None:
    from scatterbay.geometry.outline import contains

    if not contains(room.corners, [at[:2]])[0]:
        hint = f"the corners of the room are {[list(corner) for corner in room.corners]}"
        findings.wrong((*path, "at"), f"the source at {list(at)} stands outside the room", hint)
    elif not 0.0 < at[2] < room.height:
        hint = f"z is the height above the floor, between 0 and {room.height:g} m"
        findings.wrong((*path, "at"), f"the source at {list(at)} is not between floor and ceiling", hint)


def check_not_buried(
    beams: Sequence[parts.Beam],
    bodies: Sequence[parts.Body],
    solids: Mapping[str, list[Solid]],
    findings: Findings,
) -> None:
    """Refuses a source inside the material of a body; the bore of an empty pipe is no material."""
    import numpy as np

    for beam in beams:
        point = np.array([beam.at])
        holders = [
            (round(float(solid.inner_distance(point)[0]), 9), -i, body.name, (body.material, body.inside)[i])
            for body in bodies
            for i, solid in enumerate(solids[body.name])
            if solid.inner_distance(point)[0] > 1e-9
        ]
        *_, name, material = min(holders, key=lambda holder: holder[:2], default=(None, None))
        if material is not None:
            message = f"the source at {list(beam.at)} stands inside '{name}' ({material})"
            findings.wrong(("beams", beam.name, "at"), message, "move it, or give the body a bore")


def _check_sources_used(document: Document, sources: Sequence[str] | None, findings: Findings) -> None:
    beams = usable(document.beams)
    if sources is None or whole(document.beams) is None or len(beams) < len(names_in(document.beams) or ()):
        return
    used = {beam.source for beam in beams.values()}
    if used - set(sources):
        return
    for name in sources:
        if name not in used:
            findings.wrong(
                ("sources", name), f"no beam uses '{name}'", "add a beam, or take it out", on_key=True
            )
