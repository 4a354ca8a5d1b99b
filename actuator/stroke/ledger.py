"""The exergy ledger and the balances: integrals over a step, with the weights of the pair that made it.

A row of integrands or gains holds ``N_INTEGRAL`` numbers, in the order of the Q_* places.
"""

from __future__ import annotations

import math

from actuator.air.gas import CP, R_AIR
from actuator.stroke import dopri, rodas
from actuator.stroke import layout as at
from actuator.stroke.equations import Chamber, cap_chamber, opening, opposing, rod_chamber, rubbing
from actuator.stroke.slopes import cap_tangent, chamber_change, rod_tangent
from actuator.stroke.states import NOTHING, Row, State, Table, scaled, shifted, sizes, spread
from actuator.stroke.steppers import Stages, Step

_NUDGE = 1e-7
"""Size of a state's change for a difference quotient, over the state. [1]"""


def psi(p: float, temp: float, p0: float, t0: float) -> float:
    """Flow exergy of air against the dead state (p0, t0). [J/kg]"""
    return CP * (temp - t0) - t0 * entropy(p, temp, p0, t0)


def entropy(p: float, temp: float, p0: float, t0: float) -> float:
    """Specific entropy of air against the dead state (p0, t0). [J/(kg K)]"""
    return CP * math.log(temp / t0) - R_AIR * math.log(p / p0)


def mixing(q_in: float, t_in: float, temp: float, t0: float) -> float:
    """Exergy lost when inflow at ``t_in`` mixes into a chamber at ``temp``: T0·q·cp·(r - 1 - ln r). [W]"""
    if q_in <= 0.0:
        return 0.0
    r = t_in / temp
    return t0 * q_in * CP * (r - 1.0 - math.log(r))


def losses(cap: Chamber, rod: Chamber, v: float, mode: Row, par: Row, out: Row) -> None:
    """Integrands that are not linear in the transfers, to ``out[:N_LOSS]``; s = on the supply, e = on the exhaust."""
    p0, t0, p_line, t_supply = par[at.P_AMB], par[at.T_AMB], par[at.P_LINE], par[at.T_SUPPLY]
    if mode[at.SIDE] > 0.0:
        s, e, link, growth_e = cap, rod, at.CAP_LINK, -par[at.AREA_ROD] * v
    else:
        s, e, link, growth_e = rod, cap, at.ROD_LINK, par[at.AREA_CAP] * v
    theta = 0.0
    supplied = 0.0
    returned = 0.0
    produced = 0.0
    if s.inflow > 0.0:
        theta = R_AIR * t0 * s.inflow * math.log(p_line / s.p)
        supplied = s.inflow * psi(p_line, t_supply, p0, t0)
        produced -= s.inflow * entropy(p_line, t_supply, p0, t0)
    if s.outflow > 0.0:
        port = mode[link + at.PORT_P]
        theta = R_AIR * t0 * s.outflow * math.log(s.p / port)
        returned = s.outflow * psi(port, s.temp, p0, t0)
        produced += s.outflow * entropy(port, s.temp, p0, t0)
    side = 0.0
    if e.outflow > 0.0:
        side = R_AIR * t0 * e.outflow * math.log(e.p / p0) + e.outflow * psi(p0, e.temp, p0, t0)
        produced += e.outflow * entropy(p0, e.temp, p0, t0)
    if e.inflow > 0.0:
        side = R_AIR * t0 * e.inflow * math.log(p0 / e.p)
    xi_e = mixing(e.inflow, t0, e.temp, t0)
    direction = mode[at.DIRECTION]
    out[at.Q_SUPPLIED - at.N_STATE] = supplied - returned
    out[at.Q_LOAD - at.N_STATE] = direction * opposing(mode, par) * v - par[at.CONSTANT] * v
    out[at.Q_FRICTION - at.N_STATE] = direction * rubbing(v, mode, par) * v
    out[at.Q_STOP - at.N_STATE] = 0.0
    out[at.Q_THETA_SUPPLY - at.N_STATE] = theta
    out[at.Q_XI_SUPPLY - at.N_STATE] = mixing(s.inflow, t_supply, s.temp, t0)
    out[at.Q_XI_EXHAUST - at.N_STATE] = xi_e
    out[at.Q_EXHAUST_PATH - at.N_STATE] = p0 * growth_e - e.power
    out[at.Q_HEAT_LOSS - at.N_STATE] = -cap.heat * (1.0 - t0 / cap.temp) - rod.heat * (1.0 - t0 / rod.temp)
    out[at.Q_X_SIDE - at.N_STATE] = side + xi_e
    out[at.Q_FILLING - at.N_STATE] = theta if direction == 0.0 else 0.0
    out[at.Q_RETURNED - at.N_STATE] = returned
    out[at.Q_ENTROPY - at.N_STATE] = produced - (cap.heat + rod.heat) / t0
    out[at.Q_PISTON - at.N_STATE] = cap.power + rod.power - p0 * (par[at.AREA_CAP] - par[at.AREA_ROD]) * v


