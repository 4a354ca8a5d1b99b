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

    the bracket being 1 for r ≤ b, and for r > 0.999 the value at 0.999 times (1 - r)/0.001.

    References
    ----------
    ISO 6358-1:2013, Pneumatic fluid power (from memory; see ``sources.ISO_6358``).
    """
    if c <= 0.0 or p_down >= p_up:
        return 0.0
    choked = c * p_up * RHO_ISO6358 * math.sqrt(TEMP_ANR / temp_up)
    r = p_down / p_up
    if r <= b:
        return choked
    linear = 1.0
    if r > LINEAR_FROM:
        linear = (1.0 - r) / (1.0 - LINEAR_FROM)
        r = LINEAR_FROM
    share = (r - b) / (1.0 - b)
    bracket = 1.0 - share * share
    if m == 0.5:
        return float(choked * linear * math.sqrt(bracket))
    return float(choked * linear * math.exp(m * math.log(bracket)))
