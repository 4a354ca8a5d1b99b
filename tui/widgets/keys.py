"""The line of keys at the bottom: those of the table of actions that fit whole."""

from __future__ import annotations

from dataclasses import dataclass

from rich.segment import Segment
from rich.style import Style
from textual import events
from textual.message import Message
from textual.strip import Strip
from textual.widget import Widget

WIDE = 100
"""Cells from which the keys stand further apart. [1]"""


class Keys(Widget):
    """Keys and what they do, the most used first; what has no room is in the palette and in help."""

    DEFAULT_CSS = """
    Keys { height: 1; background: $panel; }
    """

    @dataclass
    class Pressed(Message):
        """One of them was clicked."""

        name: str

    def __init__(self, keys: list[tuple[str, str, str]], *, id: str | None = None) -> None:
        super().__init__(id=id)
        self._keys = keys
        self._spans: list[tuple[int, int, str]] = []

    def fitting(self, width: int) -> list[tuple[str, str, str]]:
        """Those that have room, in order: key, name, action."""
        kept: list[tuple[str, str, str]] = []
        used = 0
        for key, name, action in self._keys:
            used += 1 + self.gap(width) * bool(kept) + len(key) + len(name)
            if used > width:
                break
            kept.append((key, name, action))
        return kept

    def gap(self, width: int) -> int:
        """Cells between two of them: less where it is narrow. [1]"""
        return 2 if width >= WIDE else 1

    def render_line(self, y: int) -> Strip:  # noqa: ARG002
        """Key in bold, then its name."""
        plain = self.rich_style
        segments: list[Segment] = []
        self._spans, x = [], 0
        for key, name, action in self.fitting(self.size.width):
            gap = self.gap(self.size.width) if x else 0
            segments += [Segment(" " * gap + key, plain + Style(bold=True)), Segment(f" {name}", plain)]
            x += gap
            self._spans.append((x, x + len(key) + len(name) + 1, action))
            x += len(key) + len(name) + 1
        return Strip(segments).adjust_cell_length(self.size.width, plain)

    def on_click(self, event: events.Click) -> None:
        """Do what is under the mouse."""
        for start, end, action in self._spans:
            if start <= event.x < end:
                self.post_message(self.Pressed(action))
