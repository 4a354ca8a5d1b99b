"""From the kernel's history and event log to arrays and half-stroke figures."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from actuator.air.gas import CV, GAMMA
from actuator.errors import Refusal
from actuator.parts import Actuator, Machine
from actuator.stroke import layout as at
from actuator.stroke.result import Array, HalfStroke, StrokeResult

_BETWEEN = np.array([0.25, 0.5, 0.75])
"""Fractions of a step at which the history is filled in by its cubic."""


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class Histories:
    """Histories of one cycle; fields as in :class:`actuator.stroke.result.StrokeResult`."""

    time: Array
    position: Array
    speed: Array
    p_cap: Array
    p_rod: Array
    temp_cap: Array
    temp_rod: Array
    volume_cap: Array
    volume_rod: Array
    flow_supply: Array
    flow_exhaust: Array


_CUBIC = [
    [(1 + 2 * _BETWEEN) * (1 - _BETWEEN) ** 2, _BETWEEN**2 * (3 - 2 * _BETWEEN)],
    [_BETWEEN * (1 - _BETWEEN) ** 2, _BETWEEN**2 * (_BETWEEN - 1)],
]
"""Weights, at those fractions, of a cubic's values at both ends, and of its rates there times the step."""
_SLOPE = [
    [-6 * _BETWEEN * (1 - _BETWEEN), 6 * _BETWEEN * (1 - _BETWEEN)],
    [(1 - _BETWEEN) * (1 - 3 * _BETWEEN), _BETWEEN * (3 * _BETWEEN - 2)],
]
"""The same for its rate times the step."""
_FLOWS = [at.H_RATE + at.M_CAP, at.H_RATE + at.M_ROD]
_KEPT = [at.H_TIME, *range(at.H_STATE, at.H_STATE + at.N_STATE), *_FLOWS, at.H_SIDE]
"""Columns of the kernel's history that the arrays are made of."""


def _between(weights: list[list[Array]], values: tuple[Array, Array], rates: tuple[Array, Array]) -> Array:
    """Weighted sum over both ends of each step; one axis more, of the fractions, than the ends."""
    out: Array = values[0][..., None] * weights[0][0]
    out += values[1][..., None] * weights[0][1]
    out += rates[0][..., None] * weights[1][0]
    out += rates[1][..., None] * weights[1][1]
    return out


def fill_in(rows: Array, par: Array) -> Histories:
    """Arrays of a cycle from the kernel's history.

    Parameters
    ----------
    rows : ndarray
        Shape (n, HISTORY_WIDTH); the two sides of an event stand in two rows of equal time.
    par : ndarray
        The kernel's parameters.

    Returns
    -------
    Histories
        Read-only arrays, three points of its cubic added within each step.
    """
    columns = np.ascontiguousarray(rows.T)
    h = np.diff(columns[at.H_TIME])
    steps = np.flatnonzero(h > 0.0)
    width = h[steps]
    left, right = columns.take(steps, axis=1), columns.take(steps + 1, axis=1)
    left[at.H_RATE : at.H_SIDE] *= width
    right[at.H_RATE : at.H_SIDE] *= width
    state, rate = slice(at.H_STATE, at.H_STATE + at.N_STATE), slice(at.H_RATE, at.H_RATE + at.N_STATE)
    mass = [at.H_STATE + at.M_CAP, at.H_STATE + at.M_ROD]
    inner = np.empty((len(_KEPT), len(steps), len(_BETWEEN)))
    inner[0] = left[at.H_TIME][:, None] + _BETWEEN * width[:, None]
    inner[1 : 1 + at.N_STATE] = _between(_CUBIC, (left[state], right[state]), (left[rate], right[rate]))
    inner[-3:-1] = _between(_SLOPE, (left[mass], right[mass]), (left[_FLOWS], right[_FLOWS])) / width[:, None]
    inner[-1] = left[at.H_SIDE][:, None]
    keys = np.concatenate([np.arange(columns.shape[1], dtype=float), (steps[:, None] + _BETWEEN).ravel()])
    both = np.concatenate([columns[_KEPT], inner.reshape(len(_KEPT), -1)], axis=1)
    merged = both.take(np.argsort(keys, kind="stable"), axis=1)
    time, x, v, m_cap, u_cap, m_rod, u_rod, flow_cap, flow_rod, side = merged
    vol_cap = par[at.DEAD_CAP] + par[at.AREA_CAP] * x
    vol_rod = par[at.DEAD_ROD] + par[at.AREA_ROD] * (par[at.STROKE] - x)
    p0, t0 = par[at.P_AMB], par[at.T_AMB]
    cap_on_supply = side > 0.0
    found = {
        "time": time,
        "position": x,
        "speed": v,
        "p_cap": np.full_like(x, p0) if par[at.VENTED_CAP] else (GAMMA - 1.0) * u_cap / vol_cap,
        "p_rod": np.full_like(x, p0) if par[at.VENTED_ROD] else (GAMMA - 1.0) * u_rod / vol_rod,
        "temp_cap": np.full_like(x, t0) if par[at.VENTED_CAP] else u_cap / (m_cap * CV),
        "temp_rod": np.full_like(x, t0) if par[at.VENTED_ROD] else u_rod / (m_rod * CV),
        "volume_cap": vol_cap,
        "volume_rod": vol_rod,
        "flow_supply": np.where(cap_on_supply, flow_cap, flow_rod),
        "flow_exhaust": -np.where(cap_on_supply, flow_rod, flow_cap),
    }
    for array in found.values():
        array.setflags(write=False)
    return Histories(**found)


