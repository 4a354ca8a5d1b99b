"""Flow through one element, for arrays: ISO 6358 beside the ideal nozzle that holes are reckoned with."""

from __future__ import annotations

import math

import numpy as np
from numpy.typing import ArrayLike, NDArray

from actuator.air.gas import GAMMA, R_AIR
from actuator.flow.scalar import passage

Array = NDArray[np.float64]

CRITICAL_RATIO_IDEAL = (2.0 / (GAMMA + 1.0)) ** (GAMMA / (GAMMA - 1.0))
"""Pressure ratio below which an ideal nozzle is choked, 0.5283; Source ``cengel_cimbala``. [1]"""


def choked_constant(*, gamma: float = GAMMA, gas_constant: float = R_AIR) -> float:
    r"""Mass flow of a choked ideal nozzle times √T over (area · pressure).

    Parameters
    ----------
    gamma : float
        Isentropic exponent, above 1. [1]
    gas_constant : float
        [J/(kg·K)]

    Returns
    -------
    float
        0.0404 for air. [K**0.5*s/m]

    Notes
    -----
    .. math:: \sqrt{\gamma/R}\,(2/(\gamma + 1))^{(\gamma + 1)/(2(\gamma - 1))}

    References
    ----------
    .. [1] Murugaperumal, Gas Dynamics and Jet Propulsion, 1st ed. (2005), example 1.39, p. 68 (excerpt).
    """
    exponent = (gamma + 1.0) / (2.0 * (gamma - 1.0))
    return math.sqrt(gamma / gas_constant) * math.pow(2.0 / (gamma + 1.0), exponent)


def mass_flow(
    p_up: ArrayLike,
    p_down: ArrayLike,
    temp_up: ArrayLike,
    *,
    conductance: float,
    critical_ratio: float,
    subsonic_index: float = 0.5,
) -> Array:
    r"""Mass flow from the higher to the lower pressure, choked or subsonic.

    Parameters
    ----------
    p_up, p_down : array_like
        Upstream and downstream pressure, absolute. [Pa]
    temp_up : array_like
        Upstream stagnation temperature. [K]
    conductance : float
        Sonic conductance C, referred to ANR. [m³/(s·Pa)]
    critical_ratio, subsonic_index : float
        Critical back-pressure ratio b, below 0.999, and subsonic index m. [1]

    Returns
    -------
    ndarray
        Mass flow, shape of the first three broadcast together; zero where ``p_down`` ≥ ``p_up``: flow never
        runs backwards here. [kg/s]

    Notes
    -----
    The formula is :func:`actuator.flow.scalar.passage`, with r = p₂/p₁ and the bracket 1 for r ≤ b:

    .. math:: q_m = C p_1 \rho_0 \sqrt{T_0/T_1} [1 - ((r - b)/(1 - b))^2]^m

    References
    ----------
    .. [1] ISO 6358-1:2013, Pneumatic fluid power, Part 1 (from memory).
    """
    door = np.vectorize(passage, otypes=[np.float64])
    result: Array = door(p_up, p_down, temp_up, conductance, critical_ratio, subsonic_index)
    return result


def ideal_nozzle_flow(
    p_up: ArrayLike,
    p_down: ArrayLike,
    temp_up: ArrayLike,
    *,
    area: float,
    discharge: float = 1.0,
    gamma: float = GAMMA,
    gas_constant: float = R_AIR,
) -> Array:
    r"""Mass flow through an ideal nozzle, or through a hole with a discharge coefficient.

    Parameters
    ----------
    p_up, p_down : array_like
        Upstream stagnation pressure and downstream pressure, absolute. [Pa]
    temp_up : array_like
        Upstream stagnation temperature. [K]
    area : float
        Narrowest cross-section. [m²]
    discharge : float
        Discharge coefficient: 1 ideal, 0.97 well rounded, 0.61 to 0.65 sharp-edged. [1]
    gamma, gas_constant : float
        Isentropic exponent [1] and gas constant [J/(kg·K)].

    Returns
    -------
    ndarray
        Mass flow, zero where ``p_down`` ≥ ``p_up``. [kg/s]

    Notes
    -----
    With r = p₂/p₁, not below the critical ratio:

    .. math:: q_m = C_d A \frac{p_1}{\sqrt{R T_1}} \sqrt{\frac{2\gamma}{\gamma - 1}
              \left(r^{2/\gamma} - r^{(\gamma + 1)/\gamma}\right)}

    References
    ----------
    .. [1] Fox, McDonald, Introduction to Fluid Mechanics, example 12.2, p. 634 (excerpt).
    .. [2] Isermann, Combustion Engine Diagnosis (2017), p. 252, for its highest value 0.484 (seen).
    """
    p_up, p_down = np.asarray(p_up, dtype=np.float64), np.asarray(p_down, dtype=np.float64)
    critical = (2.0 / (gamma + 1.0)) ** (gamma / (gamma - 1.0))
    r = np.clip(p_down / p_up, critical, 1.0)
    k = (gamma - 1.0) / gamma
    # r^(2/γ) − r^((γ+1)/γ) = r^(2/γ)·(1 − r^k), the bracket by expm1 so that r near 1 keeps its digits
    bracket = r ** (2.0 / gamma) * -np.expm1(k * np.log(r))
    outflow = np.sqrt(2.0 / k * bracket)
    result: Array = discharge * area * p_up * outflow / np.sqrt(gas_constant * np.asarray(temp_up))
    return result
