"""The scripts that made the tables make them again, byte for byte. Kind: independent route (the raw packages)."""

from __future__ import annotations

import subprocess
import sys
from pathlib import Path

import pytest

DATA = Path(__file__).parents[2] / "data"
MAKERS = {
    "make_attenuation.py": ("attenuation.csv", "air.csv"),
    "make_elements.py": ("elements.csv",),
    "make_nuclides.py": ("nuclides.csv", "nuclide-lines.csv"),
    "make_pair.py": ("pair.csv",),
    "make_scattering.py": ("incoherent.csv", "coherent.csv", "k-shell.csv"),
}
BY_HAND = {
    "materials.csv", "dose-conversion.csv", "allowances.csv", "transmission-fits.csv", "stock.csv", "rules.csv",
    "occupancy.csv", "containers.csv", "receptors.csv", "sheets.csv", "checklist.csv",
}  # fmt: skip


def test_every_table_has_a_maker_or_was_written_by_hand() -> None:
    made = {name for names in MAKERS.values() for name in names}
    assert {path.name for path in DATA.glob("make_*.py")} == set(MAKERS)
    assert {path.name for path in DATA.glob("*.csv")} == made | BY_HAND
    for name in sorted(BY_HAND):
        header = [
            line for line in (DATA / name).read_text(encoding="utf-8").splitlines() if line.startswith("#")
        ]
        obtained = next(line for line in header if line.startswith("# obtained:"))
        assert "make_" not in obtained
        assert "recalled" in obtained or "by hand" in obtained


@pytest.mark.parametrize("maker", sorted(MAKERS))
def test_maker_repeats_its_tables(maker: str, tmp_path: Path) -> None:
    """With the package versions named in the test extra; another version may round differently."""
    done = subprocess.run(
        [sys.executable, str(DATA / maker), str(tmp_path)],
        capture_output=True,
        text=True,
        check=False,
        timeout=120,
    )
    assert done.returncode == 0, done.stderr
    assert {path.name for path in tmp_path.iterdir()} == set(MAKERS[maker])
    for name in MAKERS[maker]:
        assert (tmp_path / name).read_bytes() == (DATA / name).read_bytes(), name
