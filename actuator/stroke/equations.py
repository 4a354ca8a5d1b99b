"""The equations of one cylinder: rates of its state, and what holds the piston at rest.

Plain typed Python that runs as it stands and also compiled by numba: floats, tuples of floats, flat rows and ifs
only. x counts from the cap end, 1 = cap side, 2 = rod side, absolute pressures.
"""

from __future__ import annotations

import math
from typing import NamedTuple

from actuator.air.gas import CP, CV, GAMMA, R_AIR
from actuator.flow.scalar import passage
from actuator.mechanics.friction import running
from actuator.stroke import layout as at
from actuator.stroke.states import Row, State

_GAMMA_1 = GAMMA - 1.0


class Chamber(NamedTuple):
    """Air of one chamber and what it exchanges."""

    p: float
    """Absolute pressure. [Pa]"""
    temp: float
    """Temperature. [K]"""
    inflow: float
    """Through the port into the chamber, not negative. [kg/s]"""
    outflow: float
    """Out of the chamber, not negative. [kg/s]"""
    power: float
    """Work on the piston, p·dV/dt. [W]"""
    heat: float
    """From the wall to the air. [W]"""
    gain: float
    """Rate of internal energy, q_in·cp·T_in - q_out·cp·T - p·dV/dt + Q̇. [W]"""


def connect(mode: Row, par: Row) -> None:
    """Write to ``mode`` what each chamber is connected to, from SIDE and SHUT."""
    for side in (1.0, -1.0):
        link = at.CAP_LINK if side > 0.0 else at.ROD_LINK
        path = at.CAP_FILL if side > 0.0 else at.ROD_FILL
        if side == mode[at.SIDE]:
            mode[link + at.PORT_P] = par[at.P_EXTEND] if side > 0.0 else par[at.P_RETRACT]
            mode[link + at.PORT_T] = par[at.T_SUPPLY]
            into, out_of = at.FILL, at.BACK
        else:
            mode[link + at.PORT_P] = par[at.P_AMB]
            mode[link + at.PORT_T] = par[at.T_AMB]
            into, out_of = at.SUCK, at.VENT
        for i in range(3):
            mode[link + at.INTO + i] = par[path + into + i]
            mode[link + at.OUT_OF + i] = par[path + out_of + i]
        if side == mode[at.SIDE] and mode[at.SHUT] > 0.5:
            mode[link + at.INTO] = 0.0
            mode[link + at.OUT_OF] = 0.0


def opening(time: float, mode: Row) -> float:
    """Open share of both valve paths, rising linearly over the opening time. [1]"""
    over = mode[at.OPEN_OVER]
    since = time - mode[at.SWITCHED]
    if since >= over or over <= 0.0:
        return 1.0
    return max(since, 0.0) / over


def wall_heat(
    h: float, index: float, area: float, t_wall: float, temp: float, q_in: float, t_in: float, q_out: float, pdv: float
) -> float:
    """Heat from the wall to a chamber's air. [W]

    With ``index`` 0 it is h·A_w·(T_w - T); else the heat that a polytropic change of that index implies,
    (n - γ)/(γ - 1)·(R·T_in·q_in - R·T·q_out - p·dV/dt).
    """
    if index == 0.0:
        return h * area * (t_wall - temp)
    return (index - GAMMA) / _GAMMA_1 * (R_AIR * (t_in * q_in - temp * q_out) - pdv)


def chamber(
    m: float,
    u: float,
    dead: float,
    volume: float,
    growth: float,
    wall: float,
    part: float,
    link: int,
    mode: Row,
    par: Row,
) -> Chamber:
    """State of a chamber's air and what it exchanges.

    Parameters
    ----------
    m, u : float
        Mass and internal energy. [kg, J]
    dead, volume, growth, wall : float
        Dead volume, whole volume, its rate, and area of the wall. [m³, m³, m³/s, m²]
    part : float
        Opening of the valve. [1]
    link : int
        Place of the chamber's connection in ``mode``.
    """
    # a stage that is tried may lie beyond an end or below zero: kept positive, the step error then rejects it
    m = m if m > 1e-12 else 1e-12
    u = u if u > 1e-7 else 1e-7
    volume = volume if volume > 0.1 * dead else 0.1 * dead
    p = _GAMMA_1 * u / volume
    temp = u / (m * CV)
    port = mode[link + at.PORT_P]
    port_temp = mode[link + at.PORT_T]
    inflow = 0.0
    outflow = 0.0
    if port > p:
        place = link + at.INTO
        inflow = passage(port, p, port_temp, part * mode[place], mode[place + 1], mode[place + 2])
    else:
        place = link + at.OUT_OF
        outflow = passage(p, port, temp, part * mode[place], mode[place + 1], mode[place + 2])
    power = p * growth
    heat = wall_heat(par[at.HEAT], par[at.INDEX], wall, par[at.T_AMB], temp, inflow, port_temp, outflow, power)
    gain = CP * port_temp * inflow - CP * temp * outflow + (heat - power)
    return Chamber(p, temp, inflow, outflow, power, heat, gain)


