"""TOML values and the text that stands for them in a field."""

from __future__ import annotations

import re
import tomllib
from typing import Any

from actuator.errors import Problem
from actuator.project.fields import FLAG_WORDS, find
from actuator.project.paths import Steps, join

_PLAIN_NUMBER = re.compile(r"-?(?:0|[1-9][0-9]{0,14})(\.[0-9]+)?([eE][+-]?[0-9]{1,3})?")
_AT_LINE = re.compile(r" ?\(at (?:line (\d+), column \d+|end of document)\)")


class NumberText(float):
    """A TOML float that remembers how it was typed."""

    text: str

    def __new__(cls, text: str) -> NumberText:
        """From the digits as they stand in the document."""
        made = super().__new__(cls, text.replace("_", ""))
        made.text = text
        return made


def parsed(source: str) -> tuple[dict[str, Any], Problem | None]:
    """Plain tree of TOML text, or an empty one and what is wrong with the text."""
    try:
        source.encode()
    except UnicodeEncodeError as fault:
        line = source.count("\n", 0, fault.start) + 1
        return {}, Problem(path="document", given="", allowed="must be UTF-8 text", line=line)
    try:
        return tomllib.loads(source, parse_float=NumberText), None
    except RecursionError:
        return {}, Problem(path="document", given="", allowed="is nested too deeply to be read")
    except ValueError as fault:
        place = _AT_LINE.search(str(fault))
        rows = source.split("\n")
        line = 0 if place is None else int(place[1] or len(source.rstrip().split("\n")))
        reason = _AT_LINE.sub("", str(fault))
        given = rows[line - 1].strip()[:80] if 0 < line <= len(rows) else ""
        return {}, Problem(
            path="document",
            given=given,
            allowed=f'is not TOML: {reason}; write key = "value", text in double quotes',
            line=line,
        )


def told(value: Any) -> str:
    """A TOML value as it would be typed in a field; lists and tables as inline TOML."""
    if isinstance(value, str):
        return value
    if isinstance(value, (list, dict)):
        return _inline(value)
    return (
        value.text if isinstance(value, NumberText) else str(value).lower() if isinstance(value, bool) else str(value)
    )


def _inline(value: Any) -> str:
    if isinstance(value, list):
        return "[" + ", ".join(_inline(item) for item in value) + "]"
    if isinstance(value, dict):
        pairs = (f"{join((key,))} = {_inline(item)}" for key, item in value.items())
        return "{ " + ", ".join(pairs) + " }" if value else "{}"
    return quoted(value) if isinstance(value, str) else told(value)


def quoted(text: str) -> str:
    """A TOML string with what needs escaping escaped."""
    out = "".join(
        "\\" + sign if sign in '"\\' else f"\\u{ord(sign):04x}" if ord(sign) < 32 or ord(sign) == 127 else sign
        for sign in text
    )
    return f'"{out}"'


def value_of(steps: Steps, text: str) -> Any:
    """TOML value that typed text stands for at a path."""
    spec = find(steps)
    if spec is not None and (spec.is_text or spec.choices):
        return text
    if spec is not None and spec.is_flag and text in FLAG_WORDS:
        return text == "true"
    if _PLAIN_NUMBER.fullmatch(text) and text not in ("-0",):
        return int(text) if re.fullmatch(r"-?[0-9]+", text) else NumberText(text)
    if text.strip()[:1] in ("[", "{") and "\n" not in text.strip():
        read, fault = parsed(f"value = {text.strip()}\n")
        if fault is None and list(read) == ["value"]:
            return read["value"]
    return text
