"""The two lines at the top: the document with its workspaces, and the actuator with its state."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

from rich.segment import Segment
from rich.style import Style
from textual import events
from textual.message import Message
from textual.strip import Strip
from textual.widget import Widget

from tui.session import title

if TYPE_CHECKING:
    from tui.session import Session


class Head(Widget):
    """Title of the document, its file, whether it is saved; the workspaces to the right."""

    DEFAULT_CSS = """
    Head { height: 1; background: $panel; }
    """

    @dataclass
    class Go(Message):
        """A workspace was clicked."""

        key: str

    def __init__(self, workspaces: dict[str, str], *, id: str | None = None) -> None:
        super().__init__(id=id)
        self._workspaces = workspaces
        self._current = ""
        self._left, self._mark = "", ""
        self._spans: list[tuple[int, int, str]] = []

    def show(self, session: Session) -> None:
        """Show which document this is."""
        path = session.document.path
        name = path.name if path else "not yet a file"
        text = f" {title(session.document)} ({name})"
        mark = " * unsaved" if session.unsaved else ""
        if (text, mark) != (self._left, self._mark):
            self._left, self._mark = text, mark
            self.refresh()

    def choose(self, key: str) -> None:
        """Mark the workspace that is seen."""
        self._current = key
        self.refresh()

    def render_line(self, y: int) -> Strip:  # noqa: ARG002
        """Left and right part; the title gives way."""
        plain, bold = self.rich_style, Style(bold=True)
        tabs: list[tuple[str, str]] = [
            (f"[{name}]" if key == self._current else f" {name} ", key) for key, name in self._workspaces.items()
        ]
        taken = sum(len(text) for text, _ in tabs)
        room = max(self.size.width - taken - 1, 0)
        rest = max(room - len(self._mark), 0)
        left = self._left if len(self._left) <= rest else self._left[: max(rest - 1, 0)] + "…"
        segments = [Segment((left + self._mark)[:room].ljust(room + 1), plain + bold)]
        self._spans, x = [], room + 1
        for text, key in tabs:
            style = plain + Style(reverse=True, bold=True) if key == self._current else plain
            segments.append(Segment(text, style))
            self._spans.append((x, x + len(text), key))
            x += len(text)
        return Strip(segments).adjust_cell_length(self.size.width, plain)

    def on_click(self, event: events.Click) -> None:
        """Go to the workspace under the mouse."""
        for start, end, key in self._spans:
            if start <= event.x < end:
                self.post_message(self.Go(key))


class Chooser(Widget):
    """The actuator that is looked at, and whether its figures are up to date."""

    DEFAULT_CSS = """
    Chooser { height: 1; background: $surface; }
    """

    @dataclass
    class Step(Message):
        """The actuator before (-1) or after (1), or the list of all (0)."""

        by: int

    def __init__(self, *, id: str | None = None) -> None:
        super().__init__(id=id)
        self._actuator, self._state, self._sound = "", "", True
        self._index, self._count = 0, 1

    def show(self, name: str, index: int, count: int) -> None:
        """Show which of all actuators it is (``index`` from 0)."""
        if (name, index, count) != (self._actuator, self._index, self._count):
            self._actuator, self._index, self._count = name, index, count
            self.refresh()

    def say(self, state: str, sound: bool) -> None:
        """Show the state of the figures."""
        if (state, sound) != (self._state, self._sound):
            self._state, self._sound = state, sound
            self.refresh()

    def work(self) -> None:
        """Show that an answer is on its way."""
        if self._sound:
            self.say("working …", True)

    def _left(self) -> str:
        if self._count == 1:
            return f" {self._actuator}"
        return f" ◂ {self._actuator} ▸ {self._index + 1} of {self._count}"

    def render_line(self, y: int) -> Strip:  # noqa: ARG002
        """Name to the left, state to the right."""
        plain = self.rich_style
        state = f" {self._state} "
        room = max(self.size.width - len(state), 0)
        left = self._left()
        left = left if len(left) <= room else left[: max(room - 1, 0)] + "…"
        style = plain if self._sound else plain + Style(reverse=True, bold=True)
        return Strip([Segment(left.ljust(room), plain + Style(bold=True)), Segment(state, style)]).adjust_cell_length(
            self.size.width, plain
        )

    def on_click(self, event: events.Click) -> None:
        """Step by the arrows, list all by the name."""
        if self._count < 2:
            return
        after = self._left().find("▸")
        by = -1 if event.x <= 2 else 1 if after - 1 <= event.x <= after + 1 else 0
        if event.x < len(self._left()):
            self.post_message(self.Step(by))
