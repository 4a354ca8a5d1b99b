"""Reading quantities: published conversion factors, forms of the trade, states of free air."""

from __future__ import annotations

import math
from decimal import Decimal

import pytest

from actuator.units import Reading, read
from tests.units.aliases import KINDS

HERE = Reading(ambient_pressure=101_325.0)

NIST = [
    ("1 in", "Length", "2.54e-2"),
    ("1 ft", "Length", "3.048e-1"),
    ("1 in2", "Area", "6.4516e-4"),
    ("1 ft3", "Volume", "2.831685e-2"),
    ("1 in3", "Volume", "1.638706e-5"),
    ("1 gal", "Volume", "3.785412e-3"),
    ("1 lb", "Mass", "4.535924e-1"),
    ("1 oz", "Mass", "2.834952e-2"),
    ("1 lbf", "Force", "4.448222"),
    ("1 ozf", "Force", "2.780139e-1"),
    ("1 kgf", "Force", "9.80665"),
    ("1 psi absolute", "AbsPressure", "6.894757e3"),
    ("1 inHg absolute", "AbsPressure", "3.386389e3"),
    ("1 mmHg absolute", "AbsPressure", "1.333224e2"),
    ("1 kgf/cm2 absolute", "AbsPressure", "9.80665e4"),
    ("1 mbar", "PressureDifference", "1.0e2"),
    ("1 cfm FAD", "FlowFAD", "4.719474e-4"),
    ("1 ft/min", "Speed", "5.08e-3"),
    ("1 ft*lbf", "Energy", "1.355818"),
    ("1 Btu", "Energy", "1.055056e3"),
    ("1 kWh", "Energy", "3.6e6"),
    ("1 hp", "Power", "7.456999e2"),
    ("1 PS", "Power", "7.354988e2"),
    ("1 Btu/(h*ft2*degF)", "HeatTransfer", "5.678263"),
    ("1 Btu/lb", "SpecificEnergy", "2.326e3"),
    ("1 lb/min", "MassFlow", "7.559873e-3"),
    ("1 deg", "Angle", "1.745329e-2"),
]
"""Text, kind, factor to SI. NIST SP 811 (2008), Appendix B.8, seven figures (from memory)."""


@pytest.mark.parametrize(("text", "kind", "factor"), NIST)
def test_factors_are_those_of_the_published_table(text: str, kind: str, factor: str) -> None:
    rounding = Decimal(5).scaleb(int(Decimal(factor).as_tuple().exponent) - 1)
    assert abs(Decimal(read(text, KINDS[kind], HERE)) - Decimal(factor)) <= rounding * Decimal("1.0000001")


TEMPERATURES = [("32 degF", 273.15), ("68 degF", 293.15), ("212 degF", 373.15), ("-40 °F", 233.15)]
"""Fixed points on both scales; t/degF = 9/5 t/degC + 32, ITS-90 practice (from memory)."""


@pytest.mark.parametrize(("text", "kelvin"), [*TEMPERATURES, ("20 degC", 293.15), ("491.67 degR", 273.15)])
def test_thermometer_scales_meet_at_their_fixed_points(text: str, kelvin: float) -> None:
    assert read(text, KINDS["Temperature"], HERE) == kelvin


def test_a_temperature_difference_has_no_zero_of_its_own() -> None:
    assert read("9 degF", KINDS["TemperatureDifference"], HERE) == pytest.approx(5.0, rel=1e-15)
    assert read("5 degC", KINDS["TemperatureDifference"], HERE) == read("5 K", KINDS["TemperatureDifference"], HERE)


@pytest.mark.parametrize(
    ("text", "pascal"),
    [
        ("6 bar gauge", 701_325.0),
        ("6 bar(g)", 701_325.0),
        ("6 bar (g)", 701_325.0),
        ("6 barg", 701_325.0),
        ("6bar g", 701_325.0),
        ("0.6 MPa gauge", 701_325.0),
        ("600 kPa(g)", 701_325.0),
        ("101.3 kPa(a)", 101_300.0),
        ("101.3 kPa abs", 101_300.0),
        ("7 bar absolute", 700_000.0),
        ("7 bara", 700_000.0),
        ("-0.5 bar gauge", 51_325.0),
        ("0 bar gauge", 101_325.0),
    ],
)
def test_gauge_counts_from_the_ambient_pressure_of_the_site(text: str, pascal: float) -> None:
    assert read(text, KINDS["AbsPressure"], HERE) == pascal


def test_gauge_follows_the_site_up_a_mountain() -> None:
    high = Reading(ambient_pressure=80_000.0)
    assert read("6 bar gauge", KINDS["AbsPressure"], high) == 680_000.0
    assert read("7 bar absolute", KINDS["AbsPressure"], high) == 700_000.0


