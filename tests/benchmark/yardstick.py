"""The yardstick: one half stroke, settled start to arrival, by scipy's LSODA with a right-hand side in plain Python."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
from numpy.typing import NDArray
from scipy.integrate import solve_ivp

from actuator.stroke import layout as at
from actuator.stroke.equations import connect, excess, rates
from actuator.stroke.rows import Case, gather

Array = NDArray[np.float64]


def _event(function: Callable[[float, Array], float]) -> Callable[[float, Array], float]:
    function.terminal = True  # type: ignore[attr-defined]
    function.direction = 1.0  # type: ignore[attr-defined]
    return function


def half_stroke(case: Case, rtol: float) -> tuple[float, float]:
    """Time of arrival [s] and speed there [m/s] of one extending stroke, commanded at time 0.

    The kernel's own equations, interpreted. Allowances as in the kernel: relative for masses and energies,
    against the stroke for the position and against 0.1 m/s for the speed.
    """
    rows = gather([case], compiled=False, way=1.0)
    par, mode = rows.par[0], rows.mode[0]
    mode[at.SIDE], mode[at.SWITCHED], mode[at.OPEN_OVER] = 1.0, 0.0, par[at.OPENING]
    connect(mode, par)
    allowed = rtol * np.array([par[at.STROKE], 0.1, 0.0, 0.0, 0.0, 0.0])
    period = rows.periods[0]

    def slope(time: float, y: Array) -> tuple[float, ...]:
        x, v, m_cap, u_cap, m_rod, u_rod = y.tolist()
        return rates(time, (x, v, m_cap, u_cap, m_rod, u_rod), mode, par)

    def start(_: float, y: Array) -> float:
        x, v, m_cap, u_cap, m_rod, u_rod = np.asarray(y).tolist()
        return excess((x, v, m_cap, u_cap, m_rod, u_rod), mode, par)

    def end(_: float, y: Array) -> float:
        return float(y[at.X] - par[at.STROKE])

    rest = solve_ivp(
        slope, (0.0, period), np.array(rows.y[0][: at.N_STATE]), "LSODA", rtol=rtol, atol=allowed, events=_event(start)
    )  # fmt: skip
    mode[at.DIRECTION] = 1.0
    motion = solve_ivp(
        slope, (rest.t[-1], period), rest.y[:, -1], "LSODA", rtol=rtol, atol=allowed, events=_event(end)
    )  # fmt: skip
    return float(motion.t[-1]), float(motion.y[at.V, -1])
