"""What the simulation of one actuator's periodic cycle gives."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from actuator.errors import Refusal

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class HalfStroke:
    """One way of the piston in the periodic cycle; times count from the valve command.

    A figure that needs the arrival is a :class:`Refusal` where the end is not reached.
    """

    direction: str
    """``"extend"`` or ``"retract"``."""
    completed: bool
    """Whether the piston arrives at the end before it is sent back."""
    position_reached: float
    """Furthest position in this direction, from the retracted end. [m]"""
    reaction_time: float | Refusal
    """Command to the start of the motion that reaches the end. [s]"""
    stroke_time: float | Refusal
    """Command to first contact with the end. [s]"""
    settled_time: float | Refusal
    """Command to rest at the end. [s]"""
    force_time: float | Refusal
    """Arrival until (pressures - gravity + constant - running friction) reaches ``force_at_end``. [s]"""
    force_at_end: float | Refusal
    """That same force at the next command, in this direction. [N]"""
    mean_speed: float | Refusal
    """Way of the motion that reaches the end, over (stroke time - reaction time). [m/s]"""
    peak_speed: float
    """Highest speed in this direction. [m/s]"""
    end_speed: float | Refusal
    """Speed on arrival at the end stop. [m/s]"""
    end_energy: float | Refusal
    """Kinetic energy on arrival at the end stop. [J]"""
    peak_flow: float
    """Highest flow drawn from the supply in this half of the cycle, dry air. [kg/s]"""
    air_drawn: float
    """Air drawn from the supply in this half of the cycle, less what flows back. [kg]"""


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class Ledger:
    """Exergy of one periodic cycle, supply port to atmosphere; every item an integral of its own. [J]"""

    supplied: float
    load: float
    friction: float
    stop: float
    supply_path: float
    exhaust_path: float
    heat: float
    exhaust: float
    residual: float
    filling: float
    mixing: float
    returned: float
    dead_volume: float
    stored_change: float
    lift_extend: float
    lift_retract: float


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class Balances:
    """Integrals over the same cycle that check mass, energy and entropy; pairs are (cap, rod)."""

    mass_in: tuple[float, float]
    """Air into each chamber, both its connections. [kg]"""
    mass_out: tuple[float, float]
    """Air out of each chamber. [kg]"""
    mass_change: tuple[float, float]
    """Mass at the end less mass at the start. [kg]"""
    enthalpy_in: tuple[float, float]
    """Sum of q·cp·T upstream, into each chamber. [J]"""
    enthalpy_out: tuple[float, float]
    """Sum of q·cp·T of the chamber, out of each chamber. [J]"""
    work: tuple[float, float]
    """Boundary work of each chamber, integral of p dV, absolute pressure. [J]"""
    heat: tuple[float, float]
    """Heat from wall to air, each chamber. [J]"""
    energy_change: tuple[float, float]
    """Internal energy at the end less at the start. [J]"""
    piston_work: float
    """Integral of (p1·A1 - p2·A2 - p0·A_rod)·v. [J]"""
    mechanical_change: float
    """Kinetic, lift and spring energy at the end less at the start. [J]"""
    entropy_produced: float
    """Entropy leaving less entering, over the boundary supply port to atmosphere and walls. [J/K]"""
    exhaust_side: float
    """X of the ledger: all losses booked on the exhaust side. [J]"""
    drawn: float
    """Air from the supply, forward flow only. [kg]"""
    given_back: float
    """Air from a chamber back into the supply. [kg]"""
    vented: float
    """Air to the atmosphere less air sucked in. [kg]"""


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class StrokeResult:
    """The periodic cycle of one actuator. Histories share one time axis, arrays are read-only."""

    time: Array
    """Shape (n,), from 0 to the cycle time; events stand twice, once for each side. [s]"""
    position: Array
    """Shape (n,), from the retracted end. [m]"""
    speed: Array
    """Shape (n,), positive extending. [m/s]"""
    p_cap: Array
    """Shape (n,), absolute. [Pa]"""
    p_rod: Array
    """Shape (n,), absolute. [Pa]"""
    temp_cap: Array
    """Shape (n,). [K]"""
    temp_rod: Array
    """Shape (n,). [K]"""
    volume_cap: Array
    """Shape (n,), dead volume included. [m³]"""
    volume_rod: Array
    """Shape (n,), dead volume included. [m³]"""
    flow_supply: Array
    """Shape (n,), drawn from the supply, negative where air flows back; dry air. [kg/s]"""
    flow_exhaust: Array
    """Shape (n,), to the atmosphere. [kg/s]"""
    extend: HalfStroke
    retract: HalfStroke
    ledger: Ledger | Refusal
    balances: Balances | Refusal
    cycles: int
    """Cycles simulated until the state repeated. [1]"""
    periodic: bool
    """Whether it repeated within the step tolerance."""
    mismatch: float
    """Largest relative difference of the state at the ends of the cycle. [1]"""
    engine: str
    """``"compiled"`` or ``"interpreted"``."""
    rates: int
    """Evaluations of the right-hand side in all. [1]"""
    remarks: tuple[str, ...]
    """What the reader should know: not periodic, not finished, not settled."""


@dataclass(frozen=True, slots=True, kw_only=True)
class Path:
    """Flow path between a cylinder port and supply or atmosphere, valve and throttle in series."""

    name: str
    """``"cap, filling"``, ``"rod, exhausting"``, ..."""
    conductance: float
    """Sonic conductance C of the whole path. [m³/(s·Pa)]"""
    critical_ratio: float
    """Critical back-pressure ratio b of the fit. [1]"""
    subsonic_index: float
    """Subsonic index m of the fit. [1]"""
    error: float
    """Largest difference between fit and exact chain, share of the choked flow. [1]"""
