"""Ideal indicator diagram of a stroke: admission, expansion, release, exhaust, recompression."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from actuator.air.exergy import flow_exergy, unused_share
from actuator.air.gas import GAMMA, R_AIR
from actuator.air.work import end_pressure, polytropic_work
from actuator.errors import InputError, Problem, Refusal
from actuator.parts import Actuator

Array = NDArray[np.float64]

CURVE_POINTS = 26
"""Points on each of the two curves of a diagram. [1]"""


@dataclass(frozen=True, slots=True, kw_only=True)
class Diagram:
    """One chamber's ideal cycle."""

    work_out: float
    """Useful work while the volume grows, ambient behind the piston. [J]"""
    work_back: float
    """Useful work while it shrinks, negative. [J]"""
    work: float
    """Out and back. [J]"""
    mean_effective_pressure: float
    """Work over swept volume. [Pa]"""
    air: float
    """Isothermal admission: the air in the chamber takes the supply's temperature. [kg]"""
    air_adiabatic: float
    """Adiabatic admission: no heat passes, the filled chamber is warmer. [kg]"""
    p_release: float
    """At the end of expansion, absolute. [Pa]"""
    p_compressed: float
    """At the end of recompression, absolute. [Pa]"""
    volume: tuple[float, ...]
    """Points of the closed loop, clearance included. [m³]"""
    pressure: tuple[float, ...]
    """Absolute, same length. [Pa]"""
    remarks: tuple[str, ...]


@dataclass(frozen=True, slots=True, kw_only=True)
class Indicator:
    """Ideal indicator diagram of one stroke of one cylinder, and what the ideal would need."""

    direction: str
    """Of the stroke: ``"extend"``, or ``"retract"`` where a spring drives the cylinder out."""
    cut_off: float
    """[1]"""
    work: float
    """Per stroke, out and back. [J]"""
    mean_effective_pressure: float
    """[Pa]"""
    air: float
    """Per stroke, isothermal admission. [kg]"""
    air_adiabatic: float
    """Per stroke, adiabatic admission. [kg]"""
    work_per_kg: float
    """Work over air of isothermal admission. [J/kg]"""
    unused_share: float
    """Share of the supplied exergy that a full-pressure stroke leaves unused. [1]"""
    unused_share_here: float
    """The same for this diagram, with its cut-off and clearance. [1]"""
    volume: tuple[float, ...]
    """Corner and curve points of the cap side's diagram, closed loop; empty where it takes no air. [m³]"""
    pressure: tuple[float, ...]
    """Absolute, same length as ``volume``. [Pa]"""
    volume_retract: tuple[float, ...]
    """The same for the rod side. [m³]"""
    pressure_retract: tuple[float, ...]
    """[Pa]"""
    remarks: tuple[str, ...]


def _between(start: float, end: float) -> Array:
    """Volumes evenly in ln V, so that a curve is as smooth where it is steep; plain where it has no length. [m³]"""
    if start == end or min(start, end) <= 0.0:
        return np.linspace(start, end, CURVE_POINTS)
    return np.geomspace(start, end, CURVE_POINTS)


