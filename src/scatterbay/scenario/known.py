"""What the tables know by name. The tables are read when first asked, not when this is imported."""

from __future__ import annotations

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
