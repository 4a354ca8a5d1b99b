"""Figures of each half stroke of the simulated cycle."""

from __future__ import annotations

from typing import Any

from actuator.errors import Refusal
from actuator.kinds import AirMass, Energy, Force, MassFlow, Position, Speed, Time
from actuator.report.figures.registry import At, Direction, Figure, kind, of_stroke

SIMULATION = (
    "kind",
    "count",
    "bore",
    "rod",
    "stroke",
    "dead_volume_cap",
    "dead_volume_rod",
    "return_pressure",
    "extend_at",
    "retract_at",
    "cut_off",
    "wall_heat_transfer",
    "polytropic_index",
    "load",
    "friction",
    "spring",
    "valve",
    "throttle",
    "machine.supply_pressure",
    "machine.supply_temperature",
    "machine.cycle_time",
    "site.ambient_pressure",
    "site.ambient_temperature",
)
"""All fields that enter the simulation of an actuator's cycle."""

_ROWS: tuple[tuple[str, Any, str, str, str], ...] = (
    (
        "reaction_time",
        Time,
        "Reaction time",
        "t_r = t(start of the motion that reaches the end) − t(valve command)",
        "",
    ),
    (
        "stroke_time",
        Time,
        "Stroke time",
        "t_s = t(first contact with the end) − t(valve command)",
        "Valve delay included.",
    ),
    (
        "settled_time",
        Time,
        "Settled time",
        "t_e = t(at rest at the end) − t(valve command)",
        "Equals the stroke time where the end stop is rigid: it takes the speed at once.",
    ),
    (
        "force_time",
        Time,
        "Force build-up time",
        "t_F = t(F_end ≥ force_at_end) − t(arrival)\n"
        "F_end = ±(p₁·A₁ − p₂·A₂ − p₀·(A₁ − A₂) − M·g·sin α + F_const + F_spring) − F_c, + extending, − retracting",
        "Against a force of 0 where require.force_at_end is not given, and always when retracting.",
    ),
    (
        "force_at_end",
        Force,
        "Force at the end",
        "F_end at the next command: ±(p₁·A₁ − p₂·A₂ − p₀·(A₁ − A₂) − M·g·sin α + F_const + F_spring) − F_c",
        "What the load feels while the piston stands at the end, in the direction of the motion.",
    ),
    (
        "mean_speed",
        Speed,
        "Mean speed",
        "v_m = way/(t_s − t_r)",
        "The way of the motion that reaches the end: the stroke, or what was left after a pause.",
    ),
    ("peak_speed", Speed, "Peak speed", "v_max = max |v(t)| in this direction", ""),
    ("end_speed", Speed, "End speed", "v_e = |v| at first contact with the end", ""),
    ("end_energy", Energy, "End energy", "E_e = ½·M·v_e²", "What the end of the stroke has to take."),
    (
        "peak_flow",
        MassFlow,
        "Peak flow drawn",
        "q_max = max q_s(t) in this half of the cycle, dry air",
        "",
    ),
    (
        "air_drawn",
        AirMass,
        "Air drawn",
        "m = ∫ q_s dt over this half of the cycle, less what flows back, dry air",
        "",
    ),
    (
        "position_reached",
        Position,
        "Position reached",
        "x at its furthest in this direction, from the retracted end",
        "The stroke when extending is completed, 0 when retracting is.",
    ),
)


def _half(direction: Direction, name: str) -> Any:
    def read(stroke: Any) -> float | Refusal:
        found: float | Refusal = getattr(getattr(stroke, direction), name)
        return found

    return of_stroke(read)


_EXTRA_USES = {
    "mean_speed": ("stroke_time", "reaction_time"),
    "end_energy": ("end_speed",),
    "force_time": ("force_at_end",),
}
_EXTRA_INPUTS = {"force_time": ("require.force_at_end",)}


def _figure(direction: Direction, row: tuple[str, Any, str, str, str]) -> Figure:
    name, alias, label, formula, note = row
    return Figure(
        level="actuator",
        key=f"{direction}.{name}",
        kind=kind(alias),
        label=label,
        group="Motion",
        formula=formula,
        sources=("own", "iso6358", "armstrong"),
        inputs=_EXTRA_INPUTS.get(name, ()) + SIMULATION,
        uses=tuple(f"{direction}.{used}" for used in _EXTRA_USES.get(name, ())),
        get=_half(direction, name),
        direction=direction,
        simulated=True,
        note=note,
    )


EXTEND = tuple(_figure("extend", row) for row in _ROWS)
RETRACT = tuple(_figure("retract", row) for row in _ROWS)
FIGURES: tuple[Figure, ...] = EXTEND + RETRACT


def completed(at: At, direction: Direction) -> bool:
    """Whether the piston arrives at that end; false where the cycle could not be simulated."""
    stroke = at.actuator.stroke
    if isinstance(stroke, Refusal):
        return False
    return stroke.extend.completed if direction == "extend" else stroke.retract.completed
