"""One registry of figures: everything that JSON, text, CSV, screen and workings show comes from it."""

from actuator.report.figures import beam, cycle, dynamics, flow, forces, held, money, motion, worst
from actuator.report.figures.motion import completed
from actuator.report.figures.registry import At, Direction, Figure, Level, si_unit

ACTUATOR_FIGURES: tuple[Figure, ...] = (
    motion.FIGURES
    + dynamics.FIGURES
    + worst.FIGURES
    + cycle.FIGURES
    + money.ACTUATOR
    + forces.FIGURES
    + beam.FIGURES
    + held.FIGURES
    + flow.FIGURES
)
MACHINE_FIGURES: tuple[Figure, ...] = money.MACHINE
PROJECT_FIGURES: tuple[Figure, ...] = money.PROJECT
FIGURES: dict[Level, dict[str, Figure]] = {
    "actuator": {figure.key: figure for figure in ACTUATOR_FIGURES},
    "machine": {figure.key: figure for figure in MACHINE_FIGURES},
    "project": {figure.key: figure for figure in PROJECT_FIGURES},
}
"""All figures by level and key."""

__all__ = [
    "ACTUATOR_FIGURES",
    "FIGURES",
    "MACHINE_FIGURES",
    "PROJECT_FIGURES",
    "At",
    "Direction",
    "Figure",
    "Level",
    "completed",
    "si_unit",
]
