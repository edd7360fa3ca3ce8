"""Which form a place in the file follows, so that errors can say what is allowed there."""

from __future__ import annotations

from collections.abc import Mapping

from scatterbay.scenario.model import bodies, room, sources, use
from scatterbay.scenario.model.base import Form
from scatterbay.scenario.model.document import Document, Material, Paper
from scatterbay.scenario.yaml_tree import Data, Path

_SECTIONS: dict[str, type[Form]] = {
    "materials": Material,
    "beams": use.Beam,
    "workload": use.Workload,
    "techniques": use.Technique,
    "people": use.People,
    "places": use.Place,
    "overrides": use.Override,
}
_WHOLE: dict[str, type[Form]] = {"room": room.Room, "options": use.Options, "document": Paper}
_SHAPES: dict[str, type[Form]] = {
    "box": bodies.Box,
    "cylinder": bodies.Cylinder,
    "sphere": bodies.Sphere,
    "pipe": bodies.Pipe,
    "plate": bodies.Plate,
}


def form_at(path: Path, value: Data) -> type[Form] | None:
    """The form that the mapping ``value`` at ``path`` follows; None where there is none."""
    if not path:
        return Document
    section = str(path[0])
    if len(path) == 1:
        return _WHOLE.get(section)
    found = value if isinstance(value, Mapping) else {}
    if section == "bodies":
        return _SHAPES.get(str(found.get("shape")))
    if section == "sources":
        return sources.XrayTube if "x-ray tube" in found else sources.SealedSource
    if path[:2] == ("room", "screens"):
        return room.Screen
    if path[:2] == ("room", "panels"):
        return room.FlatPanel if found.get("on") in room.FLAT else room.SidePanel
    if path[:2] == ("room", "openings"):
        return room.FlatOpening if found.get("in") in room.FLAT else room.SideOpening
    return _SECTIONS.get(section)


def keys_of(form: type[Form]) -> dict[str, str]:
    """The keys of a form, each with its help text."""
    return {str(info.alias): info.description or "" for info in form.model_fields.values()}
