"""A real browser for the worksheet's tests: Debian's chromium, headless."""

from __future__ import annotations

import os
import shutil
import subprocess
from pathlib import Path

import pytest

FLAGS = (
    "--headless",
    "--no-sandbox",
    "--disable-gpu",
    "--disable-quic",
    "--no-first-run",
    "--disable-background-networking",
    "--disable-component-update",
    "--disable-sync",
    "--hide-scrollbars",
    "--host-resolver-rules=MAP * ~NOTFOUND",
    "--enable-logging=stderr",
    "--virtual-time-budget=4000",
)

PROBE = """<script>
addEventListener("load", () => parent.postMessage(
  document.documentElement.scrollWidth + " " + innerWidth + " " + document.querySelectorAll("svg").length, "*"));
</script></body>"""
FRAME = """<!doctype html><body><iframe src="{page}" style="width:{width}px;height:900px;border:0"></iframe>
<script>addEventListener("message", (event) => document.body.setAttribute("data-told", event.data));</script>"""


def chromium() -> str:
    """The browser; without one the test is skipped, or fails where the environment requires it."""
    found = shutil.which("chromium")
    if found is None:
        assert os.environ.get("SCATTERBAY_BROWSER") != "required", "a browser is required and there is none"
        pytest.skip("no chromium here: the worksheet is not opened in a browser")
    return found


def run(folder: Path, *arguments: str) -> subprocess.CompletedProcess[str]:
    """The browser with these arguments, and a fresh profile in a folder."""
    command = [chromium(), *FLAGS, f"--user-data-dir={folder / 'profile'}", *arguments]
    done = subprocess.run(command, capture_output=True, text=True, timeout=120, check=False)
    assert done.returncode == 0, done.stderr[-2000:]
    return done


def measured(folder: Path, page: str, width: int) -> tuple[int, int, int]:
    """Width of the page's content, of its window, and the number of drawings, in a window this wide [px]."""
    inner = folder / f"inner-{width}.html"
    inner.write_text(page.replace("</body>", PROBE), encoding="utf-8")
    outer = folder / f"outer-{width}.html"
    outer.write_text(FRAME.format(page=inner.as_uri(), width=width), encoding="utf-8")
    done = run(folder, "--dump-dom", outer.as_uri())
    told = done.stdout.split('data-told="')[1].split('"')[0]
    content, window, drawings = (int(part) for part in told.split())
    return content, window, drawings
