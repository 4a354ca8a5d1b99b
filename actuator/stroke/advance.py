"""One accepted step: error control, and shortening onto the first event within it."""

from __future__ import annotations

import math
from collections.abc import Sequence
from typing import NamedTuple

from actuator.stroke import layout as at
from actuator.stroke.equations import excess
from actuator.stroke.events import EDGE, REVERSAL, START, event_slope, event_value, first_guess, next_edge
from actuator.stroke.ledger import book
from actuator.stroke.slopes import NO_SLOPES, slopes_at
from actuator.stroke.states import Row, State, Table
from actuator.stroke.steppers import explicit_step, implicit_step

NONE, FAILED = -1, -2
"""No event; a start that did not move the piston."""
_LIMP_LIMIT = 12.0
"""Explicit steps near the limit of stability, less those that are not, after which motion counts as stiff. [1]"""
_LIMP_FROM = 1.5
"""Stiffness of a step that is near the limit. [1]"""
_COARSE = 1e-5
"""Step tolerance from which motion is always taken as stiff: the implicit pair's steps are then longer. [1]"""


class Found(NamedTuple):
    """The first event within a step."""

    event: int
    target: float
    """Position of an end or edge. [m]"""
    part: float
    """Where in the step it is, as guessed. [s]"""


class Advance(NamedTuple):
    """An accepted step."""

    status: float
    y: State
    """State at its end."""
    k: State
    """Rates at its end."""
    taken: float
    """Its length. [s]"""
    h: float
    """Length to try next. [s]"""
    event: int
    target: float


def implicit_now(rtol: float, mode: Row) -> bool:
    """Whether the next step is an implicit one: at rest, coarse, and while the motion is stiff."""
    return mode[at.DIRECTION] == 0.0 or rtol >= _COARSE or mode[at.STIFF] >= _LIMP_LIMIT


def event_ahead(y: State, k: State, mode: Row, par: Row) -> float:
    """Time until the end at the present acceleration, or until the start at the present rise of the drive. [s]"""
    direction = mode[at.DIRECTION]
    if direction == 0.0:
        lack = -excess(y, mode, par)
        rise = event_slope(START, y, k, mode, par)
        return lack / rise if lack > 0.0 and rise > 0.0 and mode[at.ARMED] > 0.5 else math.inf
    way = par[at.STROKE] - y[at.X] if direction > 0.0 else y[at.X]
    v = direction * y[at.V]
    square = v * v + 2.0 * direction * k[at.V] * way
    if square <= 0.0 or v + math.sqrt(square) <= 0.0:
        return math.inf
    return 2.0 * way / (v + math.sqrt(square))


def fitted(time: float, h: float, limit: float) -> float:
    """Length of a step that ends at the limit if it comes near, or leaves room for one as long. [s]"""
    if time + 1.001 * h >= limit:
        return limit - time
    if time + 2.0 * h > limit:
        return 0.5 * (limit - time)
    return h


def resized(wrong: float, implicit: bool) -> float:
    """Factor from a step with this error to the next, between 0.2 and 5. [1]"""
    if wrong < 1e-4:
        return 5.0
    if wrong < 1e12:
        root = math.sqrt(math.sqrt(wrong)) if implicit else math.pow(wrong, 0.2)
        return min(5.0, max(0.2, 0.9 / root))
    return 0.2


def event_of_motion(
    y: State, k: State, end_y: State, end_k: State, taken: float, mode: Row, par: Row, edges: Row
) -> Found:
    """First end, edge or reversal that a step of a moving piston passes."""
    direction = mode[at.DIRECTION]
    if y[at.V] == 0.0 and direction * end_y[at.V] <= 0.0:
        return Found(FAILED, 0.0, 0.0)
    end = par[at.STROKE] if direction > 0.0 else 0.0
    edge = next_edge(y[at.X], mode, par, edges)
    nearer = min(edge, end) if direction > 0.0 else max(edge, end)
    found = Found(NONE, 0.0, taken)
    if direction * (end_y[at.X] - nearer) < 0.0 < direction * end_y[at.V]:
        return found
    for kind in range(3):
        goal = edge if kind == EDGE else end
        after = event_value(kind, end_y, mode, par, goal)
        if after >= 0.0:
            before = event_value(kind, y, mode, par, goal)
            slope = event_slope(kind, y, k, mode, par)
            part = first_guess(before, slope, after, event_slope(kind, end_y, end_k, mode, par), taken)
            if found.event == NONE or part < found.part:
                found = Found(kind, goal, part)
    return found


