"""The equations made linear at one state: derivatives in a direction, the Jacobian, and its linear systems.

A chamber's exchange depends on its own mass and energy and on the piston only, and its flows not on the speed. So
the Jacobian has two blocks of two rows beside the piston's, and a system of six is solved block by block.
"""

from __future__ import annotations

import math
from typing import NamedTuple

from actuator.air.gas import CP, CV, GAMMA, R_AIR
from actuator.flow.scalar import passage, passage_slope
from actuator.mechanics.friction import running_slope
from actuator.stroke import layout as at
from actuator.stroke.equations import Chamber, Row, State, opening

_GAMMA_1 = GAMMA - 1.0


class Tangent(NamedTuple):
    """A chamber at one state, and how its open valve's flows depend on its pressure."""

    m: float
    u: float
    volume: float
    growth: float
    wall: float
    part: float
    p: float
    temp: float
    inflow: float
    """At full opening. [kg/s]"""
    outflow: float
    """At full opening. [kg/s]"""
    inflow_p: float
    """Derivative by the chamber's pressure, at full opening. [kg/(s·Pa)]"""
    outflow_p: float
    """Derivative by the chamber's pressure, at full opening. [kg/(s·Pa)]"""
    port_temp: float


class Block(NamedTuple):
    """Derivatives of one chamber's rates (first letter: mass, energy) by x, v, m and U; dm/dt is free of v."""

    m_x: float
    m_m: float
    m_u: float
    u_x: float
    u_v: float
    u_m: float
    u_u: float


class Jacobian(NamedTuple):
    """Derivatives of all rates: of the acceleration by x, v, U₁, U₂, and the chambers' blocks."""

    a_x: float
    a_v: float
    a_u1: float
    a_u2: float
    cap: Block
    rod: Block


class Factors(NamedTuple):
    """A block of g·I - J eliminated: m and U of a chamber as functions of right-hand side, x and v."""

    pivot_u: float
    pivot_m: float
    ratio: float
    m_x: float
    m_v: float
    u_x: float
    u_v: float
    u_m: float


class System(NamedTuple):
    """g·I - J, eliminated as far as the right-hand side allows."""

    g: float
    a_x: float
    pivot_v: float
    a_u1: float
    a_u2: float
    cap: Factors
    rod: Factors


def tangent(
    m: float, u: float, volume: float, growth: float, wall: float, part: float, link: int, mode: Row
) -> Tangent:
    """Chamber and slopes of its flows; parameters as of :func:`actuator.stroke.equations.chamber`."""
    p = _GAMMA_1 * u / volume
    temp = u / (m * CV)
    port = mode[link + at.PORT_P]
    port_temp = mode[link + at.PORT_T]
    inflow = 0.0
    inflow_p = 0.0
    outflow = 0.0
    outflow_p = 0.0
    if port > p:
        c, b, index = mode[link + at.INTO], mode[link + at.INTO + 1], mode[link + at.INTO + 2]
        inflow = passage(port, p, port_temp, c, b, index)
        inflow_p = passage_slope(port, p, port_temp, c, b, index)
    else:
        c, b, index = mode[link + at.OUT_OF], mode[link + at.OUT_OF + 1], mode[link + at.OUT_OF + 2]
        outflow = passage(p, port, temp, c, b, index)
        outflow_p = (outflow - port * passage_slope(p, port, temp, c, b, index)) / p
    return Tangent(m, u, volume, growth, wall, part, p, temp, inflow, outflow, inflow_p, outflow_p, port_temp)


def vented_tangent(growth: float, par: Row) -> Tangent:
    """A side that is open to the atmosphere: a chamber without bounds, which nothing changes."""
    far = math.inf
    return Tangent(far, far, far, growth, 0.0, 0.0, par[at.P_AMB], par[at.T_AMB], 0.0, 0.0, 0.0, 0.0, par[at.T_AMB])


