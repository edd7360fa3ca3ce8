"""Makes pair.csv (pair production, nuclear and electron field together) from the PyPI package `mucoeff`.

Only the package's own table energies are taken: it interpolates linearly between them, which is far off near
the threshold. Run: python data/make_pair.py [folder to write to]
"""

from __future__ import annotations

import sys
from pathlib import Path

from mucoeff import Flag, mu
from writing import HERE, write_table

NODES_KEV = (1250.0, 1500.0, 2000.0, 3000.0)


def main(where: Path = HERE) -> None:
    header = {
        "title": "Mass coefficients for pair production (nuclear and electron field)",
        "columns": "z; energy_kev [keV]; pair [cm2/g]",
        "interpolation": "log-log in energy above the threshold of 1022 keV, carried down to it by its power law",
        "range": "1022 keV to 3000 keV",
        "source": "Boone and Chavez, Med. Phys. 23 (1996) 1997",
        "obtained": "make_pair.py, from the package mucoeff (PyPI)",
        "licence": "CC-BY 4.0, Boone and Chavez; changed: energies selected, the two parts added",
        "version": "1",
        "gaps": "none",
    }
    rows = []
    for z in range(1, 93):
        for energy in NODES_KEV:
            value = mu(Flag.MU_PAIR, z, energy).item() + mu(Flag.MU_TRIPLET, z, energy).item()
            rows.append((z, f"{energy:g}", f"{value:.4e}"))
    write_table("pair.csv", header, ("z", "energy_kev", "pair"), rows, where)


if __name__ == "__main__":
    main(Path(sys.argv[1]) if len(sys.argv) > 1 else HERE)
