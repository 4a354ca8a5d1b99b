"""Air of a cycle by hand against worked examples in print."""

from __future__ import annotations

import math

import pytest
from scipy.constants import inch, psi

from actuator.air.states import anr_volume, dry_density_at
from actuator.energy.consumption import hand_formula, settled_air, textbook_air

CUBIC_FOOT = 0.3048**3


def _kelvin(fahrenheit: float) -> float:
    return (fahrenheit + 459.67) / 1.8


def _one_chamber(p: float, temp: float, swept: float) -> float:
    return textbook_air(p_extend=p, p_retract=p, temp_supply=temp, swept_cap=swept, swept_rod=0.0)


def test_one_chamber_counted() -> None:
    # Esposito, Fluid Power with Applications, ex. 13-12, p. 511: 1.75 in, 6 in, 30 cycles/min, 100 psi gauge, 80 degF,
    # free air at 68 degF 14.7 psia: 1.91 scfm
    swept = math.pi / 4.0 * (1.75 * inch) ** 2 * 6.0 * inch
    mass = _one_chamber(114.7 * psi, _kelvin(80.0), swept) * 30.0
    assert mass / dry_density_at(14.7 * psi, _kelvin(68.0), 0.0) / CUBIC_FOOT == pytest.approx(1.91, abs=0.005)


def test_cycles_that_a_flow_allows() -> None:
    # Esposito ex. 13-13: 44.5 mm, 152 mm, 687 kPa gauge, 27 degC, 0.0555 m³/min at 20 degC 101 kPa: 30 cycles/min (cut)
    swept = math.pi / 4.0 * 0.0445**2 * 0.152
    mass = _one_chamber(788e3, 300.0, swept)
    cycles = 0.0555 * dry_density_at(101e3, 293.0, 0.0) / mass
    assert math.floor(cycles) == 30


def test_strokes_counted() -> None:
    # Sullivan, Fluid Power: Theory and Applications, 4th ed., ex. 15.5, p. 409: 2 in, 10 in, 40 strokes/min, 80 psi
    # gauge: 4.685 cfm free, by pressure alone
    swept = math.pi / 4.0 * (2.0 * inch) ** 2 * 10.0 * inch
    mass = _one_chamber(94.7 * psi, 293.15, swept) * 40.0
    assert mass / dry_density_at(14.7 * psi, 293.15, 0.0) / CUBIC_FOOT == pytest.approx(4.685, abs=5e-4)


def test_strokes_counted_in_metres() -> None:
    # The same in SI: 20.3 cm² × 25.4 cm × 40/min, 552 kPa gauge: 0.133 m³/min
    mass = _one_chamber(653.3e3, 293.15, 20.3e-4 * 0.254) * 40.0
    assert mass / dry_density_at(101.3e3, 293.15, 0.0) == pytest.approx(0.133, abs=5e-4)


def test_double_acting_with_and_without_rod() -> None:
    # Handbook nomogram, air consumption of cylinders, table 2, p. 62: 100 mm, 180 mm, 8 bar gauge over 1 bar: 25.4 L
    # out and back, 24.6 L with a rod of 25 mm (the page says "per stroke"; 25.4 − 0.8 with both rounded)
    area, rod = math.pi / 4.0 * 0.100**2, math.pi / 4.0 * 0.025**2
    free = dry_density_at(1e5, 293.15, 0.0)
    plain, true = (
        textbook_air(
            p_extend=9e5, p_retract=9e5, temp_supply=293.15, swept_cap=area * 0.18, swept_rod=(area - minus) * 0.18
        )
        / free
        * 1e3
        for minus in (0.0, rod)
    )
    assert plain == pytest.approx(25.4, abs=0.05)
    assert true == pytest.approx(24.6, abs=0.1)


def test_free_air_that_a_receiver_needs() -> None:
    # Esposito ex. 13-6, p. 483: 30 cfm at 125 psi gauge 90 degF, inlet 70 degF 14.7 psia: 275 cfm
    mass = _one_chamber(139.7 * psi, _kelvin(90.0), 30.0)
    assert mass / dry_density_at(14.7 * psi, _kelvin(70.0), 0.0) == pytest.approx(275.0, abs=0.5)


def test_hand_formula_reads_one_and_a_half_percent_less() -> None:
    # Dry air at 20 degC 100 kPa 1.1884 kg/m³ against 1.1703 in the ANR state, densities by CoolProp within 0.1 %
    swept = 1e-3
    mass = _one_chamber(7e5, 293.15, swept)
    assert hand_formula(mass, 293.15) == pytest.approx(7.0 * swept, rel=1e-12)
    assert hand_formula(mass, 293.15) / anr_volume(mass) == pytest.approx(0.985, abs=5e-4)


def test_dead_volume_counts_by_gauge_pressure() -> None:
    # Textbook practice (from memory): dead volume and tube are refilled from ambient, V·(p − p0)/p0 of free air
    common = {"p_extend": 7e5, "p_retract": 7e5, "temp_supply": 293.15, "swept_cap": 8e-4, "swept_rod": 7e-4}
    settled = settled_air(**common, p_ambient=1e5, dead_cap=2e-5, dead_rod=3e-5)
    extra = (settled - textbook_air(**common)) / dry_density_at(1e5, 293.15, 0.0)
    assert extra == pytest.approx(6.0 * 5e-5, rel=1e-9)