def cap_tangent(time: float, y: State, mode: Row, par: Row) -> Tangent:
    """:func:`tangent` of the cap side."""
    x, v, area = y[at.X], y[at.V], par[at.AREA_CAP]
    if par[at.VENTED_CAP] > 0.5:
        return vented_tangent(area * v, par)
    wall = math.pi * par[at.BORE] * x + 2.0 * area
    volume = par[at.DEAD_CAP] + area * x
    return tangent(y[at.M_CAP], y[at.U_CAP], volume, area * v, wall, opening(time, mode), at.CAP_LINK, mode)


def rod_tangent(time: float, y: State, mode: Row, par: Row) -> Tangent:
    """:func:`tangent` of the rod side."""
    x, v, area = par[at.STROKE] - y[at.X], y[at.V], par[at.AREA_ROD]
    if par[at.VENTED_ROD] > 0.5:
        return vented_tangent(-area * v, par)
    wall = math.pi * par[at.BORE] * x + 2.0 * area
    volume = par[at.DEAD_ROD] + area * x
    return tangent(y[at.M_ROD], y[at.U_ROD], volume, -area * v, wall, opening(time, mode), at.ROD_LINK, mode)


def chamber_change(
    air: Tangent, area: float, dx: float, dv: float, dm: float, du: float, dpart: float, par: Row
) -> Chamber:
    """Derivative of a chamber and its exchange in a direction.

    Parameters
    ----------
    air : Tangent
    area : float
        dV/dx: positive for the cap side, negative for the rod side. [m²]
    dx, dv, dm, du, dpart : float
        Direction: position, speed, mass, energy, opening. [m, m/s, kg, J, 1]
    """
    dwall = math.copysign(math.pi * par[at.BORE], area) * dx
    dp = air.p * (du / air.u - area * dx / air.volume)
    dtemp = air.temp * (du / air.u - dm / air.m)
    dinflow = air.part * air.inflow_p * dp + air.inflow * dpart
    doutflow = air.part * (air.outflow_p * dp - 0.5 * air.outflow * dtemp / air.temp) + air.outflow * dpart
    dpower = dp * air.growth + air.p * area * dv
    if air.volume == math.inf:
        dheat = 0.0
    elif par[at.INDEX] == 0.0:
        dheat = par[at.HEAT] * (dwall * (par[at.T_AMB] - air.temp) - air.wall * dtemp)
    else:
        leaving = air.temp * doutflow + air.part * air.outflow * dtemp
        dheat = (par[at.INDEX] - GAMMA) / _GAMMA_1 * (R_AIR * (air.port_temp * dinflow - leaving) - dpower)
    return Chamber(dp, dtemp, dinflow, doutflow, dpower, dheat)


def energy_change(air: Tangent, change: Chamber) -> float:
    """Derivative of dU/dt that goes with the change of a chamber. [W]"""
    carried = air.temp * change.outflow + air.part * air.outflow * change.temp
    return CP * (air.port_temp * change.inflow - carried) - change.power + change.heat


def block(air: Tangent, area: float, par: Row) -> Block:
    """Columns of a chamber's rates, each the change in one direction."""
    if air.volume == math.inf:
        return Block(0.0, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0)
    by_x = chamber_change(air, area, 1.0, 0.0, 0.0, 0.0, 0.0, par)
    by_v = chamber_change(air, area, 0.0, 1.0, 0.0, 0.0, 0.0, par)
    by_m = chamber_change(air, area, 0.0, 0.0, 1.0, 0.0, 0.0, par)
    by_u = chamber_change(air, area, 0.0, 0.0, 0.0, 1.0, 0.0, par)
    return Block(
        by_x.inflow - by_x.outflow,
        by_m.inflow - by_m.outflow,
        by_u.inflow - by_u.outflow,
        energy_change(air, by_x),
        energy_change(air, by_v),
        energy_change(air, by_m),
        energy_change(air, by_u),
    )


