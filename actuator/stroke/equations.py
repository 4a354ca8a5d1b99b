"""The equations of one cylinder: rates of state and ledger, and what holds the piston at rest.

Plain typed Python that runs as it stands and also compiled by numba: floats, flat rows and ifs only. A row is
a list of floats when interpreted and an array when compiled. Notation as in PHYSICS notes of the docstrings:
x from the cap end, 1 = cap side, 2 = rod side, absolute pressures.
"""

from __future__ import annotations

import math

from actuator.air.gas import CP, CV, GAMMA, R_AIR
from actuator.flow.scalar import passage
from actuator.mechanics.friction import running
from actuator.stroke import layout as at

Row = list[float]

_GAMMA_1 = GAMMA - 1.0


def psi(p: float, temp: float, p0: float, t0: float) -> float:
    """Flow exergy of air against the dead state (p0, t0). [J/kg]"""
    return CP * (temp - t0) - t0 * (CP * math.log(temp / t0) - R_AIR * math.log(p / p0))


def entropy(p: float, temp: float, p0: float, t0: float) -> float:
    """Specific entropy of air against the dead state (p0, t0). [J/(kg K)]"""
    return CP * math.log(temp / t0) - R_AIR * math.log(p / p0)


def wall_heat(
    h: float,
    index: float,
    area: float,
    t_wall: float,
    temp: float,
    q_in: float,
    t_in: float,
    q_out: float,
    pdv: float,
) -> float:
    """Heat from the wall to a chamber's air. [W]

    With ``index`` 0 it is h·A_w·(T_w - T); else the heat that a polytropic change of that index implies,
    (n - γ)/(γ - 1)·(R·T_in·q_in - R·T·q_out - p·dV/dt).
    """
    if index == 0.0:
        return h * area * (t_wall - temp)
    return (index - GAMMA) / _GAMMA_1 * (R_AIR * (t_in * q_in - temp * q_out) - pdv)


def mixing(q_in: float, t_in: float, temp: float, t0: float) -> float:
    """Exergy lost when inflow at ``t_in`` mixes into a chamber at ``temp``: T0·q·cp·(r - 1 - ln r). [W]"""
    if q_in <= 0.0:
        return 0.0
    r = t_in / temp
    return t0 * q_in * CP * (r - 1.0 - math.log(r))


