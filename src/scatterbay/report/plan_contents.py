"""Bodies, beams, stored sources and places on a drawing."""

from __future__ import annotations

import numpy as np
from matplotlib.axes import Axes
from matplotlib.patches import Polygon
from numpy.typing import NDArray
from scipy.spatial import ConvexHull

from scatterbay.advice.dose_map import Plane
from scatterbay.geometry.bodies import solids
from scatterbay.geometry.solids import perpendicular
from scatterbay.scenario.parts import Beam, Place, Scenario, SealedSource

Array = NDArray[np.float64]

UPRIGHT = 0.9
"""A beam whose axis runs this much across the plane shows no edges."""
REACH = 30.0
"""How far a beam's edges are drawn [m]; the frame cuts them."""


def draw_bodies(axes: Axes, scenario: Scenario, plane: Plane) -> None:
    """The outline of each body, seen along the plane's axis."""
    keep = [k for k in range(3) if k != plane.axis]
    for body in scenario.bodies:
        outer = solids(body.shape, body.centre, body.sizes, body.axis, body.turned)[0]
        spots = outer.surface()[:, keep]
        hull = spots[ConvexHull(spots).vertices]
        axes.add_patch(
            Polygon(
                hull, closed=True, facecolor="#d8d2c4", edgecolor="black", linewidth=0.8, alpha=0.9, zorder=5
            )
        )
        x, y = np.array(body.centre)[keep]
        axes.text(
            x,
            y,
            f"{body.name}\n{body.material}",
            fontsize=6,
            ha="center",
            va="center",
            zorder=8,
            clip_on=True,
        )


def draw_beams(axes: Axes, scenario: Scenario, plane: Plane) -> None:
    """Sources as stars, axes dash-dotted, edges of the field dashed; containers and ways of sealed sources."""
    keep = [k for k in range(3) if k != plane.axis]
    drawn: dict[tuple[float, ...], str] = {}
    for beam in scenario.beams:
        origin = np.array(beam.at)
        spot = origin[keep]
        for ray in _edges(beam, plane.axis):
            end = origin + REACH * ray
            axes.plot(
                [spot[0], end[keep][0]],
                [spot[1], end[keep][1]],
                color="black",
                linewidth=0.8,
                linestyle=(0, (5, 3)),
                zorder=6,
                scalex=False,
                scaley=False,
            )
        known = tuple(float(x) for x in spot)
        drawn[known] = (
            f"{drawn[known]}, {beam.name}" if known in drawn and beam.name not in drawn[known] else beam.name
        )
    for (x, y), name in drawn.items():
        axes.plot([x], [y], marker="*", markersize=9, color="white", markeredgecolor="black", zorder=9)
        short = name if len(name) < 40 else name[:37] + "..."
        axes.annotate(
            short, (x, y), xytext=(5, 6), textcoords="offset points", fontsize=6.5, weight="bold", zorder=9
        )
    for source in scenario.sources:
        if isinstance(source, SealedSource):
            _sealed(axes, source, keep)


def _sealed(axes: Axes, source: SealedSource, keep: list[int]) -> None:
    if source.container is not None:
        x, y = np.array(source.container.at)[keep]
        axes.plot([x], [y], marker="s", markersize=6, color="white", markeredgecolor="black", zorder=9)
        axes.annotate(
            f"{source.name}, stored",
            (x, y),
            xytext=(5, -9),
            textcoords="offset points",
            fontsize=6.5,
            zorder=9,
        )
    if source.travel is not None:
        way = np.array(source.travel.path)[:, keep]
        axes.plot(way[:, 0], way[:, 1], color="black", linewidth=0.9, linestyle=":", zorder=7)


def _edges(beam: Beam, across: int) -> list[Array]:
    """Directions of the edges of a field that a drawing shows; none of one that goes all round, or across the plane."""
    axis = np.array(beam.aim) - np.array(beam.at)
    axis = axis / np.linalg.norm(axis)
    if beam.field.kind == "everywhere" or abs(axis[across]) > UPRIGHT:
        return []
    wide, high = perpendicular(axis)
    if beam.field.kind == "rectangle":
        turn = beam.field.turned
        wide, high = np.cos(turn) * wide + np.sin(turn) * high, np.cos(turn) * high - np.sin(turn) * wide
        half = 0.5 / beam.field.distance
        sides = [s * half * beam.field.width * wide for s in (-1, 1)] + [
            s * half * beam.field.height * high for s in (-1, 1)
        ]
        found = [axis + side for side in sides]
    elif beam.field.kind == "cone":
        tangent = np.tan(beam.field.half_angle)
        found = [axis + s * tangent * across for s in (-1, 1) for across in (wide, high)]
    else:
        tangent = np.tan(beam.field.half_angle)
        found = [across * s + t * tangent * axis for across in (wide, high) for s in (-1, 1) for t in (-1, 1)]
    return [ray / np.linalg.norm(ray) for ray in found]


def numbered(scenario: Scenario) -> list[tuple[int, Place]]:
    """Places by the number that they have on a drawing."""
    return list(enumerate(scenario.places, start=1))


def draw_places(axes: Axes, scenario: Scenario, plane: Plane) -> None:
    """Numbered marks: filled where a place lies within 1 m of the plane, open where it lies farther off."""
    keep = [k for k in range(3) if k != plane.axis]
    for number, place in numbered(scenario):
        at = np.array(place.at)
        near = abs(at[plane.axis] - plane.level) <= 1.0
        x, y = at[keep]
        axes.plot(
            [x],
            [y],
            marker="o",
            markersize=10,
            color="black" if near else "white",
            markeredgecolor="black",
            zorder=9,
            clip_on=True,
        )
        axes.text(
            x,
            y,
            str(number),
            fontsize=6.5,
            weight="bold",
            color="white" if near else "black",
            ha="center",
            va="center",
            zorder=10,
            clip_on=True,
        )
