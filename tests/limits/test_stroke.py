"""The simulated cylinder where a closed form is known: tanks, free pistons, slow strokes, mirrors."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
import pytest

from actuator.stroke.result import StrokeResult
from tests.agreement.cases import CONDUCTANCE, Case, base_case, case
from tests.agreement.project_side import number, project_result
from tests.conservation.support import solved

R_AIR, GAMMA, RHO_ANR, T0 = 287.05, 1.4, 1.185, 293.15
VOLUME = 1e-3
"""The blocked cylinder's cap side: one litre of dead volume. [m³]"""


def _tank(**given: Any) -> Case:
    """A cylinder held by its load at the retracted end; C 1 dm³/(s·bar), V 1 L, 7 bar into 0.5 bar."""
    held = {"extend_force": 1e5, "retract_force": 1e5}
    return case(
        "tank", 50, 20, 1, 1.0, c=1.0, b=0.28, supply=7.0, ambient=0.5, period=20.0, delay=0.0, opening=0.0,
        dead=1000.0, friction=(0.0, 0.0, 0.0), load=held, **given,
    )  # fmt: skip


def _choked(p: float, temp: float, c: float = CONDUCTANCE) -> float:
    """Choked flow after ISO 6358-1. [kg/s]"""
    return c * p * RHO_ANR * math.sqrt(T0 / temp)


def _venting(result: StrokeResult, down_to: float) -> tuple[float, float, float, float]:
    """Blow-down of the cap side from the command at 10 s: (p, T) at its start, then (time, T) at ``down_to``."""
    after = result.time >= 10.0
    time, p, temp = result.time[after] - 10.0, result.p_cap[after], result.temp_cap[after]
    start_p, start_t = float(p[0]), float(temp[0])
    end = float(np.interp(-down_to, -p, time))
    return start_p, start_t, end, float(np.interp(end, time, temp))


@pytest.mark.parametrize(
    ("given", "printed"),
    [({"n": 1.0}, 6.98), ({"h": 0.0}, 9.77), ({"n": 1.4}, 9.77), ({"h": 1e7}, 6.98)],
    ids=["isothermal", "adiabatic", "index 1.4", "walls without bound"],
)
def test_a_blocked_cylinder_fills_like_a_tank(given: dict[str, Any], printed: float) -> None:
    """Choked charge: the pressure rises at n·R·T_s·q/V; 6.98 and 9.77 bar/s worked out, no publication."""
    result = project_result(_tank(**given))
    filling = (result.time < 10.0) & (result.p_cap < 0.28 * 7e5) & (result.p_cap > 0.55e5)
    time, p = result.time[filling], result.p_cap[filling]
    rate = (p[-1] - p[0]) / (time[-1] - time[0])
    n = given.get("n", GAMMA if given.get("h") == 0.0 else 1.0)
    assert rate / 1e5 == pytest.approx(printed, abs=0.005)
    assert rate == pytest.approx(n * R_AIR * T0 * _choked(7e5, T0) / VOLUME, rel=1e-4)
    assert result.flow_supply[filling] == pytest.approx(_choked(7e5, T0), rel=1e-4)
    assert result.extend.peak_flow == pytest.approx(_choked(7e5, T0), rel=1e-4)


def test_isothermal_blow_down_of_a_litre_takes_the_worked_out_time() -> None:
    """7 to 2 bar, choked: V/(R·T·C·ρ0)·ln(7/2) = 1.256 s at 20 °C, worked out, no publication."""
    start_p, start_t, time, end_t = _venting(project_result(_tank(n=1.0)), 2e5)
    assert start_p == pytest.approx(7e5, rel=1e-6)
    assert time == pytest.approx(1.256, abs=0.0005)
    assert (start_t, end_t) == pytest.approx((T0, T0), rel=1e-6)


def test_adiabatic_blow_down_of_a_litre_takes_the_worked_out_time() -> None:
    """7 to 2 bar from 20 °C, choked: 0.983 s, ending at 204.9 K; worked out, no publication.

    Filling heats the air; supply and site stand at 229.24 K so that the full tank stands at 293.15 K.
    """
    cold = {"temp_supply": 229.24, "temp_ambient": 229.24, "h": 0.0}
    start_p, start_t, time, end_t = _venting(project_result(_tank(**cold)), 2e5)
    assert start_p == pytest.approx(7e5, rel=1e-6)
    assert start_t == pytest.approx(T0, abs=0.05)
    assert time == pytest.approx(0.983, abs=0.0005)
    assert end_t == pytest.approx(204.9, abs=0.1)


