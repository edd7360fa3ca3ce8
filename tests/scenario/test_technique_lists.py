"""Medical workloads: technique lists, patients, kerma-area product, leakage technique factors. Kind: hand-worked."""

from __future__ import annotations

import pytest

from scatterbay.scenario import loads
from scatterbay.scenario.parts import Scenario, XrayTube
from tests.scenario.edits import refusal

TEXT = """
format: 1
title: a room
room:
  corners: [[0, 0], [5, 0], [5, 4], [0, 4]]
  height: 3 m
  sides: {south: lead 2 mm, east: lead 2 mm, north: lead 2 mm, west: lead 2 mm}
  ceiling: concrete 150 mm
  floor: on the ground
sources:
  tube:
    x-ray tube: 150 kV
    current: 250 mA
    filtration: aluminium 3 mm
    output: 9 mGy m2/(mA min)
    leakage: 0.876 mGy/h at 1 m at 150 kV, 3.3 mA
beams:
  wall stand: {source: tube, at: [1, 2, 1.3], aim: east, field: 400 mm x 400 mm at 1.8 m, behind: table and receptor}
  table: {source: tube, at: [3, 2, 2], aim: down, field: 300 mm x 300 mm at 1 m}
workload:
  table: {patients: 120/week, per patient: 1.9 mA min, worst hour: 8 patients, worst day: 30 patients, weeks: 50}
techniques:
  chest PA: {beam: wall stand, voltage: 125 kV, charge: 2 mA s, exposures: 240/week, worst hour: 20 exposures,
             worst day: 80 exposures, in a minute: 2, output: 7 mGy m2/(mA min)}
  chest child: {beam: wall stand, voltage: 70 kV, charge: 1.5 mA s, exposures: 30/week, worst hour: 5 exposures,
                field: 250 mm x 250 mm at 1.8 m}
people:
  others: {area: public, goals: [0.3 mSv/year]}
places:
  beyond it: {beyond: north, along: 2 m, people: others}
never together:
  - [wall stand, table]
"""


def changed(old: str, new: str) -> str:
    assert TEXT.count(old) == 1, old
    return TEXT.replace(old, new)


def tube(scenario: Scenario, name: str) -> XrayTube:
    found = next(s for s in scenario.sources if s.name == name)
    assert isinstance(found, XrayTube)
    return found


def test_a_technique_becomes_a_setting_a_beam_and_a_workload() -> None:
    """2 mA s twice a minute is 4 / 60 mA on average; 240 exposures are 120 such minutes: 480 mA s."""
    scenario = loads(TEXT, "list")
    assert [b.name for b in scenario.beams] == ["wall stand: chest PA", "wall stand: chest child", "table"]
    setting = tube(scenario, "tube: chest PA")
    load = next(w for w in scenario.workloads if w.beam == "wall stand: chest PA")
    assert setting.current.value == pytest.approx(4e-3 / 60.0)
    assert setting.per_exposure == pytest.approx(2e-3)
    assert setting.set_name == "tube"
    assert load.seconds_per_week == pytest.approx(120 * 60.0)
    assert load.seconds_per_week * setting.current.value == pytest.approx(240 * 2e-3)
    assert load.seconds_in_worst_hour * setting.current.value == pytest.approx(20 * 2e-3)
    assert load.seconds_in_worst_day * setting.current.value == pytest.approx(80 * 2e-3)


def test_what_was_measured_stays_where_it_was_measured() -> None:
    """The list's own output holds at its voltage; the tube's, measured at 150 kV, scales the model at 70 kV."""
    scenario = loads(TEXT, "list")
    own, scaled = tube(scenario, "tube: chest PA"), tube(scenario, "tube: chest child")
    assert own.output is not None
    assert own.output.text == "7 mGy m2/(mA min)"
    assert own.output_at is None
    assert scaled.output is not None
    assert scaled.output.text == "9 mGy m2/(mA min)"
    assert scaled.output_at is not None
    assert scaled.output_at.value == 150.0
    assert any("scales the model" in a.text for a in scenario.assumptions)


def test_fields_of_the_list_and_of_the_beam() -> None:
    fields = {b.name: b.field.text for b in loads(TEXT, "list").beams}
    assert fields["wall stand: chest PA"] == "400 mm x 400 mm at 1.8 m"
    assert fields["wall stand: chest child"] == "250 mm x 250 mm at 1.8 m"


def test_never_together_takes_every_technique_of_a_beam() -> None:
    assert loads(TEXT, "list").never_together == (
        ("wall stand: chest PA", "wall stand: chest child", "table"),
    )


