"""The output of a source: its spectrum per unit of output, how much of it a second, and what was assumed."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from scatterbay.engine.leakage import LeakingHousing, housing_for, leaking_housing
from scatterbay.engine.sealed import sealed_output
from scatterbay.engine.tubes import tube_output
from scatterbay.physics import dose
from scatterbay.physics.spectrum import Spectrum
from scatterbay.scenario.parts import Assumption, Source, XrayTube
from scatterbay.tables.materials import Material, material


@dataclass(frozen=True)
class Output:
    """What a source sends out.

    ``spectrum``: per steradian and unit of output (coulomb or decay), as it leaves towards the field.
    ``bare``: inside the housing, before added filters. ``drive``: output per second while on.
    ``tolerance``: of the output, as a share. ``annual``: mean output over a year over that at the start.
    ``survey``: output on the day of a survey over that of the design; None where no day is stated.
    """

    spectrum: Spectrum
    bare: Spectrum
    drive: float
    assumptions: tuple[Assumption, ...]
    tolerance: float = 0.0
    annual: float = 1.0
    survey: float | None = None
    leakage: LeakingHousing | None = None


def output_of(source: Source, defined: Sequence[Material] = ()) -> Output:
    """The output of a source as the scenario describes it.

    Raises
    ------
    OutOfRangeError : a voltage, a half-value layer or a leakage outside the models.
    """
    if isinstance(source, XrayTube):
        tube = tube_output(source, defined)
        leakage = None
        if source.leakage is not None and source.leakage.rate.value > 0.0:
            stated = source.leakage
            housing = material(stated.housing, defined)
            quantity = quantity_of(stated.rate.kind)
            if stated.voltage is None or stated.current is None:
                leakage = leaking_housing(tube.bare, tube.drive, stated.rate.value, quantity, housing)
            else:
                hardest = tube.bare_at(stated.voltage.value)
                thickness = housing_for(hardest, stated.current.value, stated.rate.value, quantity, housing)
                spectrum = tube.bare.filtered(((housing, thickness),)).thinned()
                leakage = LeakingHousing(housing, thickness, spectrum)
        return Output(
            tube.spectrum, tube.bare, tube.drive, tube.assumptions, tube.tolerance, leakage=leakage
        )  # fmt: skip
    sealed = sealed_output(source)
    leakage = None
    if source.leakage is not None and source.leakage.rate.value > 0.0:
        housing = material(source.leakage.housing, defined)
        quantity = quantity_of(source.leakage.rate.kind)
        leakage = leaking_housing(sealed.spectrum, sealed.drive, source.leakage.rate.value, quantity, housing)
    return Output(
        sealed.spectrum, sealed.spectrum, sealed.drive, sealed.assumptions, sealed.tolerance, sealed.annual,
        sealed.survey, leakage,
    )  # fmt: skip


def quantity_of(kind: str) -> str:
    """The dose quantity that a rate of this kind is a rate of."""
    return dose.AIR_KERMA if "kerma" in kind else dose.AMBIENT