def test_psig_of_a_handbook_example() -> None:
    """80 psig with 14.7 psia outside is 94.7 psia: Esposito, Fluid Power with Applications, ex. 13-10."""
    outside = Reading(ambient_pressure=read("14.7 psia", KINDS["AbsPressure"], HERE))
    inside = read("80 psig", KINDS["AbsPressure"], outside)
    assert inside == pytest.approx(read("94.7 psia", KINDS["AbsPressure"], HERE), rel=1e-15)


@pytest.mark.parametrize(
    ("text", "kind", "value"),
    [
        ("7.5 dm3/(s*bar)", "Conductance", 7.5e-8),
        ("7.5 dm³/(s·bar)", "Conductance", 7.5e-8),
        ("7.5 L/s/bar", "Conductance", 7.5e-8),
        ("450 L/(min*bar)", "Conductance", 7.5e-8),
        ("60 W/(m2*K)", "HeatTransfer", 60.0),
        ("60 W/(m²·K)", "HeatTransfer", 60.0),
        ("30 N*s/m", "Viscous", 30.0),
        ("30 Ns/m", "Viscous", 30.0),
        ("50 mm", "Length", 0.05),
        ("50mm", "Length", 0.05),
        ("+50. mm", "Length", 0.05),
        (".05 m", "Length", 0.05),
        ("5e1 mm", "Length", 0.05),
        ("5E+1 mm", "Length", 0.05),
        ('2"', "Length", 0.0508),
        ("2 inch", "Length", 0.0508),
        ("1 234.5 mm", "Length", 1.2345),
        ("1\u2009234.5\u00a0mm", "Length", 1.2345),
        ("20 cm3", "Volume", 2e-5),
        ("20 cc", "Volume", 2e-5),
        ("15 ms", "Time", 0.015),
        ("−30 deg", "Angle", -math.pi / 6),
        ("90 deg", "Angle", math.pi / 2),
        ("-90°", "Angle", -math.pi / 2),
        ("65 %", "Share", 0.65),
        ("65%", "Share", 0.65),
        ("0.65", "Share", 0.65),
        ("0.30", "CriticalRatio", 0.3),
        ("4800 h/year", "HoursPerYear", 4800 / 8760),
        ("8760 h/year", "HoursPerYear", 1.0),
        ("6.0 m3/min FAD", "FlowFAD", 0.1),
        ("37 kW", "Power", 37000.0),
        ("0.18 /kWh", "EnergyPrice", 5e-8),
        ("0.18 EUR/kWh", "EnergyPrice", 5e-8),
        ("350 g/kWh", "CarbonIntensity", 0.35 / 3.6e6),
        ("0.35 kgCO2e/kWh", "CarbonIntensity", 0.35 / 3.6e6),
        ("1 234 EUR/year", "MoneyYear", 1234.0),
        ("3", "Count", 3.0),
    ],
)
def test_forms_of_the_trade_are_read(text: str, kind: str, value: float) -> None:
    assert read(text, KINDS[kind], HERE) == pytest.approx(value, rel=1e-15)


STATES = [
    ("1 m3/s ANR", 1.1703, 1e-4),
    ("1 m3/s DIN1343", 1.2931, 1e-3),
    ("1 Nm3/s DIN1343", 1.2931, 1e-3),
    ("1 m3/s ISO1217", 1.1889, 1e-3),
    ("1 ft3/s SCFM-14.5-68F-dry", 1.1889 * 0.02831685, 1e-3),
    ("1 ft3/s SCFM-14.696-60F-dry", 1.2232 * 0.02831685, 1e-3),
    ("481 scfm SCFM-14.696-60F-dry", 1000.0 / 3600.0, 1.1e-3),
    ("1 ft3/s (SCFM-14.7-68F-36)", 1.2008 * 0.02831685, 9e-3),
]
"""Flow, dry air in it [kg/s], tolerance. Densities of real air: CoolProp at the state; 481 scfm of 60 degF for
1000 kg/h: an encyclopaedia's article on standard cubic feet; 0.075 lb/ft3 is of moist air, 0.8 % of it water.
Ideal against real gas is within 0.1 %."""


@pytest.mark.parametrize(("text", "dry", "tolerance"), STATES)
def test_another_state_is_converted_by_the_mass_of_dry_air(text: str, dry: float, tolerance: float) -> None:
    anr = read(text, KINDS["FlowANR"], HERE)
    assert anr * 1.1703 == pytest.approx(dry, rel=tolerance)


def test_prices_per_volume_go_the_other_way_than_volumes() -> None:
    price = read("1 EUR/m3 DIN1343", KINDS["PriceAir"], HERE)
    volume = read("1 m3 DIN1343", KINDS["VolumeANR"], HERE)
    assert price * volume == pytest.approx(1.0, rel=1e-15)


def test_the_float_nearest_to_the_typed_decimal_is_read() -> None:
    for millimetres in range(1, 2000):
        assert read(f"{millimetres} mm", KINDS["Length"], HERE) == millimetres / 1000
    for milliseconds in range(0, 2000, 7):
        assert read(f"{milliseconds} ms", KINDS["Time"], HERE) == milliseconds / 1000
