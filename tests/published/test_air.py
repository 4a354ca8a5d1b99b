"""Air and its reference states against CoolProp and printed figures."""

from __future__ import annotations

import math

import psychrolib
import pytest
from CoolProp.CoolProp import HAPropsSI, PropsSI
from scipy.constants import inch, pound

from actuator.air.gas import CP, DRY_DENSITY_ANR, GAMMA, R_AIR
from actuator.air.humidity import (
    condensate,
    dew_point,
    humidity_ratio,
    pressure_dew_point,
    saturation_pressure,
    vapour_pressure,
)
from actuator.air.states import dry_density, dry_density_at, dry_mass, free_volume

FOOT = 12.0 * inch
GALLON = 3.785411784e-3

IF97 = [(300.0, 0.353658941e-2), (500.0, 0.263889776e1), (600.0, 0.123443146e2)]
"""K, MPa: IAPWS R7-97(2012), table 35, check values of eq. 30 (from memory)."""
IF97_BACK = [(0.1, 0.372755919e3), (1.0, 0.453035632e3), (10.0, 0.584149488e3)]
"""MPa, K: the same, table 36, check values of eq. 31 (from memory)."""


@pytest.mark.parametrize("bar", [1.0, 2.0, 4.0, 7.0, 10.0, 12.0])
@pytest.mark.parametrize("celsius", [15.0, 20.0, 25.0])
def test_ideal_gas_is_within_half_a_percent_of_real_air(bar: float, celsius: float) -> None:
    # CoolProp, equation of state of air by Lemmon et al. (2000)
    real = PropsSI("D", "P", bar * 1e5, "T", 273.15 + celsius, "Air")
    assert bar * 1e5 / (R_AIR * (273.15 + celsius)) == pytest.approx(real, rel=0.005)


def test_gas_constant_and_specific_heats() -> None:
    # CoolProp at 20 degC and 1 bar
    molar = PropsSI("M", "Air")
    assert pytest.approx(8.314462618 / molar, rel=2e-4) == R_AIR
    heat = [PropsSI(name, "P", 1e5, "T", 293.15, "Air") for name in ("C", "O")]
    assert pytest.approx(heat[0] / heat[1], rel=2e-3) == GAMMA
    assert pytest.approx(heat[0], rel=2e-3) == CP


@pytest.mark.parametrize(("temp", "printed"), IF97)
def test_saturation_pressure_at_its_check_values(temp: float, printed: float) -> None:
    assert saturation_pressure(temp) / 1e6 == pytest.approx(printed, rel=1e-8)


@pytest.mark.parametrize(("megapascal", "printed"), IF97_BACK)
def test_dew_point_at_its_check_values(megapascal: float, printed: float) -> None:
    assert dew_point(megapascal * 1e6) == pytest.approx(printed, rel=1e-8)


def test_sublimation_pressure_at_its_check_value() -> None:
    # IAPWS R14-08(2011), check value of eq. 6 (from memory): 230 K, 8.94735 Pa
    assert saturation_pressure(230.0) == pytest.approx(8.94735, abs=5e-6)


@pytest.mark.parametrize("celsius", [1.0, 5.0, 20.0, 25.0, 40.0, 60.0, 100.0])
def test_saturation_pressure_beside_two_libraries(celsius: float) -> None:
    ours = float(saturation_pressure(273.15 + celsius))
    assert ours == pytest.approx(PropsSI("P", "T", 273.15 + celsius, "Q", 0, "Water"), rel=1e-4)  # IAPWS-95
    psychrolib.SetUnitSystem(psychrolib.SI)
    assert ours == pytest.approx(psychrolib.GetSatVapPres(celsius), rel=4e-4)  # Hyland and Wexler


@pytest.mark.parametrize("celsius", [-40.0, -20.0, -5.0])
def test_saturation_pressure_over_ice(celsius: float) -> None:
    psychrolib.SetUnitSystem(psychrolib.SI)
    assert saturation_pressure(273.15 + celsius) == pytest.approx(psychrolib.GetSatVapPres(celsius), rel=1e-3)


def test_humidity_ratio_of_the_reference_atmosphere() -> None:
    # Joel, Basic Engineering Thermodynamics, 5th ed., ex. 19.2, p. 626: 20 degC, 65 %, 100 kPa: 0.0096
    ratio = float(humidity_ratio(100e3, 293.15, 0.65))
    assert ratio == pytest.approx(0.0096, abs=5e-5)
    psychrolib.SetUnitSystem(psychrolib.SI)
    assert ratio == pytest.approx(psychrolib.GetHumRatioFromRelHum(20.0, 0.65, 100e3), rel=1e-3)


def test_dew_point_of_room_air() -> None:
    # Joel ex. 19.3, p. 627: 25 degC, 60 %, 101.3 kPa: 0.0119 and 16.69 degC
    ratio = humidity_ratio(101.3e3, 298.15, 0.60)
    assert ratio == pytest.approx(0.0119, abs=5e-5)
    assert dew_point(vapour_pressure(101.3e3, ratio)) - 273.15 == pytest.approx(16.69, abs=0.02)


