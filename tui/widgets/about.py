"""Two lines about what is under the hands."""

from __future__ import annotations

from textwrap import wrap

from rich.segment import Segment
from textual.strip import Strip
from textual.widget import Widget

LINES = 2
"""Lines that it takes. [1]"""
MORE = " … F1"
"""Says that help has the whole text."""


class About(Widget):
    """What the focused field or figure is; a longer text stands whole at the top of the help."""

    DEFAULT_CSS = """
    About { height: 2; color: $foreground 70%; }
    """

    def __init__(self, *, id: str | None = None) -> None:
        super().__init__(id=id)
        self.text = ""

    def say(self, text: str) -> None:
        """Show another text, without laying the screen out again."""
        if text != self.text:
            self.text = text
            self.refresh()

    def render_line(self, y: int) -> Strip:
        """One of the lines."""
        width = self.size.width - 2
        lines = wrap(self.text, width, break_on_hyphens=False)
        if len(lines) > LINES:
            lines[LINES - 1] = lines[LINES - 1][: width - len(MORE)] + MORE
        text = lines[y] if y < len(lines) else ""
        return Strip([Segment(f" {text}", self.rich_style)]).adjust_cell_length(self.size.width, self.rich_style)
