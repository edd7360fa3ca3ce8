"""The program's entry: commands, exit codes, and what happens when something goes wrong."""

from __future__ import annotations

import os
import sys
from typing import NoReturn

os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")
os.environ.setdefault("OMP_NUM_THREADS", "1")

OUR_FAULT = 70


def run() -> NoReturn:
    """Run the command line and exit: 0 below, 1 not below, 2 bad input, 3 outside the model, 70 our fault."""
    if sys.argv[1:] == ["--version"]:  # asked often, by scripts: answered without the commands
        from scatterbay import __version__

        sys.stdout.write(f"scatterbay {__version__}\n")
        sys.exit(0)
    from scatterbay.errors import ScatterbayError

    try:
        from scatterbay.cli.app import app

        code = app(standalone_mode=False)
    except ScatterbayError as error:
        _complain(str(error))
        sys.exit(error.exit_code)
    except BrokenPipeError:
        sys.stderr.close()
        sys.exit(0)
    except Exception as error:
        sys.exit(_usage_or_fault(error))
    sys.exit(code if isinstance(code, int) else 0)


def _usage_or_fault(error: Exception) -> int:
    """Typer's own complaints about usage, or a fault of ours with the way to report it."""
    show = getattr(error, "show", None)
    if callable(show):
        show()
        return 2
    if type(error).__name__ in ("Abort", "Exit"):
        return int(getattr(error, "exit_code", 1))
    import traceback

    traceback.print_exc()
    _complain(
        "This is a fault in scatterbay, not in your input. Please report it with the lines above, the command and "
        "the scenario file (leave out anything confidential). Nothing printed by this run should be used."
    )
    return OUR_FAULT


def _complain(text: str) -> None:
    sys.stderr.write(f"scatterbay: {text}\n" if not text.startswith("scatterbay") else f"{text}\n")
