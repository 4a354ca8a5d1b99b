"""What to say of a quantity that cannot be read: what is wrong, and what to write instead."""

from __future__ import annotations

import difflib
import re
from collections.abc import Callable

from actuator.air.states import STATES
from actuator.errors import ActuatorError
from actuator.kinds import Kind
from actuator.unit_table import ABSOLUTE, DIMENSIONS, GAUGE, INTAKE, Dimension

LONGEST = 100
"""Characters of a quantity; longer text is refused before any arithmetic."""

_NO_NUMBER = re.compile(r"\s*[+-]?(nan|inf|infinity)\b", re.IGNORECASE)


class UnitFault(ActuatorError, ValueError):
    """A quantity that cannot be read; the text says what to write instead."""


def explain_unit(text: str, end: int, kind: Kind, currency: str) -> str:
    """Say why ``text``, whose number ends at ``end``, is no quantity of this kind."""
    dimension = DIMENSIONS[kind.dimension]
    example = f'e.g. "{dimension.example}"'
    number, unit = text[:end].strip(), " ".join(text[end:].split())
    if not text.strip():
        return f"is empty; write {dimension.name}, {example}"
    if len(text) > LONGEST:
        return f"is too long; write {dimension.name}, {example}"
    if _NO_NUMBER.match(text):
        return f"must be a finite number, {example}"
    if "," in text:
        mended = text.strip().replace(",", ".", 1)
        grouped = text.strip().replace(",", "")
        return (
            f'has a comma; write a decimal point, "{mended}", or no separator at thousands, "{grouped}"'
            if text.count(",") == 1
            else f'has commas; write a decimal point and no separator at thousands, "{grouped}"'
        )
    if not number:
        return f"must start with a number, {example}"
    if not unit and not dimension.reference:
        return f"needs a unit: {', '.join(_names(dimension))}; {example}"
    return _explain_word(number, unit, dimension, currency) or _explain_form(unit, kind.dimension, example)


def _names(dimension: Dimension) -> list[str]:
    """Unit texts worth naming in a message."""
    return [name for name in dict.fromkeys((*dimension.si, *dimension.us)) if name]


def _explain_word(number: str, unit: str, dimension: Dimension, currency: str) -> str:
    """A missing, doubtful or misplaced reference word or currency; else empty."""
    packed = "".join(unit.split())
    if dimension.money:
        code = re.match(r"[A-Za-z]{3}(?=/)", packed)
        if code and code[0] != currency:
            return f'prices are in {currency} here (money.currency), e.g. "{number} {currency}{packed[3:]}"'
    if dimension.reference == "pressure":
        if packed in dimension.forms or not packed:
            unit = unit or "bar"
            return f'say gauge or absolute: "{number} {unit} gauge" or "{number} {unit} absolute"'
    elif dimension.reference in ("free", "intake"):
        return _explain_state(number, packed, dimension)
    elif dimension.forms.get("bar") == "bar":
        for word in (*GAUGE, *ABSOLUTE):
            if packed.endswith(word) and packed[: -len(word)] in dimension.forms:
                return f'a difference is neither gauge nor absolute: "{number} {packed[: -len(word)]}"'
    return ""


def _explain_state(number: str, packed: str, dimension: Dimension) -> str:
    """Free air without its state, or with a state that does not belong here."""
    intake = dimension.reference == "intake"
    for word in (*STATES, INTAKE):
        bare = packed.replace("(", "").replace(")", "").removesuffix(word)
        if bare != packed and bare in dimension.forms:
            if intake:
                return f'is counted at the compressor\'s own intake: "{number} {bare} FAD"'
            return (
                f"FAD is the state at one compressor's own intake; name a fixed state: "
                f'"{number} {bare} ANR" or "{number} {bare} ISO1217"'
            )
    if packed in dimension.forms or not packed:
        unit = packed or next(iter(dimension.forms))
        if intake:
            return f'say that it is counted at the intake: "{number} {unit} FAD"'
        return (
            f'say at which state the air is counted: "{number} {unit} ANR" ({STATES["ANR"].meaning}) or '
            f'"{number} {unit} DIN1343" ({STATES["DIN1343"].meaning})'
        )
    bare = packed[1:]
    for prefix, one, other in (
        ("s", "SCFM-14.5-68F-dry", "SCFM-14.696-60F-dry"),
        ("S", "SCFM-14.5-68F-dry", "SCFM-14.696-60F-dry"),
        ("N", "DIN1343", "ANR"),
        ("n", "DIN1343", "ANR"),
    ):
        if packed.startswith(prefix) and bare in dimension.forms:
            return (
                f'"{packed}" has more than one meaning: "{number} {bare} {one}" ({STATES[one].meaning}) or '
                f'"{number} {bare} {other}" ({STATES[other].meaning})'
            )
    return ""


def _explain_form(unit: str, name: str, example: str) -> str:
    """A unit that is not in the table of this dimension."""
    dimension = DIMENSIONS[name]
    packed = "".join(unit.split())
    names = _names(dimension)
    if not names or names == ["%"]:
        return f'unit "{unit}" does not belong here: write {dimension.name}, {example}'
    near = difflib.get_close_matches(packed.lower(), {form.lower(): form for form in dimension.forms}, 1, 0.8)
    close = next((form for form in dimension.forms if near and form.lower() == near[0]), "")
    hint = f'did you mean "{close}"? ' if close else ""
    return f'unit "{unit}" is not known for {dimension.name}; {hint}write {", ".join(names)}; {example}'


def explain_range(kind: Kind, value: float, limit_text: Callable[[float], str]) -> str:
    """Say which limit of the kind a value breaks, in the unit that was typed."""
    if kind.dimension == "pressure":
        return f"is below vacuum: must be above {limit_text(0.0)}"
    if kind.dimension == "temperature":
        return f"is below absolute zero: must be above {limit_text(0.0)}"
    if kind.above is not None and not value > kind.above:
        return f"must be above {limit_text(kind.above)}"
    if kind.at_least is not None and not value >= kind.at_least:
        return f"must be at least {limit_text(kind.at_least)}"
    if kind.below is not None and not value < kind.below:
        return f"must be below {limit_text(kind.below)}"
    assert kind.at_most is not None
    return f"must be at most {limit_text(kind.at_most)}"


def explain_share(text: str, value: float) -> str:
    """Say how to write a bare number above 1 where a share is expected."""
    return f'is a share above 1: write "{text} %" or "{value * 100.0:g} %"'
