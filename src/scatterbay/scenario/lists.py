"""The shipped lists as they are printed: what a scenario can take by name, each entry with its source."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

from scatterbay.errors import UsageError
from scatterbay.scenario.make_ups import make_up
from scatterbay.scenario.parts import Layer
from scatterbay.units import nearest

PREVAIL = "Local rules prevail over every one of these. They are quoted from memory: check them before use."


@dataclass(frozen=True)
class Listing:
    """A list: what it holds, remarks to read before it, and its entries.

    ``banner`` : a sentence that stands before and after them; empty where there is none.
    ``columns`` : name, heading and greatest width on a screen of 80 columns, without the source; a width of 0: said
    with the source, beneath the table. ``rows`` : an entry
    each, a value per column and its source last.
    """

    topic: str
    about: str
    remarks: tuple[str, ...]
    columns: tuple[tuple[str, str, int], ...]
    rows: tuple[tuple[str | float, ...], ...]
    banner: str = ""


def topics() -> dict[str, str]:
    """The topics there are lists of, each with what it holds."""
    return {topic: about for topic, (about, _) in _TOPICS.items()}


def listing(topic: str) -> Listing:
    """The list of a topic.

    Raises
    ------
    UsageError : there is no list of it; the nearest is suggested.
    """
    if topic not in _TOPICS:
        near = nearest(topic, _TOPICS)
        hint = f"did you mean '{near}'? " if near else ""
        raise UsageError(f"there is no list of '{topic}'; {hint}topics: {', '.join(_TOPICS)}")
    about, made = _TOPICS[topic]
    remarks, columns, rows = made()
    return Listing(topic, about, remarks, columns, tuple(rows), PREVAIL if topic == "rules" else "")


_Row = tuple[str | float, ...]
_Made = tuple[tuple[str, ...], tuple[tuple[str, str, int], ...], list[_Row]]


def _stock() -> _Made:
    from scatterbay.tables.stock import items

    remarks = (
        "A stock item stands in a make-up by its name alone, as 'gypsum board 12.5 mm + lead code 4'. It counts at "
        "its guaranteed minimum: the thin end of each tolerance; 'at nominal' behind it makes it count as written.",
        "A maker's certificate goes before these figures: define your own items under 'stock' in the scenario.",
    )
    columns = (("item", "item", 21), ("layers", "layers, inside first", 25), ("counted", "counts as", 12))
    rows: list[_Row] = []
    for one in items().values():
        counted = " + ".join(_counted(layer) for layer in make_up(one.make_up, open_allowed=False).layers)
        rows.append((one.name, one.make_up, counted, one.source))
    return remarks, columns, rows


def _counted(layer: Layer) -> str:
    """The thickness a layer counts at, and its density where one is stated."""
    density = layer.counted_density
    stated = "" if density is None else f" at {density / 1000.0:.3g} g/cm3"
    return f"{1e3 * layer.counted_thickness:.4g} mm{stated}"


def _rules() -> _Made:
    from scatterbay.tables.rules import rules

    remarks = (
        "A group of people takes an entry as 'rules: \"NCRP 147: controlled area\"'. Goals are judged by air kerma "
        "where they are given in Gy, and by H*(10) where in Sv; H*(10) stands for effective dose, below which it does "
        "not fall for photons (ICRP Publication 74, recalled).",
    )
    columns = (
        ("rules", "rule set: entry", 20), ("area", "area", 10), ("goal", "goal", 12), ("stated", "stated as", 14),
        ("averaging", "averaged over", 0),
    )  # fmt: skip
    rows: list[_Row] = [
        (f"{one.rule_set}: {one.entry}", one.area, one.goal, one.stated, one.averaging, one.source)
        for entry in rules().values()
        for one in entry
    ]
    return remarks, columns, rows


def _occupancy() -> _Made:
    from scatterbay.tables.occupancy import spaces

    remarks = (
        "Suggestions, never applied unasked: the stay of the most exposed person decides, and local rules prevail.",
    )
    columns = (("space", "kind of space", 28), ("factor", "occupancy", 9), ("also", "also called", 22))
    rows: list[_Row] = [(one.space, one.factor, ", ".join(one.also), one.source) for one in spaces().values()]
    return remarks, columns, rows


def _containers() -> _Made:
    from scatterbay.tables.containers import containers

    remarks = (
        "Highest H*(10) rates allowed for a container filled to its rating, not readings: a certificate or a reading "
        "replaces them. Distances count from its surface; at 1 m from the source it may be more.",
    )
    columns = (
        ("class", "class", 16), ("at_1_m", "at 1 m", 12), ("at_50_mm", "at 50 mm", 12), ("surface", "surface", 12),
        ("what", "for", 0),
    )  # fmt: skip
    rows: list[_Row] = [
        (one.name, one.at_1_m, one.at_50_mm, one.surface, one.what, one.source)
        for one in containers().values()
    ]
    return remarks, columns, rows


def _receptors() -> _Made:
    from scatterbay.tables.receptors import receptors

    remarks = (
        "Counted in the primary beam only, and only where the receptor always stands in the whole beam. The lead has "
        "the effect of the real layers in a published fit; it is not what they are made of.",
    )
    columns = (("name", "behind the patient", 20), ("layers", "counts as", 14), ("what", "what it is", 24))
    rows: list[_Row] = [(one.name, one.make_up, one.what, one.source) for one in receptors().values()]
    return remarks, columns, rows


def _materials() -> _Made:
    from scatterbay.tables import materials

    others = materials.other_names()
    remarks = (
        "Real concretes, glasses and boards differ: state a density at the layer, or define a material of your own.",
    )
    columns = (("material", "material", 20), ("density_g_cm3", "g/cm3", 10), ("also", "also called", 26))
    rows: list[_Row] = []
    for name in materials.names():
        also = ", ".join(other for other, main in others.items() if main == name)
        found = materials.material(name)
        rows.append((name, found.density_g_cm3, also, found.source))
    return remarks, columns, rows


def _nuclides() -> _Made:
    from scatterbay.tables import nuclides

    remarks = ("Photon lines below 20 keV are taken as stopped in the capsule.",)
    columns = (
        ("nuclide", "nuclide", 9), ("half_life_days", "half-life days", 14),
        ("highest_line_kev", "highest line keV", 16), ("lines", "lines", 6),
    )  # fmt: skip
    rows: list[_Row] = []
    for name in nuclides.names():
        found = nuclides.nuclide(name)
        source = f"LNHB evaluated decay data: {found.evaluation}"
        highest = nuclides.highest_line_kev(name)
        rows.append((name, found.half_life / 86400.0, highest, found.lines_kev.size, source))
    return remarks, columns, rows


_TOPICS: dict[str, tuple[str, Callable[[], _Made]]] = {
    "stock": ("what is sold under a name, and the layers it counts as", _stock),
    "rules": ("rule sets and the design goals they give", _rules),
    "occupancy": ("occupancy factors suggested for kinds of space", _occupancy),
    "containers": ("dose rates allowed round containers of sealed sources", _containers),
    "receptors": ("preset attenuation behind the patient", _receptors),
    "materials": ("materials, their densities, and other names they go by", _materials),
    "nuclides": ("nuclides of sealed sources", _nuclides),
}
