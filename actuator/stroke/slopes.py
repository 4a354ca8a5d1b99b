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
from actuator.stroke.equations import Chamber, opening
from actuator.stroke.states import Row, State

_GAMMA_1 = GAMMA - 1.0


class Tangent(NamedTuple):
    """A chamber at one state and its slopes; _p: by its pressure, _u and _m: by energy and mass, _v: by volume."""

    growth: float
    wall: float
    part: float
    p: float
    p_v: float
    p_u: float
    temp: float
    temp_m: float
    temp_u: float
    inflow: float
    """At full opening. [kg/s]"""
    outflow: float
    """At full opening. [kg/s]"""
    inflow_p: float
    """At full opening. [kg/(s·Pa)]"""
    outflow_p: float
    """At full opening. [kg/(s·Pa)]"""
    outflow_t: float
    """By the temperature, at full opening. [kg/(s·K)]"""
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


class Slopes(NamedTuple):
    """Derivatives of the rates by the six states and by time."""

    jacobian: Jacobian
    by_time: State


NO_BLOCK = Block(0.0, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0)
NO_SLOPES = Slopes(Jacobian(0.0, 0.0, 0.0, 0.0, NO_BLOCK, NO_BLOCK), (0.0, 0.0, 0.0, 0.0, 0.0, 0.0))


class Inverse(NamedTuple):
    """A chamber's two rows of g·I - J solved: increments of m and U from right-hand sides and the speed's increment."""

    m_m: float
    m_u: float
    m_x: float
    m_v: float
    u_m: float
    u_u: float
    u_x: float
    u_v: float


class System(NamedTuple):
    """g·I - J solved: the speed's increment from all right-hand sides, then the others from theirs and the speed's."""

    x: float
    v_x: float
    v_v: float
    v_m1: float
    v_u1: float
    v_m2: float
    v_u2: float
    cap: Inverse
    rod: Inverse


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
        inflow_p = passage_slope(inflow, port, p, port_temp, c, b, index)
    else:
        c, b, index = mode[link + at.OUT_OF], mode[link + at.OUT_OF + 1], mode[link + at.OUT_OF + 2]
        outflow = passage(p, port, temp, c, b, index)
        outflow_p = (outflow - port * passage_slope(outflow, p, port, temp, c, b, index)) / p
    return Tangent(
        growth, wall, part,
        p, -p / volume, p / u,
        temp, -temp / m, temp / u,
        inflow, outflow, inflow_p, outflow_p, -0.5 * outflow / temp, port_temp,
    )  # fmt: skip


def vented_tangent(growth: float, par: Row) -> Tangent:
    """A side that is open to the atmosphere: nothing changes it; told by its wall, which is 0."""
    p0, t0 = par[at.P_AMB], par[at.T_AMB]
    return Tangent(growth, 0.0, 0.0, p0, 0.0, 0.0, t0, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0, t0)


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
    dp = air.p_u * du + air.p_v * area * dx
    dtemp = air.temp_u * du + air.temp_m * dm
    dinflow = air.part * air.inflow_p * dp + air.inflow * dpart
    doutflow = air.part * (air.outflow_p * dp + air.outflow_t * dtemp) + air.outflow * dpart
    dpower = dp * air.growth + air.p * area * dv
    if air.wall == 0.0:
        dheat = 0.0
    elif par[at.INDEX] == 0.0:
        dheat = par[at.HEAT] * (dwall * (par[at.T_AMB] - air.temp) - air.wall * dtemp)
    else:
        leaving = air.temp * doutflow + air.part * air.outflow * dtemp
        dheat = (par[at.INDEX] - GAMMA) / _GAMMA_1 * (R_AIR * (air.port_temp * dinflow - leaving) - dpower)
    carried = air.temp * doutflow + air.part * air.outflow * dtemp
    gain = CP * (air.port_temp * dinflow - carried) - dpower + dheat
    return Chamber(dp, dtemp, dinflow, doutflow, dpower, dheat, gain)


