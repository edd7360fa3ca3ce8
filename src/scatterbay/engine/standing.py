"""The bodies of a scenario as solids and matters, and the K edges of everything in a scene."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from scatterbay.barriers.makeup import SMALLEST_SHARE, Sheets
from scatterbay.engine.bodies import VOID, Bodies, Part
from scatterbay.engine.energies import Ladder
from scatterbay.engine.media import Matter
from scatterbay.geometry.bodies import solids
from scatterbay.geometry.solids import Solid, relation
from scatterbay.physics.medium import medium
from scatterbay.scenario.parts import Scenario
from scatterbay.tables.materials import Material, material


def edges_of(stacks: Iterable[Sheets], scenario: Scenario, defined: Sequence[Material]) -> list[float]:
    """K edges of everything in the scene that matters."""
    named = [body.material for body in scenario.bodies] + [b.inside for b in scenario.bodies if b.inside]
    fractions = {one.fractions for stack in stacks for one in stack}
    fractions |= {material(name, defined).fractions for name in named}
    found = set()
    for mixture in fractions:
        for z, edge in medium(mixture).k_edges_kev.items():
            if dict(mixture)[z] >= SMALLEST_SHARE:
                found.add(edge)
    return sorted(found)


def bodies_of(scenario: Scenario, defined: Sequence[Material], rungs: Ladder) -> Bodies:
    """Every body of a scenario; a pipe is two."""
    matters: list[Matter] = []
    numbers: dict[str, int] = {}

    def number(name: str | None) -> int:
        if name is None:
            return VOID
        if name not in numbers:
            found = material(name, defined)
            numbers[name] = len(matters)
            matters.append(Matter(medium(found.fractions), found.density_g_cm3, rungs))
        return numbers[name]

    found = []
    for body in scenario.bodies:
        shapes = solids(body.shape, body.centre, body.sizes, body.axis, body.turned)
        found.append((shapes[0], number(body.material)))
        found += [(inner, number(body.inside)) for inner in shapes[1:]]
    parents = [_parent(k, [solid for solid, _ in found]) for k in range(len(found))]
    parts = [
        Part(solid, matter, parents[k], _outermost(k, parents)) for k, (solid, matter) in enumerate(found)
    ]
    return Bodies(tuple(parts), tuple(matters))


def _parent(k: int, shapes: Sequence[Solid]) -> int | None:
    """The smallest solid around the k-th."""
    around = [j for j, other in enumerate(shapes) if j != k and relation(shapes[k], other) == "inside"]
    if not around:
        return None
    return next(
        j for j in around if all(i == j or relation(shapes[j], shapes[i]) == "inside" for i in around)
    )


def _outermost(k: int, parents: list[int | None]) -> int:
    parent = parents[k]
    return k if parent is None else _outermost(parent, parents)
