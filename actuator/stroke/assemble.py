"""The kernel's rows made into a :class:`StrokeResult`."""

from __future__ import annotations

import math

import numpy as np

from actuator.air.gas import CP, CV, GAMMA, R_AIR
from actuator.errors import Refusal
from actuator.parts import Actuator, Machine
from actuator.stroke import layout as at
from actuator.stroke.histories import Histories, fill_in, half_stroke, push_on
from actuator.stroke.result import Array, Balances, Ledger, StrokeResult


def spring_energy(x: float, par: Array) -> float:
    """Energy of the spring against its place at the retracted end. [J]"""
    return float(-par[at.SPRING_FORCE] * x - 0.5 * par[at.SPRING_RATE] * x * x)


def stored(y: Array, par: Array) -> float:
    """Exergy of both chambers against the ambient, and kinetic, lift and spring energy. [J]"""
    p0, t0 = par[at.P_AMB], par[at.T_AMB]
    total = 0.5 * par[at.MASS] * y[at.V] ** 2 + par[at.WEIGHT] * y[at.X]
    total += spring_energy(y[at.X], par)
    for m, u, volume, vented in (
        (y[at.M_CAP], y[at.U_CAP], par[at.DEAD_CAP] + par[at.AREA_CAP] * y[at.X], par[at.VENTED_CAP]),
        (
            y[at.M_ROD],
            y[at.U_ROD],
            par[at.DEAD_ROD] + par[at.AREA_ROD] * (par[at.STROKE] - y[at.X]),
            par[at.VENTED_ROD],
        ),
    ):
        if vented:
            continue
        temp, p = u / (m * CV), (GAMMA - 1.0) * u / volume
        total += (
            m * (CV * (temp - t0) - t0 * (CP * math.log(temp / t0) - R_AIR * math.log(p / p0)) - R_AIR * t0)
            + p0 * volume
        )
    return float(total)


def make_ledger(start: Array, end: Array, par: Array, past: Histories) -> Ledger:
    """Exergy ledger of the cycle from its integrals."""
    supply_path = end[at.Q_THETA_SUPPLY] + end[at.Q_XI_SUPPLY]
    exhaust = end[at.Q_X_SIDE] - end[at.Q_EXHAUST_PATH]
    items = {
        "load": end[at.Q_LOAD],
        "friction": end[at.Q_FRICTION],
        "stop": end[at.Q_STOP],
        "supply_path": supply_path,
        "exhaust_path": end[at.Q_EXHAUST_PATH],
        "heat": end[at.Q_HEAT_LOSS],
        "exhaust": exhaust,
    }
    swing = par[at.DEAD_CAP] * np.ptp(past.p_cap) + par[at.DEAD_ROD] * np.ptp(past.p_rod)
    way = np.ptp(past.position)
    return Ledger(
        supplied=float(end[at.Q_SUPPLIED]),
        **{key: float(value) for key, value in items.items()},
        residual=float(end[at.Q_SUPPLIED] - sum(items.values())),
        filling=float(end[at.Q_FILLING]),
        mixing=float(end[at.Q_XI_SUPPLY] + end[at.Q_XI_EXHAUST]),
        returned=float(end[at.Q_RETURNED]),
        dead_volume=float(swing * math.log(par[at.P_LINE] / par[at.P_AMB])),
        stored_change=stored(end, par) - stored(start, par),
        lift_extend=float(par[at.WEIGHT] * way),
        lift_retract=float(-par[at.WEIGHT] * way),
    )


