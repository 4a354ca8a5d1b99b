"""What a cylinder of each kind cannot have and what a single-acting one needs, for checks and schema."""

from __future__ import annotations

from typing import Any

from actuator.parts import Spring
from actuator.parts.actuator import SPRING_KINDS
from actuator.project.fields import fields

SINGLE_ACTING = "3/2"
"""The function of a single-acting cylinder's valve."""

_ONE_PORT = "takes air on one side only"
REFUSED: dict[str, tuple[tuple[str, str], ...]] = {
    "rodless": tuple(
        (key, "has no rod")
        for key in (
            "rod", "rod_end", "mounting", "closed_length", "side_load", "bearing_length", "require.buckling_safety",
        )
    ),
    "spring-return": (("return_pressure", "is returned by its spring"), ("dead_volume_rod", _ONE_PORT)),
    "spring-extend": (("return_pressure", "is driven out by its spring"), ("dead_volume_cap", _ONE_PORT)),
}  # fmt: skip
"""By kind, fields that a cylinder of that kind cannot have, and why."""


def rules_by_kind() -> list[dict[str, Any]]:
    """Clauses of the JSON Schema of an actuator."""

    def of_kind(*kinds: str) -> dict[str, Any]:
        return {"properties": {"kind": {"enum": list(kinds)}}, "required": ["kind"]}

    def without(key: str) -> dict[str, Any]:
        part, _, last = key.rpartition(".")
        rule: dict[str, Any] = {"not": {"required": [last]}}
        return {"properties": {part: rule}} if part else rule

    spring = {"required": list(fields(Spring))}
    return [
        *(
            {"if": of_kind(kind), "then": {"allOf": [without(key) for key, _ in keys]}}
            for kind, keys in REFUSED.items()
        ),
        {"if": of_kind("rodless"), "else": {"required": ["rod"]}},
        {
            "if": of_kind(*SPRING_KINDS),
            "then": {
                "properties": {"spring": spring, "valve": {"properties": {"function": {"const": SINGLE_ACTING}}}},
                "required": ["spring"],
            },
            "else": {
                "properties": {
                    "spring": {"maxProperties": 0},
                    "valve": {"properties": {"function": {"not": {"const": SINGLE_ACTING}}}},
                }
            },
        },
    ]
