"""Bands of figures whose distribution is known in closed form, and of strokes against plain random sampling."""

from __future__ import annotations

import math
import threading
import time
from collections.abc import Callable
from dataclasses import replace

import numpy as np
import pytest

from actuator.errors import Cancelled, Refusal
from actuator.parts import Actuator, Machine, Spread
from actuator.scatter.bands import Band, Bands, _interval, banded, summed_up
from actuator.scatter.outcome import Outcome, no_stop
from actuator.scatter.points import SAMPLES, deviations
from actuator.scatter.vary import Deviation, paths_times, scaled_paths, varied
from actuator.stroke.result import Path
from actuator.stroke.simulate import flow_paths, simulate
from tests.agreement.cases import CASES, Case

PART = {case.name: case for case in CASES}
BASE = PART["loaded"]
NONE = Spread(supply_pressure=0.0, friction=0.0, mass=0.0, conductance=0.0, delay=0.0)


def never() -> bool:
    return False


def last(
    case: Case, read: Callable[[Actuator, Machine], Outcome], *, samples: int = SAMPLES, threads: int = 2
) -> Bands:
    """Bands of all samples."""

    def evaluate(actuator: Actuator, machine: Machine, _: tuple[Path, ...] | None) -> Outcome:
        return read(actuator, machine)

    *_, found = banded(
        case.actuator, case.machine, case.site, evaluate, cancelled=never, samples=samples, threads=threads
    )
    return found


def known(actuator: Actuator, machine: Machine) -> Outcome:
    """Figures with a known distribution: of a uniform field, of the sum of two, of a square; and a requirement."""
    spread = BASE.actuator.spread
    pressure = (machine.supply_pressure - BASE.machine.supply_pressure) / spread.supply_pressure
    rubbing = (actuator.friction.coulomb / BASE.actuator.friction.coulomb - 1.0) / spread.friction
    late = (actuator.valve.delay / 0.015 - 1.0) / spread.delay if actuator.valve.delay else 0.0
    return Outcome(
        values={
            "pressure": pressure,
            "sum": pressure + rubbing,
            "square": rubbing**2,
            "delay": late,
            "never": Refusal("nothing to tell"),
            "often lost": Refusal("out of reach") if pressure > 0.5 else pressure,
            "seldom lost": Refusal("out of reach") if pressure > 0.95 else pressure,
        },
        met=pressure > 0.5,
    )


def test_bands_are_the_quantiles_of_the_distribution() -> None:
    """P5, P50, P95 of a rectangular, a triangular (sum of two) and a squared rectangular variable, from their laws."""
    found = last(BASE, known).bands
    laws = {
        "pressure": (-0.9, 0.0, 0.9),
        # sum of two on [-1, 1]: distribution function (2 + s)²/8 below 0, so s = sqrt(8·0.05) - 2
        "sum": (math.sqrt(0.4) - 2.0, 0.0, 2.0 - math.sqrt(0.4)),
        # square of one on [-1, 1]: distribution function sqrt(q)
        "square": (0.05**2, 0.5**2, 0.95**2),
    }
    for name, law in laws.items():
        band = found[name]
        assert isinstance(band, Band)
        np.testing.assert_allclose((band.p05, band.p50, band.p95), law, atol=0.07, err_msg=name)


def test_a_figure_that_is_missing_in_more_than_one_sample_in_twenty_has_no_band() -> None:
    found = last(BASE, known).bands
    assert found["never"] == Refusal("nothing to tell")
    often, seldom = found["often lost"], found["seldom lost"]
    assert isinstance(often, Refusal)
    assert often.reason == "in 32 of 128 samples: out of reach"  # pressure above 0.5: a quarter of the range
    assert isinstance(seldom, Band)
    assert 1 <= seldom.missing <= 6
    assert seldom.p95 < 0.95


