"""From parts to the periodic cycle of one actuator."""

from __future__ import annotations

import math
from typing import Any

import numpy as np

from actuator.air.gas import CV, GRAVITY, R_AIR
from actuator.errors import Cancelled, Refusal
from actuator.flow.series import SeriesFit, fit_chain
from actuator.parts import Actuator, Machine, Site
from actuator.stroke import layout as at
from actuator.stroke.assemble import assemble, stored
from actuator.stroke.compiled import Engine
from actuator.stroke.compiled import engine as pick_engine
from actuator.stroke.equations import psi
from actuator.stroke.events import process_at
from actuator.stroke.result import Path, StrokeResult

ROUGH = 1e-4
"""Step tolerance of the cycles that only approach the periodic state. [1]"""
FINE = 3e-7
"""Step tolerance of the cycles that are reported. [1]"""
MOST_CYCLES = 200.0
HISTORY_ROWS = 6000

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
    """Valve and throttle in series for each port, connection and direction, in the kernel's order.

    Meter-out: what leaves a chamber passes the needle, what enters passes the check valve; meter-in the other way.
    """
    valve, throttle = actuator.valve, actuator.throttle
    found = []
    fits: dict[tuple[tuple[float, float, float], ...], SeriesFit] = {}
    for name, side, inward in _PATHS:
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
    """Row of the kernel's parameters, see :mod:`actuator.stroke.layout`."""
    load, friction = actuator.load, actuator.friction
    par = [0.0] * at.N_PAR
    par[at.AREA_CAP] = actuator.area_cap
    par[at.AREA_ROD] = actuator.area_rod
    par[at.BORE] = actuator.bore
    par[at.STROKE] = actuator.stroke
    par[at.DEAD_CAP] = actuator.dead_volume_cap
    par[at.DEAD_ROD] = actuator.dead_volume_rod
    par[at.MASS] = load.mass
    par[at.WEIGHT] = load.mass * GRAVITY * math.sin(load.inclination)
    par[at.GUIDE] = load.guide_friction * load.mass * GRAVITY * math.cos(load.inclination)
    par[at.CONSTANT] = load.constant_force
    par[at.EXTEND_FORCE] = load.extend_force
    par[at.RETRACT_FORCE] = load.retract_force
    par[at.BREAKAWAY] = friction.breakaway
    par[at.COULOMB] = friction.coulomb
    par[at.VISCOUS] = friction.viscous
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
    for number, path in enumerate(paths):
        place = at.CAP_FILL + 3 * number
        par[place : place + 3] = [path.conductance, path.critical_ratio, path.subsonic_index]
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


def starting_state(par: list[float], switches: list[float]) -> tuple[list[float], list[float]]:
    """State and mode at time 0: settled at the end that the last command of the cycle leads to."""
    side = switches[-1]
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


def _workspace(compiled: bool) -> tuple[Any, ...]:
    """Work rows of the kernel: lists where interpreted, arrays where compiled."""
    n = at.N_LEDGER
    sizes = (7 * n, n, n, n, 7 * n, 42, 6 * n, 6)
    return tuple(np.empty(size) if compiled else [0.0] * size for size in sizes)


def _closes(start: Any, end: Any, par: list[float]) -> bool:
    """Whether what the cycle leaves stored is small against what it was supplied with."""
    row = np.array(par)
    return bool(abs(stored(end, row) - stored(start, row)) <= 3e-7 * abs(end[at.Q_SUPPLIED]))


def _exergy_scale(events: Any, par: list[float]) -> float:
    """Exergy of the air drawn in the cycle whose events these are, at least 1e-4 of a swept volume's. [J]"""
    size = at.EVENT_WIDTH
    switched = [row for row in range(0, size * at.MAX_EVENTS, size) if events[row + at.E_CODE] == at.SWITCH][:2]
    change = sum(abs(events[switched[0] + place] - events[switched[1] + place]) for place in (at.E_M_CAP, at.E_M_ROD))
    full = par[at.P_LINE] * (par[at.AREA_CAP] * par[at.STROKE] + par[at.DEAD_CAP]) / (R_AIR * par[at.T_AMB])
    per_mass = psi(par[at.P_LINE], par[at.T_SUPPLY], par[at.P_AMB], par[at.T_AMB])
    return float(max(change, 1e-4 * full) * per_mass)


