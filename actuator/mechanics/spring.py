"""The bore of a single-acting cylinder, whose air works against a spring."""

from __future__ import annotations

import math

from actuator.errors import Refusal


def required_bore_against_spring(
    *,
    p_supply: float,
    p_ambient: float,
    load: float,
    spring_force: float,
    reserve: float = 0.0,
    friction_share: float = 0.05,
    rod_ratio: float = 0.0,
) -> float | Refusal:
    r"""Smallest bore whose air carries load, reserve and friction over a given spring.

    Parameters
    ----------
    p_supply, p_ambient : float
        Supply and ambient pressure, absolute. [Pa]
    load : float
        Load that opposes the air stroke. [N]
    spring_force : float
        Force of the spring at the end of the air stroke; it does not grow with the bore. [N]
    reserve : float
        Wanted force reserve, share of the load. [1]
    friction_share : float
        Running friction over the thrust of the air; 5 % is common practice, no source. [1]
    rod_ratio : float
        Rod over bore, kept in proportion, where the air acts on the rod's side; else 0. [1]

    Returns
    -------
    float or Refusal
        Bore; refused without load, and where no bore can do it. [m]

    Notes
    -----
    With friction share f, rod ratio k and reserve ρ:

    .. math:: \frac{\pi}{4} D^2 = \frac{F (1 + \rho) + F_{spring}}{(p_s - p_0)(1 - k^2)(1 - f)}
    """
    if load <= 0.0:
        return Refusal("no load")
    pressure = (p_supply - p_ambient) * (1.0 - rod_ratio**2) * (1.0 - friction_share)
    if pressure <= 0.0:
        return Refusal("the supply pressure leaves no force over friction", "supply_pressure")
    return math.sqrt(4.0 / math.pi * (load * (1.0 + reserve) + spring_force) / pressure)
