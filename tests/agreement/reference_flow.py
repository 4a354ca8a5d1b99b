"""Flow between a chamber and supply or atmosphere, written for the reference model only.

Nothing here is taken from the project's own flow room, so that the two can be compared.
"""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass

from scipy.optimize import brentq

from actuator.parts import Actuator

R_AIR = 287.05
GAMMA = 1.4
RHO_ANR = 1.185
TEMP_ANR = 293.15
GRAVITY = 9.80665
LINEAR_FROM = 0.999
"""Pressure ratio above which the flow falls linearly to zero, so that its slope is finite. [1]"""

PATH_NAMES = ("filling", "back to supply", "exhausting", "sucking in")


@dataclass(frozen=True)
class Element:
    """One ISO 6358-1 element: conductance [m³/(s·Pa)], critical ratio [1], subsonic index [1]."""

    c: float
    b: float
    m: float = 0.5


PathTable = dict[str, Element]
"""One element for each path, keyed ``"cap, filling"`` and so on."""
ChainTable = dict[str, tuple[Element, ...]]
"""The elements of each path in the order the air meets them."""
Exchange = Callable[[float, float, float], float]
"""(chamber pressure [Pa], its temperature [K], opening [1]) -> flow into the chamber [kg/s]."""


def standard_share(element: Element, r: float) -> float:
    """Flow as a share of the choked flow at pressure ratio ``r`` ≤ 1, as the standard has it. [1]"""
    z = max(r - element.b, 0.0) / (1.0 - element.b)
    return float(max(1.0 - z * z, 0.0) ** element.m)


def share_of_choked(element: Element, r: float) -> float:
    """The same with the linear core near ``r`` = 1. [1]"""
    core = max((r - LINEAR_FROM) / (1.0 - LINEAR_FROM), 0.0)
    return standard_share(element, min(r, LINEAR_FROM)) * (1.0 - core)


def chain_conductance(chain: tuple[Element, ...], r: float) -> float:
    """Flow of elements in series at ratio ``r``, over p_up·ρ0·√(T0/T). [m³/(s·Pa)]

    The intermediate pressure is found so that the mass flows are equal; throttling leaves the
    temperature as it is. The linear core is that of the whole chain.
    """
    if len(chain) == 1:
        return chain[0].c * share_of_choked(chain[0], r)
    first, second = chain
    down = min(r, LINEAR_FROM)

    def surplus(mid: float) -> float:
        return first.c * standard_share(first, mid) - second.c * mid * standard_share(second, down / mid)

    mid = float(brentq(surplus, max(down, 1e-12), 1.0, xtol=1e-15, rtol=1e-14))
    core = max((r - LINEAR_FROM) / (1.0 - LINEAR_FROM), 0.0)
    return first.c * standard_share(first, mid) * (1.0 - core)


def chains(actuator: Actuator) -> ChainTable:
    """Valve and one-way throttle of every path, from the parts."""
    valve, throttle = actuator.valve, actuator.throttle
    supply = Element(valve.supply_c, valve.supply_b, valve.m)
    exhaust = Element(valve.exhaust_c, valve.exhaust_b, valve.m)
    table: ChainTable = {}
    for side in {"spring-return": ("cap",), "spring-extend": ("rod",)}.get(actuator.kind, ("cap", "rod")):
        inward: tuple[Element, ...] = ()
        outward: tuple[Element, ...] = ()
        if throttle.kind != "none":
            metering_in = throttle.kind == "meter-in"
            c = throttle.extend_c if (side == "cap") == metering_in else throttle.retract_c
            assert c is not None
            assert throttle.free_c is not None
            needle, free = Element(c, throttle.b), Element(throttle.free_c, throttle.b)
            inward, outward = ((needle,), (free,)) if metering_in else ((free,), (needle,))
        table[f"{side}, filling"] = (supply, *inward)
        table[f"{side}, back to supply"] = (*outward, supply)
        table[f"{side}, exhausting"] = (*outward, exhaust)
        table[f"{side}, sucking in"] = (exhaust, *inward)
    return table


def exchange_by_table(into: Element, out: Element, p_far: float, temp_far: float) -> Exchange:
    """Flow into a chamber from a place at fixed pressure and temperature, and back."""
    k_in = into.c * RHO_ANR * math.sqrt(TEMP_ANR / temp_far) * p_far
    k_out = out.c * RHO_ANR * math.sqrt(TEMP_ANR)
    b_in, b_out, m_in, m_out = into.b, out.b, into.m, out.m
    span_in, span_out = 1.0 - b_in, 1.0 - b_out
    steep_in = share_of_choked(into, LINEAR_FROM) / (1.0 - LINEAR_FROM)
    steep_out = share_of_choked(out, LINEAR_FROM) / (1.0 - LINEAR_FROM)
    sqrt = math.sqrt

    def flow(p: float, temp: float, opening: float) -> float:
        if p < p_far:
            r = p / p_far
            if r > LINEAR_FROM:
                return opening * k_in * steep_in * (1.0 - r)
            if r <= b_in:
                return opening * k_in
            z = (r - b_in) / span_in
            bracket = 1.0 - z * z
            return opening * k_in * (sqrt(bracket) if m_in == 0.5 else bracket**m_in)
        r = p_far / p
        k = opening * k_out * p / sqrt(temp)
        if r > LINEAR_FROM:
            return -k * steep_out * (1.0 - r)
        if r <= b_out:
            return -k
        z = (r - b_out) / span_out
        bracket = 1.0 - z * z
        return -k * (sqrt(bracket) if m_out == 0.5 else float(bracket**m_out))

    return flow


def exchange_by_chain(into: tuple[Element, ...], out: tuple[Element, ...], p_far: float, temp_far: float) -> Exchange:
    """The same with the chains solved exactly at every call."""
    k_in = RHO_ANR * math.sqrt(TEMP_ANR / temp_far) * p_far
    k_out = RHO_ANR * math.sqrt(TEMP_ANR)

    def flow(p: float, temp: float, opening: float) -> float:
        if p < p_far:
            return opening * k_in * chain_conductance(into, p / p_far)
        return -opening * k_out * p / math.sqrt(temp) * chain_conductance(out, p_far / p)

    return flow


def shut(p: float, temp: float, opening: float) -> float:
    """No flow: the path is closed."""
    return 0.0
