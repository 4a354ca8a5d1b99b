"""The cycle of one cylinder: phases of rest and motion, valve switching, and the events between them.

Every event (start of motion, end, reversal, edge of a process force, cut-off, valve switching, end of the
opening ramp) ends a step exactly: steps are shortened onto it, never interpolated over it.
"""

from __future__ import annotations

from collections.abc import Sequence

from actuator.stroke import layout as at
from actuator.stroke.advance import FAILED, NONE, advance
from actuator.stroke.equations import connect, excess, rates
from actuator.stroke.events import (
    EDGE,
    END,
    REVERSAL,
    START,
    first_step,
    log,
    process_at,
    record,
    start_direction,
    store,
)
from actuator.stroke.states import Row, State, Table

_STEP_LIMIT = 20000.0
"""Steps of one cycle after which it is given up. [1]"""
_SETTLE_STEPS = 30000.0
"""Steps after which no further cycle is begun, whether the state repeats or not. [1]"""


def switch_over(time: float, side: float, y: State, mode: Row, par: Row, events: Row, info: Row) -> None:
    """Let the valve begin to open the other way."""
    mode[at.SIDE] = side
    mode[at.SWITCHED] = time
    mode[at.OPEN_OVER] = par[at.OPENING]
    past = y[at.X] >= par[at.CUT_EXTEND] if side > 0.0 else y[at.X] <= par[at.CUT_RETRACT]
    mode[at.SHUT] = 1.0 if past else 0.0
    mode[at.STIFF] = 0.0
    connect(mode, par)
    log(time, at.SWITCH, side, y, events, info)


def next_limit(time: float, period: float, upcoming: int, switches: Row, mode: Row) -> float:
    """Time that the next step must not pass: end of the cycle, switching, end of the opening ramp. [s]"""
    limit = period
    if upcoming < len(switches) // 2:
        limit = switches[2 * upcoming]
    if mode[at.OPEN_OVER] > 0.0:
        ramp_end = mode[at.SWITCHED] + mode[at.OPEN_OVER]
        if ramp_end <= time:
            mode[at.OPEN_OVER] = 0.0
        elif ramp_end < limit:
            limit = ramp_end
    return limit


def start_if_free(time: float, y: State, mode: Row, par: Row, events: Row, info: Row) -> None:
    """Let a resting piston go where nothing holds it."""
    if mode[at.DIRECTION] == 0.0 and mode[at.ARMED] > 0.5 and excess(y, mode, par) >= 0.0:
        mode[at.DIRECTION] = start_direction(y, mode, par)
        log(time, at.START, mode[at.DIRECTION], y, events, info)


def arm_again(y: State, mode: Row, par: Row) -> bool:
    """Allow a start after one that failed: once the drive has fallen, or has risen clearly; tell the latter."""
    if mode[at.DIRECTION] != 0.0 or mode[at.ARMED] > 0.5:
        return False
    over = excess(y, mode, par)
    risen = over > 1e-6 * par[at.P_LINE] * par[at.AREA_CAP]
    if over < 0.0 or risen:
        mode[at.ARMED] = 1.0
    return risen


def placed(event: int, target: float, y: State) -> State:
    """State exactly at the event."""
    if event in (END, EDGE):
        return (target, y[1], y[2], y[3], y[4], y[5])
    if event == REVERSAL:
        return (y[0], 0.0, y[2], y[3], y[4], y[5])
    return y


