"""What the histories tell: lowest natural frequency, deceleration, letting go, by other ways to the same."""

from __future__ import annotations

import math
from dataclasses import replace
from typing import Any

import numpy as np
import pytest
from hypothesis import HealthCheck, given, settings
from scipy.integrate import solve_ivp

from actuator.errors import Refusal
from actuator.stroke.dynamics import Dynamics, dynamics
from actuator.stroke.result import StrokeResult
from actuator.stroke.rows import flow_paths, parameters
from tests.agreement.cases import Case, base_case, case
from tests.agreement.project_side import number, project_result
from tests.strategies import cylinders

GRAVITY = 9.80665
some = settings(
    max_examples=12, deadline=None, derandomize=True, database=None, suppress_health_check=[HealthCheck.too_slow]
)


def solved(given: Case, **how: Any) -> tuple[StrokeResult, Dynamics]:
    result = project_result(given, ledger=False, **how)
    par = np.array(parameters(given.actuator, given.machine, given.site, flow_paths(given.actuator)))
    return result, dynamics(given.actuator, given.machine, result, par)


def _accelerations(given: Case, result: StrokeResult, found: Dynamics, sign: float) -> np.ndarray[Any, Any]:
    """By the forces: what pushes less what opposes and rubs, over the mass, where the piston moves that way."""
    load, friction = given.actuator.load, given.actuator.friction
    v = np.abs(result.speed)
    opposing = load.extend_force if sign > 0.0 else load.retract_force
    seal = friction.coulomb + (friction.breakaway - friction.coulomb) * np.exp(-((v / friction.stribeck_speed) ** 2))
    guide = load.guide_friction * load.mass * GRAVITY * math.cos(load.inclination)
    a = (found.force - sign * (opposing + seal + friction.viscous * v + guide)) / load.mass
    moving: np.ndarray[Any, Any] = sign * a[sign * result.speed > 1e-6]
    return moving


@pytest.mark.parametrize(
    "given_case",
    [
        base_case("base"),
        base_case("heavy", mass=60.0),
        case("metered", 40, 16, 320, 25.0, c=2.0, slope=90, throttle=("meter-out", 1.0, 1.0, 3.0)),
        case("index 1.2", 50, 20, 400, 20.0, c=2.0, n=1.2, load={"retract_force": 150.0}),
    ],
    ids=lambda item: item.name,
)
def test_peak_deceleration_is_what_the_forces_give(given_case: Case) -> None:
    result, found = solved(given_case)
    for sign, half in ((1.0, found.extend), (-1.0, found.retract)):
        wanted = max(float(-_accelerations(given_case, result, found, sign).min()), 0.0)
        assert number(half.peak_deceleration) == pytest.approx(wanted, rel=0.02, abs=0.02)


@some
@given(cylinders())
def test_lowest_frequency_is_that_of_some_moment_of_the_motion(drawn: Case) -> None:
    result, found = solved(drawn)
    part = drawn.actuator
    n = part.polytropic_index or 1.4
    springs = result.p_cap * part.area_cap**2 / result.volume_cap + result.p_rod * part.area_rod**2 / result.volume_rod
    every = np.sqrt(n * springs / part.load.mass) / (2.0 * math.pi)
    for sign, half in ((1.0, found.extend), (-1.0, found.retract)):
        moving = sign * result.speed > 0.0
        if isinstance(half.natural_frequency, Refusal):
            assert not moving.any()
            continue
        assert half.natural_frequency == pytest.approx(every[moving].min(), rel=1e-9)
        assert number(half.peak_deceleration) >= 0.0


@some
@given(cylinders())
def test_unloading_takes_longer_than_letting_go_and_both_fall_before_the_start(drawn: Case) -> None:
    result, found = solved(drawn)
    for half, way in ((found.extend, result.extend), (found.retract, result.retract)):
        if isinstance(half.release_time, Refusal) or isinstance(half.unloaded_time, Refusal):
            continue
        assert half.unloaded_time >= half.release_time
        if not isinstance(way.reaction_time, Refusal) and half.unloaded_time > 0.0:
            assert half.unloaded_time <= way.reaction_time + 1e-6


def test_a_clamp_lets_go_when_its_chamber_has_vented_far_enough() -> None:
    """Held at the end by a load that cannot be pulled: the cap side blows down isothermally and choked.

    p1 at which p1·A1 = p2·A2 + p0·(A1 − A2) + F_c is crossed is found by scipy from the two mass balances alone.
    """
    clamp = case(
        "clamp", 63, 20, 50, 5.0, c=1.0, period=20.0, delay=0.03, opening=0.0, dead=400.0, n=1.0,
        load={"retract_force": 5000.0},
    )  # fmt: skip
    held = replace(clamp, actuator=replace(clamp.actuator, retract_at=10.0))
    result, found = solved(held)
    part = held.actuator
    assert result.extend.completed or result.position.max() == pytest.approx(0.05)
    # retract_force keeps the piston out, so volumes stay as they are at the extended end
    volumes = np.array([400e-6 + part.area_cap * 0.05, 400e-6])
    r, t0, c, rho, p0, p_s = 287.05, 293.15, 1e-8, 1.185, 1e5, 7e5

    def flow(up: float, down: float) -> float:
        ratio = down / up
        share = 1.0 if ratio <= 0.3 else math.sqrt(max(1.0 - ((ratio - 0.3) / 0.7) ** 2, 0.0))
        return c * rho * up * share

    def rates(_: float, p: Any) -> list[float]:
        return [-r * t0 / volumes[0] * flow(p[0], p0), r * t0 / volumes[1] * flow(p_s, p[1])]

    def left(_: float, p: Any, level: float) -> float:
        return float(p[0] * part.area_cap - p[1] * part.area_rod - p0 * (part.area_cap - part.area_rod) - level)

    for level, got in ((part.friction.coulomb, found.retract.release_time), (0.0, found.retract.unloaded_time)):

        def crossing(t: float, p: Any, wanted: float = level) -> float:
            return left(t, p, wanted)

        crossing.terminal = True  # type: ignore[attr-defined]
        solution = solve_ivp(rates, (0.0, 5.0), [p_s, p0], events=crossing, rtol=1e-9, atol=1e-3)
        assert solution.t_events is not None
        assert number(got) - 0.03 == pytest.approx(float(solution.t_events[0][0]), rel=2e-3)


def test_nothing_to_let_go_is_no_time_and_what_stays_is_refused() -> None:
    part = base_case("idle", period=2.0, load={"extend_force": 1e5, "retract_force": 1e5})
    _, found = solved(part)
    assert isinstance(found.extend.natural_frequency, Refusal)
    assert str(found.extend.peak_deceleration) == "the piston does not move this way"
    pushed = base_case("pushed", load={"constant_force": 5000.0})
    _, found = solved(pushed)
    assert found.extend.release_time == 0.0
    assert "still stand at the next command" in str(found.retract.unloaded_time)
