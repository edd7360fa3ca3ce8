"""What a bay is built of and what stands in it."""

from __future__ import annotations

from dataclasses import dataclass

from scatterbay.units import Quantity

Point = tuple[float, float, float]


@dataclass(frozen=True)
class LeadEquivalent:
    """Lead that lets as much of an X-ray beam through: its thickness, and the tube voltage it is stated at."""

    lead: Quantity
    voltage: Quantity


@dataclass(frozen=True)
class Layer:
    """One layer of a make-up: a material's name and its thickness (a length, with tolerance).

    ``density``: of this layer where it is stated, with tolerance. ``equivalent``: where the layer is known by its
    lead equivalent; its thickness is then a first guess, which the engine replaces. ``bought_as``: the stock item
    it comes from. ``at_nominal``: told to count at its nominal thickness and density, not at the least.
    """

    material: str
    thickness: Quantity
    density: Quantity | None = None
    equivalent: LeadEquivalent | None = None
    bought_as: str = ""
    at_nominal: bool = False

    @property
    def counted_thickness(self) -> float:
        """The thickness that is counted [m]: the thin end of its tolerance, unless told otherwise."""
        return self.thickness.value - (0.0 if self.at_nominal else self.thickness.tolerance)

    @property
    def counted_density(self) -> float | None:
        """The stated density that is counted [kg/m3], the light end of its tolerance; None where none is stated."""
        if self.density is None:
            return None
        return self.density.value - (0.0 if self.at_nominal else self.density.tolerance)


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
    """A rectangle in a side, the ceiling, the floor, a screen or another opening, with a make-up of its own.

    ``host``: what it is in. ``face``: the side, ceiling, floor or screen that this is part of. In a side or screen,
    ``low`` and ``high`` are (distance from its first corner, height above the floor) [m]; in the ceiling or floor
    (x, y) [m]. Openings in openings come after their hosts.
    """

    name: str
    host: str
    low: tuple[float, float]
    high: tuple[float, float]
    make_up: MakeUp
    face: str = ""

    @property
    def on_face(self) -> str:
        """The face it lies in."""
        return self.face or self.host


@dataclass(frozen=True)
class Panel:
    """A rectangle of a side, ceiling, floor, screen or opening (``host``) that holds more or less than the rest.

    ``make_up``: what is there instead of the host's own; None where the host's own stays and ``inside`` or
    ``outside`` is added to it. ``face``, ``low``, ``high``: as for an opening. A panel covers its host, not the
    openings in it. Panels count in the order given; where additions overlap, they add up.
    """

    name: str
    host: str
    face: str
    low: tuple[float, float]
    high: tuple[float, float]
    make_up: MakeUp | None = None
    inside: MakeUp | None = None
    outside: MakeUp | None = None


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
    panels: tuple[Panel, ...] = ()


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
