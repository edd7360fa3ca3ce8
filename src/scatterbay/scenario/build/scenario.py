"""The whole scenario, from the file as written."""

from __future__ import annotations

from collections.abc import Mapping

from scatterbay.scenario import parts
from scatterbay.scenario.build.beams import build_beams, check_not_buried
from scatterbay.scenario.build.bodies import build_bodies, check_bodies, solids_of
from scatterbay.scenario.build.findings import Findings, Section, names_in, usable, whole
from scatterbay.scenario.build.materials import build_materials
from scatterbay.scenario.build.people import build_people
from scatterbay.scenario.build.places import build_places, check_places
from scatterbay.scenario.build.room import build_room
from scatterbay.scenario.build.sources import build_sources
from scatterbay.scenario.build.states import check_states
from scatterbay.scenario.build.stock import check_stock, note_least
from scatterbay.scenario.build.techniques import expand
from scatterbay.scenario.build.workload import build_workloads
from scatterbay.scenario.model.document import NAMED, NAMED_IN_ROOM, Document
from scatterbay.scenario.purposes import not_validated

LONGEST_NAME = 60
MOST_BREADTH = 0.5
"""[m]"""
_NEEDED = ("sources", "beams", "people", "places")


def build(document: Document, path: str, text: str, sha256: str, findings: Findings) -> parts.Scenario | None:
    """The scenario; every problem met on the way is noted in ``findings``. None where the room is missing."""
    _check_names(document, findings)
    materials = build_materials(document, findings)
    written_room = whole(document.room)
    room = build_room(written_room, findings) if written_room else None
    bodies = build_bodies(document, findings)
    sources = build_sources(document, findings)
    people = build_people(document, findings)
    places = build_places(document, room, findings)
    beams = build_beams(document, room, _targets(document, bodies, places), findings)
    workloads = build_workloads(
        document, {beam.name: beam for beam in beams}, {source.name: source for source in sources}, findings
    )
    solids = solids_of(bodies)
    check_bodies(solids, room, findings)
    check_not_buried(beams, bodies, solids, findings)
    check_states(sources, beams, room, solids, findings)
    check_places(places, room, solids, beams, findings)
    expanded = expand(document, sources, beams, workloads, findings)
    together = _never_together(document, expanded.named, findings)
    options = _options(document, findings)
    check_stock(document, findings)
    overrides = _overrides(document, people, places, findings)
    spoken_of = not_validated(whole(document.title) or "")
    if spoken_of:
        findings.assume(
            "purpose", f"The title speaks of {spoken_of}: nothing here was validated for such rooms"
        )
    if room is not None:
        note_least(room, findings)
    if not bodies:
        findings.assume("bodies", "No bodies are given: nothing in the room scatters the beam")
    if room is None:
        return None
    return parts.Scenario(
        path,
        text,
        sha256,
        whole(document.title) or "",
        whole(document.drawing) or "",
        room,
        bodies,
        expanded.sources,
        expanded.beams,
        expanded.workloads,
        people,
        places,
        together,
        materials,
        options,
        findings.assumptions,
        whole(document.purpose) or "",
        whole(document.notes) or (),
        _paper(document),
        overrides,
        tuple(usable(document.stated or {}).items()),
    )


def _overrides(
    document: Document, people: tuple[parts.People, ...], places: tuple[parts.Place, ...], findings: Findings
) -> tuple[parts.Override, ...]:
    """A reviewer's own figures, one for each place, time base and quantity."""
    found: dict[tuple[str, str, str], parts.Override] = {}
    known = names_in(document.places)
    for name, entry in usable(document.overrides).items():
        path = ("overrides", name)
        if known is not None and entry.place not in known:
            findings.unknown((*path, "place"), "place", entry.place, known)
            continue
        key = entry.place, entry.figure.time_base, entry.figure.quantity
        if key in found:
            message = f"'{found[key].name}' overrides the same figure"
            findings.wrong((*path, "figure"), message, "keep one of the two")
            continue
        found[key] = parts.Override(name, entry.place, entry.figure, entry.by, entry.why)
        findings.assume(
            "overrides", f"{entry.figure.text} at {entry.place} is put there by {entry.by}: {entry.why}", name
        )
    return tuple(found.values())


def _paper(document: Document) -> tuple[tuple[str, str], ...]:
    """What the worksheet says about itself, in the order of the form."""
    paper = whole(document.document)
    if paper is None:
        return ()
    return tuple(
        (name, value) for name in type(paper).model_fields if (value := getattr(paper, name)) is not None
    )


def _check_names(document: Document, findings: Findings) -> None:
    """Names are printed in tables and drawings: short, on one line, and no two things to aim at alike."""
    named: list[tuple[tuple[str, ...], Section[object]]]
    named = [((section,), getattr(document, section)) for section in NAMED]
    room = whole(document.room)
    named += [(("room", section), getattr(room, section)) for section in NAMED_IN_ROOM if room]
    for path, section in named:
        for name in names_in(section) or ():
            if len(name) > LONGEST_NAME or not name.isprintable() or name != name.strip():
                message = (
                    f"'{name[:20]}...' cannot be a name"
                    if len(name) > LONGEST_NAME
                    else f"{name!r} cannot be a name"
                )
                hint = f"a name is one line of up to {LONGEST_NAME} characters"
                findings.wrong((*path, name), message, hint, on_key=True)
        if path[0] in _NEEDED and names_in(section) == ():
            findings.wrong(path, f"there are no {path[0]}", "give one at least", on_key=True)
    for name in names_in(document.places) or ():
        if name in (names_in(document.bodies) or ()):
            message = f"'{name}' is a body as well"
            findings.wrong(("places", name), message, "beams are aimed by name: rename one", on_key=True)


def _targets(
    document: Document, bodies: tuple[parts.Body, ...], places: tuple[parts.Place, ...]
) -> Mapping[str, parts.Point | None]:
    """What a beam may be aimed at by name, and where it is; None where that could not be told."""
    named = [*(names_in(document.bodies) or ()), *(names_in(document.places) or ())]
    known = {body.name: body.centre for body in bodies} | {place.name: place.at for place in places}
    return {name: known.get(name) for name in named}


def _never_together(
    document: Document, named: Mapping[str, tuple[str, ...]], findings: Findings
) -> tuple[tuple[str, ...], ...]:
    """Groups of beams of which one is on at a time, every technique of a beam among them."""
    lists = whole(document.never_together) or ()
    beams = names_in(document.beams)
    for i, names in enumerate(lists):
        for j, name in enumerate(names):
            if beams is not None and name not in beams:
                findings.unknown(("never together", i, j), "beam", name, beams)
    return tuple(tuple(made for name in names for made in named.get(name, ())) for names in lists)


def _options(document: Document, findings: Findings) -> parts.Options:
    options = whole(document.options)
    if options is None or options.primary_by is None:
        findings.assume("primary", "Primary beams are judged on the patch they light")
    if options is None:
        return parts.Options()
    seed = parts.Options.seed if options.seed is None else options.seed
    breadth = parts.Options.breadth if options.breadth is None else options.breadth.value
    if options.breadth is not None and breadth > MOST_BREADTH:
        message = f"'{options.breadth.text}' is more than {MOST_BREADTH:g} m"
        findings.wrong(("options", "breadth"), message, "a hand's breadth is 100 mm")
    if breadth < parts.Options.breadth:
        text = f"Rays are taken at their worst within {1e3 * breadth:.0f} mm only, less than a hand's breadth of 100 mm"
        findings.assume("hand's breadth", text)
    return parts.Options(options.primary_by == "plane", seed, breadth)
