"""From parts to the flat rows of numbers that the kernel works on."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np

from actuator.air.gas import CV, GRAVITY, R_AIR
from actuator.flow.series import SeriesFit, fit_chain
from actuator.parts import Actuator, Machine, Site
from actuator.stroke import layout as at
from actuator.stroke.events import process_at
from actuator.stroke.result import Path

MOST_HISTORY = 6000
"""Rows of history that are kept of a cycle. [1]"""

_PATHS = (
    ("cap, filling", "supply", True),
    ("cap, back to supply", "supply", False),
    ("cap, exhausting", "exhaust", False),
    ("cap, sucking in", "exhaust", True),
    ("rod, filling", "supply", True),
    ("rod, back to supply", "supply", False),
    ("rod, exhausting", "exhaust", False),
    ("rod, sucking in", "exhaust", True),
)


def flow_paths(actuator: Actuator) -> tuple[Path, ...]:
    """Valve and throttle in series for each port of one cylinder, connection and direction, in the kernel's order.

    Meter-out: what leaves a chamber passes the needle, what enters passes the check valve; meter-in the other way.
    A side that takes no air has no path.
    """
    valve, throttle = actuator.valve, actuator.throttle
    found = []
    fits: dict[tuple[tuple[float, float, float], ...], SeriesFit] = {}
    sides = tuple(("cap" if way == "extend" else "rod") for way in actuator.air_ways)
    for name, side, inward in _PATHS:
        if not name.startswith(sides):
            continue
        own = (
            (valve.supply_c, valve.supply_b, valve.m)
            if side == "supply"
            else (valve.exhaust_c, valve.exhaust_b, valve.m)
        )
        chain: tuple[tuple[float, float, float], ...] = (own,)
        if throttle.kind != "none":
            metered = inward == (throttle.kind == "meter-in")
            # what leaves the rod side, or enters the cap side, does so while extending
            extending = inward == name.startswith("cap")
            needle = throttle.extend_c if extending else throttle.retract_c
            c = needle if metered else throttle.free_c
            assert c is not None
            element = (c, throttle.b, 0.5)
            chain = (own, element) if inward else (element, own)
        if chain not in fits:
            fits[chain] = fit_chain(chain)
        fit = fits[chain]
        found.append(
            Path(
                name=name,
                conductance=fit.conductance,
                critical_ratio=fit.critical_ratio,
                subsonic_index=fit.subsonic_index,
                error=fit.error,
            )
        )
    return tuple(found)


def parameters(actuator: Actuator, machine: Machine, site: Site, paths: tuple[Path, ...]) -> list[float]:
    """Row of the kernel's parameters, see :mod:`actuator.stroke.layout`; of all cylinders in parallel together."""
    load, friction, count = actuator.load, actuator.friction, float(actuator.count)
    par = [0.0] * at.N_PAR
    par[at.AREA_CAP] = count * actuator.area_cap
    par[at.AREA_ROD] = count * actuator.area_rod
    par[at.BORE] = count * actuator.bore
    par[at.STROKE] = actuator.stroke
    par[at.DEAD_CAP] = count * actuator.dead_volume_cap
    par[at.DEAD_ROD] = count * actuator.dead_volume_rod
    par[at.MASS] = load.mass
    par[at.WEIGHT] = load.mass * GRAVITY * math.sin(load.inclination)
    par[at.GUIDE] = load.guide_friction * load.mass * GRAVITY * math.cos(load.inclination)
    par[at.CONSTANT] = load.constant_force
    par[at.EXTEND_FORCE] = load.extend_force
    par[at.RETRACT_FORCE] = load.retract_force
    par[at.BREAKAWAY] = count * friction.breakaway
    par[at.COULOMB] = count * friction.coulomb
    par[at.VISCOUS] = count * friction.viscous
    par[at.STRIBECK] = friction.stribeck_speed
    par[at.P_LINE] = machine.supply_pressure
    par[at.P_EXTEND] = machine.supply_pressure
    par[at.P_RETRACT] = actuator.return_pressure or machine.supply_pressure
    par[at.T_SUPPLY] = machine.supply_temperature
    par[at.P_AMB] = site.ambient_pressure
    par[at.T_AMB] = site.ambient_temperature
    par[at.HEAT] = actuator.wall_heat_transfer or 0.0
    par[at.INDEX] = actuator.polytropic_index or 0.0
    par[at.OPENING] = actuator.valve.opening_time
    cut = actuator.cut_off * actuator.stroke
    par[at.CUT_EXTEND] = cut if actuator.cut_off < 1.0 else 2.0 * actuator.stroke
    par[at.CUT_RETRACT] = actuator.stroke - cut if actuator.cut_off < 1.0 else -actuator.stroke
    if actuator.spring is not None:
        returning = actuator.kind == "spring-return"
        stands = -actuator.spring.preload if returning else actuator.spring.largest(actuator.stroke)
        par[at.SPRING_FORCE] = count * stands
        par[at.SPRING_RATE] = -count * actuator.spring.rate
        par[at.VENTED_ROD if returning else at.VENTED_CAP] = 1.0
    places = {name: at.CAP_FILL + 3 * number for number, (name, *_) in enumerate(_PATHS)}
    for path in paths:
        place = places[path.name]
        par[place : place + 3] = [count * path.conductance, path.critical_ratio, path.subsonic_index]
    return par