def vented(growth: float, par: Row) -> Chamber:
    """A side that is open to the atmosphere, as on the spring of a single-acting cylinder."""
    return Chamber(par[at.P_AMB], par[at.T_AMB], 0.0, 0.0, par[at.P_AMB] * growth, 0.0, 0.0)


def cap_chamber(part: float, y: State, mode: Row, par: Row) -> Chamber:
    """:func:`chamber` of the cap side, with the valve open by ``part``."""
    x, area, dead = y[at.X], par[at.AREA_CAP], par[at.DEAD_CAP]
    if par[at.VENTED_CAP] > 0.5:
        return vented(area * y[at.V], par)
    wall = math.pi * par[at.BORE] * x + 2.0 * area
    return chamber(
        y[at.M_CAP], y[at.U_CAP], dead, dead + area * x, area * y[at.V], wall, part, at.CAP_LINK, mode, par
    )  # fmt: skip


def rod_chamber(part: float, y: State, mode: Row, par: Row) -> Chamber:
    """:func:`chamber` of the rod side, with the valve open by ``part``."""
    x, area, dead = par[at.STROKE] - y[at.X], par[at.AREA_ROD], par[at.DEAD_ROD]
    if par[at.VENTED_ROD] > 0.5:
        return vented(-area * y[at.V], par)
    wall = math.pi * par[at.BORE] * x + 2.0 * area
    return chamber(
        y[at.M_ROD], y[at.U_ROD], dead, dead + area * x, -area * y[at.V], wall, part, at.ROD_LINK, mode, par
    )  # fmt: skip


def opposing(mode: Row, par: Row) -> float:
    """Load force against the motion; of either sign only if the document's forces are. [N]"""
    return par[at.EXTEND_FORCE] + mode[at.PROCESS] if mode[at.DIRECTION] > 0.0 else par[at.RETRACT_FORCE]


def rubbing(v: float, mode: Row, par: Row) -> float:
    """Friction of seals and guide against the motion. [N]"""
    return par[at.GUIDE] + running(
        mode[at.DIRECTION] * v, par[at.BREAKAWAY], par[at.COULOMB], par[at.VISCOUS], par[at.STRIBECK]
    )


def push(p1: float, p2: float, x: float, par: Row) -> float:
    """Drive D = p1·A1 - p2·A2 - p0·(A1 - A2) - M·g·sin α + F_const + F_spring(x), positive extending. [N]"""
    area1, area2 = par[at.AREA_CAP], par[at.AREA_ROD]
    pressures = p1 * area1 - p2 * area2 - par[at.P_AMB] * (area1 - area2)
    return pressures - par[at.WEIGHT] + par[at.CONSTANT] + par[at.SPRING_FORCE] + par[at.SPRING_RATE] * x


def rates(time: float, y: State, mode: Row, par: Row) -> State:
    """Rates of the six states.

    Each chamber: dm/dt = q_in - q_out and dU/dt, its gain. Piston: M·dv/dt = D - opposing forces - friction;
    at rest (DIRECTION 0, v 0) x and v do not move.
    """
    part = opening(time, mode)
    cap = cap_chamber(part, y, mode, par)
    rod = rod_chamber(part, y, mode, par)
    direction = mode[at.DIRECTION]
    acceleration = 0.0
    if direction != 0.0:
        against = opposing(mode, par) + rubbing(y[at.V], mode, par)
        acceleration = (push(cap.p, rod.p, y[at.X], par) - direction * against) / par[at.MASS]
    return y[at.V], acceleration, cap.inflow - cap.outflow, cap.gain, rod.inflow - rod.outflow, rod.gain


def drive(y: State, par: Row) -> float:
    """Force D on the piston at rest, positive extending. [N]"""
    vol1 = par[at.DEAD_CAP] + par[at.AREA_CAP] * y[at.X]
    vol2 = par[at.DEAD_ROD] + par[at.AREA_ROD] * (par[at.STROKE] - y[at.X])
    p1 = par[at.P_AMB] if par[at.VENTED_CAP] > 0.5 else _GAMMA_1 * y[at.U_CAP] / vol1
    p2 = par[at.P_AMB] if par[at.VENTED_ROD] > 0.5 else _GAMMA_1 * y[at.U_ROD] / vol2
    return push(p1, p2, y[at.X], par)


def excess(y: State, mode: Row, par: Row) -> float:
    """By how much the drive exceeds what holds the piston, the larger of both ways; never through an end. [N]

    Extending starts where D > F_b + μ·M·g·cos α + F_ext(x), retracting where -D > F_b + μ·M·g·cos α + F_ret.
    """
    d = drive(y, par)
    hold = par[at.BREAKAWAY] + par[at.GUIDE]
    out = d - hold - par[at.EXTEND_FORCE] - mode[at.PROCESS]
    back = -d - hold - par[at.RETRACT_FORCE]
    if y[at.X] >= par[at.STROKE]:
        return back
    if y[at.X] <= 0.0:
        return out
    return max(out, back)
