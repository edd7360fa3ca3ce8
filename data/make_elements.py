"""Makes elements.csv (symbols, names, atomic weights) from the PyPI package `roentgen`.

Run: python data/make_elements.py [folder to write to]
"""

from __future__ import annotations

import csv
import sys
from pathlib import Path

import roentgen
from writing import HERE, write_table

SPELLINGS = {"aluminum": "aluminium", "sulfur": "sulphur", "cesium": "caesium"}


def main(where: Path = HERE) -> None:
    with (Path(roentgen.__file__).parent / "data" / "elements.csv").open(encoding="utf-8") as source:
        raw = [row for row in csv.DictReader(source) if int(row["z"]) <= 92]
    header = {
        "title": "Elements: symbol, name and atomic weight",
        "columns": "z; symbol; name; atomic_weight [g/mol]",
        "interpolation": "none",
        "range": "Z from 1 to 92",
        "source": "NIST, X-Ray Mass Attenuation Coefficients, table 1 (Z/A to five digits)",
        "obtained": "make_elements.py, from the package roentgen (PyPI); weight = Z / (Z/A)",
        "licence": "NIST data, public domain in the United States; Apache-2.0 (roentgen)",
        "version": "1",
        "gaps": "none",
    }
    rows = []
    for row in raw:
        z, name = int(row["z"]), row["name"].strip().lower()
        weight = z / float(row["zovera"])
        rows.append((z, row["symbol"].strip(), SPELLINGS.get(name, name), f"{weight:.5g}"))
    write_table("elements.csv", header, ("z", "symbol", "name", "atomic_weight"), rows, where)


if __name__ == "__main__":
    main(Path(sys.argv[1]) if len(sys.argv) > 1 else HERE)