def test_water_that_a_system_takes_in_a_day() -> None:
    # Esposito, Fluid Power with Applications, ex. 13-9, p. 495: 100 scfm saturated at 80 degF (1.58 lb per 1000 ft³ by
    # its chart), 8 h: 9.09 gal/day
    temp = (80.0 + 459.67) / 1.8
    density = float(saturation_pressure(temp)) / (461.526 * temp)
    assert density / pound * FOOT**3 * 1e3 == pytest.approx(1.58, abs=0.005)
    per_day = density * 100.0 * FOOT**3 * 60.0 * 8.0 / 8.34 / pound
    assert per_day == pytest.approx(9.09, rel=0.5 / 158.0)


@pytest.mark.parametrize(("celsius", "printed"), [(20.0, 17.3), (30.0, 30.4), (40.0, 51.2)])
def test_water_vapour_in_saturated_air(celsius: float, printed: float) -> None:
    # Common table (from memory): g/m³. The vapour as ideal gas is 0.1 to 0.2 % light
    temp = 273.15 + celsius
    density = float(saturation_pressure(temp)) / (461.526 * temp) * 1e3
    assert density == pytest.approx(printed, abs=0.05 + 0.002 * printed)


def test_condensate_beside_a_library() -> None:
    # psychrolib: 20 degC, 70 %, 101.325 kPa taken in, 8 bar gauge, cooled to 40 degC
    psychrolib.SetUnitSystem(psychrolib.SI)
    p = 901.325e3
    before = psychrolib.GetHumRatioFromRelHum(20.0, 0.70, 101.325e3)
    after = psychrolib.GetSatHumRatio(40.0, p)
    ours = condensate(humidity_ratio(101.325e3, 293.15, 0.70), p, 313.15)
    assert ours == pytest.approx(before - after, rel=3e-3)
    assert condensate(0.001, p, 313.15) == 0.0


def test_pressure_dew_point_beside_a_library() -> None:
    psychrolib.SetUnitSystem(psychrolib.SI)
    assert pressure_dew_point(8e5, 0.001) - 273.15 == pytest.approx(
        psychrolib.GetTDewPointFromHumRatio(20.0, 0.001, 8e5), abs=0.02
    )


def test_dry_air_in_the_reference_atmosphere() -> None:
    # CoolProp, humid air at 20 degC, 100 kPa, 65 %: 1/v per kg of dry air; ISO 8778:2003 names the state
    volume = HAPropsSI("Vda", "T", 293.15, "P", 100e3, "R", 0.65)
    assert pytest.approx(1.0 / volume, rel=1e-3) == DRY_DENSITY_ANR
    assert dry_density("ANR") == DRY_DENSITY_ANR


def test_density_of_the_scfm_of_humid_air() -> None:
    # Common figure for 68 degF, 14.7 psia, 36 %: 0.075 lb/ft³, moist
    dry = dry_density("SCFM-14.7-68F-36")
    moist = dry * (1.0 + float(humidity_ratio(14.7 * 6894.757, 293.15, 0.36)))
    assert moist / pound * FOOT**3 == pytest.approx(0.075, abs=5e-4)


@pytest.mark.parametrize(("state", "printed"), [("DIN1343", 455.0), ("SCFM-14.696-60F-dry", 481.0)])
def test_a_tonne_of_air_an_hour_in_cubic_feet(state: str, printed: float) -> None:
    # Encyclopaedia article on the SCFM (en-academic.com/dic.nsf/enwiki/1173621): 1000 kg/h at 1 atm, 32 and 60 degF
    assert free_volume(1000.0 / 60.0, state) / FOOT**3 == pytest.approx(printed, abs=0.5)


def test_normal_density() -> None:
    # DIN 1343 state, real air 1.293 kg/m³ (common figure); the ideal gas is 0.05 % below
    assert dry_density("DIN1343") == pytest.approx(1.293, abs=0.001)


def test_normal_to_reference_by_pressure_and_temperature() -> None:
    # 1 m³ (0 degC, 1.01325 bar) is 1.0874 m³ at 20 degC and 1 bar, both dry
    assert free_volume(dry_mass(1.0, "DIN1343"), "ISO1217") == pytest.approx(1.0874, abs=5e-5)


def test_intake_of_a_hot_humid_site() -> None:
    # CoolProp, humid air: free air delivered at 35 degC, 80 %, 1.013 bar against the reference atmosphere
    volumes = [
        HAPropsSI("Vda", "T", temp, "P", p, "R", humidity)
        for temp, p, humidity in ((308.15, 101.3e3, 0.80), (293.15, 100e3, 0.65))
    ]
    ours = dry_density_at(101.3e3, 308.15, 0.80) / dry_density("ANR")
    assert ours == pytest.approx(volumes[1] / volumes[0], rel=1e-3)
    assert math.isclose(ours, 0.935, abs_tol=5e-4)
