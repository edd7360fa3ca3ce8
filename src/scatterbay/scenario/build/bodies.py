"""Bodies that scatter: of possible size, inside the room, apart from one another or wholly one in another."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from itertools import combinations
from typing import TYPE_CHECKING

from scatterbay.scenario import parts
from scatterbay.scenario.build.findings import Findings, usable
from scatterbay.scenario.model import bodies as written
from scatterbay.scenario.model.document import Document

if TYPE_CHECKING:
    from scatterbay.geometry.solids import Solid

_CLOSE = 1e-6
UPRIGHT = (0.0, 0.0, 1.0)

Written = written.Box | written.Cylinder | written.Sphere | written.Pipe | written.Plate


def build_bodies(document: Document, findings: Findings) -> tuple[parts.Body, ...]:
    """Every body of possible size."""
    entries: dict[str, Written] = usable(document.bodies)
    made = [_body(name, entry, findings) for name, entry in entries.items()]
    return tuple(body for body in made if body)


def _body(name: str, entry: Written, findings: Findings) -> parts.Body | None:
    if isinstance(entry, written.Box):
        turned = entry.turned.value if entry.turned else 0.0
        return parts.Body(name, "box", entry.material, entry.centre, entry.size, turned=turned)
    if isinstance(entry, written.Sphere):
        return parts.Body(name, "sphere", entry.material, entry.centre, (entry.diameter.value,))
    if isinstance(entry, written.Plate):
        sizes = (entry.width.value, entry.height.value, entry.thickness.value)
        return parts.Body(name, "plate", entry.material, entry.centre, sizes, entry.facing)
    if entry.along is None:
        findings.assume("bodies", "Upright (no direction given)", name)
    axis = entry.along or UPRIGHT
    if isinstance(entry, written.Cylinder):
        across_and_long = (entry.diameter.value, entry.length.value)
        return parts.Body(name, "cylinder", entry.material, entry.centre, across_and_long, axis)
    if 2.0 * entry.wall.value >= entry.outer_diameter.value:
        message = f"a wall of {entry.wall.text} leaves no bore in a pipe of {entry.outer_diameter.text}"
        findings.wrong(("bodies", name, "wall"), message, "make it a cylinder, or thin the wall")
        return None
    sizes = (entry.outer_diameter.value, entry.wall.value, entry.length.value)
    return parts.Body(name, "pipe", entry.material, entry.centre, sizes, axis, inside=entry.filled_with)


def solids_of(bodies: Sequence[parts.Body]) -> dict[str, list[Solid]]:
    """The solids of each body, outermost first."""
    from scatterbay.geometry.bodies import solids

    return {b.name: solids(b.shape, b.centre, b.sizes, b.axis, b.turned) for b in bodies}


def check_bodies(solids: Mapping[str, list[Solid]], room: parts.Room | None, findings: Findings) -> None:
    """Refuses bodies that overlap in part, and bodies that reach out of the room."""
    from scatterbay.geometry.solids import relation

    for (one, theirs), (other, ours) in combinations(solids.items(), 2):
        if any(relation(a, b) == "overlap" for a in theirs for b in ours):
            message = f"'{other}' overlaps '{one}' in part"
            hint = "bodies lie apart, touch, or one lies wholly inside the other"
            findings.wrong(("bodies", other), message, hint, on_key=True)
    for name, outer in solids.items():
        if room is not None and not _inside(outer[0], room):
            message = f"'{name}' reaches out of the room"
            hint = "walls, floor (z = 0) and ceiling enclose every body; check centre, sizes and direction"
            findings.wrong(("bodies", name), message, hint, on_key=True)


def _inside(solid: Solid, room: parts.Room) -> bool:
    """Whether a solid lies between the inner faces, which it may touch."""
    import numpy as np

    from scatterbay.geometry.outline import contains, distance_to_edges

    surface = solid.surface()
    plan, heights = surface[:, :2], surface[:, 2]
    if heights.min() < -_CLOSE or heights.max() > room.height + _CLOSE:
        return False
    if not (contains(room.corners, plan) | (distance_to_edges(room.corners, plan) < _CLOSE)).all():
        return False
    levels = np.linspace(heights.min(), heights.max(), 41)
    edges = np.array([(x, y, z) for x, y in room.corners for z in levels])
    return not (solid.inner_distance(edges) > _CLOSE).any()
