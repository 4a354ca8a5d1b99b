"""Compressor and cost: limits, and electricity as the machine is described."""

from __future__ import annotations

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from actuator.air.gas import GAMMA, R_AIR
from actuator.air.states import dry_density_at
from actuator.energy.compressor import (
    outlet_temperature,
    staged_work,
    steady_flow_work,
    supply_work,
    volumetric_efficiency,
)
from actuator.energy.cost import yearly_cost
from actuator.errors import Refusal
from actuator.parts import Compressor, Site

quick = settings(deadline=None, max_examples=60, database=None)


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


def test_intercoolers_of_a_machine_leave_air_warmer_than_the_intake() -> None:
    def work(approach: float) -> float:
        supply = supply_work(Compressor(isentropic_efficiency=0.75, stages=2, approach=approach), Site())
        assert not isinstance(supply, Refusal)
        return supply.specific_work

    assert work(20.0) / work(0.0) == pytest.approx(1.0 + 0.5 * 20.0 / 293.15, rel=1e-12)
    # without cooling the second stage takes in what the first gives
    ratio = Compressor().rated_pressure / Site().ambient_pressure
    rise = (math.sqrt(ratio) ** (0.4 / 1.4) - 1.0) / 0.75
    assert work(500.0) / work(0.0) == pytest.approx(1.0 + 0.5 * rise, rel=1e-12)


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


def test_cost_is_proportional_and_zero_without_air() -> None:
    rates = {"energy_price": 0.2 / 3.6e6, "carbon_intensity": 0.35 / 3.6e6}
    one = yearly_cost(0.01, 1e6, 400e3, **rates)
    assert one.energy_year == pytest.approx(4e9, rel=1e-12)
    assert one.cost_year == pytest.approx(4e9 / 3.6e6 * 0.2, rel=1e-12)
    assert one.carbon_year == pytest.approx(4e9 / 3.6e6 * 0.35, rel=1e-12)
    none = yearly_cost(0.0, 1e6, 400e3, **rates)
    assert (none.energy_year, none.cost_year, none.carbon_year) == (0.0, 0.0, 0.0)
