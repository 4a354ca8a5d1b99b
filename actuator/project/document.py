"""The document as typed: its text, and the edits on top of it."""

from __future__ import annotations

import re
import tomllib
from collections.abc import Mapping
from dataclasses import dataclass, field, replace
from functools import cached_property
from importlib import resources
from pathlib import Path
from types import MappingProxyType
from typing import Any

from actuator.errors import InputError, Problem
from actuator.project import paths
from actuator.project.fields import find
from actuator.project.files import write_text
from actuator.project.paths import Steps, refuse, steps_of
from actuator.project.template import start
from actuator.unit_table import System

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


@dataclass(frozen=True)
class Document:
    """A document and what was changed in it; a change gives another one.

    Attributes
    ----------
    path : Path or None
        Where it was read from or saved to; None for one that has no file.
    source : str
        TOML text as read.
    edits : Mapping of str to str
        Typed text by numbered path, in the order typed; empty text leaves the key out.
    """

    path: Path | None
    source: str
    edits: Mapping[str, str] = field(default_factory=lambda: MappingProxyType({}))
    _read: tuple[dict[str, Any], Problem | None] | None = field(default=None, repr=False, compare=False)

    @cached_property
    def _base(self) -> tuple[dict[str, Any], Problem | None]:
        return self._read if self._read is not None else _parsed(self.source)

    @property
    def broken(self) -> Problem | None:
        """What keeps the source from being TOML, with its line; None where it is."""
        return self._base[1]

    @cached_property
    def _tree(self) -> dict[str, Any]:
        tree = self._base[0]
        for path, text in self.edits.items():
            tree = _put(tree, steps_of(path), text, path)
        return tree

    def tree(self) -> dict[str, Any]:
        """Plain nested dicts, lists, texts and numbers with the edits applied; not to be changed."""
        return self._tree

    def edited(self, path: str, text: str) -> Document:
        """The document with one field's text replaced.

        Parameters
        ----------
        path : str
            Numbers or names, see :func:`~actuator.project.paths.canonical`.
        text : str
            As typed in a form: a number alone becomes a TOML number, a list or inline table TOML, all else a
            string. Empty text leaves the key out.

        Returns
        -------
        Document

        Raises
        ------
        InputError
            Where the path leads nowhere, or the source is not TOML.
        """
        if self.broken is not None:
            raise InputError(self.broken)
        at = paths.canonical(path, self._tree)
        text = text.encode("utf-8", "replace").decode() if not text.isascii() else text
        tree = _put(self._tree, steps_of(at), text, at)
        kept = {key: old for key, old in self.edits.items() if key != at and not key.startswith(at + ".")}
        made = replace(self, edits=MappingProxyType({**kept, at: text}), _read=self._base)
        made.__dict__["_tree"] = tree
        return made

    def text(self, path: str) -> str:
        """Typed text of a field as it stands; empty where the key is absent or the path leads nowhere."""
        try:
            at = paths.canonical(path, self._tree)
        except InputError:
            return ""
        if at in self.edits and not any(key.startswith(at + ".") for key in self.edits):
            return self.edits[at]
        here: Any = self._tree
        for step in steps_of(at):
            if isinstance(step, int):
                here = here[step - 1] if isinstance(here, list) and 0 < step <= len(here) else None
            else:
                here = here.get(step) if isinstance(here, dict) else None
        return "" if here is None else told(here)

    def to_toml(self) -> str:
        """TOML text with the edits in place and the comments kept."""
        if not self.edits:
            return self.source
        from actuator.project.rewrite import rewritten

        return rewritten(self.source, self.edits, self._tree)

    def saved(self, path: Path) -> Document:
        """Write the document and give the one that has this file and no edits.

        Raises
        ------
        OSError
            Where the file cannot be written; what stood there still does.
        """
        source = self.to_toml()
        write_text(path, source)
        return Document(path=path, source=source)


def load(path: Path) -> Document:
    """Open a document; text that is no TOML opens too, see :attr:`Document.broken`.

    Raises
    ------
    OSError
        Where the file cannot be read.
    """
    return parse(path.read_bytes().decode("utf-8", "surrogateescape").removeprefix("\ufeff"), path)


def parse(text: str, path: Path | None = None) -> Document:
    """Make a document of TOML text."""
    return Document(path=path, source=text)


def demo() -> Document:
    """The invented demo plant, without a path."""
    return parse(resources.files("catalog_demo").joinpath("demo.toml").read_text(encoding="utf-8"))


def template(system: System) -> str:
    """A commented starting document that checks clean, in SI or US units."""
    return start(system)


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
        pairs = (f"{paths.join((key,))} = {_inline(item)}" for key, item in value.items())
        return "{ " + ", ".join(pairs) + " }" if value else "{}"
    return quoted(value) if isinstance(value, str) else told(value)


def quoted(text: str) -> str:
    """A TOML string with what needs escaping escaped."""
    out = "".join(
        "\\" + sign if sign in '"\\' else f"\\u{ord(sign):04x}" if ord(sign) < 32 or ord(sign) == 127 else sign
        for sign in text
    )
    return f'"{out}"'


def _parsed(source: str) -> tuple[dict[str, Any], Problem | None]:
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


def value_of(steps: Steps, text: str) -> Any:
    """TOML value that typed text stands for at a path."""
    spec = find(steps)
    if spec is not None and (spec.is_text or spec.choices):
        return text
    if _PLAIN_NUMBER.fullmatch(text) and text not in ("-0",):
        return int(text) if re.fullmatch(r"-?[0-9]+", text) else NumberText(text)
    if text.strip()[:1] in ("[", "{") and "\n" not in text.strip():
        read, fault = _parsed(f"value = {text.strip()}\n")
        if fault is None and list(read) == ["value"]:
            return read["value"]
    return text


def _put(tree: Any, steps: Steps, text: str, path: str) -> Any:
    """A copy of the tree along one path, with the value set or, for empty text, left out."""
    return _put_at(tree, steps, 0, value_of(steps, text) if text else None, path)


def _put_at(here: Any, steps: Steps, depth: int, value: Any, path: str) -> Any:
    if depth == len(steps):
        return value
    step = steps[depth]
    whole = paths.join(steps[:depth])
    if isinstance(step, int):
        items = list(here) if isinstance(here, list) else []
        spec = find(steps[:depth])
        may_grow = spec is not None and spec.key in ("process_force", "compressor")
        if here is not None and not isinstance(here, list):
            raise refuse(path, f"{whole} is no list")
        if step > len(items) + (1 if may_grow else 0):
            raise refuse(path, f"there {'is' if len(items) == 1 else 'are'} only {len(items)} of {whole}")
        if step > len(items):
            if value is None:
                return here
            items.append(None)
        items[step - 1] = _put_at(items[step - 1], steps, depth + 1, value, path)
        return [item for item in items if item is not None]
    if here is not None and not isinstance(here, dict):
        raise refuse(path, f"{whole} holds a value, not a table")
    table = dict(here) if here is not None else {}
    if value is None and (step not in table or depth == len(steps) - 1):
        table.pop(step, None)
        return table if here is not None else None
    table[step] = _put_at(table.get(step), steps, depth + 1, value, path)
    return table
