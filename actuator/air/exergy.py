"""Exergy of compressed air: what it could do at best in the surroundings it is used in."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

from actuator.air.gas import CP, CV, R_AIR

Array = NDArray[np.float64]


def flow_exergy(p: ArrayLike, temp: ArrayLike, p_ambient: ArrayLike, temp_ambient: ArrayLike) -> Array:
    r"""Exergy that flowing air carries, kinetic energy left out.

    Parameters
    ----------
    p, temp : array_like
        Pressure, absolute, and temperature of the air. [Pa], [K]
    p_ambient, temp_ambient : array_like
        Dead state: pressure, absolute, and temperature of the surroundings. [Pa], [K]

    Returns
    -------
    ndarray
        Flow exergy per mass. [J/kg]

    Notes
    -----
    .. math:: \psi = c_p(T - T_0) - T_0[c_p \ln(T/T_0) - R \ln(p/p_0)]

    References
    ----------
    .. [1] Cengel, Boles, Thermodynamics: An Engineering Approach, chapter on exergy (excerpt).
    """
    p, temp = np.asarray(p, dtype=np.float64), np.asarray(temp, dtype=np.float64)
    p0, t0 = np.asarray(p_ambient, dtype=np.float64), np.asarray(temp_ambient, dtype=np.float64)
    entropy = CP * np.log(temp / t0) - R_AIR * np.log(p / p0)
    result: Array = CP * (temp - t0) - t0 * entropy
    return result


def stored_exergy(
    p: ArrayLike, temp: ArrayLike, volume: ArrayLike, p_ambient: ArrayLike, temp_ambient: ArrayLike
) -> Array:
    r"""Exergy of the air shut in a vessel or a chamber.

    Parameters
    ----------
    p, temp, volume : array_like
        Pressure, absolute, temperature and volume of the air. [Pa], [K], [m³]
    p_ambient, temp_ambient : array_like
        Dead state: pressure, absolute, and temperature of the surroundings. [Pa], [K]

    Returns
    -------
    ndarray
        Stored exergy, zero in the dead state, never negative. [J]

    Notes
    -----
    With m = pV/(RT):

    .. math:: A = m[c_v(T - T_0) - T_0(c_p \ln(T/T_0) - R \ln(p/p_0)) - R T_0] + p_0 V

    References
    ----------
    .. [1] Cengel, Boles, Thermodynamics: An Engineering Approach, example 8-7, p. 438 (excerpt).
    """
    p, temp = np.asarray(p, dtype=np.float64), np.asarray(temp, dtype=np.float64)
    p0, t0 = np.asarray(p_ambient, dtype=np.float64), np.asarray(temp_ambient, dtype=np.float64)
    volume = np.asarray(volume, dtype=np.float64)
    mass = p * volume / (R_AIR * temp)
    entropy = CP * np.log(temp / t0) - R_AIR * np.log(p / p0)
    result: Array = mass * (CV * (temp - t0) - t0 * entropy - R_AIR * t0) + p0 * volume
    return result


def air_power(p: ArrayLike, flow: ArrayLike, p_ambient: ArrayLike) -> Array:
    """Exergy flow of compressed air at ambient temperature.

    Parameters
    ----------
    p : array_like
        Pressure of the compressed air, absolute. [Pa]
    flow : array_like
        Volume flow of the same air at ambient pressure and temperature. [m³/s]
    p_ambient : array_like
        Ambient pressure, absolute. [Pa]

    Returns
    -------
    ndarray
        p₀·Q₀·ln(p/p₀). [W]

    References
    ----------
    .. [1] Cai, Kagawa et al., the "air power" of pneumatic systems (from memory).
    """
    p0 = np.asarray(p_ambient, dtype=np.float64)
    result: Array = p0 * np.asarray(flow, dtype=np.float64) * np.log(np.asarray(p, dtype=np.float64) / p0)
    return result


def unused_share(p: ArrayLike, p_ambient: ArrayLike) -> Array:
    r"""Share of the supplied exergy that a full-pressure stroke vents without using it.

    Parameters
    ----------
    p : array_like
        Supply pressure, absolute, not below ambient. [Pa]
    p_ambient : array_like
        Ambient pressure, absolute. [Pa]

    Returns
    -------
    ndarray
        0 at ambient pressure, 0.53 at 6 bar absolute. Isothermal, no friction, no dead volume. [1]

    Notes
    -----
    The stroke draws pV/(RT) of air worth pV·ln(p/p₀) and gives (p − p₀)V:

    .. math:: 1 - (p - p_0)/(p \ln(p/p_0))
    """
    p0 = np.asarray(p_ambient, dtype=np.float64)
    x = (np.asarray(p, dtype=np.float64) - p0) / p0
    safe = np.where(x == 0.0, 1.0, x)
    result: Array = np.where(x == 0.0, 0.0, 1.0 - safe / ((1.0 + safe) * np.log1p(safe)))
    return result
