"""Springs, through rods and cylinders in parallel: the ledger closes, and equal equations give equal cylinders."""

from __future__ import annotations

import math
from dataclasses import replace
from typing import Any

import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from actuator.parts import Actuator, Spring
from actuator.parts.actuator import ActuatorKind, acting_needles
from tests.agreement.cases import Case, case
from tests.agreement.project_side import halves, number
from tests.conservation.support import MANY, Solved, solved
from tests.strategies import cylinders

EXACT, CLOSES, SAME = 1e-12, 1e-6, 1e-5
ITEMS = ("supplied", "load", "friction", "stop", "supply_path", "exhaust_path", "heat", "exhaust", "mixing")


@st.composite
def single_acting(draw: st.DrawFn) -> Case:
    """A random cylinder with a spring of up to half of its push in place of one side's air."""
    found = draw(cylinders())
    part = found.actuator
    push = (found.machine.supply_pressure - found.site.ambient_pressure) * part.area_rod
    kind: ActuatorKind = draw(st.sampled_from(("spring-return", "spring-extend")))
    preload, more = (push * draw(st.integers(5, 25)) / 100 for _ in range(2))
    acting = acting_needles(kind, part.throttle.kind)
    throttle = part.throttle
    if throttle.kind != "none":
        throttle = replace(
            throttle,
            extend_c=throttle.extend_c if "extend_c" in acting else None,
            retract_c=throttle.retract_c if "retract_c" in acting else None,
        )
    part = replace(
        part,
        kind=kind,
        spring=Spring(preload=preload, rate=more / part.stroke),
        valve=replace(part.valve, function="3/2"),
        throttle=throttle,
        return_pressure=None,
        load=replace(part.load, inclination=0.0, process_force=(), extend_force=0.0, retract_force=0.0),
    )
    return replace(found, actuator=part)


@MANY
@given(single_acting())
def test_the_ledger_closes_with_a_spring(case: Case) -> None:
    items = solved(case).ledger
    scale = abs(items.supplied) + abs(items.exhaust) + abs(items.load) + 1e-3
    assert items.residual == pytest.approx(items.stored_change, abs=CLOSES * scale)


@MANY
@given(single_acting())
def test_piston_work_is_load_friction_impact_and_what_the_spring_keeps(case: Case) -> None:
    found = solved(case)
    b, items = found.balances, found.ledger
    used = items.load + items.friction + items.stop
    assert b.piston_work == pytest.approx(used + b.mechanical_change, abs=1e-6 * found.scale)


@MANY
@given(single_acting())
def test_only_the_side_that_takes_air_has_a_balance(case: Case) -> None:
    found = solved(case)
    r, b = found.result, found.balances
    air, open_side = (0, 1) if case.actuator.kind == "spring-return" else (1, 0)
    gained = b.enthalpy_in[air] - b.enthalpy_out[air] - b.work[air] + b.heat[air]
    assert gained == pytest.approx(b.energy_change[air], abs=EXACT * found.scale)
    assert (b.mass_in[open_side], b.mass_out[open_side], b.heat[open_side]) == (0.0, 0.0, 0.0)
    vented = r.p_rod if open_side else r.p_cap
    assert set(vented.tolist()) == {case.site.ambient_pressure}
    driven_by_spring = r.retract if open_side else r.extend
    assert (driven_by_spring.air_drawn, driven_by_spring.peak_flow) == (0.0, 0.0)


def test_a_spring_stores_on_the_way_out_what_it_gives_on_the_way_back() -> None:
    """Sent back early, the cycle starts with the piston halfway: 60 N and 0.5 N/mm over the way."""
    times: dict[str, Any] = {"extend_at": 0.05, "retract_at": 0.2, "period": 0.3}
    turned = case("turned", 32, 12, 100, 6.0, c=0.5, kind="spring-return", coil=(0.5, 60.0), **times)
    found = solved(turned)
    way = found.result.position[-1] - found.result.position[0]
    assert abs(way) < 1e-6
    assert found.ledger.residual == pytest.approx(found.ledger.stored_change, abs=1e-6 * found.ledger.supplied)


def _load_times(part: Actuator, factor: float) -> Actuator:
    """Mass and all forces of the load times ``factor``; friction stays that of one cylinder."""
    load = part.load
    forces = {
        name: factor * getattr(load, name) for name in ("mass", "extend_force", "retract_force", "constant_force")
    }
    zones = tuple(replace(zone, force=zone.force * factor) for zone in load.process_force)
    return replace(part, load=replace(load, process_force=zones, **forces))


def _alike(one: Solved, other: Solved, factor: float) -> None:
    """Same motion, energies and air times ``factor``."""
    scale = abs(one.ledger.supplied) + 1e-6
    for item in ITEMS:
        wanted = factor * getattr(one.ledger, item)
        assert getattr(other.ledger, item) == pytest.approx(wanted, abs=factor * SAME * scale), item
    assert other.balances.drawn == pytest.approx(factor * one.balances.drawn, rel=SAME, abs=1e-12)
    for direction, half in halves(one.result).items():
        twin = halves(other.result)[direction]
        assert twin.completed == half.completed
        assert twin.air_drawn == pytest.approx(factor * half.air_drawn, rel=SAME, abs=1e-5 * one.balances.drawn)
        if half.completed:
            assert number(twin.stroke_time) == pytest.approx(number(half.stroke_time), rel=SAME)
            assert number(twin.end_speed) == pytest.approx(number(half.end_speed), rel=1e2 * SAME)
            # friction and spring of all of them stand in this force
            if isinstance(half.force_at_end, float):
                assert number(twin.force_at_end) == pytest.approx(factor * half.force_at_end, rel=1e-4, abs=1e-3)


