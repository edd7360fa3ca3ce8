"""Makes incoherent.csv, coherent.csv and k-shell.csv from the PyPI package `xraylib`.

Run: python data/make_scattering.py [folder to write to]
"""

from __future__ import annotations

import sys
from collections.abc import Callable
from pathlib import Path

import xraylib
from writing import HERE, write_table

# The abscissae of Hubbell et al. (1975); between them the package interpolates, so only these are taken.
X_NODES = (
    0.005, 0.01, 0.02, 0.03, 0.04, 0.05, 0.06, 0.07, 0.08, 0.09, 0.1, 0.125, 0.15, 0.175, 0.2, 0.25, 0.3, 0.4,
    0.5, 0.6, 0.7, 0.8, 0.9, 1.0, 1.25, 1.5, 2.0, 2.5, 3.0, 3.5, 4.0, 5.0, 6.0, 7.0, 8.0, 10.0, 15.0, 20.0,
    50.0, 80.0, 100.0,
)  # fmt: skip
FIRST_K_SHELL = 40
K_GROUPS = {"ka2": ("KL1", "KL2"), "ka1": ("KL3",), "kb1": ("KM",), "kb2": ("KN", "KO", "KP")}


def header(title: str, columns: str, rule: str, extent: str, source: str, gaps: str) -> dict[str, str]:
    return {
        "title": title,
        "columns": columns,
        "interpolation": rule,
        "range": extent,
        "source": source,
        "obtained": "make_scattering.py, from the package xraylib (PyPI)",
        "licence": "BSD-3-Clause (xraylib); evaluated data in the public domain",
        "version": "1",
        "gaps": gaps,
    }


def by_momentum(function: Callable[[int, float], float]) -> list[tuple[object, ...]]:
    return [(x, *(f"{function(z, x):.5g}" for z in range(1, 93))) for x in X_NODES]


def line_groups(z: int) -> list[str]:
    """Mean energy [keV] and share of each group of K lines; the shares are normalised to 1."""
    lines: dict[str, list[tuple[float, float]]] = {name: [] for name in K_GROUPS}
    for name in dir(xraylib):
        if not (name.startswith("K") and name.endswith("_LINE") and len(name) == 8 and name[1] in "LMNOP"):
            continue
        group = next(g for g, starts in K_GROUPS.items() if name[:3] in starts or name[:2] in starts)
        try:
            lines[group].append(
                (xraylib.LineEnergy(z, getattr(xraylib, name)), xraylib.RadRate(z, getattr(xraylib, name)))
            )
        except ValueError:
            continue
    total = sum(rate for group in lines.values() for _, rate in group)
    cells = []
    for found in lines.values():
        share = sum(rate for _, rate in found)
        mean = sum(energy * rate for energy, rate in found) / share if share else 0.0
        cells += [f"{mean:.3f}", f"{share / total:.4f}"]
    return cells


def main(where: Path = HERE) -> None:
    columns = ("x", *(xraylib.AtomicNumberToSymbol(z) for z in range(1, 93)))
    momentum = "x = sin(theta/2)/wavelength [1/angstrom]; one column per element [1 per atom]"
    hubbell = "Hubbell et al., J. Phys. Chem. Ref. Data 4 (1975) 471, and 6 (1977) 615 (errata)"
    write_table(
        "incoherent.csv",
        header(
            "Incoherent scattering functions S(x, Z)", momentum,
            "log-log; below the first row proportional to x squared; above the last row the last value",
            "x from 0.005 to 100 per angstrom", hubbell, "none",
        ),
        columns, by_momentum(xraylib.SF_Compt), where,
    )  # fmt: skip
    write_table(
        "coherent.csv",
        header(
            "Atomic form factors F(x, Z)", momentum,
            "log-log; below the first row the first value; above the last row its power law is carried on",
            "x from 0.005 to 100 per angstrom", hubbell, "anomalous scattering is left out",
        ),
        columns, by_momentum(xraylib.FF_Rayl), where,
    )  # fmt: skip
    write_table(
        "k-shell.csv",
        header(
            "K-shell fluorescence: yield, mean energy and share of each group of lines",
            "z; yield [1]; energies [keV]; shares [1]",
            "none", "Z from 40 to 92",
            "yields: Krause, J. Phys. Chem. Ref. Data 8 (1979) 307; shares: Scofield (1974); line energies: "
            "Bearden, Rev. Mod. Phys. 39 (1967) 78",
            "elements below Z = 40, whose K lines lie below 16 keV; L lines",
        ),
        ("z", "yield", "ka2_kev", "ka2", "ka1_kev", "ka1", "kb1_kev", "kb1", "kb2_kev", "kb2"),
        [(z, f"{xraylib.FluorYield(z, xraylib.K_SHELL):.4f}", *line_groups(z)) for z in range(FIRST_K_SHELL, 93)],
        where,
    )  # fmt: skip


if __name__ == "__main__":
    main(Path(sys.argv[1]) if len(sys.argv) > 1 else HERE)
