"""A plot of curves in the terminal, with a reading line that the keys and the mouse move."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING, ClassVar

from rich.segment import Segment
from textual import events
from textual.binding import Binding, BindingType
from textual.message import Message
from textual.reactive import reactive
from textual.strip import Strip
from textual.widget import Widget

from tui.widgets.picture import Picture

if TYPE_CHECKING:
    from tui.widgets.chart import Drawn
    from tui.widgets.raster import Glyphs


class Plot(Widget, can_focus=True):
    """Draws one picture; several plots may share the place of the reading line."""

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("left", "move(-1)", "Reading line left", show=False),
        Binding("right", "move(1)", "Reading line right", show=False),
        Binding("shift+left,ctrl+left", "move(-8)", "Reading line far left", show=False),
        Binding("shift+right,ctrl+right", "move(8)", "Reading line far right", show=False),
        Binding("home", "edge(0)", "Reading line to the start", show=False),
        Binding("end", "edge(1)", "Reading line to the end", show=False),
        Binding("escape,delete", "lift", "Take the reading line away", show=False),
    ]
    COMPONENT_CLASSES: ClassVar[set[str]] = {
        "plot--title",
        "plot--label",
        "plot--frame",
        "plot--cursor",
        "plot--1",
        "plot--2",
        "plot--3",
        "plot--4",
    }
    DEFAULT_CSS = """
    Plot { height: 12; }
    Plot > .plot--title { text-style: bold; color: $text-primary; }
    Plot:focus > .plot--title { text-style: bold reverse; }
    Plot > .plot--label { color: $foreground 75%; }
    Plot > .plot--frame { color: $foreground 40%; }
    Plot > .plot--cursor { color: $text-warning; text-style: bold; }
    Plot > .plot--1 { color: $text-success; }
    Plot > .plot--2 { color: $text-accent; }
    Plot > .plot--3 { color: $text-primary; }
    Plot > .plot--4 { color: $text-error; }
    """

    at: reactive[float | None] = reactive(None, init=False)
    glyphs: reactive[Glyphs] = reactive("braille", init=False)
    bare: reactive[bool] = reactive(False, init=False)

    @dataclass
    class Moved(Message):
        """The reading line stands elsewhere; None where it was taken away."""

        plot: Plot
        at: float | None

        @property
        def control(self) -> Plot:
            """The plot."""
            return self.plot

    def __init__(self, *, id: str | None = None, classes: str | None = None) -> None:
        super().__init__(id=id, classes=classes)
        self._picture: Picture | None = None
        self._along: tuple[float, float] = (0.0, 0.0)
        self._empty = ""
        self._drawn: Drawn | None = None
        self._strips: list[Strip] = []

    def show(self, picture: Picture | None, along: tuple[float, float] = (0.0, 0.0), empty: str = "") -> None:
        """Show another picture.

        Parameters
        ----------
        picture : Picture or None
            None where there is nothing to draw; ``empty`` then says why.
        along : tuple of float
            Where the reading line may stand. [1]
        empty : str
        """
        self._picture, self._along, self._empty = picture, along, empty
        self._forget()

    def _forget(self) -> None:
        self._drawn, self._strips = None, []
        self.refresh()

    def watch_at(self) -> None:
        """Draw with the reading line elsewhere."""
        self._forget()

    def watch_bare(self) -> None:
        """Draw with or without numbers below."""
        self._forget()

    def watch_glyphs(self) -> None:
        """Draw with other characters."""
        self._forget()

    def notify_style_update(self) -> None:
        """Take the colours of another theme."""
        super().notify_style_update()
        self._strips = []

    def on_resize(self) -> None:
        """Draw to the new size."""
        self._forget()

    def render_line(self, y: int) -> Strip:
        """Row ``y`` of the drawing, which is made once for each size, picture and reading line."""
        if self._picture is None:
            text = f" {self._empty}" if y == self.size.height // 2 else ""
            style = self.get_component_rich_style("plot--label")
            return Strip([Segment(text[: self.size.width].ljust(self.size.width), style)])
        if not self._strips:
            self._strips = self._strips_of(self._picture)
        return self._strips[y] if y < len(self._strips) else Strip.blank(self.size.width, self.rich_style)

    def _strips_of(self, picture: Picture) -> list[Strip]:
        from tui.widgets import chart, legend  # numpy stays off the first paint

        if self._drawn is None:
            self._drawn = chart.draw(picture, self.size.width, self.size.height, self.glyphs, self.at, self.bare)
        plain = self.rich_style
        names = {legend.FRAME: "frame", legend.LABEL: "label", legend.TITLE: "title", legend.CURSOR: "cursor"}
        styles = {0: plain} | {
            tone: self.get_component_rich_style(f"plot--{names.get(tone, tone)}") for tone in (*names, 1, 2, 3, 4)
        }
        strips = []
        for row in self._drawn.rows:
            segments: list[Segment] = []
            text, tone = "", 0
            for char, of in row:
                if of != tone and text:
                    segments.append(Segment(text, styles[tone]))
                    text = ""
                text, tone = text + char, of
            segments.append(Segment(text, styles[tone]))
            strips.append(Strip(segments))
        return strips

    def _put(self, at: float | None) -> None:
        low, high = self._along
        at = None if at is None else min(max(at, low), high)
        if at != self.at:
            self.at = at
            self.post_message(self.Moved(self, at))

    def action_move(self, cells: int) -> None:
        """Move by cells of the picture, starting at its middle."""
        low, high = self._along
        if self.at is None:
            self._put((low + high) / 2.0)
        else:
            count = self._drawn.count if self._drawn and self._drawn.count > 1 else 60
            self._put(self.at + cells * (high - low) / (count - 1))

    def action_edge(self, end: int) -> None:
        """Move to the start or the end."""
        self._put(self._along[end])

    def action_lift(self) -> None:
        """Take the reading line away."""
        self._put(None)

    def on_click(self, event: events.Click) -> None:
        """Put the reading line where the mouse is, on plots over the same axis."""
        drawn, picture = self._drawn, self._picture
        if drawn is None or picture is None or drawn.count < 2:
            return
        if any(curve.at is not None for curve in picture.curves):
            return
        share = (event.x - drawn.first) / (drawn.count - 1)
        self._put(drawn.x_low + share * (drawn.x_high - drawn.x_low))
