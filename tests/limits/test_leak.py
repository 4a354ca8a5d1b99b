"""How long closed-in air holds: closed form while choked, and the balance of both chambers by scipy."""

from __future__ import annotations

import math
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.integrate import solve_ivp

from actuator.errors import Refusal
from actuator.holding.leak import NEVER, NO_LEAK, start_of_motion, time_to_fall
from tests.agreement.cases import case
from tests.limits.test_holding import FUNCTIONS, found, lift

R_AIR, RHO, T0 = 287.05, 1.185, 293.15
LEAK = 1e-12
"""0.0001 dm³/(s·bar): small. [m³/(s·Pa)]"""
quick = settings(max_examples=60, deadline=None, derandomize=True, database=None)


@quick
@given(st.floats(2.01e5, 1.2e6), st.floats(0.0, 1.0), st.floats(1e-6, 1e-2), st.floats(250.0, 330.0))
def test_choked_leak_follows_its_closed_form(high: float, share: float, volume: float, temp: float) -> None:
    """t = V/(R·√(T·T0)·C·ρ0)·ln(p1/p2), down to twice the ambient pressure."""
    low = 2.0e5 + share * (high - 2.0e5)
    expected = volume / (R_AIR * math.sqrt(temp * T0) * LEAK * RHO) * math.log(high / low)
    time = time_to_fall(high, low, 1e5, volume, math.inf, temp=temp, conductance=LEAK)
    assert time == pytest.approx(expected, rel=1e-8, abs=1e-9 * volume / LEAK)


def _flow(up: float, down: float) -> float:
    """ISO 6358 with b = 0.5 at 20 °C, either direction. [kg/s]"""
    if up < down:
        return -_flow(down, up)
    ratio = down / up
    share = 1.0 if ratio <= 0.5 else math.sqrt(max(1.0 - ((min(ratio, 0.999) - 0.5) / 0.5) ** 2, 0.0))
    return LEAK * RHO * up * share * (1.0 if ratio <= 0.999 else (1.0 - ratio) / 0.001)


def _by_balance(volumes: tuple[float, float], p: list[float], force: Any, across: bool) -> float:
    """Time until ``force(p1, p2)`` falls to zero, both chambers' balances by scipy; infinite where it never does."""

    def rates(_: float, now: Any) -> list[float]:
        if across:
            q = _flow(now[0], now[1])
            return [-R_AIR * T0 / volumes[0] * q, R_AIR * T0 / volumes[1] * q]
        return [-R_AIR * T0 / v * _flow(x, 1e5) for v, x in zip(volumes, now, strict=True)]

    def gone(_: float, now: Any) -> float:
        return float(force(*now))

    gone.terminal = True  # type: ignore[attr-defined]
    solution = solve_ivp(rates, (0.0, 1e6), p, method="LSODA", events=gone, rtol=1e-10, atol=1e-4, max_step=500.0)
    assert solution.t_events is not None
    return float(solution.t_events[0][0]) if solution.t_events[0].size else math.inf


@pytest.mark.parametrize("mass", [30.0, 45.0, 80.0])
def test_a_closed_centre_lets_go_when_the_balance_of_both_chambers_says(mass: float) -> None:
    """The sooner of leaking outwards and across the piston, from the full cap side at the extended end."""
    raised = lift(mass)
    part = raised.actuator
    volumes = (part.dead_volume_cap + part.area_cap * 0.25, part.dead_volume_rod)

    def left(p1: float, p2: float) -> float:
        push = p1 * part.area_cap - p2 * part.area_rod - 1e5 * (part.area_cap - part.area_rod)
        return push - mass * 9.80665 + part.friction.breakaway

    times = [_by_balance(volumes, [7e5, 1e5], left, across) for across in (False, True)]
    item = found(raised, "5/3 closed", seal_leak_c=LEAK)["signal lost", "extended"]
    assert (item.holds, item.by, item.direction) == (True, "closed-in air", "retract")
    assert item.starts_after == pytest.approx(min(times), rel=1e-5)


def test_a_check_valve_in_the_supply_holds_until_the_chamber_has_leaked_outwards() -> None:
    raised = lift()
    part = raised.actuator
    volumes = (part.dead_volume_cap + part.area_cap * 0.25, part.dead_volume_rod)

    def left(p1: float, _: float) -> float:
        return (p1 - 1e5) * part.area_cap - 45.0 * 9.80665 + part.friction.breakaway

    item = found(raised, "5/2 detent", supply_check=True, seal_leak_c=LEAK)["supply lost", "extended"]
    assert item.starts_after == pytest.approx(_by_balance(volumes, [7e5, 1e5], left, False), rel=1e-5)


@pytest.mark.parametrize("function", FUNCTIONS)
def test_half_the_leak_holds_twice_as_long(function: Any) -> None:
    one, two = (found(lift(), function, pilot_check=True, seal_leak_c=c) for c in (LEAK, 0.5 * LEAK))
    for key, item in one.items():
        if isinstance(item.starts_after, float) and item.starts_after > 0.0:
            assert two[key].starts_after == pytest.approx(2.0 * item.starts_after, rel=1e-9)


def test_without_a_leak_the_time_is_refused_and_friction_may_hold_for_good() -> None:
    raised = found(lift(), "5/3 closed")["signal lost", "extended"]
    assert raised.starts_after == NO_LEAK
    assert str(NO_LEAK) == "no leak is given, so the time is not known"
    assert raised.direction == "retract"
    lowered = found(lift(), "5/3 closed")["signal lost", "retracted"]
    assert (lowered.starts_after, lowered.direction) == (NEVER, "")
    open_sides = found(lift(mass=1.0))["signal lost", "extended"]
    assert str(open_sides.starts_after) == "no closed-in air holds it"


def test_leaking_across_the_piston_can_push_a_light_load_out() -> None:
    """Both sides at one pressure push by the area of the rod: a level piston that friction holds no longer."""
    level = case("level", 50, 25, 200, 5.0, c=2.0, friction=(40.0, 30.0, 30.0))
    item = found(level, "5/3 closed", seal_leak_c=LEAK)["signal lost", "retracted"]
    assert (item.by, item.direction) == ("pressed to its end", "extend")
    assert isinstance(item.starts_after, float)


def test_a_leak_that_changes_nothing_never_starts() -> None:
    none = start_of_motion(
        p_held=7e5, p_other=1e5, volume=1e-3, other_volume=None, rise=1e-3, other_rise=-1e-3, pressing=700.0,
        p_ambient=1e5, temp=T0, conductance=LEAK,
    )  # fmt: skip
    assert none == NEVER
    assert isinstance(none, Refusal)
