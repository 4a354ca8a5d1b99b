"""Stroke: the periodic cycle in pictures, the ledger of its exergy, the figures of each half stroke."""

from __future__ import annotations

from typing import TYPE_CHECKING

from textual import events, on
from textual.app import ComposeResult
from textual.containers import Container, Vertical, VerticalScroll

from tui.widgets.figures import Figures
from tui.widgets.plot import Plot

if TYPE_CHECKING:
    from tui.shown import View
    from tui.widgets.raster import Glyphs

WIDE = 72
"""Cells from which pictures stand side by side. [1]"""
LOW = 11
"""Lines that the ledger takes below the pictures. [1]"""
LEAST = 21
"""Lines below which pictures side by side are not pressed. [1]"""


class Stroke(VerticalScroll, can_focus=False):
    """Plots over time to the left, p-V loops to the right; below each other where it is narrow."""

    def __init__(self, *, id: str | None = None) -> None:
        super().__init__(id=id)
        self._shown: tuple[View, Glyphs] | None = None

    def compose(self) -> ComposeResult:
        """Five plots, the ledger, the tables."""
        with Container(id="stroke-plots"):
            with Vertical(id="stroke-times"):
                yield Plot(id="position")
                yield Plot(id="speed")
                yield Plot(id="pressures")
            with Vertical(id="stroke-loops"):
                yield Plot(id="cap")
                yield Plot(id="rod")
        with Container(id="stroke-tables"):
            yield Figures(least=36, id="ledger")
            yield Figures(least=36, id="motion")

    def on_resize(self, event: events.Resize) -> None:
        """Stand side by side where there is room, and let the pictures use the height."""
        wide = event.size.width >= WIDE
        self.set_class(wide, "-wide")
        self.query_one("#stroke-plots").styles.height = min(max(event.size.height - LOW, LEAST), 36) if wide else None
        for name in ("#position", "#speed"):
            self.query_one(name, Plot).bare = wide

    def show(self, view: View, glyphs: Glyphs) -> None:
        """Show the cycle of an answer."""
        if (view, glyphs) == self._shown:
            return
        self._shown = (view, glyphs)
        from actuator.errors import Refusal
        from tui.pictures import pictures, span
        from tui.shown import ledger_sections, stroke_sections

        plain = glyphs == "ascii"
        drawn, along = pictures(view, plain), span(view)
        result = view.result
        why = "no actuator here" if result is None else ""
        if result is not None and isinstance(result.stroke, Refusal):
            why = f"no cycle to draw: {result.stroke}"
        for plot in self.query(Plot):
            plot.glyphs = glyphs
            if plot.at is not None:
                plot.set_reactive(Plot.at, min(max(plot.at, along[0]), along[1]))
            plot.show(drawn.get(plot.id or ""), along, why)
        for name, sections in (("ledger", ledger_sections(view)), ("motion", stroke_sections(view))):
            figures = self.query_one(f"#{name}", Figures)
            figures.plain = plain
            figures.show(sections)

    @on(Plot.Moved)
    def _together(self, event: Plot.Moved) -> None:
        """All plots read at the same time of the cycle."""
        event.stop()
        for plot in self.query(Plot):
            if plot is not event.plot:
                plot.at = event.at