Event = list[float]
"""One row of the kernel's log; there are few, so that lists are quicker than arrays."""


def _from_command(log: Array, sign: float, opens: float, period: float, delay: float) -> list[Event]:
    """The log from a way's switching on, times counted from its command."""
    rows: list[Event] = log.tolist()
    for row in rows:
        row[at.E_TIME] = (row[at.E_TIME] - opens + 1e-12 * period) % period + delay - 1e-12 * period
    first = next(i for i, row in enumerate(rows) if row[at.E_CODE] == at.SWITCH and row[at.E_SIGN] == sign)
    return rows[first:] + rows[:first]


def _is_arrival(row: Event, sign: float) -> bool:
    return row[at.E_CODE] == at.ARRIVE and row[at.E_SIGN] == sign


def _start_of(log: list[Event], arrival: int, sign: float, since: float) -> tuple[float, float]:
    """Time and place of the start of the motion that ends at ``arrival``; a stick within 1 ms is no end of it."""
    start, place = since, log[0][at.E_X]
    for row in reversed(log[:arrival]):
        code = row[at.E_CODE]
        if code == at.START and row[at.E_SIGN] == sign:
            start, place = row[at.E_TIME], row[at.E_X]
        elif (code == at.STICK and start - row[at.E_TIME] > 1e-3) or code in (at.START, at.ARRIVE):
            break
    return start, place


def since(time: Array, instant: float, period: float) -> Array:
    """Time since an instant of the cycle, from 0 to the period, at each point of the time axis.

    Parameters
    ----------
    time : ndarray
        From 0 to the period. [s]
    instant, period : float
        ``instant`` within the period. [s]

    Returns
    -------
    ndarray
        [s]
    """
    passed: Array = time - instant
    passed[passed < 0.0] += period
    return passed


def push_on(past: Histories | StrokeResult, par: Array) -> Array:
    """Force on the piston over a cycle, without friction and opposing forces, positive extending. [N]"""
    push: Array = past.p_cap * par[at.AREA_CAP]
    push -= past.p_rod * par[at.AREA_ROD]
    push += (
        par[at.CONSTANT] + par[at.SPRING_FORCE] - par[at.WEIGHT] - par[at.P_AMB] * (par[at.AREA_CAP] - par[at.AREA_ROD])
    )
    if par[at.SPRING_RATE] != 0.0:
        push += par[at.SPRING_RATE] * past.position
    return push


