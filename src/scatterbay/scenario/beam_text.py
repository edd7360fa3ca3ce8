"""Beams named in a text, as commands take them: ``X-ray 150 kV, aluminium 3 mm``, ``Ir-192``, ``662 keV``."""

from __future__ import annotations

import re
from collections.abc import Collection
from dataclasses import dataclass

from scatterbay.scenario.known import nuclide_names
from scatterbay.scenario.make_ups import filtration
from scatterbay.scenario.parts import MakeUp
from scatterbay.units import TextError, nearest, read

_TUBE = re.compile(r"(?:x-ray\s+)?(?P<voltage>[^,]*kV)\s*(?:,\s*(?P<filters>.*))?", re.IGNORECASE | re.DOTALL)
_ENERGY = re.compile(r"[-+]?[.\d].*[kM]eV", re.DOTALL)

FORMS = "'X-ray 150 kV, aluminium 3 mm', 'Ir-192' or '662 keV'"


@dataclass(frozen=True)
class NamedBeam:
    """What a text names: a tube (voltage [kV] and filtration), a nuclide, or photons of one energy [keV]."""

    text: str
    voltage: float | None = None
    filtration: MakeUp | None = None
    nuclide: str | None = None
    energy_kev: float | None = None


def named_beam(text: str, materials: Collection[str] = ()) -> NamedBeam:
    """The beam that a text names.

    Raises
    ------
    TextError : none of the forms, an unknown nuclide or material, or a tube without filtration.
    """
    stripped = text.strip()
    if stripped in nuclide_names():
        return NamedBeam(stripped, nuclide=stripped)
    tube = _TUBE.fullmatch(stripped)
    if tube:
        return _tube(stripped, tube, materials)
    if _ENERGY.fullmatch(stripped):
        return NamedBeam(stripped, energy_kev=read(stripped, "energy").value)
    near = nearest(stripped, nuclide_names())
    hint = f"did you mean '{near}'? " if near else ""
    raise TextError(f"'{text}' names no beam", f"{hint}write {FORMS}; nuclides: {', '.join(nuclide_names())}")


def _tube(text: str, match: re.Match[str], materials: Collection[str]) -> NamedBeam:
    voltage = read(match["voltage"], "voltage").value
    filters = (match["filters"] or "").strip()
    if not filters:
        raise TextError(
            f"'{text}' has no filtration",
            f"add what the beam passes, as '{text}, aluminium 3 mm': none is assumed",
        )
    try:
        found = filtration(filters, materials)
    except TextError as problem:
        raise problem.moved(match.start("filters")) from None
    return NamedBeam(text, voltage=voltage, filtration=found)
