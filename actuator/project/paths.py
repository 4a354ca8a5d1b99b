"""Paths into a document: ``machine.1.actuator.Pusher.bore`` and its numbered form."""

from __future__ import annotations

import re
from collections.abc import Mapping
from functools import lru_cache
from typing import Any

from actuator.errors import InputError, Problem
from actuator.project.fields import ROOT, fields

Steps = tuple[str | int, ...]
"""Keys and 1-based numbers, ``("machine", 1, "name")``."""

_BARE = re.compile(r"[A-Za-z0-9_-]+")
_STEP = re.compile(r"""\s*(?:([A-Za-z0-9_-]+)|"((?:[^"\\]|\\.)*)"|'([^']*)')\s*(?:\.|$)""")
_ESCAPE = re.compile(r"\\(.)")


def refuse(path: str, allowed: str) -> InputError:
    """An error about a path itself."""
    return InputError(Problem(path=path, given="", allowed=allowed))


@lru_cache(maxsize=4096)
def split(path: str) -> tuple[tuple[str, bool], ...]:
    """Steps of a path as typed, each with whether it was quoted.

    Raises
    ------
    InputError
        Where the path is not keys, numbers and quoted names joined by dots.
    """
    steps: list[tuple[str, bool]] = []
    place = 0
    while place < len(path):
        match = _STEP.match(path, place)
        if match is None:
            break
        bare, basic, literal = match.groups()
        if bare is not None:
            steps.append((bare, False))
        elif literal is not None:
            steps.append((literal, True))
        else:
            steps.append((_ESCAPE.sub(r"\1", basic), True))
        place = match.end()
    if not steps or place < len(path) or path.rstrip().endswith("."):
        raise refuse(path, 'is no path; write keys, numbers or quoted names with dots between, "machine.1.cycle_time"')
    return tuple(steps)


def join(steps: Steps) -> str:
    """Dotted text of steps; keys that are not bare get quotes."""
    return ".".join(
        str(step)
        if isinstance(step, int) or _BARE.fullmatch(step)
        else '"' + step.replace("\\", "\\\\").replace('"', '\\"') + '"'
        for step in steps
    )


@lru_cache(maxsize=8192)
def steps_of(canonical_path: str) -> Steps:
    """Steps of a path in the numbered form; bare digits are numbers."""
    return tuple(int(text) if not quoted and text.isdigit() else text for text, quoted in split(canonical_path))


def canonical(path: str, tree: Mapping[str, Any]) -> str:
    """Numbered form of a path.

    Parameters
    ----------
    path : str
        Keys with dots between. After ``machine``, ``actuator``, ``compressor`` and ``process_force`` follows
        a 1-based number or a name; where there is only one of them that step may be left out.
    tree : mapping
        The document's plain tree, for names and counts.

    Returns
    -------
    str
        ``machine.1.actuator.2.bore``.

    Raises
    ------
    InputError
        Where the path cannot be read, or a name or number does not exist or is not unique.
    """
    steps = split(path)
    part: Any | None = ROOT
    here: Any = tree
    out: list[str | int] = []
    place = 0
    while place < len(steps):
        text, quoted = steps[place]
        place += 1
        spec = fields(part).get(text) if part is not None else None
        if spec is None and not quoted and text.isdigit() and isinstance(here, list):
            out.append(int(text))
            here = here[int(text) - 1] if 0 < int(text) <= len(here) else None
            continue
        out.append(text)
        here = here.get(text) if isinstance(here, Mapping) else None
        part = spec.part if spec is not None else None
        if spec is not None and spec.is_list and spec.part is not None and place < len(steps):
            number, used = _number(path, join(tuple(out)), here, steps[place], spec.part)
            place += used
            out.append(number)
            here = here[number - 1] if isinstance(here, list) and number <= len(here) else None
    return join(tuple(out))


def _number(path: str, where: str, items: Any, step: tuple[str, bool], part: Any) -> tuple[int, int]:
    """Number of the item that a step names, and how many steps that used."""
    items = items if isinstance(items, list) else []
    text, quoted = step
    if not quoted and text.isdigit():
        if len(text) > 6 or int(text) < 1:
            raise refuse(path, f"numbers count from 1; there are {len(items)} of {where}")
        return int(text), 1
    if len(items) <= 1 and not quoted and text in fields(part):
        return 1, 0
    named = [number for number, item in enumerate(items, 1) if isinstance(item, Mapping) and item.get("name") == text]
    if len(named) == 1:
        return named[0], 1
    names = ", ".join(
        f'{number} "{item.get("name", "")}"' if isinstance(item, Mapping) else str(number)
        for number, item in enumerate(items, 1)
    )
    if named:
        raise refuse(path, f'more than one of {where} has the name "{text}"; write a number: {names}')
    if len(items) <= 1 and not quoted:
        return 1, 0
    raise refuse(path, f"say which of {where} by number or name: {names or 'there is none'}")
