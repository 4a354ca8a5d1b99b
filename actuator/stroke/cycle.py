"""The cycle of one cylinder: phases of rest and motion, valve switching, and the events between them.

Every event (start of motion, end, reversal, edge of a process force, cut-off, valve switching, end of the
opening ramp) ends a step exactly: steps are shortened onto it, never interpolated over it.
"""

from __future__ import annotations

from collections.abc import Sequence

from actuator.stroke import layout as at
from actuator.stroke.equations import Row, excess, rates
from actuator.stroke.events import (
    EDGE,
    END,
    REVERSAL,
    START,
    event_slope,
    event_value,
    first_guess,
    first_step,
    log,
    next_edge,
    process_at,
    record,
    start_direction,
)
from actuator.stroke.steppers import error_norm, explicit_step, implicit_step, jacobian

_STEP_LIMIT = 20000.0
"""Steps of one cycle after which it is given up. [1]"""
_SETTLE_STEPS = 30000.0
"""Steps after which no further cycle is begun, whether the state repeats or not. [1]"""


def step(
    implicit: bool,
    time: float,
    h: float,
    y: Row,
    mode: Row,
    par: Row,
    n: int,
    k: Row,
    stage: Row,
    new: Row,
    error: Row,
    jac: Row,
    lu: Row,
    pivot: Row,
    u: Row,
    ledger: bool,
) -> float:
    """One step of either pair; returns the stiffness estimate of the explicit one, 0 of the implicit. [1]"""
    if implicit:
        implicit_step(time, h, y, mode, par, n, k, stage, new, error, jac, lu, pivot, u, ledger)
        return 0.0
    return explicit_step(time, h, y, mode, par, n, k, stage, new, error, ledger)


