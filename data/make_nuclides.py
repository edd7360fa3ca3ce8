"""Makes nuclides.csv and nuclide-lines.csv from the LNHB files in the PyPI package `roentgen`.

Run: python data/make_nuclides.py [folder to write to]
"""

from __future__ import annotations

import sys
from pathlib import Path

import roentgen
from writing import HERE, write_table

NUCLIDES = ("Am-241", "Ba-133", "Co-57", "Co-60", "Cs-134", "Cs-137", "Gd-153", "I-131", "Ir-192", "Mn-54", "Na-22",
            "Se-75", "Tc-99m", "Yb-169", "Zn-65")  # fmt: skip
LOWEST_KEV = 20.0
RAW = Path(roentgen.__file__).parent / "data" / "lara"
SECONDS = "Half-life (s)"


def parse(nuclide: str) -> tuple[float, str, list[tuple[float, float]]]:
    """Half-life [s], evaluation, and lines (keV, photons per decay) from 20 keV up, annihilation included."""
    half_life, evaluation = 0.0, ""
    lines: list[tuple[float, float]] = []
    for line in (RAW / f"{nuclide}.lara.txt").read_text().splitlines():
        cells = [cell.strip() for cell in line.split(";")]
        if cells[0] == SECONDS:
            half_life = float(cells[1])
        elif cells[0] == "Reference":
            evaluation = cells[1]
        elif len(cells) >= 8 and cells[4].startswith(("g", "X")):
            energy, intensity = float(cells[0].split("-")[0]), float(cells[2] or 0) / 100
            if energy >= LOWEST_KEV:
                lines.append((energy, intensity))
    return half_life, evaluation, lines


def main(where: Path = HERE) -> None:
    common = {
        "range": "photon lines from 20 keV up",
        "source": "LNHB evaluated decay data (Laboratoire National Henri Becquerel, module LARA)",
        "obtained": "make_nuclides.py, from the package roentgen (PyPI)",
        "licence": "LNHB data, free with citation; Apache-2.0 (roentgen)",
        "version": "1",
        "gaps": "lines below 20 keV are taken as stopped in the capsule; bremsstrahlung of beta rays is left out, "
        "which rules out nuclides where it matters",
    }
    parsed = {nuclide: parse(nuclide) for nuclide in NUCLIDES}
    write_table(
        "nuclides.csv",
        {"title": "Nuclides of sealed sources", "columns": "nuclide; half_life_s [s]; evaluation",
         "interpolation": "none", **common},
        ("nuclide", "half_life_s", "evaluation"),
        [(n, f"{p[0]:.6g}", p[1]) for n, p in parsed.items()], where,
    )  # fmt: skip
    write_table(
        "nuclide-lines.csv",
        {"title": "Photon lines of sealed sources", "columns": "nuclide; energy_kev [keV]; per_decay [1]",
         "interpolation": "none", **common},
        ("nuclide", "energy_kev", "per_decay"),
        [(n, f"{e:g}", f"{i:.6g}") for n, p in parsed.items() for e, i in p[2]], where,
    )  # fmt: skip


if __name__ == "__main__":
    main(Path(sys.argv[1]) if len(sys.argv) > 1 else HERE)
