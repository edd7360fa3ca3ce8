"""Makes attenuation.csv and air.csv from the NIST tables as carried by the PyPI package `roentgen`.

Run: python data/make_attenuation.py [folder to write to]
"""

from __future__ import annotations

import sys
from pathlib import Path

import roentgen
from writing import HERE, write_table

LOWEST_KEV, HIGHEST_KEV = 10.0, 3000.0
RAW = Path(roentgen.__file__).parent / "data"


def raw_rows(path: Path) -> list[tuple[str, str, str]]:
    """Energy [keV], mu/rho and mu_en/rho [cm2/g] as printed, 10 keV to 3 MeV, edges kept as twin rows."""
    rows = []
    for line in path.read_text().splitlines():
        if line.startswith("#"):
            continue
        energy, attenuation, absorption = line.split(",")
        kev = float(energy) * 1000
        if LOWEST_KEV <= kev <= HIGHEST_KEV:
            rows.append((f"{kev:.6g}", f"{float(attenuation):.3e}", f"{float(absorption):.3e}"))
    return rows


def header(title: str, gaps: str) -> dict[str, str]:
    return {
        "title": title,
        "columns": "energy_kev [keV]; mu_rho, mu_en_rho [cm2/g]",
        "interpolation": "log-log between rows, never across the twin rows of an edge",
        "range": "10 keV to 3000 keV",
        "source": "Hubbell and Seltzer, NIST Standard Reference Database 126 (NISTIR 5632), tables 3 and 4",
        "obtained": "make_attenuation.py, from the copy of the NIST pages in the package roentgen (PyPI)",
        "licence": "NIST data, public domain in the United States",
        "version": "1",
        "gaps": gaps,
    }


def main(where: Path = HERE) -> None:
    elements = [(z, *row) for z in range(1, 93) for row in raw_rows(RAW / "elements" / f"z{z:02d}.csv")]
    write_table(
        "attenuation.csv",
        header("Photon mass attenuation and mass energy-absorption coefficients of the elements", "none"),
        ("z", "energy_kev", "mu_rho", "mu_en_rho"),
        elements,
        where,
    )
    write_table(
        "air.csv",
        header(
            "Mass attenuation and mass energy-absorption coefficients of dry air",
            "mu_en is used for air kerma: the radiated part (under 0.4 % below 1.5 MeV) is left out",
        ),
        ("energy_kev", "mu_rho", "mu_en_rho"),
        raw_rows(RAW / "compounds_mixtures" / "air.csv"),
        where,
    )


if __name__ == "__main__":
    main(Path(sys.argv[1]) if len(sys.argv) > 1 else HERE)
