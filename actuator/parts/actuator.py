"""The actuator and what hangs on it: load, friction, valve, throttle, requirements."""

from __future__ import annotations

import math
from dataclasses import dataclass, field
from typing import Annotated, Literal

from actuator.errors import InputError, Problem
from actuator.kinds import (
    AbsPressure,
    Angle,
    Conductance,
    CriticalRatio,
    Entry,
    Force,
    HeatTransfer,
    Index,
    Length,
    Mass,
    OpposingForce,
    Period,
    Position,
    PositiveNumber,
    PositiveShare,
    PositiveSpeed,
    Ratio,
    SubsonicIndex,
    Time,
    Viscous,
    Volume,
    check,
)

ActuatorKind = Literal["double-acting"]
Mounting = Literal["foot", "front flange", "rear flange", "rear pin", "front trunnion", "mid trunnion"]
RodEnd = Literal["fixed-guided", "hinged-guided", "free"]
ValveFunction = Literal["5/2 spring", "5/2 detent", "5/3 closed", "5/3 exhausted", "5/3 pressurised"]
ThrottleKind = Literal["meter-out", "meter-in", "none"]


@dataclass(frozen=True, slots=True, kw_only=True)
class ProcessForce:
    """A force that opposes extending between two positions."""

    start: Annotated[Position, Entry("from", "Where the force begins, from the retracted end.", key="from")]
    end: Annotated[Position, Entry("to", "Where the force ends, from the retracted end.", key="to")]
    force: Annotated[OpposingForce, Entry("force", "Opposes extending between the two positions.")]

    def __post_init__(self) -> None:
        check(self)
        if not self.end > self.start:
            raise InputError(
                Problem(path="to", given=f"{self.end:g} m", allowed=f"must lie beyond from = {self.start:g} m")
            )


@dataclass(frozen=True, slots=True, kw_only=True)
class Load:
    """What the actuator moves and what opposes it."""

    mass: Annotated[Mass, Entry("Moved mass", "Everything that moves, piston and rod included.", example="20 kg")]
    inclination: Annotated[
        Angle,
        Entry("Inclination", "Above the horizontal; positive where extending lifts.", example="0 deg"),
    ] = 0.0
    guide_friction: Annotated[
        Ratio,
        Entry("Guide friction", "Coefficient of the external guide that carries the load.", example="0.1"),
    ] = 0.0
    extend_force: Annotated[
        OpposingForce, Entry("Force extending", "Opposes extending over the whole stroke.", example="100 N")
    ] = 0.0
    retract_force: Annotated[
        OpposingForce, Entry("Force retracting", "Opposes retracting over the whole stroke.", example="100 N")
    ] = 0.0
    constant_force: Annotated[
        Force, Entry("Constant force", "Always acting, signed: positive pushes the rod out.", example="0 N")
    ] = 0.0
    process_force: Annotated[
        tuple[ProcessForce, ...],
        Entry("Process force", "Opposes extending between two positions, as in pressing or clamping."),
    ] = ()

    def __post_init__(self) -> None:
        check(self)


@dataclass(frozen=True, slots=True, kw_only=True)
class Friction:
    """Friction of the seals and bearings of the cylinder."""

    breakaway: Annotated[
        OpposingForce,
        Entry(
            "Breakaway",
            "Friction force that starting has to overcome.",
            default="8 % of (p_s - p0)*A_cap, common practice, no source",
            example="90 N",
        ),
    ]
    coulomb: Annotated[
        OpposingForce,
        Entry(
            "Running",
            "Friction force while moving, without its viscous part.",
            default="5 % of (p_s - p0)*A_cap, common practice, no source",
            example="60 N",
        ),
    ]
    viscous: Annotated[
        Viscous,
        Entry(
            "Viscous",
            "Friction per speed.",
            default="0.6 N*s/m per mm of bore, common practice, no source",
            example="30 N*s/m",
        ),
    ]
    stribeck_speed: Annotated[
        PositiveSpeed,
        Entry(
            "Stribeck speed",
            "Speed over which breakaway falls to running friction.",
            example="20 mm/s",
            default="20 mm/s, common practice, no source",
        ),
    ] = 0.02

    def __post_init__(self) -> None:
        check(self)
        if self.breakaway < self.coulomb:
            raise InputError(
                Problem(
                    path="breakaway",
                    given=f"{self.breakaway:g} N",
                    allowed=f"must be at least the running friction, {self.coulomb:g} N",
                )
            )