def pass_event(
    time: float,
    event: int,
    target: float,
    y: State,
    mode: Row,
    par: Row,
    edges: Row,
    forces: Row,
    events: Row,
    info: Row,
) -> None:
    """Change the mode at an event and log it."""
    direction = mode[at.DIRECTION]
    if event == END:
        log(time, at.ARRIVE, direction, y, events, info)
        mode[at.DIRECTION] = 0.0
    elif event == REVERSAL:
        log(time, at.STICK, direction, y, events, info)
        mode[at.DIRECTION] = 0.0
    elif event == START:
        mode[at.DIRECTION] = start_direction(y, mode, par)
        log(time, at.START, mode[at.DIRECTION], y, events, info)
    elif target in (par[at.CUT_EXTEND], par[at.CUT_RETRACT]):
        mode[at.SHUT] = 1.0
        connect(mode, par)
        log(time, at.CUT, direction, y, events, info)
    mode[at.STIFF] = 0.0
    mode[at.ARMED] = 1.0
    mode[at.PROCESS] = process_at(y[at.X], edges, forces, par)


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
    work: Table,
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
        Whether the integrals behind the first six states are carried as well.
    y, mode, par : row
        State and integrals, mode and parameters as in :mod:`actuator.stroke.layout`; the first two are changed.
    switches : row
        Pairs (time, side) within the period, in order. [s, 1]
    edges, forces : row
        Edges of the process force [m] and the force below each and beyond the last [N].
    history, events, info : row
        Filled; ``history`` and ``events`` may be empty.
    work : table
        Work space, ``N_WORK`` rows of ``N_INTEGRAL``.
    stop : sequence of int
        Non-zero ends the work.

    Returns
    -------
    float
        Status, one of the codes of :mod:`actuator.stroke.layout`.
    """
    gain = work[at.N_WORK - 1]
    now: State = (y[at.X], y[at.V], y[at.M_CAP], y[at.U_CAP], y[at.M_ROD], y[at.U_ROD])
    k = now
    time = 0.0
    upcoming = 0
    h = 0.0
    fresh = True
    most = info[at.I_STEPS] + _STEP_LIMIT
    info[at.I_EVENTS] = 0.0
    info[at.I_ROWS] = 0.0
    connect(mode, par)
    while True:
        while upcoming < len(switches) // 2 and switches[2 * upcoming] <= time + 1e-13 * period:
            switch_over(time, switches[2 * upcoming + 1], now, mode, par, events, info)
            upcoming += 1
            fresh = True
        if time >= period * (1.0 - 1e-13):
            break
        limit = next_limit(time, period, upcoming, switches, mode)
        if fresh:
            start_if_free(time, now, mode, par, events, info)
            k = rates(time, now, mode, par)
            info[at.I_RATES] += 1.0
            h = first_step(now, k, mode, par)
            record(time, now, k, mode, history, info)
            fresh = False
        found = advance(
            time, h, limit, rtol, ledger, now, k, mode, par, edges, gain, work, info, most, stop
        )  # fmt: skip
        if found.status != at.DONE:
            return found.status
        h = found.h
        direction = mode[at.DIRECTION]
        if found.event == FAILED:
            mode[at.DIRECTION] = 0.0
            mode[at.ARMED] = 0.0
            log(time, at.STICK, direction, now, events, info)
            fresh = True
            continue
        at_limit = found.event == NONE and time + found.taken >= limit * (1.0 - 1e-15)
        time = limit if at_limit else time + found.taken
        now = placed(found.event, found.target, found.y)
        k = found.k
        record(time, now, k, mode, history, info)
        if ledger:
            for i in range(at.N_INTEGRAL):
                y[at.N_STATE + i] += gain[i]
        if found.event >= 0:
            pass_event(time, found.event, found.target, now, mode, par, edges, forces, events, info)
            if found.event == END:
                if ledger:
                    y[at.Q_STOP] += 0.5 * par[at.MASS] * now[at.V] * now[at.V]
                now = (now[0], 0.0, now[2], now[3], now[4], now[5])
            fresh = True
            if found.event == END and until == direction:
                break
        elif arm_again(now, mode, par):
            fresh = True
    store(now, y, 0)
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
    work: Table,
    before: Row,
    stop: Sequence[int],
) -> float:
    """Repeat the cycle, at most ``most`` times, until the state at its end is that at its start.

    Other parameters as in :func:`cycle`; ``before`` is left as the state at the start of the last cycle. The largest
    relative difference is left in ``info[I_MISMATCH]``, the number of cycles in ``info[I_CYCLES]``.
    """
    done = 0.0
    while done < most:
        for i in range(at.N_STATE):
            before[i] = y[i]
        if ledger:
            for i in range(at.N_STATE, at.N_LEDGER):
                y[i] = 0.0
        status = cycle(
            period, until, rtol, ledger, y, mode, par, switches, edges, forces, history, events, info, work, stop
        )  # fmt: skip
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
