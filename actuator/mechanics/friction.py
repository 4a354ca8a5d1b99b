"""Friction of a sliding seal while it moves: the formula that the kernel and the doors share."""

from __future__ import annotations

import math

_FADED = 7.0
"""Speed over the Stribeck speed beyond which exp(-(v/v_s)²) < 1e-21 is lost in rounding. [1]"""


def running(speed: float, breakaway: float, coulomb: float, viscous: float, stribeck_speed: float) -> float:
    r"""Friction force at a speed, against the motion.

    Parameters
    ----------
    speed : float
        Magnitude of the speed, not negative. [m/s]
    breakaway, coulomb : float
        Friction at the very start of motion and running friction. [N]
    viscous : float
        Friction per speed. [N·s/m]
    stribeck_speed : float
        Speed over which the first falls to the second, above zero. [m/s]

    Returns
    -------
    float
        Magnitude of the friction force. [N]

    Notes
    -----
    .. math:: F = F_c + (F_b - F_c) e^{-(v/v_s)^2} + k v

    References
    ----------
    B. Armstrong-Hélouvry, Control of Machines with Friction, 1991 (form of the curve, from memory).
    """
    steady = coulomb + viscous * speed
    if speed > _FADED * stribeck_speed:
        return steady
    share = speed / stribeck_speed
    return steady + (breakaway - coulomb) * math.exp(-share * share)


def running_slope(speed: float, breakaway: float, coulomb: float, viscous: float, stribeck_speed: float) -> float:
    """Derivative of :func:`running` by the speed; parameters as there. [N·s/m]"""
    share = speed / stribeck_speed
    return viscous - (breakaway - coulomb) * 2.0 * share / stribeck_speed * math.exp(-share * share)
