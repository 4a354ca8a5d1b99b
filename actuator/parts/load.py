"""What the actuator moves, what opposes it, and the friction of the cylinder."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Annotated

from actuator.errors import InputError, Problem
from actuator.kinds import (
    Angle,
    Entry,
    Force,
    Mass,
    OpposingForce,
    Position,
    PositiveSpeed,
    Ratio,
    Viscous,
    check,
)


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
            default="8 % of (p_s - p0)*A_cap (spring-extend: A_rod), common practice, no source",
            example="90 N",
        ),
    ]
    coulomb: Annotated[
        OpposingForce,
        Entry(
            "Running",
            "Friction force while moving, without its viscous part.",
            default="5 % of (p_s - p0)*A_cap (spring-extend: A_rod), common practice, no source",
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
