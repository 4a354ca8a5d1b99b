"""The worst-case pair: its corners, and that it lies around the nominal."""

from __future__ import annotations

import itertools
from dataclasses import replace
from typing import get_args

import pytest

from actuator.errors import Refusal
from actuator.parts import Actuator, Machine, Site, Spread
from actuator.results import WorstPair
from actuator.scatter.hazards import hazards
from actuator.scatter.pair import Way, Which, corner, masses, worst_pair
from actuator.scatter.vary import Deviation, varied
from actuator.stroke.result import StrokeResult
from actuator.stroke.simulate import simulate
from tests.agreement.cases import CASES, Case, base_case

PART = {case.name: case for case in CASES}
NONE = Spread(supply_pressure=0.0, friction=0.0, mass=0.0, conductance=0.0, delay=0.0)
MONOTONE = (
    "base",
    "loaded",
    "meter-in",
    "meter-out, unequal needles",
    "lifting, meter-out",
    "lowering, meter-out",
    "down a ramp",
    "pressing at the end",
    "pushed",
    "index 1.2",
)
"""Cylinders that fill and empty in their cycle, so that each field acts one way on what the pair is for."""
PLAIN = ("base", "loaded", "meter-in", "pressing at the end", "index 1.2")
"""Those that do not swing against the air in front of the piston: there the corners are the worst to a thousandth.
Else a lower pressure, or more friction, can catch the swing where it is fastest, and be some percent harder."""


def cycle(actuator: Actuator, machine: Machine, site: Site) -> StrokeResult | Refusal:
    return simulate(actuator, machine, site, ledger=False)


def pair_of(case: Case, spread: Spread | None = None) -> WorstPair:
    part = case.actuator if spread is None else replace(case.actuator, spread=spread)
    return worst_pair(part, case.machine, case.site, cycle)


@pytest.mark.parametrize("way", get_args(Way))
@pytest.mark.parametrize("name", MONOTONE)
def test_the_nominal_lies_between_slow_and_hard(name: str, way: Way) -> None:
    case = PART[name]
    nominal = cycle(case.actuator, case.machine, case.site)
    found = pair_of(case)
    half, slow, hard = (getattr(item, way) for item in (nominal, found.slow, found.hard))
    assert slow.stroke_time > half.stroke_time > hard.stroke_time
    assert slow.reaction_time > half.reaction_time > hard.reaction_time
    assert slow.force_at_end < half.force_at_end < hard.force_at_end
    assert slow.mean_speed < half.mean_speed < hard.mean_speed
    assert hard.end_energy > half.end_energy


@pytest.mark.parametrize("way", get_args(Way))
@pytest.mark.parametrize("name", MONOTONE)
def test_no_other_corner_is_slower_or_harder(name: str, way: Way) -> None:
    """All 64 corners of pressure, friction, mass, conductance and delay, with the load at either end."""
    case = PART[name]
    spread, found = case.actuator.spread, pair_of(case)
    slow, hard = getattr(found.slow, way), getattr(found.hard, way)
    for p, friction, mass, load, c, delay in itertools.product((-1.0, 1.0), repeat=6):
        by = Deviation(
            supply_pressure=p * spread.supply_pressure,
            friction=friction * spread.friction,
            mass=mass * spread.mass,
            opposing=load * spread.mass,
            constant=load * spread.mass,
            conductance=c * spread.conductance,
            delay=delay * spread.delay,
        )
        parts = varied(case.actuator, case.machine, case.site, by)
        assert not isinstance(parts, Refusal)
        stroke = simulate(*parts, case.site, ledger=False, quick=True)
        assert not isinstance(stroke, Refusal)
        half = getattr(stroke, way)
        assert half.stroke_time <= slow.stroke_time * (1.001 if name in PLAIN else 1.015)
        assert half.end_energy <= hard.end_energy * (1.002 if name in PLAIN else 1.1)


