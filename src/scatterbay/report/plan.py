"""The plan as a drawing: walls to scale, what stands in the room, beams, places, and the dose as contours."""

from __future__ import annotations

import io
import textwrap
from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np
from matplotlib import rc_context
from matplotlib.axes import Axes
from matplotlib.backends.backend_agg import FigureCanvasAgg
from matplotlib.backends.backend_svg import FigureCanvasSVG
from matplotlib.colors import LinearSegmentedColormap, LogNorm
from matplotlib.figure import Figure
from numpy.typing import NDArray

from scatterbay.advice.dose_map import DoseMap, Plane
from scatterbay.exposure.results import Assessment
from scatterbay.report.cautions import HEADLINE
from scatterbay.report.plan_building import draw_building
from scatterbay.report.plan_contents import draw_beams, draw_bodies, draw_places, numbered
from scatterbay.report.words import BASES, SYMBOLS, in_unit, spoken
from scatterbay.scenario.parts import Scenario

Array = NDArray[np.float64]

SETTINGS: dict[Any, Any] = {
    "svg.hashsalt": "scatterbay", "svg.fonttype": "none", "font.family": "sans-serif", "font.size": 8.0,
    "text.parse_math": False, "axes.linewidth": 0.6, "contour.negative_linestyle": "solid",
}  # fmt: skip
"""Same input, same bytes; text stays text; nothing in a name is read as mathematics."""
TINT = LinearSegmentedColormap.from_list(
    "tint", ["#ffffff", "#e3e9ec", "#bccad1", "#8fa5b1", "#60798a", "#37505f"]
)
"""One quiet tint from paper to slate: its lightness falls all the way, so that a photocopy shows the same."""
WIDTH, HEIGHT = 11.0, 7.6
"""Size of the drawing [inch]."""
STEPS = (1.0, 3.0)
"""Levels in each decade."""
MOST_DECADES = 8


@dataclass(frozen=True)
class _GoalLine:
    """A design goal to be drawn: its value in base units, and its words."""

    value: float
    text: str


def plan_figure(
    scenario: Scenario, plane: Plane, found: DoseMap | None, assessed: Assessment | None
) -> Figure:
    """The drawing; without ``found`` the building and what is in it alone."""
    with rc_context(SETTINGS):
        figure = Figure(figsize=(WIDTH, HEIGHT), facecolor="white")
        axes = figure.add_axes((0.06, 0.14, 0.60, 0.76))
        axes.set_aspect("equal")
        if found is not None:
            _draw_dose(axes, figure, scenario, found)
        draw_building(axes, scenario, plane)
        draw_bodies(axes, scenario, plane)
        draw_beams(axes, scenario, plane)
        draw_places(axes, scenario, plane)
        _frame(axes, scenario, plane, found)
        _margin(figure, scenario, plane, found, assessed)
        return figure


def plan_svg(
    scenario: Scenario, plane: Plane, found: DoseMap | None = None, assessed: Assessment | None = None
) -> str:
    """The drawing as SVG text, the same bytes for the same input."""
    with rc_context(SETTINGS):
        figure = plan_figure(scenario, plane, found, assessed)
        out = io.StringIO()
        FigureCanvasSVG(figure)
        figure.savefig(out, format="svg", metadata={"Date": None, "Creator": "scatterbay"})
        return out.getvalue()


def plan_png(scenario: Scenario, plane: Plane, found: DoseMap | None, assessed: Assessment | None) -> bytes:
    """The drawing as a PNG picture."""
    with rc_context(SETTINGS):
        figure = plan_figure(scenario, plane, found, assessed)
        out = io.BytesIO()
        FigureCanvasAgg(figure)
        figure.savefig(out, format="png", dpi=160, metadata={"Software": "scatterbay"})
        return out.getvalue()


def levels(found: DoseMap) -> Array:
    """Contour levels in the unit of the map, rising: 1 and 3 in each decade, MOST_DECADES decades at most."""
    values = in_unit(1.0, found.time_base) * found.values[np.isfinite(found.values) & (found.values > 0.0)]
    if not values.size:
        return np.array([1.0, 3.0])
    low = np.floor(np.log10(np.quantile(values, 0.03)))
    top = min(np.ceil(np.log10(np.quantile(values, 0.99))), low + MOST_DECADES)
    return np.array(
        [step * 10.0**k for k in np.arange(low, max(top, low + 1.0)) for step in STEPS] + [10.0**top]
    )


def _draw_dose(axes: Axes, figure: Figure, scenario: Scenario, found: DoseMap) -> None:
    """Filled contours, thin lines, goals as bold labelled lines, and the key."""
    scale = in_unit(1.0, found.time_base)
    chosen = levels(found)
    values = np.ma.masked_invalid(scale * found.values)
    filled = axes.contourf(
        found.first,
        found.second,
        values,
        levels=chosen,
        cmap=TINT,
        norm=LogNorm(chosen[0], chosen[-1]),
        extend="both",
    )
    axes.contour(found.first, found.second, values, levels=chosen, colors="#5f6f78", linewidths=0.35)
    for goal in goal_lines(scenario, found):
        value = scale * goal.value
        if chosen[0] < value < chosen[-1]:
            line = axes.contour(
                found.first, found.second, values, levels=[value], colors="black", linewidths=1.9
            )
            axes.clabel(line, fmt={value: goal.text}, fontsize=7.5, inline=True, inline_spacing=3)
    bar = figure.add_axes((0.70, 0.16, 0.016, 0.30))
    key = figure.colorbar(filled, cax=bar, ticks=[level for level in chosen if f"{level:e}".startswith("1.")])
    key.ax.set_yticklabels(
        [spoken(level / scale, found.time_base, found.quantity) for level in key.get_ticks()]
    )
    key.ax.tick_params(labelsize=7, length=2)
    key.set_label(f"{SYMBOLS[found.quantity]}, {BASES[found.time_base]}")


