"""The extended rod as a beam: sag of its tip, and what piston and gland have to carry."""

from __future__ import annotations

import math
from dataclasses import dataclass

from actuator.air.gas import GRAVITY
from actuator.mechanics.buckling import BORES, E_STEEL, SHARE_OF_STROKE

DENSITY_STEEL = 7850.0
"""Density of rod steel; Source ``practice``. [kg/m³]"""
FRONT = 1.0
"""Length between gland and rod end when retracted where the barrel is held behind it, in bores. [1]"""


@dataclass(frozen=True, slots=True, kw_only=True)
class ExtendedRod:
    """The extended rod under its own weight and a side load."""

    overhang: float
    """From the gland to the rod's end. [m]"""
    sag: float
    """Of the rod's end, as if nothing guided it. [m]"""
    bearing_load: float
    """Force on the gland. [N]"""


def overhang(mounting: str, bore: float, stroke: float, closed_length: float) -> float:
    """Length of the extended rod between gland and rod end.

    Parameters
    ----------
    mounting : str
        How the barrel is fixed.
    bore, stroke, closed_length : float
        Inside diameter of the barrel, way of the piston, mounting to rod end when retracted. [m]

    Returns
    -------
    float
        Stroke and closed length; of mountings behind the gland without the barrel, which is taken as the part
        of the stroke and of the bores that lies behind it (default closed length less one bore); never
        below the stroke. [m]
    """
    behind = SHARE_OF_STROKE[mounting] * stroke + (BORES[mounting] - FRONT) * bore
    return stroke + max(closed_length - behind, 0.0)


def rod_weight(rod: float, inclination: float) -> float:
    """Weight of a solid steel rod across its axis, per length.

    Parameters
    ----------
    rod : float
        Diameter. [m]
    inclination : float
        Above the horizontal. [rad]

    Returns
    -------
    float
        ρ·π/4·d²·g·cos α. [N/m]
    """
    return DENSITY_STEEL * math.pi / 4.0 * rod**2 * GRAVITY * math.cos(inclination)


def tip_sag(*, load: float, weight: float, length: float, inertia: float, modulus: float = E_STEEL) -> float:
    r"""Sag at the free end of a beam that is held at the other.

    Parameters
    ----------
    load : float
        Force across the beam at its free end. [N]
    weight : float
        Force across the beam per length, everywhere. [N/m]
    length : float
        From the hold to the free end. [m]
    inertia : float
        Second moment of area. [m**4]
    modulus : float
        Young's modulus. [Pa]

    Returns
    -------
    float
        [m]

    Notes
    -----
    .. math:: \delta = \frac{q L^4}{8 E I} + \frac{F L^3}{3 E I}

    References
    ----------
    .. [1] Bansal, A Textbook of Strength of Materials, problems 13.1 and 13.3 (excerpt).
    """
    stiffness = modulus * inertia
    return weight * length**4 / (8.0 * stiffness) + load * length**3 / (3.0 * stiffness)


def gland_load(*, load: float, weight: float, length: float, bearing_length: float) -> float:
    r"""Force that the gland carries where piston and gland hold an overhanging rod.

    Parameters
    ----------
    load : float
        Force across the rod at its end. [N]
    weight : float
        Force across the rod per length. [N/m]
    length : float
        From the gland to the rod's end. [m]
    bearing_length : float
        From the piston to the gland, above zero. [m]

    Returns
    -------
    float
        [N]

    Notes
    -----
    Moments about the piston, with a the bearing length:

    .. math:: R = F \frac{L + a}{a} + q \frac{(L + a)^2}{2 a}

    References
    ----------
    .. [1] Beam over two supports with one overhang, in any table of beams (seen).
    """
    whole = length + bearing_length
    return (load + 0.5 * weight * whole) * whole / bearing_length


def extended_rod(
    *,
    rod: float,
    bore: float,
    stroke: float,
    mounting: str,
    closed_length: float,
    bearing_length: float,
    inclination: float = 0.0,
    side_load: float = 0.0,
) -> ExtendedRod:
    """Overhang, sag and load on the gland of an extended rod of solid steel.

    Parameters
    ----------
    rod, bore, stroke : float
        Diameters and way of the piston. [m]
    mounting : str
        How the barrel is fixed.
    closed_length : float
        Mounting to rod end, retracted. [m]
    bearing_length : float
        Piston to gland, extended. [m]
    inclination : float
        Above the horizontal. [rad]
    side_load : float
        Across the rod at its end, besides its own weight. [N]

    Returns
    -------
    ExtendedRod
    """
    length = overhang(mounting, bore, stroke, closed_length)
    weight = rod_weight(rod, inclination)
    return ExtendedRod(
        overhang=length,
        sag=tip_sag(load=side_load, weight=weight, length=length, inertia=math.pi / 64.0 * rod**4),
        bearing_load=gland_load(load=side_load, weight=weight, length=length, bearing_length=bearing_length),
    )
