"""Figures of the flow paths: valve and throttle in series, as the simulation uses them."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from actuator.errors import Refusal
from actuator.kinds import Conductance, CriticalRatio, Kind, SubsonicIndex
from actuator.report.figures.cycle import RATIO
from actuator.report.figures.registry import At, Figure, kind

PATHS = (
    "cap, filling",
    "cap, back to supply",
    "cap, exhausting",
    "cap, sucking in",
    "rod, filling",
    "rod, back to supply",
    "rod, exhausting",
    "rod, sucking in",
)
"""Names of the paths of a double-acting actuator: chamber, and which way the air goes."""

_QUANTITIES: tuple[tuple[str, Any, str, str], ...] = (
    (
        "conductance",
        Conductance,
        "conductance C",
        "choked chain, equal mass flow through each element in the direction of the flow:\n"
        "q = C·p_u·ρ₀·√(T₀/T_u), solved for the whole",
    ),
    (
        "critical_ratio",
        CriticalRatio,
        "critical ratio b",
        "b of the pair (b, m) with which q/q_choked = [1 − ((r − b)/(1 − b))²]^m comes nearest the chain",
    ),
    (
        "subsonic_index",
        SubsonicIndex,
        "subsonic index m",
        "m of the pair (b, m) with which q/q_choked = [1 − ((r − b)/(1 − b))²]^m comes nearest the chain",
    ),
    ("fit_error", RATIO, "fit error", "max |q_fit − q_chain|/q_choked over all pressure ratios"),
)


def slug(path: str) -> str:
    """Name of a path as a step of a figure's key: ``"cap_filling"``."""
    return path.replace(",", "").replace(" ", "_")


def _read(path: str, name: str) -> Callable[[At], float | Refusal]:
    attribute = "error" if name == "fit_error" else name

    def get(at: At) -> float | Refusal:
        for found in at.actuator.paths:
            if found.name == path:
                value: float = getattr(found, attribute)
                return value
        return Refusal("this actuator has no such path")

    return get


def _figure(path: str, name: str, alias: Any, label: str, formula: str) -> Figure:
    return Figure(
        level="actuator",
        key=f"paths.{slug(path)}.{name}",
        kind=alias if isinstance(alias, Kind) else kind(alias),
        label=f"{path[0].upper()}{path[1:]}: {label}",
        group="Flow paths",
        formula=formula,
        sources=("iso6358", "iso6358-3", "own"),
        inputs=("valve", "throttle"),
        get=_read(path, name),
        note="Valve and throttle in series; their order matters, so each direction has its own figure.",
    )


FIGURES: tuple[Figure, ...] = tuple(_figure(path, *row) for path in PATHS for row in _QUANTITIES)
