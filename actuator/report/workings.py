"""The working of one figure: value, formula, the numbers put in and where they come from, sources."""

from __future__ import annotations

from dataclasses import dataclass

from actuator.answer import Answer


@dataclass(frozen=True, slots=True, kw_only=True)
class Input:
    """One number that enters a figure."""

    name: str
    """Label for a person."""
    path: str
    """Document path of a field, full name of a figure."""
    value: str
    """With its unit, in the reader's system."""
    origin: str
    """``"typed"``, ``"default: ..."`` or ``"computed"``."""


@dataclass(frozen=True, slots=True, kw_only=True)
class Working:
    """How one figure comes about."""

    name: str
    """Full name, ``"Carton erector.Pusher.extend.stroke_time"``."""
    label: str
    value: str
    """With its unit; the reason where it is refused."""
    formula: str
    inputs: tuple[Input, ...]
    sources: tuple[str, ...]
    remarks: tuple[str, ...]