def block(air: Tangent, area: float, par: Row) -> Block:
    """Derivatives of a chamber's two rates, by its pressure and temperature first; ``area`` is dV/dx. [m²]"""
    if air.wall == 0.0:
        return NO_BLOCK
    into, out_of, out_t, out = (
        air.part * air.inflow_p,
        air.part * air.outflow_p,
        air.part * air.outflow_t,
        air.part * air.outflow,
    )
    by_p = air.port_temp * into - air.temp * out_of
    by_t = -(air.temp * out_t + out)
    if par[at.INDEX] == 0.0:
        power = -1.0
        energy_p = CP * by_p
        energy_t = CP * by_t - par[at.HEAT] * air.wall
        warmed = par[at.HEAT] * math.copysign(math.pi * par[at.BORE], area) * (par[at.T_AMB] - air.temp)
    else:
        implied = (par[at.INDEX] - GAMMA) / _GAMMA_1
        power = -1.0 - implied
        energy_p = (CP + implied * R_AIR) * by_p
        energy_t = (CP + implied * R_AIR) * by_t
        warmed = 0.0
    mass_p = into - out_of
    energy_p += power * air.growth
    return Block(
        mass_p * air.p_v * area,
        -out_t * air.temp_m,
        mass_p * air.p_u - out_t * air.temp_u,
        energy_p * air.p_v * area + warmed,
        power * air.p * area,
        energy_t * air.temp_m,
        energy_p * air.p_u + energy_t * air.temp_u,
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
    by_x = (cap.p_v * area1 * area1 + rod.p_v * area2 * area2 + par[at.SPRING_RATE]) / mass
    return Jacobian(by_x, -rubbing / mass, cap.p_u * area1 / mass, -rod.p_u * area2 / mass, cap_block, rod_block)


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
        change1.gain,
        change2.inflow - change2.outflow,
        change2.gain,
    )


def slopes_at(time: float, y: State, mode: Row, par: Row) -> Slopes:
    """Derivatives of the rates at one state."""
    cap = cap_tangent(time, y, mode, par)
    rod = rod_tangent(time, y, mode, par)
    return Slopes(jacobian(cap, rod, y, mode, par), ramp(cap, rod, time, mode, par))


def inverse(g: float, own: Block) -> Inverse:
    """Solve a chamber's two rows, the energy eliminated first: heat and flow make its pivot large."""
    pivot_u = 1.0 / (g - own.u_u)
    ratio = own.m_u * pivot_u
    m_m = 1.0 / (g - own.m_m - ratio * own.u_m)
    m_x = (own.m_x + ratio * own.u_x) * m_m / g
    u_x = (own.u_x / g + own.u_m * m_x) * pivot_u
    # x itself follows the speed: x = (right-hand side + v)/g
    m_v = m_x + ratio * own.u_v * m_m
    u_v = (own.u_x / g + own.u_v + own.u_m * m_v) * pivot_u
    u_m = own.u_m * m_m * pivot_u
    return Inverse(m_m, ratio * m_m, m_x, m_v, u_m, (1.0 + own.u_m * ratio * m_m) * pivot_u, u_x, u_v)


def system(g: float, jac: Jacobian) -> System:
    """Solve g·I - J for any right-hand side. ``g`` in [1/s]."""
    cap = inverse(g, jac.cap)
    rod = inverse(g, jac.rod)
    by_x = jac.a_x / g + jac.a_u1 * cap.u_x + jac.a_u2 * rod.u_x
    by_v = jac.a_v + jac.a_x / g + jac.a_u1 * cap.u_v + jac.a_u2 * rod.u_v
    v_v = 1.0 / (g - by_v)
    v_1 = v_v * jac.a_u1
    v_2 = v_v * jac.a_u2
    return System(
        1.0 / g, v_v * by_x, v_v, v_1 * cap.u_m, v_1 * cap.u_u, v_2 * rod.u_m, v_2 * rod.u_u, cap, rod
    )  # fmt: skip


def solve(left: System, right: State) -> State:
    """Solution u of (g·I - J)·u = right."""
    cap, rod = left.cap, left.rod
    rx, rv, rm1, ru1, rm2, ru2 = right
    v = (
        (left.v_x * rx + left.v_v * rv)
        + (left.v_m1 * rm1 + left.v_u1 * ru1)
        + (left.v_m2 * rm2 + left.v_u2 * ru2)
    )  # fmt: skip
    return (
        (rx + v) * left.x,
        v,
        (cap.m_m * rm1 + cap.m_u * ru1 + cap.m_x * rx) + cap.m_v * v,
        (cap.u_m * rm1 + cap.u_u * ru1 + cap.u_x * rx) + cap.u_v * v,
        (rod.m_m * rm2 + rod.m_u * ru2 + rod.m_x * rx) + rod.m_v * v,
        (rod.u_m * rm2 + rod.u_u * ru2 + rod.u_x * rx) + rod.u_v * v,
    )
