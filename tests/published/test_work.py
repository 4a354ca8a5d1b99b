"""Boundary work of closed polytropic changes against worked examples in print."""

from __future__ import annotations

import math

import pytest

from actuator.air.gas import R_AIR
from actuator.air.work import end_pressure, end_temperature, polytropic_heat, polytropic_index, polytropic_work

MORAN = [(1.5, 17.57, 0.005), (1.0, 20.79, 0.005), (0.0, 30.0, 0.05)]
BORGNAKKE = [(0.0, 12.0, 0.05), (1.0, 7.33, 0.005), (1.3, 6.41, 0.005)]


@pytest.mark.parametrize(("index", "kilojoule", "rounding"), MORAN)
def test_expansion_by_three_indices(index: float, kilojoule: float, rounding: float) -> None:
    # Moran, Shapiro, Fundamentals of Engineering Thermodynamics, ex. 2.1, p. 39: 3 bar, 0.1 to 0.2 m³
    assert polytropic_work(3e5, 0.1, 0.2, index) / 1e3 == pytest.approx(kilojoule, abs=rounding)


@pytest.mark.parametrize(("index", "kilojoule", "rounding"), BORGNAKKE)
def test_piston_with_weights(index: float, kilojoule: float, rounding: float) -> None:
    # Borgnakke, Sonntag, Fundamentals of Thermodynamics, ex. 4.1, p. 96: 200 kPa, 0.04 to 0.1 m³
    assert polytropic_work(200e3, 0.04, 0.1, index) / 1e3 == pytest.approx(kilojoule, abs=rounding)


def test_isothermal_compression() -> None:
    # Cengel, Boles, Thermodynamics: An Engineering Approach, ex. 4-3, p. 170: 100 kPa, 0.4 to 0.1 m³: −55.5 kJ
    assert polytropic_work(100e3, 0.4, 0.1, 1.0) / 1e3 == pytest.approx(-55.5, abs=0.05)


def test_constant_pressure() -> None:
    # Joel, Basic Engineering Thermodynamics, 5th ed., ex. 1.1, p. 11: 700 kPa, 0.28 to 1.68 m³: 0.98 MJ
    assert polytropic_work(700e3, 0.28, 1.68, 0.0) / 1e6 == pytest.approx(0.98, abs=0.005)


def test_expansion_to_a_tenth_of_the_pressure() -> None:
    # Joel ex. 1.3, p. 15: 2070 to 207 kPa, 0.014 m³, n 1.35: 0.077 m³ and 37.2 kJ
    assert end_pressure(2070e3, 0.014, 0.077, 1.35) == pytest.approx(207e3, rel=0.01)  # 0.077 carries two digits
    v2 = 0.014 * 10.0 ** (1.0 / 1.35)
    assert v2 == pytest.approx(0.077, abs=5e-4)
    assert polytropic_work(2070e3, 0.014, v2, 1.35) / 1e3 == pytest.approx(37.2, abs=0.05)


def test_hyperbolic_compression() -> None:
    # Joel ex. 1.4, p. 17: 100 kPa, 0.056 to 0.007 m³: 800 kPa and −11.64 kJ
    assert end_pressure(100e3, 0.056, 0.007, 1.0) == pytest.approx(800e3, rel=1e-12)
    assert polytropic_work(100e3, 0.056, 0.007, 1.0) / 1e3 == pytest.approx(-11.64, abs=0.0055)  # prints −11.645 cut


def test_adiabatic_expansion() -> None:
    # Joel ex. 5.13, p. 123: 700 to 140 kPa, 0.015 m³, γ = 1.046/0.752: 0.048 m³ and 9.77 kJ
    index = 1.046 / 0.752
    v2 = 0.015 * 5.0 ** (1.0 / index)
    assert v2 == pytest.approx(0.048, abs=5e-4)
    assert polytropic_work(700e3, 0.015, v2, index) / 1e3 == pytest.approx(9.77, abs=0.005)


def test_polytropic_heat() -> None:
    # Joel ex. 5.15, p. 128: 1 to 0.1 MPa, 0.003 m³, n 1.3, γ 1.4: 1.03 kJ
    v2 = 0.003 * 10.0 ** (1.0 / 1.3)
    assert polytropic_heat(1e6, 0.003, v2, 1.3) / 1e3 == pytest.approx(1.03, abs=0.005)


