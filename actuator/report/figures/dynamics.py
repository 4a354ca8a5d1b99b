"""Figures of each half stroke beyond its times: natural frequency, deceleration, letting go."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from actuator.errors import Refusal
from actuator.kinds import Acceleration, Frequency, Time
from actuator.report.figures.motion import SIMULATION
from actuator.report.figures.registry import At, Direction, Figure, kind

_OTHER = "F = ∓(p₁·A₁ − p₂·A₂ − p₀·(A₁ − A₂) − M·g·sin α + F_const),  − extending, + retracting"

_ROWS: tuple[tuple[str, Any, str, str, str], ...] = (
    (
        "natural_frequency",
        Frequency,
        "Natural frequency, lowest",
        "f = ω/(2·π),  ω² = n·(p₁·A₁²/V₁ + p₂·A₂²/V₂)/M,  lowest while the piston moves this way;  n = γ, or the "
        "polytropic index given",
        "Both ports taken as closed. The lower it is, the more the load swings, and the less evenly it creeps: below "
        "a mean speed of about 50 mm/s stick-slip is likely (common practice, no source).",
    ),
    (
        "peak_deceleration",
        Acceleration,
        "Peak deceleration",
        "max −dv/dt in this direction, from the history of the speed",
        "Up to the end only: a rigid stop takes the end speed at once, which has no finite deceleration.",
    ),
    (
        "release_time",
        Time,
        "Let-go time",
        f"t(F = F_c) − t(valve command),  {_OTHER}",
        "From this command until the force that held at the other end, less running friction, has gone: when a "
        "clamped part begins to be free. Valve delay included.",
    ),
    (
        "unloaded_time",
        Time,
        "Unloaded time",
        f"t(F = 0) − t(valve command),  {_OTHER}",
        "From this command until nothing presses at the other end, friction left out.",
    ),
)


def _read(direction: Direction, name: str) -> Callable[[At], float | Refusal]:
    def get(at: At) -> float | Refusal:
        found = at.actuator.dynamics
        if isinstance(found, Refusal):
            return found
        value: float | Refusal = getattr(getattr(found, direction), name)
        return value

    return get


def _figure(direction: Direction, row: tuple[str, Any, str, str, str]) -> Figure:
    name, alias, label, formula, note = row
    return Figure(
        level="actuator",
        key=f"{direction}.{name}",
        kind=kind(alias),
        label=label,
        group="Motion",
        formula=formula,
        sources=("own", "practice") if name == "natural_frequency" else ("own",),
        inputs=SIMULATION,
        get=_read(direction, name),
        direction=direction,
        simulated=True,
        note=note,
    )


_WAYS: tuple[Direction, Direction] = ("extend", "retract")
FIGURES: tuple[Figure, ...] = tuple(_figure(direction, row) for direction in _WAYS for row in _ROWS)
