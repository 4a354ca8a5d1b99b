"""Edits put into TOML text with its comments kept; tomlkit is imported here only."""

from __future__ import annotations

import tomllib
from collections.abc import Mapping
from typing import Any

import tomlkit
from tomlkit.exceptions import TOMLKitError
from tomlkit.items import AoT, InlineTable

from actuator.project.fields import find
from actuator.project.paths import Steps, steps_of
from actuator.project.values import NumberText, value_of


def rewritten(source: str, edits: Mapping[str, str], tree: Mapping[str, Any]) -> str:
    """TOML text of ``source`` with ``edits`` in place.

    Parameters
    ----------
    source : str
        Valid TOML.
    edits : Mapping of str to str
        Typed text by numbered path.
    tree : mapping
        What the text has to mean in the end; where tomlkit's text means anything else, the tree itself is
        written, so that no value is ever lost for the sake of a comment.

    Returns
    -------
    str
    """
    try:
        kept = tomlkit.parse(source)
        for path, text in edits.items():
            _set(kept, steps_of(path), text)
        written = kept.as_string()
        if _filled(tomllib.loads(written)) == _filled(tree):
            return written
    except (TOMLKitError, ValueError, KeyError, IndexError, TypeError, AttributeError):
        pass
    return tomlkit.dumps(_plain(tree))


def _filled(value: Any) -> Any:
    """A tree without its empty tables, which mean the same as none."""
    if isinstance(value, list):
        return [_filled(item) for item in value]
    if not isinstance(value, Mapping):
        return value
    inside = {key: _filled(item) for key, item in value.items()}
    return {key: item for key, item in inside.items() if item != {}}


def _plain(value: Any) -> Any:
    """Tree that tomlkit can write: numbers as typed."""
    if isinstance(value, Mapping):
        return {key: _plain(item) for key, item in value.items()}
    if isinstance(value, list):
        return [_plain(item) for item in value]
    return tomlkit.value(value.text) if isinstance(value, NumberText) else value


def _set(here: Any, steps: Steps, text: str) -> None:
    """Set or leave out one key in tomlkit's document."""
    for depth, step in enumerate(steps[:-1]):
        if isinstance(step, int):
            if step > len(here):
                here.append(tomlkit.table() if isinstance(here, AoT) else tomlkit.inline_table())
            here = here[step - 1]
            continue
        if step not in here:
            if not text:
                return
            here[step] = _empty(steps[: depth + 1], here)
        here = here[step]
    last = steps[-1]
    if not text:
        if not isinstance(last, int) and last in here:
            del here[last]
        return
    value = value_of(steps, text)
    item = tomlkit.value(text.strip()) if isinstance(value, (list, dict)) else _plain(value)
    here[last if not isinstance(last, int) else last - 1] = item


def _empty(steps: Steps, parent: Any) -> Any:
    """Missing table or list of tables in the manner that people write it."""
    spec = find(steps)
    if spec is not None and spec.is_list:
        return tomlkit.aot() if spec.key == "compressor" and not isinstance(parent, InlineTable) else tomlkit.array()
    return tomlkit.inline_table() if isinstance(parent, InlineTable) else tomlkit.table()
