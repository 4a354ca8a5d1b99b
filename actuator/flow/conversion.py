"""Between sonic conductance and the other numbers of the trade, each with the assumption it rests on."""

from __future__ import annotations

import math

from actuator.air.gas import R_AIR, RHO_ISO6358, TEMP_ANR
from actuator.flow.orifice import choked_constant
from actuator.flow.scalar import passage

N6 = 31.6
"""Kv in a mass flow [kg/h] = N6·Kv·√(Δp·ρ), bar and kg/m³; Source ``iec60534``. [1]"""
KV_PER_CV = 0.865
"""Kv [m³/h at 1 bar] of a Cv of 1 [US gal/min at 1 psi], water; Source ``iec60534``. [1]"""

P_GAUGE_ZERO = 101_325.0
"""Atmosphere that the gauge pressures of the nominal flow count from; Source ``iso2533``. [Pa]"""
NOMINAL_UP = 600_000.0 + P_GAUGE_ZERO
"""6 bar gauge, absolute. [Pa]"""
NOMINAL_DOWN = 500_000.0 + P_GAUGE_ZERO
"""5 bar gauge, absolute. [Pa]"""

ASSUMPTION_KV = (
    "Kv and Cv are measured with water. Conductance is chosen so that the air flow is the same at small "
    "pressure drop (IEC 60534 with expansion factor 1, ISO 6358 with m = 0.5); rules in print differ by 5 %."
)
ASSUMPTION_NOMINAL = (
    "Nominal flow is taken from 6 to 5 bar gauge at 20 degC (atmosphere 101.325 kPa), as a volume in the "
    "reference state of ISO 6358 (ANR), m = 0.5."
)
ASSUMPTION_AREA = (
    "Effective area is the throat of an ideal nozzle (isentropic exponent 1.4) that chokes at the same "
    "mass flow at 20 degC."
)


def _slope(b: float) -> float:
    """Conductance per Kv for equal flow at small pressure drop. [m³/(s·Pa) per m³/h]"""
    # N6·Kv/3600·√(Δp[bar]·ρ) = C·ρ0·√(2·p1·Δp/(1 − b)) for Δp → 0, with ρ = p1/(R·T0)
    water = N6 / 3600.0 / math.sqrt(1e5 * R_AIR * TEMP_ANR)
    return water * math.sqrt((1.0 - b) / 2.0) / RHO_ISO6358


def conductance_from_kv(kv: float, b: float) -> float:
    """Sonic conductance of a valve whose Kv is known; see :data:`ASSUMPTION_KV`.

    Parameters
    ----------
    kv : float
        Flow coefficient, m³/h of water at a drop of 1 bar. [1]
    b : float
        Critical back-pressure ratio. [1]

    Returns
    -------
    float
        Sonic conductance. [m³/(s·Pa)]

    References
    ----------
    .. [1] IEC 60534-2-1:2011, Industrial-process control valves, sizing equations, N6 (from memory).
    """
    return kv * _slope(b)


def kv_from_conductance(conductance: float, b: float) -> float:
    """Kv of an element whose sonic conductance is known; see :data:`ASSUMPTION_KV`.

    Parameters
    ----------
    conductance : float
        Sonic conductance. [m³/(s·Pa)]
    b : float
        Critical back-pressure ratio. [1]

    Returns
    -------
    float
        Flow coefficient, m³/h of water at a drop of 1 bar. [1]
    """
    return conductance / _slope(b)


def conductance_from_cv(cv: float, b: float) -> float:
    """Sonic conductance of a valve whose Cv is known; see :data:`ASSUMPTION_KV`.

    Parameters
    ----------
    cv : float
        Flow coefficient, US gallons a minute of water at a drop of 1 psi. [1]
    b : float
        Critical back-pressure ratio. [1]

    Returns
    -------
    float
        Sonic conductance. [m³/(s·Pa)]
    """
    return conductance_from_kv(KV_PER_CV * cv, b)


def cv_from_conductance(conductance: float, b: float) -> float:
    """Cv of an element whose sonic conductance is known; see :data:`ASSUMPTION_KV`.

    Parameters
    ----------
    conductance : float
        Sonic conductance. [m³/(s·Pa)]
    b : float
        Critical back-pressure ratio. [1]

    Returns
    -------
    float
        Flow coefficient, US gallons a minute of water at a drop of 1 psi. [1]
    """
    return kv_from_conductance(conductance, b) / KV_PER_CV


def conductance_from_nominal_flow(flow: float, b: float) -> float:
    """Sonic conductance of a valve whose nominal flow is known; see :data:`ASSUMPTION_NOMINAL`.

    Parameters
    ----------
    flow : float
        Nominal flow from 6 to 5 bar gauge, ANR. [m³/s]
    b : float
        Critical back-pressure ratio. [1]

    Returns
    -------
    float
        Sonic conductance. [m³/(s·Pa)]
    """
    return flow / nominal_flow_from_conductance(1.0, b)


def nominal_flow_from_conductance(conductance: float, b: float) -> float:
    """Nominal flow of an element whose sonic conductance is known; see :data:`ASSUMPTION_NOMINAL`.

    Parameters
    ----------
    conductance : float
        Sonic conductance. [m³/(s·Pa)]
    b : float
        Critical back-pressure ratio. [1]

    Returns
    -------
    float
        Nominal flow from 6 to 5 bar gauge, ANR. [m³/s]
    """
    return passage(NOMINAL_UP, NOMINAL_DOWN, TEMP_ANR, conductance, b, 0.5) / RHO_ISO6358


def conductance_from_effective_area(area: float) -> float:
    """Sonic conductance of an element whose effective area is known; see :data:`ASSUMPTION_AREA`.

    Parameters
    ----------
    area : float
        Effective area S. [m²]

    Returns
    -------
    float
        Sonic conductance. [m³/(s·Pa)]
    """
    return area * choked_constant() / (RHO_ISO6358 * math.sqrt(TEMP_ANR))


def effective_area_from_conductance(conductance: float) -> float:
    """Effective area of an element whose sonic conductance is known; see :data:`ASSUMPTION_AREA`.

    Parameters
    ----------
    conductance : float
        Sonic conductance. [m³/(s·Pa)]

    Returns
    -------
    float
        Effective area S. [m²]
    """
    return conductance / conductance_from_effective_area(1.0)
