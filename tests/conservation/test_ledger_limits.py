"""Where each item of the ledger has to go when one property goes to its limit (T7, T8)."""

from __future__ import annotations

import math

import pytest

from tests.agreement.cases import base_case, case
from tests.conservation.support import R_AIR, solved

T0 = 293.15


def test_without_heat_transfer_no_heat_is_lost() -> None:
    assert solved(base_case("adiabatic", h=0.0)).ledger.heat == 0.0


def test_with_heat_transfer_without_bound_nothing_is_lost_by_mixing_or_by_warmth() -> None:
    """The air takes the temperature of the walls at once; the heat film's own loss vanishes as 1/h."""
    mild, strong = solved(base_case("h 60")), solved(base_case("h 1e6", h=1e6))
    assert strong.ledger.mixing < 1e-4 * mild.ledger.mixing
    assert strong.ledger.heat < 1e-2 * mild.ledger.heat
    lost = T0 * strong.balances.entropy_produced
    booked = strong.ledger.supply_path + strong.balances.exhaust_side + strong.ledger.heat
    assert lost == pytest.approx(booked, abs=1e-6 * strong.ledger.supplied)  # no warmth is vented
    middle = solved(base_case("h 1e5", h=1e5))
    assert middle.ledger.heat / strong.ledger.heat == pytest.approx(10.0, rel=0.05)


def test_a_large_exhaust_valve_takes_away_what_the_piston_pays_and_not_what_is_vented_unused() -> None:
    items = [solved(base_case("exhaust", exhaust_c=c)).ledger for c in (2.0, 10.0, 40.0, 200.0)]
    paid = [item.exhaust_path for item in items]
    assert paid == sorted(paid, reverse=True)
    assert paid[-1] < 1e-3 * paid[0]
    assert items[-1].exhaust > 0.9 * items[0].exhaust


def test_a_large_supply_valve_takes_away_the_throttling_while_moving_and_not_the_filling() -> None:
    items = [solved(base_case("supply", c=c, exhaust_c=2.0)).ledger for c in (2.0, 10.0, 40.0, 100.0)]
    moving = [item.supply_path - item.filling - item.mixing for item in items]
    assert moving == sorted(moving, reverse=True)
    assert moving[-1] < 5e-3 * moving[0]
    assert items[-1].filling > 0.99 * items[-2].filling


UNUSED = [(5.0, 50.3), (6.0, 53.5), (7.0, 56.0), (8.0, 57.9)]
"""Share of the supplied exergy that a full-pressure stroke leaves unused [%] at bar absolute into 1 bar.

1 − (p − p0)/(p·ln(p/p0)) of an isothermal stroke at constant pressure; worked out from the formula, no
publication.
"""


@pytest.mark.parametrize(("p", "printed"), UNUSED)
def test_one_slow_stroke_against_all_its_force_leaves_the_known_share_unused(p: float, printed: float) -> None:
    """No friction, hardly any dead volume, walls that keep the air at T0; the load is 99.95 % of the push."""
    push = (p - 1.0) * 1e5 * math.pi / 4 * 0.05**2
    slow = case(
        "slow", 50, 20, 400, 200.0, c=2.0, supply=p, period=400.0, friction=(0.0, 0.0, 0.0), dead=0.1,
        delay=0.0, opening=0.0, h=1e5, load={"extend_force": 0.9995 * push},
    )  # fmt: skip
    found = solved(slow)
    assert found.result.extend.completed
    assert found.result.extend.peak_speed < 0.05
    supplied = found.result.extend.air_drawn * R_AIR * T0 * math.log(p)
    assert 100.0 * (1.0 - found.ledger.load / supplied) == pytest.approx(printed, abs=0.1)


def test_lift_is_weight_times_way_and_nothing_over_a_cycle() -> None:
    """20 kg over 0.4 m straight up: 78.45 J each way."""
    items = solved(base_case("lifting", slope=90.0)).ledger
    assert items.lift_extend == pytest.approx(20.0 * 9.80665 * 0.4, rel=1e-6)
    assert items.lift_retract == pytest.approx(-items.lift_extend, rel=1e-6)
    assert items.load == 0.0


def test_a_constant_force_gives_back_on_one_way_what_it_takes_on_the_other() -> None:
    items = solved(base_case("pushed", load={"constant_force": 200.0})).ledger
    assert items.load == pytest.approx(0.0, abs=1e-9 * items.supplied)


def test_forces_that_oppose_take_their_work_on_both_ways() -> None:
    """400 N and 100 N over 0.4 m, and 300 N over the last 0.1 m."""
    load = {"extend_force": 400.0, "retract_force": 100.0}
    items = solved(base_case("both", load=load, process=((300.0, 400.0, 300.0),))).ledger
    assert items.load == pytest.approx(160.0 + 40.0 + 30.0, rel=1e-6)


def test_dead_volume_is_the_exergy_that_filling_and_venting_it_costs() -> None:
    """Two of 200 cm³ from 1 to 7 bar: ΣV·Δp·ln 7 = 467.0 J, a figure to read beside the ledger."""
    items = solved(base_case("dead", dead=200.0)).ledger
    assert items.dead_volume == pytest.approx(400e-6 * 6e5 * math.log(7.0), rel=1e-3)