def diagram(
    *,
    p_supply: float,
    p_back: float,
    p_ambient: float,
    temp_supply: float,
    swept: float,
    clearance: float = 0.0,
    cut_off: float = 1.0,
    closure: float = 0.0,
    index_expansion: float = GAMMA,
    index_compression: float = GAMMA,
) -> Diagram:
    r"""Ideal cycle of one chamber.

    Parameters
    ----------
    p_supply, p_back, p_ambient : float
        Admission, exhaust and ambient pressure, absolute. [Pa]
    temp_supply : float
        [K]
    swept : float
        Swept volume. [m³]
    clearance : float
        Clearance over swept volume. [1]
    cut_off : float
        Share of the stroke at full pressure, above 0. [1]
    closure : float
        Share of the stroke, at the end of the way back, over which the exhaust is shut. [1]
    index_expansion, index_compression : float
        Polytropic indices. [1]

    Returns
    -------
    Diagram
        Work, mean effective pressure, air and points to draw.

    Raises
    ------
    InputError
        For recompression without clearance, which would have no end.

    Notes
    -----
    With V₁ = (c + ε)V_s, V₂ = (c + 1)V_s, V₃ = (c + κ)V_s, and W the polytropic work:

    .. math:: W_{out} = p_s \varepsilon V_s + W(p_s, V_1 \to V_2, n_e) - p_0 V_s

    .. math:: W_{back} = -p_b (1 - \kappa) V_s + W(p_b, V_3 \to c V_s, n_c) + p_0 V_s

    Air: isothermal (p_s V₁ − p_c c V_s)/(R T_s); adiabatic
    [p_s V₁ − p_c c V_s + (γ − 1) p_s ε V_s]/(γ R T_s), from the balances of mass and energy.

    References
    ----------
    .. [1] Eastop, McConkey, Applied Thermodynamics for Engineering Technologists, 5th ed., air motors (from
       memory).
    .. [2] Nag, Engineering Thermodynamics, example 18.5, p. 727 (excerpt), without clearance.
    """
    if closure > 0.0 and clearance <= 0.0:
        raise InputError(
            Problem(path="closure", given=f"{closure:g}", allowed="0 without clearance: there is no end to it")
        )
    least, v1, v2 = clearance * swept, (clearance + cut_off) * swept, (clearance + 1.0) * swept
    v3 = (clearance + closure) * swept
    p_release = float(end_pressure(p_supply, v1, v2, index_expansion))
    squeezed = closure > 0.0
    p_compressed = float(end_pressure(p_back, v3, least, index_compression)) if squeezed else p_back
    work_out = p_supply * cut_off * swept - p_ambient * swept
    work_out += float(polytropic_work(p_supply, v1, v2, index_expansion))
    work_back = p_ambient * swept - p_back * (1.0 - closure) * swept
    if squeezed:
        work_back += float(polytropic_work(p_back, v3, least, index_compression))
    content = p_supply * v1 - p_compressed * least
    remarks = []
    if p_compressed > p_supply:
        remarks.append(
            f"Recompression ends at {p_compressed / 1e5:.3g} bar absolute, above the supply: shut the exhaust later."
        )
    if p_release < p_back:
        remarks.append(
            f"Expansion ends at {p_release / 1e5:.3g} bar absolute, below the back pressure: "
            "the end of the stroke brakes; a later cut-off would not."
        )
    fall, rise = _between(v1, v2), _between(v3, least)
    back = end_pressure(p_back, v3, rise, index_compression) if squeezed else np.full(CURVE_POINTS, p_back)
    volume = np.concatenate(([least, v1], fall, [v2], rise, [least]))
    pressure = np.concatenate(
        ([p_supply, p_supply], end_pressure(p_supply, v1, fall, index_expansion), [p_back], back, [p_supply])
    )
    return Diagram(
        work_out=work_out,
        work_back=work_back,
        work=work_out + work_back,
        mean_effective_pressure=(work_out + work_back) / swept,
        air=content / (R_AIR * temp_supply),
        air_adiabatic=(content + (GAMMA - 1.0) * p_supply * cut_off * swept) / (GAMMA * R_AIR * temp_supply),
        p_release=p_release,
        p_compressed=p_compressed,
        volume=tuple(volume.tolist()),
        pressure=tuple(pressure.tolist()),
        remarks=tuple(remarks),
    )


