"""Loss of supply and signal for springs, for equal areas, and for several cylinders in parallel."""

from __future__ import annotations

import math
from dataclasses import replace

import pytest

from actuator.holding.held import Held, holding
from actuator.parts import Actuator, Holding
from actuator.parts.spring import Spring
from actuator.stroke.rows import flow_paths, parameters
from tests.agreement.cases import Case, case
from tests.limits.test_holding import NO_STROKE, found, lift

RATE, PRELOAD, STROKE, MASS = 2000.0, 50.0, 0.05, 3.0


def losses(part: Actuator, given_case: Case) -> dict[tuple[str, str], Held]:
    """All six losses of an actuator in the case's machine."""
    par = parameters(part, given_case.machine, given_case.site, flow_paths(part))
    return {(item.case, item.start): item for item in holding(part, NO_STROKE, par)}


def sprung(kind: str, *, pilot_check: bool = False) -> dict[tuple[str, str], Held]:
    """A single-acting cylinder without friction: 2 N/mm, 50 N, 50 mm, 3 kg."""
    given_case = case("sprung", 40, 16, 50, MASS, c=1.0, friction=(0.0, 0.0, 0.0))
    part = given_case.actuator
    single = replace(
        part,
        kind="spring-return" if kind == "spring-return" else "spring-extend",
        spring=Spring(rate=RATE, preload=PRELOAD),
        valve=replace(part.valve, function="3/2"),
        holding=Holding(pilot_check=pilot_check),
    )
    return losses(single, given_case)


@pytest.mark.parametrize(("kind", "far", "near"), [
    ("spring-return", "extended", "retracted"),
    ("spring-extend", "retracted", "extended"),
])  # fmt: skip
def test_a_spring_without_air_throws_the_mass_as_a_spring_does(kind: str, far: str, near: str) -> None:
    """½·M·v² = F0·S + ½·k·S²; way (F/k)·(1 − cos ωt) with F = F0 + k·S."""
    items = sprung(kind)
    for case_ in ("supply lost", "both lost"):
        item = items[case_, far]
        assert (item.cap, item.rod, item.holds) == ("open", "open", False)
        energy = PRELOAD * STROKE + 0.5 * RATE * STROKE**2
        assert item.end_energy == pytest.approx(energy, rel=2e-5)
        largest = PRELOAD + RATE * STROKE
        time = math.acos(1.0 - RATE * STROKE / largest) / math.sqrt(RATE / MASS)
        assert item.time == pytest.approx(time, rel=2e-5)
        assert items[case_, near].by == "pressed to its end"
    # a lost signal vents the port: that is the ordinary stroke of the spring
    assert items["signal lost", far].time == NO_STROKE
    assert items["signal lost", near].holds


def test_a_check_valve_at_the_port_keeps_a_spring_compressed_until_the_signal_goes() -> None:
    items = sprung("spring-return", pilot_check=True)
    assert (items["supply lost", "extended"].cap, items["supply lost", "extended"].by) == ("checked", "closed-in air")
    assert items["both lost", "extended"].holds
    assert not items["signal lost", "extended"].holds


@pytest.mark.parametrize("kind", ["through-rod", "rodless"])
def test_equal_areas_feel_no_common_pressure(kind: str) -> None:
    given_case = case("level", 50, 20, 200, 5.0, c=2.0)
    part = given_case.actuator
    equal = replace(
        part,
        kind="rodless" if kind == "rodless" else "through-rod",
        rod=0.0 if kind == "rodless" else part.rod,
        valve=replace(part.valve, function="5/3 pressurised"),
    )
    for end in ("extended", "retracted"):
        item = losses(equal, given_case)["signal lost", end]
        assert (item.holds, item.by) == (True, "nothing pushes it")
        assert item.drive == pytest.approx(0.0, abs=1e-9)


def test_two_in_parallel_on_twice_the_load_are_one() -> None:
    one = lift()
    part = one.actuator
    two = replace(part, count=2, load=replace(part.load, mass=2.0 * part.load.mass))
    for function in ("5/3 closed", "5/3 exhausted"):
        how = {"seal_leak_c": 1e-12, "rod_lock": 100.0}
        single = found(one, function, **how)
        both = replace(
            two,
            valve=replace(part.valve, function="5/3 closed" if function == "5/3 closed" else "5/3 exhausted"),
            holding=Holding(seal_leak_c=1e-12, rod_lock=100.0),
        )
        for key, item in losses(both, one).items():
            other = single[key]
            assert (item.holds, item.by, item.direction) == (other.holds, other.by, other.direction)
            assert item.drive == pytest.approx(2.0 * other.drive)
            assert item.trapped == pytest.approx(2.0 * other.trapped)
            if isinstance(item.time, float):
                assert item.time == pytest.approx(other.time)
            if isinstance(item.starts_after, float):
                assert item.starts_after == pytest.approx(other.starts_after)