@pytest.mark.parametrize("given", [{"h": 0.0}, {"n": 1.0}], ids=["adiabatic", "isothermal"])
def test_choked_blow_down_follows_its_closed_form_all_the_way(given: dict[str, Any]) -> None:
    result = project_result(_tank(**given))
    _, start_t, _, _ = _venting(result, 2e5)
    choked = (result.time >= 10.0) & (result.p_cap > 0.5e5 / 0.28 * 1.01)
    time = result.time[choked] - 10.0
    pull = R_AIR * _choked(1.0, start_t) * start_t / VOLUME
    if "n" in given:
        expected = 7e5 * np.exp(-pull * time)
    else:
        expected = 7e5 * (1.0 + 0.5 * (GAMMA - 1.0) * pull * time) ** (-2.0 * GAMMA / (GAMMA - 1.0))
    assert result.p_cap[choked] == pytest.approx(expected, rel=1e-5)


def test_isothermal_blow_down_of_a_printed_vessel() -> None:
    """70.76 s: Murugaperumal, ex. 1.39, p. 68: 5 m³ through 10 cm² at 60 °C, 40 to 2 bar into 1 bar.

    The nozzle's choked flow is 0.0404184·A·p/√T (SI, air), which gives its sonic conductance; the book's
    R of 287 against 287.05 is 0.02 %.
    """
    c = 0.0404184 * 10e-4 / (RHO_ANR * math.sqrt(T0)) / CONDUCTANCE
    vessel = case(
        "vessel", 50, 20, 1, 1.0, c=c, b=0.5, supply=40.0, ambient=1.0, period=2000.0, delay=0.0,
        opening=0.0, dead=5e6, friction=(0.0, 0.0, 0.0), n=1.0, temp_supply=333.15, temp_ambient=333.15,
        load={"extend_force": 1e6, "retract_force": 1e6},
    )  # fmt: skip
    result = project_result(vessel)
    after = result.time >= 1000.0
    assert result.p_cap[after][0] == pytest.approx(40e5, rel=1e-6)
    time = np.interp(-2e5, -result.p_cap[after], result.time[after]) - 1000.0
    assert time == pytest.approx(70.76, rel=5e-4)


def test_adiabatic_filling_ends_at_the_temperature_of_the_energy_balance() -> None:
    """m·cv·T gains cp·T_s for each kilogram: T = p2/(p1/T1 + (p2 − p1)/(γ·T_s))."""
    result = project_result(_tank(h=0.0))
    before, full = int(np.argmin(result.time)), int(np.searchsorted(result.time, 10.0)) - 1
    p1, t1, p2 = result.p_cap[before], result.temp_cap[before], result.p_cap[full]
    assert result.temp_cap[full] == pytest.approx(p2 / (p1 / t1 + (p2 - p1) / (GAMMA * T0)), rel=1e-5)


def test_a_blocked_cylinder_draws_what_its_volume_holds() -> None:
    """Isothermal, one litre a side from 0.5 to 7 bar: the cap's litre, and the rod's with its annulus."""
    blocked = _tank(n=1.0)
    result = project_result(blocked)
    volume = 2e-3 + blocked.actuator.area_rod * 1e-3
    drawn = result.extend.air_drawn + result.retract.air_drawn
    assert drawn == pytest.approx(6.5e5 * volume / (R_AIR * T0), rel=1e-5)
    assert not result.extend.completed
    assert result.extend.position_reached == 0.0


def test_a_free_mass_is_thrown_by_the_full_force() -> None:
    """No friction, no load, valves without bound: v² = 2·F·S/M and t² = 2·S·M/F."""
    thrown = base_case("thrown", c=100.0, dead=5.0, friction=(0.0, 0.0, 0.0))
    heavy = base_case("thrown", c=100.0, dead=5.0, friction=(0.0, 0.0, 0.0), mass=200.0)
    force = 6e5 * math.pi / 4 * 0.05**2
    for free, mass in ((thrown, 20.0), (heavy, 200.0)):
        half = project_result(free).extend
        assert number(half.end_speed) == pytest.approx(math.sqrt(2.0 * force * 0.4 / mass), rel=0.03)
        assert number(half.stroke_time) == pytest.approx(math.sqrt(2.0 * 0.4 * mass / force), rel=0.03)
        assert number(half.end_energy) == pytest.approx(force * 0.4, rel=0.05)
        assert number(half.mean_speed) == pytest.approx(0.5 * number(half.end_speed), rel=0.05)


