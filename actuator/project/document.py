"""The document as typed: its text, and the edits on top of it."""

from __future__ import annotations

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
from actuator.project.values import parsed, told, value_of
from actuator.unit_table import System


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
        return self._read if self._read is not None else parsed(self.source)

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
