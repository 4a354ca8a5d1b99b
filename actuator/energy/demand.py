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


def _cumulative(time: Array, flow: Array) -> Array:
    """Integral from the first time to each other, exact for straight pieces."""
    steps = 0.5 * (flow[1:] + flow[:-1]) * np.diff(time)
    return np.concatenate(([0.0], np.cumsum(steps)))


def _drawn(at: Array, time: Array, flow: Array, total: Array, period: float) -> Array:
    """Integral from 0 to ``at`` of the periodic flow, exact for straight pieces."""
    turns = np.floor(at / period)
    local = at - turns * period
    piece = np.clip(np.searchsorted(time, local, side="right") - 1, 0, len(time) - 2)
    width = time[piece + 1] - time[piece]
    gone = local - time[piece]
    share = np.divide(gone, width, out=np.zeros_like(gone), where=width > 0.0)
    now = flow[piece] + (flow[piece + 1] - flow[piece]) * share
    result: Array = turns * total[-1] + total[piece] + 0.5 * (flow[piece] + now) * gone
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
    totals = [_cumulative(time, flow) for time, flow in histories]
    per_cycle = float(sum(total[-1] for total in totals))
    if window <= 0.0:
        return FlowDemand(mean=per_cycle / period, peak=_highest(histories), per_cycle=per_cycle, window=0.0)
    edges = np.concatenate([time for time, _ in histories])
    starts = np.unique(np.concatenate((edges, np.mod(edges - window, period), [0.0, period])))
    middles = 0.5 * (starts[1:] + starts[:-1])
    at = np.concatenate((starts, middles))
    mean = np.zeros_like(at)
    for (time, flow), total in zip(histories, totals, strict=True):
        mean += _drawn(at + window, time, flow, total, period) - _drawn(at, time, flow, total, period)
    left, right, middle = mean[: len(starts) - 1], mean[1 : len(starts)], mean[len(starts) :]
    bend = left - 2.0 * middle + right  # parabola through three points, its vertex where it bends down
    rise = 0.5 * (right - left)
    inside = (bend < 0.0) & (np.abs(rise) < -bend)
    vertex = middle - np.divide(rise * rise, 2.0 * bend, out=np.zeros_like(bend), where=inside)
    peak = max(float(mean.max()), float(vertex.max())) / window
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
