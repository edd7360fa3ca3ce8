"""Keeps the answers of walls: in memory, and on disk between runs."""

from __future__ import annotations

import contextlib
import os
import tempfile
from pathlib import Path
from zipfile import BadZipFile

from scatterbay.barriers.answer import Answer, build_answer
from scatterbay.barriers.makeup import Sheets, content_key, merged

SETTING = "SCATTERBAY_CACHE"
"""Environment variable: a folder for kept answers, or ``off``."""

_memory: dict[Sheets, Answer] = {}


def answer(sheets: Sheets) -> Answer:
    """The answer of a wall: from memory, from disk, or computed and kept."""
    key = merged(sheets)
    if key not in _memory:
        _memory[key] = _from_disk(key) or _computed(key)
    return _memory[key]


def forget() -> None:
    """Empty the memory (not the disk)."""
    _memory.clear()


def cache_folder() -> Path | None:
    """Where answers are kept on disk; None where the environment says ``off``."""
    setting = os.environ.get(SETTING, "")
    if setting == "off":
        return None
    if setting:
        return Path(setting)
    base = os.environ.get("LOCALAPPDATA") or os.environ.get("XDG_CACHE_HOME")
    return (Path(base) if base else Path.home() / ".cache") / "scatterbay"


def _path(sheets: Sheets) -> Path | None:
    folder = cache_folder()
    return folder / f"wall-{content_key(sheets)}.npz" if folder else None


def _from_disk(sheets: Sheets) -> Answer | None:
    """A kept answer; anything unreadable counts as not kept."""
    path = _path(sheets)
    if path is None:
        return None
    try:
        return Answer.from_bytes(path.read_bytes(), sheets)
    except (OSError, ValueError, KeyError, EOFError, BadZipFile):
        return None


def _computed(sheets: Sheets) -> Answer:
    made = build_answer(sheets)
    path = _path(sheets)
    if path is not None:
        with contextlib.suppress(OSError):
            _write_whole(path, made.to_bytes())
    return made


def _write_whole(path: Path, content: bytes) -> None:
    """Write by way of a temporary file, so that a reader never sees half of it."""
    path.parent.mkdir(parents=True, exist_ok=True)
    handle, name = tempfile.mkstemp(dir=path.parent, prefix="part-")
    try:
        with os.fdopen(handle, "wb") as out:
            out.write(content)
        os.replace(name, path)
    except OSError:
        Path(name).unlink(missing_ok=True)
        raise
