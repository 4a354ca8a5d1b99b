"""Ideal indicator diagram: reversible limits, balances, and what is drawn."""

from __future__ import annotations

import dataclasses

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from actuator.air.exergy import flow_exergy, unused_share
from actuator.air.gas import GAMMA, R_AIR
from actuator.energy.indicator import Indicator, diagram, ideal_indicator, smallest_cut_off
from actuator.errors import InputError, Refusal
from actuator.parts import Actuator, Friction, Load, Valve

quick = settings(deadline=None, max_examples=60, database=None)
AIR = {"p_supply": 7e5, "p_back": 1e5, "p_ambient": 1e5, "temp_supply": 293.15, "swept": 8e-4}


def _area(volume: tuple[float, ...], pressure: tuple[float, ...]) -> float:
    v, p = np.array(volume), np.array(pressure)
    return float(0.5 * np.sum((np.roll(p, -1) + p) * (np.roll(v, -1) - v)))


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
    assert (ideal.volume[0], ideal.pressure[0]) == (ideal.volume[-1], ideal.pressure[-1])
    gross = abs(ideal.work_out) + abs(ideal.work_back)  # straight pieces between points evenly in ln V
    assert _area(ideal.volume, ideal.pressure) == pytest.approx(ideal.work, abs=0.005 * gross)


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


def _cylinder(cut_off: float = 1.0, return_pressure: float | None = None) -> Actuator:
    """An invented cylinder, 50 × 20 × 400 mm."""
    return Actuator(
        name="Pusher",
        bore=0.05,
        rod=0.02,
        stroke=0.4,
        dead_volume_cap=2e-5,
        dead_volume_rod=3e-5,
        closed_length=0.05,
        bearing_length=0.025,
        cut_off=cut_off,
        return_pressure=return_pressure,
        retract_at=2.0,
        load=Load(mass=20.0),
        friction=Friction(breakaway=90.0, coulomb=60.0, viscous=30.0),
        valve=Valve(supply_c=2e-8, exhaust_c=2e-8),
    )


def _ideal(actuator: Actuator) -> Indicator:
    return ideal_indicator(actuator, p_supply=7e5, temp_supply=293.15, p_ambient=1e5, temp_ambient=293.15)


def test_both_chambers_of_a_cylinder_are_drawn_with_their_dead_volumes() -> None:
    cylinder = _cylinder()
    found = _ideal(cylinder)
    for volume, area, dead in (
        (found.volume, cylinder.area_cap, 2e-5),
        (found.volume_retract, cylinder.area_rod, 3e-5),
    ):
        assert min(volume) == pytest.approx(dead, rel=1e-12)
        assert max(volume) == pytest.approx(dead + area * 0.4, rel=1e-12)
    assert set(found.pressure) == {1e5, 7e5}
    assert found.work == pytest.approx(6e5 * cylinder.area_cap * 0.4, rel=1e-12)
    assert found.work_per_kg == pytest.approx(found.work / found.air, rel=1e-15)
    assert found.unused_share == pytest.approx(float(unused_share(7e5, 1e5)), rel=1e-15)
    assert found.unused_share_here > found.unused_share  # the dead volume is filled for nothing
    assert found.remarks == ()


def test_cut_off_saves_air_and_leaves_less_unused() -> None:
    full, short = _ideal(_cylinder()), _ideal(_cylinder(cut_off=0.5))
    assert short.air < 0.55 * full.air
    assert short.work > 0.6 * full.work
    assert short.unused_share_here < full.unused_share_here
    assert short.unused_share == full.unused_share


def test_return_pressure_and_index_of_the_actuator_are_used() -> None:
    low = _ideal(_cylinder(return_pressure=3e5))
    assert max(low.pressure_retract) == 3e5
    assert max(low.pressure) == 7e5
    slow = dataclasses.replace(_cylinder(cut_off=0.5), wall_heat_transfer=None, polytropic_index=1.0)
    assert _ideal(slow).work > _ideal(_cylinder(cut_off=0.5)).work


def test_a_cut_off_that_is_too_early_is_told_by_direction() -> None:
    found = _ideal(_cylinder(cut_off=0.05))
    assert [text.split(":")[0] for text in found.remarks] == ["Extending", "Retracting"]
