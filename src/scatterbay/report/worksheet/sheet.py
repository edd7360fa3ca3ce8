"""Builds the worksheet from an assessment and what goes with it."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from importlib.resources import files
from typing import Any

from jinja2 import Environment, StrictUndefined

from scatterbay import __version__
from scatterbay.advice.barrier_facts import BarrierFacts
from scatterbay.advice.checklist import checklist
from scatterbay.advice.hand_check import Chain
from scatterbay.advice.whole import Advice
from scatterbay.exposure.results import TIME_BASES, Assessment, Figure, GoalResult, PlaceResult
from scatterbay.physics import dose
from scatterbay.report.cautions import CAUTIONS, LOCAL_RULES, NOT_COVERED
from scatterbay.report.states import capacity_sentence, state_sentences
from scatterbay.report.wall import remedy_sentences
from scatterbay.report.words import BASES, SYMBOLS, band, fraction, goal_words, made_of, spoken
from scatterbay.scenario.parts import Scenario, SealedSource, Source, XrayTube
from scatterbay.units import format_quantity, significant


@dataclass(frozen=True)
class Paper:
    """Everything a worksheet is made of. ``advice`` may be left out; ``plan`` is a drawing as SVG text."""

    scenario: Scenario
    assessment: Assessment
    barriers: Sequence[BarrierFacts]
    plan: str
    tables: Sequence[tuple[str, str]]
    chains: Sequence[Chain] = ()
    advice: Advice | None = None


def worksheet(paper: Paper) -> str:
    """The worksheet as HTML, the same bytes for the same input."""
    scenario = paper.scenario
    here = files("scatterbay.report.worksheet")
    environment = Environment(
        autoescape=True, undefined=StrictUndefined, trim_blocks=True, lstrip_blocks=True
    )
    template = environment.from_string((here / "page.html.jinja").read_text(encoding="utf-8"))
    return template.render(
        style=(here / "style.css").read_text(encoding="utf-8"),
        scenario=scenario,
        assessment=paper.assessment,
        version=__version__,
        cautions=CAUTIONS,
        not_covered=NOT_COVERED,
        local_rules=LOCAL_RULES,
        plan=_inline(paper.plan),
        document=scenario.document,
        barriers=[_barrier(one) for one in paper.barriers],
        sources=[_source(one) for one in scenario.sources],
        beams=[_beam(scenario, k) for k in range(len(scenario.beams))],
        places=[
            {**_place(one), "chains": [_chain(c) for c in paper.chains if c.place == one.name]}
            for one in paper.assessment.places
        ],
        capacities=[capacity_sentence(one) for one in paper.assessment.capacities],
        advice=[_advice(one) for one in paper.advice.surfaces] if paper.advice else None,
        checklist=checklist(scenario),
        tables=paper.tables,
    )


def _inline(svg: str) -> str:
    """The drawing without its XML head, to stand in a page."""
    return svg[svg.index("<svg") :]


def _barrier(one: BarrierFacts) -> dict[str, Any]:
    return {
        "name": one.name,
        "kind": one.kind,
        "make_up": one.make_up,
        "counted": significant(one.counted_mm, 4),
        "passed": [f"{p.source}, {p.what}: {p.share:.1e}" for p in one.passed],
    }


def _source(source: Source) -> dict[str, str]:
    if isinstance(source, XrayTube):
        output = source.output.text if source.output else "model"
        leak = source.leakage.rate.text if source.leakage else "none counted"
        tube = f"{source.voltage.text}; {source.current.text}; {source.filtration.text}"
        rows = f"{tube}; output {output}; leakage {leak}"
        return {"name": source.name, "kind": "X-ray tube", "facts": rows}
    return {"name": source.name, "kind": "sealed source", "facts": _sealed(source)}


def _sealed(source: SealedSource) -> str:
    facts = [source.nuclide, source.activity.text]
    facts += [f"on {source.activity_date}"] if source.activity_date else []
    facts += [f"exchanged every {source.exchange_days:g} d"] if source.exchange_days else []
    facts += [f"container {source.container.how}"] if source.container else []
    facts += [f"travels at {source.travel.speed.text}"] if source.travel else []
    return "; ".join(facts)


def _beam(scenario: Scenario, number: int) -> dict[str, str]:
    beam = scenario.beams[number]
    load = next(one for one in scenario.workloads if one.beam == beam.name)
    if load.area_product is not None:
        week, hour = (f"{1e4 * x:.3g} Gy cm2" for x in load.area_product[:2])
    else:
        week, hour = (
            format_quantity(x, "time", digits=3) for x in (load.seconds_per_week, load.seconds_in_worst_hour)
        )
    if load.cycles is not None:
        week, hour = f"{week} in {load.cycles[0]:g} cycles", f"{hour} in {load.cycles[1]:g} cycles"
    return {
        "name": beam.name,
        "source": beam.source,
        "at": ", ".join(f"{x:.2f}" for x in beam.at),
        "aim": ", ".join(f"{x:.2f}" for x in beam.aim),
        "field": beam.field.text,
        "use": significant(beam.use_factor, 3),
        "week": week,
        "hour": hour,
        "weeks": f"{load.weeks_per_year:g}",
    }


def _place(place: PlaceResult) -> dict[str, Any]:
    rows = []
    for base in TIME_BASES:
        goals = [goal for goal in place.goals if goal.figure.time_base == base]
        if not any(goal.figure.quantity == place.quantity for goal in goals):
            rows.append(_row(place, place.figure(base), None))
        rows += [_row(place, goal.figure, goal) for goal in goals]
    return {
        "name": place.name,
        "how": place.how,
        "at": ", ".join(f"{x:.2f}" for x in place.at),
        "people": place.people,
        "area": place.area,
        "occupancy": significant(place.occupancy, 3),
        "verdict": place.verdict,
        "reasons": place.reasons,
        "quantity": SYMBOLS[place.quantity],
        "rows": rows,
        "made_of": made_of(place),
        "states": state_sentences(place),
        "single": spoken(place.single_scatter[place.quantity], "rate", place.quantity),
        "every": spoken(place.all_scatter[place.quantity], "rate", place.quantity),
        "survey": spoken(place.figure("rate").value, "rate", place.quantity),
    }


def _chain(chain: Chain) -> dict[str, Any]:
    """A chain of factors, its first in air kerma per hour and its product in the place's own unit per hour."""
    steps = []
    for number, step in enumerate(chain.steps):
        scale, unit = (3600e6, "uGy/h") if number == 0 else (1.0, step.unit)
        steps.append(
            {
                "what": step.what,
                "factor": f"{scale * step.factor:.4g}",
                "unit": unit,
                "rests_on": step.rests_on,
            }
        )
    return {
        "title": f"{chain.path}, {chain.beam}",
        "facts": "; ".join(chain.facts),
        "steps": steps,
        "product": f"{3600e6 * chain.product:.4g} u{dose.UNITS[chain.quantity]}/h",
    }


def _row(place: PlaceResult, figure: Figure, goal: GoalResult | None) -> dict[str, str]:
    name = BASES[figure.time_base]
    if figure.quantity != place.quantity:
        name += f" ({SYMBOLS[figure.quantity]})"
    return {
        "base": name,
        "figure": spoken(figure.value, figure.time_base, figure.quantity),
        "band": band(figure),
        "goal": goal_words(goal) if goal else "",
        "share": fraction(goal) if goal else "",
        "verdict": goal.verdict if goal else "",
    }


def _advice(one: Any) -> dict[str, Any]:
    return {
        "surface": one.scan.surface.host,
        "worst": significant(one.scan.worst.ratio, 3),
        "missed": one.missed,
        "sentences": [sentence for remedy in one.remedies for sentence in remedy_sentences(remedy)],
    }
