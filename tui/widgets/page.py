"""Lines of text to scroll through; they are drawn as they come into view."""

from __future__ import annotations

from rich.cells import cell_len
from rich.segment import Segment
from textual.geometry import Size
from textual.scroll_view import ScrollView
from textual.strip import Strip


class Page(ScrollView, can_focus=True):
    """Text that is wrapped already."""

    DEFAULT_CSS = """
    Page { height: 1fr; scrollbar-size-vertical: 1; }
    """

    def __init__(self, *, id: str | None = None) -> None:
        super().__init__(id=id)
        self.lines: list[str] = []

    def show(self, text: str) -> None:
        """Show another text, from its top."""
        self.lines = text.splitlines()
        wide = max((cell_len(line) for line in self.lines), default=0)
        self.virtual_size = Size(wide, len(self.lines))
        self.refresh()

    def render_line(self, y: int) -> Strip:
        """One of the lines that are in view."""
        place = y + self.scroll_offset.y
        text = self.lines[place] if place < len(self.lines) else ""
        strip = Strip([Segment(text, self.rich_style)])
        left = self.scroll_offset.x
        return strip.crop_extend(left, left + self.size.width, self.rich_style)
