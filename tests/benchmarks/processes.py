"""Whole processes: wall time and peak memory, medians of several runs."""

from __future__ import annotations

import os
import resource
import statistics
import subprocess
import sys
import time
from dataclasses import dataclass

FLOOR = (sys.executable, "-c", "import numpy, yaml, pydantic, typer, rich.table")


@dataclass(frozen=True)
class Timing:
    """Median wall time [s] and largest peak memory [MB]."""

    seconds: float
    megabytes: float


def timed(command: tuple[str, ...], runs: int = 5, **environment: str) -> Timing:
    """Run a command several times after a warm-up."""
    seconds, memory = [], []
    for run in range(runs + 1):
        start = time.perf_counter()
        process = subprocess.Popen(command, stdout=subprocess.DEVNULL, env={**os.environ, **environment})
        _, _, usage = os.wait4(process.pid, 0)
        if run:
            seconds.append(time.perf_counter() - start)
            memory.append(usage.ru_maxrss / 1024.0)
    return Timing(statistics.median(seconds), max(memory))


def own_peak() -> float:
    """Peak memory of this process [MB]."""
    return resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / 1024.0


def scatterbay(*arguments: str) -> tuple[str, ...]:
    """The command line of this interpreter's installation."""
    return (sys.executable, "-m", "scatterbay", *arguments)