@dataclass(frozen=True, slots=True, kw_only=True)
class Valve:
    """The directional valve: both paths of a connection, and its timing."""

    supply_c: Annotated[
        Conductance,
        Entry("Supply C", "Sonic conductance, supply to cylinder port (ISO 6358).", example="2.0 dm3/(s*bar)"),
    ]
    supply_b: Annotated[
        CriticalRatio,
        Entry(
            "Supply b",
            "Critical back-pressure ratio of the supply path.",
            default="0.3, common practice, no source",
            example="0.30",
        ),
    ] = 0.3
    exhaust_c: Annotated[
        Conductance,
        Entry(
            "Exhaust C",
            "Sonic conductance, cylinder port to atmosphere.",
            default="the supply path's, common practice, no source",
            example="2.0 dm3/(s*bar)",
        ),
    ]
    exhaust_b: Annotated[
        CriticalRatio,
        Entry(
            "Exhaust b",
            "Critical back-pressure ratio of the exhaust path.",
            default="the supply path's, common practice, no source",
            example="0.30",
        ),
    ] = 0.3
    m: Annotated[
        SubsonicIndex,
        Entry(
            "Subsonic index m",
            "Exponent of the subsonic branch, both paths.",
            default="0.5, ISO 6358-1:2013, from memory",
            example="0.5",
        ),
    ] = 0.5
    function: Annotated[
        ValveFunction,
        Entry(
            "Function",
            "Ports, positions, and what brings the valve to rest.",
            default="5/2 spring, common practice, no source",
        ),
    ] = "5/2 spring"
    delay: Annotated[
        Time,
        Entry(
            "Delay",
            "From the command to the first opening.",
            default="15 ms, common practice, no source",
            example="15 ms",
        ),
    ] = 0.015
    opening_time: Annotated[
        Time,
        Entry(
            "Opening time",
            "From the first opening to fully open.",
            default="5 ms, common practice, no source",
            example="5 ms",
        ),
    ] = 0.005

    def __post_init__(self) -> None:
        check(self)


@dataclass(frozen=True, slots=True, kw_only=True)
class Throttle:
    """One-way flow controls at the cylinder ports."""

    kind: Annotated[
        ThrottleKind,
        Entry("Kind", "Which flow is metered: what leaves the cylinder, what enters it, or none."),
    ] = "none"
    extend_c: Annotated[
        Conductance | None,
        Entry("Extending C", "Conductance of the needle that acts while extending.", example="1.2 dm3/(s*bar)"),
    ] = None
    retract_c: Annotated[
        Conductance | None,
        Entry("Retracting C", "Conductance of the needle that acts while retracting.", example="1.2 dm3/(s*bar)"),
    ] = None
    b: Annotated[
        CriticalRatio,
        Entry(
            "b",
            "Critical back-pressure ratio of needle and check valve.",
            default="0.3, common practice, no source",
            example="0.3",
        ),
    ] = 0.3
    free_c: Annotated[
        Conductance | None,
        Entry("Free C", "Conductance in the free direction, through the check valve.", example="3 dm3/(s*bar)"),
    ] = None

    def __post_init__(self) -> None:
        check(self)
        if self.kind != "none":
            missing = [key for key in ("extend_c", "retract_c", "free_c") if getattr(self, key) is None]
            if missing:
                raise InputError(
                    *(
                        Problem(
                            path=key,
                            given="",
                            allowed=f'needed with kind = "{self.kind}", e.g. "1.2 dm3/(s*bar)"',
                        )
                        for key in missing
                    )
                )


@dataclass(frozen=True, slots=True, kw_only=True)
class Require:
    """What the job asks; what is left out is not judged."""

    stroke_time: Annotated[
        Period | None,
        Entry("Stroke time", "Longest time from valve command to end of stroke, each way.", example="1.2 s"),
    ] = None
    force_reserve: Annotated[
        Ratio | None,
        Entry("Force reserve", "Least (theoretical force - friction - load)/load, each way.", example="30 %"),
    ] = None
    buckling_safety: Annotated[
        PositiveNumber | None,
        Entry("Buckling safety", "Least buckling load over largest push on the rod.", example="4.0"),
    ] = None
    force_at_end: Annotated[
        OpposingForce | None,
        Entry("Force at end", "Force that must stand at the extended end.", example="500 N"),
    ] = None
    force_time: Annotated[
        Time | None,
        Entry("Force within", "Longest time after arrival until force_at_end stands.", example="0.2 s"),
    ] = None

    def __post_init__(self) -> None:
        check(self)
        if self.force_time is not None and self.force_at_end is None:
            raise InputError(Problem(path="force_time", given=f"{self.force_time:g} s", allowed="needs force_at_end"))