def rates(time: float, y: Row, mode: Row, par: Row, out: Row, base: int, ledger: bool) -> None:
    """Rates of all states, and of the ledger's integrals, written to ``out[base:]``.

    Each chamber: dm/dt = Σq;  dU/dt = Σq_in·cp·T_in - Σq_out·cp·T - p·dV/dt + Q̇. Piston: M·dv/dt = p1·A1 - p2·A2
    - p0·(A1 - A2) - M·g·sin α + F_const - opposing forces - friction. At rest (DIRECTION 0) x and v do not move.
    """
    x = y[at.X]
    direction = mode[at.DIRECTION]
    v = y[at.V] if direction != 0.0 else 0.0
    area1 = par[at.AREA_CAP]
    area2 = par[at.AREA_ROD]
    p0 = par[at.P_AMB]
    t0 = par[at.T_AMB]
    # a stage that is tried may lie beyond an end or below zero: kept positive, the step error then rejects it
    vol1 = max(par[at.DEAD_CAP] + area1 * x, 0.1 * par[at.DEAD_CAP])
    vol2 = max(par[at.DEAD_ROD] + area2 * (par[at.STROKE] - x), 0.1 * par[at.DEAD_ROD])
    mass1 = max(y[at.M_CAP], 1e-12)
    mass2 = max(y[at.M_ROD], 1e-12)
    energy1 = max(y[at.U_CAP], 1e-7)
    energy2 = max(y[at.U_ROD], 1e-7)
    p1 = _GAMMA_1 * energy1 / vol1
    p2 = _GAMMA_1 * energy2 / vol2
    temp1 = energy1 / (mass1 * CV)
    temp2 = energy2 / (mass2 * CV)

    opening = 1.0
    since = time - mode[at.SWITCHED]
    if since < mode[at.OPEN_OVER]:
        opening = max(since, 0.0) / mode[at.OPEN_OVER]
    supply_open = 0.0 if mode[at.SHUT] > 0.5 else opening
    t_supply = par[at.T_SUPPLY]

    cap_on_supply = mode[at.SIDE] > 0.0
    if cap_on_supply:
        port1 = par[at.P_EXTEND]
        port2 = p0
        port_temp1 = t_supply
        port_temp2 = t0
        open1 = supply_open
        open2 = opening
        into1 = at.CAP_FILL + at.FILL
        outof1 = at.CAP_FILL + at.BACK
        into2 = at.ROD_FILL + at.SUCK
        outof2 = at.ROD_FILL + at.VENT
    else:
        port1 = p0
        port2 = par[at.P_RETRACT]
        port_temp1 = t0
        port_temp2 = t_supply
        open1 = opening
        open2 = supply_open
        into1 = at.CAP_FILL + at.SUCK
        outof1 = at.CAP_FILL + at.VENT
        into2 = at.ROD_FILL + at.FILL
        outof2 = at.ROD_FILL + at.BACK
    in1 = passage(port1, p1, port_temp1, par[into1] * open1, par[into1 + 1], par[into1 + 2])
    out1 = passage(p1, port1, temp1, par[outof1] * open1, par[outof1 + 1], par[outof1 + 2])
    in2 = passage(port2, p2, port_temp2, par[into2] * open2, par[into2 + 1], par[into2 + 2])
    out2 = passage(p2, port2, temp2, par[outof2] * open2, par[outof2 + 1], par[outof2 + 2])

    power1 = p1 * area1 * v
    power2 = -p2 * area2 * v
    h = par[at.HEAT]
    index = par[at.INDEX]
    wall1 = math.pi * par[at.BORE] * x + 2.0 * area1
    wall2 = math.pi * par[at.BORE] * (par[at.STROKE] - x) + 2.0 * area2
    heat1 = wall_heat(h, index, wall1, t0, temp1, in1, port_temp1, out1, power1)
    heat2 = wall_heat(h, index, wall2, t0, temp2, in2, port_temp2, out2, power2)

    opposing = 0.0
    rubbing = 0.0
    acceleration = 0.0
    if direction != 0.0:
        opposing = par[at.EXTEND_FORCE] + mode[at.PROCESS] if direction > 0.0 else par[at.RETRACT_FORCE]
        rubbing = par[at.GUIDE] + running(
            direction * v, par[at.BREAKAWAY], par[at.COULOMB], par[at.VISCOUS], par[at.STRIBECK]
        )
        push = p1 * area1 - p2 * area2 - p0 * (area1 - area2) - par[at.WEIGHT] + par[at.CONSTANT]
        acceleration = (push - direction * (opposing + rubbing)) / par[at.MASS]

    out[base + at.X] = v
    out[base + at.V] = acceleration
    out[base + at.M_CAP] = in1 - out1
    out[base + at.U_CAP] = CP * (in1 * port_temp1 - out1 * temp1) - power1 + heat1
    out[base + at.M_ROD] = in2 - out2
    out[base + at.U_ROD] = CP * (in2 * port_temp2 - out2 * temp2) - power2 + heat2
    if not ledger:
        return

    # Exergy ledger: s = chamber on the supply, e = chamber on the exhaust.
    if cap_on_supply:
        in_s, out_s, in_e, out_e = in1, out1, in2, out2
        p_s, p_e, temp_s, temp_e = p1, p2, temp1, temp2
        port_s, power_e = port1, power2
        volume_rate_e = -area2 * v
    else:
        in_s, out_s, in_e, out_e = in2, out2, in1, out1
        p_s, p_e, temp_s, temp_e = p2, p1, temp2, temp1
        port_s, power_e = port2, power1
        volume_rate_e = area1 * v
    p_line = par[at.P_LINE]
    theta = 0.0
    supplied = 0.0
    returned = 0.0
    produced = 0.0
    if in_s > 0.0:
        theta = R_AIR * t0 * in_s * math.log(p_line / p_s)
        supplied = in_s * psi(p_line, t_supply, p0, t0)
        produced -= in_s * entropy(p_line, t_supply, p0, t0)
    if out_s > 0.0:
        theta = R_AIR * t0 * out_s * math.log(p_s / port_s)
        returned = out_s * psi(port_s, temp_s, p0, t0)
        produced += out_s * entropy(port_s, temp_s, p0, t0)
    side = 0.0
    if out_e > 0.0:
        side = R_AIR * t0 * out_e * math.log(p_e / p0) + out_e * psi(p0, temp_e, p0, t0)
        produced += out_e * entropy(p0, temp_e, p0, t0)
    if in_e > 0.0:
        side = R_AIR * t0 * in_e * math.log(p0 / p_e)
    xi_s = mixing(in_s, t_supply, temp_s, t0)
    xi_e = mixing(in_e, t0, temp_e, t0)
    out[base + at.Q_SUPPLIED] = supplied - returned
    out[base + at.Q_LOAD] = direction * opposing * v - par[at.CONSTANT] * v
    out[base + at.Q_FRICTION] = direction * rubbing * v
    out[base + at.Q_STOP] = 0.0
    out[base + at.Q_THETA_SUPPLY] = theta
    out[base + at.Q_XI_SUPPLY] = xi_s
    out[base + at.Q_XI_EXHAUST] = xi_e
    out[base + at.Q_EXHAUST_PATH] = p0 * volume_rate_e - power_e
    out[base + at.Q_HEAT_LOSS] = -heat1 * (1.0 - t0 / temp1) - heat2 * (1.0 - t0 / temp2)
    out[base + at.Q_X_SIDE] = side + xi_e
    out[base + at.Q_FILLING] = theta if direction == 0.0 else 0.0
    out[base + at.Q_RETURNED] = returned
    out[base + at.Q_DRAWN] = in_s
    out[base + at.Q_GIVEN_BACK] = out_s
    out[base + at.Q_VENTED] = out_e - in_e
    out[base + at.Q_ENTROPY] = produced - (heat1 + heat2) / t0
    out[base + at.Q_PISTON] = (p1 * area1 - p2 * area2 - p0 * (area1 - area2)) * v
    out[base + at.Q_IN_CAP] = in1
    out[base + at.Q_IN_ROD] = in2
    out[base + at.Q_OUT_CAP] = out1
    out[base + at.Q_OUT_ROD] = out2
    out[base + at.Q_HIN_CAP] = CP * in1 * port_temp1
    out[base + at.Q_HIN_ROD] = CP * in2 * port_temp2
    out[base + at.Q_HOUT_CAP] = CP * out1 * temp1
    out[base + at.Q_HOUT_ROD] = CP * out2 * temp2
    out[base + at.Q_WORK_CAP] = power1
    out[base + at.Q_WORK_ROD] = power2
    out[base + at.Q_WALL_CAP] = heat1
    out[base + at.Q_WALL_ROD] = heat2


def drive(y: Row, par: Row) -> float:
    """Force on the piston at rest, positive extending: D = p1·A1 - p2·A2 - p0·(A1 - A2) - M·g·sin α + F. [N]"""
    vol1 = par[at.DEAD_CAP] + par[at.AREA_CAP] * y[at.X]
    vol2 = par[at.DEAD_ROD] + par[at.AREA_ROD] * (par[at.STROKE] - y[at.X])
    p1 = _GAMMA_1 * y[at.U_CAP] / vol1
    p2 = _GAMMA_1 * y[at.U_ROD] / vol2
    return (
        p1 * par[at.AREA_CAP]
        - p2 * par[at.AREA_ROD]
        - par[at.P_AMB] * (par[at.AREA_CAP] - par[at.AREA_ROD])
        - par[at.WEIGHT]
        + par[at.CONSTANT]
    )


def excess(y: Row, mode: Row, par: Row) -> float:
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
