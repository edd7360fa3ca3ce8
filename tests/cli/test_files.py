"""Files are written whole or not at all. Kind: limit."""

from __future__ import annotations

import errno
import os
from pathlib import Path
from typing import Any

import pytest

from scatterbay.cli.files import write_whole
from scatterbay.errors import UsageError


def test_a_full_disk_leaves_nothing_behind(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(os, "fdopen", _full)
    with pytest.raises(UsageError, match="No space left"):
        write_whole(tmp_path / "sheet.html", "content", force=False)
    assert list(tmp_path.iterdir()) == []


def _full(handle: int, *_: Any) -> _Full:
    os.close(handle)
    return _Full()


class _Full:
    """A file that takes nothing."""

    def __enter__(self) -> _Full:
        return self

    def __exit__(self, *arguments: object) -> None:
        """There is nothing to close."""

    def write(self, content: bytes) -> int:
        raise OSError(errno.ENOSPC, os.strerror(errno.ENOSPC))


def test_an_old_file_stays_where_the_new_one_fails(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    target = tmp_path / "plan.svg"
    target.write_text("old", encoding="utf-8")
    monkeypatch.setattr(os, "fdopen", _full)
    with pytest.raises(UsageError, match="cannot be written"):
        write_whole(target, b"new", force=True)
    assert target.read_text(encoding="utf-8") == "old"
    assert [p.name for p in tmp_path.iterdir()] == ["plan.svg"]
