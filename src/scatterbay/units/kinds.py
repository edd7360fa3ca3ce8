"""The kinds of quantity a bay is described with, each with its base unit and the units it is printed in."""

from __future__ import annotations

from dataclasses import dataclass

from scatterbay.units.table import NONE, Dims, dims

WEEK_SECONDS = 7 * 86400.0
YEAR_WEEKS = 52.1775
"""Weeks in a mean year."""


@dataclass(frozen=True)
class Kind:
    """A kind of quantity.

    Parameters
    ----------
    name : as printed, such as ``air kerma rate``.
    dims : exponents of the base units.
    base : the base unit as text.
    shown : units it is printed in, smallest first.
    example : a text that would be right, used in error messages.
    """

    name: str
    dims: Dims
    base: str
    shown: tuple[str, ...]
    example: str

    @property
    def example_unit(self) -> str:
        """The unit of the example."""
        return self.example.split(" ", 1)[-1]

    @property
    def article(self) -> str:
        """The name with its article."""
        return f"{'an' if self.name[0] in 'aeiou' else 'a'} {self.name}"


def _prefixed(prefixes: str, unit: str) -> tuple[str, ...]:
    return tuple(prefix.strip("-") + unit for prefix in prefixes)


_ALL = (
    Kind("length", dims(m=1), "m", ("um", "mm", "m"), "300 mm"),
    Kind("time", dims(s=1), "s", ("s", "min", "h", "d"), "25 min"),
    Kind("energy", dims(keV=1), "keV", ("keV", "MeV"), "662 keV"),
    Kind("voltage", dims(kV=1), "kV", ("kV",), "225 kV"),
    Kind("current", dims(A=1), "A", ("uA", "mA", "A"), "4 mA"),
    Kind("charge", dims(A=1, s=1), "C", ("mA s", "mA min"), "400 mA min"),
    Kind("activity", dims(Bq=1), "Bq", _prefixed("-kMGTP", "Bq"), "3.7 TBq"),
    Kind("air kerma", dims(Gy=1), "Gy", _prefixed("num-", "Gy"), "0.1 mGy"),
    Kind("ambient dose equivalent", dims(Sv=1), "Sv", _prefixed("num-", "Sv"), "20 uSv"),
    Kind("air kerma rate", dims(Gy=1, s=-1), "Gy/s", _prefixed("num-", "Gy/h"), "5 mGy/h"),
    Kind("ambient dose equivalent rate", dims(Sv=1, s=-1), "Sv/s", _prefixed("num-", "Sv/h"), "7.5 uSv/h"),
    Kind("air kerma per week", dims(Gy=1, week=-1), "Gy/week", _prefixed("num-", "Gy/week"), "0.1 mGy/week"),
    Kind("air kerma per year", dims(Gy=1, year=-1), "Gy/year", _prefixed("num-", "Gy/year"), "5 mGy/year"),
    Kind(
        "ambient dose equivalent per week",
        dims(Sv=1, week=-1),
        "Sv/week",
        _prefixed("num-", "Sv/week"),
        "0.1 mSv/week",
    ),
    Kind(
        "ambient dose equivalent per year",
        dims(Sv=1, year=-1),
        "Sv/year",
        _prefixed("num-", "Sv/year"),
        "6 mSv/year",
    ),
    Kind("angle", dims(rad=1), "rad", ("deg",), "40 deg"),
    Kind("number", NONE, "1", ("",), "0.25"),
    Kind("density", dims(kg=1, m=-3), "kg/m3", ("g/cm3",), "2.35 g/cm3"),
    Kind(
        "tube output",
        dims(Gy=1, m=2, A=-1, s=-1),
        "Gy m2/C",
        ("mGy m2/(mA min)",),
        "9.8 mGy m2/(mA min)",
    ),
    Kind("air kerma per charge", dims(Gy=1, A=-1, s=-1), "Gy/C", ("mGy/(mA s)",), "0.05 mGy/(mA s)"),
    Kind("time per week", dims(s=1, week=-1), "s/week", ("s/week", "min/week", "h/week"), "6 h/week"),
    Kind("charge per week", dims(A=1, s=1, week=-1), "C/week", ("mA min/week",), "400 mA min/week"),
    Kind("speed", dims(m=1, s=-1), "m/s", ("m/s",), "0.5 m/s"),
    Kind("kerma-area product", dims(Gy=1, m=2), "Gy m2", ("uGy m2", "Gy cm2"), "20 Gy cm2"),
    Kind(
        "kerma-area product per week",
        dims(Gy=1, m=2, week=-1),
        "Gy m2/week",
        ("Gy cm2/week",),
        "300 Gy cm2/week",
    ),
    Kind(
        "air kerma rate constant",
        dims(Gy=1, m=2, s=-1, Bq=-1),
        "Gy m2/(Bq s)",
        ("mGy m2/(GBq h)",),
        "0.11 mGy m2/(GBq h)",
    ),
    Kind(
        "ambient dose equivalent rate constant",
        dims(Sv=1, m=2, s=-1, Bq=-1),
        "Sv m2/(Bq s)",
        ("mSv m2/(GBq h)",),
        "0.14 mSv m2/(GBq h)",
    ),
)

KINDS: dict[str, Kind] = {kind.name: kind for kind in _ALL}
"""Every kind, by name."""


def kind_of(what: Dims) -> Kind | None:
    """The kind with these exponents; None where it is nothing a bay is described with."""
    return next((kind for kind in _ALL if kind.dims == what), None)
