"""What `compare` prints."""

from __future__ import annotations

from typing import Any

from scatterbay import __version__
from scatterbay.advice.comparison import Comparison, Option
from scatterbay.exposure.results import GoalResult
from scatterbay.report.cautions import CAUTIONS, NOT_COVERED
from scatterbay.report.records import FORMAT
from scatterbay.report.screen import Screen
from scatterbay.report.words import BASES, goal_words, in_unit, spoken, unit
from scatterbay.units import significant

LETTERS = "ABCDEFGHIJKLMNOPQRSTUVWXYZ"
LONGEST = 44
MOST_CHANGES = 20
"""Changes of an option that are listed before the rest is counted."""


def show_comparison(found: Comparison, screen: Screen) -> None:
    """Options by letter: their files, their changes, each place, and which meet all goals."""
    screen.line("Scenarios side by side", "bold")
    for caution in CAUTIONS:
        screen.paragraph(caution, indent="  ", first="! ")
    screen.line()
    base = found.options[0]
    rows = [
        [LETTERS[k], _short(one.scenario.title, 34), _short(one.scenario.path, 30), _added(one, base),
         "all goals kept" if one.meets_all else one.assessment.worst]
        for k, one in enumerate(found.options)
    ]  # fmt: skip
    screen.table(["", "title", "file", "walls weigh", "by this estimate"], rows, right={3})
    for k, one in enumerate(found.options[1:], start=1):
        screen.line()
        _show_changes(k, one, screen)
    screen.line()
    _show_places(found, screen)
    screen.line()
    keeping = [LETTERS[k] for k, one in enumerate(found.options) if one.meets_all]
    said = (
        f"{', '.join(keeping)}: below every goal at every place." if keeping else "None is below every goal."
    )
    screen.paragraph(said, style="bold")
    screen.line()
    for text in (*NOT_COVERED, *CAUTIONS):
        screen.paragraph(text, indent="  ", first="! ")
    screen.line()
    screen.paragraph(f"scatterbay {__version__}; SHA-256 {'; '.join(_digests(found))}")


def _digests(found: Comparison) -> list[str]:
    return [f"{LETTERS[k]} {one.scenario.sha256[:12]}..." for k, one in enumerate(found.options)]


def _added(one: Option, base: Option) -> str:
    if one is base:
        return f"{significant(one.mass, 3)} kg"
    more = one.mass - base.mass
    return "the same" if abs(more) < 0.5 else f"{'+' if more > 0 else '-'}{significant(abs(more), 3)} kg"


def _show_changes(k: int, one: Option, screen: Screen) -> None:
    screen.line(f"{LETTERS[k]} against A", "bold")
    if not one.changes:
        screen.paragraph("no value differs", indent="  ")
    for change in one.changes[:MOST_CHANGES]:
        before, after = (_short(text, LONGEST) or "nothing" for text in (change.before, change.after))
        screen.paragraph(f"{change.where}: {before} -> {after}", indent="    ", first="  - ")
    if len(one.changes) > MOST_CHANGES:
        screen.paragraph(f"and {len(one.changes) - MOST_CHANGES} more values", indent="  ")


def _show_places(found: Comparison, screen: Screen) -> None:
    """Per place the figure that comes nearest to its goal, in each option."""
    letters = LETTERS[: len(found.options)]
    headings = ["place", "nearest to its goal", *(f"{letter}, of goal" for letter in letters), "verdicts"]
    rows = []
    for row in found.places:
        first = next((goal for goal in row.goals if goal is not None), None)
        cells = [row.place, _named(first)]
        cells += ["-" if goal is None else _upper(goal) for goal in row.goals]
        rows.append([*cells, ", ".join(verdict.removesuffix(" to call") for verdict in row.verdicts)])
    screen.table(headings, rows, right=set(range(2, 2 + len(letters))))
    screen.paragraph(
        "Of goal: the upper end of the figure's band over the goal that it comes nearest to.", indent="  "
    )


def _named(goal: GoalResult | None) -> str:
    return "" if goal is None else f"{BASES[goal.figure.time_base]}, {goal_words(goal)}"


def _upper(goal: GoalResult) -> str:
    share = goal.figure.high / goal.goal
    return "< 0.001" if share < 1e-3 else significant(share)


def _short(text: str, most: int) -> str:
    return text if len(text) <= most else "..." + text[3 - most :]


def comparison_record(found: Comparison) -> dict[str, Any]:
    """The comparison for JSON."""
    return {
        "format": FORMAT,
        "program": f"scatterbay {__version__}",
        "cautions": list(CAUTIONS),
        "options": [
            {
                "title": one.scenario.title,
                "path": one.scenario.path,
                "sha256": one.scenario.sha256,
                "verdict": one.assessment.worst,
                "meets_all_goals": one.meets_all,
                "wall_mass": {"value": one.mass, "unit": "kg"},
                "changes": [{"where": c.where, "before": c.before, "after": c.after} for c in one.changes],
            }
            for one in found.options
        ],
        "places": comparison_rows(found),
    }


def comparison_rows(found: Comparison) -> list[dict[str, Any]]:
    """A row per place and option, for CSV."""
    rows = []
    for row in found.places:
        for one, goal, verdict in zip(found.options, row.goals, row.verdicts, strict=True):
            base = goal.figure.time_base if goal else ""
            rows.append(
                {
                    "place": row.place,
                    "scenario": one.scenario.path,
                    "verdict": verdict,
                    "goal": goal.text if goal else "",
                    "time_base": base,
                    "value": in_unit(goal.figure.value, base) if goal else None,
                    "upper_end": in_unit(goal.figure.high, base) if goal else None,
                    "unit": unit(base, goal.figure.quantity) if goal else "",
                    "upper_end_over_goal": goal.figure.high / goal.goal if goal else None,
                    "spoken": spoken(goal.figure.value, base, goal.figure.quantity) if goal else "",
                }
            )
    return rows
