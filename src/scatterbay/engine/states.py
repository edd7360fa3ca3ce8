"""A sealed source when it is not exposed: stored, on its way, stuck; and what a collimator lets through."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.barriers.makeup import Sheet, Sheets
from scatterbay.barriers.store import answer
from scatterbay.engine.leakage import leaking_housing
from scatterbay.engine.sources import Output, quantity_of
from scatterbay.physics import dose
from scatterbay.physics.spectrum import Spectrum
from scatterbay.scenario.parts import Assumption, Collimator, Container, Point, SealedSource
from scatterbay.tables.materials import Material, material

Array = NDArray[np.float64]


@dataclass(frozen=True)
class StoredSource:
    """A source in its container. ``spectrum``: of the leakage, per steradian and second."""

    source: str
    at: Array
    spectrum: Spectrum
    seconds_per_week: float


@dataclass(frozen=True)
class TravellingSource:
    """A bare source on its way. ``spectrum``: per steradian and decay; ``speed`` in m/s; ``drive`` in Bq."""

    source: str
    path: tuple[Point, ...]
    speed: float
    spectrum: Spectrum
    drive: float

    @property
    def seconds(self) -> float:
        """Time of one pass [s]."""
        corners = np.array(self.path)
        return float(np.linalg.norm(np.diff(corners, axis=0), axis=1).sum()) / self.speed


@dataclass(frozen=True)
class StuckSource:
    """A bare source that does not come back, for a time [s]; never part of the other figures."""

    source: str
    at: Array
    seconds: float
    spectrum: Spectrum
    drive: float


def stored(
    source: SealedSource, container: Container, output: Output, defined: Sequence[Material]
) -> StoredSource:
    """The source in its container, which leaks what is stated at 1 m, evenly in all directions."""
    housing = material(container.housing, defined)
    quantity = quantity_of(container.rate.kind)
    found = leaking_housing(output.spectrum, output.drive, container.rate.value, quantity, housing)
    return StoredSource(
        source.name, np.array(container.at), found.spectrum.scaled(output.drive), container.seconds_per_week
    )


def through_collimator(
    name: str, collimator: Collimator, output: Output, defined: Sequence[Material]
) -> tuple[Spectrum, Assumption]:
    """What leaves a collimator everywhere but in its port, per steradian and decay.

    Either the stated thickness, as a narrow beam, or the thickness that gives the stated transmission.
    """
    stuff = material(collimator.material, defined)
    if collimator.transmission is not None:
        open_rate = output.drive * output.spectrum.dose_at_1_m()[dose.QUANTITIES.index(dose.AIR_KERMA)]
        housing = leaking_housing(
            output.spectrum, output.drive, collimator.transmission * float(open_rate), dose.AIR_KERMA, stuff
        )
        text = f"passes the stated {collimator.transmission:.3g} of the air kerma"
        return housing.spectrum, Assumption("collimator", f"beam '{name}': its collimator {text}, hardened by "
            f"{1e3 * housing.thickness:.3g} mm of {stuff.name}")  # fmt: skip
    thickness = collimator.thickness.value - collimator.thickness.tolerance if collimator.thickness else 0.0
    narrow = output.spectrum.filtered(((stuff, thickness),)).thinned()
    sheets: Sheets = (Sheet(stuff.fractions, stuff.density_g_cm3, thickness),)
    row = dose.QUANTITIES.index(dose.AIR_KERMA)
    behind = np.exp(answer(sheets).log_dose(output.spectrum.energy_kev, np.array([1.0]))[row, :, 0])
    broad = float(behind @ output.spectrum.photons)
    text = (
        f"beam '{name}': its collimator of {1e3 * thickness:.3g} mm of {stuff.name} passes "
        f"{broad / output.spectrum.kerma_at_1_m:.2g} of the air kerma, what scatters in it included"
    )
    return narrow.scaled(broad / narrow.kerma_at_1_m), Assumption("collimator", text)
