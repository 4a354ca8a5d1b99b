"""Saturation pressure of water: over liquid (IAPWS-IF97) and over ice (IAPWS 2011), scalar."""

from __future__ import annotations

import math

TRIPLE_TEMP = 273.16
"""Triple point of water; Source ``iapws_ice``. [K]"""
TRIPLE_PRESSURE = 611.657
"""Pressure at the triple point of water; Source ``iapws_ice``. [Pa]"""

LIQUID = (
    0.11670521452767e4,
    -0.72421316703206e6,
    -0.17073846940092e2,
    0.12020824702470e5,
    -0.32325550322333e7,
    0.14915108613530e2,
    -0.48232657361591e4,
    0.40511340542057e6,
    -0.23855557567849,
    0.65017534844798e3,
)
"""Coefficients n1 to n10 of the saturation line; Source ``iapws_if97``. [1]"""
ICE = ((-0.212144006e2, 0.333333333e-2), (0.273203819e2, 0.120666667e1), (-0.610598130e1, 0.170333333e1))
"""Coefficients and exponents of the sublimation line; Source ``iapws_ice``. [1]"""


def saturation_pressure_liquid(temp: float) -> float:
    """Vapour pressure over liquid water, 273.15 K to 647 K; one temperature. [Pa]"""
    n1, n2, n3, n4, n5, n6, n7, n8, n9, n10 = LIQUID
    theta = temp + n9 / (temp - n10)  # IF97 eq. 29b
    A = theta * theta + n1 * theta + n2
    B = n3 * theta * theta + n4 * theta + n5
    C = n6 * theta * theta + n7 * theta + n8
    return 1e6 * (2.0 * C / (-B + math.sqrt(B * B - 4.0 * A * C))) ** 4  # IF97 eq. 30


def saturation_pressure_ice(temp: float) -> float:
    """Vapour pressure over ice, 50 K to 273.16 K; one temperature. [Pa]"""
    theta = temp / TRIPLE_TEMP
    exponent = sum(a * theta**b for a, b in ICE) / theta  # IAPWS R14-08 eq. 6
    return TRIPLE_PRESSURE * math.exp(exponent)


def saturation_pressure_scalar(temp: float) -> float:
    """Vapour pressure over the stable phase, ice below the triple point; one temperature. [Pa]"""
    return saturation_pressure_ice(temp) if temp < TRIPLE_TEMP else saturation_pressure_liquid(temp)
