"""The actuator: geometry, timing, requirements, and the parts that hang on it."""

from __future__ import annotations

import math
from dataclasses import dataclass, field
from typing import Annotated, Literal

from actuator.errors import InputError, Problem
from actuator.kinds import (
    AbsPressure,
    Count,
    Entry,
    HeatTransfer,
    Index,
    Length,
    OpposingForce,
    Period,
    Position,
    PositiveNumber,
    PositiveShare,
    Ratio,
    Time,
    Volume,
    check,
)
from actuator.parts.holding import Holding
from actuator.parts.load import Friction, Load
from actuator.parts.spread import Spread
from actuator.parts.spring import Spring
from actuator.parts.valve import Throttle, Valve

ActuatorKind = Literal["double-acting", "spring-return", "spring-extend", "through-rod", "rodless"]
SPRING_KINDS = ("spring-return", "spring-extend")
"""Kinds that take air on one side, a spring drives them back."""
Mounting = Literal["foot", "front flange", "rear flange", "rear pin", "front trunnion", "mid trunnion"]
RodEnd = Literal["fixed-guided", "hinged-guided", "free"]


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
    """One air cylinder in a machine, or several equal ones on one load.

    Absolute pressures inside. Positions run from the retracted (cap) end. Geometry, friction, spring, valve and
    throttles are those of one cylinder; load, moved mass and requirements are of the whole.
    """

    name: Annotated[str, Entry("Name", "Unique in the machine.", example='"Pusher"')]
    kind: Annotated[ActuatorKind, Entry("Kind", "How the cylinder works.", default="double-acting")] = "double-acting"
    count: Annotated[
        Count,
        Entry(
            "In parallel",
            "Equal cylinders on one load, each with this valve and these throttles; load and requirements are of all.",
            default="1",
            example="1",
        ),
    ] = 1
    bore: Annotated[Length, Entry("Bore", "Inside diameter of the barrel.", example="50 mm")]
    rod: Annotated[
        Position,
        Entry(
            "Rod",
            "Diameter of the piston rod.",
            default="none, as in a rodless cylinder; every other kind needs it",
            example="20 mm",
        ),
    ]
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
    side_load: Annotated[
        OpposingForce,
        Entry("Side load", "Force across the rod at its end, besides the rod's own weight.", example="50 N"),
    ] = 0.0
    bearing_length: Annotated[
        Length,
        Entry(
            "Bearing length",
            "From the middle of the piston to the rod's gland, extended.",
            default="half the bore, common practice, no source",
            example="25 mm",
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
    spring: Annotated[
        Spring | None, Entry("Spring", "Drives a single-acting cylinder back; only for spring-return, spring-extend.")
    ] = None
    valve: Annotated[Valve, Entry("Valve", "The directional valve.")]
    throttle: Annotated[Throttle, Entry("Throttle", "One-way flow controls.")] = field(default_factory=Throttle)
    holding: Annotated[Holding, Entry("Holding", "What holds the load when supply or signal is lost.")] = field(
        default_factory=Holding
    )
    require: Annotated[Require, Entry("Requirements", "What the job asks.")] = field(default_factory=Require)
    spread: Annotated[Spread, Entry("Spread", "How far the values may lie from the document's.")] = field(
        default_factory=Spread
    )

    def __post_init__(self) -> None:
        check(self)
        problems = self._kind_problems()
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

    def _kind_problems(self) -> list[Problem]:
        """What a cylinder of this kind must have, and cannot have."""
        found = []
        if (self.rod > 0.0) == (self.kind == "rodless"):
            allowed = "a rodless cylinder has none: 0" if self.rod > 0.0 else "must be above 0 m"
            found.append(Problem(path="rod", given=f"{self.rod:g} m", allowed=allowed))
        if (self.spring is not None) != self.single_acting:
            allowed = (
                f"a {self.kind} cylinder has none" if self.spring is not None else f"a {self.kind} cylinder has one"
            )
            found.append(Problem(path="spring", given="", allowed=allowed))
        if (self.valve.function == "3/2") != self.single_acting:
            allowed = 'must be "3/2"' if self.single_acting else '"3/2" is for single-acting cylinders'
            found.append(Problem(path="valve.function", given=self.valve.function, allowed=allowed))
        if self.single_acting and self.return_pressure is not None:
            given = f"{self.return_pressure:g} Pa"
            found.append(Problem(path="return_pressure", given=given, allowed="a spring drives this cylinder back"))
        found += [
            Problem(path=f"throttle.{key}", given="", allowed=f'needed with kind = "{self.throttle.kind}"')
            for key in acting_needles(self.kind, self.throttle.kind)
            if getattr(self.throttle, key) is None
        ]
        return found

    @property
    def single_acting(self) -> bool:
        """Whether air drives it one way only, and a spring the other."""
        return self.kind in SPRING_KINDS

    @property
    def air_ways(self) -> tuple[str, ...]:
        """Ways that air drives it: ``"extend"`` fills the cap side, ``"retract"`` the rod side."""
        return {"spring-return": ("extend",), "spring-extend": ("retract",)}.get(self.kind, ("extend", "retract"))

    @property
    def area_cap(self) -> float:
        """Piston area on the cap side of one cylinder: annular where a rod goes through it. [m²]"""
        return self.area_rod if self.kind == "through-rod" else math.pi / 4.0 * self.bore**2

    @property
    def area_rod(self) -> float:
        """Piston area on the rod side of one cylinder: annular, full without a rod. [m²]"""
        return math.pi / 4.0 * (self.bore**2 - self.rod**2)


def acting_needles(kind: str, metering: str) -> tuple[str, ...]:
    """Needles of the throttles that meter any flow.

    Parameters
    ----------
    kind : str
        Of the cylinder; a single-acting one has one port.
    metering : str
        Kind of the throttle.

    Returns
    -------
    tuple of str
        Fields of the throttle. At the one port of a single-acting cylinder meter-in acts on the way that air
        drives, meter-out on the way that the spring drives.
    """
    if metering == "none":
        return ()
    if kind not in SPRING_KINDS:
        return ("extend_c", "retract_c")
    return ("extend_c",) if (kind == "spring-return") == (metering == "meter-in") else ("retract_c",)
