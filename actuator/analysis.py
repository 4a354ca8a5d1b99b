"""Every computation of a project, section by section: parts in, results out, nothing kept."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

from actuator.errors import Refusal
from actuator.parts import Actuator, Machine, Project
from actuator.stroke.result import Path, StrokeResult


@dataclass(frozen=True, slots=True, kw_only=True)
class Static:
    """Forces without motion."""

    theoretical_extend: float
    """(p_s - p0)·A_cap. [N]"""
    theoretical_retract: float
    """(p_s - p0)·A_rod, at the return pressure where there is one. [N]"""
    load_extend: float
    """Largest force that opposes extending, worst position, without inertia and cylinder friction. [N]"""
    load_retract: float
    """The same for retracting. [N]"""
    load_ratio_extend: float
    """Opposing load over theoretical force. [1]"""
    load_ratio_retract: float
    force_reserve_extend: float | Refusal
    """(theoretical - running friction - load)/load. [1]"""
    force_reserve_retract: float | Refusal
    required_bore: float | Refusal
    """Smallest bore that carries load, friction and wanted reserve both ways, rod in proportion. [m]"""


@dataclass(frozen=True, slots=True, kw_only=True)
class Rod:
    """The rod as a column."""

    buckling_load: float | Refusal
    """[N]"""
    buckling_safety: float | Refusal
    """Buckling load over the largest push. [1]"""
    slenderness: float
    """[1]"""
    rule: str
    """``"Euler"`` or ``"Johnson"``."""
    longest_stroke: float | Refusal
    """Longest stroke that keeps the wanted safety (4 where none is asked). [m]"""


@dataclass(frozen=True, slots=True, kw_only=True)
class Air:
    """Air of one cycle: what the simulation draws, beside the two hand figures."""

    air_drawn: float
    """[kg], dry air."""
    air_drawn_anr: float
    """[m³ ANR]"""
    textbook_anr: float
    """Swept volumes at supply pressure, no dead volume. [m³ ANR]"""
    settled_anr: float
    """Swept and dead volumes filled from ambient to supply pressure. [m³ ANR]"""
    difference: str
    """Why the first differs from the last two, in words with numbers."""


@dataclass(frozen=True, slots=True, kw_only=True)
class Indicator:
    """Ideal indicator diagram of one stroke (extending), and what the ideal would need."""

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
    """[J/kg]"""
    unused_share: float
    """Share of the supplied exergy that a full-pressure stroke leaves unused. [1]"""
    volume: tuple[float, ...]
    """Corner and curve points of the diagram, closed loop. [m³]"""
    pressure: tuple[float, ...]
    """Absolute, same length as ``volume``. [Pa]"""
    volume_retract: tuple[float, ...]
    """The same for the rod side. [m³]"""
    pressure_retract: tuple[float, ...]
    """[Pa]"""
    remarks: tuple[str, ...]


@dataclass(frozen=True, slots=True, kw_only=True)
class Criterion:
    """One requirement, judged."""

    name: str
    direction: str
    """``"extend"``, ``"retract"`` or empty."""
    wanted: float
    got: float | Refusal
    unit: str
    """SI unit of wanted and got."""
    margin: float | Refusal
    """Share of the wanted, positive is good. [1]"""
    verdict: str
    """``"met"``, ``"failed"`` or ``"refused"``."""


@dataclass(frozen=True, slots=True, kw_only=True)
class Caution:
    """What can hurt, with its source."""

    path: str
    text: str
    source: str


@dataclass(frozen=True, slots=True, kw_only=True)
class AirCost:
    """Energy, money and carbon of a year."""

    energy_year: float
    """Electricity. [J]"""
    cost_year: float
    """In the document's currency."""
    carbon_year: float
    """[kg]"""


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class ActuatorResult:
    """Everything about one actuator."""

    part: Actuator
    static: Static
    rod: Rod
    indicator: Indicator
    paths: tuple[Path, ...]
    stroke: StrokeResult | Refusal
    air: Air | Refusal
    cost: AirCost | Refusal
    """Of one machine's actuator, a year."""
    criteria: tuple[Criterion, ...]
    cautions: tuple[Caution, ...]
    remarks: tuple[str, ...]


@dataclass(frozen=True, slots=True, kw_only=True)
class Demand:
    """Air that the machine (one of its quantity) draws."""

    mean_anr: float | Refusal
    """Over the cycle. [m³/s ANR]"""
    peak_anr: float | Refusal
    """Highest mean over any 0.5 s of the cycle, all actuators together. [m³/s ANR]"""
    per_cycle_anr: float | Refusal
    """[m³ ANR]"""


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class MachineResult:
    """A machine's actuators and their sum."""

    part: Machine
    actuators: tuple[ActuatorResult, ...]
    demand: Demand
    cost: AirCost | Refusal
    """Of all machines of this kind, ``quantity`` times one."""


@dataclass(frozen=True, slots=True, kw_only=True)
class Supply:
    """From the meter to a kilogram of compressed air."""

    specific_work: float
    """Work on the air by the model of the compressor, before drive and motor. [J/kg dry air]"""
    specific_energy: float
    """Electricity per mass of dry air. [J/kg]"""
    energy_per_anr: float
    """[J/m³ ANR]"""
    price_per_anr: float
    """In the document's currency, per m³ ANR."""
    how: str
    """``"package power"`` or ``"stages and efficiencies"``."""


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class Analysis:
    """All results of one project."""

    project: Project
    machines: tuple[MachineResult, ...]
    supply: Supply
    cost: AirCost | Refusal
    """Of all machines."""
    remarks: tuple[str, ...]


def never() -> bool:
    """Tell that nobody asked to stop."""
    return False


def analyse(project: Project, previous: Analysis | None = None, cancelled: Callable[[], bool] = never) -> Analysis:
    """Compute everything; placeholder signature while the rooms are built."""
    raise RuntimeError("analysis is being built")
