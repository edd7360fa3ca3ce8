"""K-shell fluorescence of the elements from Z = 40 up."""

from __future__ import annotations

from functools import cache
from typing import NamedTuple

from scatterbay.tables.files import read_table

LOWEST_Z = 40
GROUPS = ("ka2", "ka1", "kb1", "kb2")


class KShell(NamedTuple):
    """Fluorescence yield, and the groups of K lines as energies and shares that sum to 1."""

    fluorescence_yield: float
    energies_kev: tuple[float, ...]
    shares: tuple[float, ...]


@cache
def k_shell(z: int) -> KShell | None:
    """K-shell data of the element z, or None below Z = 40, where the K lines are under 16 keV."""
    return _all().get(z)


@cache
def _all() -> dict[int, KShell]:
    columns = ("z", "yield", *(name for group in GROUPS for name in (f"{group}_kev", group)))
    table = read_table("k-shell.csv", columns)
    energies = zip(*(table.numbers(f"{group}_kev") for group in GROUPS), strict=True)
    shares = zip(*(table.numbers(group) for group in GROUPS), strict=True)
    rows = zip(table.numbers("z"), table.numbers("yield"), energies, shares, strict=True)
    return {int(z): KShell(value, line, share) for z, value, line, share in rows}
