"""Figures of the extended rod as a beam: its sag and what the gland carries."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from actuator.errors import Refusal
from actuator.kinds import Force, Length, Position
from actuator.report.figures.registry import At, Figure, kind

_LENGTHS = ("bore", "stroke", "mounting", "closed_length")
_LOADS = ("rod", "side_load", "load.inclination")
_WEIGHT = "q = ρ·π/4·d²·g·cos α,  ρ = 7850 kg/m³"


def _read(name: str) -> Callable[[At], float | Refusal]:
    def get(at: At) -> float | Refusal:
        found: float | Refusal = getattr(at.actuator.rod, name)
        return found

    return get


def _figure(name: str, alias: Any, label: str, formula: str, **more: Any) -> Figure:
    return Figure(
        level="actuator",
        key=f"rod.{name}",
        kind=kind(alias),
        label=label,
        group="Rod",
        formula=formula,
        get=_read(name),
        **more,
    )


FIGURES: tuple[Figure, ...] = (
    _figure(
        "overhang",
        Length,
        "Overhang, extended",
        "L = S + closed length, less what of it lies behind the gland:\n"
        "nothing (front mountings, foot), S + 2·D (rear), S/2 + D/2 (mid trunnion)",
        inputs=_LENGTHS,
        sources=("practice",),
        note="From the gland to the rod's end.",
    ),
    _figure(
        "sag",
        Position,
        "Sag of the rod's end",
        f"δ = q·L⁴/(8·E·I) + F_s·L³/(3·E·I),  {_WEIGHT},  I = π·d⁴/64,  E = 210 GPa",
        inputs=_LOADS,
        uses=("rod.overhang",),
        sources=("bansal", "practice"),
        note="Rod of solid steel, held by the gland, its end free: what a guide at the rod's end has to take up. "
        "Play in piston and gland comes on top.",
    ),
    _figure(
        "bearing_load",
        Force,
        "Load on the gland",
        f"R = F_s·(L + a)/a + q·(L + a)²/(2·a),  a = bearing length,  {_WEIGHT}",
        inputs=(*_LOADS, "bearing_length"),
        uses=("rod.overhang",),
        sources=("beam_table", "practice"),
        note="Piston and gland as two supports, the rod's end free.",
    ),
)
