"""The scenario as a whole."""

from __future__ import annotations

from dataclasses import dataclass, field

from scatterbay.scenario.parts.fabric import Body, MaterialDefinition, Room
from scatterbay.scenario.parts.sources import Source
from scatterbay.scenario.parts.use import Beam, Override, People, Place, Workload


@dataclass(frozen=True)
class Assumption:
    """Something filled in for the user: a topic that explains it, and the sentence that is printed."""

    topic: str
    text: str


@dataclass(frozen=True)
class Options:
    """Choices about the calculation that a scenario may make."""

    primary_by_plane: bool = False
    seed: int = 1
    breadth: float = 0.1
    """A ray is taken at its worst within this distance of where it meets a barrier or a beam's edge [m]."""


@dataclass(frozen=True)
class Scenario:
    """A checked scenario. ``text`` is the file as read, ``sha256`` its digest."""

    path: str
    text: str
    sha256: str
    title: str
    drawing: str
    room: Room
    bodies: tuple[Body, ...]
    sources: tuple[Source, ...]
    beams: tuple[Beam, ...]
    workloads: tuple[Workload, ...]
    people: tuple[People, ...]
    places: tuple[Place, ...]
    never_together: tuple[tuple[str, ...], ...] = ()
    materials: tuple[MaterialDefinition, ...] = ()
    options: Options = Options()
    assumptions: tuple[Assumption, ...] = field(default=())
    purpose: str = ""
    notes: tuple[str, ...] = ()
    document: tuple[tuple[str, str], ...] = ()
    """Revision, author and so on of the worksheet, by label, as the author states them."""
    overrides: tuple[Override, ...] = ()
    stated: tuple[tuple[str, str], ...] = ()
    """Interlocks, signals and so on, by subject, as the author states them; nothing is computed from them."""
