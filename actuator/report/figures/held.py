"""Figures of what happens when supply, signal or both are lost: one group a loss, one column an end that is left."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from actuator.errors import Refusal
from actuator.holding.connections import CASES, LossCase
from actuator.holding.held import Held
from actuator.kinds import Energy, Force, OpposingForce, Position, Speed, Time
from actuator.report.figures.registry import At, Direction, Figure, kind

LEAVES: dict[Direction, str] = {"extend": "retracted", "retract": "extended"}
"""End that the piston stands at where it could only move this way."""

_INPUTS = (
    "bore",
    "rod",
    "stroke",
    "dead_volume_cap",
    "dead_volume_rod",
    "load",
    "friction",
    "valve.function",
    "holding",
    "return_pressure",
    "machine.supply_pressure",
    "site.ambient_pressure",
    "site.ambient_temperature",
)
_D = "D = p₁·A₁ − p₂·A₂ − p₀·(A₁ − A₂) − M·g·sin α + F_const + F_spring"
_MOVES = f"M·dv/dt = |D(x)| − F_c − (F_b − F_c)·exp(−(v/v_s)²) − k·v − μ·M·g·cos α from rest;  {_D}"
_NOTE = (
    "The chambers are settled when the loss comes. An open side is at ambient pressure at once and brakes nothing; "
    "forces that only oppose motion and a lock that slips are left out: all on the safe side. Where a lost signal "
    "turns the valve with air there, the figures are those of the ordinary stroke."
)

_ROWS: tuple[tuple[str, Any, str, str, tuple[str, ...]], ...] = (
    ("drive", Force, "Force on the piston", f"{_D} right after the loss, positive extending", ("own",)),
    ("hold", OpposingForce, "Friction and lock", "F_b + μ·M·g·cos α + rod lock", ("own",)),
    (
        "way",
        Position,
        "Way it moves",
        "0 where |D| ≤ friction and lock, or D presses it to its end;  else the stroke, or on closed-in air, "
        "p_i·V_i = const, to where |D(x)| = F_b + μ·M·g·cos α",
        ("own",),
    ),
    ("time", Time, "Time it takes", f"t of the way:  {_MOVES}", ("own", "armstrong")),
    ("end_speed", Speed, "Speed at its end", f"v at the end of the way:  {_MOVES}", ("own", "armstrong")),
    ("end_energy", Energy, "Energy at its end", "½·M·v²,  never above (|D| − F_c)·way", ("own", "armstrong")),
    ("trapped", Energy, "Closed-in p·V", "Σ (p − p₀)·V of what is closed in;  100 J = 1 bar·L", ("own",)),
    (
        "starts_after",
        Time,
        "Time until it starts",
        "piston fixed, isothermal, V·dp/dt = −R·T·q(C, b = 0.5) until |D| = friction and lock;  leaking outwards, or "
        "across the piston where both sides are closed in, whichever is sooner",
        ("own", "iso6358", "practice"),
    ),
)


def found(at: At, case: str, start: str) -> Held | None:
    """The loss of that name with the piston at that end."""
    return next((item for item in at.actuator.holding if (item.case, item.start) == (case, start)), None)


def _read(case: LossCase, direction: Direction, name: str) -> Callable[[At], float | Refusal]:
    def get(at: At) -> float | Refusal:
        item = found(at, case, LEAVES[direction])
        if item is None:
            return Refusal("this loss was not looked at")
        value: float | Refusal = getattr(item, name)
        return value

    return get


def _figure(case: LossCase, direction: Direction, row: tuple[str, Any, str, str, tuple[str, ...]]) -> Figure:
    name, alias, label, formula, sources = row
    return Figure(
        level="actuator",
        key=f"holding.{case.replace(' ', '_')}.{direction}.{name}",
        kind=kind(alias),
        label=label,
        group=f"Holding, {case}",
        formula=formula,
        sources=sources,
        inputs=_INPUTS,
        get=_read(case, direction, name),
        direction=direction,
        note=_NOTE,
    )


_WAYS: tuple[Direction, Direction] = ("extend", "retract")
FIGURES: tuple[Figure, ...] = tuple(
    _figure(case, direction, row) for case in CASES for direction in _WAYS for row in _ROWS
)
NAMES = tuple(row[0] for row in _ROWS)
"""Names of the numbers of one loss."""
