"""Air demand of a machine: mean, and the highest mean over a window, from its actuators' histories."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]

WINDOW = 0.5
"""Window over which a machine's peak is meant: what its inlet hose and volume even out; common practice, no
source. [s]"""


@dataclass(frozen=True, slots=True, kw_only=True)
class FlowDemand:
    """Dry air that flows in a periodic cycle."""

    mean: float
    """Over the cycle. [kg/s]"""
    peak: float
    """Highest mean over any window of the cycle. [kg/s]"""
    per_cycle: float
    """[kg]"""
    window: float
    """Length of the window. [s]"""


@dataclass(frozen=True, slots=True, eq=False)
class _Pieces:
    """A flow of straight pieces between knots, and its integral."""

    knots: Array
    """Rising; a jump may stand as two equal ones. Shape (n + 1,). [s]"""
    first: Array
    """Flow at the beginning of each piece. Shape (n,). [kg/s]"""
    last: Array
    """Flow at the end of each piece. Shape (n,). [kg/s]"""
    rise: Array
    """Slope of each piece, zero where it has no length. Shape (n,). [kg/s**2]"""
    total: Array
    """Integral from the first knot to each. Shape (n + 1,). [kg]"""


def _slopes(knots: Array, first: Array, last: Array) -> Array:
    width = np.diff(knots)
    return np.divide(last - first, width, out=np.zeros_like(width), where=width > 0.0)


def _sum(histories: Sequence[tuple[Array, Array]]) -> _Pieces:
    """Sum of flows, with the knots of all of them."""
    if len(histories) == 1:
        knots, flow = histories[0]
        first, last = flow[:-1], flow[1:]
    else:
        knots = np.unique(np.concatenate([time for time, _ in histories]))
        first, last = np.zeros(len(knots) - 1), np.zeros(len(knots) - 1)
        for time, flow in histories:
            pieces = np.diff(np.searchsorted(knots, time))  # how many of the sum's pieces each own piece makes
            rise = _slopes(time, flow[:-1], flow[1:])
            own, slope, begun = (np.repeat(item, pieces) for item in (flow[:-1], rise, time[:-1]))
            first += own + slope * (knots[:-1] - begun)
            last += own + slope * (knots[1:] - begun)
    total = np.concatenate(([0.0], np.cumsum(0.5 * (first + last) * np.diff(knots))))
    return _Pieces(knots, first, last, _slopes(knots, first, last), total)


def _drawn(at: Array, flow: _Pieces, period: float) -> Array:
    """Integral from 0 to ``at`` of the periodic flow, exact."""
    turns = np.floor(at / period)
    local = at - turns * period
    place = np.clip(np.searchsorted(flow.knots, local, side="right") - 1, 0, len(flow.first) - 1)
    gone = local - flow.knots[place]
    result: Array = (flow.first[place] + 0.5 * flow.rise[place] * gone) * gone
    result += flow.total[place]
    result += turns * flow.total[-1]
    return result


def demand(histories: Sequence[tuple[Array, Array]], period: float, window: float = WINDOW) -> FlowDemand:
    """Mean and peak of flows that repeat together.

    Parameters
    ----------
    histories : sequence of (time, flow)
        Each from 0 to ``period``, rising times, straight between them; a jump stands as two equal times. [s],
        [kg/s]
    period : float
        Cycle time. [s]
    window : float
        Length over which the peak is meant; zero gives the highest flow. [s]

    Returns
    -------
    FlowDemand
        Exact integrals of the straight pieces; air given back to the supply counts negative.

    Notes
    -----
    The mean over a window that starts at t is a parabola in t between the times at which the window's start
    or end meets a time of the histories; each parabola's ends and its vertex are compared.
    """
    if not histories:
        return FlowDemand(mean=0.0, peak=0.0, per_cycle=0.0, window=window)
    flow = _sum(histories)
    per_cycle = float(flow.total[-1])
    if window <= 0.0:
        return FlowDemand(mean=per_cycle / period, peak=_highest(histories), per_cycle=per_cycle, window=0.0)
    starts = np.unique(np.concatenate((flow.knots, np.mod(flow.knots - window, period), [0.0, period])))
    mean = _drawn(starts + window, flow, period) - _drawn(starts, flow, period)
    left, right, highest = mean[:-1], mean[1:], float(mean.max())
    # between two starts the mean cannot rise by more than this, so few parabolas can be higher than all ends
    rise = 0.5 * np.diff(starts) * float(np.ptp(np.concatenate((flow.first, flow.last))))
    near = np.flatnonzero(np.maximum(left, right) + rise > highest)
    left, right, middles = left[near], right[near], 0.5 * (starts[near] + starts[near + 1])
    middle = _drawn(middles + window, flow, period) - _drawn(middles, flow, period)
    bend = left - 2.0 * middle + right  # parabola through three points, its vertex where it bends down
    half = 0.5 * (right - left)
    inside = (bend < 0.0) & (np.abs(half) < -bend)
    vertex = middle - np.divide(half * half, 2.0 * bend, out=np.zeros_like(bend), where=inside)
    peak = max(highest, float(vertex.max(initial=highest))) / window
    return FlowDemand(mean=per_cycle / period, peak=peak, per_cycle=per_cycle, window=window)


def _highest(histories: Sequence[tuple[Array, Array]]) -> float:
    """Highest sum of the flows at one time, both sides of every jump looked at."""
    edges = np.unique(np.concatenate([time for time, _ in histories]))
    before, after = np.zeros_like(edges), np.zeros_like(edges)
    for time, flow in histories:
        first = np.searchsorted(time, edges, side="left")
        last = np.searchsorted(time, edges, side="right") - 1
        met = first <= last
        between = np.interp(edges, time, flow)
        before += np.where(met, flow[np.minimum(first, len(flow) - 1)], between)
        after += np.where(met, flow[last], between)
    return float(max(before.max(), after.max()))
