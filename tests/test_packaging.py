"""The wheel holds the tracked files and nothing else, and works from there. Kind: limit."""

from __future__ import annotations

import os
import subprocess
import sys
import zipfile
from pathlib import Path

import pytest

TOP = Path(__file__).parents[1]


def tracked(*folders: str) -> set[str]:
    """Tracked files under these folders; files on disk where this is not a checkout."""
    listed = subprocess.run(
        ["git", "ls-files", "-z", *folders], cwd=TOP, capture_output=True, text=True, check=False
    ).stdout
    if listed:
        return {name for name in listed.split("\0") if name and (TOP / name).exists()}
    found = (path for folder in folders for path in (TOP / folder).rglob("*") if path.is_file())
    return {str(path.relative_to(TOP)) for path in found if "__pycache__" not in path.parts}


@pytest.fixture(scope="module")
def wheel(tmp_path_factory: pytest.TempPathFactory) -> Path:
    folder = tmp_path_factory.mktemp("wheel")
    command = [sys.executable, "-m", "build", "--wheel", "--no-isolation", "--outdir", str(folder), str(TOP)]
    done = subprocess.run(command, capture_output=True, text=True, check=False)
    assert done.returncode == 0, done.stderr
    (found,) = folder.glob("*.whl")
    return found


def test_wheel_holds_the_tracked_files(wheel: Path) -> None:
    names = {n for n in zipfile.ZipFile(wheel).namelist() if ".dist-info/" not in n}
    wanted = {name.removeprefix("src/") for name in tracked("src")}
    wanted |= {f"scatterbay/{name}" for name in tracked("data", "scenarios") if not name.endswith(".py")}
    assert names == wanted


def test_wheel_answers_away_from_the_checkout(wheel: Path, tmp_path: Path) -> None:
    """Unpacked, with this interpreter's dependencies, and the checkout nowhere on the path."""
    zipfile.ZipFile(wheel).extractall(tmp_path / "site")
    program = (
        "import scatterbay, sys; from scatterbay.resources import folder; print(scatterbay.__file__);"
        "print(len(list(folder('data').iterdir())) > 10)"
    )
    environment = {**os.environ, "PYTHONPATH": str(tmp_path / "site")}
    done = subprocess.run(
        [sys.executable, "-P", "-c", program],
        cwd=tmp_path,
        capture_output=True,
        text=True,
        check=False,
        env=environment,
    )
    assert done.returncode == 0, done.stderr
    assert done.stdout.splitlines() == [str(tmp_path / "site" / "scatterbay" / "__init__.py"), "True"]


def test_top_level_holds_only_what_was_agreed() -> None:
    agreed = {
        "pyproject.toml",
        "README.md",
        "DEVELOPERS.md",
        "SAFETY.md",
        "src",
        "data",
        "tests",
        "scenarios",
    }
    names = {name.split("/")[0] for name in tracked(".")}
    if not (TOP / ".git").exists():
        pytest.skip("not a checkout: build folders may lie here")
    assert {name for name in names if not name.startswith(".")} == agreed


def test_start_up_imports_neither_pandas_nor_scipy() -> None:
    program = (
        "import sys, io, contextlib\n"
        "from scatterbay.cli.main import run\n"
        "sys.argv = ['scatterbay', 'assess', 'scenarios/weld-bay.yaml']\n"
        "with contextlib.redirect_stdout(io.StringIO()), contextlib.suppress(SystemExit):\n"
        "    run()\n"
        "print(sorted({m.split('.')[0] for m in sys.modules} & {'pandas', 'scipy', 'matplotlib'}))\n"
    )
    done = subprocess.run(
        [sys.executable, "-c", program], cwd=TOP, capture_output=True, text=True, check=False
    )
    assert done.stdout.strip() == "[]", done.stderr