def test_the_chance_is_the_share_of_the_samples() -> None:
    """Pressure in the upper quarter of its range: 25 %, to the balance of the points."""
    found = last(BASE, known)
    assert found.met == pytest.approx(0.25, abs=1 / 128)
    assert isinstance(found.met_low, float)
    assert isinstance(found.met_high, float)
    assert found.met_low < 0.25 < found.met_high


@pytest.mark.parametrize(
    ("hits", "count", "low", "high"),
    [(81, 263, 0.2553, 0.3662), (15, 148, 0.0624, 0.1605), (0, 20, 0.0, 0.1611), (1, 29, 0.0061, 0.1718)],
)
def test_the_confidence_interval_is_wilson_s(hits: int, count: int, low: float, high: float) -> None:
    """Newcombe, Statistics in Medicine 17 (1998) 857-872, Table I, score method (from memory)."""
    assert _interval(hits, count) == pytest.approx((low, high), abs=5e-5)


def test_without_requirements_there_is_no_chance() -> None:
    found = last(BASE, lambda *_: Outcome(values={"one": 1.0}, met=None))
    assert found.met == Refusal("no requirement is asked", "require")
    assert found.bands["one"] == Band(p05=1.0, p50=1.0, p95=1.0)


def test_the_points_repeat_and_each_beginning_of_them_is_balanced() -> None:
    spread = Spread()
    points = deviations(spread, SAMPLES)
    assert points == deviations(spread, SAMPLES)
    assert points != deviations(spread, SAMPLES, 1)
    assert points[:16] == deviations(spread, 16)
    for count in (8, 16, 32, 64, 128):
        for name, most in (("supply_pressure", 3e4), ("friction", 0.3), ("mass", 0.1), ("delay", 0.2)):
            values = np.array([getattr(point, name) for point in points[:count]])
            assert np.abs(values).max() <= most
            # one point in each of as many equal parts of the range
            parts = np.floor((values / most + 1.0) / 2.0 * count).astype(int)
            assert sorted(parts) == list(range(count))
    assert all(point.mass == point.opposing == point.constant for point in points)


@pytest.mark.parametrize("threads", [1, 2, 5])
def test_any_number_of_threads_gives_the_same(threads: int) -> None:
    assert last(BASE, known, threads=threads).bands == last(BASE, known).bands


def test_partial_results_come_at_each_doubling_and_are_those_of_fewer_samples() -> None:
    def evaluate(actuator: Actuator, machine: Machine, _: tuple[Path, ...] | None) -> Outcome:
        time.sleep(0.001)  # so that the samples do not all come at once
        return known(actuator, machine)

    found = list(banded(BASE.actuator, BASE.machine, BASE.site, evaluate, cancelled=never, threads=1))
    assert [item.samples for item in found][-1] == SAMPLES
    assert len(found) >= 2
    for item in found:
        assert item.wanted == SAMPLES
        assert item.samples in (32, 64, 128)
        assert item.bands == last(BASE, known, samples=item.samples).bands


def test_cancelling_ends_the_work_and_tells_the_simulations() -> None:
    stop, started = no_stop(), threading.Event()

    def evaluate(actuator: Actuator, machine: Machine, _: tuple[Path, ...] | None) -> Outcome:
        started.set()
        while not stop[0]:
            pass
        raise Cancelled("stopped")

    with pytest.raises(Cancelled, match="cancelled"):
        list(banded(BASE.actuator, BASE.machine, BASE.site, evaluate, cancelled=started.is_set, threads=2, stop=stop))
    assert stop[0] == 1


def test_what_goes_wrong_in_a_thread_is_not_lost() -> None:
    def evaluate(*_: object) -> Outcome:
        raise ZeroDivisionError("in the kernel")

    with pytest.raises(ZeroDivisionError, match="in the kernel"):
        list(banded(BASE.actuator, BASE.machine, BASE.site, evaluate, cancelled=never))


