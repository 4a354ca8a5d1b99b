"""Flow: limits of one element, chains against a solution by pressures, conversions there and back."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.typing import NDArray
from scipy.integrate import solve_ivp
from scipy.optimize import brentq, minimize

from actuator.air.gas import CP, CV, GAMMA, R_AIR, TEMP_ANR
from actuator.flow import conversion
from actuator.flow.orifice import (
    CRITICAL_RATIO_IDEAL,
    choked_constant,
    ideal_nozzle_flow,
    mass_flow,
)
from actuator.flow.series import Element, chain_conductance, chain_end, fit_chain, fit_parallel

quick = settings(deadline=None, max_examples=60, database=None)
UNIT = 1e-8
elements = st.tuples(
    st.floats(0.5, 5.0).map(lambda c: c * UNIT), st.floats(0.1, 0.6), st.sampled_from([0.5, 0.45, 0.6])
)


def _flow(element: Element, p_up: float, p_down: float) -> float:
    c, b, m = element
    return float(mass_flow(p_up, p_down, TEMP_ANR, conductance=c, critical_ratio=b, subsonic_index=m))


def _chain_flow(chain: list[Element], p_up: float, p_down: float) -> float:
    """Mass flow of a chain, by searching the pressure between the first element and the rest."""
    if len(chain) == 1:
        return _flow(chain[0], p_up, p_down)
    first, rest = chain[0], chain[1:]
    between = brentq(
        lambda p: _flow(first, p_up, p) - _chain_flow(rest, p, p_down), p_down, p_up, xtol=1e-6, rtol=1e-13
    )
    return _flow(first, p_up, between)


@quick
@given(elements, st.floats(1e5, 1e6), st.floats(0.0, 1.0))
def test_choked_flow_does_not_see_the_pressure_behind(element: Element, p: float, share: float) -> None:
    assert _flow(element, p, share * element[1] * p) == _flow(element, p, 0.0)


@quick
@given(elements, st.floats(0.0, 0.9985), st.floats(1e-4, 1e-3))
def test_flow_falls_as_the_pressure_behind_rises(element: Element, ratio: float, step: float) -> None:
    assert _flow(element, 7e5, 7e5 * ratio) >= _flow(element, 7e5, 7e5 * (ratio + step)) > 0.0


def test_no_flow_at_equal_pressure_nor_backwards() -> None:
    assert _flow((UNIT, 0.3, 0.5), 7e5, 7e5) == 0.0
    assert _flow((UNIT, 0.3, 0.5), 6e5, 7e5) == 0.0
    assert ideal_nozzle_flow([7e5, 6e5], 7e5, 293.0, area=1e-5) == pytest.approx([0.0, 0.0], abs=0.0)


def test_flow_is_linear_next_to_equal_pressure() -> None:
    near = [_flow((UNIT, 0.3, 0.5), 7e5, 7e5 * (1.0 - gap)) for gap in (1e-6, 1e-5, 1e-4, 1e-3)]
    assert near == pytest.approx([near[3] * 1e-3, near[3] * 1e-2, near[3] * 1e-1, near[3]], rel=1e-9)


def test_flow_joins_at_the_critical_ratio_and_at_the_linear_core() -> None:
    for edge in (0.3, 0.999):
        below, above = (_flow((UNIT, 0.3, 0.5), 7e5, 7e5 * (edge + off)) for off in (-1e-9, 1e-9))
        assert below == pytest.approx(above, rel=1e-5)


def test_shut_element_passes_nothing_and_arrays_broadcast() -> None:
    assert mass_flow(7e5, 1e5, 293.0, conductance=0.0, critical_ratio=0.3) == 0.0
    flows = mass_flow(np.array([[5e5], [7e5]]), np.array([1e5, 4e5, 6e5]), 293.0, conductance=UNIT, critical_ratio=0.3)
    assert flows.shape == (2, 3)
    assert flows[0, 2] == 0.0


def test_choked_nozzle_is_the_choked_constant() -> None:
    flow = ideal_nozzle_flow(7e5, CRITICAL_RATIO_IDEAL * 7e5 * 0.999, 300.0, area=2e-5)
    assert flow == pytest.approx(choked_constant() * 2e-5 * 7e5 / math.sqrt(300.0), rel=1e-14)


def test_nozzle_near_equal_pressure_is_bernoulli() -> None:
    drop = 10.0
    flow = ideal_nozzle_flow(7e5, 7e5 - drop, 300.0, area=1e-5)
    assert flow == pytest.approx(1e-5 * math.sqrt(2.0 * 7e5 / (R_AIR * 300.0) * drop), rel=2e-5)


@quick
@given(st.lists(elements, min_size=2, max_size=4))
def test_choked_chain_against_pressures_searched_one_by_one(chain: list[Element]) -> None:
    whole = _chain_flow(chain, 7e5, 1.0) / (7e5 * 1.185)
    assert chain_conductance(chain) == pytest.approx(whole, rel=1e-7)


@quick
@given(st.lists(elements, min_size=2, max_size=6))
def test_chain_is_fitted_to_a_few_permille_and_says_so(chain: list[Element]) -> None:
    fit = fit_chain(chain)
    assert fit.conductance <= min(c for c, _, _ in chain) * (1.0 + 1e-12)
    assert 0.0 <= fit.error < 0.02
    whole = (fit.conductance, fit.critical_ratio, fit.subsonic_index)
    choked = _flow(whole, 7e5, 0.0)
    for share in (0.2, 0.5, 0.8, 0.95, 0.999):
        ratio = chain_end(chain, share * fit.conductance)
        assert abs(_flow(whole, 7e5, 7e5 * ratio) / choked - share) <= fit.error + 2e-3


@pytest.mark.parametrize(
    "pairs",
    [[(2.0, 0.2), (2.0, 0.5)], [(1.0, 0.5), (2.0, 0.2)], [(1.0, 0.3)] * 3, [(3.0, 0.1), (1.2, 0.4), (2.0, 0.3)]],
)
def test_fit_is_as_good_as_a_slow_search_finds(pairs: list[tuple[float, float]]) -> None:
    chain = [(c * UNIT, b, 0.5) for c, b in pairs]
    fit = fit_chain(chain)
    shares = np.sin(np.linspace(0.05, 1.0, 200) * math.pi / 2.0)
    ratios = np.array([chain_end(chain, share * fit.conductance * (1.0 - 1e-12)) for share in shares])

    def worst(z: NDArray[np.float64]) -> float:
        below = np.clip((ratios - z[0]) / (1.0 - z[0]), 0.0, 1.0)
        return float(np.abs((1.0 - below**2) ** z[1] - shares).max())

    start = np.array([fit.critical_ratio, fit.subsonic_index])
    best = minimize(worst, start, method="Nelder-Mead", options={"xatol": 1e-7, "fatol": 1e-9})
    assert fit.error <= 1.05 * best.fun + 1e-4
    assert worst(start) <= 1.05 * fit.error + 2e-4  # what is reported holds between the samples too


def test_a_single_element_is_itself() -> None:
    fit = fit_chain([(2.0 * UNIT, 0.31, 0.47)])
    assert (fit.conductance, fit.critical_ratio, fit.subsonic_index, fit.error) == (2.0 * UNIT, 0.31, 0.47, 0.0)
    assert fit_parallel([(2.0 * UNIT, 0.31, 0.47)]) == fit


def test_a_wide_element_before_or_behind_changes_nothing() -> None:
    small, wide = (UNIT, 0.3, 0.5), (1000.0 * UNIT, 0.3, 0.5)
    for chain in ([small, wide], [wide, small]):
        fit = fit_chain(chain)
        assert fit.conductance == pytest.approx(UNIT, rel=1e-5)
        assert fit.critical_ratio == pytest.approx(0.3, abs=1e-3)
        assert fit.error < 1e-3


def test_the_order_of_a_chain_matters() -> None:
    # Element 1 chokes first and the other does not; reversed, the choked one sees a lower pressure
    first, second = (UNIT, 0.5, 0.5), (2.0 * UNIT, 0.2, 0.5)
    assert chain_conductance([first, second]) == pytest.approx(UNIT, rel=1e-12)
    # reversed: q = p1, with p1 = b + (1 − b)·√(1 − (q/2)²) and b = 0.2, solved by hand as a quadratic
    q = (0.4 + math.sqrt(0.16 + 4.0 * 1.16 * 0.6)) / 2.32
    assert chain_conductance([second, first]) == pytest.approx(q * UNIT, rel=1e-9)


def test_chain_of_equal_elements_at_a_small_drop() -> None:
    # √-law: n equal elements pass 1/√n of one at the same small drop
    chain = [(UNIT, 0.3, 0.5)] * 4
    drop = 1.0 - chain_end(chain, 1e-3 * UNIT)
    assert drop == pytest.approx(4.0 * (1.0 - chain_end(chain[:1], 1e-3 * UNIT)), rel=1e-5)


def test_chain_end_tells_what_does_not_pass() -> None:
    assert chain_end([(UNIT, 0.3, 0.5)], 1.1 * UNIT) == -1.0
    assert chain_end([(UNIT, 0.3, 0.5)], UNIT) == 0.3


def test_an_element_that_chokes_only_against_vacuum() -> None:
    # b = 0: choked it leaves nothing to the next, so two of them in a row choke in the second, q = √(1 − q²)
    assert chain_conductance([(UNIT, 0.0, 0.5), (UNIT, 0.0, 0.5)]) == pytest.approx(UNIT / math.sqrt(2.0), rel=1e-9)
    assert fit_chain([(UNIT, 0.0, 0.5), (UNIT, 0.0, 0.5)]).error < 0.01


@quick
@given(st.lists(elements, min_size=2, max_size=4))
def test_parallel_elements_add(side_by_side: list[Element]) -> None:
    fit = fit_parallel(side_by_side)
    assert fit.conductance == pytest.approx(sum(c for c, _, _ in side_by_side), rel=1e-12)
    assert fit.error < 0.05
    whole = (fit.conductance, fit.critical_ratio, fit.subsonic_index)
    choked = _flow(whole, 7e5, 0.0)
    for ratio in (0.1, 0.4, 0.7, 0.9, 0.99):
        total = sum(_flow(item, 7e5, 7e5 * ratio) for item in side_by_side)
        assert abs(_flow(whole, 7e5, 7e5 * ratio) - total) / choked <= fit.error + 5e-3


def test_equal_parallel_elements_double() -> None:
    fit = fit_parallel([(UNIT, 0.3, 0.5)] * 2)
    assert (fit.critical_ratio, fit.subsonic_index) == pytest.approx((0.3, 0.5), abs=1e-12)
    assert fit.error < 1e-12


@quick
@given(st.floats(0.1, 100.0), st.floats(0.0, 0.7))
def test_conversions_undo_each_other(value: float, b: float) -> None:
    assert conversion.kv_from_conductance(conversion.conductance_from_kv(value, b), b) == pytest.approx(value)
    assert conversion.cv_from_conductance(conversion.conductance_from_cv(value, b), b) == pytest.approx(value)
    flow = conversion.nominal_flow_from_conductance(value * UNIT, b)
    assert conversion.conductance_from_nominal_flow(flow, b) == pytest.approx(value * UNIT)
    area = conversion.effective_area_from_conductance(value * UNIT)
    assert conversion.conductance_from_effective_area(area) == pytest.approx(value * UNIT)


def _vessel(t_end: float, p_supply: float, volume: float, p_start: float, h_area: float) -> tuple[float, float]:
    """Pressure and temperature of a vessel filled through one choked element, mass and energy integrated."""

    def rates(_: float, state: NDArray[np.float64]) -> list[float]:
        mass, energy = float(state[0]), float(state[1])
        temp = energy / (mass * CV)
        flow = _flow((UNIT, 0.3, 0.5), p_supply, mass * R_AIR * temp / volume)
        return [flow, flow * CP * TEMP_ANR + h_area * (TEMP_ANR - temp)]

    mass = p_start * volume / (R_AIR * TEMP_ANR)
    end = solve_ivp(rates, (0.0, t_end), [mass, mass * CV * TEMP_ANR], rtol=1e-9, atol=1e-12).y[:, -1]
    temp = float(end[1] / (end[0] * CV))
    return float(end[0] * R_AIR * temp / volume), temp


def test_vessel_filled_without_heat_in_closed_form() -> None:
    # choked: dp/dt = γ·R·T·q/V; mass and energy give T between T0 and γ·T0
    q = 7e5 * UNIT * 1.185
    p, temp = _vessel(0.1, 7e5, 1e-3, 1e5, 0.0)
    assert p == pytest.approx(1e5 + GAMMA * R_AIR * TEMP_ANR * q / 1e-3 * 0.1, rel=1e-7)
    mass = 1e5 * 1e-3 / (R_AIR * TEMP_ANR) + q * 0.1
    assert temp == pytest.approx(p * 1e-3 / (R_AIR * mass), rel=1e-9)


def test_nearly_empty_vessel_fills_to_gamma_times_the_supply_temperature() -> None:
    _, temp = _vessel(0.1, 7e5, 1e-3, 10.0, 0.0)
    assert temp == pytest.approx(GAMMA * TEMP_ANR, rel=1e-3)


def test_vessel_filled_at_constant_temperature_in_closed_form() -> None:
    q = 7e5 * UNIT * 1.185
    p, temp = _vessel(0.1, 7e5, 1e-3, 1e5, 1e5)
    assert temp == pytest.approx(TEMP_ANR, rel=1e-4)
    assert p == pytest.approx(1e5 + R_AIR * TEMP_ANR * q / 1e-3 * 0.1, rel=1e-4)


def test_vessel_emptied_without_heat_in_closed_form() -> None:
    # p1 = 7, p2 = 2 bar through C = 1, choked throughout (b = 0.3 into 0.5 bar): T ∝ p^((γ−1)/γ), q ∝ p/√T
    volume, p1, p2 = 1e-3, 7e5, 2e5

    def rates(_: float, state: NDArray[np.float64]) -> list[float]:
        mass, energy = float(state[0]), float(state[1])
        temp = energy / (mass * CV)
        p = mass * R_AIR * temp / volume
        flow = float(mass_flow(p, 0.5e5, temp, conductance=UNIT, critical_ratio=0.3))
        return [-flow, -flow * CP * temp]

    k = (GAMMA - 1.0) / (2.0 * GAMMA)
    constant = volume / (UNIT * 1.185 * R_AIR * TEMP_ANR)
    time = constant / GAMMA / k * ((p1 / p2) ** k - 1.0)
    mass = p1 * volume / (R_AIR * TEMP_ANR)
    end = solve_ivp(rates, (0.0, time), [mass, mass * CV * TEMP_ANR], rtol=1e-10, atol=1e-13).y[:, -1]
    temp = float(end[1] / (end[0] * CV))
    assert float(end[0]) * R_AIR * temp / volume == pytest.approx(p2, rel=1e-6)
    assert temp == pytest.approx(TEMP_ANR * (p2 / p1) ** (2.0 * k), rel=1e-6)
