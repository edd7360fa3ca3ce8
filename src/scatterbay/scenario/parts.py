"""What a checked scenario is made of: plain frozen records in base units.

Lengths are in m, z is up, x east, y north; the floor's inner face is z = 0. Quantities keep their text and
their tolerance as the author wrote them, so that every output can show the input it rests on.
"""

from __future__ import annotations

from dataclasses import dataclass, field

from scatterbay.units import Quantity

Point = tuple[float, float, float]


@dataclass(frozen=True)
class Assumption:
    """Something filled in for the user: a topic that explains it, and the sentence that is printed."""

    topic: str
    text: str


@dataclass(frozen=True)
class Layer:
    """One layer of a make-up: a material's name and its thickness (a length, with tolerance)."""

    material: str
    thickness: Quantity


@dataclass(frozen=True)
class MakeUp:
    """Layers from the inside to the outside, with the text they came from; no layers means *open*."""

    layers: tuple[Layer, ...]
    text: str

    @property
    def is_open(self) -> bool:
        """True where nothing stands in the way (a doorway without a door, a missing roof)."""
        return not self.layers

    @property
    def thickness(self) -> float:
        """Total thickness [m]."""
        return sum(layer.thickness.value for layer in self.layers)


@dataclass(frozen=True)
class MaterialDefinition:
    """A material the scenario defines: mass fractions by element symbol, density [g/cm3]."""

    name: str
    mass_fractions: dict[str, float]
    density_g_cm3: float


@dataclass(frozen=True)
class Side:
    """One side of the outline, from corner to corner along the inner face [m], with its make-up."""

    name: str
    start: tuple[float, float]
    end: tuple[float, float]
    make_up: MakeUp


@dataclass(frozen=True)
class Opening:
    """A rectangle in a side, the ceiling or the floor with a make-up of its own.

    In a side: ``low`` and ``high`` are (distance from the side's first corner, height above the floor) [m].
    In the ceiling or floor: (x, y) [m].
    """

    name: str
    host: str
    low: tuple[float, float]
    high: tuple[float, float]
    make_up: MakeUp


@dataclass(frozen=True)
class Screen:
    """A free-standing upright barrier from plan point to plan point, between two heights [m].

    The make-up runs from the left of the walking direction (start to end) to its right.
    """

    name: str
    start: tuple[float, float]
    end: tuple[float, float]
    bottom: float
    top: float
    make_up: MakeUp


@dataclass(frozen=True)
class Room:
    """The outline (counter-clockwise, inner faces), the height inside, and what closes it."""

    corners: tuple[tuple[float, float], ...]
    height: float
    sides: tuple[Side, ...]
    ceiling: MakeUp
    floor: MakeUp
    floor_on_ground: bool
    storey_above: float | None
    """Height of the floor above over this floor [m]; None when not given."""
    storey_below: float | None
    """Depth of the floor below under this floor [m]; None when not given."""
    openings: tuple[Opening, ...] = ()
    screens: tuple[Screen, ...] = ()


@dataclass(frozen=True)
class Body:
    """A solid that scatters. ``shape`` is box, cylinder, sphere, pipe or plate; lengths in m.

    ``sizes``: box (x, y, z); cylinder (diameter, length); sphere (diameter,);
    pipe (outer diameter, wall, length); plate (width, height, thickness).
    ``axis``: unit vector along a cylinder or pipe, or the normal of a plate; ``turned``: rotation of a box
    about the vertical [rad].
    """

    name: str
    shape: str
    material: str
    centre: Point
    sizes: tuple[float, ...]
    axis: Point = (0.0, 0.0, 1.0)
    turned: float = 0.0
    inside: str | None = None
    """Material that fills a pipe; None leaves it empty."""


@dataclass(frozen=True)
class Leakage:
    """Leakage at 1 m (air kerma rate or ambient dose equivalent rate), and the housing that hardens it."""

    rate: Quantity
    housing: str


@dataclass(frozen=True)
class XrayTube:
    """An X-ray tube: constant potential, current, filtration; measured output, half-value layer if given."""

    name: str
    voltage: Quantity
    current: Quantity
    filtration: MakeUp
    anode_angle: Quantity
    output: Quantity | None = None
    half_value_layer: Layer | None = None
    leakage: Leakage | None = None


@dataclass(frozen=True)
class SealedSource:
    """A sealed source: nuclide, activity on a date, the date assessed; both dates ISO or None."""

    name: str
    nuclide: str
    activity: Quantity
    activity_date: str | None = None
    assessed_date: str | None = None
    leakage: Leakage | None = None


Source = XrayTube | SealedSource


@dataclass(frozen=True)
class Field:
    """The shape of a beam. ``kind``: rectangle, cone or everywhere.

    rectangle: full ``width`` (horizontal where the axis is not vertical) and ``height`` at ``distance`` [m],
    turned about the axis by ``turned`` [rad]. cone: ``half_angle`` [rad]. everywhere: 4 pi.
    """

    kind: str
    width: float = 0.0
    height: float = 0.0
    distance: float = 1.0
    half_angle: float = 0.0
    turned: float = 0.0
    text: str = ""


@dataclass(frozen=True)
class Beam:
    """Where a source stands and where it is pointed (``aim`` is a point [m])."""

    name: str
    source: str
    at: Point
    aim: Point
    field: Field
    use_factor: float
    object_in_beam: bool
    """True: bodies weaken the primary they stand in; False: bare beam (the protective default)."""


@dataclass(frozen=True)
class Workload:
    """How long a beam is on. Times in s per week, in the worst hour, in the worst 8 h; weeks per year."""

    beam: str
    seconds_per_week: float
    seconds_in_worst_hour: float
    seconds_in_worst_day: float
    weeks_per_year: float


@dataclass(frozen=True)
class Goal:
    """A design goal: a value of a quantity over a time base.

    ``quantity``: ``air kerma`` or ``ambient dose equivalent`` (H*(10)). ``time_base``: rate, hour, day, week
    or year. ``value`` in Gy or Sv for hour, week and year; in Gy/s or Sv/s for rate and day (8 h average).
    """

    time_base: str
    quantity: str
    value: float
    text: str


@dataclass(frozen=True)
class People:
    """A group of people: the area they are in (controlled, supervised, public) and their design goals."""

    name: str
    area: str
    goals: tuple[Goal, ...]


@dataclass(frozen=True)
class Place:
    """A point where someone may stand [m], who, how much of the time, and how the point was found."""

    name: str
    at: Point
    people: str
    occupancy: float
    how: str


@dataclass(frozen=True)
class Options:
    """Choices about the calculation that a scenario may make."""

    primary_by_plane: bool = False
    seed: int = 1


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
