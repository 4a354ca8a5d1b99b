"""Every key that a document may hold, from the parts' own declarations."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, replace
from functools import cache
from typing import Any

from actuator import kinds
from actuator.kinds import Entry, FieldSpec, Kind, fields_of
from actuator.parts import Project, Valve

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
        help="US flow coefficient, in place of C: equal air flow at small pressure drop; printed rules differ by 5 %.",
        example="0.5",
    ),
    Alternate(
        suffix="kv",
        kind=kinds.kind_of(kinds.PositiveNumber),
        label="Kv",
        help="Flow coefficient in m3/h, in place of C: equal air flow at small pressure drop; rules differ by 5 %.",
        example="0.43",
    ),
    Alternate(
        suffix="qn",
        kind=replace(kinds.kind_of(kinds.FlowANR), at_least=None, above=0.0),
        label="nominal flow",
        help="Flow from 6 to 5 bar gauge at 20 degC, in place of C: by ISO 6358 with m = 0.5.",
        example="500 L/min ANR",
    ),
    Alternate(
        suffix="s",
        kind=kinds.kind_of(kinds.Area),
        label="effective area",
        help="Effective area S, in place of C: throat of an ideal nozzle that chokes at the same flow, 20 degC.",
        example="10 mm2",
    ),
)
PROCESS_FORCE = '[{ from = "380 mm", to = "400 mm", force = "300 N" }]'
"""How the list of process forces is typed."""
FLAG_WORDS = ("false", "true")
"""How yes and no are typed; TOML takes them without quotes."""
FAMILIES = ("supply", "exhaust")
"""Paths of a valve that have alternates: ``supply_c``, ``supply_cv``, ..."""


def assumption(suffix: str) -> str:
    """What the conversion of an alternate (``"cv"``, ``"kv"``, ``"qn"``, ``"s"``) to C rests on, in words."""
    from actuator.flow import conversion

    if suffix in ("cv", "kv"):
        return conversion.ASSUMPTION_KV
    return conversion.ASSUMPTION_NOMINAL if suffix == "qn" else conversion.ASSUMPTION_AREA


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
