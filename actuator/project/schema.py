"""What a document may hold: every key, from the parts' own declarations.

Form, file, ``--set`` and JSON Schema read the same fields, so they cannot drift.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, replace
from functools import cache
from typing import Any

from actuator import kinds
from actuator.kinds import Entry, FieldSpec, Kind, fields_of
from actuator.parts import Actuator, Compressor, Machine, Money, Project, Site, Valve
from actuator.unit_table import DIMENSIONS

FORMAT = 1
ROOT: Any = Project


@dataclass(frozen=True, slots=True, kw_only=True)
class Alternate:
    """Another way to state a valve path's conductance.

    Attributes
    ----------
    suffix : str
        Ends the key in place of ``c``.
    kind : Kind
        What is typed.
    label, help, example : str
        As in :class:`~actuator.kinds.Entry`.
    """

    suffix: str
    kind: Kind
    label: str
    help: str
    example: str


ALTERNATES = (
    Alternate(
        suffix="cv",
        kind=kinds.kind_of(kinds.PositiveNumber),
        label="Cv",
        help="US flow coefficient, in place of C.",
        example="0.5",
    ),
    Alternate(
        suffix="kv",
        kind=kinds.kind_of(kinds.PositiveNumber),
        label="Kv",
        help="Metric flow coefficient in m3/h, in place of C.",
        example="0.43",
    ),
    Alternate(
        suffix="qn",
        kind=replace(kinds.kind_of(kinds.FlowANR), at_least=None, above=0.0),
        label="nominal flow",
        help="Flow from 6 to 5 bar gauge, in place of C.",
        example="500 L/min ANR",
    ),
    Alternate(
        suffix="s",
        kind=kinds.kind_of(kinds.Area),
        label="effective area",
        help="Effective area S, in place of C.",
        example="10 mm2",
    ),
)
PROCESS_FORCE = '[{ from = "380 mm", to = "400 mm", force = "300 N" }]'
"""How the list of process forces is typed."""
FAMILIES = ("supply", "exhaust")
"""Paths of a valve that have alternates: ``supply_c``, ``supply_cv``, ..."""

_FORMAT_SPEC = FieldSpec(
    name="format",
    key="format",
    kind=kinds.kind_of(kinds.Count),
    entry=Entry("Format", "Version of the document's format.", example="1"),
    choices=(),
    part=None,
    is_list=False,
    is_text=False,
    is_count=True,
    optional=False,
    required=True,
    default=None,
)


@cache
def fields(part: Any) -> Mapping[str, FieldSpec]:
    """Fields of a part by document key, alternates and the format number included."""
    found = {spec.key: spec for spec in fields_of(part) if spec.entry is not None}
    if part is ROOT:
        return {"format": _FORMAT_SPEC, **found}
    if part is Valve:
        return {key: spec for own in found.values() for key, spec in _with_alternates(own).items()}
    return found


def _with_alternates(spec: FieldSpec) -> dict[str, FieldSpec]:
    """A field and, for a path's conductance, its alternates behind it."""
    family, _, last = spec.key.rpartition("_")
    if last != "c" or family not in FAMILIES:
        return {spec.key: spec}
    return {spec.key: spec} | {
        f"{family}_{way.suffix}": replace(
            spec,
            name=f"{family}_{way.suffix}",
            key=f"{family}_{way.suffix}",
            kind=way.kind,
            entry=Entry(f"{family.capitalize()} {way.label}", way.help, example=way.example),
            optional=True,
            required=False,
            default=None,
        )
        for way in ALTERNATES
    }


def find(steps: tuple[str | int, ...]) -> FieldSpec | None:
    """Field at a path in steps; the list's own field for ``(..., "process_force")`` and for its items."""
    part: Any | None = ROOT
    spec: FieldSpec | None = None
    for step in steps:
        if isinstance(step, int):
            if spec is None or not spec.is_list:
                return None
            continue
        spec = fields(part).get(step) if part is not None else None
        if spec is None:
            return None
        part = spec.part
    return spec


@dataclass(frozen=True, slots=True, kw_only=True)
class SheetField:
    """One row of the form.

    Attributes
    ----------
    path : str
        Numbered path in the document.
    label, help, default, example : str
        From the part's declaration; ``default`` is empty where the field is needed or has none.
    choices : tuple of str
        Allowed words; empty for quantities and free text.
    kind : Kind or None
        None for words, text and lists.
    required : bool
        The document does not check without it.
    instead_of : str
        Path of the field that this one may replace (``supply_cv`` for ``supply_c``); else empty.
    """

    path: str
    label: str
    help: str
    default: str
    example: str
    choices: tuple[str, ...]
    kind: Kind | None
    required: bool = False
    instead_of: str = ""


@dataclass(frozen=True, slots=True, kw_only=True)
class SheetGroup:
    """Fields that stand together in the form."""

    title: str
    fields: tuple[SheetField, ...]


def _rows(part: Any, prefix: str, leave_out: tuple[str, ...] = ()) -> tuple[SheetField, ...]:
    """Rows of a part's own fields; nested parts have groups of their own."""
    rows = []
    for spec in fields(part).values():
        if (spec.part is not None and not spec.is_list) or spec.key in leave_out or spec.entry is None:
            continue
        family, _, suffix = spec.key.rpartition("_")
        alternate = part is Valve and family in FAMILIES and suffix in {way.suffix for way in ALTERNATES}
        rows.append(
            SheetField(
                path=prefix + spec.key,
                label=spec.entry.label,
                help=spec.entry.help,
                default=default_text(spec),
                example=PROCESS_FORCE if spec.is_list else spec.entry.example.strip('"'),
                choices=spec.choices,
                kind=spec.kind,
                required=spec.required,
                instead_of=f"{prefix}{family}_c" if alternate else "",
            )
        )
    return tuple(rows)


def default_text(spec: FieldSpec) -> str:
    """What holds where a field is left out, in words; empty where nothing does."""
    if spec.entry is not None and spec.entry.default:
        return spec.entry.default
    if spec.kind is None or spec.required or not isinstance(spec.default, float):
        return ""
    unit = DIMENSIONS[spec.kind.dimension].si[0] if spec.default == 0.0 else spec.kind.unit.replace("1", "")
    return f"{spec.default:g} {unit}".strip()


@cache
def sheet(machine: int, actuator: int) -> tuple[SheetGroup, ...]:
    """Groups of form rows for one actuator of one machine.

    Parameters
    ----------
    machine, actuator : int
        1-based numbers in the document. [1]

    Returns
    -------
    tuple of SheetGroup
    """
    at = f"machine.{machine}.actuator.{actuator}."
    nested = [
        SheetGroup(title=spec.entry.label, fields=_rows(spec.part, f"{at}{spec.key}."))
        for spec in fields(Actuator).values()
        if spec.part is not None and spec.entry is not None
    ]
    return (
        SheetGroup(title="Site", fields=_rows(Project, "", ("format", "machine")) + _rows(Site, "site.")),
        SheetGroup(title="Machine", fields=_rows(Machine, f"machine.{machine}.", ("actuator",))),
        SheetGroup(title="Actuator", fields=_rows(Actuator, at)),
        *nested,
        SheetGroup(title="Compressor", fields=_rows(Compressor, "plant.compressor.1.")),
        SheetGroup(title="Money", fields=_rows(Money, "money.")),
    )