def cycle(
    period: float,
    until: float,
    rtol: float,
    ledger: bool,
    y: Row,
    mode: Row,
    par: Row,
    switches: Row,
    edges: Row,
    forces: Row,
    history: Row,
    events: Row,
    info: Row,
    k: Row,
    stage: Row,
    new: Row,
    error: Row,
    jac: Row,
    lu: Row,
    u: Row,
    stop: Sequence[int],
) -> float:
    """Integrate from time 0 to ``period``; state and mode are left as they are there.

    Parameters
    ----------
    period : float
        Length of the cycle. [s]
    until : float
        1 or -1: end at the arrival at the extended or retracted end; 0: at the end of the period. [1]
    rtol : float
        Step tolerance. [1]
    ledger : bool
        Whether the integrals behind the first six states are carried; the rows then hold ``N_LEDGER`` entries.
    y, mode, par : row
        State, mode and parameters as in :mod:`actuator.stroke.layout`; ``y`` and ``mode`` are changed.
    switches : row
        Pairs (time, side) within the period, in order. [s, 1]
    edges, forces : row
        Edges of the process force [m] and the force below each and beyond the last [N].
    history, events, info : row
        Filled; ``history`` may be empty.
    k, stage, new, error, jac, lu, u : row
        Work space: 7n, n, n, n, 7n, 42, 6n.
    stop : sequence of int
        Non-zero ends the work.

    Returns
    -------
    float
        Status, one of the codes of :mod:`actuator.stroke.layout`.
    """
    n = at.N_LEDGER if ledger else at.N_STATE
    pivot = lu[36:]
    time = 0.0
    upcoming = 0
    h = 0.0
    fresh = True
    stale = True
    limp = 0
    step_limit = info[at.I_STEPS] + _STEP_LIMIT
    info[at.I_EVENTS] = 0.0
    info[at.I_ROWS] = 0.0
    while True:
        while upcoming < len(switches) // 2 and switches[2 * upcoming] <= time + 1e-13 * period:
            side = switches[2 * upcoming + 1]
            upcoming += 1
            mode[at.SIDE] = side
            mode[at.SWITCHED] = time
            mode[at.OPEN_OVER] = par[at.OPENING]
            past = y[at.X] >= par[at.CUT_EXTEND] if side > 0.0 else y[at.X] <= par[at.CUT_RETRACT]
            mode[at.SHUT] = 1.0 if past else 0.0
            mode[at.STIFF] = 0.0
            log(time, at.SWITCH, side, y, events, info)
            fresh = True
        if time >= period * (1.0 - 1e-13):
            break
        limit = period
        if upcoming < len(switches) // 2:
            limit = switches[2 * upcoming]
        ramp_end = mode[at.SWITCHED] + mode[at.OPEN_OVER]
        if mode[at.OPEN_OVER] > 0.0:
            if ramp_end <= time:
                mode[at.OPEN_OVER] = 0.0
            elif ramp_end < limit:
                limit = ramp_end

        if fresh:
            if mode[at.DIRECTION] == 0.0 and mode[at.ARMED] > 0.5 and excess(y, mode, par) >= 0.0:
                mode[at.DIRECTION] = start_direction(y, mode, par)
                log(time, at.START, mode[at.DIRECTION], y, events, info)
            rates(time, y, mode, par, k, 0, ledger)
            info[at.I_RATES] += 1.0
            h = first_step(y, k, par)
            record(time, y, k, mode, history, info)
            fresh = False
            stale = True
            limp = 0

        direction = mode[at.DIRECTION]
        moving = direction != 0.0
        implicit = not moving or mode[at.STIFF] > 0.5
        if implicit and stale:
            jacobian(time, y, mode, par, n, k, stage, jac, new, ledger)
            info[at.I_RATES] += 6.0 if moving else 4.0
            stale = False

        # one accepted step
        tried = 0
        taken = 0.0
        eigen = 0.0
        while True:
            if stop[0] != 0:
                return at.STOPPED
            info[at.I_STEPS] += 1.0
            if info[at.I_STEPS] > step_limit:
                return at.TOO_MANY_STEPS
            taken = h
            if time + 1.001 * h >= limit:
                taken = limit - time
            elif time + 2.0 * h > limit:
                taken = 0.5 * (limit - time)
            eigen = step(implicit, time, taken, y, mode, par, n, k, stage, new, error, jac, lu, pivot, u, ledger)
            info[at.I_RATES] += 6.0
            norm = error_norm(y, new, error, par, rtol, moving, ledger)
            power = 0.25 if implicit else 0.2
            if norm <= 1.0:
                grow = 5.0 if norm < 1e-4 else min(5.0, 0.9 * norm ** (-power))
                if tried > 0:
                    grow = min(grow, 1.0)
                h = max(taken * grow, h if taken < h else 0.0)
                break
            tried += 1
            h = taken * (max(0.2, 0.9 * norm ** (-power)) if norm < 1e12 else 0.2)
        if not implicit:
            limp = limp + 1 if eigen > 1.5 else max(limp - 1, 0)
            if limp >= 12:
                mode[at.STIFF] = 1.0

        # which event lies within the step
        kind = -1
        target = 0.0
        soonest = taken
        if moving:
            if y[at.V] == 0.0 and direction * new[at.V] <= 0.0:
                mode[at.DIRECTION] = 0.0
                mode[at.ARMED] = 0.0
                log(time, at.STICK, direction, y, events, info)
                fresh = True
                continue
            end = par[at.STROKE] if direction > 0.0 else 0.0
            edge = next_edge(y[at.X], mode, par, edges)
            for trial in range(3):
                goal = edge if trial == EDGE else end
                g1 = event_value(trial, new, mode, par, goal)
                if g1 >= 0.0:
                    g0 = event_value(trial, y, mode, par, goal)
                    s0 = event_slope(trial, y, k, 0, mode, par)
                    s1 = event_slope(trial, new, k, 6 * n, mode, par)
                    guess = first_guess(g0, s0, g1, s1, taken)
                    if kind < 0 or guess < soonest:
                        kind = trial
                        soonest = guess
                        target = goal
        else:
            over = excess(new, mode, par)
            if mode[at.ARMED] > 0.5:
                if over > 0.0:
                    kind = START
                    g0 = excess(y, mode, par)
                    s0 = event_slope(START, y, k, 0, mode, par)
                    s1 = event_slope(START, new, k, 6 * n, mode, par)
                    soonest = first_guess(g0, s0, over, s1, taken)
            elif over < 0.0:
                mode[at.ARMED] = 1.0
            elif over > 1e-6 * par[at.P_LINE] * par[at.AREA_CAP]:
                mode[at.ARMED] = 1.0
                fresh = True

        if kind >= 0:
            # shorten the step onto the event
            if kind == START:
                close = 1e-10 * par[at.P_LINE] * par[at.AREA_CAP]
            elif kind == REVERSAL:
                close = 1e-11
            else:
                close = 1e-11 * par[at.STROKE]
            low = 0.0
            high = taken
            part = soonest
            for _ in range(60):
                step(implicit, time, part, y, mode, par, n, k, stage, new, error, jac, lu, pivot, u, ledger)
                info[at.I_RATES] += 6.0
                g = event_value(kind, new, mode, par, target)
                if abs(g) <= close or high - low <= 1e-14 * period:
                    break
                if g < 0.0:
                    low = part
                else:
                    high = part
                slope = event_slope(kind, new, k, 6 * n, mode, par)
                guess = part - g / slope if slope > 0.0 else -1.0
                part = guess if low < guess < high else 0.5 * (low + high)
            taken = part

        if kind < 0 and time + taken >= limit * (1.0 - 1e-15):
            time = limit
        else:
            time += taken
        for i in range(n):
            y[i] = new[i]
            k[i] = k[6 * n + i]
        stale = True
        if kind in (END, EDGE):
            y[at.X] = target
        elif kind == REVERSAL:
            y[at.V] = 0.0
        record(time, y, k, mode, history, info)
        if kind == END:
            log(time, at.ARRIVE, direction, y, events, info)
            if ledger:
                y[at.Q_STOP] += 0.5 * par[at.MASS] * y[at.V] * y[at.V]
            y[at.V] = 0.0
            mode[at.DIRECTION] = 0.0
            if until == direction:
                break
        elif kind == REVERSAL:
            log(time, at.STICK, direction, y, events, info)
            mode[at.DIRECTION] = 0.0
        elif kind == EDGE and (target == par[at.CUT_EXTEND] or target == par[at.CUT_RETRACT]):
            mode[at.SHUT] = 1.0
            log(time, at.CUT, direction, y, events, info)
        elif kind == START:
            mode[at.DIRECTION] = start_direction(y, mode, par)
            log(time, at.START, mode[at.DIRECTION], y, events, info)
        if kind >= 0:
            mode[at.STIFF] = 0.0
            mode[at.ARMED] = 1.0
            mode[at.PROCESS] = process_at(y[at.X], edges, forces, par)
            fresh = True
    info[at.I_TIME] = time
    mode[at.SWITCHED] -= period
    return at.DONE


