"""One step of either embedded pair: explicit 5(4) for smooth motion, linearly implicit 4(3) for what is stiff.

The state is a tuple, a step's stages are kept: :mod:`actuator.stroke.ledger` integrates over them with the same
weights, so that linear balances (mass, energy) close to rounding.
"""

from __future__ import annotations

import math
from typing import NamedTuple

from actuator.stroke import dopri, rodas
from actuator.stroke import layout as at
from actuator.stroke.equations import rates
from actuator.stroke.slopes import Slopes, solve, system
from actuator.stroke.states import NOTHING, Row, State, scaled, shifted, sizes, spread

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

    error = scaled(h * dopri.E1, k1)
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


def implicit_step(time: float, h: float, y: State, k1: State, slopes: Slopes, mode: Row, par: Row) -> Step:
    """RODAS 4(3) step, L-stable, from ``y``, where the rates are ``k1``; coefficients in :mod:`rodas`.

    What is known before a stage's rates is summed before them, so that the processor need not wait.
    """
    per_h = 1.0 / h
    left = system(per_h * (1.0 / rodas.GAMMA), slopes.jacobian)
    ft = slopes.by_time

    u1 = solve(left, shifted(k1, h * rodas.D1, ft))

    s2 = shifted(y, rodas.A21, u1)
    known = scaled(h * rodas.D2, ft)
    known = shifted(known, rodas.C21 * per_h, u1)
    u2 = solve(left, shifted(known, 1.0, rates(time + rodas.T2 * h, s2, mode, par)))

    s3 = shifted(y, rodas.A31, u1)
    s3 = shifted(s3, rodas.A32, u2)
    known = scaled(h * rodas.D3, ft)
    known = shifted(known, rodas.C31 * per_h, u1)
    known = shifted(known, rodas.C32 * per_h, u2)
    u3 = solve(left, shifted(known, 1.0, rates(time + rodas.T3 * h, s3, mode, par)))

    s4 = shifted(y, rodas.A41, u1)
    s4 = shifted(s4, rodas.A42, u2)
    s4 = shifted(s4, rodas.A43, u3)
    known = scaled(h * rodas.D4, ft)
    known = shifted(known, rodas.C41 * per_h, u1)
    known = shifted(known, rodas.C42 * per_h, u2)
    known = shifted(known, rodas.C43 * per_h, u3)
    u4 = solve(left, shifted(known, 1.0, rates(time + rodas.T4 * h, s4, mode, par)))

    s5 = shifted(y, rodas.A51, u1)
    s5 = shifted(s5, rodas.A52, u2)
    s5 = shifted(s5, rodas.A53, u3)
    s5 = shifted(s5, rodas.A54, u4)
    known = scaled(rodas.C51 * per_h, u1)
    known = shifted(known, rodas.C52 * per_h, u2)
    known = shifted(known, rodas.C53 * per_h, u3)
    known = shifted(known, rodas.C54 * per_h, u4)
    u5 = solve(left, shifted(known, 1.0, rates(time + h, s5, mode, par)))

    s6 = shifted(s5, 1.0, u5)
    known = scaled(rodas.C61 * per_h, u1)
    known = shifted(known, rodas.C62 * per_h, u2)
    known = shifted(known, rodas.C63 * per_h, u3)
    known = shifted(known, rodas.C64 * per_h, u4)
    known = shifted(known, rodas.C65 * per_h, u5)
    u6 = solve(left, shifted(known, 1.0, rates(time + h, s6, mode, par)))

    end = shifted(s6, 1.0, u6)  # u6 is the error: the embedded solution is s6
    parts = 6.0 if mode[at.DIRECTION] != 0.0 else 4.0
    wrong = math.sqrt(spread(u6, NOTHING, sizes(y, end, par)) / parts)
    k7 = rates(time + h, end, mode, par)
    return Step(end, k7, wrong, 0.0, (y, s2, s3, s4, s5, s6), (u1, u2, u3, u4, u5, u6))
