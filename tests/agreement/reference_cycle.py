"""The reference model's cycle, repeated until its state repeats."""

from __future__ import annotations

import math
from dataclasses import astuple, dataclass, replace

from actuator.parts import Actuator, Machine, Site

from .reference_equations import Model, State
from .reference_flow import R_AIR, PathTable
from .reference_ledger import Tally
from .reference_phase import Course, Half, run_phase

MOST_CYCLES = 60
COARSE, COARSE_REPEAT = 1e-5, 1e-3
"""Relative tolerance of the first cycles, and the mismatch below which the tight one takes over. [1]"""


@dataclass
class Reference:
    """One periodic cycle of the reference model, cut at the switching to extend."""

    extend: Half
    retract: Half
    air_drawn: float
    cycles: int
    mismatch: float
    tally: Tally
    start: State
    end: State


def reference(
    actuator: Actuator,
    machine: Machine,
    site: Site,
    *,
    table: PathTable | None = None,
    exact: bool = False,
    ledger: bool = False,
    rtol: float = 1e-8,
    repeat: float = 1e-6,
) -> Reference:
    """Solve one cylinder to its periodic cycle.

    ``table`` gives one ISO 6358-1 element for each path, ``exact`` solves valve and throttle in series
    at every call; without a throttle neither is needed.
    """
    model = Model(actuator, machine, site, table=table, exact=exact)
    t0 = site.ambient_temperature
    p_rod = site.ambient_pressure if model.vented == "rod" else model.p_supply["retract"]
    state = State(0.0, 0.0, 0, site.ambient_pressure, t0, p_rod, t0)
    course = Course(least=state.x, most=state.x)
    mismatch, cycles, settled = math.inf, 0, False
    while not (settled and mismatch <= repeat) and cycles < MOST_CYCLES:
        settled = mismatch < COARSE_REPEAT
        before = replace(state)
        extend, retract = _cycle(model, state, course, rtol if settled else max(rtol, COARSE))
        mismatch, cycles = _difference(before, state, actuator.stroke), cycles + 1
    if ledger:
        model.ledger, model.tally = True, Tally()
        before = replace(state)
        extend, retract = _cycle(model, state, course, rtol)
        mismatch = _difference(before, state, actuator.stroke)
    return Reference(
        extend=extend,
        retract=retract,
        air_drawn=extend.drawn + retract.drawn,
        cycles=cycles,
        mismatch=mismatch,
        tally=model.tally,
        start=before,
        end=replace(state),
    )


def _cycle(model: Model, state: State, course: Course, rtol: float) -> tuple[Half, Half]:
    """One period, from the switching to extend to the next."""
    part = model.part
    first = (part.retract_at - part.extend_at) % model.period
    second, delay = model.period - first, part.valve.delay
    course.least = course.most = state.x
    course.halves = {1: Half(), -1: Half()}
    course.since = {1: delay, -1: second + delay}
    mass = mass_cap(model, state)
    run_phase(model, state, "extend", first, rtol, course)
    drawn_extend = mass_cap(model, state) - mass
    course.started = {way: time - first for way, time in course.started.items()}
    late, course.halves[-1] = course.halves[-1], Half()
    course.since = {1: first + delay, -1: delay}
    mass = mass_rod(model, state)
    run_phase(model, state, "retract", second, rtol, course)
    drawn_retract = mass_rod(model, state) - mass
    course.started = {way: time - second for way, time in course.started.items()}
    extend, retract = course.halves[1], course.halves[-1]
    fastest = max(retract.peak_speed, late.peak_speed)
    if late.completed and not retract.completed:  # arrived by its momentum after the next command
        retract = late
    extend.reached, extend.drawn = course.most, drawn_extend
    retract.reached, retract.drawn, retract.peak_speed = course.least, drawn_retract, fastest
    return extend, retract


def mass_cap(model: Model, state: State) -> float:
    """Air in the cap side, if it holds any of its own. [kg]"""
    if model.vented == "cap":
        return 0.0
    return state.p1 * (model.part.dead_volume_cap + model.area1 * state.x) / (R_AIR * state.t1)


def mass_rod(model: Model, state: State) -> float:
    """Air in the rod side, if it holds any of its own. [kg]"""
    if model.vented == "rod":
        return 0.0
    volume = model.part.dead_volume_rod + model.area2 * (model.part.stroke - state.x)
    return state.p2 * volume / (R_AIR * state.t2)


def _difference(a: State, b: State, stroke: float) -> float:
    """Largest relative difference of two states; speeds in m/s. [1]"""
    gas = zip(astuple(a)[3:], astuple(b)[3:], strict=True)
    ratios: list[float] = [abs(old / new - 1.0) for old, new in gas]
    return max(abs(a.x - b.x) / stroke, abs(a.v - b.v), *ratios)
