"""Cylinders of every kind where the answer is known by hand: balance of spring and air, areas, bores, air."""

from __future__ import annotations

import math
import re
from dataclasses import replace
from typing import Any

import pytest

from actuator.analysis import air_of
from actuator.energy.indicator import Indicator, ideal_indicator
from actuator.errors import InputError, Refusal
from actuator.parts import Actuator, Machine, Require, Site, Spring
from actuator.statics import largest_push, rod_column, static_forces
from actuator.stroke.result import StrokeResult
from tests.agreement.cases import Case, case
from tests.agreement.project_side import number, project_result

AREA = math.pi / 4 * 0.04**2
ANNULUS = math.pi / 4 * (0.04**2 - 0.016**2)
DRY_ANR = 1.1703
"""Dry air in a cubic metre ANR. [kg]"""


def _sprung(kind: str = "spring-return", coil: tuple[float, float] = (1.0, 40.0), **given: Any) -> Case:
    """Bore 40, rod 16, stroke 100 mm, friction 20 N without any breakaway of its own."""
    defaults: dict[str, Any] = {"c": 1.0, "friction": (20.0, 20.0, 30.0), "period": 40.0}
    return case("sprung", 40, 16, 100, given.pop("mass", 0.5), kind=kind, coil=coil, **(defaults | given))


@pytest.mark.parametrize("supply", [1.8, 2.0, 2.2])
def test_a_weak_supply_stops_where_its_force_is_that_of_the_spring_and_friction(supply: float) -> None:
    """(p − p0)·A = F0 + k·x + F_c: at 2 bar absolute 125.7 N, less 20 N and 40 N, over 1 N/mm: 65.7 mm, by hand."""
    slow = _sprung(supply=supply, c=0.02)
    result = project_result(slow)
    stands = ((supply - 1.0) * 1e5 * AREA - 20.0 - 40.0) / 1e3
    assert result.extend.position_reached == pytest.approx(stands, abs=2e-4)
    assert not result.extend.completed
    assert result.retract.completed


def test_a_spring_that_friction_holds_leaves_the_piston_where_both_are_equal_and_says_so() -> None:
    """F0 + k·x = F_c: 10 N and 1 N/mm against 20 N: 10 mm from the retracted end."""
    weak = _sprung(coil=(1.0, 10.0), throttle=("meter-out", 1.0, 0.1, 2.0))
    result = project_result(weak)
    assert result.extend.completed
    assert not result.retract.completed
    assert result.retract.position_reached == pytest.approx(0.010, abs=1e-6)
    said = result.retract.stroke_time
    assert isinstance(said, Refusal)
    found = re.search(r"the spring alone drives this way and leaves the piston at ([0-9.]+) mm", said.reason)
    assert found is not None
    assert float(found.group(1)) == pytest.approx(10.0, abs=0.01)
    assert any("the spring alone drives this way" in remark for remark in result.remarks)


def test_a_spring_weaker_than_breakaway_never_brings_the_piston_back() -> None:
    stuck = _sprung(coil=(0.1, 30.0), friction=(60.0, 20.0, 30.0))
    result = project_result(stuck)
    assert result.retract.position_reached == pytest.approx(0.1, abs=1e-9)
    said = result.retract.stroke_time
    assert isinstance(said, Refusal)
    assert said.reason == (
        "the piston does not start; the spring alone drives this way and leaves the piston at 100 mm"
    )


@pytest.mark.parametrize(("kind", "end"), [("spring-return", 0.0), ("spring-extend", 0.1)])
def test_a_spring_stronger_than_the_air_never_moves(kind: str, end: float) -> None:
    result = project_result(_sprung(kind, coil=(0.5, 800.0), period=3.0))
    assert result.position.min() == result.position.max() == end
    half = result.extend if kind == "spring-return" else result.retract
    assert isinstance(half.stroke_time, Refusal)
    assert half.stroke_time.reason == "the piston does not start"


def test_without_a_spring_force_and_friction_the_piston_has_no_way_back() -> None:
    """A spring of neither rate nor preload is no spring: the vented piston stays out."""
    result = project_result(_sprung(coil=(0.0, 0.0), period=3.0))
    assert result.position.min() == pytest.approx(0.1, abs=1e-9)