def event_at_rest(y: State, k: State, end_y: State, end_k: State, taken: float, mode: Row, par: Row) -> Found:
    """Start of motion within a step of a resting piston."""
    after = excess(end_y, mode, par)
    if mode[at.ARMED] < 0.5 or after <= 0.0:
        return Found(NONE, 0.0, taken)
    before = excess(y, mode, par)
    slope = event_slope(START, y, k, mode, par)
    part = first_guess(before, slope, after, event_slope(START, end_y, end_k, mode, par), taken)
    return Found(START, 0.0, part)


def closeness(event: int, rtol: float, par: Row) -> float:
    """How near to zero an event's function must come. [m, m/s, N]"""
    near = max(1e-11, 1e-5 * rtol)
    if event == START:
        return 10.0 * near * par[at.P_LINE] * par[at.AREA_CAP]
    if event == REVERSAL:
        return near
    return near * par[at.STROKE]


def advance(
    time: float,
    h: float,
    limit: float,
    rtol: float,
    ledger: bool,
    y: State,
    k: State,
    mode: Row,
    par: Row,
    edges: Row,
    gain: Row,
    work: Table,
    info: Row,
    most: float,
    stop: Sequence[int],
) -> Advance:
    """Step from ``y`` at ``time``, where the rates are ``k``, not beyond ``limit`` and not beyond an event.

    Parameters
    ----------
    time, h, limit : float
        Start, length to try, and where the step ends at the latest. [s]
    rtol : float
        Step tolerance. [1]
    ledger : bool
        Whether the step's integrals are left in ``gain``.
    y, k, mode, par, edges : row
        As in :func:`actuator.stroke.cycle.cycle`.
    gain, work : row, table
        Integrals of the step, and work space.
    info : row
        Counters; ``most`` is the number of steps at which the work is given up.
    stop : sequence of int
        Non-zero ends the work.
    """
    implicit = implicit_now(rtol, mode)
    moving = mode[at.DIRECTION] != 0.0
    # not far beyond an event: behind the end there is no volume left
    taken = fitted(time, min(h, 1.1 * event_ahead(y, k, mode, par)), limit)
    slopes = slopes_at(time, y, mode, par) if implicit else NO_SLOPES
    following = h
    retried = False
    found = Found(NONE, 0.0, taken)
    low = 0.0
    high = taken
    status = at.DONE
    while True:
        info[at.I_STEPS] += 1.0
        info[at.I_RATES] += 6.0
        if implicit:
            step = implicit_step(time, taken, y, k, slopes, mode, par)
        else:
            step = explicit_step(time, taken, y, k, mode, par)
        if stop[0] != 0:
            status = at.STOPPED
            break
        if info[at.I_STEPS] > most:
            status = at.TOO_MANY_STEPS
            break
        if found.event == NONE:
            # a whole step: is it good enough, and is there an event within?
            wrong = step.wrong / rtol
            if ledger and wrong <= 1.0:
                wrong = max(wrong, book(time, taken, implicit, step, mode, par, work, gain) / rtol)
            factor = resized(wrong, implicit)
            if wrong <= 1.0:
                if retried:
                    factor = min(factor, 1.0)
                following = max(taken * factor, following if taken < following else 0.0)
            else:
                retried = True
                following = taken * min(factor, 0.9)
                taken = fitted(time, following, limit)
                continue
            if moving:
                found = event_of_motion(y, k, step.y, step.k, taken, mode, par, edges)
            else:
                found = event_at_rest(y, k, step.y, step.k, taken, mode, par)
            if found.event < 0:
                break
            high = taken
            taken = found.part
            continue
        # a shortened step: does it end at the event?
        g = event_value(found.event, step.y, mode, par, found.target)
        if abs(g) <= closeness(found.event, rtol, par) or high - low <= 1e-14 * max(limit, high):
            break
        if g < 0.0:
            low = taken
        else:
            high = taken
        slope = event_slope(found.event, step.y, step.k, mode, par)
        guess = taken - g / slope if slope > 0.0 else -1.0
        taken = guess if low < guess < high else 0.5 * (low + high)
    if ledger and found.event >= 0 and status == at.DONE:
        book(time, taken, implicit, step, mode, par, work, gain)
    if not implicit:
        limp = mode[at.STIFF]
        mode[at.STIFF] = limp + 1.0 if step.stiffness > _LIMP_FROM else max(limp - 1.0, 0.0)
    return Advance(status, step.y, step.k, taken, following, found.event, found.target)
