"""Checks of a document by the kind of its cylinder: what it cannot have, what a single-acting one needs."""

from __future__ import annotations

from typing import Any

from actuator.parts import Actuator, Spring
from actuator.parts.actuator import SPRING_KINDS
from actuator.project.fields import fields
from actuator.project.kind_rules import REFUSED, SINGLE_ACTING
from actuator.project.paths import Steps
from actuator.project.walk import Values, Walk


def refuse(walk: Walk, steps: Steps, kind: str, values: Values) -> None:
    """Name every field that a cylinder of this kind cannot have."""
    for key, why in REFUSED.get(kind, ()):
        place = (*steps, *key.split("."))
        if walk.at(place) is not None:
            walk.problem(place, walk.at(place), f"leave it out: a {kind} cylinder {why}")
            values.pop(key, None)
    given = values.get("spring") or {}
    if kind not in SPRING_KINDS:
        for key in given if isinstance(given, dict) else ("",):
            place = (*steps, "spring", key) if key else (*steps, "spring")
            walk.problem(place, walk.at(place), f"leave it out: a {kind} cylinder has no spring")


def spring(walk: Walk, steps: Steps, here: Any, kind: str) -> Spring | None:
    """The spring of a single-acting cylinder; None for other kinds."""
    if kind not in SPRING_KINDS:
        return None
    before = len(walk.problems)
    values = walk.table(Spring, steps, here)
    if values is None:
        return None
    for key, spec in fields(Spring).items():
        if spec.name not in values and (*steps, key) not in walk.bad:
            assert spec.entry is not None
            walk.problem((*steps, key), None, f'is needed with kind = "{kind}": {key} = "{spec.entry.example}"')
    if len(walk.problems) > before:
        return None
    made: Spring | None = walk.built(Spring, steps, values)
    return made


def valve_function(walk: Walk, steps: Steps, kind: str, values: Values) -> None:
    """A single-acting cylinder has a 3/2 valve, others never."""
    single, given = kind in SPRING_KINDS, values.get("function")
    if single:
        values.setdefault("function", SINGLE_ACTING)
    if given is None or (given == SINGLE_ACTING) == single:
        return
    at = (*steps, "function")
    if single:
        walk.problem(at, given, f'must be "{SINGLE_ACTING}" with kind = "{kind}"')
    else:
        walk.problem(at, given, f'is for single-acting cylinders; with kind = "{kind}" write e.g. "5/2 spring"')


def rod(walk: Walk, steps: Steps, kind: str, values: Values) -> None:
    """A rod that is thicker than nothing and fits into the bore; none in a rodless cylinder."""
    if kind == "rodless":
        values["rod"] = 0.0
        return
    at, bore, diameter = (*steps, "rod"), values.get("bore"), values.get("rod")
    if diameter is None and at not in walk.bad:
        entry = fields(Actuator)["rod"].entry
        assert entry is not None
        walk.problem(at, None, f'is needed: {entry.help} Write rod = "{entry.example}"')
    elif diameter is not None and diameter <= 0.0:
        walk.problem(at, walk.at(at), "must be above 0 mm")
    elif bore is not None and diameter is not None and diameter >= bore:
        said = walk.said((*steps, "bore"), bore, fields(Actuator)["bore"])
        walk.problem(at, walk.at(at), f"must be below the bore, {said}")
