"""The commented starting document, made from the schema so that it cannot drift."""

from __future__ import annotations

from actuator.project.fields import FLAG_WORDS, PROCESS_FORCE
from actuator.project.schema import SheetField, sheet
from actuator.unit_table import DIMENSIONS, System
from actuator.units import Reading, read, show

_HEAD = """\
# Starting document. Change the values; delete what you do not need.
# A quantity is text: number, unit, and where it matters a word: gauge or absolute for a pressure,
# ANR (or another named state) for free air. Write decimals with a point.
# A line that starts with "# key =" holds a field that may be left out: take the first "#" away to set it.
"""

_HEADERS = {
    "Site": "[site]",
    "Machine": "[[machine]]",
    "Actuator": "[[machine.actuator]]",
    "Load": "[machine.actuator.load]",
    "Friction": "[machine.actuator.friction]",
    "Spring": "[machine.actuator.spring]",
    "Valve": "[machine.actuator.valve]",
    "Throttle": "[machine.actuator.throttle]",
    "Requirements": "[machine.actuator.require]",
    "Spread": "[machine.actuator.spread]",
    "Holding": "[machine.actuator.holding]",
    "Compressor": "[[plant.compressor]]",
    "Money": "[money]",
}

_AT = "machine.1.actuator.1."
_VALUES: dict[str, tuple[str, str]] = {
    "title": ("First machine", "First machine"),
    "site.ambient_pressure": ("101.3 kPa absolute", "14.7 psi absolute"),
    "site.ambient_temperature": ("20 degC", "68 degF"),
    "site.relative_humidity": ("65 %", "65 %"),
    "machine.1.name": ("Machine 1", "Machine 1"),
    "machine.1.supply_pressure": ("6 bar gauge", "90 psi gauge"),
    "machine.1.cycle_time": ("4 s", "4 s"),
    "machine.1.hours": ("4000 h/year", "4000 h/year"),
    "machine.1.utilisation": ("80 %", "80 %"),
    _AT + "name": ("Pusher", "Pusher"),
    _AT + "kind": ("double-acting", "double-acting"),
    _AT + "bore": ("50 mm", "2 in"),
    _AT + "rod": ("20 mm", "0.75 in"),
    _AT + "stroke": ("300 mm", "12 in"),
    _AT + "mounting": ("front flange", "front flange"),
    _AT + "rod_end": ("fixed-guided", "fixed-guided"),
    _AT + "extend_at": ("0 s", "0 s"),
    _AT + "retract_at": ("2 s", "2 s"),
    _AT + "load.mass": ("15 kg", "33 lb"),
    _AT + "load.inclination": ("0 deg", "0 deg"),
    _AT + "load.guide_friction": ("0.1", "0.1"),
    _AT + "load.extend_force": ("200 N", "45 lbf"),
    _AT + "valve.supply_c": ("2.0 dm3/(s*bar)", "2.0 dm3/(s*bar)"),
    _AT + "valve.delay": ("15 ms", "15 ms"),
    _AT + "require.stroke_time": ("1.2 s", "1.2 s"),
    _AT + "require.force_reserve": ("30 %", "30 %"),
    "plant.compressor.1.rated_pressure": ("7.5 bar gauge", "110 psi gauge"),
    "money.currency": ("EUR", "USD"),
    "money.energy": ("0.20 /kWh", "0.12 /kWh"),
    "money.carbon": ("0.35 kg/kWh", "0.77 lb/kWh"),
}
"""Typed text of the fields that the starting document sets, SI and US: a made-up machine."""

_PROCESS_FORCE_US = '[{ from = "11 in", to = "12 in", force = "70 lbf" }]'


def start(system: System) -> str:
    """Starting document in SI or US units.

    Parameters
    ----------
    system : {"si", "us"}

    Returns
    -------
    str
        TOML; checks clean.
    """
    parts = [_HEAD + "\nformat = 1"]
    for group in sheet(1, 1):
        rows = [row for row in group.fields if row.path != "title"]
        parts += [_line(row, system) for row in group.fields if row.path == "title"]
        parts.append("\n" + _HEADERS[group.title])
        parts += _group(rows, system)
    return "\n".join(parts) + "\n"


def _group(rows: list[SheetField], system: System) -> list[str]:
    lines = [_line(row, system) for row in rows]
    notes = [_note(row) for row in rows]
    width = max(len(line) for line in lines)
    return [f"{line.ljust(width)}  # {note}" for line, note in zip(lines, notes, strict=True)]


def _line(row: SheetField, system: System) -> str:
    """``key = value``, commented out where the starting document does not set it."""
    key = row.path.rpartition(".")[2]
    value = _VALUES.get(row.path)
    if value is not None:
        return f"{key} = {_toml(value[system == 'us'], row)}"
    return f"# {key} = {_toml(_example(row, system), row)}"


def _example(row: SheetField, system: System) -> str:
    """Example text, in the units of the system."""
    if row.example == PROCESS_FORCE and system == "us":
        return _PROCESS_FORCE_US
    if row.kind is None or system == "si":
        return row.example or row.choices[0]
    dimension = DIMENSIONS[row.kind.dimension]
    if dimension.si[0] == dimension.us[0]:
        return row.example
    reading = Reading()
    return " ".join(show(read(row.example, row.kind, reading), row.kind, reading, "us", 3)).strip()


def _toml(text: str, row: SheetField) -> str:
    """Bare where the field is a number or a list, else in quotes."""
    bare = (
        text.startswith("[")
        or row.choices == FLAG_WORDS
        or (row.kind is not None and text.replace(".", "", 1).isdigit())
    )
    return text if bare else f'"{text}"'


def _note(row: SheetField) -> str:
    choices = f" One of: {', '.join(row.choices)}." if len(row.choices) > 1 else ""
    default = f" Left out: {row.default}." if row.default else ""
    return row.help + choices + default