def test_patients_by_their_charge() -> None:
    """120 patients at 1.9 mA min each: 228 mA min a week; 8 in the worst hour; 1.9 mA on average over a minute."""
    scenario = loads(TEXT, "list")
    load = next(w for w in scenario.workloads if w.beam == "table")
    current = tube(scenario, "tube: table").current.value
    assert current == pytest.approx(1.9e-3)
    assert load.seconds_per_week * current == pytest.approx(228e-3 * 60.0)
    assert load.seconds_in_worst_hour * current == pytest.approx(8 * 1.9e-3 * 60.0)


def test_charge_spread_over_voltages() -> None:
    text = changed(
        "1.9 mA min, worst hour", "1.9 mA min, voltages: {70 kV: 0.3, 85 kV: 0.5, 100 kV: 20 %}, worst hour"
    )
    setting = tube(loads(text, "list"), "tube: table")
    assert [(v.value, share) for v, share in setting.voltages] == [(70.0, 0.3), (85.0, 0.5), (100.0, 0.2)]
    assert setting.voltage.value == 100.0
    assert setting.set_name == "tube"


def test_kerma_area_product() -> None:
    text = changed(
        "patients: 120/week, per patient: 1.9 mA min, worst hour: 8 patients, worst day: 30 patients",
        "kerma-area product: 300 Gy cm2/week, worst hour: 20 Gy cm2, worst day: 90 Gy cm2",
    )
    load = next(w for w in loads(text, "list").workloads if w.beam == "table")
    assert load.area_product == pytest.approx((0.03, 0.002, 0.009))


def test_the_preset_is_named_with_its_source() -> None:
    scenario = loads(TEXT, "list")
    assert scenario.beams[0].behind_object is not None
    assert scenario.beams[0].behind_object[1].text == "lead 0.85 mm"
    assert any("NCRP Report 147" in a.text for a in scenario.assumptions)


def test_leakage_technique_factors() -> None:
    leak = tube(loads(TEXT, "list"), "tube: chest PA").leakage
    assert leak is not None
    assert leak.voltage is not None
    assert leak.current is not None
    assert (leak.rate.value * 3600.0, leak.voltage.value, leak.current.value) == pytest.approx(
        (0.876e-3, 150.0, 3.3e-3)
    )


REFUSED = [
    ("beam: wall stand, voltage: 125 kV", "beam: wallstand, voltage: 125 kV", "there is no beam 'wallstand'"),
    ("voltage: 125 kV", "voltage: 160 kV", "more than the 150 kV"),
    ("voltage: 125 kV", "voltage: 30 kV", "outside the model"),
    ("charge: 2 mA s", "charge: 2 mA", "2 mA"),
    ("exposures: 240/week", "exposures: 240", "not a number per week"),
    ("worst hour: 20 exposures", "worst hour: 20 patients", "not a number of exposures"),
    ("worst hour: 20 exposures", "worst hour: 130 exposures", "of beam in an hour"),
    ("in a minute: 2", "in a minute: 0", "in a minute"),
    (" at 150 kV, 3.3 mA", "", "without technique factors"),
    ("at 150 kV, 3.3 mA", "at 150 kV", "both leakage technique factors"),
    ("at 150 kV, 3.3 mA", "at 120 kV, 3.3 mA", "below the tube's 150 kV"),
    ("behind: table and receptor", "behind: tabel", "tabel"),
    ("per patient: 1.9 mA min, ", "", "'per patient' is missing"),
    ("worst hour: 8 patients", "worst hour: 10 min", "not stated like 'patients'"),
    ("1.9 mA min, worst", "1.9 mA min, voltages: {70 kV: 0.3, 85 kV: 0.5}, worst", "add up to 0.8"),
    ("1.9 mA min, worst", "1.9 mA min, voltages: {70 V: 1}, worst", "outside the model"),
    ("patients: 120/week, per patient: 1.9 mA min, worst hour: 8 patients", "beam on: 1 h/week, per patient: 1 mA min",
     "goes with patients"),
    ("patients: 120/week, per patient: 1.9 mA min, worst hour: 8 patients, worst day: 30 patients",
     "kerma-area product: 300 Gy cm2/week", "'worst hour' is missing"),
    ("patients: 120/week, per patient: 1.9 mA min, worst hour: 8 patients, worst day: 30 patients",
     "kerma-area product: 300 mGy/week", "kerma-area product"),
    ("patients: 120/week, per patient: 1.9 mA min, worst hour: 8 patients, worst day: 30 patients",
     "cycles: 3/week, exposure: 1 min", "of sealed sources"),
    ("workload:\n", "workload:\n  wall stand: {beam on: 1 min/week}\n", "has techniques, which are its workload"),
]  # fmt: skip


@pytest.mark.parametrize(("old", "new", "said"), REFUSED)
def test_refused(old: str, new: str, said: str) -> None:
    error = refusal(changed(old, new))
    assert said in error.render(), error.render()
    assert all(problem.line for problem in error.problems)
