"""Kept answers: memory, disk, broken files, switched off. Kind: limit."""

from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path

import numpy as np
import pytest

from scatterbay.barriers import store
from scatterbay.barriers.answer import Answer, build_answer
from scatterbay.barriers.makeup import Sheets, content_key, sheet

WALL: Sheets = (sheet("aluminium", 0.003),)
ENERGY, COSINES = np.array([40.0, 100.0]), np.array([1.0, 0.6])


@pytest.fixture
def kept(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Iterator[Path]:
    """An empty cache, on disk and in memory."""
    monkeypatch.setenv(store.SETTING, str(tmp_path / "walls"))
    store.forget()
    yield tmp_path / "walls"
    store.forget()


@pytest.fixture
def builds(monkeypatch: pytest.MonkeyPatch) -> list[Sheets]:
    """The walls that were computed from scratch."""
    made: list[Sheets] = []

    def build(sheets: Sheets) -> Answer:
        made.append(sheets)
        return build_answer(sheets)

    monkeypatch.setattr("scatterbay.barriers.store.build_answer", build)
    return made


def test_this_run_has_a_folder_of_its_own() -> None:
    folder = store.cache_folder()
    assert folder is not None
    assert folder != Path.home() / ".cache" / "scatterbay"


def test_from_memory_then_from_disk(kept: Path, builds: list[Sheets]) -> None:
    first = store.answer(WALL)
    assert store.answer(WALL) is first
    assert [path.name for path in kept.iterdir()] == [f"wall-{content_key(WALL)}.npz"]
    store.forget()
    second = store.answer(WALL)
    assert second is not first
    assert builds == [WALL]
    np.testing.assert_array_equal(first.log_dose(ENERGY, COSINES), second.log_dose(ENERGY, COSINES))
    np.testing.assert_array_equal(first.diffuse, second.diffuse)


def test_a_cut_layer_shares_its_answer(kept: Path, builds: list[Sheets]) -> None:
    """Limit: exact, for it is the same answer."""
    whole = store.answer((sheet("aluminium", 0.004),))
    cut = store.answer((sheet("aluminium", 0.001), sheet("aluminium", 0.003)))
    assert cut is whole
    assert len(builds) == 1


@pytest.mark.parametrize("damage", ["empty", "text", "cut short", "other arrays"])
def test_a_broken_file_is_made_anew(damage: str, kept: Path, builds: list[Sheets]) -> None:
    good = store.answer(WALL)
    path = next(kept.iterdir())
    whole = path.read_bytes()
    if damage == "other arrays":
        np.savez(path, energy=np.ones(3))
    else:
        path.write_bytes(
            {"empty": b"", "text": b"not an archive", "cut short": whole[: len(whole) // 2]}[damage]
        )
    store.forget()
    again = store.answer(WALL)
    assert len(builds) == 2
    np.testing.assert_array_equal(good.log_dose(ENERGY, COSINES), again.log_dose(ENERGY, COSINES))
    assert path.read_bytes() == whole


def test_switched_off(kept: Path, builds: list[Sheets], monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv(store.SETTING, "off")
    assert store.cache_folder() is None
    for _ in range(2):
        store.answer(WALL)
        store.forget()
    assert len(builds) == 2
    assert not kept.exists()


def test_a_folder_that_cannot_be_written_is_no_failure(
    kept: Path, builds: list[Sheets], monkeypatch: pytest.MonkeyPatch
) -> None:
    kept.write_text("a file where the folder should be")
    assert store.answer(WALL).energy_kev.size > 0
    assert kept.read_text() == "a file where the folder should be"


def test_no_parts_of_files_are_left(kept: Path, builds: list[Sheets]) -> None:
    store.answer(WALL)
    assert not list(kept.glob("part-*"))


@pytest.mark.parametrize(
    ("variable", "inside"), [("LOCALAPPDATA", "scatterbay"), ("XDG_CACHE_HOME", "scatterbay")]
)
def test_the_systems_own_cache_folder(
    variable: str, inside: str, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    for name in (store.SETTING, "LOCALAPPDATA", "XDG_CACHE_HOME"):
        monkeypatch.delenv(name, raising=False)
    monkeypatch.setenv(variable, str(tmp_path))
    assert store.cache_folder() == tmp_path / inside
