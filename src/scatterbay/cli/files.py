"""Writes a file whole or not at all, and never over another one unless told to."""

from __future__ import annotations

import os
import tempfile
from pathlib import Path

from scatterbay.errors import UsageError


def check_free(target: Path, force: bool) -> None:
    """Refuse a file that is there already, or a folder that is not, before any work is done for it.

    Raises
    ------
    UsageError : the file exists and ``force`` is off, or its folder does not exist.
    """
    if target.exists() and not force:
        raise UsageError(f"{target} exists already; give another name, or --force to overwrite it")
    if not target.parent.is_dir():
        raise UsageError(f"{target} cannot be written: there is no folder {target.parent}")


def write_whole(target: Path, content: str | bytes, force: bool) -> None:
    """Write text or bytes to a file by way of a temporary one beside it.

    Raises
    ------
    UsageError : the file exists and ``force`` is off, or it cannot be written.
    """
    check_free(target, force)
    name = ""
    try:
        handle, name = tempfile.mkstemp(dir=target.parent, prefix=f".{target.name}-")
        with os.fdopen(handle, "wb") as out:
            out.write(content.encode("utf-8") if isinstance(content, str) else content)
        Path(name).chmod(0o644)
        os.replace(name, target)
    except OSError as error:
        if name:
            Path(name).unlink(missing_ok=True)
        raise UsageError(f"{target} cannot be written: {error.strerror or error}") from None
