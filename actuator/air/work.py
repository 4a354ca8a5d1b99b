"""Work of a closed mass of air: one expression for every polytropic index."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

from actuator.air.gas import GAMMA

Array = NDArray[np.float64]


def exprel(z: ArrayLike) -> Array:
    """Relative growth (eᶻ − 1)/z, smooth through z = 0, accurate to 1e-15 on both sides.

    Parameters
    ----------
    z : array_like
        Any number. [1]

    Returns
    -------
    ndarray
        1 at zero. [1]
    """
    z = np.asarray(z, dtype=np.float64)
    safe = np.where(z == 0.0, 1.0, z)
    result: Array = np.where(z == 0.0, 1.0, np.expm1(safe) / safe)
    return result


def polytropic_work(p1: ArrayLike, v1: ArrayLike, v2: ArrayLike, index: ArrayLike) -> Array:
    r"""Work done by a closed mass of gas along p·Vⁿ = const.

    Parameters
    ----------
    p1 : array_like
        Pressure at the start, absolute. [Pa]
    v1, v2 : array_like
        Volume at the start and at the end, above zero. [m³]
    index : array_like
        Polytropic index n: 0 constant pressure, 1 isothermal, 1.4 adiabatic. [1]

    Returns
    -------
    ndarray
        Boundary work, positive where the gas expands. [J]

    Notes
    -----
    With L = ln(V₂/V₁) and exprel(z) = (eᶻ − 1)/z, smooth through n = 1:

    .. math:: W = p_1 V_1 L\, \mathrm{exprel}((1 - n) L)

    References
    ----------
    .. [1] Moran, Shapiro, Fundamentals of Engineering Thermodynamics, example 2.1, p. 39 (excerpt), rewritten
       so that n = 1 is no special case.
    """
    p1, v1, v2, index = (np.asarray(item, dtype=np.float64) for item in (p1, v1, v2, index))
    L = np.log1p((v2 - v1) / v1)
    result: Array = p1 * v1 * L * exprel((1.0 - index) * L)
    return result


def end_pressure(p1: ArrayLike, v1: ArrayLike, v2: ArrayLike, index: ArrayLike) -> Array:
    """Pressure at the end of a polytropic change.

    Parameters
    ----------
    p1 : array_like
        Pressure at the start, absolute. [Pa]
    v1, v2 : array_like
        Volume at the start and at the end. [m³]
    index : array_like
        Polytropic index. [1]

    Returns
    -------
    ndarray
        p₂ = p₁·(V₁/V₂)ⁿ, absolute. [Pa]
    """
    v1, v2 = np.asarray(v1, dtype=np.float64), np.asarray(v2, dtype=np.float64)
    result: Array = np.asarray(p1, dtype=np.float64) * (v1 / v2) ** np.asarray(index, dtype=np.float64)
    return result


def end_temperature(temp1: ArrayLike, v1: ArrayLike, v2: ArrayLike, index: ArrayLike) -> Array:
    """Temperature at the end of a polytropic change of an ideal gas.

    Parameters
    ----------
    temp1 : array_like
        Temperature at the start. [K]
    v1, v2 : array_like
        Volume at the start and at the end. [m³]
    index : array_like
        Polytropic index. [1]

    Returns
    -------
    ndarray
        T₂ = T₁·(V₁/V₂)ⁿ⁻¹. [K]
    """
    return end_pressure(temp1, v1, v2, np.asarray(index, dtype=np.float64) - 1.0)


def polytropic_heat(p1: ArrayLike, v1: ArrayLike, v2: ArrayLike, index: ArrayLike) -> Array:
    r"""Heat taken up by the gas along a polytropic change, from the first law.

    Parameters
    ----------
    p1 : array_like
        Pressure at the start, absolute. [Pa]
    v1, v2 : array_like
        Volume at the start and at the end. [m³]
    index : array_like
        Polytropic index. [1]

    Returns
    -------
    ndarray
        Heat, positive into the gas; zero for the adiabatic index. [J]

    Notes
    -----
    The change of internal energy is (p₂V₂ − p₁V₁)/(γ − 1) = −W·(n − 1)/(γ − 1), so that

    .. math:: Q = W\, (\gamma - n)/(\gamma - 1)

    References
    ----------
    .. [1] Eastop, McConkey, Applied Thermodynamics for Engineering Technologists, 5th ed., polytropic
       processes (from memory).
    """
    share = (GAMMA - np.asarray(index, dtype=np.float64)) / (GAMMA - 1.0)
    result: Array = share * polytropic_work(p1, v1, v2, index)
    return result


def polytropic_index(p1: ArrayLike, v1: ArrayLike, p2: ArrayLike, v2: ArrayLike) -> Array:
    """Index of the polytropic change through two states.

    Parameters
    ----------
    p1, p2 : array_like
        Pressures, absolute. [Pa]
    v1, v2 : array_like
        Volumes, not equal. [m³]

    Returns
    -------
    ndarray
        n = ln(p₁/p₂)/ln(V₂/V₁). [1]
    """
    p1, p2 = np.asarray(p1, dtype=np.float64), np.asarray(p2, dtype=np.float64)
    v1, v2 = np.asarray(v1, dtype=np.float64), np.asarray(v2, dtype=np.float64)
    result: Array = np.log(p1 / p2) / np.log(v2 / v1)
    return result


def useful_work(p1: ArrayLike, v1: ArrayLike, v2: ArrayLike, index: ArrayLike, p_ambient: ArrayLike) -> Array:
    """Work that reaches the rod of a piston with the atmosphere behind it.

    Parameters
    ----------
    p1 : array_like
        Pressure of the gas at the start, absolute. [Pa]
    v1, v2 : array_like
        Volume of the gas at the start and at the end. [m³]
    index : array_like
        Polytropic index. [1]
    p_ambient : array_like
        Pressure of the atmosphere, absolute. [Pa]

    Returns
    -------
    ndarray
        Boundary work less the work of pushing the atmosphere away. [J]
    """
    moved = np.asarray(v2, dtype=np.float64) - np.asarray(v1, dtype=np.float64)
    result: Array = polytropic_work(p1, v1, v2, index) - np.asarray(p_ambient, dtype=np.float64) * moved
    return result


def piston_force(
    p_cap: ArrayLike, p_rod: ArrayLike, p_ambient: ArrayLike, *, area_cap: float, area_rod: float
) -> Array:
    """Force of both chambers and of the atmosphere on piston and rod.

    Parameters
    ----------
    p_cap, p_rod : array_like
        Pressures of the two chambers, absolute. [Pa]
    p_ambient : array_like
        Pressure of the atmosphere on the rod's end, absolute. [Pa]
    area_cap, area_rod : float
        Piston area on the cap side, annular area on the rod side. [m²]

    Returns
    -------
    ndarray
        p₁A₁ − p₂A₂ − p₀(A₁ − A₂), positive where it extends; times the speed it is the useful power. [N]
    """
    p_cap, p_rod = np.asarray(p_cap, dtype=np.float64), np.asarray(p_rod, dtype=np.float64)
    back = np.asarray(p_ambient, dtype=np.float64) * (area_cap - area_rod)
    result: Array = p_cap * area_cap - p_rod * area_rod - back
    return result
