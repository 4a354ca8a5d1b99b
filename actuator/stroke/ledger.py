"""The exergy ledger and the balances: integrals over a step, with the weights of the pair that made it.

A row of integrands or gains holds ``N_INTEGRAL`` numbers, in the order of the Q_* places.
"""

from __future__ import annotations

import math

from actuator.air.gas import CP, R_AIR
from actuator.stroke import dopri, rodas
from actuator.stroke import layout as at
from actuator.stroke.equations import Chamber, Row, State, cap_chamber, opposing, rod_chamber, rubbing
from actuator.stroke.slopes import cap_tangent, chamber_change, rod_tangent
from actuator.stroke.steppers import NOTHING, Stages, Step, shifted, sizes, spread

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


def tally(
    time: float, y: State, weight: float, doubt: float, mode: Row, par: Row, out: Row, gain: Row, error: Row
) -> None:
    """Add the integrands at one stage, in the weights of the solution to ``gain`` and of the error to ``error``."""
    cap = cap_chamber(time, y, mode, par)
    rod = rod_chamber(time, y, mode, par)
    losses(cap, rod, y[at.V], mode, par, out)
    transfers(cap, rod, cap.outflow * cap.temp, rod.outflow * rod.temp, mode, out)
    for i in range(at.N_INTEGRAL):
        gain[i] += weight * out[i]
    for i in range(at.N_WATCHED):
        error[i] += doubt * out[i]


def tally_change(
    time: float, y: State, dt: float, dy: State, h: float, mode: Row, par: Row, out: Row, back: Row, total: Row
) -> None:
    """Add h times the derivative of the integrands in direction (dt, dy) to ``total``, as long as that row is.

    Exact for the transfers, so that balances close; a difference quotient for the losses.
    """
    size = math.sqrt(spread(dy, NOTHING, sizes(y, y, par)))
    part = _NUDGE / max(size, _NUDGE)
    losses(cap_chamber(time, y, mode, par), rod_chamber(time, y, mode, par), y[at.V], mode, par, back)
    aside = shifted(y, part, dy)
    later = time + part * dt
    losses(cap_chamber(later, aside, mode, par), rod_chamber(later, aside, mode, par), aside[at.V], mode, par, out)
    for i in range(min(at.N_LOSS, len(total))):
        total[i] += h * (out[i] - back[i]) / part
    if len(total) <= at.N_LOSS:
        return
    dpart = dt / mode[at.OPEN_OVER] if time - mode[at.SWITCHED] < mode[at.OPEN_OVER] else 0.0
    air1 = cap_tangent(time, y, mode, par)
    air2 = rod_tangent(time, y, mode, par)
    cap = chamber_change(air1, par[at.AREA_CAP], dy[0], dy[1], dy[2], dy[3], dpart, par)
    rod = chamber_change(air2, -par[at.AREA_ROD], dy[0], dy[1], dy[4], dy[5], dpart, par)
    carried1 = air1.temp * cap.outflow + air1.part * air1.outflow * cap.temp
    carried2 = air2.temp * rod.outflow + air2.part * air2.outflow * rod.temp
    transfers(cap, rod, carried1, carried2, mode, out)
    for i in range(at.N_LOSS, at.N_INTEGRAL):
        total[i] += h * out[i]


def book_explicit(time: float, h: float, step: Step, mode: Row, par: Row, out: Row, gain: Row, error: Row) -> None:
    """Integrals over an explicit step to ``gain``, their step error to ``error``."""
    s1, _, s3, s4, s5, s6 = step.stages
    tally(time, s1, h * dopri.B1, h * dopri.E1, mode, par, out, gain, error)
    tally(time + h * dopri.T3, s3, h * dopri.B3, h * dopri.E3, mode, par, out, gain, error)
    tally(time + h * dopri.T4, s4, h * dopri.B4, h * dopri.E4, mode, par, out, gain, error)
    tally(time + h * dopri.T5, s5, h * dopri.B5, h * dopri.E5, mode, par, out, gain, error)
    tally(time + h, s6, h * dopri.B6, h * dopri.E6, mode, par, out, gain, error)
    tally(time + h, step.y, 0.0, h * dopri.E7, mode, par, out, gain, error)


def weighted(u: Stages, w1: float, w2: float, w3: float, w4: float, w5: float, w6: float) -> State:
    """Sum of the increments in these weights."""
    total = shifted(NOTHING, w1, u[0])
    total = shifted(total, w2, u[1])
    total = shifted(total, w3, u[2])
    total = shifted(total, w4, u[3])
    total = shifted(total, w5, u[4])
    return shifted(total, w6, u[5])


def book_implicit(
    time: float, h: float, step: Step, mode: Row, par: Row, out: Row, back: Row, gain: Row, error: Row
) -> None:
    """Integrals over an implicit step to ``gain``, their step error to ``error``; the derivatives' share as well."""
    s1, s2, s3, s4, s5, s6 = step.stages
    tally(time, s1, h * rodas.B1, h * rodas.E1, mode, par, out, gain, error)
    tally(time + h * rodas.T2, s2, h * rodas.B2, h * rodas.E2, mode, par, out, gain, error)
    tally(time + h * rodas.T3, s3, h * rodas.B3, h * rodas.E3, mode, par, out, gain, error)
    tally(time + h * rodas.T4, s4, h * rodas.B4, h * rodas.E4, mode, par, out, gain, error)
    tally(time + h, s5, h * rodas.B5, h * rodas.E5, mode, par, out, gain, error)
    tally(time + h, s6, h * rodas.B6, h * rodas.E6, mode, par, out, gain, error)
    u = step.increments
    ahead = weighted(u, rodas.B1, rodas.B2, rodas.B3, rodas.B4, rodas.B5, rodas.B6)
    tally_change(time, s1, h * rodas.BD, ahead, h, mode, par, out, back, gain)
    ahead = weighted(u, rodas.E1, rodas.E2, rodas.E3, rodas.E4, rodas.E5, rodas.E6)
    tally_change(time, s1, h * rodas.ED, ahead, h, mode, par, out, back, error)


def book(
    time: float, h: float, implicit: bool, step: Step, mode: Row, par: Row, work: Row, gain: Row, error: Row
) -> float:
    """Integrals over a step to ``gain``; their largest step error over 0.3 of the cycle's exergy is returned. [1]"""
    for i in range(at.N_INTEGRAL):
        gain[i] = 0.0
    for i in range(at.N_WATCHED):
        error[i] = 0.0
    out = work[: at.N_INTEGRAL]
    back = work[at.N_INTEGRAL :]
    if implicit:
        book_implicit(time, h, step, mode, par, out, back, gain, error)
    else:
        book_explicit(time, h, step, mode, par, out, gain, error)
    worst = 0.0
    for i in range(at.N_WATCHED):
        worst = max(worst, abs(error[i]))
    return worst / (0.3 * par[at.LEDGER_SCALE])