@pytest.mark.parametrize(("kind", "way"), [("spring-return", "extend"), ("spring-extend", "retract")])
def test_force_at_the_end_of_the_air_stroke_is_air_less_spring_less_friction(kind: str, way: str) -> None:
    """At 7 into 1 bar absolute, settled: 6 bar on the side's area, less 40 + 100 N of spring and 20 N of friction."""
    result = project_result(_sprung(kind))
    area = AREA if way == "extend" else ANNULUS
    half, back = (result.extend, result.retract) if way == "extend" else (result.retract, result.extend)
    assert number(half.force_at_end) == pytest.approx(6e5 * area - 140.0 - 20.0, rel=1e-6)
    assert number(back.force_at_end) == pytest.approx(40.0 - 20.0, rel=1e-3)


def _parts(found: Case, **changed: Any) -> tuple[Actuator, Machine, Site]:
    return replace(found.actuator, **changed), found.machine, found.site


def test_forces_are_air_less_spring_one_way_and_preload_the_other() -> None:
    """6 bar on 1256.6 mm² is 754.0 N, on 1055.6 mm² 633.3 N; the spring has 40 N to 140 N."""
    for count in (1, 3):
        out = static_forces(*_parts(_sprung(), count=count))
        assert out.theoretical_extend == pytest.approx(count * (6e5 * AREA - 140.0), rel=1e-12)
        assert out.theoretical_retract == count * 40.0
        back = static_forces(*_parts(_sprung("spring-extend"), count=count))
        assert back.theoretical_extend == count * 40.0
        assert back.theoretical_retract == pytest.approx(count * (6e5 * ANNULUS - 140.0), rel=1e-12)


def test_load_ratio_and_reserve_follow_the_force_left_over() -> None:
    """400 N against 614.0 N, friction 20 N; returning 30 N against 40 N."""
    loaded = _sprung(load={"extend_force": 400.0, "retract_force": 30.0})
    found = static_forces(*_parts(loaded))
    assert found.load_ratio_extend == pytest.approx(400.0 / 613.98, rel=1e-4)
    assert found.force_reserve_extend == pytest.approx((613.98 - 20.0 - 400.0) / 400.0, rel=1e-4)
    assert found.load_ratio_retract == pytest.approx(0.75)
    assert found.force_reserve_retract == pytest.approx((40.0 - 20.0 - 30.0) / 30.0)


def test_a_spring_that_leaves_no_force_says_which_way() -> None:
    strong = static_forces(*_parts(_sprung(coil=(0.5, 800.0), load={"extend_force": 10.0})))
    assert isinstance(strong.load_ratio_extend, Refusal)
    assert strong.load_ratio_extend.reason == "at the end of the air stroke the spring is stronger than the air"
    loose = static_forces(*_parts(_sprung(coil=(0.5, 0.0), load={"retract_force": 10.0})))
    assert isinstance(loose.load_ratio_retract, Refusal)
    assert loose.load_ratio_retract.reason == "without preload the spring gives no force at its end"


@pytest.mark.parametrize(
    ("kind", "rod", "load"),
    [
        ("spring-return", 16, {"extend_force": 300.0}),
        ("spring-extend", 16, {"retract_force": 300.0}),
        ("through-rod", 16, {"extend_force": 300.0, "retract_force": 120.0}),
        ("through-rod", 16, {"extend_force": 20.0, "retract_force": 300.0}),
        ("rodless", 0, {"extend_force": 300.0, "retract_force": 310.0}),
        ("double-acting", 16, {"extend_force": 20.0, "retract_force": 300.0}),
    ],
)
@pytest.mark.parametrize("count", [1, 2])
def test_the_required_bore_leaves_just_the_wanted_reserve(
    kind: str, rod: float, load: dict[str, float], count: int
) -> None:
    """Put back in, with rod and friction in proportion, the reserve of the way that binds is the one asked for."""
    coil = (1.0, 40.0) if kind.startswith("spring") else None
    given = case("bore", 40, rod, 100, 0.5, c=1.0, kind=kind, coil=coil, friction=(20.0, 20.0, 30.0), load=load)
    part, machine, site = _parts(given, count=count, require=Require(force_reserve=0.5))
    bore = static_forces(part, machine, site).required_bore
    assert isinstance(bore, float)
    grown = bore / part.bore
    friction = replace(part.friction, breakaway=20.0 * grown**2, coulomb=20.0 * grown**2)
    fitted = replace(part, bore=bore, rod=part.rod * grown, friction=friction)
    found = static_forces(fitted, machine, site)
    reserves = [item for item in (found.force_reserve_extend, found.force_reserve_retract) if isinstance(item, float)]
    assert min(reserves) == pytest.approx(0.5, rel=1e-9)


