"""Mass and energy of each chamber and of the whole cycle, over random cylinders (T1 to T4)."""

from __future__ import annotations

from dataclasses import replace

import pytest
from hypothesis import assume, given

from actuator.parts import Actuator
from tests.agreement.cases import CASES, Case
from tests.conservation.support import MANY, R_AIR, solved
from tests.strategies import cylinders

EXACT = 1e-12
"""Balances that hold by construction, whatever the step tolerance. [1]"""
STEP = 1e-6
"""What a ledger's step tolerance leaves of an identity between different integrals. [1]"""


@MANY
@given(cylinders())
def test_mass_in_less_mass_out_is_what_each_chamber_gained(case: Case) -> None:
    found = solved(case)
    r, b = found.result, found.balances
    kept = (
        r.p_cap[0] * r.volume_cap[0] / (R_AIR * r.temp_cap[0]),
        r.p_rod[0] * r.volume_rod[0] / (R_AIR * r.temp_rod[0]),
    )
    for side in (0, 1):
        scale = b.mass_in[side] + b.mass_out[side] + kept[side]
        gained = b.mass_in[side] - b.mass_out[side]
        assert gained == pytest.approx(b.mass_change[side], abs=EXACT * scale)


@MANY
@given(cylinders())
def test_first_law_of_each_chamber(case: Case) -> None:
    found = solved(case)
    b = found.balances
    for side in (0, 1):
        gained = b.enthalpy_in[side] - b.enthalpy_out[side] - b.work[side] + b.heat[side]
        assert gained == pytest.approx(b.energy_change[side], abs=EXACT * found.scale)


@MANY
@given(cylinders())
def test_what_is_drawn_is_vented_once_the_cycle_repeats(case: Case) -> None:
    found = solved(case)
    r, b = found.result, found.balances
    assume(r.periodic)
    drawn = b.drawn - b.given_back
    change = sum(b.mass_change)
    through = sum(b.mass_in) + sum(b.mass_out)
    assert drawn == pytest.approx(b.vented + change, abs=EXACT * (through + 1e-6))
    kept = found.stored / (R_AIR * min(r.temp_cap[0], r.temp_rod[0]))
    assert change == pytest.approx(0.0, abs=3.0 * r.mismatch * kept + EXACT * through)
    halves = r.extend.air_drawn + r.retract.air_drawn
    assert drawn == pytest.approx(halves, abs=1e-5 * (b.drawn + b.given_back) + 1e-12)


@MANY
@given(cylinders())
def test_net_enthalpy_and_heat_end_as_load_friction_and_impact(case: Case) -> None:
    found = solved(case)
    b, items = found.balances, found.ledger
    used = items.load + items.friction + items.stop
    first_law = sum(b.enthalpy_in) - sum(b.enthalpy_out) + sum(b.heat) - sum(b.energy_change)
    assert first_law == pytest.approx(sum(b.work), abs=EXACT * 10 * found.scale)
    assert b.piston_work == pytest.approx(used + b.mechanical_change, abs=STEP * found.scale)


@MANY
@given(cylinders())
def test_boundary_work_is_piston_work_where_the_piston_returns_to_its_place(case: Case) -> None:
    found = solved(case)
    r, b = found.result, found.balances
    assume(r.periodic)
    moved = (r.position[-1] - r.position[0]) * case.site.ambient_pressure * case.actuator.area_cap
    assert sum(b.work) == pytest.approx(b.piston_work, abs=STEP * found.scale + abs(moved))


def _isothermal(part: Actuator) -> Actuator:
    return replace(part, wall_heat_transfer=1e6)


@pytest.mark.parametrize("case", CASES[:5], ids=lambda case: case.name)
def test_isothermal_air_turns_heat_from_the_walls_into_work(case: Case) -> None:
    """With h without bound and the supply at ambient temperature, the heat is what the piston gives."""
    found = solved(replace(case, actuator=_isothermal(case.actuator)))
    used = found.ledger.load + found.ledger.friction + found.ledger.stop
    assert sum(found.balances.heat) == pytest.approx(used, abs=2e-3 * found.ledger.supplied)


@pytest.mark.parametrize("rtol", [1e-4, 1e-6, 1e-9])
def test_work_of_the_piston_follows_the_step_tolerance_and_the_balances_do_not(rtol: float) -> None:
    case = CASES[0]
    found = solved(case, rtol=rtol)
    b, items = found.balances, found.ledger
    used = items.load + items.friction + items.stop + b.mechanical_change
    assert b.piston_work == pytest.approx(used, abs=10.0 * rtol * items.supplied)
    for side in (0, 1):
        gained = b.mass_in[side] - b.mass_out[side]
        assert gained == pytest.approx(b.mass_change[side], abs=EXACT * b.mass_in[side])
