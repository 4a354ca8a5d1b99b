"""Exergy of compressed air against printed figures."""

from __future__ import annotations

import pytest
from CoolProp.CoolProp import PropsSI

from actuator.air.exergy import air_power, flow_exergy, stored_exergy


def test_exergy_of_a_tank() -> None:
    # Cengel, Boles, Thermodynamics: An Engineering Approach, ex. 8-7, p. 438: 200 m³, 1 MPa, 300 K, p0 100 kPa: 281 MJ
    stored = stored_exergy(1e6, 300.0, 200.0, 100e3, 300.0)
    assert stored / 1e6 == pytest.approx(281.0, abs=0.5)


@pytest.mark.parametrize(("bar", "celsius"), [(7.0, 20.0), (7.0, 60.0), (10.0, 5.0), (3.0, -20.0)])
def test_flow_exergy_beside_real_air(bar: float, celsius: float) -> None:
    # CoolProp: (h − h0) − T0·(s − s0), dead state 20 degC and 1 bar
    here, dead = (bar * 1e5, 273.15 + celsius), (1e5, 293.15)
    enthalpy, entropy = (
        PropsSI(name, "P", here[0], "T", here[1], "Air") - PropsSI(name, "P", dead[0], "T", dead[1], "Air")
        for name in ("H", "S")
    )
    assert flow_exergy(*here, *dead) == pytest.approx(enthalpy - dead[1] * entropy, rel=5e-3)


def test_air_power() -> None:
    # Cai, Kagawa et al. (from memory): p0·Q0·ln(p/p0); 1 m³/min at 1 bar, 7 bar absolute by hand 100 000/60·1.94591
    assert air_power(7e5, 1.0 / 60.0, 1e5) == pytest.approx(3243.2, abs=0.05)


def test_air_power_is_the_exergy_of_the_flow() -> None:
    # The same two ways, at ambient temperature: mass flow times flow exergy
    mass = 1e5 / 60.0 / (287.05 * 293.15)
    assert mass * flow_exergy(7e5, 293.15, 1e5, 293.15) == pytest.approx(air_power(7e5, 1.0 / 60.0, 1e5), rel=1e-12)
