"""Slopes in closed form against differences, and the linear systems made of them."""

from __future__ import annotations

import math

import numpy as np
import pytest

from actuator.flow.scalar import passage, passage_slope
from actuator.mechanics.friction import running, running_slope
from actuator.stroke import layout as at
from actuator.stroke.equations import rates
from actuator.stroke.slopes import Jacobian, cap_tangent, chamber_change, slopes_at, solve, system
from actuator.stroke.states import Row, State
from tests.stroke.states import moving

STATES = {
    "both choked": moving(full=0.5, rest=0.7),
    "both subsonic": moving(full=0.9, rest=0.2),
    "near the supply": moving(full=0.9995, rest=0.3),
    "above the supply": moving(full=1.1, rest=0.4),
    "below ambient": moving(full=0.7, rest=0.1),
    "back": moving(direction=-1.0),
    "valve opening": moving(over=0.02),
    "polytropic": moving(index=1.2),
    "isothermal": moving(index=1.0, full=0.4),
}


def _dense(jac: Jacobian) -> np.ndarray[tuple[int, int], np.dtype[np.float64]]:
    full = np.zeros((6, 6))
    full[0, 1] = 1.0
    full[1, [0, 1, 3, 5]] = jac.a_x, jac.a_v, jac.a_u1, jac.a_u2
    for row, own in ((2, jac.cap), (4, jac.rod)):
        full[row, [0, row, row + 1]] = own.m_x, own.m_m, own.m_u
        full[row + 1, [0, 1, row, row + 1]] = own.u_x, own.u_v, own.u_m, own.u_u
    return full


def _moved(y: State, place: int, by: float) -> State:
    found = list(y)
    found[place] += by
    return found[0], found[1], found[2], found[3], found[4], found[5]


@pytest.mark.parametrize("name", STATES)
def test_jacobian_against_central_differences(name: str) -> None:
    time, y, mode, par = STATES[name]
    found = _dense(slopes_at(time, y, mode, par).jacobian)
    sizes = np.array([par[at.STROKE], 0.6, *y[2:]])
    expected = np.empty((6, 6))
    for column in range(6):
        step = 1e-6 * sizes[column]
        ahead = rates(time, _moved(y, column, step), mode, par)
        back = rates(time, _moved(y, column, -step), mode, par)
        expected[:, column] = (np.array(ahead) - np.array(back)) / (2.0 * step)
    # in units of each state's own size, so that one tolerance serves all
    scaled = expected * sizes[None, :] / sizes[:, None]
    np.testing.assert_allclose(
        found * sizes[None, :] / sizes[:, None], scaled, rtol=1e-6, atol=1e-7 * float(np.abs(scaled).max())
    )


def test_slope_in_time_while_the_valve_opens() -> None:
    time, y, mode, par = STATES["valve opening"]
    step = 1e-6
    expected = (np.array(rates(time + step, y, mode, par)) - np.array(rates(time - step, y, mode, par))) / (2.0 * step)
    found = slopes_at(time, y, mode, par).by_time
    np.testing.assert_allclose(found, expected, rtol=1e-6, atol=1e-12)
    assert found[3] > 0.0
    open_now = slopes_at(1.0, y, mode, par).by_time
    assert open_now == (0.0, 0.0, 0.0, 0.0, 0.0, 0.0)


@pytest.mark.parametrize("g", [10.0, 1e3, 1e6])
@pytest.mark.parametrize("name", STATES)
def test_systems_are_solved(name: str, g: float) -> None:
    time, y, mode, par = STATES[name]
    jac = slopes_at(time, y, mode, par).jacobian
    right = (1e-3, 2.0, 1e-3 * y[2], 0.1 * y[3], -2e-3 * y[4], 0.3 * y[5])
    matrix = g * np.eye(6) - _dense(jac)
    found = np.array(solve(system(g, jac), right))
    terms = np.abs(matrix) @ np.abs(found) + np.abs(right)
    assert float((np.abs(matrix @ found - right) / terms).max()) < 1e-14


def test_at_rest_position_and_speed_stand_still() -> None:
    time, y, mode, par = moving()
    mode[at.DIRECTION] = 0.0
    resting: State = (y[0], 0.0, y[2], y[3], y[4], y[5])
    jac = slopes_at(time, resting, mode, par).jacobian
    found = solve(system(100.0, jac), (0.0, 0.0, 1e-5, 1.0, 1e-5, 1.0))
    assert found[:2] == (0.0, 0.0)


def test_a_vented_side_changes_nothing() -> None:
    time, y, mode, par = moving()
    par[at.VENTED_CAP] = 1.0
    jac = slopes_at(time, y, mode, par).jacobian
    assert (jac.a_u1, *jac.cap) == (0.0,) * 8
    assert chamber_change(cap_tangent(time, y, mode, par), par[at.AREA_CAP], 1.0, 1.0, 1.0, 1.0, 1.0, par).inflow == 0.0


@pytest.mark.parametrize("m", [0.5, 0.42])
@pytest.mark.parametrize("ratio", [0.1, 0.29, 0.31, 0.6, 0.95, 0.9985, 0.9995])
def test_flow_slope_against_differences(ratio: float, m: float) -> None:
    def flow(p_up: float, p_down: float) -> float:
        return passage(p_up, p_down, 300.0, 2e-8, 0.3, m)

    p_up, p_down, step = 7e5, ratio * 7e5, 0.5
    by_down = (flow(p_up, p_down + step) - flow(p_up, p_down - step)) / (2.0 * step)
    by_up = (flow(p_up + step, p_down) - flow(p_up - step, p_down)) / (2.0 * step)
    slope = passage_slope(flow(p_up, p_down), p_up, p_down, 300.0, 2e-8, 0.3, m)
    scale = flow(p_up, 0.0) / p_up
    assert slope == pytest.approx(by_down, rel=1e-6, abs=1e-7 * scale)
    assert (flow(p_up, p_down) - p_down * slope) / p_up == pytest.approx(by_up, rel=1e-6, abs=1e-7 * scale)


def test_flow_slope_where_pressures_are_equal_is_that_of_the_straight_piece() -> None:
    straight = -passage(7e5, 0.9995 * 7e5, 300.0, 2e-8, 0.3, 0.5) / (0.0005 * 7e5)
    assert passage_slope(0.0, 7e5, 7e5, 300.0, 2e-8, 0.3, 0.5) == pytest.approx(straight, rel=1e-9)


@pytest.mark.parametrize("speed", [0.0, 0.01, 0.03, 0.13])
def test_friction_slope_against_differences(speed: float) -> None:
    par: Row = [90.0, 60.0, 30.0, 0.02]
    step = 1e-7
    expected = (running(speed + step, *par) - running(speed - step, *par)) / (2.0 * step)
    assert running_slope(speed, *par) == pytest.approx(expected, rel=1e-6)


def test_friction_beyond_the_stribeck_range_has_lost_only_rounding() -> None:
    for speed in (0.1399999, 0.1400001):
        whole = 60.0 + 30.0 * math.exp(-((speed / 0.02) ** 2)) + 30.0 * speed
        assert running(speed, 90.0, 60.0, 30.0, 0.02) == pytest.approx(whole, rel=1e-15)
