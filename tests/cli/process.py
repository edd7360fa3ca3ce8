"""Runs the command line as a process, as a person would."""

from __future__ import annotations

import os
import subprocess
import sys
from pathlib import Path

TOP = Path(__file__).parents[2]


def run(*arguments: str, cwd: Path | None = None, **environment: str) -> subprocess.CompletedProcess[str]:
    """Run ``scatterbay`` with these arguments; output as text."""
    return subprocess.run(
        [sys.executable, "-m", "scatterbay", *arguments],
        cwd=cwd or TOP, capture_output=True, text=True, check=False, env={**os.environ, **environment},
    )  # fmt: skip