def process_rows(actuator: Actuator) -> tuple[list[float], list[float]]:
    """Edges of the process force, and the force below each edge and beyond the last; overlapping forces add."""
    items = actuator.load.process_force
    edges = sorted({item.start for item in items} | {item.end for item in items})
    forces = [0.0] + [sum(item.force for item in items if item.start <= edge < item.end) for edge in edges]
    return edges, forces


def switching(actuator: Actuator, machine: Machine) -> list[float]:
    """Pairs (time, side) at which the connection changes within the cycle, in order."""
    period = machine.cycle_time
    pairs = sorted(
        (
            ((actuator.extend_at + actuator.valve.delay) % period, 1.0),
            ((actuator.retract_at + actuator.valve.delay) % period, -1.0),
        )
    )
    return [number for pair in pairs for number in pair]


def starting_state(par: list[float], side: float) -> tuple[list[float], list[float]]:
    """State and mode at time 0: settled, with the cap (1) or the rod side (-1) on the supply, where that leads to."""
    y = [0.0] * at.N_LEDGER
    mode = [0.0] * at.N_MODE
    y[at.X] = par[at.STROKE] if side > 0.0 else 0.0
    p_cap = par[at.P_EXTEND] if side > 0.0 else par[at.P_AMB]
    p_rod = par[at.P_AMB] if side > 0.0 else par[at.P_RETRACT]
    volumes = (
        par[at.DEAD_CAP] + par[at.AREA_CAP] * y[at.X],
        par[at.DEAD_ROD] + par[at.AREA_ROD] * (par[at.STROKE] - y[at.X]),
    )
    for place, p, volume in ((at.M_CAP, p_cap, volumes[0]), (at.M_ROD, p_rod, volumes[1])):
        y[place] = p * volume / (R_AIR * par[at.T_AMB])
        y[place + 1] = y[place] * CV * par[at.T_AMB]
    mode[at.SIDE] = side
    mode[at.ARMED] = 1.0
    return y, mode


@dataclass(slots=True, kw_only=True)
class Rows:
    """All that the kernel reads and writes for a batch of cases, in its order; tables have a row for each case."""

    periods: Any
    y: Any
    mode: Any
    par: Any
    switches: Any
    edges: Any
    forces: Any
    info: Any
    before: Any
    history: Any
    events: Any
    work: Any

    def arguments(self) -> tuple[Any, ...]:
        """Arguments of :func:`actuator.stroke.batch.batch` from ``periods`` to ``work``."""
        return tuple(getattr(self, name) for name in self.__slots__)


Case = tuple[Actuator, Machine, Site, tuple[Path, ...]]


def gather(cases: Sequence[Case], *, compiled: bool, way: float = 0.0, history: bool = False) -> Rows:
    """Rows of a batch, lists for the interpreted kernel and arrays for the compiled one.

    Parameters
    ----------
    cases : sequence of (Actuator, Machine, Site, tuple of Path)
    compiled : bool
        Which of the two kernels the rows are for.
    way : float
        0 for the machine's own cycle; 1 or -1 for one stroke, commanded at time 0, from rest at the other end. [1]
    history : bool
        Whether there is room for the history of the last cycle.
    """

    def row(numbers: Sequence[Any]) -> Any:
        return np.array(numbers, dtype=np.float64) if compiled else numbers

    def empty(count: int) -> Any:
        return np.zeros(count) if compiled else [0.0] * count

    processes = [process_rows(actuator) for actuator, *_ in cases]
    most = max(len(edges) for edges, _ in processes)
    columns: list[list[list[float]]] = [[] for _ in range(6)]
    for (actuator, machine, site, paths), (edges, forces) in zip(cases, processes, strict=True):
        par = parameters(actuator, machine, site, paths)
        switches = switching(actuator, machine) if way == 0.0 else [0.0, way]
        y, mode = starting_state(par, switches[-1] if way == 0.0 else -way)
        mode[at.PROCESS] = process_at(y[at.X], edges, forces, par)
        beyond = most - len(edges)
        padded = edges + beyond * [2.0 * actuator.stroke], forces + beyond * [0.0]
        for column, own in zip(columns, (y, mode, par, switches, *padded), strict=True):
            column.append(own)
    y_rows, mode_rows, par_rows, switch_rows, edge_rows, force_rows = (row(column) for column in columns)
    return Rows(
        periods=row([machine.cycle_time for _, machine, *_ in cases]),
        y=y_rows,
        mode=mode_rows,
        par=par_rows,
        switches=switch_rows,
        edges=edge_rows,
        forces=force_rows,
        info=row([[0.0] * at.N_INFO for _ in cases]),
        before=row([[0.0] * at.N_STATE for _ in cases]),
        history=empty(MOST_HISTORY * at.HISTORY_WIDTH if history else 0),
        events=empty(at.MAX_EVENTS * at.EVENT_WIDTH),
        work=row([[0.0] * at.N_INTEGRAL for _ in range(at.N_WORK)]),
    )