def simulate(
    actuator: Actuator,
    machine: Machine,
    site: Site,
    *,
    ledger: bool = True,
    rtol: float | None = None,
    engine: Engine = "auto",
    stop: Any = None,
) -> StrokeResult | Refusal:
    """Simulate an actuator in its machine's cycle until the state repeats.

    Parameters
    ----------
    actuator, machine, site : part
        What moves, how it is commanded and supplied, and the atmosphere around it.
    ledger : bool
        Whether the exergy ledger and the balances are integrated as well.
    rtol : float, optional
        Step tolerance of the reported cycle; ``FINE`` with the ledger, ``ROUGH``/10 without. [1]
    engine : {"auto", "compiled", "interpreted"}
        Which of the two ways to run the kernel.
    stop : array of uint8, optional
        One element; set to non-zero by another thread, it ends the work.

    Returns
    -------
    StrokeResult or Refusal
        A refusal where the state does not come to an end of a cycle at all.

    Raises
    ------
    Cancelled
        When ``stop`` was set.
    """
    settle, compiled = pick_engine(engine)
    paths = flow_paths(actuator)
    par = parameters(actuator, machine, site, paths)
    switches = switching(actuator, machine)
    edges, forces = process_rows(actuator)
    y, mode = starting_state(par, switches)
    mode[at.PROCESS] = process_at(y[at.X], edges, forces, par)
    history = [0.0] * (HISTORY_ROWS * at.HISTORY_WIDTH)
    events = [0.0] * (at.MAX_EVENTS * at.EVENT_WIDTH)
    info = [0.0] * at.N_INFO
    rows: list[Any] = [mode, par, switches, edges, forces]
    none: Any = []
    state: Any = y
    if compiled:
        rows = [np.array(row, dtype=float) for row in rows]
        history, events, info = (np.zeros(len(row)) for row in (history, events, info))  # type: ignore[assignment]
        none = np.empty(0)
        state = np.array(y)
    work = _workspace(compiled)
    halt = np.zeros(1, np.uint8) if stop is None else stop
    fine = rtol if rtol is not None else (FINE if ledger else 0.1 * ROUGH)

    def run(most: float, tolerance: float, tight: float, whole: bool, record: bool) -> float:
        part = state if whole else state[: at.N_STATE]
        status = settle(
            most, tolerance, machine.cycle_time, 0.0, tight, whole, part, *rows,
            history if record else none, events, info, *work, halt,
        )  # fmt: skip
        if not compiled:
            state[: at.N_STATE] = part[: at.N_STATE]
        if status == at.STOPPED:
            raise Cancelled("stopped")
        return status

    status = run(MOST_CYCLES, 30.0 * ROUGH, ROUGH, False, False)
    cycles = info[at.I_CYCLES]
    last = info[at.I_MISMATCH] > 30.0 * ROUGH
    close, quiet = 3.0 * fine, 1.0
    while status == at.DONE:
        # quiet cycles at the fine tolerance, then one that is reported, until that one repeats; the ledger takes
        # steps of its own, so after a first failure the quiet cycles carry it too
        status = run(quiet, close, fine, ledger and quiet > 1.0, False)
        cycles += info[at.I_CYCLES]
        rows[1][at.LEDGER_SCALE] = _exergy_scale(events, par)
        if status == at.DONE:
            status = run(1.0, close, fine, ledger, True)
            cycles += 1.0
            repeats = info[at.I_MISMATCH] <= close
            if last or (repeats and (not ledger or _closes(np.array(work[7]), np.array(state), par))):
                break
            close *= 0.3 if repeats else 1.0
        quiet *= 2.0
        last = quiet >= 256.0
    if status != at.DONE:
        return Refusal(
            "the motion changes too fast to be followed: look for a dead volume, mass or conductance out of proportion"
        )
    return assemble(
        actuator, machine, site,
        par=np.array(par), rows=np.array(history), log=np.array(events), info=np.array(info),
        start=np.array(work[7]), end=np.array(state), cycles=cycles, fine=fine, ledger=ledger, compiled=compiled,
    )  # fmt: skip
