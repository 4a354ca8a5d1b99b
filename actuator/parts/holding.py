"""What holds the load when air or signal is lost."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Annotated

from actuator.kinds import Conductance, Entry, OpposingForce, check


@dataclass(frozen=True, slots=True, kw_only=True)
class Holding:
    """Check valves, rod lock, and the leak of what they close in."""

    supply_check: Annotated[
        bool,
        Entry("Supply check", "A check valve keeps the air behind the directional valve's inlet.", example="true"),
    ] = False
    pilot_check: Annotated[
        bool,
        Entry("Pilot check", "Pilot-operated check valves at both cylinder ports.", example="true"),
    ] = False
    rod_lock: Annotated[
        OpposingForce,
        Entry("Rod lock", "Force that a lock on the rod holds, engaged by loss of air or signal.", example="800 N"),
    ] = 0.0
    seal_leak_c: Annotated[
        Conductance | None,
        Entry(
            "Seal leak C",
            "Conductance of the leak out of a closed-in chamber: seals, valve, fittings. Left out, the time until "
            "the load moves is not told.",
            example="0.001 dm3/(s*bar)",
        ),
    ] = None

    def __post_init__(self) -> None:
        check(self)
