"""What an analysis holds: the results of every section, frozen."""

from __future__ import annotations

from dataclasses import dataclass

from actuator.cautions import Caution
from actuator.energy.cost import YearlyCost
from actuator.energy.indicator import Indicator
from actuator.errors import Refusal
from actuator.holding.held import Held
from actuator.parts import Actuator, Machine, Project
from actuator.stroke.dynamics import Dynamics
from actuator.stroke.result import HalfStroke, Path, StrokeResult


@dataclass(frozen=True, slots=True, kw_only=True)
class Static:
    """Forces without motion, of all cylinders in parallel together."""

    theoretical_extend: float
    """(p_s - p0)·A_cap, less the spring at the end of an air stroke; the spring's preload where it drives. [N]"""
    theoretical_retract: float
    """The same with A_rod, at the return pressure where there is one. [N]"""
    load_extend: float
    """Largest force that opposes extending, worst position, without inertia and cylinder friction. [N]"""
    load_retract: float
    """The same for retracting. [N]"""
    load_ratio_extend: float | Refusal
    """Opposing load over theoretical force. [1]"""
    load_ratio_retract: float | Refusal
    force_reserve_extend: float | Refusal
    """(theoretical - running friction - load)/load. [1]"""
    force_reserve_retract: float | Refusal
    required_bore: float | Refusal
    """Smallest bore of one cylinder that carries load, spring, friction and wanted reserve, rod in proportion. [m]"""


@dataclass(frozen=True, slots=True, kw_only=True)
class Rod:
    """The rod of one cylinder as a column."""

    largest_push: float | Refusal
    """On one rod: (p_s - p0)·A_cap, or the spring's largest force where that drives it out. [N]"""
    buckling_load: float | Refusal
    """[N]"""
    buckling_safety: float | Refusal
    """Buckling load over the largest push. [1]"""
    slenderness: float | Refusal
    """[1]"""
    rule: str
    """``"Euler"`` or ``"Johnson"``."""
    longest_stroke: float | Refusal
    """Longest stroke that keeps the wanted safety (4 where none is asked). [m]"""
    overhang: float | Refusal
    """Gland to rod end, extended. [m]"""
    sag: float | Refusal
    """Sag of the rod's end under its own weight and the side load, as if nothing guided it. [m]"""
    bearing_load: float | Refusal
    """What the gland carries under the same, with the piston as the other bearing. [N]"""


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


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class WorstCase:
    """Half strokes at the corner of the spread that is slowest, or hardest, each way, and what goes with them."""

    extend: HalfStroke | Refusal
    retract: HalfStroke | Refusal
    mass_extend: float | Refusal
    """Moved mass at that corner, extending. [kg]"""
    mass_retract: float | Refusal
    """The same retracting. [kg]"""
    force_reserve_extend: float | Refusal
    """(theoretical - running friction - load)/load at the corner for extending. [1]"""
    force_reserve_retract: float | Refusal
    buckling_safety: float | Refusal
    """Buckling load over the largest push at the corner for extending. [1]"""
    air_drawn: float | Refusal
    """Air of both half strokes, each at its corner. [kg]"""


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class WorstPair:
    """Both ends of what the spread allows."""

    slow: WorstCase
    """Lowest pressure and conductance, most friction and load, longest delay: judge times and forces here."""
    hard: WorstCase
    """Highest pressure and conductance, least friction and load, shortest delay: impact, buckling and air."""


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class ActuatorResult:
    """Everything about one actuator."""

    part: Actuator
    static: Static
    rod: Rod
    indicator: Indicator
    paths: tuple[Path, ...]
    stroke: StrokeResult | Refusal
    dynamics: Dynamics | Refusal
    holding: tuple[Held, ...]
    """What happens when supply, signal or both are lost, from either end."""
    air: Air | Refusal
    cost: YearlyCost | Refusal
    """Of one machine's actuator, a year."""
    worst: WorstPair | Refusal
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
    cost: YearlyCost | Refusal
    """Of all machines of this kind, ``quantity`` times one."""


@dataclass(frozen=True, slots=True, kw_only=True)
class Supply:
    """From the meter to a kilogram of compressed air."""

    specific_work: float
    """Work on the air by the model of the compressor, before drive and motor; ideal isentropic where the package
    power is given. [J/kg dry air]"""
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
    supply: Supply | Refusal
    cost: YearlyCost | Refusal
    """Of all machines."""
    remarks: tuple[str, ...]