def transfers(cap: Chamber, rod: Chamber, carried1: float, carried2: float, mode: Row, out: Row) -> None:
    """Integrands linear in the exchange of both chambers, to ``out[N_LOSS:]``; or their changes.

    ``carried1`` and ``carried2`` are q_out·T of each chamber. [kg·K/s]
    """
    on_supply, on_exhaust = (cap, rod) if mode[at.SIDE] > 0.0 else (rod, cap)
    out[at.Q_DRAWN - at.N_STATE] = on_supply.inflow
    out[at.Q_GIVEN_BACK - at.N_STATE] = on_supply.outflow
    out[at.Q_VENTED - at.N_STATE] = on_exhaust.outflow - on_exhaust.inflow
    out[at.Q_IN_CAP - at.N_STATE] = cap.inflow
    out[at.Q_IN_ROD - at.N_STATE] = rod.inflow
    out[at.Q_OUT_CAP - at.N_STATE] = cap.outflow
    out[at.Q_OUT_ROD - at.N_STATE] = rod.outflow
    out[at.Q_HIN_CAP - at.N_STATE] = CP * cap.inflow * mode[at.CAP_LINK + at.PORT_T]
    out[at.Q_HIN_ROD - at.N_STATE] = CP * rod.inflow * mode[at.ROD_LINK + at.PORT_T]
    out[at.Q_HOUT_CAP - at.N_STATE] = CP * carried1
    out[at.Q_HOUT_ROD - at.N_STATE] = CP * carried2
    out[at.Q_WORK_CAP - at.N_STATE] = cap.power
    out[at.Q_WORK_ROD - at.N_STATE] = rod.power
    out[at.Q_WALL_CAP - at.N_STATE] = cap.heat
    out[at.Q_WALL_ROD - at.N_STATE] = rod.heat


def integrands(time: float, y: State, mode: Row, par: Row, out: Row) -> None:
    """All integrands at one state."""
    part = opening(time, mode)
    cap = cap_chamber(part, y, mode, par)
    rod = rod_chamber(part, y, mode, par)
    losses(cap, rod, y[at.V], mode, par, out)
    transfers(cap, rod, cap.outflow * cap.temp, rod.outflow * rod.temp, mode, out)


def losses_change(time: float, y: State, dt: float, dy: State, mode: Row, par: Row, here: Row, out: Row) -> None:
    """Derivative of the losses in direction (dt, dy) to ``out``, a difference quotient; ``here`` holds those at y."""
    part = _NUDGE / max(math.sqrt(spread(dy, NOTHING, sizes(y, y, par))), _NUDGE)
    aside = shifted(y, part, dy)
    later = opening(time + part * dt, mode)
    losses(cap_chamber(later, aside, mode, par), rod_chamber(later, aside, mode, par), aside[at.V], mode, par, out)
    for i in range(at.N_LOSS):
        out[i] = (out[i] - here[i]) / part


def transfers_change(time: float, y: State, dt: float, dy: State, mode: Row, par: Row, out: Row) -> None:
    """Derivative of the transfers in direction (dt, dy) to ``out``; exact, so that balances close."""
    dpart = dt / mode[at.OPEN_OVER] if time - mode[at.SWITCHED] < mode[at.OPEN_OVER] else 0.0
    air1 = cap_tangent(time, y, mode, par)
    air2 = rod_tangent(time, y, mode, par)
    cap = chamber_change(air1, par[at.AREA_CAP], dy[0], dy[1], dy[2], dy[3], dpart, par)
    rod = chamber_change(air2, -par[at.AREA_ROD], dy[0], dy[1], dy[4], dy[5], dpart, par)
    carried1 = air1.temp * cap.outflow + air1.part * air1.outflow * cap.temp
    carried2 = air2.temp * rod.outflow + air2.part * air2.outflow * rod.temp
    transfers(cap, rod, carried1, carried2, mode, out)


