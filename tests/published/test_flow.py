"""Flow through nozzles, holes and ISO 6358 elements against printed figures."""

from __future__ import annotations

import math

import fluids
import numpy as np
import pytest
from scipy.constants import psi

from actuator.air.gas import RHO_ISO6358, TEMP_ANR
from actuator.air.states import dry_density_at
from actuator.flow.orifice import CRITICAL_RATIO_IDEAL, choked_constant, ideal_nozzle_flow, mass_flow
from tests.published.tables import read_table

BAR = 1e5
CUBIC_FOOT = 0.3048**3

NOZZLE = [(0.30, 0.9395, 2.0351), (0.50, 0.8430, 1.3398), (0.80, 0.6560, 1.0382)]
"""Mach number, p/p_t, A/A*: NACA Report 1135 (1953), subsonic table, gamma 7/5 (from memory)."""


def test_choked_constant_of_air() -> None:
    # Murugaperumal, Gas Dynamics and Jet Propulsion, 1st ed. (2005), ex. 1.39, p. 68: 0.0404184 with R = 287
    assert choked_constant(gas_constant=287.0) == pytest.approx(0.0404184, abs=5e-8)


def test_critical_ratio_of_air() -> None:
    # Cengel, Cimbala, Fluid Mechanics, ex. 12-5: 0.5283; Isermann, Combustion Engine Diagnosis (2017), p. 252: 0.53
    assert pytest.approx(0.5283, abs=5e-5) == CRITICAL_RATIO_IDEAL
    assert pytest.approx(fluids.P_critical_flow(1.0, 1.4), rel=1e-12) == CRITICAL_RATIO_IDEAL


def test_largest_value_of_the_outflow_function() -> None:
    # Isermann (2017), p. 252: 0.484, where q = A·p·√(2/(R·T))·Ψ
    ratios = np.linspace(0.0, 1.0, 2001)
    flow = ideal_nozzle_flow(1e5, 1e5 * ratios, 300.0, area=1.0, gas_constant=287.0)
    outflow = flow / (1e5 * math.sqrt(2.0 / (287.0 * 300.0)))
    assert outflow.max() == pytest.approx(0.484, abs=5e-4)


def test_converging_nozzle_below_critical() -> None:
    # Fox, McDonald, Introduction to Fluid Mechanics, ex. 12.2, p. 634: 2.20 kg/s
    flow = ideal_nozzle_flow(1e6, 591e3, 333.0, area=0.001, gas_constant=287.0)
    assert flow == pytest.approx(2.20, abs=0.005)


def _share_of_choked(ratio: float) -> float:
    through, choked = ideal_nozzle_flow(7e5, [7e5 * ratio, 0.0], 300.0, area=1e-4)
    return float(through / choked)


@pytest.mark.parametrize(("mach", "ratio", "area_ratio"), NOZZLE)
def test_nozzle_against_the_isentropic_table(mach: float, ratio: float, area_ratio: float) -> None:
    # p/p_t is printed to four digits: its rounding moves the flow, most where the ratio is near 1
    least, most = _share_of_choked(ratio + 5e-5), _share_of_choked(ratio - 5e-5)
    assert least < 1.0 / area_ratio < most, f"M = {mach}"
    assert most - least < 1e-3


@pytest.mark.parametrize(("mach", "ratio", "area_ratio"), NOZZLE)
def test_quarter_ellipse_stays_within_half_a_percent_of_the_ideal_nozzle(
    mach: float, ratio: float, area_ratio: float
) -> None:
    choked = mass_flow(7e5, 0.0, 300.0, conductance=1e-8, critical_ratio=0.5283)
    share = mass_flow(7e5, 7e5 * ratio, 300.0, conductance=1e-8, critical_ratio=0.5283) / choked
    assert share == pytest.approx(1.0 / area_ratio, rel=5e-3), f"M = {mach}"


def test_iso_6358_choked_flow() -> None:
    # ISO 6358-1:2013 (from memory): q = C·p1·ρ0·√(T0/T1); C = 1 dm³/(s·bar) at 7 bar absolute and T0: 8.295 g/s
    flow = mass_flow(7 * BAR, 1 * BAR, TEMP_ANR, conductance=1e-8, critical_ratio=0.3)
    assert flow == pytest.approx(8.295e-3, rel=1e-12)
    warm = mass_flow(7 * BAR, 1 * BAR, 4.0 * TEMP_ANR, conductance=1e-8, critical_ratio=0.3)
    assert warm == pytest.approx(8.295e-3 / 2.0, rel=1e-12)


def test_iso_6358_subsonic_flow() -> None:
    # The same, C = 1, b = 0.3, 7 to 6 bar absolute: factor 0.6054 by hand, √(1 − ((6/7 − 0.3)/0.7)²)
    flow = mass_flow(7 * BAR, 6 * BAR, TEMP_ANR, conductance=1e-8, critical_ratio=0.3)
    assert flow / 8.295e-3 == pytest.approx(0.6054, abs=5e-5)


def test_density_of_the_flow_equation() -> None:
    # ISO 6358 (from memory): 100 kPa, 293.15 K and R = 288 J/(kg K), the last known to half a unit
    assert pytest.approx(1e5 / (288.0 * 293.15), rel=0.5 / 288.0) == RHO_ISO6358


def test_every_cell_of_the_orifice_table() -> None:
    # Handbook table, see the file; isentropic flow runs up to 0.75 % beside its approximate formula, plus the rounding
    # of the last printed digit
    diameters, rows = read_table("orifice_discharge.csv")
    density = dry_density_at(14.7 * psi, 294.26, 0.0)
    seen = 0
    for gauge, cells in rows:
        for diameter, text in zip(diameters, cells, strict=True):
            area = math.pi / 4.0 * (diameter * 0.0254) ** 2
            flow = float(ideal_nozzle_flow((gauge + 14.7) * psi, 14.7 * psi, 294.26, area=area))
            free_air = flow / density / CUBIC_FOOT * 60.0
            printed = float(text)
            rounding = 0.5 * 10.0 ** -len(text.partition(".")[2])
            assert abs(free_air - printed) <= 0.0075 * printed + rounding, f"{gauge} psi, {diameter} in: {free_air}"
            seen += 1
    assert seen == 176
