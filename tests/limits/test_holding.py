"""Loss of supply and signal: what holds, what falls and how fast, by closed forms and by other ways to the same."""

from __future__ import annotations

import math
from dataclasses import replace
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.optimize import brentq

from actuator.errors import Refusal
from actuator.holding.held import Held, holding
from actuator.parts import Holding
from actuator.parts.valve import ValveFunction
from actuator.stroke.rows import flow_paths, parameters
from tests.agreement.cases import Case, base_case, case
from tests.agreement.project_side import project_result
from tests.strategies import cylinders

GRAVITY = 9.80665
NO_STROKE = Refusal("not simulated here")
FUNCTIONS: tuple[ValveFunction, ...] = ("5/2 spring", "5/2 detent", "5/3 closed", "5/3 exhausted", "5/3 pressurised")
some = settings(max_examples=40, deadline=None, derandomize=True, database=None)


def found(
    given_case: Case, function: ValveFunction = "5/3 exhausted", stroke: Any = NO_STROKE, **held: Any
) -> dict[tuple[str, str], Held]:
    """All six losses of a case by (what is lost, end)."""
    part = given_case.actuator
    part = replace(part, holding=Holding(**held), valve=replace(part.valve, function=function))
    par = parameters(part, given_case.machine, given_case.site, flow_paths(part))
    return {(item.case, item.start): item for item in holding(part, stroke, par)}


def lift(mass: float = 45.0, slope: float = 90.0, **more: Any) -> Case:
    return case("lift", 63, 20, 250, mass, c=3.0, slope=slope, **more)


def test_a_load_that_nothing_pulls_stays() -> None:
    level = base_case("level")
    for function in ("5/2 detent", "5/3 exhausted"):
        for item in found(level, function).values():
            assert item.holds
            assert (item.way, item.end_speed, item.end_energy) == (0.0, 0.0, 0.0)
            assert str(item.time) == "it holds"
    vented = found(level)["both lost", "extended"]
    assert (vented.by, vented.drive, vented.trapped, vented.direction) == ("nothing pushes it", 0.0, 0.0, "")


@pytest.mark.parametrize("slope", [90.0, 30.0, -90.0])
def test_a_frictionless_load_falls_as_any_body(slope: float) -> None:
    """v = √(2·g·h), t = √(2·s/(g·sin α))."""
    free = lift(slope=slope, friction=(0.0, 0.0, 0.0))
    item = found(free)["both lost", "extended" if slope > 0.0 else "retracted"]
    assert not item.holds
    assert item.direction == ("retract" if slope > 0.0 else "extend")
    pull = GRAVITY * abs(math.sin(math.radians(slope)))
    assert item.way == 0.25
    assert item.end_speed == pytest.approx(math.sqrt(2.0 * pull * 0.25), rel=1e-6)
    assert item.time == pytest.approx(math.sqrt(2.0 * 0.25 / pull), rel=1e-6)
    assert item.end_energy == pytest.approx(45.0 * pull * 0.25, rel=1e-6)
    assert item.starts_after == 0.0
    other = found(free)["both lost", "retracted" if slope > 0.0 else "extended"]
    assert (other.holds, other.by) == (True, "pressed to its end")


@pytest.mark.parametrize("viscous", [3.0, 300.0, 3e4])
def test_viscous_friction_brakes_as_the_textbook_says(viscous: float) -> None:
    """M·dv/dt = F − k·v: x(t) = v_t·(t − τ·(1 − e^(−t/τ))), v_t = F/k, τ = M/k; also where it only creeps."""
    item = found(lift(friction=(40.0, 40.0, viscous)))["both lost", "extended"]
    assert isinstance(item.time, float)
    terminal, tau = (45.0 * GRAVITY - 40.0) / viscous, 45.0 / viscous
    fallen = math.exp(-item.time / tau)
    assert terminal * (item.time - tau * (1.0 - fallen)) == pytest.approx(0.25, rel=2e-5)
    assert item.end_speed == pytest.approx(terminal * (1.0 - fallen), rel=2e-5)


