"""Demand of a machine: exact means over windows, against adding up."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.typing import NDArray

from actuator.energy.demand import demand

quick = settings(deadline=None, max_examples=60, database=None)
Array = NDArray[np.float64]


def _brute(histories: list[tuple[Array, Array]], period: float, window: float) -> float:
    """Highest window mean by adding up 20,000 slices."""
    count = 20_000
    middles = (np.arange(count) + 0.5) * period / count
    flow = sum((np.interp(middles, time, values) for time, values in histories), np.zeros(count))
    total = np.concatenate(([0.0], np.cumsum(np.tile(flow, 2)) * period / count))
    width = round(window / period * count)
    return float((total[width:] - total[:-width]).max() / window)


def test_a_steady_flow_has_no_peak() -> None:
    steady = (np.array([0.0, 4.0]), np.array([0.02, 0.02]))
    found = demand([steady, steady], 4.0)
    assert (found.mean, found.peak, found.per_cycle) == pytest.approx((0.04, 0.04, 0.16), rel=1e-12)


def test_no_actuator_no_demand() -> None:
    found = demand([], 4.0)
    assert (found.mean, found.peak, found.per_cycle) == (0.0, 0.0, 0.0)


def test_a_pulse_across_the_end_of_the_cycle() -> None:
    pulse = (np.array([0.0, 0.2, 0.2, 3.8, 3.8, 4.0]), np.array([1.0, 1.0, 0.0, 0.0, 1.0, 1.0]))
    assert demand([pulse], 4.0, 0.4).peak == pytest.approx(1.0, rel=1e-12)
    assert demand([pulse], 4.0, 0.5).peak == pytest.approx(0.8, rel=1e-12)
    assert demand([pulse], 4.0, 4.0).peak == pytest.approx(0.1, rel=1e-12)
    assert demand([pulse], 4.0, 0.0).peak == 1.0


def test_pulses_meet_or_miss_each_other() -> None:
    first = (np.array([0.0, 1.0, 1.0, 4.0]), np.array([1.0, 1.0, 0.0, 0.0]))
    later = (np.array([0.0, 2.0, 2.0, 3.0, 3.0, 4.0]), np.array([0.0, 0.0, 1.0, 1.0, 0.0, 0.0]))
    assert demand([first, first], 4.0, 0.5).peak == pytest.approx(2.0)
    assert demand([first, later], 4.0, 0.5).peak == pytest.approx(1.0)
    assert demand([first, later], 4.0, 0.0).peak == 1.0


def test_the_top_of_a_triangle_lies_between_its_points() -> None:
    triangle = (np.array([0.0, 1.0, 2.0, 4.0]), np.array([0.0, 1.0, 0.0, 0.0]))
    # a window of 0.5 s centred on the top: 1 − 0.25/2
    assert demand([triangle], 4.0, 0.5).peak == pytest.approx(0.875, rel=1e-12)
    # falling half as fast, the best window begins 1/6 s before the top, where both its ends are equal: 1 − 1/12
    skew = (np.array([0.0, 1.0, 3.0, 4.0]), np.array([0.0, 1.0, 0.0, 0.0]))
    assert demand([skew], 4.0, 0.5).peak == pytest.approx(11.0 / 12.0, rel=1e-12)


@quick
@given(
    st.lists(st.lists(st.floats(-0.2, 1.0), min_size=6, max_size=6), min_size=1, max_size=3),
    st.floats(0.05, 3.9),
)
def test_demand_against_adding_up_slices(values: list[list[float]], window: float) -> None:
    time = np.array([0.0, 0.3, 0.3, 1.7, 2.9, 4.0])
    histories = [(time, np.array(item)) for item in values]
    found = demand(histories, 4.0, window)
    assert found.peak == pytest.approx(_brute(histories, 4.0, window), abs=4e-3 * len(values) / window)
    assert found.peak >= found.mean - 1e-12
    assert found.per_cycle == pytest.approx(4.0 * found.mean, abs=1e-12)


def test_a_window_longer_than_the_cycle() -> None:
    pulse = (np.array([0.0, 1.0, 1.0, 4.0]), np.array([1.0, 1.0, 0.0, 0.0]))
    assert demand([pulse], 4.0, 9.0).peak == pytest.approx(3.0 / 9.0, rel=1e-12)
