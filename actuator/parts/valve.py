"""The directional valve and the one-way flow controls."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Annotated, Literal

from actuator.errors import InputError, Problem
from actuator.kinds import (
    Conductance,
    CriticalRatio,
    Entry,
    SubsonicIndex,
    Time,
    check,
)

ValveFunction = Literal["5/2 spring", "5/2 detent", "5/3 closed", "5/3 exhausted", "5/3 pressurised", "3/2"]
ThrottleKind = Literal["meter-out", "meter-in", "none"]


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
            default="5/2 spring; 3/2 for single-acting kinds; common practice, no source",
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
            needles = (self.extend_c, self.retract_c)
            missing = ["extend_c", "retract_c"] if needles == (None, None) else []
            missing += ["free_c"] if self.free_c is None else []
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
