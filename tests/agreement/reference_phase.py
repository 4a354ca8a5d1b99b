"""From one switching of the valve to the next: segments between located events."""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from dataclasses import dataclass, field

import numpy as np
from scipy.integrate import solve_ivp

from .reference_equations import Array, Connection, Direction, Model, RightHandSide, State
from .reference_ledger import COLUMNS

REST_SPEED = 1e-10
"""Speed against its direction at which a motion has ended. [m/s]"""


@dataclass
class Half:
    """What is measured in one half of the cycle; times count from the command."""

    completed: bool = False
    reached: float = math.nan
    reaction: float = math.nan
    stroke: float = math.nan
    end_speed: float = math.nan
    peak_speed: float = 0.0
    drawn: float = 0.0


@dataclass
class Course:
    """What is remembered through a cycle; keys +1 extending, −1 retracting."""

    least: float
    most: float
    halves: dict[int, Half] = field(default_factory=lambda: {1: Half(), -1: Half()})
    started: dict[int, float] = field(default_factory=lambda: {1: 0.0, -1: 0.0})
    """Start of the latest motion each way, in the time of the phase. [s]"""
    since: dict[int, float] = field(default_factory=lambda: {1: 0.0, -1: 0.0})
    """From the command of each way to the start of the phase; an arrival may come after the next one. [s]"""

    def arrive(self, way: int, time: float, speed: float) -> None:
        """First contact with the end of direction ``way``."""
        half = self.halves[way]
        if not half.completed:
            half.completed, half.end_speed = True, speed
            half.reaction = self.started[way] + self.since[way]
            half.stroke = time + self.since[way]


class Event:
    """A terminal event of ``solve_ivp``."""

    terminal = True

    def __init__(self, value: Callable[[float, Array], float], direction: float) -> None:
        self.value = value
        self.direction = direction

    def __call__(self, t: float, y: Array) -> float:
        return self.value(t, y)


def run_phase(model: Model, state: State, direction: Direction, length: float, rtol: float, course: Course) -> None:
    """Bring ``state`` through one phase, ``length`` [s] from the switching on."""
    part = model.part
    ahead = 1 if direction == "extend" else -1
    cut_at = part.cut_off * part.stroke if ahead > 0 else (1.0 - part.cut_off) * part.stroke
    cutting = part.cut_off < 1.0
    cut = cutting and ahead * (state.x - cut_at) >= 0.0
    zones = part.load.process_force
    edges = {zone.start for zone in zones} | {zone.end for zone in zones}
    ramp, time = part.valve.opening_time, 0.0
    while time < length:
        opening = time < ramp
        until = min(ramp, length) if opening else length
        connection = Connection(direction, cut, ramp if opening else 0.0)
        if state.way == 0:
            state.way = model.starts(state)
            if state.way == 0:
                time, state.way = rest(model, state, connection, time, until, rtol)
            if state.way == 0:
                continue
            course.started[state.way] = time
            if time >= until:
                continue
        stop = part.stroke if state.way > 0 else 0.0
        marks = edges | {cut_at} if cutting and not cut else edges
        coming = [mark for mark in marks if state.way * (mark - state.x) > 1e-13]
        target = min([*coming, stop], key=lambda mark: state.way * mark)
        time, event, fastest = move(model, state, connection, time, until, rtol, target)
        course.least, course.most = min(course.least, state.x), max(course.most, state.x)
        half = course.halves[state.way]
        half.peak_speed = max(half.peak_speed, fastest)
        if event == "target":
            state.x = target
            cut = cut or (cutting and ahead * (state.x - cut_at) >= 0.0)
            if target == stop:
                course.arrive(state.way, time, abs(state.v))
                model.tally.add("stop", 0.5 * part.load.mass * state.v**2)
                state.v, state.way = 0.0, 0
        elif event == "stand":
            state.v, state.way = 0.0, 0


def rest(
    model: Model, state: State, connection: Connection, time: float, until: float, rtol: float
) -> tuple[float, int]:
    """The piston stands until it starts, or until ``until``: that time [s], and the way it starts in."""

    def surplus(way: int) -> Callable[[float, Array], float]:
        wanted = model.threshold(state.x, way)
        return lambda _, y: way * model.drive(float(y[0]), float(y[2]), state.x) - wanted

    ways = [way for way in (1, -1) if model.has_room(state.x, way)]
    events = [Event(surplus(way), 1.0) for way in ways]
    rates = model.resting(connection, state.x)
    end, y, which, _ = integrate(model, rates, time, until, state.gas(), rtol, events)
    state.p1, state.t1, state.p2, state.t2 = y[:4]
    model.tally.take(y[4:], rest=True)
    return end, ways[which] if which >= 0 else 0


def move(
    model: Model,
    state: State,
    connection: Connection,
    time: float,
    until: float,
    rtol: float,
    target: float,
) -> tuple[float, str, float]:
    """The piston moves until it stands, reaches ``target``, or ``until``.

    Returns the time [s], what happened, and the highest speed at the steps [m/s].
    """
    way = state.way
    events = [
        Event(lambda _, y: way * float(y[1]) + REST_SPEED, -1.0),
        Event(lambda _, y: way * (float(y[0]) - target), 1.0),
    ]
    rates = model.moving(connection, way, 0.5 * (state.x + target))
    start = np.concatenate([[state.x, state.v], state.gas()])
    end, y, which, fastest = integrate(model, rates, time, until, start, rtol, events)
    state.x, state.v, state.p1, state.t1, state.p2, state.t2 = y[:6]
    model.tally.take(y[6:], rest=False)
    return end, ("", "stand", "target")[which + 1], fastest


def integrate(
    model: Model,
    rates: RightHandSide,
    time: float,
    until: float,
    start: Array,
    rtol: float,
    events: Sequence[Event],
) -> tuple[float, list[float], int, float]:
    """One segment: end time, end state, number of the event (−1 none), highest |second state|."""
    fine = rtol / 1e-8
    gas = [1e-3 * fine, 1e-6 * fine, 1e-3 * fine, 1e-6 * fine]
    atol = gas if len(start) == 4 else [1e-9 * fine, 1e-8 * fine, *gas]
    if model.ledger:
        start = np.concatenate([start, np.zeros(len(COLUMNS))])
        atol = atol + [1e-3 * fine * size for size in COLUMNS.values()]
    found = solve_ivp(rates, (time, until), start, method="LSODA", rtol=rtol, atol=atol, events=list(events))
    assert found.status >= 0, found.message
    struck = found.t_events or []
    which = next((number for number, times in enumerate(struck) if len(times)), -1)
    end = [float(value) for value in found.y[:, -1]]
    return float(found.t[-1]), end, which, float(np.abs(found.y[1]).max())