def test_a_load_that_hardly_starts_creeps_and_gets_no_time() -> None:
    pull = 45.0 * GRAVITY
    item = found(lift(friction=(pull - 1e-3, pull - 60.0, 30.0)))["both lost", "extended"]
    assert not item.holds
    assert str(item.time) == "it creeps: longer than an hour"


@pytest.mark.parametrize(("lock", "holds"), [(0.0, False), (291.0, False), (292.0, True), (2000.0, True)])
def test_a_lock_holds_what_friction_does_not(lock: float, holds: bool) -> None:
    """45 kg·g = 441.3 N; breakaway 8 % of 6 bar on 63 mm = 149.6 N; the lock needs 291.7 N, by hand."""
    item = found(lift(), rod_lock=lock)["supply lost", "extended"]
    assert item.holds is holds
    assert item.by == ("rod lock" if holds else "")
    if not holds:
        assert item.end_energy == found(lift())["supply lost", "extended"].end_energy


def test_friction_that_holds_is_called_friction() -> None:
    item = found(lift(mass=10.0))["supply lost", "extended"]
    assert (item.holds, item.by) == (True, "friction")
    assert item.hold == pytest.approx(149.6, abs=0.05)


CLOSED, FALLS = "closed-in air", ""


@pytest.mark.parametrize(
    ("function", "held", "signal", "both", "supply"),
    [
        ("5/2 spring", {}, FALLS, FALLS, FALLS),
        ("5/2 spring", {"pilot_check": True}, FALLS, CLOSED, CLOSED),
        ("5/2 spring", {"supply_check": True}, FALLS, FALLS, CLOSED),
        ("5/2 detent", {}, "supply air", FALLS, FALLS),
        ("5/2 detent", {"supply_check": True}, "supply air", CLOSED, CLOSED),
        ("5/2 detent", {"pilot_check": True}, "supply air", CLOSED, CLOSED),
        ("5/3 closed", {}, CLOSED, CLOSED, FALLS),
        ("5/3 exhausted", {}, FALLS, FALLS, FALLS),
        ("5/3 exhausted", {"pilot_check": True}, CLOSED, CLOSED, CLOSED),
        ("5/3 exhausted", {"supply_check": True}, FALLS, FALLS, CLOSED),
        ("5/3 pressurised", {}, FALLS, FALLS, FALLS),
        ("5/3 pressurised", {"pilot_check": True}, FALLS, CLOSED, CLOSED),
    ],
)
def test_a_raised_load_is_held_by_what_the_circuit_says(
    function: ValveFunction, held: dict[str, bool], signal: str, both: str, supply: str
) -> None:
    """Common knowledge of circuits, no source: each row can be followed on a circuit drawing."""
    items = found(lift(), function, **held)
    assert items["signal lost", "extended"].by == signal
    assert items["both lost", "extended"].by == both
    assert items["supply lost", "extended"].by == supply


def test_pressure_on_both_sides_drives_a_level_piston_out_by_the_area_of_its_rod() -> None:
    item = found(base_case("level"), "5/3 pressurised")["signal lost", "retracted"]
    assert item.direction == "extend"
    assert item.drive == pytest.approx(6e5 * math.pi / 4.0 * 0.02**2, rel=1e-12)
    assert not item.holds


def test_a_lost_signal_that_turns_the_valve_gives_the_ordinary_stroke() -> None:
    given_case = base_case("level")
    stroke = project_result(given_case, ledger=False)
    item = found(given_case, "5/2 spring", stroke)["signal lost", "extended"]
    assert (item.time, item.end_speed) == (stroke.retract.stroke_time, stroke.retract.end_speed)
    assert item.end_energy == pytest.approx(stroke.retract.end_energy)
    refused = found(given_case, "5/2 spring")["signal lost", "extended"]
    assert (refused.time, refused.end_energy) == (NO_STROKE, NO_STROKE)


