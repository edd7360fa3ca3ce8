"""Leakage of a housing: as much as is stated at 1 m, with the spectrum that the housing lets through."""

from __future__ import annotations

from dataclasses import dataclass

from scatterbay.errors import OutOfRangeError
from scatterbay.physics import dose
from scatterbay.physics.spectrum import Spectrum
from scatterbay.tables.materials import Material

THICKEST = 1.0
"""Thickest housing looked for [m]."""


@dataclass(frozen=True)
class LeakingHousing:
    """The thickness [m] of the housing that explains a stated leakage, and the spectrum behind it."""

    material: Material
    thickness: float
    spectrum: Spectrum


def leaking_housing(
    bare: Spectrum, drive: float, stated: float, quantity: str, housing: Material
) -> LeakingHousing:
    """The housing that lets the stated dose rate at 1 m through.

    The spectrum behind it is taken as that of a narrow beam, which is harder than what really comes out (the
    housing's own scatter is softer): protective behind barriers.

    Parameters
    ----------
    bare : spectrum inside the housing, per unit of output.
    drive : output per second: tube current [A] or activity [Bq].
    stated : leakage at 1 m [Gy/s or Sv/s], of this quantity.
    housing : its material.

    Raises
    ------
    OutOfRangeError : the stated leakage is more than the bare source gives, or nothing stops enough of it.
    """
    thickness = housing_for(bare, drive, stated, quantity, housing)
    spectrum = bare.filtered(((housing, thickness),)).thinned()
    row = dose.QUANTITIES.index(quantity)
    return LeakingHousing(housing, thickness, spectrum.scaled(stated / (drive * spectrum.dose_at_1_m()[row])))


def housing_for(bare: Spectrum, drive: float, stated: float, quantity: str, housing: Material) -> float:
    """Thickness [m] of the housing behind which a source gives the stated dose rate at 1 m.

    Parameters and errors as for ``leaking_housing``.
    """
    row = dose.QUANTITIES.index(quantity)

    def rate(thickness: float) -> float:
        behind = bare.filtered(((housing, thickness),))
        return float(drive * behind.dose_at_1_m()[row])

    if stated > rate(0.0):
        raise OutOfRangeError(
            f"the stated leakage at 1 m is {stated / rate(0.0):.3g} times what the bare source gives there"
        )
    low, high = 0.0, 1e-3
    while rate(high) > stated:
        low, high = high, 2.0 * high
        if high > THICKEST:
            raise OutOfRangeError(f"no housing of {housing.name} up to 1 m thick leaks as little as stated")
    for _ in range(60):
        middle = 0.5 * (low + high)
        low, high = (middle, high) if rate(middle) > stated else (low, middle)
    return 0.5 * (low + high)
