"""A table of figures: one is chosen, by keys or mouse, and its working can be asked for."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from rich.segment import Segment
from rich.style import Style
from textual import events
from textual.binding import Binding, BindingType
from textual.geometry import Region, Size
from textual.message import Message
from textual.reactive import reactive
from textual.strip import Strip
from textual.widget import Widget

from tui.tables import Row, Section
from tui.widgets.lines import GAP, Layout, Line, lay_out


class Figures(Widget, can_focus=True):
    """Sections of figures in as many columns as fit."""

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("up", "move(-1)", "Figure above", show=False),
        Binding("down", "move(1)", "Figure below", show=False),
        Binding("left", "across(-1)", "Column to the left", show=False),
        Binding("right", "across(1)", "Column to the right", show=False),
        Binding("home", "end(0)", "First figure", show=False),
        Binding("end", "end(-1)", "Last figure", show=False),
        Binding("enter", "open", "Working", show=False),
    ]
    COMPONENT_CLASSES: ClassVar[set[str]] = {
        "figures--title",
        "figures--number",
        "figures--note",
        "figures--change",
        "figures--bar",
    }
    DEFAULT_CSS = """
    Figures { height: auto; }
    Figures > .figures--title { text-style: bold; color: $text-primary; }
    Figures > .figures--note { color: $foreground 60%; }
    Figures > .figures--change { color: $text-warning; }
    Figures > .figures--bar { color: $primary; }
    """

    chosen: reactive[str] = reactive("", init=False)

    @dataclass
    class Chosen(Message):
        """Another figure is chosen."""

        figures: Figures
        name: str

        @property
        def control(self) -> Figures:
            """The table."""
            return self.figures

    @dataclass
    class Opened(Message):
        """The working of the chosen figure is asked for."""

        figures: Figures

        @property
        def control(self) -> Figures:
            """The table."""
            return self.figures

    def __init__(self, *, least: int = 38, id: str | None = None) -> None:
        super().__init__(id=id)
        self.least = least
        self.plain = False
        self._sections: tuple[Section, ...] = ()
        self._layouts: dict[int, Layout] = {}

    def show(self, sections: tuple[Section, ...]) -> None:
        """Show other figures; the choice stays where its row does."""
        width = self.size.width or 80
        before = self._laid_out(width).height
        self._sections = sections
        self._layouts.clear()
        if self.chosen not in self.names:
            self.set_reactive(Figures.chosen, self.names[0] if sections else "")
        self.refresh(layout=self._laid_out(width).height != before)

    @property
    def names(self) -> list[str]:
        """Names of all rows, from the top."""
        return [row.name for section in self._sections for row in section.rows]

    def row(self, name: str) -> Row | None:
        """The row of a name; None where it is not in this table."""
        return next((row for section in self._sections for row in section.rows if row.name == name), None)

    def _laid_out(self, width: int) -> Layout:
        if width not in self._layouts:
            if len(self._layouts) > 4:
                self._layouts.clear()
            self._layouts[width] = lay_out(self._sections, max(width, 20), self.least, self.plain)
        return self._layouts[width]

    def get_content_height(self, container: Size, viewport: Size, width: int) -> int:  # noqa: ARG002
        """As many lines as the longest column."""
        return self._laid_out(width).height

    def render_line(self, y: int) -> Strip:
        """Line ``y`` of all columns."""
        layout = self._laid_out(self.size.width)
        plain = self.rich_style
        parts: list[Segment] = []
        for number, column in enumerate(layout.columns):
            if number:
                parts.append(Segment(" " * GAP, plain))
            line = column[y] if y < len(column) else Line(((" " * layout.width, "body"),))
            parts += self._segments(line, plain)
        strip = Strip(parts)
        return strip.adjust_cell_length(self.size.width, plain)

    def _segments(self, line: Line, plain: Style) -> list[Segment]:
        """One line in the colours of the theme; the chosen row also has a sign in front."""
        chosen = bool(line.row) and line.row == self.chosen
        segments = []
        for number, (text, what) in enumerate(line.parts):
            style = self.get_component_rich_style(f"figures--{what}") if what != "body" else plain
            if chosen:
                style += Style(bold=True, reverse=self.has_focus)
            sign = "›" if chosen and line.first and number == 0 and text[:1] == " " else text[:1]
            segments.append(Segment(sign + text[1:], style))
        return segments

    def watch_chosen(self) -> None:
        """Tell the screen, and bring the row into view."""
        self.refresh()
        self.post_message(self.Chosen(self, self.chosen))
        self.reveal()

    def on_focus(self) -> None:
        """The chosen figure of this table is the one asked about."""
        self.post_message(self.Chosen(self, self.chosen))
        self.call_after_refresh(self.reveal)

    def reveal(self) -> None:
        """Scroll whatever holds this table until the chosen row is seen."""
        place = self._laid_out(self.size.width).place(self.chosen)
        if place is None:
            return
        _, top, count = place
        region = Region(0, max(top - 1, 0), self.size.width, count + 1)
        child: Widget = self
        for ancestor in self.ancestors:
            if not isinstance(ancestor, Widget):
                break
            region = region.translate(child.virtual_region.offset)
            if ancestor.is_scrollable and ancestor.max_scroll_y > 0:
                ancestor.scroll_to_region(region, animate=False, force=True)
                break
            child = ancestor

    def action_move(self, by: int) -> None:
        """Choose the figure above or below; past the ends go to the neighbouring widget."""
        names = self._laid_out(self.size.width).names
        place = names.index(self.chosen) + by if self.chosen in names else 0
        if names and 0 <= place < len(names):
            self.chosen = names[place]

    def action_end(self, place: int) -> None:
        """Choose the first or the last figure."""
        names = self._laid_out(self.size.width).names
        if names:
            self.chosen = names[place]

    def action_across(self, by: int) -> None:
        """Choose the figure at the same height in the next column."""
        layout = self._laid_out(self.size.width)
        place = layout.place(self.chosen)
        if place is None or not 0 <= place[0] + by < len(layout.columns):
            return
        column = layout.columns[place[0] + by]
        near = [(abs(y - place[1]), line.row) for y, line in enumerate(column) if line.row]
        if near:
            self.chosen = min(near)[1]

    def action_open(self) -> None:
        """Ask for the working of the chosen figure."""
        self.post_message(self.Opened(self))

    def on_click(self, event: events.Click) -> None:
        """Choose; a second click asks for the working."""
        row = self._laid_out(self.size.width).row_at(event.x, event.y)
        if row:
            again = row == self.chosen and event.chain >= 2
            self.chosen = row
            if again:
                self.action_open()
