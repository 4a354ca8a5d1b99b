"""Static forces, bore and buckling: limits and inverses."""

from __future__ import annotations

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from actuator.errors import InputError, Refusal
from actuator.mechanics.buckling import (
    BORES,
    YIELD_ROD,
    column,
    default_closed_length,
    end_factor,
    longest_column,
    longest_stroke,
    transition_slenderness,
)
from actuator.mechanics.force import (
    area_cap,
    area_rod,
    available_force,
    force_reserve,
    largest_process_force,
    load_ratio,
    opposing_extend,
    opposing_retract,
    required_bore,
    theoretical_extend,
    theoretical_retract,
)

quick = settings(deadline=None, max_examples=80, database=None)


def test_areas_without_and_with_a_rod() -> None:
    assert area_rod(0.05, 0.0) == area_cap(0.05)
    assert area_rod(0.05, 0.05) == 0.0
    assert area_cap(0.05) - area_rod(0.05, 0.02) == pytest.approx(area_cap(0.02), rel=1e-12)


def test_no_force_at_ambient_pressure() -> None:
    assert theoretical_extend(1e5, 1e5, 0.05) == 0.0
    assert theoretical_retract(1e5, 1e5, 0.05, 0.02) == 0.0
    assert available_force(50.0, 60.0) == 0.0
    assert str(load_ratio(10.0, 0.0)) == "the supply pressure is not above ambient: no force"


def test_no_load_has_no_reserve() -> None:
    assert force_reserve(1000.0, 50.0, 0.0) == Refusal("no load")
    assert load_ratio(0.0, 1000.0) == 0.0


def test_reserve_is_zero_where_the_load_is_just_carried() -> None:
    assert force_reserve(1000.0, 60.0, 940.0) == 0.0
    assert force_reserve(1000.0, 60.0, 1000.0) == pytest.approx(-0.06)


def test_gravity_opposes_one_way_and_helps_the_other() -> None:
    up = math.pi / 2.0
    assert opposing_extend(mass=10.0, inclination=up) == pytest.approx(98.0665, rel=1e-12)
    assert opposing_retract(mass=10.0, inclination=up) == 0.0
    assert opposing_extend(mass=10.0, inclination=-up) == 0.0
    assert opposing_retract(mass=10.0, inclination=-up) == pytest.approx(98.0665, rel=1e-12)


def test_guide_friction_opposes_both_ways_on_the_level() -> None:
    assert opposing_extend(mass=10.0, guide_friction=0.1) == pytest.approx(9.80665, rel=1e-12)
    assert opposing_retract(mass=10.0, guide_friction=0.1) == pytest.approx(9.80665, rel=1e-12)


def test_constant_force_pushes_the_rod_out() -> None:
    assert opposing_extend(mass=1.0, extend_force=100.0, constant_force=40.0) == pytest.approx(60.0)
    assert opposing_retract(mass=1.0, retract_force=100.0, constant_force=40.0) == pytest.approx(140.0)


def test_process_forces_add_where_they_overlap_and_only_there() -> None:
    assert largest_process_force(()) == 0.0
    assert largest_process_force(((0.0, 0.1, 100.0), (0.1, 0.2, 80.0))) == 100.0
    assert largest_process_force(((0.0, 0.11, 100.0), (0.1, 0.2, 80.0))) == 180.0
    assert opposing_extend(mass=1.0, extend_force=10.0, process=((0.3, 0.4, 300.0),)) == pytest.approx(310.0)


@quick
@given(st.floats(10.0, 5000.0), st.floats(10.0, 5000.0), st.floats(0.0, 1.0), st.floats(0.0, 0.15), st.floats(0.0, 0.6))
def test_required_bore_just_carries_load_and_reserve(
    load_extend: float, load_retract: float, reserve: float, share: float, ratio: float
) -> None:
    bore = required_bore(
        p_extend=7e5,
        p_retract=6e5,
        p_ambient=1e5,
        load_extend=load_extend,
        load_retract=load_retract,
        reserve=reserve,
        friction_share=share,
        rod_ratio=ratio,
    )
    assert not isinstance(bore, Refusal)
    friction = share * theoretical_extend(7e5, 1e5, bore)
    both = (
        force_reserve(theoretical_extend(7e5, 1e5, bore), friction, load_extend),
        force_reserve(theoretical_retract(6e5, 1e5, bore, ratio * bore), friction, load_retract),
    )
    got = [item for item in both if not isinstance(item, Refusal)]
    assert min(got) == pytest.approx(reserve, abs=1e-9)


