"""Stock, rules, occupancy, containers, receptors: what their rows must be. Kinds stand at the tests."""

from __future__ import annotations

from fractions import Fraction

import pytest

from scatterbay.scenario.goals import goal
from scatterbay.scenario.make_ups import make_up
from scatterbay.scenario.parts import MakeUp
from scatterbay.tables import containers, occupancy, receptors, rules, stock
from scatterbay.units import read

STOCK = sorted(stock.items())
POUND, FOOT, INCH = 0.45359237, 0.3048, 25.4
SIXTY_FOURTHS = {"2": 2, "2.5": 2.5, "3": 3, "4": 4, "5": 5, "6": 6, "8": 8}
"""Sheet lead by pounds per square foot and the 64ths of an inch it is sold as (NCRP Report 147, recalled)."""
ROLLING_MM = 0.005 * INCH
"""Tolerance of its thickness (ASTM B749, recalled)."""
CODES = {3: 1.32, 4: 1.80, 5: 2.24, 6: 2.65, 7: 3.15, 8: 3.55}
"""Lead by code, nominal mm (EN 12588, recalled)."""


def counted(name: str) -> MakeUp:
    return make_up(stock.items()[name].make_up, open_allowed=False)


@pytest.mark.parametrize("name", STOCK)
def test_every_stock_text_reads_and_counts_no_more_than_nominal(name: str) -> None:
    """Limit."""
    item = stock.items()[name]
    assert item.source
    layers = counted(name).layers
    assert layers
    for layer in layers:
        assert 0.0 < layer.counted_thickness <= layer.thickness.value
        assert not layer.at_nominal
    if "lead" in name:
        lead = [layer for layer in layers if layer.material == "lead"]
        assert len(lead) == 1
        assert lead[0].counted_thickness < lead[0].thickness.value


@pytest.mark.parametrize("name", STOCK)
def test_a_stock_name_stands_alone_in_a_make_up(name: str) -> None:
    """Limit: the name gives the layers of its row, each marked with it, also among other layers."""
    found = make_up(f"steel 1 mm + {name} + steel 1 mm").layers
    own = counted(name).layers
    assert [layer.bought_as for layer in found] == ["", *[name] * len(own), ""]
    assert [layer.thickness for layer in found[1:-1]] == [layer.thickness for layer in own]


@pytest.mark.parametrize("code", sorted(CODES))
def test_lead_by_code(code: int) -> None:
    """Published: EN 12588 nominal thickness, and the least that 5 % allows, rounded down by 0.01 mm at most."""
    (layer,) = counted(f"lead code {code}").layers
    assert layer.thickness.value * 1e3 == pytest.approx(CODES[code])
    least = 0.95 * CODES[code]
    assert least - 0.01 < layer.counted_thickness * 1e3 <= least + 1e-9


@pytest.mark.parametrize("psf", sorted(SIXTY_FOURTHS))
def test_lead_by_weight(psf: str) -> None:
    """Independent route: nominal from weight over density; least from the 64ths of an inch and the tolerance.

    Both rounded down by less than 0.01 mm (the least by as much again, through the tolerance).
    """
    (layer,) = counted(f"lead {psf} psf").layers
    nominal = float(psf) * POUND / FOOT**2 / 11.35
    assert nominal - 0.01 < layer.thickness.value * 1e3 <= nominal
    least = SIXTY_FOURTHS[psf] / 64.0 * INCH - ROLLING_MM
    assert least - 0.01 < layer.counted_thickness * 1e3 <= least + 1e-9
    assert layer.counted_thickness < layer.thickness.value


@pytest.mark.parametrize(
    "name", [name for name in STOCK if " with lead " in name or name.startswith("lead-lined")]
)
def test_boards_carry_the_sheet_they_are_named_after(name: str) -> None:
    """Limit: board first, then the sheet of the stock's own row, or of the thickness in the name."""
    (lead,) = (layer for layer in counted(name).layers if layer.material == "lead")
    sheet = name.split(" with ")[-1].replace("lead-lined plywood", "lead")
    if sheet in stock.items():
        assert lead.thickness == counted(sheet).layers[0].thickness
    else:
        assert lead.thickness.value == pytest.approx(read(sheet.removeprefix("lead"), "length").value)
        assert lead.thickness.tolerance >= 0.05 * lead.thickness.value * (1 - 1e-9)
        assert lead.thickness.tolerance >= 0.05e-3 * (1 - 1e-9)
    assert counted(name).layers[0].material != "lead"


