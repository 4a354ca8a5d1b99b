"""The sheet: every entry of the document that concerns one actuator, in groups."""

from __future__ import annotations

from collections.abc import Mapping
from typing import TYPE_CHECKING

from textual import events
from textual.app import ComposeResult
from textual.containers import Vertical, VerticalScroll
from textual.lazy import Lazy
from textual.widgets import Static

from actuator.errors import Problem
from actuator.project.schema import SheetField, SheetGroup, sheet
from tui.widgets.field import Field

if TYPE_CHECKING:
    from tui.session import Session

LAST = ("Site", "Compressor", "Money")
"""Groups that are edited least; all others stand before them, the machine first."""
AT_ONCE = 2
"""Groups that are built before the first paint. [1]"""
LABELS = 22
"""Cells that a label has at most. [1]"""


def groups_of(machine: int, actuator: int) -> list[SheetGroup]:
    """Groups of one actuator (numbers from 1) in the sheet's order."""
    groups = sheet(machine, actuator)
    return sorted(groups, key=lambda group: (group.title in LAST, group.title != "Machine"))


class Group(Vertical):
    """A heading and its fields."""

    DEFAULT_CSS = "Group { height: auto; }"

    def __init__(self, group: SheetGroup, session: Session) -> None:
        super().__init__()
        self._group = group
        self._session = session

    def compose(self) -> ComposeResult:
        """One widget a field."""
        yield Static(self._group.title, classes="heading", markup=False)
        for spec in self._group.fields:
            yield Field(spec, self._session.text(spec.path))


class Rest(Vertical):
    """Groups below the first screen."""

    DEFAULT_CSS = "Rest { height: auto; }"


class Sheet(VerticalScroll, can_focus=False):
    """All fields; it holds no text of its own, it shows the session's."""

    def __init__(self, session: Session, place: tuple[int, int], *, id: str | None = None) -> None:
        super().__init__(id=id)
        self._session = session
        self._place = place
        self._problems: tuple[Problem, ...] = ()
        self._fields: list[Field] = []
        self.every = False

    def compose(self) -> ComposeResult:
        """The first groups now, the others right after the first paint."""
        groups = [Group(group, self._session) for group in groups_of(*self._place)]
        yield from groups[:AT_ONCE]
        yield Lazy(Rest(*groups[AT_ONCE:]))

    def on_resize(self, event: events.Resize) -> None:
        """Give labels their room, texts the rest."""
        for field in self.fields():
            field.label_width = self.label_width(event.size.width)

    def label_width(self, width: int) -> int:
        """Cells for labels in a sheet of that width. [1]"""
        return max(12, min(LABELS, width - 19))

    def fields(self) -> list[Field]:
        """All fields that are built."""
        return self._fields or list(self.query(Field))

    def field(self, path: str) -> Field | None:
        """The field of a path, where this actuator's sheet has it."""
        return next((field for field in self.fields() if field.spec.path == path), None)

    def show(self, session: Session, place: tuple[int, int]) -> None:
        """Show the session's texts; another actuator takes over the same rows."""
        self._session = session
        if place != self._place:
            self._place = place
            self._readdress()
        else:
            for field in self.fields():
                field.put(session.text(field.spec.path))
        self._alternates()

    def _readdress(self) -> None:
        """Let every row stand for the same entry of the other actuator."""
        specs: dict[str, SheetField] = {}
        for group in groups_of(*self._place):
            specs |= {_shape(spec.path): spec for spec in group.fields}
        for field in self.fields():
            spec = specs[_shape(field.spec.path)]
            if spec is not field.spec:
                field.address(spec, self._session.text(spec.path))
        self.mark(self._problems)

    def mark(self, problems: tuple[Problem, ...]) -> None:
        """Put each problem beside its field, or the field it belongs to; take away those that are gone."""
        self._problems = problems
        fields = {field.spec.path: field for field in self.fields()}
        texts: dict[str, str] = {}
        for problem in problems:
            path = problem.path
            while path and path not in fields:
                path = path.rpartition(".")[0]
            texts.setdefault(path, problem.allowed)
        for path, field in fields.items():
            field.problem = texts.get(path, "")
        self._alternates()

    def hint(self, values: Mapping[str, str]) -> None:
        """Show in grey, where a field is left out, the value that holds."""
        for field in self.fields():
            field.hint(values.get(field.spec.path, ""))

    def turn_every(self) -> bool:
        """Show all ways to state a value, or the usual ones; whether it is all."""
        self.every = not self.every
        self._alternates()
        return self.every

    def complete(self) -> None:
        """Catch up after the later groups are built."""
        self._fields = list(self.query(Field))
        for field in self._fields:
            field.label_width = self.label_width(self.size.width)
        self.show(self._session, self._place)
        self.mark(self._problems)

    def _alternates(self) -> None:
        """Hide other ways to state a value, unless one is used, or the usual one is missing."""
        usual = {field.spec.path: field for field in self.fields()}
        others = [field for field in usual.values() if field.spec.instead_of in usual]
        used = {field.spec.instead_of for field in others if field.value}
        for field in others:
            first = usual[field.spec.instead_of]
            missing = first.spec.required and not first.value and field.spec.instead_of not in used
            field.display = self.every or missing or bool(field.value or field.problem or field.has_focus)


def _shape(path: str) -> str:
    """A path without its numbers."""
    return ".".join(step for step in path.split(".") if not step.isdigit())
