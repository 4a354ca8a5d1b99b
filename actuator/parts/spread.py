"""How far supply, friction, load, flow and valve may lie from what the document says."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Annotated

from actuator.kinds import Deviation, Entry, PressureDeviation, check


@dataclass(frozen=True, slots=True, kw_only=True)
class Spread:
    """Largest deviation from the document's value, either way: for the worst-case pair and the tolerance bands."""

    supply_pressure: Annotated[
        PressureDeviation,
        Entry(
            "Supply pressure",
            "Largest deviation of the supply pressure, either way; a return pressure moves in proportion.",
            default="0.3 bar, common practice, no source",
            example="0.3 bar",
        ),
    ] = 3e4
    friction: Annotated[
        Deviation,
        Entry(
            "Friction",
            "Largest deviation, as a share: breakaway, running and viscous friction, and that of the guide.",
            default="30 %, common practice, no source",
            example="30 %",
        ),
    ] = 0.3
    mass: Annotated[
        Deviation,
        Entry(
            "Mass and load",
            "Largest deviation, as a share: the moved mass, and the forces of the load.",
            default="10 %, common practice, no source",
            example="10 %",
        ),
    ] = 0.1
    conductance: Annotated[
        Deviation,
        Entry(
            "Conductance",
            "Largest deviation, as a share: every conductance that the air passes, all of them together.",
            default="10 %, common practice, no source",
            example="10 %",
        ),
    ] = 0.1
    delay: Annotated[
        Deviation,
        Entry(
            "Delay",
            "Largest deviation, as a share, of the valve's delay.",
            default="20 %, common practice, no source",
            example="20 %",
        ),
    ] = 0.2

    def __post_init__(self) -> None:
        check(self)
