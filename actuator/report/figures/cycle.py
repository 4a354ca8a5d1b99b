"""Figures of one periodic cycle: its air, and where the exergy that the supply delivers goes."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from actuator.errors import Refusal
from actuator.kinds import AirMass, Energy, Kind, VolumeANR, kind_of
from actuator.report.figures.motion import SIMULATION
from actuator.report.figures.registry import At, Figure, kind

RATIO = Kind(dimension="share", unit="1")
"""A share that may have either sign. [1]"""

_AIR_INPUTS = (
    "kind",
    "count",
    "bore",
    "rod",
    "stroke",
    "return_pressure",
    "machine.supply_pressure",
    "machine.supply_temperature",
)


def _air(name: str) -> Callable[[At], float | Refusal]:
    def get(at: At) -> float | Refusal:
        air = at.actuator.air
        if isinstance(air, Refusal):
            return air
        found: float = getattr(air, name)
        return found

    return get


def ledger_item(name: str) -> Callable[[At], float | Refusal]:
    """Reader of one item of the exergy ledger, with the refusal of the cycle or of the ledger."""

    def get(at: At) -> float | Refusal:
        stroke = at.actuator.stroke
        if isinstance(stroke, Refusal):
            return stroke
        if isinstance(stroke.ledger, Refusal):
            return stroke.ledger
        found: float = getattr(stroke.ledger, name)
        return found

    return get


def share_of(part: Callable[[At], float | Refusal], whole: Callable[[At], float | Refusal]) -> Any:
    """Reader of ``part``/``whole``; refused where either is, or where the whole is not positive."""

    def get(at: At) -> float | Refusal:
        top, bottom = part(at), whole(at)
        if isinstance(bottom, Refusal):
            return bottom
        if isinstance(top, Refusal):
            return top
        return top / bottom if bottom > 0.0 else Refusal("nothing is supplied in the cycle")

    return get


def _loss(at: At) -> float | Refusal:
    pushed, vented = ledger_item("exhaust_path")(at), ledger_item("exhaust")(at)
    if isinstance(pushed, Refusal):
        return pushed
    return vented if isinstance(vented, Refusal) else pushed + vented


def _air_figure(
    key: str,
    alias: Any,
    label: str,
    formula: str,
    *,
    name: str,
    inputs: tuple[str, ...],
    uses: tuple[str, ...] = (),
    sources: tuple[str, ...],
    simulated: bool = False,
    note: str = "",
) -> Figure:
    return Figure(
        level="actuator",
        key=key,
        kind=kind(alias),
        label=label,
        group="Air of a cycle",
        formula=formula,
        sources=sources,
        inputs=inputs,
        uses=uses,
        get=_air(name),
        simulated=simulated,
        note=note,
    )


_ANR_NOTE = (
    "Litres ANR here are kilograms of dry air over 1.1703 kg/m³, the dry air in 1 m³ at 20 °C, 100 kPa "
    "absolute and 65 % relative humidity. The hand formula V·p/100 kPa counts the moisture as air and reads "
    "1.5 % lower."
)

AIR: tuple[Figure, ...] = (
    _air_figure(
        "cycle.air_drawn",
        AirMass,
        "Air drawn",
        "m = ∮ q_s dt, dry air from the supply less what flows back, one periodic cycle",
        name="air_drawn",
        sources=("own", "iso6358"),
        inputs=SIMULATION,
        simulated=True,
    ),
    _air_figure(
        "cycle.air_drawn_anr",
        VolumeANR,
        "Air drawn, ANR",
        "V = m/ρ_dry(ANR),  ρ_dry(ANR) = (p − φ·p_sat)/(R·T) = 1.1703 kg/m³",
        name="air_drawn_anr",
        sources=("own", "iso6358", "iso8778"),
        inputs=SIMULATION,
        uses=("cycle.air_drawn",),
        simulated=True,
        note=_ANR_NOTE,
    ),
    _air_figure(
        "cycle.textbook",
        VolumeANR,
        "Textbook air, ANR",
        "V = (p_s·A₁ + p_r·A₂)·S/(R·T_s·ρ_dry(ANR)),  A₁ = π/4·D²,  A₂ = π/4·(D² − d²), sides that take air,\n"
        "times the number of cylinders; both A₂ with a through rod, both A₁ without a rod",
        name="textbook_anr",
        sources=("esposito", "iso8778"),
        inputs=_AIR_INPUTS,
        note="Swept volumes at supply pressure, no dead volume. " + _ANR_NOTE,
    ),
    _air_figure(
        "cycle.settled",
        VolumeANR,
        "Settled air, ANR",
        "V = Σ [p_s·(A·S + V_dead) − p₀·V_dead]/(R·T_s·ρ_dry(ANR)), sides that take air",
        name="settled_anr",
        sources=("own", "iso8778"),
        inputs=(
            *_AIR_INPUTS,
            "dead_volume_cap",
            "dead_volume_rod",
            "site.ambient_pressure",
            "site.ambient_temperature",
        ),
        note="What a cycle takes that fills and vents each chamber to the end. " + _ANR_NOTE,
    ),
)

_ITEMS: tuple[tuple[str, str, str, str], ...] = (
    (
        "supplied",
        "Supplied at the port",
        "∮ q_s·ψ(p_s, T_u) dt,  ψ(p, T) = c_p·(T − T₀) − T₀·[c_p·ln(T/T₀) − R·ln(p/p₀)]",
        "T_u is the supply's temperature, or the chamber's for air that flows back, which is credited.",
    ),
    (
        "load",
        "Load",
        "∮ (F_ext + F_ret + F_process)·|v| dt − ∮ F_const·v dt",
        "Gravity is zero over a cycle; the lift of each half stroke stands beside the ledger.",
    ),
    (
        "friction",
        "Friction",
        "∮ (F_seal(v) + μ·M·g·cos α)·|v| dt,  F_seal = F_c + (F_b − F_c)·exp(−(v/v_s)²) + k·|v|",
        "",
    ),
    ("stop", "End stops", "Σ ½·M·v² lost at the end stops", ""),
    (
        "supply_path",
        "Supply path",
        "∮ Σθ dt + ∮ ξ dt on the supply side,  θ = R·T₀·|q|·ln(p_u/p_d),  ξ = T₀·q·c_p·[T_in/T − 1 − ln(T_in/T)]",
        "Valve and throttle between supply and chamber, and mixing of that air with the chamber's.",
    ),
    (
        "exhaust_path",
        "Exhaust path",
        "∮ (p − p₀)·(−dV/dt) dt of the chamber that is open to the atmosphere",
        "What the piston pays to push air out; falls with a larger exhaust path.",
    ),
    (
        "heat",
        "Heat to the walls",
        "∮ Σ h·A_w·(T − T₀)²/T dt,  A_w = π·D·x + 2·A",
        "With a polytropic index: −∮ (1 − T₀/T) dQ with the heat it implies; may be negative.",
    ),
    (
        "exhaust",
        "Vented without working",
        "X − exhaust path,  X = ∮ Σθ dt + ∮ q_e·ψ(p₀, T) dt + ∮ ξ dt on the exhaust side",
        "Exergy of the compressed air in the chamber when it is vented; a larger valve does not lower it, a "
        "smaller volume, a lower pressure or an earlier cut-off does.",
    ),
    (
        "residual",
        "Residual",
        "supplied − (load + friction + stops + supply path + exhaust path + heat + vented)",
        "Each of the others is an integral of its own, so this shows how well the ledger closes; it holds "
        "the stored change too.",
    ),
)

_OF_WHICH: tuple[tuple[str, str, str, str], ...] = (
    ("filling", "Filling at rest", "∮ Σθ dt on the supply side while the piston rests", ""),
    ("mixing", "Mixing", "∮ ξ dt,  ξ = T₀·q·c_p·[T_in/T − 1 − ln(T_in/T)]", ""),
    ("returned", "Given back", "∮ q_s·ψ dt where q_s < 0: air pushed back into the supply", ""),
    (
        "dead_volume",
        "Dead volumes",
        "≈ Σ V_dead·(p_hi − p_lo)·ln(p_s/p₀)",
        "What filling and venting the dead volumes alone would take.",
    ),
    (
        "stored_change",
        "Stored change",
        "A + ½·M·v² + M·g·x·sin α + energy of the spring, end of the cycle less its start",
        "",
    ),
    ("lift_extend", "Lift, extending", "M·g·sin α·Δx while extending", ""),
    ("lift_retract", "Lift, retracting", "M·g·sin α·Δx while retracting", ""),
)


def _item(name: str, label: str, formula: str, note: str, group: str, heading: str) -> Figure:
    return Figure(
        level="actuator",
        key=f"cycle.{group}.{name}",
        kind=kind_of(Energy),
        label=label,
        group=heading,
        formula=formula,
        sources=("own", "cengel"),
        inputs=SIMULATION,
        uses=tuple(f"cycle.exergy.{row[0]}" for row in _ITEMS[:-1]) if name == "residual" else (),
        get=ledger_item(name),
        simulated=True,
        grouped=True,
        note=note,
    )


LEDGER = tuple(_item(*row, "exergy", "Exergy of a cycle") for row in _ITEMS)
OF_WHICH = tuple(_item(*row, "exergy_of_which", "Of which (not summed)") for row in _OF_WHICH)

SHARES = tuple(
    Figure(
        level="actuator",
        key=f"cycle.exergy_share.{name}",
        kind=RATIO,
        label=label,
        group="Shares of the supplied exergy",
        formula=f"{label.lower()}/supplied",
        sources=("own",),
        uses=(f"cycle.exergy.{name}", "cycle.exergy.supplied"),
        get=share_of(ledger_item(name), ledger_item("supplied")),
        simulated=True,
    )
    for name, label, _, _ in _ITEMS[1:]
)

LOSS: tuple[Figure, ...] = (
    Figure(
        level="actuator",
        key="cycle.exhaust_loss",
        kind=kind_of(Energy),
        label="Exhaust loss",
        group="Exhaust loss",
        formula="pushed out (exhaust path) + vented without working",
        sources=("own",),
        uses=("cycle.exergy.exhaust_path", "cycle.exergy.exhaust"),
        get=_loss,
        simulated=True,
        note="Booked by cause: a larger exhaust path lowers the first part and not the second.",
    ),
    Figure(
        level="actuator",
        key="cycle.exhaust_loss_share",
        kind=RATIO,
        label="Exhaust loss, share",
        group="Exhaust loss",
        formula="exhaust loss/supplied",
        sources=("own",),
        uses=("cycle.exhaust_loss", "cycle.exergy.supplied"),
        get=share_of(_loss, ledger_item("supplied")),
        simulated=True,
    ),
)

FIGURES: tuple[Figure, ...] = AIR + LEDGER + OF_WHICH + SHARES + LOSS
