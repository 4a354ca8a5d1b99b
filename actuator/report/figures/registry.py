"""What a figure is: its name, kind, formula, source and inputs, and where its value stands."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass
from typing import Any, Literal

from actuator.errors import Refusal
from actuator.kinds import Kind, kind_of
from actuator.results import ActuatorResult, Analysis, MachineResult
from actuator.sources import SOURCES, Source
from actuator.stroke.result import StrokeResult

Level = Literal["actuator", "machine", "project"]
Direction = Literal["", "extend", "retract"]


@dataclass(frozen=True, slots=True, eq=False)
class At:
    """Where a figure is read: the whole analysis, and which machine and actuator of it.

    Attributes
    ----------
    analysis : Analysis
        All results.
    machine_index, actuator_index : int or None
        0-based; None above that level. [1]
    """

    analysis: Analysis
    machine_index: int | None = None
    actuator_index: int | None = None

    @property
    def level(self) -> Level:
        """The level whose figures can be read here."""
        if self.machine_index is None:
            return "project"
        return "machine" if self.actuator_index is None else "actuator"

    @property
    def machine(self) -> MachineResult:
        """The machine; only at machine and actuator level."""
        if self.machine_index is None:
            raise LookupError("no machine at project level")
        return self.analysis.machines[self.machine_index]

    @property
    def actuator(self) -> ActuatorResult:
        """The actuator; only at actuator level."""
        if self.actuator_index is None:
            raise LookupError("no actuator above actuator level")
        return self.machine.actuators[self.actuator_index]

    @property
    def owner(self) -> tuple[str, ...]:
        """Names of machine and actuator, outermost first."""
        if self.machine_index is None:
            return ()
        names = (self.machine.part.name,)
        return names if self.actuator_index is None else (*names, self.actuator.part.name)


@dataclass(frozen=True, slots=True, kw_only=True)
class Figure:
    """One figure that JSON, text, CSV, screen and workings show, with all that explains it.

    Attributes
    ----------
    level : str
        ``"actuator"``, ``"machine"`` or ``"project"``.
    key : str
        Dotted name without unit, ``"extend.stroke_time"``; unique in its level.
    kind : Kind
        Its SI unit and how it is shown.
    label : str
        For tables, without the direction.
    group : str
        Heading of the table that it stands in.
    formula : str
        What an engineer would write down; lines end with a newline.
    sources : tuple of str
        Keys of :data:`actuator.sources.SOURCES`.
    inputs : tuple of str
        Fields that enter, relative to the actuator; ``machine.``, ``site.``, ``plant.`` and ``money.`` say
        otherwise. The name of a nested part stands for all its fields.
    uses : tuple of str
        Keys of figures that enter; ``machine.`` or ``project.`` in front for those of another level.
    get : callable
        Reads the value, in the kind's SI unit, or the refusal.
    direction : str
        ``"extend"``, ``"retract"`` or empty.
    simulated : bool
        Whether it comes out of the simulated cycle; its working then states the equations solved.
    grouped : bool
        The unit stands on the group's key in JSON, ``exergy_J.friction``, not on the figure's own.
    note : str
        A remark that always goes with the working.
    """

    level: Level
    key: str
    kind: Kind
    label: str
    group: str
    formula: str
    sources: tuple[str, ...]
    inputs: tuple[str, ...] = ()
    uses: tuple[str, ...] = ()
    get: Callable[[At], float | Refusal]
    direction: Direction = ""
    simulated: bool = False
    grouped: bool = False
    note: str = ""

    @property
    def row(self) -> str:
        """Key without its direction: figures of both directions share a row."""
        if not self.direction:
            return self.key
        below = self.key.replace(f".{self.direction}.", ".")
        return below.removeprefix(self.direction + ".").removesuffix("_" + self.direction)

    @property
    def json_path(self) -> tuple[str, ...]:
        """Keys that lead to it inside its owner's object, units included."""
        parts = self.key.split(".")
        place = -2 if self.grouped else -1
        name, suffix = parts[place], self.kind.suffix
        if suffix.startswith("_anr") and name.endswith("_anr"):
            suffix = suffix.removeprefix("_anr")
        parts[place] = name + suffix
        return tuple(parts)

    @property
    def source_texts(self) -> tuple[Source, ...]:
        """The sources themselves."""
        return tuple(SOURCES[key] for key in self.sources)

    def value(self, at: At) -> float | Refusal:
        """The value in SI, or why it cannot be had; never NaN or infinite.

        Parameters
        ----------
        at : At
            Where to read it; must be of the figure's level.

        Returns
        -------
        float or Refusal
            In the SI unit of the figure's kind.
        """
        found = self.get(at)
        if isinstance(found, Refusal):
            return found
        if not math.isfinite(found):
            return Refusal("the computation gave no finite number", self.key)
        return float(found)


def kind(alias: Any) -> Kind:
    """Kind of one of the aliases in ``actuator.kinds``."""
    return kind_of(alias)


def of_stroke(read: Callable[[StrokeResult], float | Refusal]) -> Callable[[At], float | Refusal]:
    """Reader of a figure of the simulated cycle; the refusal of the cycle is the figure's."""

    def get(at: At) -> float | Refusal:
        stroke = at.actuator.stroke
        return stroke if isinstance(stroke, Refusal) else read(stroke)

    return get


def si_unit(kind: Kind, currency: str) -> str:
    """SI unit of a kind as plain text, reference and currency included.

    Parameters
    ----------
    kind : Kind
        What the number means.
    currency : str
        Code of the document's money.

    Returns
    -------
    str
        ``"Pa absolute"``, ``"m3 ANR"``, ``"EUR"``; ``"1"`` where there is no unit.
    """
    unit = kind.unit.replace("**", "")
    if kind.dimension == "pressure":
        return f"{unit} absolute"
    if kind.dimension in ("volume_anr", "flow_anr"):
        return unit.replace("m3", "m3 ANR", 1)
    if kind.dimension == "money":
        return currency
    if kind.dimension == "price_air":
        return f"{currency}/m3 ANR"
    return unit
