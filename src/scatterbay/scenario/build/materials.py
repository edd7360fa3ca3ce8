"""Materials that a scenario defines."""

from __future__ import annotations

import re

from scatterbay.scenario import parts
from scatterbay.scenario.build.findings import Findings, usable
from scatterbay.scenario.known import other_names, shipped_names
from scatterbay.scenario.model.document import Document

_NAME = re.compile(r"[^\W\d_][^+]*")
_PER_G_CM3 = 1000.0


def build_materials(document: Document, findings: Findings) -> tuple[parts.MaterialDefinition, ...]:
    """Every material with a composition and a name of its own."""
    taken = (*shipped_names(), *other_names())
    found = []
    for name, entry in usable(document.materials).items():
        path = ("materials", name)
        if name in taken:
            message = f"'{name}' is already known"
            findings.wrong(path, message, "give yours a name of its own", on_key=True)
        if not _NAME.fullmatch(name) or name == "open":
            message = f"'{name}' cannot name a material"
            findings.wrong(path, message, "start with a letter and do without '+'", on_key=True)
        if (entry.mass_fractions is None) == (entry.formula is None):
            said = "both mass fractions and a formula are given" if entry.formula else "it has no composition"
            findings.wrong(
                path, said, "give 'mass fractions: {Ca: 0.4, ...}' or 'formula: CaWO4'", on_key=True
            )
            continue
        fractions = entry.mass_fractions or entry.formula or {}
        total = sum(fractions.values())
        if abs(total - 1.0) > 1e-9:
            findings.assume("materials", f"Mass fractions adding up to {total:.4f} scaled to 1", name)
        scaled = {symbol: part / total for symbol, part in fractions.items()}
        found.append(parts.MaterialDefinition(name, scaled, round(entry.density.value / _PER_G_CM3, 9)))
    return tuple(found)