def _slow() -> Case:
    """Against nearly all of the push both ways, no friction, walls that keep the air at T0."""
    push, pull = (6e5 * math.pi / 4 * (0.05**2 - rod**2) for rod in (0.0, 0.02))
    return case(
        "slow", 50, 20, 400, 200.0, c=2.0, period=200.0, friction=(0.0, 0.0, 0.0), dead=0.1, delay=0.0,
        opening=0.0, h=1e5, load={"extend_force": 0.998 * push, "retract_force": 0.998 * pull},
    )  # fmt: skip


def test_a_frictionless_slow_stroke_gives_the_load_the_integral_of_p_dv() -> None:
    slow = _slow()
    result = project_result(slow)
    out = result.time <= number(result.extend.stroke_time)
    p0 = slow.site.ambient_pressure
    work = np.trapezoid(result.p_cap[out] - p0, result.volume_cap[out])
    work += np.trapezoid(result.p_rod[out] - p0, result.volume_rod[out])
    given = slow.actuator.load.extend_force * slow.actuator.stroke + number(result.extend.end_energy)
    assert work == pytest.approx(given, rel=1e-4)
    assert work == pytest.approx(6e5 * slow.actuator.area_cap * 0.4, rel=2e-3)


def test_a_slow_isothermal_stroke_is_reversible_but_for_what_it_vents() -> None:
    """Throttling, mixing, wall film and pushing air out all vanish with the speed."""
    items = solved(_slow()).ledger
    assert items.friction == 0.0
    assert items.supply_path + items.heat < 0.02 * items.supplied
    assert items.mixing < 1e-6 * items.supplied
    assert items.exhaust_path < 0.02 * items.supplied


@pytest.mark.parametrize(
    ("given", "index"),
    [({"h": 0.0}, 1.4), ({"n": 1.0}, 1.0), ({"n": 1.2}, 1.2), ({"h": 1e7}, 1.0)],
    ids=["adiabatic", "isothermal", "index 1.2", "walls without bound"],
)
def test_shut_in_air_expands_along_its_polytrope(given: dict[str, Any], index: float) -> None:
    """After the cut-off p·Vⁿ stays, also where the piston swings back: reversible."""
    swinging = base_case("swinging", c=4.0, mass=5.0, friction=(0.0, 0.0, 1.0), cut_off=0.3, **given)
    result = project_result(swinging)
    extending = result.time < 2.0
    beyond = np.flatnonzero(extending & (result.position > 0.3 * 0.4 + 1e-9))
    shut_in = slice(int(beyond[0]), int(np.flatnonzero(extending)[-1]))
    p, v = result.p_cap[shut_in], result.volume_cap[shut_in]
    assert v.max() > 1.5 * v[0]
    assert np.any(np.diff(result.position[shut_in]) < -1e-6)  # it does swing back
    assert p * v**index == pytest.approx(np.full(len(p), p[0] * v[0] ** index), rel=1e-4)


@pytest.mark.parametrize("slope", [0.0, 60.0])
def test_a_mirrored_cylinder_extends_as_it_retracts(slope: float) -> None:
    """With a rod as thin as a thread both sides are alike: turned round, one way is the other."""

    def result(tilt: float, dead: tuple[float, float], needles: tuple[float, float]) -> StrokeResult:
        throttle = ("meter-out", *needles, 3.0)
        return project_result(
            case("side", 50, 0.01, 300, 15.0, c=2.0, period=3.0, slope=tilt, dead=dead, throttle=throttle)
        )

    one, other = result(slope, (15.0, 30.0), (1.0, 0.6)), result(-slope, (30.0, 15.0), (0.6, 1.0))
    for out, back in ((one.extend, other.retract), (one.retract, other.extend)):
        for figure in ("reaction_time", "stroke_time", "end_speed", "mean_speed", "end_energy"):
            mirrored = number(getattr(back, figure))
            assert number(getattr(out, figure)) == pytest.approx(mirrored, rel=1e-5), figure
        assert out.peak_speed == pytest.approx(back.peak_speed, rel=1e-5)
        assert out.air_drawn == pytest.approx(back.air_drawn, rel=1e-5)
        assert out.position_reached == pytest.approx(0.3 - back.position_reached, abs=1e-9)
