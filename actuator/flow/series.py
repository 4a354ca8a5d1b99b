"""Elements one behind the other, or side by side, and one (C, b, m) for the whole with its error."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
Element = tuple[float, float, float]
"""Sonic conductance C [m³/(s·Pa)], critical ratio b and subsonic index m of one element."""

LARGEST_RATIO = 0.9
"""Highest critical ratio that a fit may take, as in the document. [1]"""
LEAST_INDEX, LARGEST_INDEX = 0.3, 1.0
"""Range of the subsonic index that a fit may take, as in the document. [1]"""
_GRID = np.linspace(-1.0, 1.0, 5)
_OFFSETS_B, _OFFSETS_M = (item.ravel() for item in np.meshgrid(_GRID, _GRID, indexing="ij"))
_LEVELS = np.sin(np.linspace(0.04, 1.0, 13) * math.pi / 2.0)
"""Flows at which chain and fit are compared, dense near the choked flow, where the curves bend. [1]"""


@dataclass(frozen=True, slots=True, kw_only=True)
class SeriesFit:
    """One element that stands for several."""

    conductance: float
    """Sonic conductance C, exact. [m³/(s·Pa)]"""
    critical_ratio: float
    """Critical back-pressure ratio b of the fit. [1]"""
    subsonic_index: float
    """Subsonic index m of the fit. [1]"""
    error: float
    """Largest difference between fit and exact flow over all pressure ratios, share of choked flow. [1]"""


def _share_down(share: float, b: float, m: float) -> float:
    """Pressure ratio p2/p1 at which an element passes a share of its choked flow."""
    if share >= 1.0:
        return b
    left = 1.0 - share * share if m == 0.5 else -math.expm1(math.log(share) / m)
    return b + (1.0 - b) * math.sqrt(left)


def chain_end(elements: Sequence[Element], flow: float) -> float:
    """Pressure behind a chain, as a share of the pressure before it.

    Parameters
    ----------
    elements : sequence of (C, b, m)
        In the order of the flow. [m³/(s·Pa)], [1], [1]
    flow : float
        Flow over (ρ₀·√(T₀/T₁)·p₁), above zero: the conductance that is in use. [m³/(s·Pa)]

    Returns
    -------
    float
        Highest pressure ratio at which the chain passes this flow; -1 where it cannot. [1]

    Notes
    -----
    The mass flow is the same in all elements, and throttling leaves the stagnation temperature of an ideal
    gas unchanged, so each element sees T₁ and the pressure that the one before leaves.
    """
    p = 1.0
    for c, b, m in elements:
        share = flow / (c * p)
        if share > 1.0 + 1e-12:
            return -1.0
        p *= _share_down(share, b, m)
        if p <= 0.0:
            return -1.0
    return p


def chain_conductance(elements: Sequence[Element]) -> float:
    """Sonic conductance of a chain: its largest flow, wherever it chokes.

    Parameters
    ----------
    elements : sequence of (C, b, m)
        In the order of the flow; the order matters. [m³/(s·Pa)], [1], [1]

    Returns
    -------
    float
        Sonic conductance of the whole. [m³/(s·Pa)]

    References
    ----------
    .. [1] ISO 6358-3:2014 solves the same chain numerically (scope only was seen).
    """
    limit = elements[0][0]
    for number in range(1, len(elements)):
        limit = _choked_behind(elements[:number], limit, elements[number][0])
    return limit


def _choked_behind(before: Sequence[Element], limit: float, c: float) -> float:
    """Largest flow of a chain that passes ``limit`` at most, with an element of conductance ``c`` behind."""

    def spare(angle: float) -> float:
        flow = limit * math.sin(angle)  # the pressure falls like a root near the limit; in the angle it is smooth
        return max(chain_end(before, flow), 0.0) * c / limit - math.sin(angle)

    low, high = 0.0, 0.5 * math.pi
    f_low, f_high = c / limit, spare(high)
    if f_high >= 0.0:
        return limit
    side = 0
    for _ in range(200):  # Illinois: the secant, halving the value on a side that stays twice
        middle = high - f_high * (high - low) / (f_high - f_low)
        f = spare(middle)
        if abs(f) < 1e-13 or high - low < 1e-14:
            break
        if f > 0.0:
            low, f_low = middle, f
            f_high *= 0.5 if side > 0 else 1.0
            side = 1
        else:
            high, f_high = middle, f
            f_low *= 0.5 if side < 0 else 1.0
            side = -1
    return limit * math.sin(middle)


def _chain_ratios(elements: Sequence[Element], flows: Array) -> Array:
    """Pressure ratios of the whole chain at given flows, all of which it passes."""
    p = np.ones_like(flows)
    for c, b, m in elements:
        share = np.minimum(flows / (c * p), 1.0)
        left = 1.0 - share * share if m == 0.5 else 1.0 - share ** (1.0 / m)
        p = p * (b + (1.0 - b) * np.sqrt(left))
    return p


def _worst(ratios: Array, shares: Array, b: Array, m: Array) -> Array:
    """Largest difference of flow between samples and fits, for each pair of b and m."""
    below = np.maximum((ratios - b) / (1.0 - b), 0.0)
    result: Array = np.abs((1.0 - below * below) ** m - shares).max(axis=-1)
    return result


def _fit(ratios: Array, shares: Array, b_start: float, m_start: float) -> tuple[float, float, float]:
    """Pair (b, m) of least largest error: a grid that closes in on its best point, and that error."""
    b_best, m_best, b_step, m_step = min(max(b_start, 0.0), LARGEST_RATIO), m_start, 0.06, 0.03
    error = math.inf
    for _ in range(3):
        b = np.minimum(np.maximum(b_best + b_step * _OFFSETS_B, 0.0), LARGEST_RATIO)[:, None]
        m = np.minimum(np.maximum(m_best + m_step * _OFFSETS_M, LEAST_INDEX), LARGEST_INDEX)[:, None]
        errors = _worst(ratios, shares, b, m)
        place = int(errors.argmin())
        error = float(errors[place])
        b_best, m_best = float(b[place, 0]), float(m[place, 0])
        b_step, m_step = 0.3 * b_step, 0.3 * m_step
    return b_best, m_best, error


def fit_chain(elements: Sequence[Element]) -> SeriesFit:
    """One element that stands for several in a row, in the order of the flow.

    Parameters
    ----------
    elements : sequence of (C, b, m)
        At least one; a chain reversed is another chain. [m³/(s·Pa)], [1], [1]

    Returns
    -------
    SeriesFit
        C exact, (b, m) with the largest error made small, and that error; a single element is itself.

    Notes
    -----
    Flows near zero pressure difference follow b = 1 − C²·Σ(1 − bᵢ)/Cᵢ², where the search begins.
    """
    if len(elements) == 1:
        c, b, m = elements[0]
        return SeriesFit(conductance=c, critical_ratio=b, subsonic_index=m, error=0.0)
    conductance = chain_conductance(elements)
    ratios = _chain_ratios(elements, conductance * _LEVELS)
    start = 1.0 - conductance**2 * sum((1.0 - b) / c**2 for c, b, _ in elements)
    b, m, error = _fit(ratios, _LEVELS, start, sum(item[2] for item in elements) / len(elements))
    return SeriesFit(conductance=conductance, critical_ratio=b, subsonic_index=m, error=error)


def fit_parallel(elements: Sequence[Element]) -> SeriesFit:
    """One element that stands for several side by side.

    Parameters
    ----------
    elements : sequence of (C, b, m)
        At least one. [m³/(s·Pa)], [1], [1]

    Returns
    -------
    SeriesFit
        C exact, (b, m) with the largest error made small, and that error; a single element is itself.

    Notes
    -----
    Mass flows add. Flows near zero pressure difference follow C/√(1 − b) = Σ Cᵢ/√(1 − bᵢ), where the search
    begins.
    """
    if len(elements) == 1:
        return fit_chain(elements)
    conductance = sum(c for c, _, _ in elements)
    start = 1.0 - (conductance / sum(c / math.sqrt(1.0 - b) for c, b, _ in elements)) ** 2
    lowest = min(b for _, b, _ in elements)
    ratios = lowest + (1.0 - lowest) * np.sqrt(1.0 - _LEVELS**2)
    shares = np.zeros_like(ratios)
    for c, b, m in elements:
        below = np.maximum((ratios - b) / (1.0 - b), 0.0)
        shares += c / conductance * (1.0 - below * below) ** m
    b, m, error = _fit(ratios, shares, start, sum(item[2] for item in elements) / len(elements))
    return SeriesFit(conductance=conductance, critical_ratio=b, subsonic_index=m, error=error)
