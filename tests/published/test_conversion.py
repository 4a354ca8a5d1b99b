"""Conductance against Cv, Kv, nominal flow and effective area: printed rules scatter, tolerances say by how much."""

from __future__ import annotations

import math

import pytest
from scipy.constants import psi

from actuator.air.states import dry_density
from actuator.flow.conversion import (
    conductance_from_cv,
    conductance_from_effective_area,
    conductance_from_kv,
    effective_area_from_conductance,
    kv_from_conductance,
    nominal_flow_from_conductance,
)
from actuator.flow.orifice import mass_flow

CUBIC_FOOT = 0.3048**3


@pytest.mark.parametrize("b", [0.2, 0.3, 0.4])
def test_conductance_is_about_four_times_cv(b: float) -> None:
    # Common rule, no source: C ≈ 4 Cv in dm³/(s·bar), one digit
    assert conductance_from_cv(1.0, b) * 1e8 == pytest.approx(4.0, abs=0.5)


def test_effective_area_is_five_times_the_conductance() -> None:
    # Common conversion (from memory): S [mm²] = 5.0·C [dm³/(s·bar)]
    assert effective_area_from_conductance(1e-8) * 1e6 == pytest.approx(5.0, abs=0.05)
    assert conductance_from_effective_area(5.0e-6) * 1e8 == pytest.approx(1.0, abs=0.01)


def test_kv_over_cv() -> None:
    # IEC 60534 (from memory): Kv = 0.865 Cv, Cv = 1.156 Kv
    assert kv_from_conductance(conductance_from_cv(1.0, 0.3), 0.3) == pytest.approx(0.865, abs=5e-4)
    assert conductance_from_kv(1.0, 0.3) / conductance_from_cv(1.0, 0.3) == pytest.approx(1.156, abs=5e-4)


@pytest.mark.parametrize("b", [0.2, 0.3, 0.4, 0.5])
def test_nominal_flow_per_cv(b: float) -> None:
    # Published rules (from memory): 933 to 984 L/min (0 degC, 101.325 kPa) per Cv, 6 to 5 bar gauge; by pressure and
    # temperature 1 such litre is 1.0874 L ANR
    normal = nominal_flow_from_conductance(conductance_from_cv(1.0, b), b) * 6e4 / 1.0874
    assert 933.0 < normal < 984.0


def test_gas_flow_from_kv_at_a_small_drop() -> None:
    # IEC 60534 handbook form (from memory): QN = 514·Kv·√(Δp·p2/(ρN·T1)), m³/h at 0 degC and 1.01325 bar. 514 goes back
    # to kp/cm²; in bar it is 519, hence 1 %
    p1, p2 = 7.01325, 6.96325
    printed = 514.0 * math.sqrt((p1 - p2) * p2 / (1.2929 * 293.15))
    flow = mass_flow(p1 * 1e5, p2 * 1e5, 293.15, conductance=conductance_from_kv(1.0, 0.3), critical_ratio=0.3)
    assert flow / 1.2929 * 3600.0 == pytest.approx(printed, rel=0.015)


def test_largest_flow_of_a_valve_of_known_cv() -> None:
    # Esposito, Fluid Power with Applications, ex. 13-10, p. 498: Cv 7.4, 80 psi gauge, 80 degF, choked: 341 scfm
    # (14.7 psia, 68 degF). Rules scatter by 5 %; b = 0.5 is what its formula has in it
    p1, temp = (80.0 + 14.7) * psi, (80.0 + 459.67) / 1.8
    flow = mass_flow(p1, 0.5 * p1, temp, conductance=conductance_from_cv(7.4, 0.5), critical_ratio=0.5)
    assert flow / dry_density("SCFM-14.7-68F-36") / CUBIC_FOOT * 60.0 == pytest.approx(341.0, rel=0.05)


@pytest.mark.parametrize(
    ("cv", "scfm", "p1_gauge", "p2_gauge"),
    [(1.38, 50.0, 112.0, 100.0), (1.14, 35.0, 90.0, 80.0)],
    ids=["Esposito ex. 13-11, p. 506", "Sullivan, 4th ed., ex. 16.5, p. 444"],
)
def test_flow_of_a_valve_sized_by_cv(cv: float, scfm: float, p1_gauge: float, p2_gauge: float) -> None:
    # Both at 80 degF, subsonic, where flow hangs on the square root of the drop: rules scatter by 5 %
    p1, p2, temp = (p1_gauge + 14.7) * psi, (p2_gauge + 14.7) * psi, (80.0 + 459.67) / 1.8
    flow = mass_flow(p1, p2, temp, conductance=conductance_from_cv(cv, 0.3), critical_ratio=0.3)
    assert flow / dry_density("SCFM-14.7-68F-36") / CUBIC_FOOT * 60.0 == pytest.approx(scfm, rel=0.05)