def test_samples_below_ambient_are_told_and_fail_the_requirements() -> None:
    low = replace(BASE, actuator=replace(BASE.actuator, spread=replace(NONE, supply_pressure=8e5)))
    found = last(low, lambda *_: Outcome(values={"one": 1.0}, met=True))
    lost = found.bands["one"]
    assert isinstance(lost, Refusal)
    assert "is not above the ambient pressure" in lost.reason
    # 7 bar in 1 bar: all that lies more than 6 of 8 bar low is lost, an eighth of the range
    assert found.met == pytest.approx(1.0 - 1 / 8, abs=1 / 128)


def test_flow_paths_are_only_multiplied() -> None:
    case = PART["meter-out, unequal needles"]
    paths = scaled_paths(case.actuator, case.machine, case.site)
    assert paths is not None
    parts = varied(case.actuator, case.machine, case.site, Deviation(conductance=-0.07))
    assert not isinstance(parts, Refusal)
    for one, other in zip(paths_times(paths, 0.93), flow_paths(parts[0]), strict=True):
        assert one.name == other.name
        assert one.conductance == pytest.approx(other.conductance, rel=1e-12)
        assert one.critical_ratio == pytest.approx(other.critical_ratio, abs=1e-3)


def strokes(case: Case, points: tuple[Deviation, ...]) -> list[Outcome]:
    """Figures of quick simulations."""
    outcomes = []
    for by in points:
        parts = varied(case.actuator, case.machine, case.site, by)
        assert not isinstance(parts, Refusal)
        found = simulate(*parts, case.site, ledger=False, quick=True)
        assert not isinstance(found, Refusal)
        outcomes.append(
            Outcome(
                values={
                    "stroke_time": found.extend.stroke_time,
                    "end_energy": found.extend.end_energy,
                    "force": found.retract.force_at_end,
                    "air": found.extend.air_drawn + found.retract.air_drawn,
                },
                met=isinstance(found.extend.stroke_time, float) and found.extend.stroke_time < 0.5,
            )
        )
    return outcomes


def by_chance(spread: Spread, count: int) -> tuple[Deviation, ...]:
    """Plain random deviations, each field evenly and apart from the others."""
    draws = np.random.default_rng(7).uniform(-1.0, 1.0, (count, 5)).tolist()
    return tuple(
        Deviation(
            supply_pressure=p * spread.supply_pressure,
            friction=f * spread.friction,
            mass=m * spread.mass,
            opposing=m * spread.mass,
            constant=m * spread.mass,
            conductance=c * spread.conductance,
            delay=d * spread.delay,
        )
        for p, f, m, c, d in draws
    )


def agree(case: Case, count: int) -> None:
    """Of ``count`` plain random samples about 5, 50 and 95 % lie below P5, P50 and P95 of the 128 points."""
    spread = case.actuator.spread
    bands = summed_up(strokes(case, deviations(spread, SAMPLES)), SAMPLES)
    brute = strokes(case, by_chance(spread, count))
    for name, band in bands.bands.items():
        assert isinstance(band, Band)
        values = np.array([item.values[name] for item in brute], dtype=float)
        shares = [(values < level).mean() for level in (band.p05, band.p50, band.p95)]
        np.testing.assert_array_less(np.abs(np.subtract(shares, (0.05, 0.5, 0.95))), (0.03, 0.06, 0.03), err_msg=name)
    met = sum(bool(item.met) for item in brute) / count
    assert isinstance(bands.met_low, float)
    assert isinstance(bands.met_high, float)
    assert bands.met_low - 0.02 <= met <= bands.met_high + 0.02


@pytest.mark.parametrize("name", ["loaded", "lifting, meter-out"])
def test_bands_agree_with_a_thousand_plain_random_samples(name: str) -> None:
    agree(PART[name], 1000)


@pytest.mark.benchmark
@pytest.mark.parametrize("name", ["base", "loaded", "lifting, meter-out", "short 1.2 s"])
def test_bands_agree_with_ten_thousand_plain_random_samples(name: str) -> None:
    agree(PART[name], 10_000)
