"""The commands on the demo plant: what goes where, exit statuses, and one answer in every view."""

from __future__ import annotations

import csv
import io
import json
import math
from pathlib import Path
from typing import Any

import jsonschema
import pytest

from actuator.answer import Answer, work_out
from actuator.cli import main
from actuator.project.document import demo, load
from actuator.report.figures import At
from actuator.report.names import all_figures
from actuator.report.shown import shown_for
from actuator.report.workings import working

BROKEN = """format = 1
[[machine]]
name = "Press"
supply_pressure = "6 bar"
cycle_time = "4 s"

[[machine.actuator]]
name = "Pusher"
bore = "50"
"""


@pytest.fixture(name="plant")
def _plant(tmp_path: Path) -> Path:
    path = tmp_path / "plant.toml"
    path.write_text(demo().to_toml(), encoding="utf-8")
    return path


@pytest.fixture(name="broken")
def _broken(tmp_path: Path) -> Path:
    path = tmp_path / "broken.toml"
    path.write_text(BROKEN, encoding="utf-8")
    return path


@pytest.fixture(name="solved", scope="module")
def _solved() -> Answer:
    return work_out(demo())


@pytest.fixture(name="once")
def _once(solved: Answer, monkeypatch: pytest.MonkeyPatch) -> Answer:
    """Every command shows this one answer, computed once."""
    monkeypatch.setattr("actuator.answer.work_out", lambda _: solved)
    return solved


ENGINE = ("simulation", "difference", "remarks")
"""Keys whose text tells which engine computed, or repeats numbers of the cycle."""


def same(one: Any, other: Any) -> bool:
    """Equal trees, numbers to a share of 1e-6: either engine may have computed them."""
    if isinstance(one, dict):
        return one.keys() == other.keys() and all(same(one[key], other[key]) for key in one if key not in ENGINE)
    if isinstance(one, list):
        return len(one) == len(other) and all(same(a, b) for a, b in zip(one, other, strict=True))
    if isinstance(one, float):
        return math.isclose(one, other, rel_tol=1e-6, abs_tol=1e-6)
    return bool(one == other)


