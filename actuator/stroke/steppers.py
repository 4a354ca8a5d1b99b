"""One step of either embedded pair: explicit 5(4) for smooth motion, linearly implicit 4(3) for what is stiff.

The state is a tuple, a step's stages are kept: :mod:`actuator.stroke.ledger` integrates over them with the same
weights, so that linear balances (mass, energy) close to rounding.
"""

from __future__ import annotations

import math
from typing import NamedTuple

from actuator.stroke import dopri, rodas
from actuator.stroke import layout as at
from actuator.stroke.equations import Row, State, rates
from actuator.stroke.slopes import cap_tangent, jacobian, ramp, rod_tangent, solve, system

NOTHING: State = (0.0, 0.0, 0.0, 0.0, 0.0, 0.0)
STANDING = (NOTHING, NOTHING, NOTHING, NOTHING, NOTHING, NOTHING)


Stages = tuple[State, State, State, State, State, State]


class Step(NamedTuple):
    """A step tried."""

    y: State
    """State at its end."""
    k: State
    """Rates at its end."""
    wrong: float
    """Step error over the size of the states, root mean square. [1]"""
    stiffness: float
    """h times the dominant eigenvalue as estimated by the explicit pair, else 0. [1]"""
    stages: Stages
    """States at which rates were taken, the first that at the start."""
    increments: Stages
    """Implicit pair only: what its linear systems gave for each stage."""


def shifted(y: State, by: float, k: State) -> State:
    """Return y + by·k."""
    return (
        y[0] + by * k[0],
        y[1] + by * k[1],
        y[2] + by * k[2],
        y[3] + by * k[3],
        y[4] + by * k[4],
        y[5] + by * k[5],
    )


def sizes(y: State, z: State, par: Row) -> State:
    """What errors are measured against: stroke, speed + 0.1 m/s, and each mass and energy itself."""
    return (
        par[at.STROKE],
        max(abs(y[at.V]), abs(z[at.V])) + 0.1,
        max(abs(y[at.M_CAP]), abs(z[at.M_CAP])),
        max(abs(y[at.U_CAP]), abs(z[at.U_CAP])),
        max(abs(y[at.M_ROD]), abs(z[at.M_ROD])),
        max(abs(y[at.U_ROD]), abs(z[at.U_ROD])),
    )


def spread(a: State, b: State, size: State) -> float:
    """Sum of the squares of (a - b)/size. [1]"""
    d0 = (a[0] - b[0]) / size[0]
    d1 = (a[1] - b[1]) / size[1]
    d2 = (a[2] - b[2]) / size[2]
    d3 = (a[3] - b[3]) / size[3]
    d4 = (a[4] - b[4]) / size[4]
    d5 = (a[5] - b[5]) / size[5]
    return d0 * d0 + d1 * d1 + d2 * d2 + d3 * d3 + d4 * d4 + d5 * d5


def explicit_step(time: float, h: float, y: State, k1: State, mode: Row, par: Row) -> Step:
    """Dormand-Prince 5(4) step from ``y``, where the rates are ``k1``; coefficients in :mod:`dopri`.

    References
    ----------
    Stiffness detection: E. Hairer, G. Wanner, Solving Ordinary Differential Equations II, 2nd ed. 1996, equation
    IV.2.8 (from memory).
    """
    s2 = shifted(y, h * dopri.A21, k1)
    k2 = rates(time + h * dopri.T2, s2, mode, par)

    s3 = shifted(y, h * dopri.A31, k1)
    s3 = shifted(s3, h * dopri.A32, k2)
    k3 = rates(time + h * dopri.T3, s3, mode, par)

    s4 = shifted(y, h * dopri.A41, k1)
    s4 = shifted(s4, h * dopri.A42, k2)
    s4 = shifted(s4, h * dopri.A43, k3)
    k4 = rates(time + h * dopri.T4, s4, mode, par)

    s5 = shifted(y, h * dopri.A51, k1)
    s5 = shifted(s5, h * dopri.A52, k2)
    s5 = shifted(s5, h * dopri.A53, k3)
    s5 = shifted(s5, h * dopri.A54, k4)
    k5 = rates(time + h * dopri.T5, s5, mode, par)

    s6 = shifted(y, h * dopri.A61, k1)
    s6 = shifted(s6, h * dopri.A62, k2)
    s6 = shifted(s6, h * dopri.A63, k3)
    s6 = shifted(s6, h * dopri.A64, k4)
    s6 = shifted(s6, h * dopri.A65, k5)
    k6 = rates(time + h, s6, mode, par)

    end = shifted(y, h * dopri.B1, k1)
    end = shifted(end, h * dopri.B3, k3)
    end = shifted(end, h * dopri.B4, k4)
    end = shifted(end, h * dopri.B5, k5)
    end = shifted(end, h * dopri.B6, k6)
    k7 = rates(time + h, end, mode, par)

    error = shifted(NOTHING, h * dopri.E1, k1)
    error = shifted(error, h * dopri.E3, k3)
    error = shifted(error, h * dopri.E4, k4)
    error = shifted(error, h * dopri.E5, k5)
    error = shifted(error, h * dopri.E6, k6)
    error = shifted(error, h * dopri.E7, k7)

    size = sizes(y, end, par)
    wrong = math.sqrt(spread(error, NOTHING, size) / 6.0)
    distance = spread(end, s6, size)
    stiffness = h * math.sqrt(spread(k7, k6, size) / distance) if distance > 0.0 else 0.0
    return Step(end, k7, wrong, stiffness, (y, s2, s3, s4, s5, s6), STANDING)


