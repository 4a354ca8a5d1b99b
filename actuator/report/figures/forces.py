"""Figures without motion: static forces, the rod as a column, the ideal indicator diagram."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from actuator.errors import Refusal
from actuator.kinds import (
    AirMass,
    Energy,
    Force,
    Kind,
    Length,
    Number,
    PressureDifference,
    Share,
    SpecificEnergy,
)
from actuator.report.figures.cycle import RATIO
from actuator.report.figures.registry import At, Direction, Figure, kind

_PRESSURES = ("machine.supply_pressure", "site.ambient_pressure")
_SIZES = ("kind", "count", "bore", "rod")


def _read(section: str, name: str) -> Callable[[At], float | Refusal]:
    def get(at: At) -> float | Refusal:
        found: float | Refusal = getattr(getattr(at.actuator, section), name)
        return found

    return get


def _static(
    name: str,
    alias: Any,
    label: str,
    formula: str,
    *,
    inputs: tuple[str, ...] = (),
    uses: tuple[str, ...] = (),
    direction: Direction = "",
    sources: tuple[str, ...] = ("own",),
    note: str = "",
) -> Figure:
    return Figure(
        level="actuator",
        key=f"static.{name}",
        kind=alias if isinstance(alias, Kind) else kind(alias),
        label=label,
        group="Static force",
        formula=formula,
        sources=sources,
        inputs=inputs,
        uses=uses,
        get=_read("static", name),
        direction=direction,
        note=note,
    )


_LOAD_NOTE = "At its worst position; without inertia and without the cylinder's own friction."
_WEAKEST = "A spring takes most at the end of the air stroke and gives least at the end of its own: that is shown."
_RATIO_NOTE = "Common practice keeps it below 0.5 for fast strokes, 0.7 for slow ones, 0.85 to clamp."

STATIC: tuple[Figure, ...] = (
    _static(
        "theoretical_extend",
        Force,
        "Theoretical force",
        "F = (p_s − p₀)·A₁,  A₁ = π/4·D², with a through rod π/4·(D² − d²), times the number of cylinders\n"
        "spring-return: less F₀ + k·S, at the end of the stroke;  spring-extend: F = F₀",
        inputs=(*_SIZES, "stroke", "spring", *_PRESSURES),
        direction="extend",
        sources=("esposito",),
        note=_WEAKEST,
    ),
    _static(
        "theoretical_retract",
        Force,
        "Theoretical force",
        "F = (p_r − p₀)·A₂,  A₂ = π/4·(D² − d²), times the number of cylinders,  p_r = return pressure, else p_s\n"
        "spring-extend: less F₀ + k·S, at the end of the stroke;  spring-return: F = F₀",
        inputs=(*_SIZES, "stroke", "spring", "return_pressure", *_PRESSURES),
        direction="retract",
        sources=("esposito",),
        note=_WEAKEST,
    ),
    _static(
        "load_extend",
        Force,
        "Opposing load",
        "max over x of M·g·sin α + μ·M·g·cos α + F_ext + F_process(x) − F_const",
        inputs=("load",),
        direction="extend",
        note=_LOAD_NOTE,
    ),
    _static(
        "load_retract",
        Force,
        "Opposing load",
        "−M·g·sin α + μ·M·g·cos α + F_ret + F_const",
        inputs=("load",),
        direction="retract",
        note=_LOAD_NOTE,
    ),
    *(
        _static(
            f"load_ratio_{direction}",
            RATIO,
            "Load ratio",
            "opposing load/theoretical force",
            uses=(f"static.load_{direction}", f"static.theoretical_{direction}"),
            direction=direction,
            sources=("own", "practice"),
            note=_RATIO_NOTE,
        )
        for direction in ("extend", "retract")
    ),
    *(
        _static(
            f"force_reserve_{direction}",
            RATIO,
            "Force reserve",
            "(theoretical force − F_c − opposing load)/opposing load",
            inputs=("count", "friction.coulomb"),
            uses=(f"static.load_{direction}", f"static.theoretical_{direction}"),
            direction=direction,
            note="At the load's worst position; refused where nothing opposes the motion.",
        )
        for direction in ("extend", "retract")
    ),
    _static(
        "required_bore",
        Length,
        "Required bore",
        "D = √(4·A/π), A the larger of A_e = F_e·(1 + ρ)/[(p_s − p₀)·(1 − f)] and\n"
        "A_r = F_r·(1 + ρ)/[(p_r − p₀)·(1 − k²) − f·(p_s − p₀)];  f = F_c/(F of extending), k = d/D, "
        "ρ the wanted reserve, F_e and F_r the loads of one cylinder\n"
        "single-acting: A = [F·(1 + ρ) + F_spring]/[(p_s − p₀)·(1 − k²)·(1 − f)], F_spring at the end of the air "
        "stroke, k = 0 for spring-return;  through-rod: both sides with 1 − k²",
        inputs=(
            *_SIZES,
            "stroke",
            "spring",
            "return_pressure",
            "friction.coulomb",
            "load",
            "require.force_reserve",
            *_PRESSURES,
        ),
        uses=("static.load_extend", "static.load_retract"),
        note="Running friction and rod in proportion to the bore, a spring as it is; no reserve where none is asked.",
    ),
)


def _rod(name: str, alias: Any, label: str, formula: str, *, inputs: tuple[str, ...] = (), **more: Any) -> Figure:
    return Figure(
        level="actuator",
        key=f"rod.{name}",
        kind=kind(alias),
        label=label,
        group="Rod",
        formula=formula,
        sources=("gere", "shigley", "aisc360", "practice"),
        inputs=inputs,
        get=_read("rod", name),
        **more,
    )


_COLUMN = ("rod", "stroke", "mounting", "rod_end", "closed_length")
_COLUMN_FORMULA = (
    "Euler, λ ≥ λ_t: F = π²·E·I/(K·L)²,  Johnson below: F = A·σ_y·[1 − σ_y·λ²/(4·π²·E)]\n"
    "L = closed length + S,  I = π·d⁴/64,  λ_t = π·√(2·E/σ_y),  E = 210 GPa,  σ_y = 355 MPa"
)

ROD: tuple[Figure, ...] = (
    _rod(
        "largest_push",
        Force,
        "Largest push on a rod",
        "F = (p_s − p₀)·A₁ of one cylinder;  spring-extend: F₀ + k·S",
        inputs=("kind", "bore", "rod", "stroke", "spring", *_PRESSURES),
    ),
    _rod("buckling_load", Force, "Buckling load", _COLUMN_FORMULA, inputs=_COLUMN),
    _rod(
        "buckling_safety",
        Number,
        "Buckling safety",
        "buckling load/largest push",
        uses=("rod.buckling_load", "rod.largest_push"),
        note="Common practice asks for 3.5 to 5.",
    ),
    _rod(
        "slenderness",
        Number,
        "Slenderness",
        "λ = K·L/(d/4),  K = 0.65 to 2.1 by mounting and rod end",
        inputs=_COLUMN,
    ),
    _rod(
        "longest_stroke",
        Length,
        "Longest stroke",
        "S at which buckling load = wanted safety × largest push, from the same two formulas",
        inputs=(*_COLUMN, "require.buckling_safety"),
        uses=("rod.largest_push",),
        note="With a wanted safety of 4 where none is asked (common practice, no source).",
    ),
)

_DIAGRAM = (
    "kind",
    "bore",
    "rod",
    "stroke",
    "dead_volume_cap",
    "dead_volume_rod",
    "cut_off",
    "machine.supply_pressure",
    "machine.supply_temperature",
    "site.ambient_pressure",
)


INDICATOR_GROUP = "Ideal indicator diagram"


def _indicator(
    name: str,
    alias: Any,
    label: str,
    formula: str,
    *,
    inputs: tuple[str, ...] = _DIAGRAM,
    uses: tuple[str, ...] = (),
    note: str = "",
) -> Figure:
    return Figure(
        level="actuator",
        key=f"indicator.{name}",
        kind=kind(alias),
        label=label,
        group=INDICATOR_GROUP,
        formula=formula,
        sources=("own", "eastop"),
        inputs=inputs,
        uses=uses,
        get=_read("indicator", name),
        note=note,
    )


INDICATOR: tuple[Figure, ...] = (
    _indicator("cut_off", Share, "Cut-off", "ε = share of the stroke with the supply open", inputs=("cut_off",)),
    _indicator(
        "work",
        Energy,
        "Work per stroke",
        "W = p_s·ε·V_s + p_s·V₁·L·exprel((1−n)·L) − p_b·(1−κ)·V_s + W_recompression,  L = ln(V₂/V₁)\n"
        "V₁ = (c + ε)·V_s,  V₂ = (c + 1)·V_s,  V₃ = (c + κ)·V_s,  exprel(z) = (eᶻ − 1)/z",
        inputs=(*_DIAGRAM, "polytropic_index"),
        note="Of the extending stroke, or of the retracting one where a spring drives the cylinder out. "
        "Admission, polytropic expansion, release, exhaust and recompression; out and back. Here "
        "n = 1.4 or the polytropic index given, p_b = p₀, κ = 0 as with an ordinary valve.",
    ),
    _indicator(
        "mean_effective_pressure",
        PressureDifference,
        "Mean effective pressure",
        "W/V_s",
        inputs=("kind", "bore", "rod", "stroke"),
        uses=("indicator.work",),
    ),
    _indicator(
        "air",
        AirMass,
        "Air, isothermal",
        "m = (p_s·V₁ − p_c·c·V_s)/(R·T_s)",
        note="Admission at the supply's temperature; the adiabatic figure is the other bound.",
    ),
    _indicator(
        "air_adiabatic",
        AirMass,
        "Air, adiabatic",
        "m = [p_s·V₁ − p_c·c·V_s + (γ − 1)·p_s·ε·V_s]/(γ·R·T_s)",
    ),
    _indicator(
        "work_per_kg",
        SpecificEnergy,
        "Work per mass of air",
        "W/m, isothermal admission",
        inputs=(),
        uses=("indicator.work", "indicator.air"),
    ),
    _indicator(
        "unused_share_here",
        Share,
        "Unused, this diagram",
        "1 − W/(m·ψ(p_s, T_s)),  ψ(p, T) = c_p·(T − T₀) − T₀·[c_p·ln(T/T₀) − R·ln(p/p₀)]",
        inputs=("machine.supply_pressure", "machine.supply_temperature", "site"),
        uses=("indicator.work", "indicator.air"),
        note="Share of the exergy of the admitted air that this diagram leaves unused.",
    ),
    _indicator(
        "unused_share",
        Share,
        "Unused by full pressure",
        "1 − (p − p₀)/(p·ln(p/p₀)),  p = p_s",
        inputs=_PRESSURES,
        note="Share of the supplied exergy that a stroke at full pressure to the end leaves unused: "
        "isothermal, no friction, no dead volume.",
    ),
)

FIGURES: tuple[Figure, ...] = STATIC + ROD + INDICATOR