def test_required_bore_is_refused_with_a_reason() -> None:
    pressures = {"p_extend": 7e5, "p_ambient": 1e5, "load_extend": 0.0}
    assert required_bore(**pressures, p_retract=7e5, load_retract=0.0) == Refusal("no load")
    refused = required_bore(**pressures, p_retract=1.2e5, load_retract=100.0)
    assert str(refused) == "retracting, the supply pressure leaves no force over friction"


def test_johnson_meets_euler_with_equal_slope() -> None:
    diameter = 0.02
    edge = transition_slenderness() * 0.25 * diameter
    step = 1e-6 * edge
    loads = [column(diameter, edge + k * step) for k in (-2, -1, 1, 2)]
    assert [item.rule for item in loads] == ["Johnson", "Johnson", "Euler", "Euler"]
    assert loads[1].load == pytest.approx(loads[2].load, rel=1e-5)
    left, right = loads[1].load - loads[0].load, loads[3].load - loads[2].load
    assert left == pytest.approx(right, rel=1e-3)


def test_a_stocky_rod_yields() -> None:
    assert column(0.02, 1e-9).load == pytest.approx(YIELD_ROD * area_cap(0.02), rel=1e-12)
    assert longest_column(0.02, YIELD_ROD * area_cap(0.02) * 1.001) == 0.0


@quick
@given(st.floats(0.004, 0.1), st.floats(0.01, 5.0))
def test_longest_column_undoes_the_buckling_load(diameter: float, length: float) -> None:
    rod = column(diameter, length)
    if rod.slenderness > 1.0:
        assert longest_column(diameter, rod.load) == pytest.approx(length, rel=1e-6)


@quick
@given(st.floats(0.01, 0.04), st.floats(1.0, 6.0), st.sampled_from(sorted(BORES)), st.floats(50.0, 5000.0))
def test_longest_stroke_just_keeps_the_safety(diameter: float, safety: float, mounting: str, push: float) -> None:
    bore, stroke = 2.5 * diameter, 0.3
    longest = longest_stroke(
        rod=diameter,
        mounting=mounting,
        rod_end="hinged-guided",
        stroke=stroke,
        closed_length=default_closed_length(mounting, bore, stroke),
        push=push,
        safety=safety,
    )
    if isinstance(longest, Refusal):
        assert "no stroke keeps a buckling safety" in longest.reason
        return
    factor = end_factor(mounting, "hinged-guided")
    assert not isinstance(factor, Refusal)
    extended = default_closed_length(mounting, bore, longest) + longest
    assert column(diameter, factor * extended).load == pytest.approx(safety * push, rel=1e-6)


def test_a_longer_way_behind_the_mounting_counts() -> None:
    lengths = {item: default_closed_length(item, 0.05, 0.4) for item in sorted(BORES)}
    expected = {"foot": 0.05, "front flange": 0.05, "front trunnion": 0.05, "rear flange": 0.55, "rear pin": 0.55}
    assert lengths == pytest.approx(expected | {"mid trunnion": 0.275})


def test_a_mechanism_is_refused() -> None:
    refused = end_factor("rear pin", "free")
    assert str(refused) == "a free rod end on a hinged mounting is a mechanism: guide the rod end"
    common = {"rod": 0.02, "stroke": 0.3, "closed_length": 0.4}
    assert longest_stroke(**common, mounting="mid trunnion", rod_end="free", push=100.0) == refused
    nothing = longest_stroke(**common, mounting="foot", rod_end="free", push=0.0)
    assert nothing == Refusal("nothing pushes on the rod")
    hopeless = longest_stroke(**common, mounting="foot", rod_end="free", push=1e5)
    assert str(hopeless) == "no stroke keeps a buckling safety of 4 with this rod"


def test_unknown_words_are_refused_with_the_known_ones() -> None:
    with pytest.raises(InputError, match=r'mounting: "side" given; one of foot, front flange'):
        default_closed_length("side", 0.05, 0.4)
    with pytest.raises(InputError, match=r'rod_end: "loose" given; one of fixed-guided, hinged-guided, free'):
        end_factor("foot", "loose")