def test_where_only_the_spring_carries_a_load_there_is_no_bore_to_size() -> None:
    found = static_forces(*_parts(_sprung(load={"retract_force": 30.0})))
    assert isinstance(found.required_bore, Refusal)
    assert found.required_bore.reason == "only the spring carries a load: there is no bore to size"
    idle = static_forces(*_parts(_sprung())).required_bore
    assert isinstance(idle, Refusal)
    assert idle.reason == "no load"


def test_the_rod_is_pushed_by_one_cylinder_s_air_or_by_its_spring() -> None:
    """Bore 40: 754.0 N; a rod through it leaves 633.3 N; a spring that drives out pushes with at most 140 N."""
    through = case("t", 40, 16, 100, 0.5, c=1.0, kind="through-rod")
    for found, push in ((_sprung(), 753.98), (_sprung("spring-extend"), 140.0), (through, 633.35)):
        parts = _parts(found, count=2)
        assert largest_push(*parts) == pytest.approx(push, abs=0.01)
        rod = rod_column(*parts)
        assert isinstance(rod.buckling_load, float)
        assert rod.buckling_safety == pytest.approx(rod.buckling_load / push, rel=1e-4)


def test_a_rodless_cylinder_has_no_rod_to_judge() -> None:
    rod = rod_column(*_parts(case("r", 40, 0, 100, 0.5, c=1.0, kind="rodless")))
    for name in (
        "largest_push",
        "buckling_load",
        "buckling_safety",
        "slenderness",
        "longest_stroke",
        "overhang",
        "sag",
    ):
        figure = getattr(rod, name)
        assert isinstance(figure, Refusal), name
        assert figure.reason == "no rod"


def _areas(part: Actuator) -> tuple[float, float]:
    return part.area_cap, part.area_rod


def test_areas_by_kind() -> None:
    """Bore 40 and rod 16: 1256.64 and 1055.58 mm², by hand."""
    full, ring = 1256.64e-6, 1055.58e-6
    by_kind = {"double-acting": (full, ring), "through-rod": (ring, ring)}
    for kind, areas in by_kind.items():
        assert _areas(case("a", 40, 16, 100, 1.0, c=1.0, kind=kind).actuator) == pytest.approx(areas, rel=1e-5)
    assert _areas(case("a", 40, 0, 100, 1.0, c=1.0, kind="rodless").actuator) == pytest.approx((full, full), rel=1e-5)
    assert _areas(_sprung("spring-extend").actuator) == pytest.approx((full, ring), rel=1e-5)


@pytest.mark.parametrize(
    ("kind", "rod", "area"),
    [
        ("spring-return", 16, AREA),
        ("spring-extend", 16, ANNULUS),
        ("through-rod", 16, 2 * ANNULUS),
        ("rodless", 0, 2 * AREA),
    ],
)
@pytest.mark.parametrize("count", [1, 3])
def test_air_by_hand_counts_the_sides_that_take_it(kind: str, rod: float, area: float, count: int) -> None:
    """Textbook p_s·A·S/(R·T); the settled figure adds (p_s − p0)·V_dead, 5 cm³ a side."""
    coil = (1.0, 60.0) if kind.startswith("spring") else None
    given = case("air", 40, rod, 100, 2.0, c=1.0, kind=kind, coil=coil, dead=5.0, period=20.0, n=1.0)
    part = replace(given.actuator, count=count, load=replace(given.actuator.load, mass=2.0 * count))
    given = replace(given, actuator=part)
    result = project_result(given)
    air = air_of(part, given.machine, given.site, result)
    textbook = count * 7e5 * area * 0.1 / (287.05 * 293.15)
    sides = count * (1 if coil else 2)
    settled = textbook + sides * 6e5 * 5e-6 / (287.05 * 293.15)
    assert air.textbook_anr == pytest.approx(textbook / DRY_ANR, rel=1e-4)
    assert air.settled_anr == pytest.approx(settled / DRY_ANR, rel=1e-4)
    assert air.air_drawn == pytest.approx(settled, rel=2e-3)  # isothermal and settled, both ways
    assert "temperature at the end" not in air.difference
    assert "pressure left" not in air.difference