def test_closed_in_air_that_is_too_weak_gives_way_until_friction_holds() -> None:
    """A load above the cylinder's own force: p1·V1 = const, p2·V2 = const, isothermal; the place by scipy."""
    heavy = case("too heavy", 40, 16, 200, 90.0, c=2.0, slope=90.0)
    item = found(heavy, "5/3 closed")["signal lost", "extended"]
    part = heavy.actuator
    a1, a2, dead = part.area_cap, part.area_rod, part.dead_volume_cap

    def beyond(way: float) -> float:
        p1 = 7e5 * (dead + a1 * 0.2) / (dead + a1 * (0.2 - way))
        p2 = 1e5 * part.dead_volume_rod / (part.dead_volume_rod + a2 * way)
        return 90.0 * GRAVITY - p1 * a1 + p2 * a2 + 1e5 * (a1 - a2) - part.friction.breakaway

    assert not item.holds
    assert item.way == pytest.approx(brentq(beyond, 0.0, 0.199), rel=1e-9)
    assert isinstance(item.time, float)
    assert isinstance(item.end_energy, float)
    assert 0.0 < item.end_energy < (90.0 * GRAVITY) * item.way
    assert item.trapped == pytest.approx(6e5 * (dead + a1 * 0.2), rel=1e-12)
    # a check valve lets air in behind the piston, which then does not hang on thin air: it goes further
    checked = found(heavy, "5/3 exhausted", pilot_check=True)["signal lost", "extended"]
    assert (checked.cap, checked.rod) == ("checked", "checked")
    assert checked.way > item.way


@some
@given(cylinders(), st.sampled_from(FUNCTIONS), st.booleans(), st.booleans())
def test_energy_stays_below_what_the_force_can_give(
    drawn: Case, function: ValveFunction, supply_check: bool, pilot_check: bool
) -> None:
    """v² ≤ 2·(|D| − F_c)·S/M, and no more way than the stroke."""
    for item in found(drawn, function, supply_check=supply_check, pilot_check=pilot_check).values():
        assert 0.0 <= item.way <= drawn.actuator.stroke
        assert item.trapped >= 0.0
        if item.holds:
            assert item.end_energy == 0.0
            continue
        assert abs(item.drive) > item.hold
        assert (item.drive > 0.0) == (item.direction == "extend") == (item.start == "retracted")
        if isinstance(item.end_energy, float):
            bound = (abs(item.drive) - drawn.actuator.friction.coulomb) * item.way
            assert item.end_energy <= bound * (1.0 + 1e-4)


@some
@given(cylinders(), st.sampled_from(FUNCTIONS), st.booleans())
def test_a_lock_above_the_drive_holds_everything(drawn: Case, function: ValveFunction, check: bool) -> None:
    free = found(drawn, function, supply_check=check)
    strongest = max(abs(item.drive) for item in free.values())
    locked = found(drawn, function, supply_check=check, rod_lock=1.001 * strongest)
    assert all(item.holds for item in locked.values())
    assert all(locked[key].holds for key, item in free.items() if item.holds)


@some
@given(cylinders(), st.sampled_from(FUNCTIONS))
def test_check_valves_do_no_harm_when_the_supply_is_lost(drawn: Case, function: ValveFunction) -> None:
    free = found(drawn, function)
    for check in ("supply_check", "pilot_check"):
        checked = found(drawn, function, **{check: True})
        for end in ("extended", "retracted"):
            if free["supply lost", end].holds:
                assert checked["supply lost", end].holds


def test_a_mirrored_cylinder_falls_out_as_it_falls_in() -> None:
    """With a rod as thin as a thread both sides are alike: turned round, one end is the other."""
    up, down = (case("side", 50, 0.01, 300, 45.0, c=2.0, slope=tilt, dead=15.0) for tilt in (70.0, -70.0))
    for function in ("5/3 closed", "5/3 exhausted"):
        one, other = found(up, function, seal_leak_c=1e-12), found(down, function, seal_leak_c=1e-12)
        for lost in ("supply lost", "signal lost", "both lost"):
            for end, turned in (("extended", "retracted"), ("retracted", "extended")):
                first, second = one[lost, end], other[lost, turned]
                assert (first.holds, first.by) == (second.holds, second.by)
                assert first.drive == pytest.approx(-second.drive, rel=1e-6)
                if isinstance(first.starts_after, float):
                    assert first.starts_after == pytest.approx(second.starts_after, rel=1e-5)
                if isinstance(first.time, float):
                    assert first.time == pytest.approx(second.time, rel=1e-6)