def settle(
    most: float,
    tolerance: float,
    period: float,
    until: float,
    rtol: float,
    ledger: bool,
    y: Row,
    mode: Row,
    par: Row,
    switches: Row,
    edges: Row,
    forces: Row,
    history: Row,
    events: Row,
    info: Row,
    k: Row,
    stage: Row,
    new: Row,
    error: Row,
    jac: Row,
    lu: Row,
    u: Row,
    before: Row,
    stop: Sequence[int],
) -> float:
    """Repeat the cycle, at most ``most`` times, until the state at its end is that at its start.

    Other parameters as in :func:`cycle`; ``before`` is work space of six. The largest relative difference is left
    in ``info[I_MISMATCH]``, the number of cycles in ``info[I_CYCLES]``.
    """
    done = 0.0
    while done < most:
        for i in range(len(y)):
            if i < at.N_STATE:
                before[i] = y[i]
            else:
                y[i] = 0.0
        status = cycle(
            period,
            until,
            rtol,
            ledger,
            y,
            mode,
            par,
            switches,
            edges,
            forces,
            history,
            events,
            info,
            k,
            stage,
            new,
            error,
            jac,
            lu,
            u,
            stop,
        )
        if status != at.DONE:
            return status
        done += 1.0
        worst = abs(y[at.X] - before[at.X]) / par[at.STROKE]
        worst = max(worst, abs(y[at.V] - before[at.V]) / (abs(y[at.V]) + 0.1))
        for i in range(at.M_CAP, at.N_STATE):
            worst = max(worst, abs(y[i] - before[i]) / y[i])
        info[at.I_CYCLES] = done
        info[at.I_MISMATCH] = worst
        if worst <= tolerance or info[at.I_STEPS] > _SETTLE_STEPS:
            break
    return at.DONE