def test_the_corners_are_those_of_the_document() -> None:
    """Lowest pressure, most friction and load, least flow, longest delay; the contrary for the hard one."""
    case = PART["loaded"]
    spread = Spread(supply_pressure=5e4, friction=0.2, mass=0.1, conductance=0.15, delay=0.5)
    part = replace(case.actuator, spread=spread)
    parts = varied(part, case.machine, case.site, corner(part, "slow", "extend", 0.1))
    assert not isinstance(parts, Refusal)
    slow, machine = parts
    assert machine.supply_pressure == pytest.approx(case.machine.supply_pressure - 5e4)
    assert slow.friction.breakaway == pytest.approx(1.2 * part.friction.breakaway)
    assert slow.friction.coulomb == pytest.approx(1.2 * part.friction.coulomb)
    assert slow.friction.viscous == pytest.approx(1.2 * part.friction.viscous)
    assert slow.friction.stribeck_speed == part.friction.stribeck_speed
    assert slow.load.guide_friction == pytest.approx(1.2 * part.load.guide_friction)
    assert slow.load.mass == pytest.approx(1.1 * part.load.mass)
    assert slow.load.extend_force == pytest.approx(1.1 * part.load.extend_force)
    assert slow.load.retract_force == pytest.approx(1.1 * part.load.retract_force)
    assert slow.valve.supply_c == pytest.approx(0.85 * part.valve.supply_c)
    assert slow.valve.exhaust_c == pytest.approx(0.85 * part.valve.exhaust_c)
    assert slow.valve.delay == pytest.approx(1.5 * part.valve.delay)
    hard = corner(part, "hard", "extend", -0.1)
    assert hard == Deviation(
        supply_pressure=5e4, friction=-0.2, mass=-0.1, opposing=-0.1, constant=-0.1, conductance=0.15, delay=-0.5
    )


def test_needles_and_check_valves_move_with_the_valve() -> None:
    part = PART["meter-out, unequal needles"].actuator
    parts = varied(part, PART["base"].machine, PART["base"].site, Deviation(conductance=0.1))
    assert not isinstance(parts, Refusal)
    for name in ("extend_c", "retract_c", "free_c"):
        assert getattr(parts[0].throttle, name) == pytest.approx(1.1 * getattr(part.throttle, name))


def test_a_return_pressure_moves_in_proportion() -> None:
    case = PART["weaker return"]
    parts = varied(case.actuator, case.machine, case.site, Deviation(supply_pressure=-3e4))
    assert not isinstance(parts, Refusal)
    assert case.actuator.return_pressure is not None
    ambient = case.site.ambient_pressure
    share = (parts[1].supply_pressure - ambient) / (case.machine.supply_pressure - ambient)
    assert parts[0].return_pressure == pytest.approx(ambient + share * (case.actuator.return_pressure - ambient))


@pytest.mark.parametrize(
    ("slope", "which", "way", "both"),
    [
        (90.0, "slow", "extend", False),
        (90.0, "slow", "retract", True),
        (-90.0, "slow", "extend", True),
        (0.0, "slow", "extend", False),
        (0.0, "hard", "extend", True),
        (90.0, "hard", "retract", True),
    ],
)
def test_the_mass_is_taken_at_both_ends_where_either_may_be_the_worst(
    slope: float, which: Which, way: Way, both: bool
) -> None:
    assert masses(base_case("any", slope=slope).actuator, which, way) == ((0.1, -0.1) if both else (0.1,))


def test_a_load_that_falls_is_hardest_where_it_is_heaviest() -> None:
    case = PART["lowering, meter-out"]
    found = pair_of(case)
    assert found.hard.mass_extend == pytest.approx(1.1 * case.actuator.load.mass)
    assert found.slow.mass_retract == pytest.approx(1.1 * case.actuator.load.mass)


