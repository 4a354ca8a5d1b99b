"""How long closed-in air holds a piston while it leaks away."""

from __future__ import annotations

import math

from actuator.air.gas import R_AIR
from actuator.errors import Refusal
from actuator.flow.scalar import LINEAR_FROM, passage

CRITICAL_RATIO, SUBSONIC_INDEX = 0.5, 0.5
"""Critical ratio and subsonic index of a leak; Source ``practice``. [1]"""
NO_LEAK = Refusal("no leak is given, so the time is not known", "holding.seal_leak_c")
NEVER = Refusal("it does not start, even with no air left")


def time_to_fall(
    p_start: float, p_end: float, p_other: float, volume: float, other_volume: float, *, temp: float, conductance: float
) -> float:
    r"""Time in which a closed chamber leaks from one pressure to another, isothermal.

    Parameters
    ----------
    p_start, p_end : float
        Pressures, absolute, the second above what both sides settle at. [Pa]
    p_other : float
        Pressure that it leaks to, absolute, at the start. [Pa]
    volume : float
        Of the chamber. [m³]
    other_volume : float
        That it leaks into; infinite for the atmosphere. [m³]
    temp : float
        Of the air, which stays. [K]
    conductance : float
        Sonic conductance of the leak. [m³/(s·Pa)]

    Returns
    -------
    float
        [s]

    Notes
    -----
    .. math:: t = \frac{V}{R T} \int_{p_2}^{p_1} \frac{dp}{q(p, p_o)}, \quad
              p_o = p_{o,1} + (p_1 - p) V / V_o

    While choked, :math:`t = V/(R \sqrt{T T_0} C \rho_0) \ln(p_1/p_2)`.
    """
    from scipy.integrate import quad

    gain = volume / other_volume

    def slowness(p: float) -> float:
        other = p_other + (p_start - p) * gain
        return 1.0 / passage(p, other, temp, conductance, CRITICAL_RATIO, SUBSONIC_INDEX)

    kinks = [(p_other + p_start * gain) / (ratio + gain) for ratio in (CRITICAL_RATIO, LINEAR_FROM)]
    inside = [p for p in kinks if p_end < p < p_start]
    whole, _ = quad(slowness, p_end, p_start, points=inside or None, epsrel=1e-9, limit=200)
    return float(volume / (R_AIR * temp) * whole)


def start_of_motion(
    *,
    p_held: float,
    p_other: float,
    volume: float,
    other_volume: float | None,
    rise: float,
    other_rise: float,
    pressing: float,
    p_ambient: float,
    temp: float,
    conductance: float | None,
) -> float | Refusal:
    """Time until a piston that closed-in air holds at its end starts to leave it.

    Parameters
    ----------
    p_held, p_other, p_ambient : float
        Pressure of the chamber that holds, of the other one, and outside, absolute. [Pa]
    volume : float
        Of the chamber that holds. [m³]
    other_volume : float or None
        Of the other chamber where it is closed in too. [m³]
    rise, other_rise : float
        By how much the force towards the end rises per pressure in either chamber. [m²]
    pressing : float
        Force towards the end at the start, plus what friction and lock hold. [N]
    temp : float
        Of the air. [K]
    conductance : float or None
        Of the leak out of the chamber; None where it is not known. [m³/(s·Pa)]

    Returns
    -------
    float or Refusal
        Piston fixed, temperature constant; the leak taken to the atmosphere or, where the other chamber is closed
        in, across the piston, whichever lets it start sooner. Refused where it never starts, and where the leak is
        not known. [s]
    """
    ways = []
    lowest = p_held - pressing / rise
    if lowest > p_ambient:
        ways.append((lowest, p_ambient, math.inf))
    if other_volume is not None:
        gain = volume / other_volume
        lowest = p_held - pressing / (rise - other_rise * gain)
        if lowest > (p_held * gain + p_other) / (gain + 1.0):
            ways.append((lowest, p_other, other_volume))
    if not ways:
        return NEVER
    if conductance is None:
        return NO_LEAK
    return min(
        time_to_fall(p_held, lowest, beyond, volume, room, temp=temp, conductance=conductance)
        for lowest, beyond, room in ways
    )
