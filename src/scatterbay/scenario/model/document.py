"""The whole file as it is written."""

from __future__ import annotations

from typing import Literal

from pydantic import Field

from scatterbay.scenario.model.base import Form, Maybe
from scatterbay.scenario.model.bodies import Body
from scatterbay.scenario.model.kinds import (
    Density,
    Formula,
    MakeUp,
    MassFractions,
    NameLists,
    Notes,
    Purpose,
    Text,
    Variant,
)
from scatterbay.scenario.model.room import Room
from scatterbay.scenario.model.sources import Source
from scatterbay.scenario.model.use import Beam, Options, Override, People, Place, Technique, Workload


class Material(Form):
    """A material the tables lack: mass fractions or a formula, and a density."""

    mass_fractions: MassFractions | None = Field(None, description="By element symbol; they add up to 1")
    formula: Formula | None = Field(None, description="Chemical formula, instead of mass fractions")
    density: Density = Field(description="Density")


class Paper(Form):
    """What a worksheet says about itself; every line is printed as it stands."""

    reference: Text | None = Field(None, description="Reference of the worksheet")
    revision: Text | None = Field(None, description="Its revision")
    date: Text | None = Field(None, description="Its date")
    author: Text | None = Field(None, description="Who drew it up")
    adviser: Text | None = Field(None, description="The qualified expert or adviser it goes to")
    site: Text | None = Field(None, description="Where the bay is")


class Document(Form):
    """A scenario: a room, what is in it, what radiates, and who stands where."""

    format: Maybe[Literal[1]] = Field(description="Version of the file format")
    title: Maybe[Text] = Field(description="What this is")
    drawing: Maybe[Text | None] = Field(None, description="The drawing it was taken from, with its revision")
    purpose: Maybe[Purpose | None] = Field(None, description="What the room is for")
    notes: Maybe[Notes | None] = Field(None, description="Remarks")
    document: Maybe[Paper | None] = Field(None, description="Who stands behind the worksheet")
    stated: Maybe[dict[str, Maybe[Text]] | None] = Field(
        None,
        description="What the author states about the bay, by subject, such as interlocks, signals, penetrations",
    )
    room: Maybe[Room] = Field(description="The room")
    materials: Maybe[dict[str, Maybe[Material]]] = Field({}, description="Materials of your own, by name")
    stock: Maybe[dict[str, Maybe[MakeUp]]] = Field(
        {},
        description="Sheets and boards of your own, by the name make-ups use: layers, counted at their least",
    )
    bodies: Maybe[dict[str, Maybe[Body]]] = Field({}, description="Things that scatter, by name")
    sources: Maybe[dict[str, Maybe[Source]]] = Field(description="What radiates, by name")
    beams: Maybe[dict[str, Maybe[Beam]]] = Field(description="Where sources stand and point, by name")
    workload: Maybe[dict[str, Maybe[Workload]]] = Field(
        {}, description="How long each beam is on, by its name"
    )
    techniques: Maybe[dict[str, Maybe[Technique]]] = Field(
        {}, description="Kinds of exposure with a beam, by name, instead of the beam's workload"
    )
    people: Maybe[dict[str, Maybe[People]]] = Field(description="Groups of people, by name")
    places: Maybe[dict[str, Maybe[Place]]] = Field(description="Where people may stand, by name")
    never_together: Maybe[NameLists | None] = Field(
        None, description="Lists of beams that are never on at the same time; all others run together"
    )
    overrides: Maybe[dict[str, Maybe[Override]]] = Field(
        {}, description="A reviewer's own figures instead of computed ones, by name, with who and why"
    )
    variants: Maybe[dict[str, Maybe[Variant]]] = Field(
        {},
        description="Other values to compare with, by name of the variant: where they stand, and what stands there",
    )
    options: Maybe[Options | None] = Field(None, description="Choices about the calculation")


NAMED = (
    "materials",
    "stock",
    "bodies",
    "sources",
    "beams",
    "workload",
    "techniques",
    "people",
    "places",
    "overrides",
    "variants",
)
"""Sections whose entries are named by the author."""

NAMED_IN_ROOM = ("sides", "openings", "screens", "panels")
