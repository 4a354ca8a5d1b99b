"""The commented starting document, made from the schema so that it cannot drift."""

from __future__ import annotations

from actuator.project.schema import sheet
from actuator.unit_table import System

_START: dict[str, tuple[str, str]] = {
    "title": ("A machine", "A machine"),
}


def start(system: System) -> str:
    """Starting document in SI or US units."""
    raise KeyError(system, sheet)
