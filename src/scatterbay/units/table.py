"""The closed table of units: symbol -> what it measures and how much of it.

Air kerma (Gy) and ambient dose equivalent (Sv), activity (Bq) and frequency, voltage and energy are
different things here, although general unit systems let them pass for one another.
"""

from __future__ import annotations

import math
from dataclasses import dataclass

BASES = ("m", "s", "keV", "kV", "A", "Bq", "Gy", "Sv", "rad", "kg", "week", "year")
"""Base units, in the order of the exponents in ``Dims``."""

Dims = tuple[int, ...]
"""Exponents of the base units."""

NONE: Dims = (0,) * len(BASES)


@dataclass(frozen=True)
class Unit:
    """A unit: exponents of the base units, and its size in them."""

    dims: Dims
    factor: float

    def times(self, other: Unit, power: int = 1) -> Unit:
        """This unit times ``other`` to a power."""
        dims = tuple(mine + power * theirs for mine, theirs in zip(self.dims, other.dims, strict=True))
        return Unit(dims, self.factor * other.factor**power)


ONE = Unit(NONE, 1.0)


def dims(**exponents: int) -> Dims:
    """Exponents by base unit, such as ``dims(Gy=1, s=-1)``."""
    return tuple(exponents.get(base, 0) for base in BASES)


_PREFIXES = {"n": 1e-9, "u": 1e-6, "m": 1e-3, "c": 1e-2, "k": 1e3, "M": 1e6, "G": 1e9, "T": 1e12, "P": 1e15}

# Symbol, other spellings, what it measures, size in base units, prefixes in use.
_ROWS: tuple[tuple[str, str, Dims, float, str], ...] = (
    ("m", "", dims(m=1), 1.0, "umck"),
    ("in", "inch inches", dims(m=1), 0.0254, ""),
    ("ft", "foot feet", dims(m=1), 0.3048, ""),
    ("s", "", dims(s=1), 1.0, "um"),
    ("min", "minute minutes", dims(s=1), 60.0, ""),
    ("h", "hr hour hours", dims(s=1), 3600.0, ""),
    ("d", "day days", dims(s=1), 86400.0, ""),
    ("week", "weeks", dims(week=1), 1.0, ""),
    ("year", "years", dims(year=1), 1.0, ""),
    ("eV", "", dims(keV=1), 1e-3, "kM"),
    ("V", "", dims(kV=1), 1e-3, "kM"),
    ("A", "", dims(A=1), 1.0, "um"),
    ("C", "", dims(A=1, s=1), 1.0, "um"),
    ("As", "", dims(A=1, s=1), 1.0, "m"),
    ("Amin", "", dims(A=1, s=1), 60.0, "m"),
    ("Bq", "", dims(Bq=1), 1.0, "kMGTP"),
    ("Ci", "", dims(Bq=1), 3.7e10, "umk"),
    ("Gy", "", dims(Gy=1), 1.0, "numc"),
    ("Sv", "", dims(Sv=1), 1.0, "num"),
    ("rem", "", dims(Sv=1), 1e-2, "um"),
    ("rad", "", dims(rad=1), 1.0, ""),
    ("deg", "degree degrees °", dims(rad=1), math.pi / 180.0, ""),
    ("%", "", NONE, 1e-2, ""),
    ("g", "", dims(kg=1), 1e-3, "mk"),
    ("lb", "", dims(kg=1), 0.45359237, ""),
)


def _build() -> dict[str, Unit]:
    table: dict[str, Unit] = {}
    for symbol, spellings, what, factor, prefixes in _ROWS:
        for spelling in (symbol, *spellings.split()):
            table[spelling] = Unit(what, factor)
        for prefix in prefixes:
            table[prefix + symbol] = Unit(what, factor * _PREFIXES[prefix])
    return table


UNITS: dict[str, Unit] = _build()
"""Every unit there is, by symbol (micro is written u; µ is read as u)."""

_ROENTGEN = (
    "the roentgen is a unit of exposure and does not turn into air kerma one to one",
    "give air kerma in Gy (1 R is about 8.8 mGy; use your calibration's own figure)",
)
_RAD = (
    "'{symbol}' is ambiguous (a unit of dose, or of angle)",
    "give a dose in Gy or Sv (an angle in deg)",
)
_PEAK = (
    "'{symbol}' is not a unit of voltage here",
    "write kV: the tube is taken at constant potential, which gives more than a pulsed one of the same peak",
)
_SHORT = "'{symbol}' is not used here"
REFUSED: dict[str, tuple[str, str]] = {
    **dict.fromkeys(("R", "mR", "uR", "kR", "roentgen", "roentgens", "Roentgen", "r", "mr"), _ROENTGEN),
    **dict.fromkeys(("mrad", "krad", "urad", "rads", "mrads"), _RAD),
    **dict.fromkeys(("kVp", "kVP", "kvp", "KVP", "kVcp"), _PEAK),
    **dict.fromkeys(("y", "yr", "yrs", "a", "annum"), (_SHORT, "write year")),
    **dict.fromkeys(("wk", "wks", "w"), (_SHORT, "write week")),
    **dict.fromkeys(("month", "months", "quarter"), (_SHORT, "write week or year")),
    "rad as dose": (_RAD[0].format(symbol="rad"), _RAD[1]),
}
"""Units that people write and that must not be let through: message and hint for each."""
