"""Materials a barrier or a body may be made of: density and mass fractions, with their source."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from functools import cache

from scatterbay.errors import UsageError
from scatterbay.tables.elements import atomic_number
from scatterbay.tables.files import read_table


@dataclass(frozen=True)
class Material:
    """A material: name, density [g/cm3], mass fractions by atomic number (they sum to 1), and their source."""

    name: str
    density_g_cm3: float
    fractions: tuple[tuple[int, float], ...]
    source: str

    @classmethod
    def from_symbols(
        cls, name: str, density_g_cm3: float, fractions: dict[str, float], source: str
    ) -> Material:
        """A material from mass fractions by element symbol, normalised to 1."""
        total = sum(fractions.values())
        pairs = sorted(
            (atomic_number(symbol), value / total) for symbol, value in fractions.items() if value > 0
        )
        return cls(name, density_g_cm3, tuple(pairs), source)


@cache
def names() -> tuple[str, ...]:
    """Names of the shipped materials, in the order of the table."""
    return tuple(_shipped())


@cache
def other_names() -> dict[str, str]:
    """Other names in use, each with the shipped name it stands for."""
    table = read_table("materials.csv", ("name", "also", "density", "composition", "source"))
    pairs = zip(table.texts("name"), table.texts("also"), strict=True)
    return {other.strip(): name for name, also in pairs for other in also.split(";") if other.strip()}


def material(name: str, defined: Iterable[Material] = ()) -> Material:
    """Material by name or other name; ``defined`` (from a scenario) come first.

    Raises
    ------
    UsageError : no material of that name.
    """
    for own in defined:
        if own.name == name:
            return own
    shipped = _shipped().get(other_names().get(name, name))
    if shipped is None:
        raise UsageError(f"'{name}' is not a known material")
    return shipped


@cache
def _shipped() -> dict[str, Material]:
    table = read_table("materials.csv", ("name", "also", "density", "composition", "source"))
    found = {}
    columns = (
        table.texts("name"),
        table.numbers("density"),
        table.texts("composition"),
        table.texts("source"),
    )
    for name, density, composition, source in zip(*columns, strict=True):
        parts = (part.split(":") for part in composition.split())
        found[name] = Material.from_symbols(name, density, {s: float(v) for s, v in parts}, source)
    return found
