"""The yardstick of speed: one half stroke solved by scipy's LSODA, in plain Python, at a step tolerance of 1e-4."""

from __future__ import annotations

import math
import time
from collections.abc import Callable

import numpy as np
from numpy.typing import NDArray
from scipy.integrate import solve_ivp

R, GAMMA = 287.05, 1.4
CV = R / (GAMMA - 1.0)
AREA_1, AREA_2 = math.pi / 4 * 0.05**2, math.pi / 4 * (0.05**2 - 0.02**2)
STROKE, DEAD, MASS = 0.4, 20e-6, 20.0
P_SUPPLY, P_AMBIENT, TEMP = 7e5, 1e5, 293.15


def _flow(p_up: float, p_down: float, temp: float) -> float:
    """ISO 6358 with C = 2 dm³/(s·bar), b = 0.3. [kg/s]"""
    ratio = p_down / p_up
    share = 1.0 if ratio <= 0.3 else math.sqrt(max(1.0 - ((ratio - 0.3) / 0.7) ** 2, 0.0))
    return 2e-8 * p_up * 1.185 * math.sqrt(293.15 / temp) * share


def _rates(_: float, y: NDArray[np.float64]) -> list[float]:
    x, v, m1, t1, m2, t2 = y.tolist()
    v1, v2 = DEAD + AREA_1 * x, DEAD + AREA_2 * (STROKE - x)
    p1, p2 = m1 * R * t1 / v1, m2 * R * t2 / v2
    q_in, q_out = _flow(P_SUPPLY, min(p1, P_SUPPLY), TEMP), _flow(max(p2, P_AMBIENT), P_AMBIENT, t2)
    force = p1 * AREA_1 - p2 * AREA_2 - P_AMBIENT * (AREA_1 - AREA_2)
    if x <= 0.0 and force < 90.0:
        v = a = 0.0
    else:
        a = (force - math.copysign(60.0 + 30.0 * math.exp(-((v / 0.02) ** 2)), v) - 30.0 * v) / MASS
    heat1 = 60.0 * (math.pi * 0.05 * x + 2.0 * AREA_1) * (TEMP - t1)
    heat2 = 60.0 * (math.pi * 0.05 * (STROKE - x) + 2.0 * AREA_2) * (TEMP - t2)
    return [
        v,
        a,
        q_in,
        (q_in * (GAMMA * CV * TEMP - CV * t1) - p1 * AREA_1 * v + heat1) / (m1 * CV),
        -q_out,
        (-q_out * R * t2 + p2 * AREA_2 * v + heat2) / (m2 * CV),
    ]


def half_stroke() -> float:
    """Time to the end of the base case's extending stroke. [s]"""

    def at_end(_: float, y: NDArray[np.float64]) -> float:
        return float(y[0]) - STROKE

    at_end.terminal = True  # type: ignore[attr-defined]
    start = [0.0, 0.0, P_AMBIENT * DEAD / (R * TEMP), TEMP, P_SUPPLY * (DEAD + AREA_2 * STROKE) / (R * TEMP), TEMP]
    scale = [1e-6, 1e-6, 1e-9, 1e-3, 1e-9, 1e-3]
    found = solve_ivp(_rates, (0.0, 2.0), start, method="LSODA", rtol=1e-4, atol=scale, events=[at_end])
    return float(found.t[-1])


def best(work: Callable[[], object], times: int) -> float:
    """Shortest of several runs, on the wall clock. [s]"""
    work()
    found = []
    for _ in range(times):
        begin = time.perf_counter()
        work()
        found.append(time.perf_counter() - begin)
    return min(found)