def test_assess_writes_json_alone_on_stdout(plant: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status = main(["assess", str(plant), "--json"])
    out, err = capsys.readouterr()
    data = json.loads(out)
    assert err == ""
    assert data["problems"] == []
    assert [machine["name"] for machine in data["machines"]] == ["Tray packer", "Lid press"]
    verdicts = {
        item["verdict"]
        for machine in data["machines"]
        for actuator in machine["actuators"]
        for item in actuator["criteria"]
    }
    assert status == (0 if verdicts == {"met"} else 3)


def test_json_csv_text_and_workings_agree(plant: Path, once: Answer, capsys: pytest.CaptureFixture[str]) -> None:
    main(["assess", str(plant), "--json"])
    data = json.loads(capsys.readouterr().out)
    main(["assess", str(plant), "--csv"])
    rows = list(csv.DictReader(io.StringIO(capsys.readouterr().out)))
    main(["assess", str(plant), "--units", "si"])
    text = capsys.readouterr().out
    analysis, project = once.analysis, once.project
    assert analysis is not None
    assert project is not None
    shown = shown_for(project)
    for item, row in zip(all_figures(analysis), rows, strict=True):
        at = item.at
        assert (row["figure"], row["machine"]) == (item.figure.key, (*at.owner, "", "")[0])
        found = working(once, at.machine_index, at.actuator_index, item.figure.key)
        value = _of_json(data, at, item.figure.json_path)
        if row["refused"]:
            assert value == {"refused": row["refused"]}
            assert found.value == f"refused: {row['refused']}"
        else:
            number, unit = shown.number(value, item.figure.kind)
            assert value == float(row["value"])
            assert found.value == f"{number} {unit}".rstrip()
            # the text tells losses in a line each, without every number behind it
            assert number in text or item.figure.key.startswith("holding."), item.name


def _of_json(data: Any, at: At, path: tuple[str, ...]) -> Any:
    money = path[0] == "money"
    tree = data["money"] if money else data
    if at.machine_index is not None:
        tree = tree["machines"][at.machine_index]
    if at.actuator_index is not None:
        tree = tree["actuators"][at.actuator_index]
    if path[0] == "holding":  # a list: one entry a loss and end it stands at
        _, loss, way, name = path
        wanted = (loss.replace("_", " "), "extended" if way == "retract" else "retracted")
        return next(item for item in tree["holding"] if (item["case"], item["from"]) == wanted)[name]
    for step in path[1:] if money else path:
        tree = tree[step]
    return tree


def test_set_gives_what_the_edited_file_gives(plant: Path, capsys: pytest.CaptureFixture[str]) -> None:
    edits = [
        ('machine."Tray packer".actuator.Pusher.bore', "50 mm"),
        ("machine.1.actuator.1.load.guide_friction", "0.2"),
        ("machine.2.actuator.Clamp.load.process_force", '[{ from = "80 mm", to = "100 mm", force = "900 N" }]'),
    ]
    flags = [flag for path, text in edits for flag in ("--set", f"{path}={text}")]
    first = main(["assess", str(plant), "--json", *flags])
    by_flag = json.loads(capsys.readouterr().out)
    document = load(plant)
    for path, text in edits:
        document = document.edited(path, text)
    document.saved(plant)
    second = main(["assess", str(plant), "--json"])
    by_file = json.loads(capsys.readouterr().out)
    assert first == second
    assert same(by_flag, by_file)
    pusher = by_flag["machines"][0]["actuators"][0]
    # π/4·(50 mm)²·6 bar = 1178.1 N, by hand
    assert pusher["static"]["theoretical_extend_N"] == pytest.approx(1178.1, abs=0.05)


def test_set_with_a_bad_value_or_path_is_a_problem(plant: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["assess", str(plant), "--set", "machine.1.actuator.1.bore=50"]) == 1
    assert "machine.1.actuator.1.bore" in capsys.readouterr().err
    assert main(["assess", str(plant), "--json", "--set", "machine.9.cycle_time=4 s"]) == 1
    out, err = capsys.readouterr()
    assert err == ""
    data = json.loads(out)
    assert data["machines"] == []
    assert "machine.9" in data["problems"][0]["path"]


def test_problems_go_to_stdout_for_check_and_to_stderr_elsewhere(
    broken: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    assert main(["check", str(broken)]) == 1
    out, err = capsys.readouterr()
    assert err == ""
    assert f"{broken}: line 4: machine.1.supply_pressure" in out
    assert "line 9: machine.1.actuator.1.bore" in out
    assert main(["assess", str(broken)]) == 1
    assert capsys.readouterr() == ("", out)
    assert main(["explain", str(broken), "extend.stroke_time"]) == 1
    assert capsys.readouterr() == ("", out)
    assert main(["assess", str(broken), "--json"]) == 1
    data = json.loads(capsys.readouterr().out)
    assert data["machines"] == []
    assert {item["path"] for item in data["problems"]} >= {
        "machine.1.supply_pressure",
        "machine.1.actuator.1.bore",
    }
    assert {item["line"] for item in data["problems"]} >= {4, 9}


@pytest.mark.parametrize("command", ["check", "assess", "explain"])
def test_a_file_that_cannot_be_read_is_status_1(
    tmp_path: Path, capsys: pytest.CaptureFixture[str], command: str
) -> None:
    missing = tmp_path / "none.toml"
    assert main([command, str(missing)]) == 1
    assert "cannot be read: No such file or directory" in "".join(capsys.readouterr())
    assert main([command, str(tmp_path)]) == 1
    assert "cannot be read: Is a directory" in "".join(capsys.readouterr())


def test_check_of_a_clean_document(plant: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["check", str(plant)]) == 0
    assert capsys.readouterr() == ("", f"{plant}: no problems\n")


@pytest.mark.parametrize("units", ["si", "us"])
def test_new_writes_a_document_that_assesses(tmp_path: Path, capsys: pytest.CaptureFixture[str], units: str) -> None:
    path = tmp_path / "line.toml"
    assert main(["new", str(path), "--units", units]) == 0
    text = path.read_text(encoding="utf-8")
    assert text.startswith("#")
    path.write_text("mine", encoding="utf-8")
    assert main(["new", str(path), "--units", units]) == 2
    assert "exists; --force writes over it" in capsys.readouterr().err
    assert path.read_text(encoding="utf-8") == "mine"
    assert main(["new", str(path), "--units", units, "--force"]) == 0
    assert path.read_text(encoding="utf-8") == text
    assert main(["check", str(path)]) == 0
    assert main(["assess", str(path), "--units", units]) in (0, 3)
    assert list(tmp_path.iterdir()) == [path]


def test_new_where_it_cannot_write(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["new", str(tmp_path / "none" / "line.toml"), "--units", "si"]) == 2
    assert "cannot be written" in capsys.readouterr().err


def test_explain_lists_and_explains(plant: Path, once: Answer, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["explain", str(plant), "--units", "si"]) == 0
    names = [line.split("  ")[0] for line in capsys.readouterr().out.splitlines()]
    assert '"Tray packer".Pusher.extend.stroke_time' in names
    assert "money.cost_year" in names
    assert main(["explain", str(plant), "Clamp.extend.force_time", "--units", "si"]) == 0
    out = capsys.readouterr().out
    assert out.startswith('"Lid press".Clamp.extend.force_time\nForce build-up time, extending = ')
    assert "typed, machine.2.actuator.1.require.force_at_end" in out


def test_explain_refuses_what_it_cannot_tell(plant: Path, once: Answer, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["explain", str(plant), "extend.stroke_time", "--units", "si"]) == 2
    err = capsys.readouterr().err
    assert "names several figures; write one of" in err
    assert '"Tray packer".Lift.extend.stroke_time' in err
    assert main(["explain", str(plant), "Lift.extend.strok_time", "--units", "si"]) == 2
    err = capsys.readouterr().err
    assert "names no figure; nearest" in err
    assert '"Tray packer".Lift.extend.stroke_time' in err


def test_a_requirement_that_fails_is_status_3_and_one_that_is_met_0(
    plant: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    at = 'machine."Tray packer".actuator.Pusher.require'
    base = ["assess", str(plant), "--csv"]
    none = ["Pusher", "Lift"]
    drop = [flag for name in none for flag in ("--set", f"machine.1.actuator.{name}.require.stroke_time=")]
    drop += [flag for name in none for flag in ("--set", f"machine.1.actuator.{name}.require.force_reserve=")]
    drop += ["--set", "machine.2.actuator.Clamp.require.force_reserve="]
    drop += ["--set", "machine.2.actuator.Clamp.require.stroke_time="]
    assert main([*base, *drop]) == 0
    assert main([*base, *drop, "--set", f"{at}.stroke_time=1 ms"]) == 3
    assert main([*base, *drop, "--set", f"{at}.stroke_time=1 min"]) == 0
    capsys.readouterr()


def test_a_requirement_that_cannot_be_judged_is_status_3(plant: Path, capsys: pytest.CaptureFixture[str]) -> None:
    pusher = "machine.1.actuator.Pusher"
    stuck = ["--set", f"{pusher}.load.extend_force=5 kN", "--set", f"{pusher}.require.force_reserve="]
    assert main(["assess", str(plant), "--json", *stuck]) == 3
    found = json.loads(capsys.readouterr().out)["machines"][0]["actuators"][0]
    assert found["completed"] is False
    assert found["position_reached_m"] == pytest.approx(0.0, abs=1e-9)
    assert "refused" in found["extend"]["stroke_time_s"]
    time = next(item for item in found["criteria"] if item["name"] == "stroke_time")
    assert time["verdict"] == "refused"


def test_schema_is_a_json_schema_that_takes_the_demo(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["schema"]) == 0
    schema = json.loads(capsys.readouterr().out)
    checker = jsonschema.validators.validator_for(schema)
    checker.check_schema(schema)
    checker(schema).validate(json.loads(json.dumps(demo().tree())))


@pytest.mark.parametrize(
    ("arguments", "said"),
    [
        (["assess"], "required: FILE"),
        (["asess", "x.toml"], "invalid choice"),
        (["assess", "x.toml", "--json", "--csv"], "not allowed with"),
        (["assess", "x.toml", "--histories"], "--histories needs --json"),
        (["assess", "x.toml", "--set", "bore"], "write path=text"),
        (["assess", "x.toml", "--set", "=5 mm"], "write path=text"),
        (["assess", "x.toml", "--units", "imperial"], "invalid choice"),
    ],
)
def test_wrong_usage_is_status_2(arguments: list[str], said: str, capsys: pytest.CaptureFixture[str]) -> None:
    with pytest.raises(SystemExit, match="2"):
        main(arguments)
    assert said in capsys.readouterr().err


@pytest.mark.parametrize("command", ["open", "new", "check", "assess", "explain", "schema"])
def test_help_of_every_command_has_an_example(command: str, capsys: pytest.CaptureFixture[str]) -> None:
    with pytest.raises(SystemExit, match="0"):
        main([command, "--help"])
    assert f"example\n  actuator {command}" in capsys.readouterr().out
