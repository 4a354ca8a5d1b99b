"""The document's fields that enter a figure: label, value, and where the value comes from."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from typing import Any

from actuator.answer import Answer
from actuator.kinds import FieldSpec, fields_of
from actuator.parts import Project
from actuator.project.fields import ALTERNATES, FAMILIES, FLAG_WORDS, assumption
from actuator.project.schema import default_text
from actuator.report.shown import Shown


@dataclass(frozen=True, slots=True, kw_only=True)
class FieldValue:
    """One field of the document as it enters a figure."""

    label: str
    path: str
    """Path in the document, with 1-based numbers."""
    value: str
    origin: str
    """``"typed"`` or ``"default: ..."``."""


def _root(project: Project, path: str, machine: int | None, actuator: int | None) -> tuple[Any, str, str]:
    """Part that a relative path starts at, the document path of that part, and the rest of the path."""
    first, _, rest = path.partition(".")
    if first in ("site", "plant", "money"):
        return getattr(project, first), first, rest
    if machine is None:
        raise LookupError(f"{path} needs a machine")
    if first == "machine":
        return project.machines[machine], f"machine.{machine + 1}", rest
    if actuator is None:
        raise LookupError(f"{path} needs an actuator")
    part = project.machines[machine].actuators[actuator]
    return part, f"machine.{machine + 1}.actuator.{actuator + 1}", path


def _below(part: Any, base: str) -> Iterator[tuple[FieldSpec, Any, str, str]]:
    """All fields of a part and of the parts inside it: specification, value, path, key of the part."""
    for spec in fields_of(part.__class__):
        value, path = getattr(part, spec.name), f"{base}.{spec.key}"
        if spec.entry is None:
            continue
        if spec.part is None:
            yield spec, value, path, base
        elif value is None:
            continue
        elif not spec.is_list:
            yield from _below(value, path)
        else:
            for number, item in enumerate(value, 1):
                yield from _below(item, f"{path}.{number}")


def _descend(part: Any, base: str, rest: str) -> Iterator[tuple[FieldSpec, Any, str, str]]:
    """Fields at the end of a path, which may name a field or a part."""
    if not rest:
        yield from _below(part, base)
        return
    step, _, left = rest.partition(".")
    spec = next(item for item in fields_of(part.__class__) if item.key == step)
    value, path = getattr(part, spec.name), f"{base}.{step}"
    if spec.part is None:
        yield spec, value, path, base
    elif value is None:
        return
    elif not spec.is_list:
        yield from _descend(value, path, left)
    else:
        number, _, left = left.partition(".")
        for index, item in enumerate(value, 1):
            if not number or int(number) == index:
                yield from _descend(item, f"{path}.{index}", left)


def _origin(answer: Answer, spec: FieldSpec, path: str) -> str:
    if answer.document.text(path):
        return "typed"
    if path.rpartition("_")[0].rpartition(".")[2] in FAMILIES:
        for way in ALTERNATES:
            other = f"{path.rpartition('_')[0]}_{way.suffix}"
            typed = answer.document.text(other)
            if typed:
                return f"typed as {other.rpartition('.')[2]} = {typed}. {assumption(way.suffix)}"
    return f"default: {default_text(spec)}".rstrip()


def _value(value: Any, spec: FieldSpec, shown: Shown) -> str:
    if spec.name == "ambient_pressure" and spec.kind is not None:
        return shown.absolute(float(value), spec.kind)
    if spec.kind is not None:
        return shown.text(float(value), spec.kind)
    return FLAG_WORDS[value] if spec.is_flag else str(value)


def field_values(
    answer: Answer, path: str, shown: Shown, *, machine: int | None, actuator: int | None
) -> tuple[FieldValue, ...]:
    """Fields that a relative path of the registry stands for.

    Parameters
    ----------
    answer : Answer
        With a project.
    path : str
        A field (``"bore"``) or a part (``"load"``), relative to the actuator; ``machine.``, ``site.``,
        ``plant.`` and ``money.`` in front say otherwise.
    shown : Shown
        Units of the reader.
    machine, actuator : int or None
        0-based place. [1]

    Returns
    -------
    tuple of FieldValue
        Without the optional fields that are left out and have no default.

    Raises
    ------
    LookupError
        Where the path needs a machine or an actuator and none is given.
    """
    if answer.project is None:
        raise LookupError("the document has problems")
    part, base, rest = _root(answer.project, path, machine, actuator)
    return tuple(
        FieldValue(
            label=spec.entry.label if spec.entry is not None else spec.key,
            path=place,
            value=_value(value, spec, shown),
            origin=_origin(answer, spec, place),
        )
        for spec, value, place, _ in _descend(part, base, rest)
        if value is not None
    )