def ideal_indicator(
    actuator: Actuator,
    *,
    p_supply: float,
    temp_supply: float,
    p_ambient: float,
    temp_ambient: float,
    closure: float = 0.0,
) -> Indicator:
    """Ideal diagrams of the chambers of one cylinder, and what its extending stroke would need.

    Parameters
    ----------
    actuator : Actuator
        Its polytropic index holds for the curves, without one the adiabatic index.
    p_supply : float
        Supply pressure, absolute; the retracting stroke takes the return pressure where there is one. [Pa]
    temp_supply : float
        [K]
    p_ambient, temp_ambient : float
        Surroundings, absolute; the exhaust ends at ambient pressure. [Pa], [K]
    closure : float
        Share of the way back over which the exhaust is shut; an ordinary valve leaves it open. [1]

    Returns
    -------
    Indicator
        Of the retracting stroke where a spring drives the cylinder out. The dead volumes are the clearance.
        ``unused_share_here`` is 1 − work/(air · flow exergy), isothermal.
    """
    index = actuator.polytropic_index if actuator.polytropic_index is not None else GAMMA
    p_return = actuator.return_pressure if actuator.return_pressure is not None else p_supply
    cap, rod = (
        diagram(
            p_supply=p,
            p_back=p_ambient,
            p_ambient=p_ambient,
            temp_supply=temp_supply,
            swept=area * actuator.stroke,
            clearance=dead / (area * actuator.stroke),
            cut_off=actuator.cut_off,
            closure=closure,
            index_expansion=index,
            index_compression=index,
        )
        for p, area, dead in (
            (p_supply, actuator.area_cap, actuator.dead_volume_cap),
            (p_return, actuator.area_rod, actuator.dead_volume_rod),
        )
    )
    exergy = float(flow_exergy(p_supply, temp_supply, p_ambient, temp_ambient))
    on_cap, on_rod = (way in actuator.air_ways for way in ("extend", "retract"))
    first = cap if on_cap else rod
    per_kg = first.work / first.air
    return Indicator(
        direction="extend" if on_cap else "retract",
        cut_off=actuator.cut_off,
        work=first.work,
        mean_effective_pressure=first.mean_effective_pressure,
        air=first.air,
        air_adiabatic=first.air_adiabatic,
        work_per_kg=per_kg,
        unused_share=float(unused_share(p_supply, p_ambient)),
        unused_share_here=1.0 - per_kg / exergy if exergy > 0.0 else 0.0,
        volume=cap.volume if on_cap else (),
        pressure=cap.pressure if on_cap else (),
        volume_retract=rod.volume if on_rod else (),
        pressure_retract=rod.pressure if on_rod else (),
        remarks=(
            *(() if on_cap else ("The ideal diagram is that of the retracting stroke.",)),
            *(("The ideal diagram is that of one cylinder.",) if actuator.count > 1 else ()),
            *(f"Extending: {item}" for item in cap.remarks if on_cap),
            *(f"Retracting: {item}" for item in rod.remarks if on_rod),
        ),
    )


def smallest_cut_off(
    *, p_supply: float, p_back: float, mean_pressure: float, clearance: float = 0.0, index: float = GAMMA
) -> float | Refusal:
    """Shortest admission whose mean effective pressure still carries a mean load.

    Parameters
    ----------
    p_supply, p_back : float
        Admission and exhaust pressure, absolute. [Pa]
    mean_pressure : float
        Mean force over the stroke, friction included, over the piston area. [Pa]
    clearance : float
        Clearance over swept volume. [1]
    index : float
        Polytropic index of the expansion. [1]

    Returns
    -------
    float or Refusal
        Cut-off, zero where the clearance air alone does it; refused where full pressure is too little. [1]

    Notes
    -----
    Ideal diagram without recompression: p_s·ε + W(p_s, c + ε → c + 1, n) − p_b = p_m, solved by halving; the
    left side rises with ε.
    """

    def mean(cut_off: float) -> float:
        start = max(clearance + cut_off, 1e-300)
        return p_supply * cut_off + float(polytropic_work(p_supply, start, clearance + 1.0, index)) - p_back

    if mean_pressure > p_supply - p_back:
        return Refusal("even full pressure over the whole stroke does not carry the load", "cut_off")
    low, high = 0.0, 1.0
    if mean(low) >= mean_pressure:
        return 0.0
    for _ in range(54):
        middle = 0.5 * (low + high)
        low, high = (middle, high) if mean(middle) < mean_pressure else (low, middle)
    return high
