"""All problems of the document, each one leading to its field."""

from __future__ import annotations

from dataclasses import dataclass
from textwrap import wrap
from typing import ClassVar

from rich.segment import Segment
from rich.style import Style
from textual import events
from textual.binding import Binding, BindingType
from textual.geometry import Region, Size
from textual.message import Message
from textual.reactive import reactive
from textual.scroll_view import ScrollView
from textual.strip import Strip

from actuator.errors import Problem

MOST = 6
"""Lines that are seen at once; the others by scrolling. [1]"""


class Problems(ScrollView, can_focus=True):
    """A list that takes no room while there are none."""

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("up", "move(-1)", "Problem above", show=False),
        Binding("down", "move(1)", "Problem below", show=False),
        Binding("enter", "pick", "Go to its field", show=False),
    ]
    DEFAULT_CSS = """
    Problems { height: 0; color: $text-error; background: $surface; scrollbar-size-vertical: 1; }
    """

    present: reactive[int] = reactive(0, init=False)

    @dataclass
    class Picked(Message):
        """Go to the field of a problem."""

        number: int

    def __init__(self, *, id: str | None = None) -> None:
        super().__init__(id=id)
        self.problems: tuple[Problem, ...] = ()
        self._rows: list[tuple[int, str]] = []

    def show(self, problems: tuple[Problem, ...]) -> None:
        """List other problems."""
        if problems != self.problems:
            self.problems = problems
            self.set_reactive(Problems.present, min(self.present, max(len(problems) - 1, 0)))
            self.can_focus = bool(problems)
            self._wrap()

    def on_resize(self) -> None:
        """Wrap to the width."""
        self._wrap()

    def _wrap(self) -> None:
        width = max(self.size.width - 4, 16)
        self._rows = [
            (number, ("! " if first == 0 else "  ") + part)
            for number, problem in enumerate(self.problems)
            for first, part in enumerate(wrap(str(problem), width, break_on_hyphens=False))
        ]
        height = min(len(self._rows), MOST)
        if self.styles.height is None or self.styles.height.value != height:
            self.styles.height = height
        self.virtual_size = Size(self.size.width, len(self._rows))
        self.refresh()

    def render_line(self, y: int) -> Strip:
        """One line; the present problem is reversed while the list has the focus."""
        place = y + self.scroll_offset.y
        if place >= len(self._rows):
            return Strip.blank(self.size.width, self.rich_style)
        number, text = self._rows[place]
        style = self.rich_style + Style(reverse=self.has_focus and number == self.present)
        return Strip([Segment(f" {text}", style)]).adjust_cell_length(self.size.width, style)

    def watch_present(self, number: int) -> None:
        """Bring the problem into view."""
        rows = [place for place, (of, _) in enumerate(self._rows) if of == number]
        if rows:
            self.scroll_to_region(Region(0, rows[0], 1, len(rows)), animate=False)
        self.refresh()

    def action_move(self, by: int) -> None:
        """Go to the problem above or below."""
        self.present = min(max(self.present + by, 0), max(len(self.problems) - 1, 0))

    def action_pick(self) -> None:
        """Ask for the field of the present problem."""
        if self.problems:
            self.post_message(self.Picked(self.present))

    def on_click(self, event: events.Click) -> None:
        """Ask for the field of the problem under the mouse."""
        place = event.y + self.scroll_offset.y
        if place < len(self._rows):
            self.present = self._rows[place][0]
            self.action_pick()