def book_explicit(time: float, h: float, step: Step, mode: Row, par: Row, work: Table, gain: Row) -> float:
    """Integrals over an explicit step to ``gain``; returns the largest step error among those watched. [J]"""
    s1, _, s3, s4, s5, s6 = step.stages
    r1, r3, r4, r5, r6, r7 = work[0], work[1], work[2], work[3], work[4], work[5]
    integrands(time, s1, mode, par, r1)
    integrands(time + h * dopri.T3, s3, mode, par, r3)
    integrands(time + h * dopri.T4, s4, mode, par, r4)
    integrands(time + h * dopri.T5, s5, mode, par, r5)
    integrands(time + h, s6, mode, par, r6)
    integrands(time + h, step.y, mode, par, r7)
    for i in range(at.N_INTEGRAL):
        gain[i] = h * (
            dopri.B1 * r1[i] + dopri.B3 * r3[i] + dopri.B4 * r4[i] + dopri.B5 * r5[i] + dopri.B6 * r6[i]
        )  # fmt: skip
    worst = 0.0
    for i in range(at.N_WATCHED):
        error = h * (
            dopri.E1 * r1[i] + dopri.E3 * r3[i] + dopri.E4 * r4[i]
            + dopri.E5 * r5[i] + dopri.E6 * r6[i] + dopri.E7 * r7[i]
        )  # fmt: skip
        worst = max(worst, abs(error))
    return worst


def weighted(u: Stages, w1: float, w2: float, w3: float, w4: float, w5: float, w6: float) -> State:
    """Sum of the increments in these weights."""
    total = scaled(w1, u[0])
    total = shifted(total, w2, u[1])
    total = shifted(total, w3, u[2])
    total = shifted(total, w4, u[3])
    total = shifted(total, w5, u[4])
    return shifted(total, w6, u[5])


def book_implicit(time: float, h: float, step: Step, mode: Row, par: Row, work: Table, gain: Row) -> float:
    """As :func:`book_explicit` over an implicit step, which has a share of the integrands' derivatives as well."""
    s1, s2, s3, s4, s5, s6 = step.stages
    r1, r2, r3, r4, r5, r6 = work[0], work[1], work[2], work[3], work[4], work[5]
    integrands(time, s1, mode, par, r1)
    integrands(time + h * rodas.T2, s2, mode, par, r2)
    integrands(time + h * rodas.T3, s3, mode, par, r3)
    integrands(time + h * rodas.T4, s4, mode, par, r4)
    integrands(time + h, s5, mode, par, r5)
    integrands(time + h, s6, mode, par, r6)
    u, change = step.increments, work[6]
    ahead = weighted(u, rodas.B1, rodas.B2, rodas.B3, rodas.B4, rodas.B5, rodas.B6)
    losses_change(time, s1, h * rodas.BD, ahead, mode, par, r1, change)
    transfers_change(time, s1, h * rodas.BD, ahead, mode, par, change)
    for i in range(at.N_INTEGRAL):
        gain[i] = h * (
            rodas.B1 * r1[i] + rodas.B2 * r2[i] + rodas.B3 * r3[i]
            + rodas.B4 * r4[i] + rodas.B5 * r5[i] + rodas.B6 * r6[i] + change[i]
        )  # fmt: skip
    ahead = weighted(u, rodas.E1, rodas.E2, rodas.E3, rodas.E4, rodas.E5, rodas.E6)
    losses_change(time, s1, h * rodas.ED, ahead, mode, par, r1, change)
    worst = 0.0
    for i in range(at.N_WATCHED):
        error = h * (
            rodas.E1 * r1[i] + rodas.E2 * r2[i] + rodas.E3 * r3[i]
            + rodas.E4 * r4[i] + rodas.E5 * r5[i] + rodas.E6 * r6[i] + change[i]
        )  # fmt: skip
        worst = max(worst, abs(error))
    return worst


def book(time: float, h: float, implicit: bool, step: Step, mode: Row, par: Row, work: Table, gain: Row) -> float:
    """Integrals over a step to ``gain``; returns their largest step error over 0.3 of the cycle's exergy. [1]"""
    if implicit:
        worst = book_implicit(time, h, step, mode, par, work, gain)
    else:
        worst = book_explicit(time, h, step, mode, par, work, gain)
    return worst / (0.3 * par[at.LEDGER_SCALE])
