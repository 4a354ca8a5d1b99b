"""Loss of supply and signal: the table, the sentences, the list for JSON, the cautions."""

from __future__ import annotations

from dataclasses import replace

from actuator.answer import work_out
from actuator.cautions import cautions
from actuator.errors import Refusal
from actuator.holding.held import holding
from actuator.parts import Actuator, Holding, Site
from actuator.project.document import parse
from actuator.report.figures import At
from actuator.report.holding_view import listed, sentence, table
from actuator.report.json_view import as_data
from actuator.report.shown import Shown
from actuator.report.text import as_text
from actuator.report.workings import working
from actuator.stroke.rows import flow_paths, parameters
from actuator.units import Reading
from tests.report.build import DOCUMENT, NO_STROKE, answer

SHOWN = Shown(Reading(100000.0, "EUR"))
KEYS = {
    "case", "from", "cap", "rod", "holds", "by", "direction", "drive_N", "hold_N", "way_m", "time_s",
    "end_speed_m_s", "end_energy_J", "trapped_J", "starts_after_s",
}  # fmt: skip


def place() -> At:
    analysis = answer().analysis
    assert analysis is not None
    return At(analysis, 0, 0)


def test_the_list_has_each_loss_from_each_end_and_its_numbers() -> None:
    rows = listed(place())
    assert [(row["case"], row["from"]) for row in rows] == [
        (case, start) for case in ("supply lost", "signal lost", "both lost") for start in ("extended", "retracted")
    ]
    for row, item in zip(rows, place().actuator.holding, strict=True):
        assert set(row) == KEYS
        assert (row["way_m"], row["trapped_J"], row["hold_N"]) == (item.way, item.trapped, item.hold)
    assert rows[3]["starts_after_s"] == {"refused": "it does not start, even with no air left"}
    assert as_data(answer())["machines"][0]["actuators"][0]["holding"] == rows


def test_a_sentence_says_what_each_side_is_connected_to_and_what_comes_of_it() -> None:
    found = {(item.case, item.start): sentence(item) for item in place().actuator.holding}
    assert found["supply lost", "extended"] == (
        "Supply lost, piston extended: cap side open, rod side on supply; not held, it retracts."
    )
    assert found["signal lost", "extended"] == (
        "Signal lost, piston extended: cap side closed in by a check valve, rod side closed in; held: closed-in air; "
        "once closed-in air has leaked away it retracts."
    )
    assert found["signal lost", "retracted"].endswith("held: closed-in air.")


def test_the_table_fits_and_tells_never_and_why_not() -> None:
    lines = table(place(), SHOWN)
    assert max(len(line) for line in lines) <= 100
    assert sum("lost, extended" in line for line in lines) == 3
    never = next(line for line in lines if line.startswith("  signal lost, retracted"))
    assert never.split()[-1] == "never"
    creeping = replace(place().actuator.holding[0], time=Refusal("it creeps: longer than an hour"))
    analysis = answer().analysis
    assert analysis is not None
    machine = analysis.machines[0]
    slow = replace(machine.actuators[0], holding=(creeping, *machine.actuators[0].holding[1:]))
    shown = table(At(replace(analysis, machines=(replace(machine, actuators=(slow,)),)), 0, 0), SHOWN)
    assert "  -: it creeps: longer than an hour" in shown
    assert as_text(answer()).count("When air or signal is lost") == 2


def test_the_working_tells_which_loss_it_is_about() -> None:
    found = working(answer(), 0, 0, "holding.signal_lost.retract.starts_after")
    assert any(remark.startswith("Signal lost, piston extended") for remark in found.remarks)
    assert not any("Supply lost" in remark for remark in found.remarks)


def lift(**held: object) -> tuple[Actuator, str]:
    """The lift of the document with other means to hold it, and its weight's caution."""
    project = answer().project
    assert project is not None
    machine = project.machines[0]
    part = replace(machine.actuators[1], holding=Holding(**held))  # type: ignore[arg-type]
    par = parameters(part, machine, project.site, flow_paths(part))
    found = cautions(part, machine, project.site, NO_STROKE, holding(part, NO_STROKE, par))
    return part, next(item.text for item in found if item.path == "load.inclination")


def test_a_weight_is_always_told_with_what_holds_it_and_how_it_falls() -> None:
    _, bare = lift()
    assert "no rod lock, check valve or counterweight" in bare
    assert "at the extended end it goes 200 mm in" in bare
    _, locked = lift(rod_lock=800.0)
    assert "relies on a rod lock of 800 N, which has to be rated" in locked
    assert "it goes" not in locked
    _, checked = lift(pilot_check=True, seal_leak_c=1e-12)
    assert "relies on pilot-operated check valves at the ports" in checked
    assert "Closed-in air holds it for" in checked
    _, unknown = lift(pilot_check=True, supply_check=True)
    assert "at the ports and a check valve in the supply" in unknown
    assert "no leak is given, so that time is not known" in unknown


def test_air_that_stays_closed_in_is_told() -> None:
    project = answer().project
    assert project is not None
    machine, site = project.machines[0], Site(ambient_pressure=1e5)
    part = replace(machine.actuators[0], holding=Holding(pilot_check=True))
    par = parameters(part, machine, site, flow_paths(part))
    held = holding(part, NO_STROKE, par)
    told = {item.path: item.text for item in cautions(part, machine, site, NO_STROKE, held)}
    # π/4·(50 mm)²·(400 mm + 5 mm of dead volume) at 6 bar gauge = 4.77 bar·L, by hand
    assert "4.77 bar·L gauge stay closed in" in told["holding.supply_lost.extended.trapped"]
    open_ = holding(machine.actuators[0], NO_STROKE, par)
    paths = {item.path for item in cautions(machine.actuators[0], machine, site, NO_STROKE, open_)}
    assert not any(path.startswith("holding.") for path in paths)


def test_a_document_with_a_lock_is_worked_out() -> None:
    text = DOCUMENT.replace('name = "Lift.1"', 'name = "Lift.1"\nholding.rod_lock = "800 N"')
    found = work_out(parse(text))
    assert found.analysis is not None
    rows = listed(At(found.analysis, 0, 1))
    assert rows[0]["by"] == "rod lock"
    assert rows[0]["hold_N"] > 800.0
