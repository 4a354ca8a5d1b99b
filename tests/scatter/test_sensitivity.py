"""Sensitivity: steps whose effect is known in closed form, and the fields that have one."""

from __future__ import annotations

from dataclasses import replace

import pytest

from actuator.errors import Cancelled, Refusal
from actuator.parts import Actuator, Machine
from actuator.scatter.outcome import Outcome
from actuator.scatter.sensitivity import Step, sensitivity
from actuator.stroke.result import Path
from tests.agreement.cases import CASES, Case

PART = {case.name: case for case in CASES}
CASE = PART["two overlapping zones"]


def never() -> bool:
    return False


def known(actuator: Actuator, machine: Machine, _: tuple[Path, ...] | None) -> Outcome:
    """Figures in closed form."""
    pushed = actuator.load.process_force[1].force if actuator.load.process_force else 0.0
    return Outcome(
        values={
            "thrust": (machine.supply_pressure - 1e5) * actuator.area_cap,
            "pushed": pushed,
            "weight": actuator.load.mass,
            "lost": Refusal("out of reach") if actuator.bore > 0.0631 else actuator.bore,
        },
        met=None,
    )


def ranked(figure: str, case: Case = CASE, threads: int = 2) -> tuple[Step, ...]:
    return sensitivity(case.actuator, case.machine, case.site, known, figure, cancelled=never, threads=threads)


def test_the_thrust_follows_bore_and_pressure_and_nothing_else() -> None:
    """F = (p - p0)·π/4·D²: 21 % for a tenth more bore, 10 % for a tenth more gauge pressure, 5 % for 0.3 of 6 bar."""
    thrust = 6e5 * CASE.actuator.area_cap
    steps = ranked("thrust")
    assert [step.path for step in steps[:3]] == ["bore", "machine.supply_pressure", "spread.supply_pressure"]
    assert [step.change for step in steps[:3]] == pytest.approx([0.21 * thrust, 0.1 * thrust, 0.05 * thrust])
    assert [step.figure for step in steps[:3]] == pytest.approx([1.21 * thrust, 1.1 * thrust, 1.05 * thrust])
    assert {step.change for step in steps[3:]} == {0.0}
    assert steps[0].label == "Bore"
    assert (steps[0].before, steps[0].after) == pytest.approx((0.063, 0.0693))


def test_a_field_of_the_spread_moves_all_that_it_stands_for() -> None:
    steps = {step.path: step for step in ranked("weight")}
    assert steps["spread.mass"].change == pytest.approx(0.5)  # 10 % of 5 kg
    assert steps["load.mass"].change == pytest.approx(0.5)
    assert steps["spread.mass"].after == pytest.approx(0.1)
    steps = {step.path: step for step in ranked("pushed")}
    assert steps["load.process_force.2.force"].change == pytest.approx(60.0)  # 10 % of 600 N
    assert steps["load.process_force.1.force"].change == 0.0
    assert steps["spread.mass"].change == pytest.approx(60.0)


def test_fields_that_are_zero_or_ask_something_have_no_step() -> None:
    case = replace(CASE, actuator=replace(CASE.actuator, spread=replace(CASE.actuator.spread, delay=0.0)))
    paths = {step.path for step in ranked("thrust", case)}
    assert {"stroke", "valve.supply_c", "friction.coulomb", "load.mass", "spread.friction"} <= paths
    assert not paths & {"load.inclination", "load.extend_force", "extend_at", "spread.delay", "return_pressure"}
    assert not any(path.startswith(("require", "holding")) for path in paths)


def test_what_cannot_grow_shrinks() -> None:
    tight = replace(CASE.actuator, rod=0.06, cut_off=1.0, retract_at=0.95 * CASE.machine.cycle_time)
    steps = {step.path: step for step in ranked("thrust", replace(CASE, actuator=tight))}
    assert steps["rod"].after == pytest.approx(0.9 * 0.06)  # 66 mm would not fit into a bore of 63 mm
    assert steps["cut_off"].after == pytest.approx(0.9)
    assert steps["retract_at"].after == pytest.approx(0.9 * tight.retract_at)
    assert steps["load.process_force.2.to"].after > steps["load.process_force.2.to"].before


def test_a_step_that_cannot_be_taken_says_why() -> None:
    """A zone that fills the stroke can grow neither way round its one end."""
    zone = replace(CASE.actuator.load.process_force[0], start=0.95 * 0.2, end=0.2)
    narrow = replace(CASE.actuator, load=replace(CASE.actuator.load, process_force=(zone, zone)))
    step = next(
        step for step in ranked("thrust", replace(CASE, actuator=narrow)) if step.path == "load.process_force.1.to"
    )
    assert isinstance(step.figure, Refusal)
    assert step.change == step.figure


def test_a_figure_that_is_lost_on_the_way_comes_last() -> None:
    steps = ranked("lost")
    assert steps[-1].path == "bore"
    assert steps[-1].change == Refusal("out of reach")


def test_any_number_of_threads_gives_the_same_ranking() -> None:
    assert ranked("thrust", threads=1) == ranked("thrust", threads=4)


def test_it_can_be_cancelled() -> None:
    with pytest.raises(Cancelled, match="cancelled"):
        sensitivity(CASE.actuator, CASE.machine, CASE.site, known, "thrust", cancelled=lambda: True)
