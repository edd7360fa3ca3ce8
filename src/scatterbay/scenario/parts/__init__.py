"""What a checked scenario is made of: plain frozen records in base units.

Lengths are in m, z is up, x east, y north; the floor's inner face is z = 0. Quantities keep their text and
their tolerance as the author wrote them, so that every output can show the input it rests on.
"""

from scatterbay.scenario.parts.fabric import (
    Body,
    Layer,
    LeadEquivalent,
    MakeUp,
    MaterialDefinition,
    Opening,
    Panel,
    Point,
    Room,
    Screen,
    Side,
)
from scatterbay.scenario.parts.sources import (
    Container,
    Leakage,
    SealedSource,
    Source,
    Stuck,
    Travel,
    XrayTube,
)
from scatterbay.scenario.parts.use import Beam, Collimator, Field, Goal, Override, People, Place, Workload
from scatterbay.scenario.parts.whole import Assumption, Options, Scenario

__all__ = [
    "Assumption",
    "Beam",
    "Body",
    "Collimator",
    "Container",
    "Field",
    "Goal",
    "Layer",
    "LeadEquivalent",
    "Leakage",
    "MakeUp",
    "MaterialDefinition",
    "Opening",
    "Options",
    "Override",
    "Panel",
    "People",
    "Place",
    "Point",
    "Room",
    "Scenario",
    "Screen",
    "SealedSource",
    "Side",
    "Source",
    "Stuck",
    "Travel",
    "Workload",
    "XrayTube",
]