def implicit_step(time: float, h: float, y: State, k1: State, mode: Row, par: Row) -> Step:
    """RODAS 4(3) step, L-stable, from ``y``, where the rates are ``k1``; coefficients in :mod:`rodas`."""
    cap = cap_tangent(time, y, mode, par)
    rod = rod_tangent(time, y, mode, par)
    left = system(1.0 / (rodas.GAMMA * h), jacobian(cap, rod, y, mode, par))
    ft = ramp(cap, rod, time, mode, par)

    u1 = solve(left, shifted(k1, h * rodas.D1, ft))

    s2 = shifted(y, rodas.A21, u1)
    right = shifted(rates(time + rodas.T2 * h, s2, mode, par), h * rodas.D2, ft)
    u2 = solve(left, shifted(right, rodas.C21 / h, u1))

    s3 = shifted(y, rodas.A31, u1)
    s3 = shifted(s3, rodas.A32, u2)
    right = shifted(rates(time + rodas.T3 * h, s3, mode, par), h * rodas.D3, ft)
    right = shifted(right, rodas.C31 / h, u1)
    u3 = solve(left, shifted(right, rodas.C32 / h, u2))

    s4 = shifted(y, rodas.A41, u1)
    s4 = shifted(s4, rodas.A42, u2)
    s4 = shifted(s4, rodas.A43, u3)
    right = shifted(rates(time + rodas.T4 * h, s4, mode, par), h * rodas.D4, ft)
    right = shifted(right, rodas.C41 / h, u1)
    right = shifted(right, rodas.C42 / h, u2)
    u4 = solve(left, shifted(right, rodas.C43 / h, u3))

    s5 = shifted(y, rodas.A51, u1)
    s5 = shifted(s5, rodas.A52, u2)
    s5 = shifted(s5, rodas.A53, u3)
    s5 = shifted(s5, rodas.A54, u4)
    right = shifted(rates(time + h, s5, mode, par), rodas.C51 / h, u1)
    right = shifted(right, rodas.C52 / h, u2)
    right = shifted(right, rodas.C53 / h, u3)
    u5 = solve(left, shifted(right, rodas.C54 / h, u4))

    s6 = shifted(s5, 1.0, u5)
    right = shifted(rates(time + h, s6, mode, par), rodas.C61 / h, u1)
    right = shifted(right, rodas.C62 / h, u2)
    right = shifted(right, rodas.C63 / h, u3)
    right = shifted(right, rodas.C64 / h, u4)
    u6 = solve(left, shifted(right, rodas.C65 / h, u5))

    end = shifted(s6, 1.0, u6)  # u6 is the error: the embedded solution is s6
    parts = 6.0 if mode[at.DIRECTION] != 0.0 else 4.0
    wrong = math.sqrt(spread(u6, NOTHING, sizes(y, end, par)) / parts)
    k7 = rates(time + h, end, mode, par)
    return Step(end, k7, wrong, 0.0, (y, s2, s3, s4, s5, s6), (u1, u2, u3, u4, u5, u6))
