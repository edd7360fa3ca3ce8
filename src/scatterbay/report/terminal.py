"""The terminal's answer to `assess`, in the order of the question."""

from __future__ import annotations

from scatterbay import __version__
from scatterbay.engine.contributions import PLANE_BOUND
from scatterbay.exposure.results import ABOVE, BELOW, CLOSE, TIME_BASES, Assessment, GoalResult, PlaceResult
from scatterbay.report.cautions import CAUTIONS, LOCAL_RULES, NOT_COVERED
from scatterbay.report.screen import STYLES, Screen
from scatterbay.report.states import show_capacities, show_states
from scatterbay.report.words import BASES, SYMBOLS, band, fraction, goal_words, made_of, spoken


def show_assessment(assessment: Assessment, screen: Screen) -> None:
    """Print the whole assessment."""
    screen.line(assessment.title, "bold")
    if assessment.drawing:
        screen.line(f"Drawing: {assessment.drawing}")
    for caution in CAUTIONS:
        screen.paragraph(caution, indent="  ", first="! ")
    screen.line()
    screen.paragraph(headline(assessment), style=STYLES.get(assessment.worst, ""))
    if assessment.rule_sets:
        screen.paragraph(
            f"{LOCAL_RULES} Goals taken from: {'; '.join(assessment.rule_sets)}.", indent="  ", first="! "
        )
    for place in assessment.places:
        screen.line()
        _show_place(place, screen)
    screen.line()
    show_capacities(assessment, screen)
    _show_closing(assessment, screen)


def headline(assessment: Assessment) -> str:
    """One sentence: what is above, what is too close to call, how many are below."""
    groups = {
        verdict: [p.name for p in assessment.places if p.verdict == verdict] for verdict in (ABOVE, CLOSE)
    }
    below = sum(p.verdict == BELOW for p in assessment.places)
    parts = [f"{verdict.upper()}: {', '.join(names)}." for verdict, names in groups.items() if names]
    count = len(assessment.places)
    if below:
        everywhere = below == count
        parts.append(
            f"BELOW every goal at {'all ' if everywhere else ''}{below} of {count} places, by this estimate."
        )
    return " ".join(parts) or "No place has a design goal: nothing was judged."


def _show_place(place: PlaceResult, screen: Screen) -> None:
    screen.line(f"{place.name}: {place.verdict}", STYLES.get(place.verdict, "") or "bold")
    at = ", ".join(f"{x:.2f}" for x in place.at)
    where = f"{place.how}; " if place.how else ""
    screen.paragraph(
        f"{where}at ({at}) m; {place.people} ({place.area} area), occupancy {place.occupancy:.3g}",
        indent="  ",
    )
    for reason in place.reasons:
        screen.paragraph(reason, indent="    ", first="  ! ")
    rows = []
    for base in TIME_BASES:
        goals = [goal for goal in place.goals if goal.figure.time_base == base]
        if not any(goal.figure.quantity == place.quantity for goal in goals):
            rows.append(_figure_row(place, base, None))
        rows += [_figure_row(place, base, goal) for goal in goals]
    headings = ["time base", "figure", "low to high", "goal", "of goal", "verdict"]
    screen.table(headings, rows, right={1, 3, 4})
    _show_paths(place, screen)
    show_states(place, screen)


def _figure_row(place: PlaceResult, base: str, goal: GoalResult | None) -> list[str]:
    figure = goal.figure if goal else place.figure(base)
    name = BASES[base]
    if figure.quantity != place.quantity:
        name += f" ({SYMBOLS[figure.quantity].removeprefix('air ')})"
    cells = [name, spoken(figure.value, base, figure.quantity), band(figure)]
    if goal is None:
        return [*cells, "", "", ""]
    return [*cells, goal_words(goal), fraction(goal), goal.verdict.removesuffix(" to call")]


def _show_paths(place: PlaceResult, screen: Screen) -> None:
    quantity = place.quantity
    parts = made_of(place)
    screen.paragraph(
        "; ".join(parts) or "nothing arrives", indent="    ", first=f"  the week's {SYMBOLS[quantity]} is "
    )
    if place.all_scatter[quantity] > 0.0:
        single, every = place.single_scatter[quantity], place.all_scatter[quantity]
        screen.paragraph(
            f"scatter: single {spoken(single, 'rate', quantity)}, all orders {spoken(every, 'rate', quantity)}",
            indent="    ", first="  ",
        )  # fmt: skip
    for share in place.paths:
        if share.bound and share.path == PLANE_BOUND:
            screen.paragraph(
                f"primary of {share.beam} if the whole barrier were lit: "
                f"{spoken(share.rate[quantity], 'rate', quantity)} (upper bound)",
                indent="    ", first="  ",
            )  # fmt: skip


def _show_closing(assessment: Assessment, screen: Screen) -> None:
    screen.line("Assumed for you", "bold")
    for assumption in assessment.assumptions:
        screen.paragraph(f"{assumption.topic}: {assumption.text}", indent="    ", first="  - ")
    screen.line()
    for text in (*NOT_COVERED, *CAUTIONS):
        screen.paragraph(text, indent="  ", first="! ")
    screen.line()
    digest = assessment.sha256[:16]
    screen.paragraph(
        f"scatterbay {__version__}; scenario {assessment.path}, SHA-256 {digest}...; seed {assessment.seed}"
    )
