"""Whatever is written, the answer is a scenario or a foreseen refusal; and importing costs little."""

from __future__ import annotations

import re
import subprocess
import sys

from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from scatterbay.errors import ScenarioError
from scatterbay.scenario import loads
from tests.scenario.edits import BASE

PIECES = re.findall(r"[\w.]+|\s+|.", BASE)
ODD = [
    "",
    "0",
    "-1",
    "1e9",
    ".nan",
    "null",
    "[]",
    "{}",
    "{a: 1}",
    "[1, 2]",
    "true",
    "*a",
    "&a ",
    "!!x ",
    "'",
    '"',
]
ODD += [
    ":",
    ",",
    "[",
    "]",
    "{",
    "}",
    "#",
    "\t",
    "\n",
    "é",
    "٣",
    "%",
    "~",
    "- ",
    "? ",
    "|",
    "lead 2 mm",
    "all round",
]

changes = st.lists(
    st.tuples(st.integers(0, len(PIECES) - 1), st.sampled_from([*ODD, *sorted(set(PIECES))])),
    min_size=1,
    max_size=4,
)


@settings(max_examples=150, deadline=None, suppress_health_check=[HealthCheck.too_slow])
@given(changes)
def test_a_file_with_slips_is_read_or_refused_with_places(slips: list[tuple[int, str]]) -> None:
    pieces = list(PIECES)
    for at, piece in slips:
        pieces[at] = piece
    try:
        loads("".join(pieces))
    except ScenarioError as error:
        problems = error.problems
    else:
        return
    assert problems
    assert all(problem.message and problem.line and problem.column for problem in problems)


@settings(max_examples=50, deadline=None)
@given(st.text(max_size=60))
def test_any_text_at_all(text: str) -> None:
    try:
        loads(text)
    except ScenarioError as error:
        problems = error.problems
    assert problems


def test_importing_the_room_imports_nothing_heavy() -> None:
    code = (
        "import sys, scatterbay.scenario, scatterbay.units\n"
        "heavy = {'pandas', 'scipy', 'numpy', 'pydantic', 'yaml'}\n"
        "print(*{name.split('.')[0] for name in sys.modules} & heavy)"
    )
    run = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert run.stdout.strip() == ""


def test_loading_needs_neither_pandas_nor_scipy() -> None:
    code = (
        "import sys\nfrom scatterbay.scenario import loads\nloads(sys.stdin.read())\n"
        "print(*{name.split('.')[0] for name in sys.modules} & {'pandas', 'scipy'})"
    )
    run = subprocess.run([sys.executable, "-c", code], input=BASE, capture_output=True, text=True, check=True)
    assert run.stdout.strip() == ""
