"""Cylinders that have to behave alike because their equations are the same up to scale (T9)."""

from __future__ import annotations

import math
from dataclasses import replace

import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from actuator.parts import Actuator
from tests.agreement.cases import Case
from tests.agreement.project_side import halves, number
from tests.conservation.support import MANY, Solved, solved
from tests.strategies import cylinders

ITEMS = ("supplied", "load", "friction", "stop", "supply_path", "exhaust_path", "heat", "exhaust", "mixing")
SAME = 1e-5
"""Two runs step differently; this is far below what the model is promised to keep. [1]"""


def _forces_times(part: Actuator, factor: float) -> Actuator:
    """Every force, friction included, times ``factor``; so is the mass."""
    load, friction = part.load, part.friction
    return replace(
        part,
        load=replace(
            load,
            mass=load.mass * factor,
            extend_force=load.extend_force * factor,
            retract_force=load.retract_force * factor,
            constant_force=load.constant_force * factor,
            process_force=tuple(replace(zone, force=zone.force * factor) for zone in load.process_force),
        ),
        friction=replace(
            friction,
            breakaway=friction.breakaway * factor,
            coulomb=friction.coulomb * factor,
            viscous=friction.viscous * factor,
        ),
    )


def _conductances_times(part: Actuator, factor: float) -> Actuator:
    valve, throttle = part.valve, part.throttle
    if throttle.kind != "none":
        assert throttle.extend_c is not None
        assert throttle.retract_c is not None
        assert throttle.free_c is not None
        throttle = replace(
            throttle,
            extend_c=throttle.extend_c * factor,
            retract_c=throttle.retract_c * factor,
            free_c=throttle.free_c * factor,
        )
    valve = replace(valve, supply_c=valve.supply_c * factor, exhaust_c=valve.exhaust_c * factor)
    return replace(part, valve=valve, throttle=throttle)


def _walls_times(part: Actuator, factor: float) -> Actuator:
    if part.wall_heat_transfer is None:
        return part
    return replace(part, wall_heat_transfer=part.wall_heat_transfer * factor)


def _alike(one: Solved, other: Solved, *, energy: float, air: float, time: float, speed: float) -> None:
    """Check that ``other`` is ``one`` with its quantities scaled."""
    assert other.result.periodic == one.result.periodic
    scale = abs(one.ledger.supplied) + 1e-6
    for item in ITEMS:
        assert getattr(other.ledger, item) == pytest.approx(
            energy * getattr(one.ledger, item), abs=energy * SAME * scale
        ), item
    assert other.balances.drawn == pytest.approx(air * one.balances.drawn, rel=SAME, abs=1e-12)
    for direction, half in halves(one.result).items():
        twin = halves(other.result)[direction]
        assert twin.completed == half.completed
        if half.completed:
            assert number(twin.stroke_time) == pytest.approx(time * number(half.stroke_time), rel=SAME)
            assert number(twin.end_speed) == pytest.approx(speed * number(half.end_speed), rel=1e2 * SAME)


def _settles_well(found: Solved) -> bool:
    """Periodic, moving, and drawing air: where a change in the last digit cannot grow."""
    r = found.result
    moves = r.extend.completed and r.retract.completed
    return r.periodic and r.cycles <= 12 and moves


@MANY
@given(cylinders(), st.sampled_from((0.5, 2.0, 3.0)))
def test_all_pressures_forces_and_masses_scaled(case: Case, factor: float) -> None:
    """Same motion at any level of pressure: flow, pressure and force are linear in it."""
    one = solved(case)
    assume(_settles_well(one))
    part = _walls_times(_forces_times(case.actuator, factor), factor)
    back = part.return_pressure
    part = replace(part, return_pressure=None if back is None else back * factor)
    machine = replace(case.machine, supply_pressure=case.machine.supply_pressure * factor)
    site = replace(case.site, ambient_pressure=case.site.ambient_pressure * factor)
    other = solved(Case("scaled", part, machine, site))
    _alike(one, other, energy=factor, air=factor, time=1.0, speed=1.0)


@MANY
@given(cylinders(), st.sampled_from((0.8, 1.25)))
def test_all_temperatures_scaled(case: Case, factor: float) -> None:
    """Hotter air flows faster by the root of the temperature: time runs faster, speeds rise, energy stays."""
    level = replace(case.actuator.load, inclination=0.0, guide_friction=0.0)
    case = replace(case, actuator=replace(case.actuator, load=level))
    one = solved(case)
    assume(_settles_well(one))
    quick = math.sqrt(factor)
    part, load, friction, valve = (
        case.actuator,
        case.actuator.load,
        case.actuator.friction,
        case.actuator.valve,
    )
    part = replace(
        _walls_times(part, 1.0 / quick),
        extend_at=part.extend_at / quick,
        retract_at=part.retract_at / quick,
        load=replace(load, mass=load.mass / factor),
        friction=replace(friction, viscous=friction.viscous / quick, stribeck_speed=friction.stribeck_speed * quick),
        valve=replace(valve, delay=valve.delay / quick, opening_time=valve.opening_time / quick),
    )
    machine = replace(
        case.machine,
        supply_temperature=case.machine.supply_temperature * factor,
        cycle_time=case.machine.cycle_time / quick,
    )
    site = replace(case.site, ambient_temperature=case.site.ambient_temperature * factor)
    other = solved(Case("hot", part, machine, site))
    _alike(one, other, energy=1.0, air=1.0 / factor, time=1.0 / quick, speed=quick)


@MANY
@given(cylinders())
def test_two_in_parallel_on_a_doubled_load_are_one(case: Case) -> None:
    """Without wall heat transfer, whose area grows with the bore and not with the piston's area."""
    if case.actuator.wall_heat_transfer is not None:
        case = replace(case, actuator=replace(case.actuator, wall_heat_transfer=0.0))
    one = solved(case)
    assume(_settles_well(one))
    part = _conductances_times(_forces_times(case.actuator, 2.0), 2.0)
    part = replace(
        part,
        bore=part.bore * math.sqrt(2.0),
        rod=part.rod * math.sqrt(2.0),
        dead_volume_cap=2.0 * part.dead_volume_cap,
        dead_volume_rod=2.0 * part.dead_volume_rod,
    )
    other = solved(replace(case, actuator=part))
    _alike(one, other, energy=2.0, air=2.0, time=1.0, speed=1.0)


@pytest.mark.parametrize("factor", [0.25, 0.5])
@given(cylinders())
@MANY
def test_one_more_turn_of_the_clock_changes_nothing(factor: float, case: Case) -> None:
    """Both commands moved by the same part of the period: the same cycle, entered elsewhere."""
    one = solved(case)
    assume(_settles_well(one))
    period = case.machine.cycle_time
    part = replace(
        case.actuator,
        extend_at=(case.actuator.extend_at + factor * period) % period,
        retract_at=(case.actuator.retract_at + factor * period) % period,
    )
    other = solved(replace(case, actuator=part))
    _alike(one, other, energy=1.0, air=1.0, time=1.0, speed=1.0)
