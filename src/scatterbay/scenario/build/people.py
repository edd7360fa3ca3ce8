"""Groups of people and their design goals."""

from __future__ import annotations

from scatterbay.scenario import parts
from scatterbay.scenario.build.findings import Findings, usable
from scatterbay.scenario.model import use as written
from scatterbay.scenario.model.document import Document

_Key = tuple[str, str]


def build_people(document: Document, findings: Findings) -> tuple[parts.People, ...]:
    """Every group, with no two goals for the same thing."""
    found = []
    for name, entry in usable(document.people).items():
        own = _own(name, entry, findings)
        if entry.goals is None and entry.rules is None:
            hint = "give 'goals: [6 mSv/year]', or 'rules: \"NCRP 147: controlled area\"'"
            findings.wrong(("people", name), "'goals' is missing", hint, on_key=True)
        _check_area(name, entry, document, findings)
        goals = (*own.values(), *_from_rules(name, entry, own, findings).values())
        found.append(parts.People(name, entry.area or "", goals))
    return tuple(found)


def _own(name: str, entry: written.People, findings: Findings) -> dict[_Key, parts.Goal]:
    """Goals that the author states."""
    seen: dict[_Key, parts.Goal] = {}
    for i, goal in enumerate(entry.goals or ()):
        same = (goal.time_base, goal.quantity)
        if same in seen:
            message = (
                f"'{goal.text}' and '{seen[same].text}' are both goals for the same time base and quantity"
            )
            findings.wrong(("people", name, "goals", i), message, "keep the lower one")
        seen[same] = goal
    return seen


def _from_rules(
    name: str, entry: written.People, own: dict[_Key, parts.Goal], findings: Findings
) -> dict[_Key, parts.Goal]:
    """Goals of rule sets that the author's own do not replace; of two for the same thing the lower one."""
    found: dict[_Key, parts.Goal] = {}
    for text, goals in entry.rules or ():
        findings.assume(
            "rules", f"Goals of {text} taken from the rule sets shipped here, recalled: check them", name
        )
        for goal in goals:
            same = (goal.time_base, goal.quantity)
            if same in own:
                findings.assume(
                    "rules", f"'{own[same].text}' is judged instead of '{goal.text}' of {text}", name
                )
                continue
            if same in found:
                lower = min(goal, found[same], key=lambda one: one.value)
                findings.assume("rules", f"'{lower.text}' is kept as the lower of two goals from rules", name)
                goal = lower
            found[same] = goal
    return found


def _check_area(name: str, entry: written.People, document: Document, findings: Findings) -> None:
    """A group without an area needs one at each of its places."""
    if entry.area is not None:
        return
    places = [place for place in usable(document.places).values() if place.people == name]
    if not places or any(place.area is None for place in places):
        hint = "controlled, supervised or public: of the group, or of each of its places"
        findings.wrong(("people", name), "'area' is missing", hint, on_key=True)
