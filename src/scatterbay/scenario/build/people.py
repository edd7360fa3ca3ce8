"""Groups of people and their design goals."""

from __future__ import annotations

from scatterbay.scenario import parts
from scatterbay.scenario.build.findings import Findings, usable
from scatterbay.scenario.model.document import Document


def build_people(document: Document, findings: Findings) -> tuple[parts.People, ...]:
    """Every group, with no two goals for the same thing."""
    found = []
    for name, entry in usable(document.people).items():
        seen: dict[tuple[str, str], str] = {}
        for i, goal in enumerate(entry.goals):
            same = (goal.time_base, goal.quantity)
            if same in seen:
                message = (
                    f"'{goal.text}' and '{seen[same]}' are both goals for the same time base and quantity"
                )
                findings.wrong(("people", name, "goals", i), message, "keep the lower one")
            seen[same] = goal.text
        found.append(parts.People(name, entry.area, entry.goals))
    return tuple(found)