def jacobian(cap: Tangent, rod: Tangent, y: State, mode: Row, par: Row) -> Jacobian:
    """Derivatives of all rates by the six states; at rest those of the acceleration are zero."""
    area1, area2 = par[at.AREA_CAP], par[at.AREA_ROD]
    cap_block = block(cap, area1, par)
    rod_block = block(rod, -area2, par)
    direction = mode[at.DIRECTION]
    if direction == 0.0:
        return Jacobian(0.0, 0.0, 0.0, 0.0, cap_block, rod_block)
    rubbing = running_slope(direction * y[at.V], par[at.BREAKAWAY], par[at.COULOMB], par[at.VISCOUS], par[at.STRIBECK])
    mass = par[at.MASS]
    by_x = -(cap.p * area1 * area1 / cap.volume + rod.p * area2 * area2 / rod.volume - par[at.SPRING_RATE]) / mass
    by_u1 = cap.p / cap.u * area1 / mass
    by_u2 = -rod.p / rod.u * area2 / mass
    return Jacobian(by_x, -rubbing / mass, by_u1, by_u2, cap_block, rod_block)


def ramp(cap: Tangent, rod: Tangent, time: float, mode: Row, par: Row) -> State:
    """Derivative of the rates by time: what the opening of the valve adds."""
    if opening(time, mode) >= 1.0:
        return (0.0, 0.0, 0.0, 0.0, 0.0, 0.0)
    dpart = 1.0 / mode[at.OPEN_OVER]
    change1 = chamber_change(cap, par[at.AREA_CAP], 0.0, 0.0, 0.0, 0.0, dpart, par)
    change2 = chamber_change(rod, -par[at.AREA_ROD], 0.0, 0.0, 0.0, 0.0, dpart, par)
    return (
        0.0,
        0.0,
        change1.inflow - change1.outflow,
        energy_change(cap, change1),
        change2.inflow - change2.outflow,
        energy_change(rod, change2),
    )


def eliminate(g: float, own: Block) -> Factors:
    """Eliminate a chamber's two rows of g·I - J, the energy first: heat and flow make its pivot large."""
    pivot_u = 1.0 / (g - own.u_u)
    ratio = own.m_u * pivot_u
    pivot_m = 1.0 / (g - own.m_m - ratio * own.u_m)
    m_x = (own.m_x + ratio * own.u_x) * pivot_m
    m_v = ratio * own.u_v * pivot_m
    u_x = (own.u_x + own.u_m * m_x) * pivot_u
    u_v = (own.u_v + own.u_m * m_v) * pivot_u
    return Factors(pivot_u, pivot_m, ratio, m_x, m_v, u_x, u_v, own.u_m)


def system(g: float, jac: Jacobian) -> System:
    """Eliminate g·I - J down to the row of the speed. ``g`` in [1/s]."""
    cap = eliminate(g, jac.cap)
    rod = eliminate(g, jac.rod)
    a_x = jac.a_x + jac.a_u1 * cap.u_x + jac.a_u2 * rod.u_x
    a_v = jac.a_v + jac.a_u1 * cap.u_v + jac.a_u2 * rod.u_v
    return System(g, a_x, 1.0 / (g - a_v - a_x / g), jac.a_u1, jac.a_u2, cap, rod)


def solve(left: System, right: State) -> State:
    """Solution u of (g·I - J)·u = right."""
    cap, rod = left.cap, left.rod
    rx, rv, rm1, ru1, rm2, ru2 = right
    m1 = (rm1 + cap.ratio * ru1) * cap.pivot_m
    m2 = (rm2 + rod.ratio * ru2) * rod.pivot_m
    u1 = (ru1 + cap.u_m * m1) * cap.pivot_u
    u2 = (ru2 + rod.u_m * m2) * rod.pivot_u
    v = (rv + left.a_u1 * u1 + left.a_u2 * u2 + left.a_x * rx / left.g) * left.pivot_v
    x = (rx + v) / left.g
    return (
        x,
        v,
        m1 + cap.m_x * x + cap.m_v * v,
        u1 + cap.u_x * x + cap.u_v * v,
        m2 + rod.m_x * x + rod.m_v * v,
        u2 + rod.u_x * x + rod.u_v * v,
    )
