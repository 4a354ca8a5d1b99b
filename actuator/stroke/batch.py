"""Many cases in one call: the kernel's only entry, compiled or not; one actuator is a batch of one."""

from __future__ import annotations

from collections.abc import Sequence

from actuator.stroke import layout as at
from actuator.stroke.cycle import settle
from actuator.stroke.states import Row, Table


def arrivals(events: Row, info: Row) -> None:
    """Write time and speed of the first arrival at either end from the log to ``info``; time -1 where there is none."""
    info[at.I_EXTENDED] = -1.0
    info[at.I_RETRACTED] = -1.0
    logged = min(int(info[at.I_EVENTS]), len(events) // at.EVENT_WIDTH)
    for number in range(logged):
        row = number * at.EVENT_WIDTH
        if events[row + at.E_CODE] == at.ARRIVE:
            place = at.I_EXTENDED if events[row + at.E_SIGN] > 0.0 else at.I_RETRACTED
            if info[place] < 0.0:
                info[place] = events[row + at.E_TIME]
                info[place + 1] = abs(events[row + at.E_V])


def batch(
    most: float,
    tolerance: float,
    until: float,
    rtol: float,
    ledger: bool,
    periods: Row,
    y: Table,
    mode: Table,
    par: Table,
    switches: Table,
    edges: Table,
    forces: Table,
    info: Table,
    before: Table,
    history: Row,
    events: Row,
    work: Table,
    stop: Sequence[int],
) -> float:
    """Run :func:`actuator.stroke.cycle.settle` over cases, one row of each table a case.

    Parameters
    ----------
    most, tolerance, until, rtol, ledger
        As of ``settle``, the same for all.
    periods : row
        Length of the cycle of each case. [s]
    y, mode, par, switches, edges, forces, info, before : table
        A row for each case as of ``settle``; edges that a case does not have stand beyond its end. ``info`` holds
        each case's status, and time and speed of its first arrival at each end in its last cycle.
    history, events, work : row, row, table
        Shared: history and log of the last case remain.
    stop : sequence of int
        Non-zero ends the work.

    Returns
    -------
    float
        ``STOPPED``, or ``DONE`` even where single cases failed.
    """
    for case in range(len(periods)):
        counters = info[case]
        counters[at.I_STATUS] = settle(
            most, tolerance, periods[case], until, rtol, ledger, y[case], mode[case], par[case], switches[case],
            edges[case], forces[case], history, events, counters, work, before[case], stop,
        )  # fmt: skip
        if counters[at.I_STATUS] == at.STOPPED:
            return at.STOPPED
        arrivals(events, counters)
    return at.DONE
