"""Figures of the worst-case pair: both half strokes at the slowest and at the hardest corner of the spread."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace
from typing import Any

from actuator.errors import Refusal
from actuator.kinds import AirMass, Mass, Number, kind_of
from actuator.report.figures import motion
from actuator.report.figures.cycle import RATIO
from actuator.report.figures.registry import At, Direction, Figure
from actuator.results import WorstCase

CASES = {"slow": "slowest", "hard": "hardest"}
"""Cases of the pair by the name in JSON, and how labels call them."""

_CORNER = {
    "slow": "at p_s − Δp,  C·(1 − s_C),  friction·(1 + s_f),  opposing load·(1 + s_m),  driving load·(1 − s_m),  "
    "delay·(1 + s_d)",
    "hard": "at p_s + Δp,  C·(1 + s_C),  friction·(1 − s_f),  opposing load·(1 − s_m),  driving load·(1 + s_m),  "
    "delay·(1 − s_d)",
}
_MASS = {
    "slow": "The mass is at the upper end of its range, or at the lower one where its weight drives this way and "
    "that takes longer. Judge times and forces here.",
    "hard": "The mass is at the end of its range that arrives with more energy; both are simulated. Judge impact, "
    "buckling and air here.",
}
_INPUTS = ("spread", "machine.supply_pressure", "return_pressure", "load", "friction", "valve", "throttle")
"""What the spread moves, and the spread itself; the rest enters as it does in the nominal figure."""


def _read(case: str, name: str) -> Callable[[At], float | Refusal]:
    """Reader of a field of one case; one of a half stroke is written ``extend.stroke_time``."""
    way, _, field = name.rpartition(".")

    def get(at: At) -> float | Refusal:
        pair = at.actuator.worst
        if isinstance(pair, Refusal):
            return pair
        of: WorstCase | Any = getattr(pair, case)
        if way:
            of = getattr(of, way)
        if isinstance(of, Refusal):
            return of
        found: float | Refusal = getattr(of, field)
        return found

    return get


def _half(case: str, figure: Figure) -> Figure:
    """A figure of a half stroke at a corner, explained as its nominal one is."""
    return replace(
        figure,
        key=f"worst.{case}.{figure.key}",
        label=f"{figure.label}, {CASES[case]}",
        group=f"Worst-case pair, {CASES[case]}",
        formula=f"{figure.formula}\n{_CORNER[case]}",
        inputs=_INPUTS,
        uses=(figure.key, *(f"worst.{case}.{used}" for used in figure.uses)),
        get=_read(case, figure.key),
        note=f"{figure.note} {_MASS[case]}".strip(),
    )


def _own(
    case: str, key: str, field: str, alias: Any, label: str, formula: str, note: str, direction: Direction = ""
) -> Figure:
    return Figure(
        level="actuator",
        key=f"worst.{case}.{key}",
        kind=alias,
        label=f"{label}, {CASES[case]}",
        group=f"Worst-case pair, {CASES[case]}",
        formula=f"{formula}\n{_CORNER[case]}",
        sources=("own",),
        inputs=_INPUTS,
        get=_read(case, field),
        direction=direction,
        note=note,
    )


def _case(case: str) -> tuple[Figure, ...]:
    ways: tuple[Direction, ...] = ("extend", "retract")
    return (
        *(_half(case, figure) for figure in motion.FIGURES),
        *(
            _own(
                case,
                f"{way}.moved_mass",
                f"mass_{way}",
                kind_of(Mass),
                "Moved mass",
                "M·(1 ± s_m)",
                _MASS[case],
                way,
            )
            for way in ways
        ),
        *(
            _own(
                case,
                f"static.force_reserve_{way}",
                f"force_reserve_{way}",
                RATIO,
                "Force reserve",
                "(F_theoretical − F_c − F_load)/F_load",
                "At the same corner as the half stroke.",
                way,
            )
            for way in ways
        ),
        _own(
            case,
            "rod.buckling_safety",
            "buckling_safety",
            kind_of(Number),
            "Buckling safety",
            "buckling load/largest push of one rod",
            "At the same corner as extending.",
        ),
        _own(
            case,
            "cycle.air_drawn",
            "air_drawn",
            kind_of(AirMass),
            "Air of a cycle",
            "m = ∮ q_s dt, dry air of both half strokes, each at its corner",
            "",
        ),
    )


FIGURES: tuple[Figure, ...] = tuple(figure for case in CASES for figure in _case(case))


def completed(at: At, case: str, direction: Direction) -> bool:
    """Whether the piston arrives at that end at the corner of a case; false where it could not be simulated."""
    pair = at.actuator.worst
    if isinstance(pair, Refusal):
        return False
    half = getattr(getattr(pair, case), direction)
    return not isinstance(half, Refusal) and bool(half.completed)
