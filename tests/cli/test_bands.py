"""``assess --bands`` in each form."""

from __future__ import annotations

import csv
import io
import json
from pathlib import Path

import pytest

from actuator.cli import main
from actuator.report import scatter as room

DOCUMENT = """
format = 1

[[machine]]
name = "Invented machine"
supply_pressure = "6 bar gauge"
cycle_time = "4 s"

[[machine.actuator]]
name = "Pusher"
bore = "50 mm"
rod = "20 mm"
stroke = "400 mm"
return_pressure = "6 bar gauge"
[machine.actuator.load]
mass = "20 kg"
process_force = [{ from = "380 mm", to = "400 mm", force = "300 N" }]
[machine.actuator.friction]
breakaway = "90 N"
coulomb = "60 N"
viscous = "30 N*s/m"
[machine.actuator.valve]
supply_c = "2.0 dm3/(s*bar)"
exhaust_c = "2.0 dm3/(s*bar)"
[machine.actuator.throttle]
kind = "meter-out"
extend_c = "1.2 dm3/(s*bar)"
retract_c = "1.2 dm3/(s*bar)"
free_c = "3 dm3/(s*bar)"
[machine.actuator.require]
stroke_time = "1.2 s"
"""


@pytest.fixture(name="plant")
def _plant(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    monkeypatch.setattr(room, "SAMPLES", 8)
    path = tmp_path / "plant.toml"
    path.write_text(DOCUMENT, encoding="utf-8")
    return path


def test_json(plant: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["assess", str(plant), "--bands", "--json"]) == 0
    out, err = capsys.readouterr()
    (actuator,) = json.loads(out)["machines"][0]["actuators"]
    band = actuator["bands"]["extend.stroke_time"]
    assert set(band) == {"p05", "p50", "p95"}
    assert band["p05"] < actuator["extend"]["stroke_time_s"] < band["p95"]
    assert band["p95"] < actuator["worst"]["slow"]["extend"]["stroke_time_s"]
    assert band["p05"] > actuator["worst"]["hard"]["extend"]["stroke_time_s"]
    assert "cycle.exergy.friction" in actuator["bands"]
    assert actuator["scatter"]["samples"] == 8
    assert actuator["scatter"]["all_met"] == 1.0
    assert err == ""


def test_csv(plant: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["assess", str(plant), "--bands", "--csv"]) == 0
    rows = {row["figure"]: row for row in csv.DictReader(io.StringIO(capsys.readouterr().out)) if row["actuator"]}
    row = rows["extend.end_energy"]
    assert float(row["p05"]) < float(row["value"]) < float(row["p95"])
    assert rows["worst.slow.extend.end_energy"]["p05"] == ""


def test_text(plant: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["assess", str(plant), "--bands", "--units", "si"]) == 0
    text = capsys.readouterr().out
    assert "Tolerance bands" in text
    assert "All requirements are met in 100 % of 8 samples" in " ".join(text.split())
    assert "Worst-case pair, slowest" in text


def test_problems_come_before_bands(plant: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["assess", str(plant), "--bands", "--set", "machine.actuator.spread.mass=95 %"]) == 1
    assert "must be at most 90 %" in capsys.readouterr().err


def test_a_corner_can_be_reached_by_hand(plant: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """The slow corner of the example, typed: 5.7 bar, 30 % more friction, a tenth more load, a tenth less flow."""
    main(["assess", str(plant), "--json"])
    slow = json.loads(capsys.readouterr().out)["machines"][0]["actuators"][0]["worst"]["slow"]
    typed = {
        "machine.supply_pressure": "5.7 bar gauge",
        "machine.actuator.return_pressure": "5.7 bar gauge",
        "machine.actuator.friction.breakaway": "117 N",
        "machine.actuator.friction.coulomb": "78 N",
        "machine.actuator.friction.viscous": "39 N*s/m",
        "machine.actuator.load.mass": "22 kg",
        "machine.actuator.load.process_force.1.force": "330 N",
        "machine.actuator.valve.supply_c": "1.8 dm3/(s*bar)",
        "machine.actuator.valve.exhaust_c": "1.8 dm3/(s*bar)",
        "machine.actuator.throttle.extend_c": "1.08 dm3/(s*bar)",
        "machine.actuator.throttle.retract_c": "1.08 dm3/(s*bar)",
        "machine.actuator.throttle.free_c": "2.7 dm3/(s*bar)",
        "machine.actuator.valve.delay": "18 ms",
    }
    sets = [word for path, text in typed.items() for word in ("--set", f"{path}={text}")]
    main(["assess", str(plant), "--json", *sets])
    nominal = json.loads(capsys.readouterr().out)["machines"][0]["actuators"][0]
    for way in ("extend", "retract"):
        for key in ("stroke_time_s", "end_energy_J", "mean_speed_m_s", "force_at_end_N"):
            assert slow[way][key] == pytest.approx(nominal[way][key], rel=1e-4), key
    assert slow["static"]["force_reserve_extend"] == pytest.approx(nominal["static"]["force_reserve_extend"])