def _ideal(found: Case, **changed: Any) -> Indicator:
    part, machine, site = _parts(found, **changed)
    return ideal_indicator(
        part,
        p_supply=machine.supply_pressure,
        temp_supply=machine.supply_temperature,
        p_ambient=site.ambient_pressure,
        temp_ambient=site.ambient_temperature,
    )


def test_the_ideal_diagram_is_that_of_one_cylinder_s_air_side() -> None:
    out, back = _ideal(_sprung(), count=2), _ideal(_sprung("spring-extend"))
    assert (out.direction, back.direction) == ("extend", "retract")
    assert out.work == pytest.approx(6e5 * AREA * 0.1, rel=1e-12)
    assert back.work == pytest.approx(6e5 * ANNULUS * 0.1, rel=1e-12)
    assert out.volume
    assert (out.volume_retract, out.pressure_retract) == ((), ())
    assert (back.volume, back.pressure) == ((), ())
    assert back.volume_retract
    assert out.remarks == ("The ideal diagram is that of one cylinder.",)
    assert back.remarks == ("The ideal diagram is that of the retracting stroke.",)


@pytest.mark.parametrize(
    ("changed", "path", "words"),
    [
        ({"rod": 0.0}, "rod", "must be above 0 m"),
        ({"spring": None}, "spring", "a spring-return cylinder has one"),
        ({"return_pressure": 5e5}, "return_pressure", "a spring drives this cylinder back"),
        ({"kind": "double-acting"}, "spring", "a double-acting cylinder has none"),
        ({"kind": "double-acting"}, "valve.function", '"3/2" is for single-acting cylinders'),
        ({"kind": "rodless"}, "rod", "a rodless cylinder has none"),
        ({"count": 0}, "count", "must be at least 1"),
    ],
)
def test_parts_of_one_kind_only_are_refused_for_others(changed: dict[str, Any], path: str, words: str) -> None:
    with pytest.raises(InputError, match=re.escape(words)) as caught:
        replace(_sprung().actuator, **changed)
    assert path in {problem.path for problem in caught.value.problems}


def test_a_single_acting_cylinder_needs_its_valve_and_the_needle_that_acts() -> None:
    part = _sprung(throttle=("meter-out", 1.0, 0.5, 2.0)).actuator
    with pytest.raises(InputError, match='must be "3/2"'):
        replace(part, valve=replace(part.valve, function="5/2 spring"))
    with pytest.raises(InputError, match=r'throttle\.retract_c: .*needed with kind = "meter-out"'):
        replace(part, throttle=replace(part.throttle, retract_c=None, extend_c=1e-8))
    assert part.throttle.extend_c is None


def test_a_needle_slows_the_way_that_it_is_said_to_slow() -> None:
    """Meter-out the spring's way, meter-in the air's."""
    free, out, into = (
        project_result(_sprung(throttle=throttle, period=8.0))
        for throttle in (None, ("meter-out", 0.1, 0.1, 9.0), ("meter-in", 0.1, 0.1, 9.0))
    )

    def times(result: StrokeResult) -> tuple[float, float]:
        return number(result.extend.stroke_time), number(result.retract.stroke_time)

    assert times(out)[0] == pytest.approx(times(free)[0], rel=0.1)
    assert times(out)[1] > 3.0 * times(free)[1]
    assert times(into)[0] > 2.0 * times(free)[0]
    assert times(into)[1] == pytest.approx(times(free)[1], rel=0.1)


def test_energy_of_a_spring_is_the_area_under_its_line() -> None:
    """40 N rising to 140 N over 0.1 m: 9 J."""
    assert Spring(rate=1e3, preload=40.0).energy(0.1) == pytest.approx(9.0, rel=1e-12)
    with pytest.raises(InputError, match="must be at least 0 N/m"):
        Spring(rate=-1.0, preload=0.0)
