"""Leak of closed-in air against a printed discharge."""

from __future__ import annotations

import math

import pytest

from actuator.holding.leak import time_to_fall


def test_isothermal_discharge_of_a_printed_vessel() -> None:
    # Murugaperumal, Gas Dynamics and Jet Propulsion, ex. 1.39, p. 68: 5 m³ through 10 cm² at 60 °C, 40 to 2 bar into
    # 1 bar: 70.76 s. The nozzle's choked flow, 0.0404184·A·p/√T in SI, gives its conductance; R 287 there, 287.05 here
    conductance = 0.0404184 * 10e-4 / (1.185 * math.sqrt(293.15))
    time = time_to_fall(40e5, 2e5, 1e5, 5.0, math.inf, temp=333.15, conductance=conductance)
    assert time == pytest.approx(70.76, rel=5e-4)
