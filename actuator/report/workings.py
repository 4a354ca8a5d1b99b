"""The working of one figure: value, formula, the numbers put in and where they come from, sources."""

from __future__ import annotations

import textwrap
from collections.abc import Iterator
from dataclasses import dataclass

from actuator.answer import Answer
from actuator.errors import Refusal
from actuator.report import holding_view
from actuator.report.equations import equations
from actuator.report.fields import field_values
from actuator.report.figures import FIGURES, At, Figure
from actuator.report.names import Named
from actuator.report.shown import Shown, shown_for
from actuator.unit_table import System

LONGEST_NAME, LONGEST_VALUE = 36, 24
"""Widest columns of names and values; what is longer pushes its line to the right. [1]"""


@dataclass(frozen=True, slots=True, kw_only=True)
class Input:
    """One number that enters a figure."""

    name: str
    """Label for a person."""
    path: str
    """Path of a field in the document, or full name of a figure."""
    value: str
    """With its unit, in the reader's units."""
    origin: str
    """``"typed"``, ``"default: ..."`` or ``"computed"``."""


@dataclass(frozen=True, slots=True, kw_only=True)
class Working:
    """How one figure comes about."""

    name: str
    """Full name, ``'"Carton erector".Pusher.extend.stroke_time'``."""
    label: str
    value: str
    """With its unit; the reason where it is refused."""
    formula: tuple[str, ...]
    """Definition first; for a simulated figure then the equations solved."""
    inputs: tuple[Input, ...]
    sources: tuple[str, ...]
    remarks: tuple[str, ...]


def title(figure: Figure) -> str:
    """Label of a figure with its direction, for where it stands alone."""
    ending = {"extend": ", extending", "retract": ", retracting", "": ""}[figure.direction]
    return figure.label + ending


def used_figures(figure: Figure, at: At) -> Iterator[Named]:
    """Figures that enter another one, each at its place.

    Parameters
    ----------
    figure : Figure
    at : At
        Place of that figure.

    Yields
    ------
    Named
    """
    for key in figure.uses:
        scope, _, rest = key.partition(".")
        if scope == "project":
            yield Named(FIGURES["project"][rest], At(at.analysis))
        elif scope == "machines":
            for number in range(len(at.analysis.machines)):
                yield Named(FIGURES["machine"][rest], At(at.analysis, number))
        elif scope == "actuators":
            for index in range(len(at.machine.actuators)):
                yield Named(FIGURES["actuator"][rest], At(at.analysis, at.machine_index, index))
        else:
            yield Named(FIGURES[at.level][key], at)


def _inputs(answer: Answer, figure: Figure, at: At, shown: Shown) -> Iterator[Input]:
    for used in used_figures(figure, at):
        apart = used.at.owner[len(at.owner) :]
        yield Input(
            name=": ".join((*apart, title(used.figure))),
            path=used.name,
            value=shown.figure(used.figure, used.at),
            origin="computed",
        )
    for path in figure.inputs:
        for field in field_values(answer, path, shown, machine=at.machine_index, actuator=at.actuator_index):
            yield Input(name=field.label, path=field.path, value=field.value, origin=field.origin)


def _remarks(figure: Figure, at: At) -> Iterator[str]:
    if figure.note:
        yield figure.note
    if at.level != "actuator":
        return
    result = at.actuator
    if figure.group == "Air of a cycle" and not isinstance(result.air, Refusal):
        yield result.air.difference
    if figure.group.startswith("Ideal indicator"):
        yield from result.indicator.remarks
    yield from holding_view.remarks(figure, at)
    if figure.group == "Rod" and "shigley" in figure.sources and result.rod.rule:
        yield f"Rule used: {result.rod.rule}."
    if figure.simulated and not figure.key.startswith("worst.") and not isinstance(result.stroke, Refusal):
        yield from result.stroke.remarks


def working(
    answer: Answer,
    machine_index: int | None,
    actuator_index: int | None,
    figure_key: str,
    system: System = "si",
) -> Working:
    """Working of one figure.

    Parameters
    ----------
    answer : Answer
        With an analysis.
    machine_index, actuator_index : int or None
        0-based place; None above that level. [1]
    figure_key : str
        Key in the registry, ``"extend.stroke_time"``.
    system : {"si", "us"}, optional
        Units to show in.

    Returns
    -------
    Working

    Raises
    ------
    LookupError
        Where there is no analysis, no such place or no such figure.
    """
    if answer.project is None or answer.analysis is None:
        raise LookupError("the document has problems")
    at = At(answer.analysis, machine_index, actuator_index)
    figure = FIGURES[at.level][figure_key]
    shown = shown_for(answer.project, system)
    formula = tuple(figure.formula.splitlines())
    if figure.simulated:
        formula += equations(at.actuator.part)
    return Working(
        name=Named(figure, at).name,
        label=title(figure),
        value=shown.figure(figure, at),
        formula=formula,
        inputs=tuple(_inputs(answer, figure, at, shown)),
        sources=tuple(str(source) for source in figure.source_texts),
        remarks=tuple(_remarks(figure, at)),
    )


def _wrapped(lines: tuple[str, ...], width: int) -> Iterator[str]:
    for block in lines:
        for line in block.splitlines():
            yield from textwrap.wrap(line, width, initial_indent="  ", subsequent_indent="      ")


def render(found: Working, width: int = 100) -> str:
    """A working as plain text.

    Parameters
    ----------
    found : Working
    width : int, optional
        Columns. [1]

    Returns
    -------
    str
        Ends with a newline.
    """
    lines = [found.name, f"{found.label} = {found.value}", "", "Formula", *_wrapped(found.formula, width)]
    if found.inputs:
        lines += ["", "Put in"]
        name = min(max(len(item.name) for item in found.inputs), LONGEST_NAME)
        value = min(max(len(item.value) for item in found.inputs), LONGEST_VALUE)
        for item in found.inputs:
            text = f"{item.name:<{name}}  {item.value:>{value}}  {item.origin.rstrip('.')}, {item.path}"
            lines += textwrap.wrap(text, width, initial_indent="  ", subsequent_indent=" " * (name + value + 6))
    lines += ["", "Sources", *_wrapped(found.sources, width)]
    if found.remarks:
        lines += ["", "Remarks", *_wrapped(found.remarks, width)]
    return "\n".join(lines) + "\n"
