"""The command line as a process: exit codes, streams, formats. Kind: limit, golden structure."""

from __future__ import annotations

import json
from pathlib import Path

import pytest

import scatterbay
from tests.cli.process import TOP, run

WELD_BAY = "scenarios/weld-bay.yaml"


def test_version() -> None:
    done = run("--version")
    assert done.returncode == 0
    assert done.stdout == f"scatterbay {scatterbay.__version__}\n"


@pytest.mark.parametrize(
    "command",
    [
        "assess",
        "wall",
        "advise",
        "map",
        "compare",
        "worksheet",
        "barrier",
        "source",
        "lists",
        "new",
        "schema",
    ],
)
def test_every_command_has_help_with_an_example(command: str) -> None:
    done = run(command, "--help")
    assert done.returncode == 0
    assert f"Example: scatterbay {command}" in done.stdout


@pytest.mark.parametrize(
    ("name", "code"),
    [
        ("weld-bay", 0),
        ("casting-cell", 0),
        ("pipe-shop", 1),
        ("radiography-room", 1),
        ("projector-job", 0),
        ("two-tube-room", 1),
    ],
)
def test_shipped_scenarios_run(name: str, code: int) -> None:
    done = run("assess", f"scenarios/{name}.yaml")
    assert done.returncode == code, done.stderr
    assert done.stderr == ""
    assert "DRAFT for a qualified expert" in done.stdout


def test_weld_bay_is_all_below_and_the_pipe_shop_has_one_place_above() -> None:
    weld = json.loads(run("assess", WELD_BAY, "--json").stdout)
    assert {place["verdict"] for place in weld["places"]} == {"below"}
    shop = json.loads(run("assess", "scenarios/pipe-shop.yaml", "--json").stdout)
    assert [place["verdict"] for place in shop["places"]].count("above") == 1


def test_same_input_same_bytes() -> None:
    one, two = (run("assess", WELD_BAY, "--json", PYTHONHASHSEED=seed).stdout for seed in ("1", "2"))
    assert one == two


def test_csv_has_a_row_per_place_and_time_base() -> None:
    lines = run("assess", WELD_BAY, "--csv").stdout.splitlines()
    assert lines[0].startswith("place,people,occupancy,time_base,quantity,unit,value")
    assert len(lines) >= 1 + 5 * 5


def test_two_formats_at_once_are_refused() -> None:
    done = run("assess", WELD_BAY, "--json", "--csv")
    assert done.returncode == 2
    assert done.stdout == ""
    assert "exclude each other" in done.stderr


def test_barrier_json_holds_the_promised_numbers() -> None:
    done = run(
        "barrier", "--beam", "X-ray 150 kV, aluminium 3 mm", "--layers", "gypsum board 12.5 mm + lead 1.5 mm",
        "--field", "40cm", "--source-distance", "2m", "--point-distance", "1m", "--json",
    )  # fmt: skip
    assert done.returncode == 0, done.stderr
    transmission = json.loads(done.stdout)["transmission"]
    for quantity in ("air_kerma", "ambient_dose_equivalent"):
        assert 0.0 < transmission[quantity]["patch"] <= transmission[quantity]["plane"] < 0.01


@pytest.mark.parametrize("beam", ["Ir-192", "662 keV", "0.662 MeV"])
def test_barrier_takes_nuclides_and_energies(beam: str) -> None:
    done = run("barrier", "--beam", beam, "--layers", "lead 20 mm", "--angle", "45deg")
    assert done.returncode == 0, done.stderr
    assert "H*(10)" in done.stdout


def test_source() -> None:
    done = run("source", "Ir-192", "--json")
    record = json.loads(done.stdout)
    assert record["at_1_m"][0]["value"] == pytest.approx(109.0, rel=0.01)
    assert record["at_1_m"][0]["unit"] == "uGy m2/(GBq h)"