def make_balances(start: Array, end: Array, par: Array) -> Balances:
    """Integrals of the cycle that check mass, energy and entropy."""

    def pair(cap: int) -> tuple[float, float]:
        return float(end[cap]), float(end[cap + 1])

    kinetic = 0.5 * par[at.MASS] * (end[at.V] ** 2 - start[at.V] ** 2)
    return Balances(
        mass_in=pair(at.Q_IN_CAP),
        mass_out=pair(at.Q_OUT_CAP),
        mass_change=(float(end[at.M_CAP] - start[at.M_CAP]), float(end[at.M_ROD] - start[at.M_ROD])),
        enthalpy_in=pair(at.Q_HIN_CAP),
        enthalpy_out=pair(at.Q_HOUT_CAP),
        work=pair(at.Q_WORK_CAP),
        heat=pair(at.Q_WALL_CAP),
        energy_change=(float(end[at.U_CAP] - start[at.U_CAP]), float(end[at.U_ROD] - start[at.U_ROD])),
        piston_work=float(end[at.Q_PISTON]),
        mechanical_change=float(
            kinetic
            + par[at.WEIGHT] * (end[at.X] - start[at.X])
            + spring_energy(end[at.X], par)
            - spring_energy(start[at.X], par)
        ),
        entropy_produced=float(end[at.Q_ENTROPY]),
        exhaust_side=float(end[at.Q_X_SIDE]),
        drawn=float(end[at.Q_DRAWN]),
        given_back=float(end[at.Q_GIVEN_BACK]),
        vented=float(end[at.Q_VENTED]),
    )


def _pauses(events: Array, sign: float, stroke: float) -> str:
    """Positions between the ends where motion in a direction stopped, in millimetres, at most three."""
    held = (row[at.E_X] for row in events.tolist() if row[at.E_CODE] == at.STICK and row[at.E_SIGN] == sign)
    places = [f"{1e3 * x:.4g}" for x in held if 1e-3 * stroke < x < (1.0 - 1e-3) * stroke]
    return ", ".join(places[:3]) + (" ..." if len(places) > 3 else "")


def assemble(
    actuator: Actuator,
    machine: Machine,
    *,
    par: Array,
    rows: Array,
    log: Array,
    info: Array,
    start: Array,
    end: Array,
    cycles: float,
    fine: float,
    ledger: bool,
    compiled: bool,
) -> StrokeResult:
    """Result of the last cycle of a simulation; arguments are the kernel's rows."""
    count = int(info[at.I_ROWS])
    past = fill_in(rows[: count * at.HISTORY_WIDTH].reshape(count, at.HISTORY_WIDTH), par)
    happened = min(int(info[at.I_EVENTS]), at.MAX_EVENTS)
    events = log[: happened * at.EVENT_WIDTH].reshape(happened, at.EVENT_WIDTH)
    push = push_on(past, par)
    halves = [half_stroke(sign, actuator, machine, events, par, past, push) for sign in (1.0, -1.0)]
    mismatch = float(info[at.I_MISMATCH])
    periodic = mismatch <= 10.0 * fine
    remarks = []
    if not periodic:
        remarks.append(
            f"the state does not repeat from cycle to cycle (difference {mismatch:.1e} after "
            f"{cycles:.0f} cycles): the figures are those of the last one"
        )
    if int(info[at.I_EVENTS]) > at.MAX_EVENTS:
        remarks.append("the piston sticks and slips too often: only the first events of the cycle are counted")
    remarks += [f"{half.direction}: {half.stroke_time}" for half in halves if isinstance(half.stroke_time, Refusal)]
    remarks += [
        f"{half.direction}: the piston pauses at {places} mm before it goes on to the end"
        for half, sign in zip(halves, (1.0, -1.0), strict=True)
        if half.completed and (places := _pauses(events, sign, actuator.stroke))
    ]
    none = Refusal("not asked for")
    return StrokeResult(
        **{name: getattr(past, name) for name in Histories.__dataclass_fields__},
        extend=halves[0],
        retract=halves[1],
        ledger=make_ledger(start, end, par, past) if ledger else none,
        balances=make_balances(start, end, par) if ledger else none,
        cycles=int(cycles),
        periodic=periodic,
        mismatch=mismatch,
        engine="compiled" if compiled else "interpreted",
        rates=int(info[at.I_RATES]),
        remarks=tuple(remarks),
    )
