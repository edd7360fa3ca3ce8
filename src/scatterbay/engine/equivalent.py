"""How thick a layer is that is known by its lead equivalent."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from scatterbay.barriers.makeup import Sheet, Sheets
from scatterbay.barriers.store import answer
from scatterbay.errors import OutOfRangeError
from scatterbay.physics import dose
from scatterbay.physics.interpolate import cubic
from scatterbay.physics.tube import tube_spectrum
from scatterbay.tables.materials import Material, material

Array = NDArray[np.float64]

FILTER = ("aluminium", 3e-3)
"""Total filtration of the beam that a lead equivalent is taken to be stated for (common practice)."""
STEPS = (0.5, 0.75, 1.0, 1.25, 1.5, 2.0)
"""Thicknesses tried, over a first guess."""


def equivalent_thickness(stuff: Material, lead: float, voltage_kv: float, guess: float) -> float:
    """Thickness [m] of a material behind which a tube's beam gives the air kerma that it gives behind lead.

    Both as planes lit all over, square on, by transport, for ``voltage_kv`` behind 3 mm of aluminium.

    Parameters
    ----------
    lead : thickness of the lead [m].
    guess : a first guess of the answer [m].

    Raises
    ------
    OutOfRangeError : the answer is not between a half and twice the guess.
    """
    spectrum = tube_spectrum(voltage_kv, ((material(FILTER[0]), FILTER[1]),)).thinned(1e-9)

    def log_kerma(one: Material, thickness: float) -> float:
        sheets: Sheets = (Sheet(one.fractions, one.density_g_cm3, thickness),)
        behind = answer(sheets).log_dose(spectrum.energy_kev, np.array([1.0]))
        row = dose.QUANTITIES.index(dose.AIR_KERMA)
        return float(np.log(np.exp(behind[row, :, 0]) @ spectrum.photons))

    wanted = log_kerma(material("lead"), lead)
    thickness = guess * np.array(STEPS)
    found = np.array([log_kerma(stuff, float(t)) for t in thickness])
    if not found[-1] < wanted < found[0]:
        raise OutOfRangeError(
            f"no thickness of {stuff.name} near {1e3 * guess:.3g} mm stops as much at {voltage_kv:g} kV as "
            f"{1e3 * lead:.3g} mm of lead"
        )
    return float(cubic(np.array([-wanted]), -found, thickness)[0])
