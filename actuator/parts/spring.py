"""The spring of a single-acting cylinder."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Annotated

from actuator.kinds import Entry, OpposingForce, Stiffness, check

_LEFT_OUT = "no spring, which spring-return and spring-extend need"


@dataclass(frozen=True, slots=True, kw_only=True)
class Spring:
    """A straight spring in one cylinder, on the side that takes no air."""

    rate: Annotated[
        Stiffness,
        Entry(
            "Spring rate",
            "Force of the spring per length of the stroke.",
            default=_LEFT_OUT,
            example="0.5 N/mm",
        ),
    ]
    preload: Annotated[
        OpposingForce,
        Entry(
            "Spring preload",
            "Force of the spring at the end that it drives the piston to.",
            default=_LEFT_OUT,
            example="30 N",
        ),
    ]

    def __post_init__(self) -> None:
        check(self)

    def largest(self, stroke: float) -> float:
        """Force at the end that the air drives the piston to. [N]"""
        return self.preload + self.rate * stroke

    def energy(self, stroke: float) -> float:
        """Work that the air stroke puts into the spring. [J]"""
        return (self.preload + 0.5 * self.rate * stroke) * stroke
