"""Published transmission fits, each for one beam and material."""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import cache

from scatterbay.tables.files import read_table

_METRES = {"mm": 1e-3, "cm": 1e-2}


@dataclass(frozen=True)
class TransmissionFit:
    """A broad-beam fit: beam (voltage [kV] or energy [keV], the other 0), material, parameters [1/m], [1/m], [1]."""

    beam: str
    voltage: float
    energy_kev: float
    material: str
    a: float
    b: float
    g: float
    source: str

    def transmission(self, thickness: float) -> float:
        """B = [(1 + b/a) exp(a g x) - b/a]^(-1/g) for a thickness x [m] (Archer et al. 1983)."""
        ratio = self.b / self.a
        return float(((1.0 + ratio) * math.exp(self.a * self.g * thickness) - ratio) ** (-1.0 / self.g))


@cache
def fits() -> tuple[TransmissionFit, ...]:
    """All fits of the table."""
    columns = ("beam", "kv", "energy_kev", "material", "a", "b", "g", "per", "source")
    table = read_table("transmission-fits.csv", columns)
    scale = [1.0 / _METRES[unit] for unit in table.texts("per")]
    return tuple(
        TransmissionFit(beam, kv, energy, material, a * per, b * per, g, source)
        for beam, kv, energy, material, a, b, g, per, source in zip(
            table.texts("beam"), table.numbers("kv"), table.numbers("energy_kev"), table.texts("material"),
            table.numbers("a"), table.numbers("b"), table.numbers("g"), scale, table.texts("source"), strict=True,
        )
    )  # fmt: skip
