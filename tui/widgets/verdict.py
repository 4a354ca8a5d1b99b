"""The verdict line: whether the job is met, requirement by requirement."""

from __future__ import annotations

from textwrap import wrap
from typing import TYPE_CHECKING

from rich.text import Text
from textual.app import ComposeResult
from textual.containers import VerticalScroll
from textual.widgets import Static

if TYPE_CHECKING:
    from tui.shown import View
    from tui.verdict import Item

NOTHING = "Nothing is required of this actuator yet: fill in Requirements on the sheet to have it judged."
GAP = "   "
_STYLES = {"failed": "bold reverse", "refused": "bold", "met": ""}


def packed(items: tuple[Item, ...], width: int) -> Text:
    """Put the requirements in as few lines as they fit in, each whole where it can be."""
    lines: list[Text] = []
    for item in items:
        for part in wrap(item.text, max(width, 20), break_on_hyphens=False):
            text = Text(part, style=_STYLES[item.verdict])
            fits = lines and len(part) == len(item.text)
            if fits and lines[-1].cell_len + len(GAP) + text.cell_len <= width:
                lines[-1].append(GAP).append_text(text)
            else:
                lines.append(Text().append_text(text))
    return Text("\n").join(lines)


class Verdict(VerticalScroll, can_focus=False):
    """Failed requirements first; each with its margin in words and numbers."""

    DEFAULT_CSS = """
    Verdict { height: auto; max-height: 4; padding: 0 1; background: $panel; }
    """

    def __init__(self, *, id: str | None = None) -> None:
        super().__init__(id=id)
        self._items: tuple[Item, ...] | None = None
        self._lines = -2

    def compose(self) -> ComposeResult:
        """One text, which scrolls where it is long."""
        yield Static("", markup=False)

    def show(self, view: View, plain: bool) -> None:
        """Judge the actuator of an answer."""
        from tui.verdict import verdicts

        self._items = verdicts(view, plain)
        self._fill()

    def on_resize(self) -> None:
        """Pack to the width."""
        self._fill()

    def _fill(self) -> None:
        if self._items is not None:
            text = packed(self._items, self.size.width) if self._items else Text(NOTHING)
            lines = text.plain.count("\n") if self._items else -1
            self.query_one(Static).update(text, layout=lines != self._lines)
            self._lines = lines
