"""Events of the cycle: functions that rise through zero where one is, and the two logs that are kept."""

from __future__ import annotations

from actuator.air.gas import GAMMA
from actuator.stroke import layout as at
from actuator.stroke.equations import drive, excess
from actuator.stroke.states import Row, State

END, REVERSAL, EDGE, START = 0, 1, 2, 3


def process_at(x: float, edges: Row, forces: Row, par: Row) -> float:
    """Process force just beyond ``x``; ``forces[i]`` acts below ``edges[i]``, the last beyond all. [N]"""
    place = 0
    for i in range(len(edges)):
        if x >= edges[i] - 1e-12 * par[at.STROKE]:
            place = i + 1
    return forces[place]


def next_edge(x: float, mode: Row, par: Row, edges: Row) -> float:
    """Next position on the way where force or supply path changes; beyond the ends if there is none. [m]"""
    slack = 1e-12 * par[at.STROKE]
    if mode[at.DIRECTION] > 0.0:
        found = 2.0 * par[at.STROKE]
        for i in range(len(edges)):
            if x + slack < edges[i] < found:
                found = edges[i]
        if mode[at.SIDE] > 0.0 and mode[at.SHUT] < 0.5 and par[at.CUT_EXTEND] < found:
            found = par[at.CUT_EXTEND]
        return found
    if mode[at.SIDE] < 0.0 and mode[at.SHUT] < 0.5:
        return par[at.CUT_RETRACT]
    return -par[at.STROKE]


def event_value(kind: int, y: State, mode: Row, par: Row, target: float) -> float:
    """Rises through zero where the event is: position past ``target``, reversal, start. [m, m/s, N]"""
    if kind == REVERSAL:
        return -mode[at.DIRECTION] * y[at.V]
    if kind == START:
        return excess(y, mode, par)
    return mode[at.DIRECTION] * (y[at.X] - target)


def event_slope(kind: int, y: State, k: State, mode: Row, par: Row) -> float:
    """Rate of the event function where the rates are ``k``."""
    if kind == REVERSAL:
        return -mode[at.DIRECTION] * k[at.V]
    if kind == START:
        vol1 = par[at.DEAD_CAP] + par[at.AREA_CAP] * y[at.X]
        vol2 = par[at.DEAD_ROD] + par[at.AREA_ROD] * (par[at.STROKE] - y[at.X])
        rise = (GAMMA - 1.0) * (k[at.U_CAP] / vol1 * par[at.AREA_CAP] - k[at.U_ROD] / vol2 * par[at.AREA_ROD])
        return rise if start_direction(y, mode, par) > 0.0 else -rise
    return mode[at.DIRECTION] * k[at.X]


def start_direction(y: State, mode: Row, par: Row) -> float:
    """Way in which the piston is closer to starting: 1 extending, -1 retracting. [1]"""
    if y[at.X] >= par[at.STROKE]:
        return -1.0
    if y[at.X] <= 0.0:
        return 1.0
    d = drive(y, par)
    return 1.0 if d - par[at.EXTEND_FORCE] - mode[at.PROCESS] > -d - par[at.RETRACT_FORCE] else -1.0


def first_guess(g0: float, s0: float, g1: float, s1: float, h: float) -> float:
    """Where in (0, h) the cubic through both values and slopes rises through zero. [s]"""
    low = 0.0
    high = 1.0
    for _ in range(26):
        z = 0.5 * (low + high)
        value = (
            (1.0 + 2.0 * z) * (1.0 - z) * (1.0 - z) * g0
            + z * (1.0 - z) * (1.0 - z) * h * s0
            + z * z * (3.0 - 2.0 * z) * g1
            + z * z * (z - 1.0) * h * s1
        )
        if value < 0.0:
            low = z
        else:
            high = z
    return 0.5 * (low + high) * h


def record(time: float, y: State, k: State, mode: Row, history: Row, info: Row) -> None:
    """Append time, state and rates to the history while there is room."""
    base = int(info[at.I_ROWS]) * at.HISTORY_WIDTH
    if base + at.HISTORY_WIDTH > len(history):
        return
    history[base + at.H_TIME] = time
    store(y, history, base + at.H_STATE)
    store(k, history, base + at.H_RATE)
    history[base + at.H_SIDE] = mode[at.SIDE]
    info[at.I_ROWS] += 1.0


def store(y: State, row: Row, base: int) -> None:
    """Write a state to ``row[base:]``."""
    row[base] = y[0]
    row[base + 1] = y[1]
    row[base + 2] = y[2]
    row[base + 3] = y[3]
    row[base + 4] = y[4]
    row[base + 5] = y[5]


def log(time: float, code: float, sign: float, y: State, events: Row, info: Row) -> None:
    """Append an event to the log while there is room."""
    base = int(info[at.I_EVENTS]) * at.EVENT_WIDTH
    if base + at.EVENT_WIDTH <= len(events):
        events[base + at.E_TIME] = time
        events[base + at.E_CODE] = code
        events[base + at.E_SIGN] = sign
        events[base + at.E_X] = y[at.X]
        events[base + at.E_V] = y[at.V]
        events[base + at.E_M_CAP] = y[at.M_CAP]
        events[base + at.E_M_ROD] = y[at.M_ROD]
    info[at.I_EVENTS] += 1.0


def first_step(y: State, k: State, mode: Row, par: Row) -> float:
    """Step to try first: a hundredth of the shortest time in which a state changes by its own size. [s]"""
    fastest = max(
        abs(k[at.X]) / par[at.STROKE],
        abs(k[at.V]) / (abs(y[at.V]) + 0.1),
        abs(k[at.M_CAP]) / y[at.M_CAP],
        abs(k[at.U_CAP]) / y[at.U_CAP],
        abs(k[at.M_ROD]) / y[at.M_ROD],
        abs(k[at.U_ROD]) / y[at.U_ROD],
    )
    h = 0.01 / max(fastest, 1e-6)
    return min(h, mode[at.OPEN_OVER]) if mode[at.OPEN_OVER] > 0.0 else h
