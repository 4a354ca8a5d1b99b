"""Cylinder: forces, reserve, rod, ideal diagram, air, demand, energy and money of one actuator."""

from __future__ import annotations

from typing import TYPE_CHECKING

from textual.app import ComposeResult
from textual.containers import VerticalScroll

from tui.widgets.figures import Figures

if TYPE_CHECKING:
    from tui.shown import View
    from tui.widgets.raster import Glyphs


class Cylinder(VerticalScroll, can_focus=False):
    """Figures that need no picture."""

    def __init__(self, *, id: str | None = None) -> None:
        super().__init__(id=id)
        self._shown: tuple[View, Glyphs] | None = None

    def compose(self) -> ComposeResult:
        """One table, in as many columns as fit."""
        yield Figures(least=36, id="cylinder-figures")

    def show(self, view: View, glyphs: Glyphs) -> None:
        """Show the figures of an answer."""
        if (view, glyphs) == self._shown:
            return
        from tui.shown import cylinder_sections

        self._shown = (view, glyphs)
        figures = self.query_one(Figures)
        figures.plain = glyphs == "ascii"
        figures.show(cylinder_sections(view))
