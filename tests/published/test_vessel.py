"""Vessels that fill and empty: published times and rates, from the flow functions by quadrature."""

from __future__ import annotations

import pytest
from scipy.integrate import quad

from actuator.air.gas import CV, GAMMA, R_AIR
from actuator.air.work import end_pressure, end_temperature
from actuator.flow.orifice import ideal_nozzle_flow


def test_time_to_empty_a_vessel_at_constant_temperature() -> None:
    # Murugaperumal, Gas Dynamics and Jet Propulsion, 1st ed. (2005), ex. 1.39, p. 68: 5 m³, 10 cm², 60 degC, 40 to
    # 2 bar absolute into 1 bar: 70.76 s, R 287 and 333 K
    volume, temp = 5.0, 333.0

    def seconds_per_pascal(p: float) -> float:
        flow = ideal_nozzle_flow(p, 1e5, temp, area=10e-4, gas_constant=287.0)
        return volume / (287.0 * temp) / float(flow)

    time, _ = quad(seconds_per_pascal, 2e5, 40e5)
    assert time == pytest.approx(70.76, abs=0.005)


def test_air_left_in_a_bottle_that_empties_without_heat() -> None:
    # Textbook example (inputs and formulas in a companion, 20 m³, 10 MPa, 25 degC to 200 kPa):
    # m_f = m_i·(p_f/p_i)^(1/γ), T_f = T_i·(m_f/m_i)^(γ−1). What stays expands without heat into the whole bottle
    mass = 10e6 * 20.0 / (R_AIR * 298.0)
    left = mass * (0.2 / 10.0) ** (1.0 / GAMMA)
    before = 20.0 * left / mass  # volume that the air that stays has at the start
    assert end_pressure(10e6, before, 20.0, GAMMA) == pytest.approx(200e3, rel=1e-9)
    temp = end_temperature(298.0, before, 20.0, GAMMA)
    assert 200e3 * 20.0 / (R_AIR * temp) == pytest.approx(left, rel=1e-9)
    assert temp == pytest.approx(298.0 * (left / mass) ** (GAMMA - 1.0), rel=1e-12)


def test_rate_at_which_a_tank_begins_to_fill() -> None:
    # Fox, McDonald, Introduction to Fluid Mechanics, ch. 4: 0.1 m³, 293 K, 0.1 MPa gauge, line at the same temperature,
    # 0.05 K/s: 0.10 g/s. First law: m·cv·dT/dt = q·(cp − cv)·T
    mass = 201e3 * 0.1 / (R_AIR * 293.0)
    flow = mass * CV * 0.05 / (R_AIR * 293.0)
    assert flow * 1e3 == pytest.approx(0.10, abs=0.005)