@pytest.mark.parametrize("force", [300.0, -300.0])
def test_a_constant_force_is_worst_at_one_end_for_one_way_and_at_the_other_for_the_other(force: float) -> None:
    part = base_case("pushed", load={"constant_force": force}).actuator
    helped, opposed = ("extend", "retract") if force > 0.0 else ("retract", "extend")
    ways: dict[str, Way] = {"extend": "extend", "retract": "retract"}
    assert corner(part, "hard", ways[helped], 0.0).constant == pytest.approx(0.1)
    assert corner(part, "hard", ways[opposed], 0.0).constant == pytest.approx(-0.1)
    assert corner(part, "slow", ways[helped], 0.0).constant == pytest.approx(-0.1)
    assert corner(part, "slow", ways[opposed], 0.0).constant == pytest.approx(0.1)


@pytest.mark.parametrize("name", ["base", "lifting, meter-out"])
def test_without_a_spread_both_are_the_nominal(name: str) -> None:
    case = PART[name]
    calls = []

    def counted(actuator: Actuator, machine: Machine, site: Site) -> StrokeResult | Refusal:
        calls.append(actuator)
        return cycle(actuator, machine, site)

    part = replace(case.actuator, spread=NONE)
    found = worst_pair(part, case.machine, case.site, counted)
    nominal = cycle(part, case.machine, case.site)
    assert len(calls) == 1
    assert not isinstance(nominal, Refusal)
    for half in (found.slow.extend, found.hard.extend):
        assert not isinstance(half, Refusal)
        assert half.stroke_time == nominal.extend.stroke_time
        assert half.end_energy == nominal.extend.end_energy
    assert found.slow.mass_extend == part.load.mass


def test_a_supply_that_may_fall_to_ambient_refuses_the_slow_one_alone() -> None:
    case = PART["low pressure"]
    found = pair_of(case, Spread(supply_pressure=1.6e5))
    assert isinstance(found.slow.extend, Refusal)
    assert found.slow.extend.reason == "a supply that lies 1.6 bar low is not above the ambient pressure"
    assert isinstance(found.slow.force_reserve_extend, Refusal)
    assert isinstance(found.slow.air_drawn, Refusal)
    assert not isinstance(found.hard.extend, Refusal)


def test_force_reserve_is_least_when_slow_and_buckling_safety_when_hard() -> None:
    """By hand: A = π/4·(50 mm)²; slow 6.7 - 1 bar, running friction 78 N, opposing 440 N and 0.1·1.3·1.1·20 kg·g."""
    found = pair_of(PART["loaded"])
    area, weight = 1.9634954e-3, 20.0 * 9.80665
    push, load = 5.7e5 * area, 440.0 + 0.1 * 1.3 * 1.1 * weight
    assert found.slow.force_reserve_extend == pytest.approx((push - 78.0 - load) / load, rel=1e-6)
    assert isinstance(found.slow.buckling_safety, float)
    assert found.hard.buckling_safety == pytest.approx(found.slow.buckling_safety * 5.7 / 6.3, rel=1e-9)


def test_cautions_name_the_energy_of_the_hard_one_and_a_slow_one_that_does_not_arrive() -> None:
    case = PART["just time enough"]
    nominal, found = cycle(case.actuator, case.machine, case.site), pair_of(case)
    assert not isinstance(found.hard.extend, Refusal)
    cautions = {item.path: item.text for item in hazards(nominal, found)}
    assert f"with {found.hard.extend.end_energy:.3g} J, where the nominal" in cautions["worst.hard.extend.end_energy"]
    strained = base_case("strained", load={"extend_force": 1000.0})
    nominal, found = cycle(strained.actuator, strained.machine, strained.site), pair_of(strained)
    assert (
        "does not arrive before it is sent back"
        in {item.path: item.text for item in hazards(nominal, found)}["worst.slow.extend.position_reached"]
    )
    assert hazards(nominal, Refusal("not asked for")) == ()
