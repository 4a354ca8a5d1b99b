"""Air: what must hold whatever the numbers are."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.integrate import quad
from scipy.special import exprel as reference_exprel

from actuator.air.exergy import flow_exergy, stored_exergy, unused_share
from actuator.air.gas import CP, CV, GAMMA, R_AIR, TEMP_ANR
from actuator.air.humidity import (
    condensate,
    dew_point,
    humidity_ratio,
    pressure_dew_point,
    saturation_pressure,
    vapour_pressure,
)
from actuator.air.states import STATES, anr_volume, dry_density, dry_density_at, dry_mass, free_volume
from actuator.air.work import (
    end_pressure,
    end_temperature,
    exprel,
    piston_force,
    polytropic_heat,
    polytropic_index,
    polytropic_work,
    useful_work,
)
from actuator.errors import InputError

quick = settings(deadline=None, max_examples=60, database=None)
pressures = st.floats(2e4, 2e6)
temperatures = st.floats(230.0, 400.0)
volumes = st.floats(1e-6, 1.0)
indices = st.floats(0.0, 1.6)


@quick
@given(pressures, volumes, volumes, indices)
def test_work_is_the_integral_of_p_dv(p: float, v1: float, v2: float, index: float) -> None:
    exponent = 1.0 - index  # in ln V the integrand p·V is smooth
    area, _ = quad(lambda x: p * v1 * math.exp(exponent * x), 0.0, math.log(v2 / v1), epsabs=0.0, epsrel=1e-11)
    assert float(polytropic_work(p, v1, v2, index)) == pytest.approx(area, rel=1e-8, abs=1e-12 * p * v1)


@quick
@given(st.floats(-50.0, 50.0))
def test_relative_growth_is_that_of_scipy(z: float) -> None:
    assert float(exprel(z)) == pytest.approx(float(reference_exprel(z)), rel=1e-15)
    assert float(exprel(z * 1e-12)) == pytest.approx(float(reference_exprel(z * 1e-12)), rel=1e-15)
    assert exprel(0.0) == 1.0


@pytest.mark.parametrize("off", [1e-3, 1e-6, 1e-9, 1e-12, 0.0])
def test_work_is_smooth_through_the_isothermal(off: float) -> None:
    isothermal = 7e5 * 1e-3 * math.log(3.0)
    for index in (1.0 - off, 1.0 + off):
        slope = 0.5 * isothermal * math.log(3.0)  # dW/d(1 − n) at n = 1
        expected = isothermal + slope * (1.0 - index)
        assert polytropic_work(7e5, 1e-3, 3e-3, index) == pytest.approx(expected, rel=2.0 * off**2 + 1e-14)


@quick
@given(pressures, volumes, volumes, volumes, indices)
def test_work_adds_up_along_the_way_and_comes_back(p: float, v1: float, v2: float, v3: float, index: float) -> None:
    middle = float(end_pressure(p, v1, v2, index))
    first, second = polytropic_work(p, v1, v2, index), polytropic_work(middle, v2, v3, index)
    scale = abs(float(first)) + abs(float(second)) + 1e-30
    assert abs(float(first + second - polytropic_work(p, v1, v3, index))) < 1e-9 * scale
    assert float(polytropic_work(middle, v2, v1, index)) == pytest.approx(-float(first), rel=1e-9)


@quick
@given(pressures, volumes, volumes, indices)
def test_first_law_of_the_closed_change(p: float, v1: float, v2: float, index: float) -> None:
    inner = (float(end_pressure(p, v1, v2, index)) * v2 - p * v1) / (GAMMA - 1.0)
    heat, work = float(polytropic_heat(p, v1, v2, index)), float(polytropic_work(p, v1, v2, index))
    assert abs(heat - work - inner) < 1e-9 * (abs(heat) + abs(work) + abs(inner) + p * v1)


def test_heat_at_the_ends() -> None:
    assert polytropic_heat(5e5, 1e-3, 2e-3, GAMMA) == 0.0
    assert polytropic_heat(5e5, 1e-3, 2e-3, 1.0) == pytest.approx(float(polytropic_work(5e5, 1e-3, 2e-3, 1.0)))


@quick
@given(pressures, temperatures, volumes, volumes, indices)
def test_end_state_is_an_ideal_gas_of_the_same_mass(p: float, temp: float, v1: float, v2: float, n: float) -> None:
    before = p * v1 / temp
    after = float(end_pressure(p, v1, v2, n)) * v2 / float(end_temperature(temp, v1, v2, n))
    assert after == pytest.approx(before, rel=1e-9)


def test_index_is_found_again_and_arrays_broadcast() -> None:
    index = np.array([[0.5], [1.0], [1.3]])
    v2 = np.array([2e-3, 5e-4])
    p2 = end_pressure(3e5, 1e-3, v2, index)
    assert polytropic_index(3e5, 1e-3, p2, v2) == pytest.approx(np.broadcast_to(index, (3, 2)), rel=1e-12)
    assert polytropic_work(3e5, 1e-3, v2, index).shape == (3, 2)


def test_atmosphere_behind_the_piston_costs_nothing_at_ambient_pressure() -> None:
    assert useful_work(1e5, 1e-3, 4e-3, 0.0, 1e5) == pytest.approx(0.0, abs=1e-12)
    assert piston_force(1e5, 1e5, 1e5, area_cap=2e-3, area_rod=1.6e-3) == pytest.approx(0.0, abs=1e-10)


def test_constants_hang_together() -> None:
    assert pytest.approx(R_AIR, rel=1e-15) == CP - CV
    assert pytest.approx(GAMMA, rel=1e-15) == CP / CV


@quick
@given(pressures, temperatures, volumes)
def test_stored_exergy_is_never_negative(p: float, temp: float, volume: float) -> None:
    assert float(stored_exergy(p, temp, volume, 1e5, TEMP_ANR)) >= -1e-9 * p * volume


def test_exergy_of_the_dead_state_is_zero() -> None:
    assert stored_exergy(1e5, TEMP_ANR, 1.0, 1e5, TEMP_ANR) == pytest.approx(0.0, abs=1e-9)
    assert flow_exergy(1e5, TEMP_ANR, 1e5, TEMP_ANR) == pytest.approx(0.0, abs=1e-9)


@quick
@given(pressures, temperatures)
def test_flow_exergy_is_stored_exergy_and_flow_work(p: float, temp: float) -> None:
    volume = R_AIR * temp / p  # of one kilogram
    stored = float(stored_exergy(p, temp, volume, 1e5, TEMP_ANR))
    expected = stored + (p - 1e5) * volume
    assert float(flow_exergy(p, temp, 1e5, TEMP_ANR)) == pytest.approx(expected, rel=1e-9, abs=1e-6)


@quick
@given(st.floats(1.001, 30.0))
def test_unused_share_is_what_work_leaves_of_the_exergy(ratio: float) -> None:
    used = (ratio - 1.0) * 1e5
    supplied = ratio * 1e5 / (R_AIR * TEMP_ANR) * float(flow_exergy(ratio * 1e5, TEMP_ANR, 1e5, TEMP_ANR))
    assert float(unused_share(ratio * 1e5, 1e5)) == pytest.approx(1.0 - used / supplied, rel=1e-6, abs=1e-12)


def test_unused_share_near_ambient() -> None:
    assert unused_share(1e5, 1e5) == 0.0
    assert unused_share(1e5 * (1.0 + 1e-6), 1e5) == pytest.approx(5e-7, rel=1e-4)


@quick
@given(st.floats(200.0, 373.0))
def test_dew_point_undoes_saturation(temp: float) -> None:
    assert float(dew_point(saturation_pressure(temp))) == pytest.approx(temp, rel=1e-7)


def test_saturation_lines_meet_at_the_triple_point() -> None:
    below, above = saturation_pressure([273.16 - 1e-6, 273.16 + 1e-6])
    assert below == pytest.approx(float(above), rel=1e-6)


@quick
@given(pressures, temperatures, st.floats(0.0, 1.0))
def test_humidity_ratio_and_vapour_pressure_undo_each_other(p: float, temp: float, humidity: float) -> None:
    ratio = float(humidity_ratio(p, temp, humidity))
    vapour = humidity * float(saturation_pressure(temp))
    if vapour >= p:
        assert ratio == math.inf
    else:
        assert float(vapour_pressure(p, ratio)) == pytest.approx(vapour, rel=1e-9, abs=1e-9)


def test_dry_air_has_no_dew_point_and_gives_no_water() -> None:
    assert dew_point(0.0) == 0.0
    assert condensate(0.0, 8e5, 283.15) == 0.0


def test_pressure_dew_point_rises_with_pressure() -> None:
    dew = pressure_dew_point(np.array([1e5, 4e5, 8e5]), 0.0007)
    assert np.all(np.diff(dew) > 0.0)


def test_saturated_air_is_at_its_dew_point() -> None:
    ratio = humidity_ratio(8e5, 276.15, 1.0)
    assert pressure_dew_point(8e5, ratio) == pytest.approx(276.15, rel=1e-8)


@pytest.mark.parametrize("state", sorted(STATES))
def test_free_volumes_go_there_and_back(state: str) -> None:
    assert free_volume(dry_mass(3.0, state), state) == pytest.approx(3.0, rel=1e-15)
    assert anr_volume(dry_mass(1.0, state)) == pytest.approx(dry_density(state) / dry_density("ANR"), rel=1e-15)


def test_an_unknown_state_is_refused_with_the_known_ones() -> None:
    with pytest.raises(InputError, match=r'state: "FAD" given; one of ANR, DIN1343'):
        dry_density("FAD")


def test_vapour_above_the_pressure_is_refused() -> None:
    with pytest.raises(InputError, match="the vapour alone would reach the pressure"):
        dry_density_at(20e3, 350.0, 1.0)
