"""Flow through one element, one float at a time: the formula that kernel and array doors share.

Plain typed Python that also compiles: floats, ``math`` and ifs only, no division by zero left to chance.
"""

from __future__ import annotations

import math

from actuator.air.gas import RHO_ISO6358, TEMP_ANR

LINEAR_FROM = 0.999
"""Pressure ratio above which the flow falls linearly to zero. [1] Keeps the slope finite (ISO 6358-1)."""


def passage(p_up: float, p_down: float, temp_up: float, c: float, b: float, m: float) -> float:
    r"""Mass flow from the higher to the lower pressure through one element.

    Parameters
    ----------
    p_up, p_down : float
        Upstream and downstream pressure, absolute. [Pa]
    temp_up : float
        Upstream stagnation temperature. [K]
    c : float
        Sonic conductance, referred to ANR; zero for a shut element. [m³/(s·Pa)]
    b, m : float
        Critical back-pressure ratio, below 0.999, and subsonic index. [1]

    Returns
    -------
    float
        Mass flow, zero where ``p_down`` ≥ ``p_up``. [kg/s]

    Notes
    -----
    With r = p₂/p₁:

    .. math:: q_m = C p_1 \rho_0 \sqrt{T_0/T_1} [1 - ((r - b)/(1 - b))^2]^m

    the bracket being 1 for r ≤ b, and for r > 0.999 the value at 0.999 times (1 - r)/0.001. The bracket is taken
    under the root of T₀/T₁, as its power 2m.

    References
    ----------
    ISO 6358-1:2013, Pneumatic fluid power (from memory; see ``sources.ISO_6358``).
    """
    if c <= 0.0 or p_down >= p_up:
        return 0.0
    linear = 1.0
    if p_down > LINEAR_FROM * p_up:
        linear = (p_up - p_down) / ((1.0 - LINEAR_FROM) * p_up)
        p_down = LINEAR_FROM * p_up
    bracket = 1.0
    if p_down > b * p_up:
        share = (p_down - b * p_up) / ((1.0 - b) * p_up)
        bracket = 1.0 - share * share
        if m != 0.5:
            bracket = math.exp(2.0 * m * math.log(bracket))
    return c * p_up * RHO_ISO6358 * linear * math.sqrt(TEMP_ANR / temp_up * bracket)


def passage_slope(flow: float, p_up: float, p_down: float, temp_up: float, c: float, b: float, m: float) -> float:
    """Derivative of :func:`passage` by the downstream pressure, never above zero. [kg/(s·Pa)]

    ``flow`` is what :func:`passage` gives for the other parameters, ``p_down`` ≤ ``p_up``. The flow is of degree one
    in both pressures, so that the derivative by the upstream pressure is (flow - p₂·slope)/p₁ (Euler).
    """
    if p_down > LINEAR_FROM * p_up:
        return -passage(p_up, LINEAR_FROM * p_up, temp_up, c, b, m) / ((1.0 - LINEAR_FROM) * p_up)
    if p_down <= b * p_up:
        return 0.0
    width = (1.0 - b) * p_up
    share = (p_down - b * p_up) / width
    return -2.0 * m * share * flow / ((1.0 - share * share) * width)
