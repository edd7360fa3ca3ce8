"""What is said of exposure cycles, stuck sources, survey days and capacity."""

from __future__ import annotations

import math

from scatterbay.exposure.results import Assessment, Capacity, Overridden, PlaceResult
from scatterbay.exposure.timebases import DAY
from scatterbay.report.screen import Screen
from scatterbay.report.words import BASES, SYMBOLS, band, spoken
from scatterbay.units import format_quantity, significant


def show_states(place: PlaceResult, screen: Screen) -> None:
    """Doses per exposure cycle, per working day, if stuck, and the rate on the day of a survey."""
    for sentence in state_sentences(place):
        screen.paragraph(sentence, indent="    ", first="  ")


def state_sentences(place: PlaceResult) -> list[str]:
    """The same as sentences."""
    quantity = place.quantity

    def said(value: float) -> str:
        return spoken(value, "hour", quantity)

    found = [override_sentence(one) for one in place.overridden]
    for cycle in place.cycles:
        whole = said(cycle.exposed[quantity] + cycle.passes[quantity])
        long = format_quantity(cycle.seconds, "time")
        found.append(
            f"one cycle of {cycle.beam} ({long}): {whole}, of it {said(cycle.passes[quantity])} on the way out and back"
        )
    if place.cycles:
        day = said(DAY * place.figure("day").value)
        found.append(f"one working day of 8 h here, without occupancy: {day}, the stored source included")
    for stuck in place.stuck:
        long = format_quantity(stuck.seconds, "time")
        found.append(
            f"if {stuck.source} is stuck for {long}: {said(stuck.dose[quantity])} more (in no other figure)"
        )
    if place.survey_rate is not None:
        rate = spoken(place.survey_rate[quantity], "rate", quantity)
        found.append(
            f"highest rate on the day of the survey: {rate} {SYMBOLS[quantity]}, scatter in the room left out"
        )
    return found


def override_sentence(one: Overridden) -> str:
    """A figure that a reviewer replaced, both values shown."""
    base, quantity = one.figure.time_base, one.figure.quantity
    mine, ours = (spoken(figure.value, base, quantity) for figure in (one.figure, one.computed))
    return (
        f"{BASES[base]}: {mine} by {one.by} ({one.why}) instead of {ours} as computed, {band(one.computed)}"
    )


def show_capacities(assessment: Assessment, screen: Screen) -> None:
    """The greatest weekly workloads, and what limits them."""
    if not any(
        goal.figure.time_base in ("week", "year") for place in assessment.places for goal in place.goals
    ):
        return
    screen.line("Capacity: the greatest weekly workload that keeps every weekly and annual goal", "bold")
    for one in assessment.capacities:
        screen.paragraph(capacity_sentence(one), indent="    ", first="  - ")
    if assessment.left_out_of_capacity:
        names = ", ".join(assessment.left_out_of_capacity)
        screen.paragraph(
            f"Left out, as nothing there can be called below a goal: {names}.", indent="    ", first="  ! "
        )
    screen.paragraph(
        "By the upper end of each band. Goals for a rate, an hour or 8 h do not depend on it and are judged above.",
        indent="    ", first="    ",
    )  # fmt: skip
    screen.line()


def capacity_sentence(one: Capacity) -> str:
    """One capacity in words."""
    name = f"{one.beam}, the rest as stated" if one.beam else "all beams together"
    if math.isinf(one.factor):
        return f"{name}: no weekly or annual goal limits it"
    limit = f"limited by {one.place} ({one.goal})"
    if one.factor == 0.0:
        return f"{name}: none; {limit} without it"
    if not one.beam:
        return f"{name}: {significant(one.factor)} times the stated workload; {limit}"
    most = f"{significant(one.factor * one.stated)} {one.unit}"
    return f"{name}: {most} ({significant(one.stated)} stated); {limit}"
