"""From parts to the periodic cycle of one actuator."""

from __future__ import annotations

from typing import Any

import numpy as np

from actuator.air.gas import R_AIR
from actuator.errors import Cancelled, Refusal
from actuator.parts import Actuator, Machine, Site
from actuator.stroke import layout as at
from actuator.stroke.assemble import assemble, stored
from actuator.stroke.compiled import Engine
from actuator.stroke.compiled import engine as pick_engine
from actuator.stroke.ledger import psi
from actuator.stroke.result import Path, StrokeResult
from actuator.stroke.rows import Rows, flow_paths, gather

__all__ = ["FINE", "MOST_CYCLES", "ROUGH", "flow_paths", "simulate"]

ROUGH = 1e-4
"""Step tolerance of the cycles that only approach the periodic state. [1]"""
FINE = 3e-7
"""Step tolerance of the cycles that are reported. [1]"""
MOST_CYCLES = 200.0
QUICK_CYCLES = 50.0
"""Cycles after which a quick simulation is taken as it is. [1]"""


def _closes(rows: Rows) -> bool:
    """Whether what the cycle leaves stored is small against what it was supplied with."""
    start, end, par = rows.before[0], rows.y[0], rows.par[0]
    return bool(abs(stored(end, par) - stored(start, par)) <= 3e-7 * abs(end[at.Q_SUPPLIED]))


def _exergy_scale(events: Any, par: Any) -> float:
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
    paths: tuple[Path, ...] | None = None,
    ledger: bool = True,
    rtol: float | None = None,
    quick: bool = False,
    engine: Engine = "auto",
    stop: Any = None,
) -> StrokeResult | Refusal:
    """Simulate an actuator in its machine's cycle until the state repeats.

    Parameters
    ----------
    actuator, machine, site : part
        What moves, how it is commanded and supplied, and the atmosphere around it.
    paths : tuple of Path, optional
        Flow paths of the actuator where they are known already, as of :func:`flow_paths`.
    ledger : bool
        Whether the exergy ledger and the balances are integrated as well.
    rtol : float, optional
        Step tolerance of the reported cycle; ``FINE`` with the ledger, ``ROUGH``/10 without. [1]
    quick : bool
        Report the first cycle at the tolerance ``ROUGH`` that repeats, good to a thousandth: for scatter.
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
    batch, compiled = pick_engine(engine)
    rows = gather([(actuator, machine, site, paths or flow_paths(actuator))], compiled=compiled, history=True)
    history, nothing = rows.history, rows.history[:0]
    info, par = rows.info[0], rows.par[0]
    halt = np.zeros(1, np.uint8) if stop is None else stop
    fine = ROUGH if quick else rtol if rtol is not None else (FINE if ledger else 0.1 * ROUGH)

    def run(most: float, tolerance: float, tight: float, whole: bool, record: bool) -> float:
        rows.history = history if record else nothing
        if batch(most, tolerance, 0.0, tight, whole, *rows.arguments(), halt) == at.STOPPED:
            raise Cancelled("stopped")
        return float(info[at.I_STATUS])

    if quick:
        status = run(QUICK_CYCLES, 3.0 * ROUGH, ROUGH, False, not ledger)
    else:
        status = run(MOST_CYCLES, 30.0 * ROUGH, ROUGH, False, False)
    cycles = info[at.I_CYCLES]
    if quick and ledger and status == at.DONE:
        par[at.LEDGER_SCALE] = _exergy_scale(rows.events, par)
        status = run(1.0, 3.0 * ROUGH, ROUGH, True, True)
        cycles += 1.0
    last = info[at.I_MISMATCH] > 30.0 * ROUGH
    # the ledger closes only from a start at its own tolerance; without it the rough cycles lead near enough
    close, quiet = 3.0 * fine, (1.0 if ledger else 0.0)
    while status == at.DONE and not quick:
        # quiet cycles at the fine tolerance, then one that is reported, until that one repeats; the ledger takes
        # steps of its own, so after a first failure the quiet cycles carry it too
        if quiet > 0.0:
            status = run(quiet, close, fine, ledger and quiet > 1.0, False)
            cycles += info[at.I_CYCLES]
        if ledger:
            par[at.LEDGER_SCALE] = _exergy_scale(rows.events, par)
        if status == at.DONE:
            status = run(1.0, close, fine, ledger, True)
            cycles += 1.0
            repeats = info[at.I_MISMATCH] <= close
            if last or (repeats and (not ledger or _closes(rows))):
                break
            close *= 0.3 if repeats else 1.0
        quiet = max(1.0, 2.0 * quiet)
        last = quiet >= 256.0
    if status != at.DONE:
        return Refusal(
            "the motion changes too fast to be followed: look for a dead volume, mass or conductance out of proportion"
        )
    recorded = int(info[at.I_ROWS]) * at.HISTORY_WIDTH  # the rest of the room for it is best left untouched
    return assemble(
        actuator, machine,
        par=np.array(par), rows=np.array(history[:recorded]), log=np.array(rows.events), info=np.array(info),
        start=np.array(rows.before[0]), end=np.array(rows.y[0]), cycles=cycles, fine=fine, ledger=ledger,
        compiled=compiled,
    )  # fmt: skip
