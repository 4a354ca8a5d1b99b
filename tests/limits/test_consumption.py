"""Air by hand, and the causes of what is drawn instead."""

from __future__ import annotations

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from actuator.air.gas import R_AIR
from actuator.energy.consumption import ChamberTurn, air_difference, settled_air, textbook_air

quick = settings(deadline=None, max_examples=60, database=None)
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