@dataclass(frozen=True, slots=True, kw_only=True)
class Actuator:
    """One air cylinder in a machine.

    Absolute pressures inside. Positions run from the retracted (cap) end.
    """

    name: Annotated[str, Entry("Name", "Unique in the machine.", example='"Pusher"')]
    kind: Annotated[ActuatorKind, Entry("Kind", "How the cylinder works.")] = "double-acting"
    bore: Annotated[Length, Entry("Bore", "Inside diameter of the barrel.", example="50 mm")]
    rod: Annotated[Length, Entry("Rod", "Diameter of the piston rod.", example="20 mm")]
    stroke: Annotated[Length, Entry("Stroke", "Way of the piston from end to end.", example="400 mm")]
    dead_volume_cap: Annotated[
        Volume,
        Entry(
            "Dead volume, cap",
            "Ports and end gap on the cap side, without tubes.",
            default="10 % of the bore as length times the area, common practice, no source",
            example="20 cm3",
        ),
    ]
    dead_volume_rod: Annotated[
        Volume,
        Entry(
            "Dead volume, rod",
            "Ports and end gap on the rod side, without tubes.",
            default="10 % of the bore as length times the area, common practice, no source",
            example="20 cm3",
        ),
    ]
    mounting: Annotated[
        Mounting,
        Entry("Mounting", "How the barrel is fixed.", default="front flange, common practice, no source"),
    ] = "front flange"
    rod_end: Annotated[
        RodEnd,
        Entry("Rod end", "How the rod's end is held.", default="fixed-guided, common practice, no source"),
    ] = "fixed-guided"
    closed_length: Annotated[
        Length,
        Entry(
            "Closed length",
            "Mounting plane or pin to rod end, retracted.",
            default="bore (front flange, foot, front trunnion), stroke + 3 bores (rear flange, rear pin), "
            "stroke/2 + 1.5 bores (mid trunnion); common practice, no source",
            example="90 mm",
        ),
    ]
    return_pressure: Annotated[
        AbsPressure | None,
        Entry(
            "Return pressure",
            "Lower supply for the retract stroke, where it has its own regulator.",
            example="4 bar gauge",
        ),
    ] = None
    extend_at: Annotated[
        Time,
        Entry("Extend at", "Command to extend, within the machine's cycle.", default="0 s", example="0 s"),
    ] = 0.0
    retract_at: Annotated[
        Time,
        Entry(
            "Retract at",
            "Command to retract, within the machine's cycle.",
            default="half the cycle time",
            example="2 s",
        ),
    ]
    cut_off: Annotated[
        PositiveShare,
        Entry(
            "Cut-off",
            "Share of the stroke after which the supply is shut, both ways.",
            default="100 %",
            example="100 %",
        ),
    ] = 1.0
    wall_heat_transfer: Annotated[
        HeatTransfer | None,
        Entry(
            "Wall heat transfer",
            "Coefficient between the air and the chamber walls.",
            default="60 W/(m2*K), common practice, no source",
            example="60 W/(m2*K)",
        ),
    ] = 60.0
    polytropic_index: Annotated[
        Index | None,
        Entry(
            "Polytropic index",
            "In place of wall heat transfer: index of the chamber air, 1 to 1.4.",
            example="1.2",
        ),
    ] = None
    load: Annotated[Load, Entry("Load", "What the actuator moves.")]
    friction: Annotated[Friction, Entry("Friction", "Friction of the cylinder.")]
    valve: Annotated[Valve, Entry("Valve", "The directional valve.")]
    throttle: Annotated[Throttle, Entry("Throttle", "One-way flow controls.")] = field(default_factory=Throttle)
    require: Annotated[Require, Entry("Requirements", "What the job asks.")] = field(default_factory=Require)

    def __post_init__(self) -> None:
        check(self)
        problems = []
        if self.rod >= self.bore:
            problems.append(
                Problem(path="rod", given=f"{self.rod:g} m", allowed=f"must be below the bore, {self.bore:g} m")
            )
        if (self.wall_heat_transfer is None) == (self.polytropic_index is None):
            problems.append(
                Problem(
                    path="polytropic_index",
                    given="",
                    allowed="give either wall_heat_transfer or polytropic_index, not both",
                )
            )
        problems += [
            Problem(
                path=f"load.process_force.{number}.to",
                given=f"{item.end:g} m",
                allowed=f"must not lie beyond the stroke, {self.stroke:g} m",
            )
            for number, item in enumerate(self.load.process_force, 1)
            if item.end > self.stroke * (1 + 1e-12)
        ]
        if problems:
            raise InputError(*problems)

    @property
    def area_cap(self) -> float:
        """Piston area on the cap side. [m²]"""
        return math.pi / 4.0 * self.bore**2

    @property
    def area_rod(self) -> float:
        """Annular piston area on the rod side. [m²]"""
        return math.pi / 4.0 * (self.bore**2 - self.rod**2)
