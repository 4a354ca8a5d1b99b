"""Diagram, compressor, hand figures, demand and cost: limits and balances."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.typing import NDArray

from actuator.air.exergy import flow_exergy, unused_share
from actuator.air.gas import GAMMA, R_AIR
from actuator.air.states import dry_density_at
from actuator.energy.compressor import (
    outlet_temperature,
    staged_work,
    steady_flow_work,
    supply_work,
    volumetric_efficiency,
)
from actuator.energy.consumption import ChamberTurn, air_difference, settled_air, textbook_air
from actuator.energy.cost import yearly_cost
from actuator.energy.demand import demand
from actuator.energy.indicator import diagram, smallest_cut_off
from actuator.errors import InputError, Refusal
from actuator.parts import Compressor, Site

quick = settings(deadline=None, max_examples=60, database=None)
AIR = {"p_supply": 7e5, "p_back": 1e5, "p_ambient": 1e5, "temp_supply": 293.15, "swept": 8e-4}


def _area(volume: tuple[float, ...], pressure: tuple[float, ...]) -> float:
    v, p = np.array(volume), np.array(pressure)
    return float(0.5 * np.sum((np.roll(p, -1) + p) * (np.roll(v, -1) - v)))


# Indicator diagram


def test_full_pressure_stroke_is_a_rectangle() -> None:
    ideal = diagram(**AIR)
    assert ideal.work == pytest.approx(6e5 * 8e-4, rel=1e-12)
    assert ideal.mean_effective_pressure == pytest.approx(6e5, rel=1e-12)
    assert ideal.work_out == pytest.approx(6e5 * 8e-4, rel=1e-12)
    assert ideal.work_back == pytest.approx(0.0, abs=1e-9)
    assert ideal.air == pytest.approx(7e5 * 8e-4 / (R_AIR * 293.15), rel=1e-12)
    assert ideal.air_adiabatic == pytest.approx(ideal.air, rel=1e-12)  # no clearance: the air stays at supply


@quick
@given(st.floats(0.01, 0.3), st.floats(0.1, 1.0), st.floats(0.0, 0.3), st.floats(1.0, 1.4))
def test_work_is_the_area_that_is_drawn(clearance: float, cut_off: float, closure: float, index: float) -> None:
    ideal = diagram(
        **AIR,
        clearance=clearance,
        cut_off=cut_off,
        closure=closure,
        index_expansion=index,
        index_compression=index,
    )
    assert len(ideal.volume) == len(ideal.pressure)
    assert (ideal.volume[0], ideal.pressure[0]) == pytest.approx((ideal.volume[-1], ideal.pressure[-1]))
    assert _area(ideal.volume, ideal.pressure) == pytest.approx(ideal.work, rel=0.02)


def test_complete_isothermal_expansion_uses_all_exergy() -> None:
    ideal = diagram(**AIR, cut_off=1.0 / 7.0, index_expansion=1.0)
    assert ideal.p_release == pytest.approx(1e5, rel=1e-12)
    exergy = float(flow_exergy(7e5, 293.15, 1e5, 293.15))
    assert ideal.work / ideal.air == pytest.approx(exergy, rel=1e-12)


def test_full_pressure_leaves_the_share_that_exergy_says() -> None:
    ideal = diagram(**AIR)
    exergy = float(flow_exergy(7e5, 293.15, 1e5, 293.15))
    assert 1.0 - ideal.work / ideal.air / exergy == pytest.approx(float(unused_share(7e5, 1e5)), rel=1e-12)


def test_recompression_to_supply_pressure_makes_clearance_free() -> None:
    clearance = 0.05
    closure = clearance * (7.0 - 1.0)  # isothermal: c·p_s = (c + κ)·p_b
    ideal = diagram(**AIR, clearance=clearance, cut_off=0.4, closure=closure, index_compression=1.0)
    assert ideal.p_compressed == pytest.approx(7e5, rel=1e-12)
    assert ideal.air == pytest.approx(0.4 * 7e5 * 8e-4 / (R_AIR * 293.15), rel=1e-12)
    assert ideal.remarks == ()


def test_clearance_air_is_filled_from_the_back_pressure() -> None:
    ideal = diagram(**AIR, clearance=0.1)
    extra = ideal.air - 7e5 * 8e-4 / (R_AIR * 293.15)
    assert extra == pytest.approx(6e5 * 8e-5 / (R_AIR * 293.15), rel=1e-12)
    assert ideal.air_adiabatic < ideal.air  # the filled chamber is warmer


def test_adiabatic_admission_against_the_first_law() -> None:
    # m·cp·T_s = ΔU + p_s·ε·V_s, clearance air counted from p_c
    ideal = diagram(**AIR, clearance=0.1, cut_off=0.5)
    inner = (7e5 * 0.6 * 8e-4 - 1e5 * 0.1 * 8e-4) / (GAMMA - 1.0)
    heat = GAMMA * R_AIR / (GAMMA - 1.0) * 293.15
    assert ideal.air_adiabatic * heat == pytest.approx(inner + 7e5 * 0.5 * 8e-4, rel=1e-12)


def test_expansion_and_recompression_out_of_bounds_are_told() -> None:
    early = diagram(**AIR, cut_off=0.1)
    assert early.remarks[0].startswith("Expansion ends at 0.279 bar absolute, below the back pressure")
    late = diagram(**AIR, clearance=0.02, closure=0.3)
    assert "above the supply: shut the exhaust later" in late.remarks[0]


def test_recompression_needs_a_clearance() -> None:
    with pytest.raises(InputError, match="0 without clearance"):
        diagram(**AIR, closure=0.1)


@quick
@given(st.floats(0.0, 0.2), st.floats(0.01, 0.999), st.floats(1.0, 1.4))
def test_smallest_cut_off_just_carries_the_load(clearance: float, share: float, index: float) -> None:
    common = {"p_supply": 7e5, "p_back": 1e5, "clearance": clearance}
    cut_off = smallest_cut_off(**common, mean_pressure=share * 6e5, index=index)
    assert not isinstance(cut_off, Refusal)
    if cut_off > 0.0:
        ideal = diagram(**(AIR | {"clearance": clearance}), cut_off=cut_off, index_expansion=index)
        assert ideal.mean_effective_pressure == pytest.approx(share * 6e5, rel=1e-6)
    else:
        least = diagram(**(AIR | {"clearance": clearance}), cut_off=1e-12, index_expansion=index)
        assert least.mean_effective_pressure >= share * 6e5


def test_smallest_cut_off_at_its_ends() -> None:
    full = smallest_cut_off(p_supply=7e5, p_back=1e5, mean_pressure=6e5)
    assert full == pytest.approx(1.0, abs=1e-6)
    refused = smallest_cut_off(p_supply=7e5, p_back=1e5, mean_pressure=6.1e5)
    assert str(refused) == "even full pressure over the whole stroke does not carry the load"


# Compressor


@pytest.mark.parametrize("off", [1e-3, 1e-6, 1e-9, 0.0])
def test_compression_work_is_smooth_through_the_isothermal(off: float) -> None:
    isothermal = R_AIR * 293.15 * math.log(8.0)
    for index in (1.0 - off, 1.0 + off):
        expected = isothermal * (1.0 + 0.5 * math.log(8.0) * (index - 1.0))
        assert steady_flow_work(293.15, 8.0, index) == pytest.approx(expected, rel=3.0 * off**2 + 2.0 * off**2 + 1e-14)


@quick
@given(st.floats(1.01, 20.0), st.floats(1.0, 1.4))
def test_work_lies_between_isothermal_and_isentropic(ratio: float, index: float) -> None:
    low, here, high = steady_flow_work(293.15, ratio, [1.0, index, GAMMA])
    assert low <= here * (1.0 + 1e-12)
    assert here <= high * (1.0 + 1e-12)


@quick
@given(st.floats(1.5, 20.0))
def test_isentropic_work_is_the_rise_of_enthalpy(ratio: float) -> None:
    rise = float(outlet_temperature(293.15, ratio, GAMMA)) - 293.15
    heat = GAMMA * R_AIR / (GAMMA - 1.0)
    assert float(steady_flow_work(293.15, ratio, GAMMA)) == pytest.approx(heat * rise, rel=1e-10)


def test_many_cooled_stages_come_to_the_isothermal() -> None:
    isothermal = float(steady_flow_work(293.15, 8.0, 1.0))
    works = [staged_work(293.15, 8.0, GAMMA, stages=n) for n in (1, 2, 4, 1000)]
    assert works == sorted(works, reverse=True)
    assert works[-1] == pytest.approx(isothermal, rel=1e-3)


def test_intercooling_to_an_approach() -> None:
    # the second stage takes in air that is 10 K warmer: its work grows by 10/T1
    cold, warm = (staged_work(293.15, 8.0, 1.3, stages=2, approach=approach) for approach in (0.0, 10.0))
    assert warm / cold == pytest.approx(1.0 + 0.5 * 10.0 / 293.15, rel=1e-12)
    uncooled = staged_work(293.15, 8.0, 1.3, stages=2, approach=1000.0)
    assert uncooled == pytest.approx(staged_work(293.15, 8.0, 1.3), rel=1e-12)


def test_clearance_at_its_ends() -> None:
    assert volumetric_efficiency(0.0, 8.0, 1.3) == 1.0
    assert volumetric_efficiency(0.05, 1.0, 1.3) == 1.0
    assert volumetric_efficiency(0.05, 1e4, 1.3) == 0.0


def test_electricity_from_measured_points_is_power_over_dry_air() -> None:
    site = Site(ambient_pressure=95e3, ambient_temperature=303.15, relative_humidity=0.8)
    supply = supply_work(Compressor(free_air=0.1, package_power=37e3), site)
    assert not isinstance(supply, Refusal)
    assert supply.how == "package power"
    assert supply.specific_energy == pytest.approx(370e3 / dry_density_at(95e3, 303.15, 0.8), rel=1e-12)


def test_electricity_from_stages_is_work_over_efficiencies() -> None:
    machine = Compressor(isentropic_efficiency=1.0, stages=1, drive_efficiency=0.9, motor_efficiency=0.8)
    supply = supply_work(machine, Site())
    assert not isinstance(supply, Refusal)
    ratio = machine.rated_pressure / Site().ambient_pressure
    assert supply.specific_work == pytest.approx(float(steady_flow_work(293.15, ratio, GAMMA)), rel=1e-12)
    assert supply.specific_energy == pytest.approx(supply.specific_work / 0.72, rel=1e-12)
    assert supply.how == "stages and efficiencies"


def test_polytropic_efficiency_is_above_the_isentropic_one_of_the_same_machine() -> None:
    def work(machine: Compressor) -> float:
        supply = supply_work(machine, Site())
        assert not isinstance(supply, Refusal)
        return supply.specific_work

    polytropic = work(Compressor(isentropic_efficiency=None, polytropic_efficiency=0.8, stages=1))
    isentropic = work(Compressor(isentropic_efficiency=0.8, stages=1))
    assert polytropic > isentropic
    perfect = work(Compressor(isentropic_efficiency=None, polytropic_efficiency=1.0, stages=2))
    assert perfect == pytest.approx(work(Compressor(isentropic_efficiency=1.0, stages=2)), rel=1e-12)


def test_a_compressor_that_does_not_compress_is_refused() -> None:
    refused = supply_work(Compressor(rated_pressure=90e3), Site())
    assert str(refused) == "the compressor's rated pressure is not above ambient"


# Air of a cycle by hand

turns = st.builds(
    ChamberTurn,
    p_supply=st.floats(3e5, 1e6),
    swept=st.floats(1e-4, 1e-2),
    dead=st.floats(1e-6, 1e-3),
    p_full=st.floats(2e5, 1e6),
    temp_full=st.floats(250.0, 350.0),
    volume_full=st.floats(1e-4, 1e-2),
    p_empty=st.floats(1e5, 3e5),
    temp_empty=st.floats(220.0, 320.0),
    volume_empty=st.floats(1e-6, 1e-3),
)


@quick
@given(turns, turns, st.floats(1e-5, 0.1))
def test_causes_add_up_to_the_difference(cap: ChamberTurn, rod: ChamberTurn, drawn: float) -> None:
    found = air_difference(drawn=drawn, cap=cap, rod=rod, p_ambient=1e5, temp_supply=293.15)
    textbook = textbook_air(
        p_extend=cap.p_supply, p_retract=rod.p_supply, temp_supply=293.15, swept_cap=cap.swept, swept_rod=rod.swept
    )
    total = sum(mass for _, mass in found.causes)
    assert total == pytest.approx(drawn - textbook, abs=1e-12)


@quick
@given(turns, turns)
def test_a_chamber_explains_what_it_holds(cap: ChamberTurn, rod: ChamberTurn) -> None:
    drawn = sum(
        turn.p_full * turn.volume_full / (R_AIR * turn.temp_full)
        - turn.p_empty * turn.volume_empty / (R_AIR * turn.temp_empty)
        for turn in (cap, rod)
    )
    found = air_difference(drawn=drawn, cap=cap, rod=rod, p_ambient=1e5, temp_supply=293.15)
    assert found.causes[-1][0] == "air not held by a chamber when the valve switches"
    assert abs(found.causes[-1][1]) < 1e-12


def _settled_turn() -> ChamberTurn:
    return ChamberTurn(
        p_supply=7e5,
        swept=8e-4,
        dead=2e-5,
        p_full=7e5,
        temp_full=293.15,
        volume_full=8.2e-4,
        p_empty=1e5,
        temp_empty=293.15,
        volume_empty=2e-5,
    )


def test_a_settled_cycle_differs_by_its_dead_volumes_only() -> None:
    turn = _settled_turn()
    common = {"p_extend": 7e5, "p_retract": 7e5, "temp_supply": 293.15, "swept_cap": 8e-4, "swept_rod": 8e-4}
    settled = settled_air(**common, p_ambient=1e5, dead_cap=2e-5, dead_rod=2e-5)
    found = air_difference(drawn=settled, cap=turn, rod=turn, p_ambient=1e5, temp_supply=293.15)
    causes = dict(found.causes)
    assert causes.pop("dead volumes") == pytest.approx(settled - textbook_air(**common), rel=1e-9)
    assert all(abs(mass) < 1e-12 for mass in causes.values())
    assert "Against the textbook +2.1 %: dead volumes +2.1 %." in found.text
    assert "shut at" not in found.text


def test_the_text_names_a_cut_off_and_the_hand_formula() -> None:
    turn = _settled_turn()
    found = air_difference(drawn=1e-2, cap=turn, rod=turn, p_ambient=1e5, temp_supply=293.15, cut_off=0.6)
    assert "The supply is shut at 60 % of the stroke" in found.text
    assert "(-1.5 %)" in found.text


# Demand

Array = NDArray[np.float64]


def _brute(histories: list[tuple[Array, Array]], period: float, window: float) -> float:
    """Highest window mean by adding up 20,000 slices."""
    count = 20_000
    middles = (np.arange(count) + 0.5) * period / count
    flow = sum((np.interp(middles, time, values) for time, values in histories), np.zeros(count))
    total = np.concatenate(([0.0], np.cumsum(np.tile(flow, 2)) * period / count))
    width = round(window / period * count)
    return float((total[width:] - total[:-width]).max() / window)


def test_a_steady_flow_has_no_peak() -> None:
    steady = (np.array([0.0, 4.0]), np.array([0.02, 0.02]))
    found = demand([steady, steady], 4.0)
    assert (found.mean, found.peak, found.per_cycle) == pytest.approx((0.04, 0.04, 0.16), rel=1e-12)


def test_no_actuator_no_demand() -> None:
    found = demand([], 4.0)
    assert (found.mean, found.peak, found.per_cycle) == (0.0, 0.0, 0.0)


def test_a_pulse_across_the_end_of_the_cycle() -> None:
    pulse = (np.array([0.0, 0.2, 0.2, 3.8, 3.8, 4.0]), np.array([1.0, 1.0, 0.0, 0.0, 1.0, 1.0]))
    assert demand([pulse], 4.0, 0.4).peak == pytest.approx(1.0, rel=1e-12)
    assert demand([pulse], 4.0, 0.5).peak == pytest.approx(0.8, rel=1e-12)
    assert demand([pulse], 4.0, 4.0).peak == pytest.approx(0.1, rel=1e-12)
    assert demand([pulse], 4.0, 0.0).peak == 1.0


def test_pulses_meet_or_miss_each_other() -> None:
    first = (np.array([0.0, 1.0, 1.0, 4.0]), np.array([1.0, 1.0, 0.0, 0.0]))
    later = (np.array([0.0, 2.0, 2.0, 3.0, 3.0, 4.0]), np.array([0.0, 0.0, 1.0, 1.0, 0.0, 0.0]))
    assert demand([first, first], 4.0, 0.5).peak == pytest.approx(2.0)
    assert demand([first, later], 4.0, 0.5).peak == pytest.approx(1.0)
    assert demand([first, later], 4.0, 0.0).peak == 1.0


def test_the_top_of_a_triangle_lies_between_its_points() -> None:
    triangle = (np.array([0.0, 1.0, 2.0, 4.0]), np.array([0.0, 1.0, 0.0, 0.0]))
    # a window of 0.5 s centred on the top: 1 − 0.25/2
    assert demand([triangle], 4.0, 0.5).peak == pytest.approx(0.875, rel=1e-12)


@quick
@given(
    st.lists(st.lists(st.floats(-0.2, 1.0), min_size=6, max_size=6), min_size=1, max_size=3),
    st.floats(0.05, 3.9),
)
def test_demand_against_adding_up_slices(values: list[list[float]], window: float) -> None:
    time = np.array([0.0, 0.3, 0.3, 1.7, 2.9, 4.0])
    histories = [(time, np.array(item)) for item in values]
    found = demand(histories, 4.0, window)
    assert found.peak == pytest.approx(_brute(histories, 4.0, window), abs=4e-3 * len(values) / window)
    assert found.peak >= found.mean - 1e-12
    assert found.per_cycle == pytest.approx(4.0 * found.mean, abs=1e-12)


def test_a_window_longer_than_the_cycle() -> None:
    pulse = (np.array([0.0, 1.0, 1.0, 4.0]), np.array([1.0, 1.0, 0.0, 0.0]))
    assert demand([pulse], 4.0, 9.0).peak == pytest.approx(3.0 / 9.0, rel=1e-12)


# Cost


def test_cost_is_proportional_and_zero_without_air() -> None:
    rates = {"energy_price": 0.2 / 3.6e6, "carbon_intensity": 0.35 / 3.6e6}
    one = yearly_cost(0.01, 1e6, 400e3, **rates)
    assert one.energy_year == pytest.approx(4e9, rel=1e-12)
    assert one.cost_year == pytest.approx(4e9 / 3.6e6 * 0.2, rel=1e-12)
    assert one.carbon_year == pytest.approx(4e9 / 3.6e6 * 0.35, rel=1e-12)
    none = yearly_cost(0.0, 1e6, 400e3, **rates)
    assert (none.energy_year, none.cost_year, none.carbon_year) == (0.0, 0.0, 0.0)
