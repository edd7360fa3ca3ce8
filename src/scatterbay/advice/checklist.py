"""The plan-review checklist: each item found in the scenario, or marked missing."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

from scatterbay.scenario.parts import Scenario, SealedSource, XrayTube
from scatterbay.tables.checklist import review_items


@dataclass(frozen=True)
class Checked:
    """An item, who asks for it, and what was found; nothing found stands for missing."""

    item: str
    asked_by: str
    found: str


def checklist(scenario: Scenario) -> list[Checked]:
    """Every item of the plan review against a scenario."""
    return [Checked(one.item, one.asked_by, _LOOKS[one.key](scenario)) for one in review_items()]


def _stated(*words: str) -> Callable[[Scenario], str]:
    """What the author states under a subject that holds one of these words."""

    def look(scenario: Scenario) -> str:
        return "; ".join(
            f"{subject}: {text}"
            for subject, text in scenario.stated
            if any(word in subject.lower() for word in words)
        )

    return look


def _sources(scenario: Scenario) -> str:
    said = []
    for source in scenario.sources:
        if isinstance(source, XrayTube):
            said.append(f"{source.name}: {source.voltage.text}, {source.current.text}")
        else:
            said.append(f"{source.name}: {source.nuclide} {source.activity.text}")
    return "; ".join(said)


def _above_below(scenario: Scenario) -> str:
    room = scenario.room
    above = [place.name for place in scenario.places if place.at[2] > room.height]
    below = [place.name for place in scenario.places if place.at[2] < 0.0]
    lies = "floor on the ground" if room.floor_on_ground else f"below: {', '.join(below) or 'nobody stated'}"
    return (
        f"above: {', '.join(above) or 'nobody stated'}; {lies}"
        if above or below or room.floor_on_ground
        else ""
    )


def _places(scenario: Scenario, *words: str) -> str:
    return ", ".join(p.name for p in scenario.places if any(word in p.name.lower() for word in words))


def _outside(scenario: Scenario) -> str:
    return "; ".join(f"{place.name}: {place.how}" for place in scenario.places if place.how.endswith("up"))


def _storage(scenario: Scenario) -> str:
    kept = [s.name for s in scenario.sources if isinstance(s, SealedSource) and s.container is not None]
    sealed = any(isinstance(s, SealedSource) for s in scenario.sources)
    return ", ".join(f"container of {name}" for name in kept) or ("" if sealed else "no sealed source")


_LOOKS: dict[str, Callable[[Scenario], str]] = {
    "drawing": lambda s: s.drawing,
    "dimensions": lambda s: (
        f"{len(s.room.corners)} corners, height {s.room.height:g} m; {len(s.beams)} source positions"
    ),
    "directions": lambda s: "; ".join(
        f"{b.name}: aimed at {', '.join(f'{x:.2f}' for x in b.aim)} m" for b in s.beams
    ),
    "openings": lambda s: "; ".join(f"{o.name}: {o.make_up.text}" for o in s.room.openings),
    "control": lambda s: _places(s, "control", "console", "crank", "desk", "operator", "booth"),
    "make_ups": lambda s: (
        f"{len(s.room.sides)} sides, ceiling, floor, {len(s.room.panels)} panels, in section 3"
    ),
    "above_below": _above_below,
    "adjacent": lambda s: "; ".join(f"{p.name}: {p.people}, {p.occupancy:.3g}" for p in s.places),
    "outside": _outside,
    "equipment": _sources,
    "kinds": lambda s: s.purpose or "; ".join(b.name for b in s.beams),
    "workload": lambda s: f"{len(s.workloads)} workloads, in section 4",
    "assumptions": lambda s: "in section 9",
    "goals": lambda s: "; ".join(f"{g.name}: {', '.join(goal.text for goal in g.goals)}" for g in s.people),
    "interlocks": _stated("interlock", "emergency", "search"),
    "signals": _stated("signal", "notice", "warning"),
    "penetrations": _stated("penetration", "duct", "cable", "sleeve"),
    "roof": _stated("roof"),
    "storage": _storage,
    "survey": lambda s: (
        "; ".join(x.survey_date or "" for x in s.sources if isinstance(x, SealedSource) and x.survey_date)
        or _stated("survey")(s)
    ),
}
