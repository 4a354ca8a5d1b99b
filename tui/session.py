"""What the user is working on: a document, the way back, the way forward. No screen in here."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from actuator.project.document import Document


@dataclass(frozen=True, slots=True, kw_only=True)
class Step:
    """One change that undo takes back: the document on its other side, and the field that it touched."""

    document: Document
    path: str


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class Session:
    """The only state that the screens show; every change gives another session.

    Attributes
    ----------
    document : Document
        As it stands, valid or not.
    past, future : tuple of Step
        What undo and redo go to, latest last.
    saved : Document
        As it stands in its file, or as it was begun where it has none.
    revision : int
        Grows with every change; an answer belongs to one revision. [1]
    open : str
        Path of the field that is being typed in; its keystrokes are one step.
    """

    document: Document
    saved: Document
    past: tuple[Step, ...] = ()
    future: tuple[Step, ...] = ()
    revision: int = 0
    open: str = ""

    @classmethod
    def begun(cls, document: Document, saved: Document | None = None) -> Session:
        """Start on a document; ``saved`` is given where it came back from a draft. Undo then goes to it."""
        if saved is None or saved is document:
            return cls(document=document, saved=document)
        return cls(document=document, saved=saved, past=(Step(document=saved, path=""),))

    def text(self, path: str) -> str:
        """What stands at a path, as typed; empty where it is left out."""
        return self.document.text(path)

    def edited(self, path: str, text: str) -> Session:
        """Put a text at a path; no change where it stands there already."""
        if self.document.text(path) == text:
            return self
        past = self.past if self.open == path else (*self.past, Step(document=self.document, path=path))
        return replace(
            self,
            document=self.document.edited(path, text),
            past=past,
            future=(),
            revision=self.revision + 1,
            open=path,
        )

    def left(self) -> Session:
        """End the step that is being typed: the focus has gone elsewhere."""
        return replace(self, open="") if self.open else self

    def undone(self) -> Session:
        """Go back one step; the same session where there is none."""
        if not self.past:
            return self
        step = self.past[-1]
        return replace(
            self,
            document=step.document,
            past=self.past[:-1],
            future=(*self.future, Step(document=self.document, path=step.path)),
            revision=self.revision + 1,
            open="",
        )

    def redone(self) -> Session:
        """Go forward one step; the same session where there is none."""
        if not self.future:
            return self
        step = self.future[-1]
        return replace(
            self,
            document=step.document,
            past=(*self.past, Step(document=self.document, path=step.path)),
            future=self.future[:-1],
            revision=self.revision + 1,
            open="",
        )

    def kept(self, document: Document) -> Session:
        """Take over the document that was written to its file; the way back stays open."""
        return replace(self, document=document, saved=document, revision=self.revision + 1, open="")

    def at_revision(self, revision: int) -> Session:
        """Count revisions on from another session."""
        return replace(self, revision=revision)

    @property
    def unsaved(self) -> bool:
        """Whether closing would lose something."""
        return self.document != self.saved


@dataclass(frozen=True, slots=True)
class Place:
    """One actuator of the document, numbers from 1; ``actuator`` is 0 where the machine has none."""

    machine: int
    actuator: int
    name: str


def places(document: Document) -> tuple[Place, ...]:
    """All actuators of a document, whatever state it is in; at least one place is given."""
    found = []
    machines = document.tree().get("machine")
    for number, machine in enumerate(machines if isinstance(machines, list) else [], 1):
        if not isinstance(machine, dict):
            continue
        name = _name(machine, f"machine {number}")
        actuators = machine.get("actuator")
        inner = [item for item in actuators if isinstance(item, dict)] if isinstance(actuators, list) else []
        found += [
            Place(number, index, f"{name} / {_name(item, f'actuator {index}')}") for index, item in enumerate(inner, 1)
        ]
        if not inner:
            found.append(Place(number, 0, f"{name} / no actuator"))
    return tuple(found) or (Place(1, 0, "no machine"),)


def _name(item: dict[str, object], otherwise: str) -> str:
    name = item.get("name")
    return name if isinstance(name, str) and name.strip() else otherwise


def title(document: Document) -> str:
    """What the document calls itself, else its file's name."""
    named = document.tree().get("title")
    if isinstance(named, str) and named.strip():
        return named
    return document.path.name if document.path else "Without a title"