@pytest.mark.parametrize(
    ("arguments", "code", "says"),
    [
        (("barrier", "--beam", "X-ray 500 kV, aluminium 3 mm", "--layers", "lead 3 mm"), 3, "40 to 450 kV"),
        (("barrier", "--beam", "X-ray 150 kV", "--layers", "lead 3 mm"), 2, "no filtration"),
        (("barrier", "--beam", "Ir192", "--layers", "lead 3 mm"), 2, "did you mean 'Ir-192'"),
        (("barrier", "--beam", "Ir-192", "--layers", "led 3 mm"), 2, "did you mean 'lead'"),
        (("barrier", "--beam", "Ir-192", "--layers", "lead 3"), 2, "unit"),
        (("barrier", "--beam", "Ir-192", "--layers", "lead 3 mm", "--angle", "88deg"), 3, "85 degrees"),
        (("barrier", "--beam", "Ir-192", "--layers", "lead 3 mm", "--field", "40 cm"), 2, "all three"),
        (("barrier", "--beam", "2 MeV", "--layers", "lead 3 mm"), 3, "1400 keV"),
        (("source", "Xx-1"), 2, "names no beam"),
        (("new", "weldbay"), 2, "did you mean 'weld-bay'"),
        (("assess", "no-such-file.yaml"), 2, "no-such-file.yaml"),
        (("asses", "x"), 2, "No such command"),
    ],
)
def test_mistakes_get_one_message_and_no_traceback(arguments: tuple[str, ...], code: int, says: str) -> None:
    done = run(*arguments)
    assert done.returncode == code
    assert done.stdout == ""
    assert says in done.stderr
    assert "Traceback" not in done.stderr


def test_new_writes_a_scenario_that_runs_and_never_overwrites(tmp_path: Path) -> None:
    assert run("new", "weld-bay", cwd=tmp_path).returncode == 0
    target = tmp_path / "weld-bay.yaml"
    assert target.read_text(encoding="utf-8") == (TOP / WELD_BAY).read_text(encoding="utf-8")
    target.write_text("mine", encoding="utf-8")
    again = run("new", "weld-bay", cwd=tmp_path)
    assert again.returncode == 2
    assert "--force" in again.stderr
    assert target.read_text(encoding="utf-8") == "mine"
    assert run("new", "weld-bay", "--force", cwd=tmp_path).returncode == 0
    assert run("new", "weld-bay", "-o", "no/such/folder/x.yaml", cwd=tmp_path).returncode == 2
    assert sorted(p.name for p in tmp_path.iterdir()) == ["weld-bay.yaml"]


def test_new_has_a_medical_and_a_projector_start_and_refuses_what_is_not_validated(tmp_path: Path) -> None:
    for kind, name in (("medical", "two-tube-room"), ("projector", "projector-job")):
        assert run("new", kind, cwd=tmp_path).returncode == 0
        assert (tmp_path / f"{kind}.yaml").read_text(encoding="utf-8") == (
            TOP / f"scenarios/{name}.yaml"
        ).read_text(encoding="utf-8")
    for kind in ("ct", "fluoroscopy", "mammography", "dental"):
        done = run("new", kind, cwd=tmp_path)
        assert done.returncode == 3
        assert "refused" in done.stderr
    assert len(list(tmp_path.iterdir())) == 2


def test_a_closed_pipe_is_not_an_error() -> None:
    import subprocess
    import sys

    command = f"{sys.executable} -m scatterbay schema | head -n 1"
    done = subprocess.run(["bash", "-c", command], cwd=TOP, capture_output=True, text=True, check=False)
    assert done.stdout == "{\n"
    assert "Traceback" not in done.stderr


def test_a_fault_of_ours_says_so(monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]) -> None:
    from scatterbay.cli import main

    monkeypatch.setattr("sys.argv", ["scatterbay", "assess", WELD_BAY])
    monkeypatch.setattr("scatterbay.api.assess", lambda _: 1 / 0)
    with pytest.raises(SystemExit) as stop:
        main.run()
    assert stop.value.code == 70
    assert "fault in scatterbay" in capsys.readouterr().err