def test_polytropic_state() -> None:
    # Joel ex. 5.11, p. 119: 0.675 kg, 1.4 MPa, 280 degC, n 1.3, fourfold volume: 0.0765 m³, 231 kPa, 92 degC
    v1 = 0.675 * 287.0 * 553.0 / 1.4e6
    assert v1 == pytest.approx(0.0765, abs=5e-5)
    assert end_pressure(1.4e6, v1, 4.0 * v1, 1.3) / 1e3 == pytest.approx(231.0, abs=0.5)
    assert end_temperature(553.0, v1, 4.0 * v1, 1.3) - 273.0 == pytest.approx(92.0, abs=0.5)


def test_index_and_work_from_measured_points() -> None:
    # Nag, Engineering Thermodynamics, ex. 3.10, p. 63: 100, 37.9, 14.4 kPa at 0.1, 0.2, 0.4 m³: n about 1.4, 10.6 kJ
    assert polytropic_index(100e3, 0.1, 37.9e3, 0.2) == pytest.approx(1.4, abs=0.05)
    index = polytropic_index(100e3, 0.1, 14.4e3, 0.4)
    assert index == pytest.approx(1.4, abs=0.05)
    # the book takes n from two of the points and the end pressure from the third: 0.5 %
    assert polytropic_work(100e3, 0.1, 0.4, index) / 1e3 == pytest.approx(10.6, rel=0.006)


def test_cycle_of_expansion_and_return_at_constant_pressure() -> None:
    # Nag ex. 3.11, p. 63: 20 atm, 0.04 to 0.08 m³, n 1.45, back at constant pressure: 18.61 kJ, p2 rounded to 100 Pa
    p1 = 20.0 * 101325.0
    p2 = end_pressure(p1, 0.04, 0.08, 1.45)
    work = polytropic_work(p1, 0.04, 0.08, 1.45) + polytropic_work(p2, 0.08, 0.04, 0.0)
    assert work / 1e3 == pytest.approx(18.61, abs=0.02)


def test_cycle_of_three_changes() -> None:
    # Singh, Engineering Thermodynamics, ex. 3.22, p. 91: 3 kg, 1.5 bar 77 degC to 7.5 bar with n 1.2, to the start's
    # temperature at constant pressure, isothermal home: −71.27 kJ, R = 287.05 against the book's 287
    p1, p2, temp1 = 1.5e5, 7.5e5, 350.0
    v1 = 3.0 * R_AIR * temp1 / p1
    v2 = v1 * math.exp(-math.log(5.0) / 1.2)
    v3 = v1 * p1 / p2
    work = polytropic_work(p1, v1, v2, 1.2) + polytropic_work(p2, v2, v3, 0.0) + polytropic_work(p2, v3, v1, 1.0)
    assert work / 1e3 == pytest.approx(-71.27, rel=4e-4)


def test_piston_against_a_spring() -> None:
    # Cengel, Boles ex. 4-4, p. 171: 200 kPa, 0.05 m³ doubled against 150 kN/m on 0.25 m²: 320 kPa, 13 kJ, 3 kJ in the
    # spring. A line through p(V) is the mean of its ends, cut here into polytropic pieces that meet it
    stiffness, area = 150e3, 0.25
    steps = 400
    volumes = [0.05 + 0.05 * step / steps for step in range(steps + 1)]
    pressures = [200e3 + stiffness * (v - 0.05) / area**2 for v in volumes]
    assert pressures[-1] / 1e3 == pytest.approx(320.0, rel=1e-12)
    work = sum(
        float(
            polytropic_work(pressures[i], volumes[i], volumes[i + 1], polytropic_index(*_pair(i, pressures, volumes)))
        )
        for i in range(steps)
    )
    assert work / 1e3 == pytest.approx(13.0, rel=1e-5)
    constant = float(polytropic_work(200e3, 0.05, 0.1, 0.0))
    assert (work - constant) / 1e3 == pytest.approx(3.0, rel=1e-4)


def _pair(i: int, pressures: list[float], volumes: list[float]) -> tuple[float, float, float, float]:
    return pressures[i], volumes[i], pressures[i + 1], volumes[i + 1]
