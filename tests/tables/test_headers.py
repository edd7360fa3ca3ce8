"""Every shipped table: its header, its rows, and what happens when either is broken. Kind: limit."""

from __future__ import annotations

import csv
import shutil
from pathlib import Path

import pytest

from scatterbay.errors import DataFileError
from scatterbay.resources import folder
from scatterbay.tables import files
from scatterbay.tables.files import HEADER_KEYS, Table

DATA = Path(str(folder("data")))
TABLES = sorted(path.name for path in DATA.glob("*.csv"))
NUMBERS = {
    "air.csv": "mu_rho", "allowances.csv": "low", "attenuation.csv": "mu_en_rho", "coherent.csv": "Pb",
    "dose-conversion.csv": "hstar_per_kerma", "elements.csv": "atomic_weight", "incoherent.csv": "Fe",
    "k-shell.csv": "yield", "materials.csv": "density", "nuclide-lines.csv": "per_decay",
    "nuclides.csv": "half_life_s", "pair.csv": "pair", "transmission-fits.csv": "a",
}  # fmt: skip
"""A column of numbers in each table that has one."""
WORDS = {
    "checklist.csv",
    "containers.csv",
    "occupancy.csv",
    "receptors.csv",
    "rules.csv",
    "sheets.csv",
    "stock.csv",
}
"""Tables of texts, which the scenario's own readers read."""


def lines_of(name: str) -> list[str]:
    return (DATA / name).read_text(encoding="utf-8").splitlines()


def columns_of(name: str) -> tuple[str, ...]:
    names = next(line for line in lines_of(name) if not line.startswith("#"))
    return tuple(next(csv.reader([names])))


@pytest.fixture
def copied(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """A copy of the tables that the reader is pointed at."""
    for name in TABLES:
        shutil.copy(DATA / name, tmp_path / name)
    monkeypatch.setattr(files, "folder", lambda _: tmp_path)
    return tmp_path


def read(name: str) -> Table:
    """Read without the memory of what was read before."""
    return files.read_table.__wrapped__(name, columns_of(name))


def rewritten(where: Path, name: str, lines: list[str]) -> None:
    (where / name).write_text("\n".join(lines) + "\n", encoding="utf-8")


def test_all_tables_are_known_here() -> None:
    assert set(NUMBERS) | WORDS == set(TABLES)
    assert not set(NUMBERS) & WORDS


@pytest.mark.parametrize("name", TABLES)
def test_header_and_rows_are_whole(name: str, copied: Path) -> None:
    table = read(name)
    assert set(HEADER_KEYS) <= set(table.header)
    assert all(table.header[key] for key in HEADER_KEYS)
    assert len(table.rows) == len(lines_of(name)) - table.first_line + 1
    assert all(len(row) == len(table.columns) for row in table.rows)
    assert len(set(table.columns)) == len(table.columns)


@pytest.mark.parametrize("name", TABLES)
@pytest.mark.parametrize("key", HEADER_KEYS)
def test_a_missing_header_line_is_named(name: str, key: str, copied: Path) -> None:
    rewritten(copied, name, [line for line in lines_of(name) if not line.startswith(f"# {key}:")])
    with pytest.raises(DataFileError, match=rf"data/{name}: the header lacks {key}"):
        read(name)


@pytest.mark.parametrize("name", TABLES)
def test_an_empty_header_line_is_named(name: str, copied: Path) -> None:
    lines = ["# source:" if line.startswith("# source:") else line for line in lines_of(name)]
    number = lines.index("# source:") + 1
    rewritten(copied, name, lines)
    with pytest.raises(DataFileError, match=rf"data/{name}:{number}: a header line reads"):
        read(name)


@pytest.mark.parametrize("name", TABLES)
def test_a_renamed_column_is_named(name: str, copied: Path) -> None:
    lines = lines_of(name)
    place = next(k for k, line in enumerate(lines) if not line.startswith("#"))
    lines[place] = lines[place].replace(columns_of(name)[-1], "other")
    rewritten(copied, name, lines)
    with pytest.raises(DataFileError, match=rf"data/{name}:{place + 1}: the columns should be"):
        read(name)


@pytest.mark.parametrize("name", TABLES)
@pytest.mark.parametrize("last", [False, True])
def test_a_row_of_wrong_length_is_named(name: str, last: bool, copied: Path) -> None:
    lines = lines_of(name)
    first = read(name).first_line
    place = len(lines) - 1 if last else first - 1
    lines[place] = lines[place] + ",7" if last else lines[place].split(",")[0]
    rewritten(copied, name, lines)
    with pytest.raises(DataFileError, match=rf"data/{name}:{place + 1}: \d+ entr"):
        read(name)


@pytest.mark.parametrize("name", sorted(NUMBERS))
def test_a_number_that_is_none_is_named(name: str, copied: Path) -> None:
    column = NUMBERS[name]
    lines, first = lines_of(name), read(name).first_line
    place = first + (len(lines) - first) // 2 - 1
    cells = next(csv.reader([lines[place]]))
    cells[columns_of(name).index(column)] = "1.2.3"
    lines[place] = ",".join(f'"{cell}"' for cell in cells)
    rewritten(copied, name, lines)
    with pytest.raises(
        DataFileError, match=rf"data/{name}:{place + 1}: '1.2.3' is not a number \({column}\)"
    ):
        read(name).numbers(column)


def test_an_empty_file_is_refused(copied: Path) -> None:
    (copied / "air.csv").write_text("", encoding="utf-8")
    with pytest.raises(DataFileError, match=r"data/air\.csv"):
        read("air.csv")