def _settles_well(found: Solved) -> bool:
    r = found.result
    return r.periodic and r.cycles <= 12 and r.extend.completed and r.retract.completed


@MANY
@given(st.one_of(cylinders(), single_acting()), st.sampled_from((2, 3, 5)))
def test_several_in_parallel_on_as_many_loads_move_like_one(case: Case, count: int) -> None:
    """Walls, volumes, valves, friction and spring of each are there as often as the cylinders are."""
    one = solved(case)
    assume(_settles_well(one))
    part = replace(_load_times(case.actuator, float(count)), count=count)
    _alike(one, solved(replace(case, actuator=part)), float(count))


def _doubled(conductance: float | None) -> float | None:
    return None if conductance is None else 2.0 * conductance


@MANY
@given(cylinders())
def test_two_in_parallel_are_one_of_doubled_areas(case: Case) -> None:
    """Without wall heat transfer, whose area grows with the bore and not with the piston's area."""
    part = case.actuator
    if part.wall_heat_transfer is not None:
        part = replace(part, wall_heat_transfer=0.0)
    pair = solved(replace(case, actuator=replace(part, count=2)))
    assume(_settles_well(pair))
    friction, valve, throttle = part.friction, part.valve, part.throttle
    large = replace(
        part,
        bore=part.bore * math.sqrt(2.0),
        rod=part.rod * math.sqrt(2.0),
        dead_volume_cap=2.0 * part.dead_volume_cap,
        dead_volume_rod=2.0 * part.dead_volume_rod,
        friction=replace(
            friction,
            breakaway=2.0 * friction.breakaway,
            coulomb=2.0 * friction.coulomb,
            viscous=2.0 * friction.viscous,
        ),
        valve=replace(valve, supply_c=2.0 * valve.supply_c, exhaust_c=2.0 * valve.exhaust_c),
        throttle=replace(
            throttle,
            extend_c=_doubled(throttle.extend_c),
            retract_c=_doubled(throttle.retract_c),
            free_c=_doubled(throttle.free_c),
        ),
    )
    _alike(pair, solved(replace(case, actuator=large)), 1.0)


@pytest.mark.parametrize("slope", [0.0, 60.0])
@pytest.mark.parametrize(("kind", "rod"), [("through-rod", 20), ("rodless", 0)])
def test_a_cylinder_of_equal_areas_extends_as_it_retracts(kind: str, rod: float, slope: float) -> None:
    def turned(tilt: float, dead: tuple[float, float], needles: tuple[float, float], start: float) -> Solved:
        times: dict[str, Any] = {"extend_at": start, "retract_at": (start + 1.5) % 3.0}
        return solved(
            case(
                "side", 50, rod, 300, 15.0, c=2.0, period=3.0, slope=tilt, dead=dead, kind=kind,
                throttle=("meter-out", *needles, 3.0), **times,
            )
        )  # fmt: skip

    one, other = turned(slope, (15.0, 30.0), (1.0, 0.6), 0.0), turned(-slope, (30.0, 15.0), (0.6, 1.0), 1.5)
    for item in ITEMS:
        wanted = getattr(one.ledger, item)
        assert getattr(other.ledger, item) == pytest.approx(wanted, abs=SAME * one.ledger.supplied), item
    for out, back in (("extend", "retract"), ("retract", "extend")):
        half, twin = halves(one.result)[out], halves(other.result)[back]
        for figure in ("reaction_time", "stroke_time", "end_speed", "mean_speed", "end_energy", "force_at_end"):
            assert number(getattr(twin, figure)) == pytest.approx(number(getattr(half, figure)), rel=SAME), figure
        assert twin.air_drawn == pytest.approx(half.air_drawn, rel=SAME)
        assert twin.position_reached == pytest.approx(0.3 - half.position_reached, abs=1e-9)


def test_without_a_rod_it_is_the_cylinder_whose_rod_is_a_thread() -> None:
    thin, none = (
        solved(case("side", 40, rod, 500, 12.0, c=1.5, period=4.0, kind=kind, load={"extend_force": 80.0}))
        for rod, kind in ((0.001, "double-acting"), (0.0, "rodless"))
    )
    _alike(thin, none, 1.0)


def test_a_through_rod_is_the_rodless_cylinder_of_its_annulus() -> None:
    """Without wall heat transfer: bore 50 and rod 30 leave the area of a bore of 40."""
    given: dict[str, Any] = {"c": 1.5, "h": 0.0, "dead": 20.0, "friction": (50.0, 40.0, 20.0), "period": 4.0}
    through = solved(case("side", 50, 30, 400, 12.0, kind="through-rod", **given))
    without = solved(case("side", 40, 0, 400, 12.0, kind="rodless", **given))
    _alike(through, without, 1.0)