def half_stroke(
    sign: float, actuator: Actuator, machine: Machine, log: Array, par: Array, past: Histories, push: Array
) -> HalfStroke:
    """Figures of one way of the piston.

    Parameters
    ----------
    sign : float
        1 extend, -1 retract.
    actuator, machine : part
    log : ndarray
        Shape (n, EVENT_WIDTH), events of one cycle.
    par : ndarray
        The kernel's parameters.
    past : Histories
        Of the same cycle.
    push : ndarray
        Force on the piston as of :func:`push_on`. [N]
    """
    period, delay = machine.cycle_time, actuator.valve.delay
    direction, other = ("extend", "retract") if sign > 0.0 else ("retract", "extend")
    command = actuator.extend_at if sign > 0.0 else actuator.retract_at
    counter = actuator.retract_at if sign > 0.0 else actuator.extend_at
    opens = (command + delay) % period
    lasts = (counter - command) % period

    events = _from_command(log, sign, opens, period, delay)
    own_mass = at.E_M_CAP if sign > 0.0 else at.E_M_ROD
    back = next(row for row in events[1:] if row[at.E_CODE] == at.SWITCH)
    air_drawn = back[own_mass] - events[0][own_mass]

    since_open = since(past.time, opens, period)
    in_half = since_open <= lasts
    speeds = sign * past.speed
    reached = float(past.position.max() if sign > 0.0 else past.position.min())
    peak_flow = float(past.flow_supply[in_half].max(initial=0.0)) if direction in actuator.air_ways else 0.0

    arrival = next((i for i, row in enumerate(events) if _is_arrival(row, sign)), None)
    if arrival is None:
        way = reached if sign > 0.0 else actuator.stroke - reached
        end = actuator.stroke if sign > 0.0 else 0.0
        if abs(events[0][at.E_X] - end) <= 1e-9 * actuator.stroke:
            reason = f"the piston stands at this end already: it did not {other} before"
        elif way <= 1e-9 * actuator.stroke:
            reason = "the piston does not start"
        else:
            whole = actuator.stroke * 1e3
            reason = f"the end is not reached: {way * 1e3:.4g} mm of {whole:.4g} mm before the {other} stroke"
        if direction not in actuator.air_ways and not reason.startswith("the piston stands"):
            reason += f"; the spring alone drives this way and leaves the piston at {reached * 1e3:.4g} mm"
        lost = Refusal(reason, f"{direction}.stroke_time")
        return HalfStroke(
            direction=direction,
            completed=False,
            position_reached=reached,
            reaction_time=lost,
            stroke_time=lost,
            settled_time=lost,
            force_time=lost,
            force_at_end=lost,
            mean_speed=lost,
            peak_speed=float(speeds.max(initial=0.0)),
            end_speed=lost,
            end_energy=lost,
            peak_flow=peak_flow,
            air_drawn=air_drawn,
        )
    arrived = events[arrival][at.E_TIME]
    started, place = _start_of(events, arrival, sign, delay)
    end = actuator.stroke if sign > 0.0 else 0.0
    later = (row[at.E_TIME] for row in events if _is_arrival(row, sign) and row[at.E_TIME] <= lasts + delay)
    settled = max(later, default=arrived)
    end_speed = abs(events[arrival][at.E_V])
    wanted = (actuator.require.force_at_end or 0.0) if sign > 0.0 else 0.0
    standing = sign * push - par[at.COULOMB]
    force_time, force = _standing_force(direction, standing, since_open + delay, arrived, lasts + delay, wanted)
    return HalfStroke(
        direction=direction,
        completed=True,
        position_reached=reached,
        reaction_time=started,
        stroke_time=arrived,
        settled_time=settled,
        force_time=force_time,
        force_at_end=force,
        mean_speed=abs(end - place) / (arrived - started),
        peak_speed=max(float(speeds.max(initial=0.0)), end_speed),
        end_speed=end_speed,
        end_energy=0.5 * actuator.load.mass * end_speed**2,
        peak_flow=peak_flow,
        air_drawn=air_drawn,
    )


def _standing_force(
    direction: str, force: Array, since_command: Array, arrived: float, ends: float, wanted: float
) -> tuple[float | Refusal, float | Refusal]:
    """Time after arrival until the wanted force stands, and the force at the next switching."""
    field = f"{direction}.force_time"
    standing = np.flatnonzero((since_command >= arrived - 1e-12) & (since_command <= ends + 1e-12))
    if not len(standing):
        lost = Refusal("the valve is switched back before the arrival", field)
        return lost, lost
    order = standing[np.argsort(since_command[standing], kind="stable")]
    clock, force = since_command[order], force[order]
    enough = np.flatnonzero(force >= wanted)
    if not len(enough):
        reason = f"{float(force.max()):.4g} N stand at most, {wanted:.4g} N are wanted"
        return Refusal(reason, field), float(force[-1])
    i = int(enough[0])
    if i == 0:
        return 0.0, float(force[-1])
    share = (wanted - force[i - 1]) / (force[i] - force[i - 1])
    return float(clock[i - 1] + share * (clock[i] - clock[i - 1]) - arrived), float(force[-1])