def goal_lines(scenario: Scenario, found: DoseMap) -> list[_GoalLine]:
    """Goals stated over the map's time base and in its quantity, each value once."""
    seen: dict[float, str] = {}
    for group in scenario.people:
        for goal in group.goals:
            if (goal.time_base, goal.quantity) == (found.time_base, found.quantity):
                seen[goal.value] = (
                    f"{seen[goal.value]}, {group.name}"
                    if goal.value in seen
                    else f"{goal.text} ({group.name})"
                )
    return [_GoalLine(value, text) for value, text in sorted(seen.items())]


def _frame(axes: Axes, scenario: Scenario, plane: Plane, found: DoseMap | None) -> None:
    """Limits, axes, scale bar, north arrow."""
    if found is not None:
        low, high = (found.first[0], found.second[0]), (found.first[-1], found.second[-1])
    else:
        spots = np.array([*scenario.room.corners])
        thick = max(side.make_up.thickness for side in scenario.room.sides) + 1.2
        if plane.axis == 2:
            low, high = tuple(spots.min(axis=0) - thick), tuple(spots.max(axis=0) + thick)
        else:
            keep = 1 - plane.axis
            up = scenario.room.height + scenario.room.ceiling.thickness + 1.2
            low, high = (spots[:, keep].min() - thick, -1.2), (spots[:, keep].max() + thick, up)
    axes.set_xlim(low[0], high[0])
    axes.set_ylim(low[1], high[1])
    names = [name for k, name in enumerate(("x (east)", "y (north)", "z (up)")) if k != plane.axis]
    axes.set_xlabel(f"{names[0]} [m]")
    axes.set_ylabel(f"{names[1]} [m]")
    axes.tick_params(labelsize=7, length=2)
    bar, right, bottom = 1.0, high[0] - 0.3, low[1] + 0.03 * (high[1] - low[1])
    axes.plot(
        [right - bar, right], [bottom, bottom], color="black", linewidth=2.2, solid_capstyle="butt", zorder=9
    )
    axes.text(right - 0.5 * bar, bottom + 0.02 * (high[1] - low[1]), "1 m", ha="center", fontsize=7, zorder=9)
    if plane.axis == 2:
        x, y = low[0] + 0.35, high[1] - 0.25
        axes.annotate(
            "N",
            xy=(x, y),
            xytext=(x, y - 0.65),
            ha="center",
            va="center",
            fontsize=8,
            zorder=9,
            arrowprops={"arrowstyle": "-|>", "color": "black", "linewidth": 1.0},
        )


def _margin(
    figure: Figure, scenario: Scenario, plane: Plane, found: DoseMap | None, assessed: Assessment | None
) -> None:
    """Title, cautions, the table of places, and what the map rests on."""
    where = {0: "section at x", 1: "section at y", 2: "plan at height"}[plane.axis]
    figure.text(0.06, 0.955, scenario.title, fontsize=13, weight="bold", va="center")
    figure.text(
        0.06, 0.925, f"{scenario.drawing}   {where} {plane.level:g} m".strip(), fontsize=8.5, va="center"
    )
    figure.text(0.955, 0.955, "DRAFT", fontsize=13, weight="bold", ha="right", va="center")
    figure.text(
        0.06,
        0.06,
        f"{HEADLINE} Local regulations and licensed practice prevail.",
        fontsize=7.5,
        weight="bold",
    )
    figure.text(0.06, 0.042, "\n".join(textwrap.wrap(_basis(scenario, found), 150)), fontsize=7, va="top")
    figure.text(0.70, 0.885, "Places", fontsize=9, weight="bold", va="top")
    rows = _rows(scenario, found, assessed)
    step = min(0.034, 0.38 / max(len(rows), 1))
    for k, (number, name, value) in enumerate(rows):
        y = 0.855 - k * step
        figure.text(0.70, y, number, fontsize=7.5, va="top", ha="left", weight="bold")
        figure.text(0.722, y, name, fontsize=7.5, va="top")
        figure.text(0.955, y, value, fontsize=7.5, va="top", ha="right")


def _basis(scenario: Scenario, found: DoseMap | None) -> str:
    digest = f"scenario SHA-256 {scenario.sha256[:12]}..., seed {scenario.options.seed}"
    if found is None:
        return digest
    return (
        f"Statistical error typically {100.0 * found.typical_error:.1f} %, beside the model's allowance; "
        f"{found.computed} points computed, the rest filled in; room scatter, travelling and stuck sources left out; "
        f"full occupancy; {digest}"
    )


def _rows(
    scenario: Scenario, found: DoseMap | None, assessed: Assessment | None
) -> Sequence[tuple[str, str, str]]:
    """Number, name and figure of each place, from the assessment."""
    results = {place.name: place for place in assessed.places} if assessed else {}
    rows = []
    for number, place in numbered(scenario):
        value = ""
        if place.name in results:
            result = results[place.name]
            base = found.time_base if found else "year"
            quantity = found.quantity if found else result.quantity
            figure = result.figures[base, quantity]
            value = f"{spoken(figure.value, base, quantity)}  {result.verdict}"
        rows.append((str(number), f"{place.name} (z {place.at[2]:.1f} m)", value))
    return rows
