"""Moist air: humidity ratio, dew point, and the water that falls out when air is compressed and cooled."""

from __future__ import annotations

import math

import numpy as np
from numpy.typing import ArrayLike, NDArray

from actuator.air.gas import R_AIR
from actuator.air.saturation import (
    LIQUID,
    TRIPLE_PRESSURE,
    TRIPLE_TEMP,
    saturation_pressure_ice,
    saturation_pressure_scalar,
)

Array = NDArray[np.float64]

R_VAPOUR = 461.526
"""Gas constant of water vapour; Source ``iapws_if97``. [J/(kg*K)]"""
MASS_RATIO = R_AIR / R_VAPOUR
"""Molar mass of water over that of dry air, 0.62196. [1]"""


def saturation_pressure(temp: ArrayLike) -> Array:
    r"""Vapour pressure of water, over ice below the triple point.

    Parameters
    ----------
    temp : array_like
        Temperature, 50 K to 647 K. [K]

    Returns
    -------
    ndarray
        Saturation pressure, same shape. The presence of air (below 0.5 % at 1 bar) is neglected. [Pa]

    References
    ----------
    .. [1] IAPWS R7-97(2012), Industrial Formulation 1997, region 4, eq. 30.
    .. [2] IAPWS R14-08(2011), Melting and sublimation curves of ordinary water, eq. 6.
    """
    result: Array = np.vectorize(saturation_pressure_scalar, otypes=[np.float64])(temp)
    return result


def humidity_ratio(p: ArrayLike, temp: ArrayLike, humidity: ArrayLike) -> Array:
    r"""Mass of water vapour per mass of dry air.

    Parameters
    ----------
    p : array_like
        Pressure of the moist air, absolute. [Pa]
    temp : array_like
        Temperature. [K]
    humidity : array_like
        Relative humidity, 0 to 1. [1]

    Returns
    -------
    ndarray
        Humidity ratio, kg of vapour per kg of dry air; infinite where the vapour pressure reaches ``p``. [1]

    Notes
    -----
    .. math:: W = 0.62196\, p_v/(p - p_v), \quad p_v = \varphi\, p_s(T)

    References
    ----------
    .. [1] ASHRAE Handbook Fundamentals (2017), chapter 1, eq. 20 (from memory).
    """
    vapour = np.asarray(humidity, dtype=np.float64) * saturation_pressure(temp)
    dry = np.asarray(p, dtype=np.float64) - vapour
    with np.errstate(divide="ignore", invalid="ignore"):
        result: Array = np.where(dry > 0.0, MASS_RATIO * vapour / dry, np.inf)
    return result


def vapour_pressure(p: ArrayLike, ratio: ArrayLike) -> Array:
    """Partial pressure of the vapour in air of a known humidity ratio.

    Parameters
    ----------
    p : array_like
        Pressure of the moist air, absolute. [Pa]
    ratio : array_like
        Humidity ratio, kg of vapour per kg of dry air. [1]

    Returns
    -------
    ndarray
        Vapour pressure. [Pa]
    """
    ratio = np.asarray(ratio, dtype=np.float64)
    result: Array = np.asarray(p, dtype=np.float64) * ratio / (MASS_RATIO + ratio)
    return result


def _dew_point(p_vapour: float) -> float:
    if p_vapour <= 0.0:
        return 0.0
    if p_vapour >= TRIPLE_PRESSURE:
        n1, n2, n3, n4, n5, n6, n7, n8, n9, n10 = LIQUID
        beta = math.sqrt(math.sqrt(p_vapour * 1e-6))  # IF97 eq. 29a
        E = beta * beta + n3 * beta + n6
        F = n1 * beta * beta + n4 * beta + n7
        G = n2 * beta * beta + n5 * beta + n8
        D = 2.0 * G / (-F - math.sqrt(F * F - 4.0 * E * G))
        return 0.5 * (n10 + D - math.sqrt((n10 + D) ** 2 - 4.0 * (n9 + n10 * D)))  # IF97 eq. 31
    low, high = 50.0, TRIPLE_TEMP
    while high - low > 1e-9:
        middle = 0.5 * (low + high)
        low, high = (middle, high) if saturation_pressure_ice(middle) < p_vapour else (low, middle)
    return 0.5 * (low + high)


def dew_point(p_vapour: ArrayLike) -> Array:
    """Temperature at which vapour of this partial pressure begins to condense, or to freeze out.

    Parameters
    ----------
    p_vapour : array_like
        Partial pressure of the water vapour. [Pa]

    Returns
    -------
    ndarray
        Dew point, below the triple point the frost point; 0 for perfectly dry air. [K]

    References
    ----------
    .. [1] IAPWS R7-97(2012), region 4, eq. 31; below the triple point eq. 6 of IAPWS R14-08(2011), inverted.
    """
    result: Array = np.vectorize(_dew_point, otypes=[np.float64])(p_vapour)
    return result


def pressure_dew_point(p: ArrayLike, ratio: ArrayLike) -> Array:
    """Dew point of compressed air at its own pressure.

    Parameters
    ----------
    p : array_like
        Pressure of the compressed air, absolute. [Pa]
    ratio : array_like
        Humidity ratio, kg of vapour per kg of dry air. [1]

    Returns
    -------
    ndarray
        Pressure dew point. [K]
    """
    return dew_point(vapour_pressure(p, ratio))


def condensate(ratio_in: ArrayLike, p: ArrayLike, temp: ArrayLike) -> Array:
    """Water that falls out when air is compressed and cooled.

    Parameters
    ----------
    ratio_in : array_like
        Humidity ratio that the air brought along, kg of vapour per kg of dry air. [1]
    p : array_like
        Pressure after compression, absolute. [Pa]
    temp : array_like
        Temperature after cooling. [K]

    Returns
    -------
    ndarray
        Liquid water per kg of dry air, never negative. [1]
    """
    result: Array = np.maximum(np.asarray(ratio_in, dtype=np.float64) - humidity_ratio(p, temp, 1.0), 0.0)
    return result
