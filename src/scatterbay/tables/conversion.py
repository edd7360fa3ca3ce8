"""Ambient dose equivalent per air kerma, as tabulated."""

from __future__ import annotations

from functools import cache

import numpy as np
from numpy.typing import NDArray

from scatterbay.tables.files import read_table


@cache
def ambient_per_kerma() -> tuple[NDArray[np.float64], NDArray[np.float64]]:
    """Energies (n,) [keV] and H*(10)/Ka (n,) [Sv/Gy], 10 keV to 3 MeV."""
    table = read_table("dose-conversion.csv", ("energy_kev", "hstar_per_kerma"))
    return np.array(table.numbers("energy_kev")), np.array(table.numbers("hstar_per_kerma"))
