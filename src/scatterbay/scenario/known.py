"""What the tables know by name. The tables are read when first asked, not when this is imported."""

from __future__ import annotations

from collections.abc import Collection, Iterator, Mapping
from dataclasses import dataclass, field

HIGHEST_LINE_KEV = 1400.0
"""Top of the energy grid on which barriers are worked out [keV]."""

TUBE_KV = (40.0, 450.0)
"""Tube voltages the spectrum model covers [kV]."""

FARTHEST = 200.0
"""Longest length and farthest coordinate that are believed [m]; more is a slip of the unit."""


def shipped_names() -> tuple[str, ...]:
    """Names of the shipped materials."""
    from scatterbay.tables import materials

    return materials.names()


def other_names() -> tuple[str, ...]:
    """Other names that the shipped materials go by."""
    from scatterbay.tables import materials

    return tuple(materials.other_names())


def nuclide_names() -> tuple[str, ...]:
    """Names of the nuclides in the table, such as ``Ir-192``."""
    from scatterbay.tables import nuclides

    return tuple(nuclides.names())


def highest_line_kev(nuclide: str) -> float:
    """Energy of the highest line of a nuclide that matters [keV]."""
    from scatterbay.tables import nuclides

    return nuclides.highest_line_kev(nuclide)


def element_symbols() -> tuple[str, ...]:
    """Symbols of the elements the tables hold."""
    from scatterbay.tables import elements

    return elements.symbols()


def atomic_weight(symbol: str) -> float:
    """Atomic weight of an element [g/mol]."""
    from scatterbay.tables import elements

    return elements.atomic_weight(elements.atomic_number(symbol))


def density(material: str) -> float:
    """Density of a shipped material [kg/m3]."""
    from scatterbay.tables import materials

    return 1000.0 * materials.material(material).density_g_cm3


def lead_fraction(material: str) -> float:
    """Mass fraction of lead in a shipped material."""
    from scatterbay.tables import elements, materials

    return dict(materials.material(material).fractions).get(elements.atomic_number("Pb"), 0.0)


def shipped_stock() -> dict[str, str]:
    """Make-ups of the shipped stock items, by name."""
    from scatterbay.tables import stock

    return {name: item.make_up for name, item in stock.items().items()}


@dataclass(frozen=True)
class Known(Collection[str]):
    """What a scenario defines by name: its materials, and its stock items with their make-ups as text.

    It stands where a plain collection of material names can stand, and behaves as one.
    """

    materials: tuple[str, ...] = ()
    stock: Mapping[str, str] = field(default_factory=dict)

    def __contains__(self, name: object) -> bool:
        return name in self.materials

    def __iter__(self) -> Iterator[str]:
        return iter(self.materials)

    def __len__(self) -> int:
        return len(self.materials)

    def __bool__(self) -> bool:
        return bool(self.materials or self.stock)

    def without(self, item: str) -> Known:
        """The same with one stock item less."""
        return Known(self.materials, {name: text for name, text in self.stock.items() if name != item})


def known(names: Collection[str]) -> Known:
    """What is known by name, the shipped stock included, from what a scenario defines."""
    own = names if isinstance(names, Known) else Known(tuple(names))
    return Known(own.materials, {**shipped_stock(), **own.stock})
