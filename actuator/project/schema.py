"""What a document may hold, as a form and as JSON Schema.

Both are made from the parts' own declarations, as file and ``--set`` are, so they cannot drift.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache
from typing import Any

from actuator.kinds import FieldSpec, Kind
from actuator.parts import Actuator, Compressor, Machine, Money, Project, Site, Valve
from actuator.project.fields import ALTERNATES, FAMILIES, FLAG_WORDS, FORMAT, PROCESS_FORCE, ROOT, fields
from actuator.project.kind_rules import rules_by_kind
from actuator.unit_table import DIMENSIONS


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
                choices=FLAG_WORDS if spec.is_flag else spec.choices,
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
    if spec.is_flag:
        return FLAG_WORDS[spec.default]
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


def json_schema() -> dict[str, Any]:
    """JSON Schema (draft 2020-12) of the document.

    Returns
    -------
    dict
        Says which keys there are, which are needed, which words and numbers they take; whether the text of
        a quantity can be read is for :func:`~actuator.project.validate.validate` to say.
    """
    return {
        "$schema": "https://json-schema.org/draft/2020-12/schema",
        "title": f"Pneumatic actuator document, format {FORMAT}",
        **_object(ROOT),
    }


def _object(part: Any) -> dict[str, Any]:
    """Schema of one table."""
    known = fields(part)
    needed = [key for key, spec in known.items() if _is_needed(part, key, spec)]
    made: dict[str, Any] = {
        "type": "object",
        "properties": {key: _property(spec) for key, spec in known.items()},
        "required": needed,
        "additionalProperties": False,
    }
    if part is Valve:
        made["allOf"] = [_one_of_family(family) for family in FAMILIES]
    if part is Actuator:
        made["allOf"] = rules_by_kind()
    return made


def _is_needed(part: Any, key: str, spec: FieldSpec) -> bool:
    """Whether the table does not check without the key."""
    if part is Valve and key == "supply_c":
        return False
    if part is Actuator and spec.part is not None:
        return key in ("load", "valve")
    return spec.required or key in ("machine", "actuator")


def _one_of_family(family: str) -> dict[str, Any]:
    """Exactly one way to state the supply path, at most one for the exhaust path."""
    keys = [f"{family}_c", *(f"{family}_{way.suffix}" for way in ALTERNATES)]
    ways: list[dict[str, Any]] = [{"required": [key]} for key in keys]
    if family == "exhaust":
        ways.append({"not": {"anyOf": [{"required": [key]} for key in keys]}})
    return {"oneOf": ways}


def _property(spec: FieldSpec) -> dict[str, Any]:
    """Schema of one key."""
    entry = spec.entry
    assert entry is not None
    default = default_text(spec)
    about: dict[str, Any] = {
        "title": entry.label,
        "description": entry.help + (f" Left out: {default}." if default else ""),
    }
    if spec.key == "format":
        return {**about, "const": FORMAT}
    if spec.part is not None and spec.is_list:
        least = {} if spec.key == "process_force" else {"minItems": 1}
        most = {"maxItems": 1} if spec.key == "compressor" else {}
        return {**about, "type": "array", "items": _object(spec.part), **least, **most}
    if spec.part is not None:
        return {**about, **_object(spec.part)}
    if spec.is_flag:
        return {**about, "type": "boolean"}
    if spec.choices:
        return {**about, "enum": list(spec.choices)}
    if spec.kind is None:
        return {**about, "type": "string", "examples": [entry.example.strip('"')]}
    return {**about, **_quantity(spec.kind, entry.example)}


def _quantity(kind: Kind, example: str) -> dict[str, Any]:
    """Schema of a quantity: text, or a plain number where the dimension is 1."""
    dimension = DIMENSIONS[kind.dimension]
    made: dict[str, Any] = {"type": "string", "pattern": r"^\s*[-+\u2212]?\.?[0-9]"}
    if dimension.bare:
        made["type"] = ["integer" if kind.dimension == "count" else "number", "string"]
        limits = {
            "exclusiveMinimum": kind.above,
            "minimum": kind.at_least,
            "exclusiveMaximum": kind.below,
            "maximum": kind.at_most,
        }
        made |= {key: value for key, value in limits.items() if value is not None}
    return {**made, "examples": [example or dimension.example]}
