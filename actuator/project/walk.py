"""From the document's tree to values: each key known, each text read, each problem kept."""

from __future__ import annotations

import difflib
from collections.abc import Mapping
from typing import Any

from actuator.errors import InputError, Problem
from actuator.kinds import FieldSpec
from actuator.project import paths
from actuator.project.document import Document
from actuator.project.fields import fields
from actuator.project.limits import beyond
from actuator.project.locate import line_of
from actuator.project.paths import Steps
from actuator.project.values import told
from actuator.unit_table import DIMENSIONS
from actuator.units import Reading, UnitFault, read, show

Values = dict[str, Any]
"""Values of one table by field name; nested tables are dicts too."""


class Walk:
    """One walk over a document; ``problems`` fills on the way."""

    def __init__(self, document: Document) -> None:
        self.document = document
        self.problems: list[Problem] = []
        self.bad: set[Steps] = set()
        self.reading = Reading()

    def problem(self, steps: Steps, given: Any, allowed: str) -> None:
        """Keep the first problem of a path; what stands there is not used further."""
        if steps in self.bad:
            return
        self.bad.add(steps)
        self.problems.append(
            Problem(
                path=paths.join(steps),
                given=_given(given),
                allowed=allowed,
                line=line_of(self.document.source, steps),
            )
        )

    def at(self, steps: Steps) -> Any:
        """What stands at a path; None where nothing does."""
        here: Any = self.document.tree()
        for step in steps:
            if isinstance(step, int):
                here = here[step - 1] if isinstance(here, list) and step <= len(here) else None
            else:
                here = here.get(step) if isinstance(here, dict) else None
        return here

    def said(self, steps: Steps, value: float, spec: FieldSpec) -> str:
        """A value for a message: as typed, or as a default would be."""
        typed = self.at(steps)
        if typed is not None:
            return f'"{told(typed)}"'
        assert spec.kind is not None
        return " ".join(show(value, spec.kind, self.reading)).strip()

    def table(self, part: Any, steps: Steps, here: Any) -> Values | None:
        """Values of a table by field name; None where it is no table.

        Nested tables and lists are left as they stand; absent keys are absent.
        """
        if not isinstance(here, Mapping):
            self.problem(steps, here, f"must be a table: write {_header(steps)} on a line of its own")
            return None
        known = fields(part)
        values: Values = {}
        for key, value in here.items():
            spec = known.get(key)
            if spec is None:
                self.problem((*steps, key), value, _unknown(key, list(known)))
            elif spec.part is not None:
                values[spec.name] = value
            else:
                self.leaf((*steps, key), spec, value, values)
        return values

    def needed(self, part: Any, steps: Steps, values: Values, but: tuple[str, ...] = ()) -> None:
        """Ask for what is missing."""
        for key, spec in fields(part).items():
            if (
                spec.required
                and spec.part is None
                and spec.name not in values
                and key not in but
                and (*steps, key) not in self.bad
            ):
                assert spec.entry is not None
                self.problem((*steps, key), None, f"is needed: {spec.entry.help} Write {_form(spec)}")

    def leaf(self, steps: Steps, spec: FieldSpec, value: Any, values: Values) -> None:
        """Read one value."""
        if isinstance(value, (list, dict)):
            self.problem(steps, value, f"must be one value, not a list or table: {_form(spec)}")
        elif spec.is_text:
            if isinstance(value, str):
                values[spec.name] = value
            else:
                self.problem(steps, value, f'must be text in quotes, "{told(value)}"')
        elif spec.is_flag:
            if isinstance(value, bool):
                values[spec.name] = value
            else:
                self.problem(steps, value, f"must be true or false, without quotes: {_form(spec)}")
        elif spec.choices:
            if value in spec.choices:
                values[spec.name] = value
            else:
                self.problem(steps, value, _choice(value, spec.choices))
        elif isinstance(value, bool) or not isinstance(value, (str, int, float)):
            self.problem(steps, value, f"must be a quantity: {_form(spec)}")
        else:
            assert spec.kind is not None
            typed = value if isinstance(value, str) else told(value).replace("_", "")
            try:
                number = read(typed, spec.kind, self.reading)
            except UnitFault as fault:
                self.problem(steps, value, str(fault))
                return
            fault_text = beyond(number, spec.kind, self.reading)
            if fault_text:
                self.problem(steps, value, fault_text)
                return
            values[spec.name] = int(number) if spec.is_count else number

    def is_gauge(self, value: Any, spec: FieldSpec) -> bool:
        """Whether a typed pressure counts from the ambient one."""
        assert spec.kind is not None
        if not isinstance(value, str):
            return False
        try:
            one, other = (read(value, spec.kind, Reading(ambient_pressure=p)) for p in (1e5, 2e5))
        except UnitFault:
            return False
        return one != other

    def built(self, part: Any, steps: Steps, values: Values) -> Any:
        """The part, or None and its problems told with their place in the document."""
        try:
            return part(**values)
        except InputError as fault:
            for problem in fault.problems:
                at = (*steps, *paths.steps_of(problem.path))
                self.problem(at, self.at(at), problem.allowed)
        return None


def _given(value: Any) -> str:
    """What stands there, verbatim; long lists and tables are cut."""
    if value is None:
        return ""
    text = told(value)
    return text if not isinstance(value, (list, dict)) or len(text) <= 60 else text[:57] + "..."


def _header(steps: Steps) -> str:
    """Header line of a table, or of an item in a list of tables."""
    name = ".".join(step for step in steps if isinstance(step, str))
    return f"[[{name}]]" if isinstance(steps[-1], int) else f"[{name}]"


def _is_bare(spec: FieldSpec) -> bool:
    return spec.kind is not None and spec.kind.dimension in ("number", "count")


def _form(spec: FieldSpec) -> str:
    """How to write a field."""
    if spec.is_flag:
        return f"{spec.key} = true"
    if spec.choices:
        return _choice("", spec.choices)
    example = (spec.entry.example if spec.entry else "").strip('"')
    if spec.kind is not None and not example:
        example = DIMENSIONS[spec.kind.dimension].example
    return f"{spec.key} = {example}" if _is_bare(spec) else f'{spec.key} = "{example}"'


def _choice(value: Any, choices: tuple[str, ...]) -> str:
    near = difflib.get_close_matches(str(value).lower(), choices, 1, 0.6)
    hint = f'; did you mean "{near[0]}"?' if near and len(choices) > 1 else ""
    return "must be one of " + ", ".join(f'"{choice}"' for choice in choices) + hint


def _unknown(key: str, known: list[str]) -> str:
    """Say that a key is not known, with the nearest one."""
    near = difflib.get_close_matches(key.lower(), known, 1, 0.6)
    if near:
        return f'is no key here; did you mean "{near[0]}"?'
    return "is no key here; known are " + ", ".join(known)