@pytest.mark.parametrize("inches", [4, 6, 8, 10, 12])
def test_hollow_blocks_are_shell_gap_shell(inches: int) -> None:
    """Published: ASTM C90 least face shells (recalled); widths 3/8 in under the name."""
    shell = {4: Fraction(3, 4), 6: Fraction(1)}.get(inches, Fraction(5, 4))
    first, gap, last = counted(f"hollow block {inches} in").layers
    assert first == last
    assert (first.material, gap.material) == ("concrete", "air")
    assert first.thickness.value == pytest.approx(float(shell) * 0.0254)
    assert counted(f"hollow block {inches} in").thickness == pytest.approx((inches - 0.375) * 0.0254)
    assert first.counted_density == pytest.approx(2000.0)


def test_barite_blocks_count_below_barite_concrete() -> None:
    """Limit."""
    (layer,) = counted("barite block 140 mm").layers
    assert (layer.counted_thickness, layer.counted_density) == pytest.approx((0.135, 2800.0))


def test_every_rule_has_a_goal_that_reads_and_says_it_is_recalled() -> None:
    """Limit."""
    assert {"ICRP 103", "NCRP 147", "IAEA GSR Part 3", "US 10 CFR 20", "UK IRR17"} <= {
        s for s, _ in rules.rules()
    }
    for (rule_set, entry), found in rules.rules().items():
        bases = [(goal(rule.goal).time_base, goal(rule.goal).quantity) for rule in found]
        assert len(set(bases)) == len(bases), (rule_set, entry)
        for rule in found:
            assert "recalled" in rule.source
            assert rule.area in ("controlled", "supervised", "public")
            assert rule.stated
            assert rule.averaging


def test_rules_in_numbers() -> None:
    """Published: NCRP Report 147, 10 CFR 20.1301, ICRP 103, IRR17 (recalled)."""

    def of(rule_set: str, entry: str) -> list[str]:
        return [rule.goal for rule in rules.rules()[rule_set, entry]]

    assert of("NCRP 147", "controlled area") == ["0.1 mGy/week"]
    assert of("NCRP 147", "uncontrolled area") == ["0.02 mGy/week"]
    assert of("US 10 CFR 20", "public") == ["1 mSv/year", "20 uSv in an hour"]
    assert of("ICRP 103", "workers") == ["20 mSv/year"]
    assert of("UK IRR17", "outside a controlled area") == ["6 mSv/year", "7.5 uSv/h over 8 h"]
    assert of("UK IRR17", "public constraint") == ["0.3 mSv/year"]


def test_occupancy_factors() -> None:
    """Published: NCRP Report 147, table 4.1 (recalled), a row of each factor; factors are those of the table."""
    found = occupancy.spaces()
    for space, factor in (("office", 1), ("examination room", 1 / 2), ("corridor", 1 / 5), ("corridor door", 1 / 8),
                          ("public toilet", 1 / 20), ("stairway", 1 / 40)):  # fmt: skip
        assert found[space].value == pytest.approx(factor)
        assert "NCRP Report 147" in found[space].source
    assert {entry.factor for entry in found.values()} == {"1", "1/2", "1/5", "1/8", "1/20", "1/40"}
    assert all("recalled" in e.source or "common practice" in e.source for e in found.values())


ALSO = {
    "occupancy": {name: entry.also for name, entry in occupancy.spaces().items()},
    "containers": {name: entry.also for name, entry in containers.containers().items()},
    "receptors": {name: entry.also for name, entry in receptors.receptors().items()},
}


@pytest.mark.parametrize("table", sorted(ALSO))
def test_no_name_means_two_things(table: str) -> None:
    """Limit."""
    names = [*ALSO[table], *(other for also in ALSO[table].values() for other in also)]
    assert len(names) == len(set(names))


def test_container_classes() -> None:
    """Published: ISO 3999 (2004), limits at 1 m (recalled); limit: they fall with distance, and rise P to F."""
    found = containers.containers()
    kind = "ambient dose equivalent rate"
    at_1_m = [read(found[f"class {letter}"].at_1_m, kind).value * 3.6e6 for letter in "PMF"]
    assert at_1_m == pytest.approx([0.02, 0.05, 0.1])
    for entry in found.values():
        falling = [read(text, kind).value for text in (entry.surface, entry.at_50_mm, entry.at_1_m) if text]
        assert falling == sorted(falling, reverse=True)
        assert "recalled" in entry.source


def test_receptors() -> None:
    """Published: NCRP Report 147, table 4.6, preshielding in lead (recalled)."""
    found = receptors.receptors()
    assert found["table and receptor"].make_up == "lead 0.85 mm"
    assert found["receptor"].make_up == "lead 0.3 mm"
    assert found["patient, table and receptor"].make_up == f"{found['patient'].make_up} + lead 0.85 mm"
    assert all(make_up(entry.make_up).layers for entry in found.values())
    assert all("recalled" in entry.source or "judgement" in entry.source for entry in found.values())
