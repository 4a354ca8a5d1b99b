"""SI into the reader's units: the one place where a view turns a number into text."""

from __future__ import annotations

from dataclasses import dataclass

from actuator.errors import Refusal
from actuator.kinds import Kind
from actuator.parts import Project
from actuator.report.figures import At, Figure, si_unit
from actuator.unit_table import DIMENSIONS, System
from actuator.units import Reading, show

DIGITS = 4
"""Significant figures of every number shown. [1]"""


@dataclass(frozen=True, slots=True)
class Shown:
    """How numbers are shown: units, and what gauge pressures and prices refer to.

    Attributes
    ----------
    reading : Reading
        The project's ambient pressure and currency.
    system : {"si", "us"}
        Trade units.
    """

    reading: Reading
    system: System = "si"

    def number(self, value: float, kind: Kind) -> tuple[str, str]:
        """Number and unit of a value in SI; a kind without a row of the unit table stays in SI."""
        if kind.dimension not in DIMENSIONS:
            return f"{value:.{DIGITS}g}", si_unit(kind, self.reading.currency)
        return show(value, kind, self.reading, self.system, DIGITS)

    def text(self, value: float | Refusal, kind: Kind) -> str:
        """Number and unit in one text, or why there is none."""
        if isinstance(value, Refusal):
            return f"refused: {value.reason}"
        return " ".join(self.number(value, kind)).rstrip()

    def absolute(self, value: float, kind: Kind) -> str:
        """A pressure in absolute terms, for the atmosphere that gauge pressures count from."""
        number, unit = show(value, kind, Reading(0.0, self.reading.currency), self.system, DIGITS)
        return f"{number} {unit.replace('gauge', 'absolute')}"

    def figure(self, figure: Figure, at: At) -> str:
        """Value of a figure with its unit, or why there is none."""
        return self.text(figure.value(at), figure.kind)


def shown_for(project: Project, system: System = "si") -> Shown:
    """Way of showing that fits a project's own atmosphere and currency.

    Parameters
    ----------
    project : Project
    system : {"si", "us"}, optional

    Returns
    -------
    Shown
    """
    return Shown(Reading(project.site.ambient_pressure, project.money.currency), system)
