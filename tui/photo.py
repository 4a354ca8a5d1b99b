"""A picture of a screen as SVG, for documents: braille and blocks are drawn, so that no font matters.

``python -m tui.photo OUT.svg 160x50 f3`` opens the demo plant, presses the keys and writes the picture.
"""

from __future__ import annotations

import asyncio
import sys
from html import escape
from pathlib import Path
from typing import Any

from rich.color_triplet import ColorTriplet
from rich.segment import Segment
from rich.style import Style
from textual.app import App
from textual.strip import Strip

WIDE, HIGH = 9.0, 18.0
"""Size of a cell, in pixels. [1]"""
_DOTS = ((0, 0), (0, 1), (0, 2), (1, 0), (1, 1), (1, 2), (0, 3), (1, 3))
"""Column and row of the dots of a braille character, in the order of its bits. [1]"""
_LEFT = "▏▎▍▌▋▊▉█"
_LOW = "▁▂▃▄▅▆▇█"

Colour = tuple[int, int, int]


def svg(app: App[Any]) -> str:
    """Draw what an app shows.

    Parameters
    ----------
    app : App
        Running.

    Returns
    -------
    str
        SVG text.
    """
    strips = app.screen._compositor.render_strips()
    width, height = app.size.width * WIDE, len(strips) * HIGH
    parts = [part for y, strip in enumerate(strips) for part in _row(app, strip, y * HIGH)]
    return (
        f'<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 {width:.0f} {height:.0f}">'
        f'<rect width="100%" height="100%" fill="{_hex(_ground(app))}"/>'
        '<g font-family="DejaVu Sans Mono, Menlo, Consolas, monospace" font-size="14.5">'
        + "".join(parts)
        + "</g></svg>\n"
    )


def _hex(colour: Colour) -> str:
    return "#{:02x}{:02x}{:02x}".format(*colour)


def _rgb(found: ColorTriplet) -> Colour:
    return found.red, found.green, found.blue


def _ground(app: App[Any]) -> Colour:
    colour = app.screen.background_colors[1]
    return colour.r, colour.g, colour.b


def _row(app: App[Any], strip: Strip, y: float) -> list[str]:
    """Grounds first, then what stands on them."""
    grounds, marks, x = [], [], 0.0
    for segment in strip:
        if segment.control:
            continue
        wide = segment.cell_length * WIDE
        front, ground = _colours(app, segment.style)
        grounds.append(
            f'<rect x="{x:g}" y="{y:g}" width="{wide + 0.3:g}" height="{HIGH + 0.3:g}" fill="{_hex(ground)}"/>'
        )
        marks += _marks(segment, x, y, _hex(front))
        x += wide
    return grounds + marks


def _colours(app: App[Any], style: Style | None) -> tuple[Colour, Colour]:
    """Of the text, and of the ground."""
    theme, ground = app.ansi_theme, _ground(app)
    front: Colour = (224, 224, 224)
    if style is not None:
        if style.bgcolor is not None:
            ground = _rgb(style.bgcolor.get_truecolor(theme, foreground=False))
        if style.color is not None:
            front = _rgb(style.color.get_truecolor(theme))
        if style.reverse:
            front, ground = ground, front
    return front, ground


def _marks(segment: Segment, x: float, y: float, fill: str) -> list[str]:
    """Dots and blocks as shapes, all other characters as text, each at its own place."""
    found, places, text = [], [], ""
    for number, char in enumerate(segment.text):
        left = x + number * WIDE
        if 0x2800 <= ord(char) <= 0x28FF:
            found += [
                f'<circle cx="{left + WIDE * (0.25 + 0.5 * column):g}" cy="{y + HIGH * (0.125 + 0.25 * row):g}"'
                f' r="1.5" fill="{fill}"/>'
                for bit, (column, row) in enumerate(_DOTS)
                if (ord(char) - 0x2800) >> bit & 1
            ]
        elif char in _LEFT:
            share = (_LEFT.index(char) + 1) / 8
            found.append(
                f'<rect x="{left:g}" y="{y:g}" width="{WIDE * share + 0.2:g}" height="{HIGH:g}" fill="{fill}"/>'
            )
        elif char in _LOW:
            high = HIGH * (_LOW.index(char) + 1) / 8
            found.append(
                f'<rect x="{left:g}" y="{y + HIGH - high:g}" width="{WIDE:g}" height="{high:g}" fill="{fill}"/>'
            )
        elif char != " ":
            places.append(f"{left:g}")
            text += char
    if text:
        weight = ' font-weight="bold"' if segment.style is not None and segment.style.bold else ""
        found.append(
            f'<text x="{" ".join(places)}" y="{y + HIGH * 0.76:.1f}" fill="{fill}"{weight}>{escape(text)}</text>'
        )
    return found


async def take(place: Path, size: tuple[int, int], keys: list[str]) -> None:
    """Open the demo plant, press keys, and write the picture.

    Parameters
    ----------
    place : Path
        SVG to write.
    size : tuple of int
        Columns and rows of the terminal. [1]
    keys : list of str
        In Textual's names.
    """
    from actuator.project.document import demo
    from actuator.settings import Settings
    from tui.app import Design

    app = Design(demo(), Settings())
    async with app.run_test(size=size) as pilot:
        while app.answered != app.session.revision:
            await pilot.pause(0.05)
        for key in keys:
            await pilot.press(key)
        await pilot.pause(0.5)
        while app.answered != app.session.revision:
            await pilot.pause(0.05)
        await pilot.pause(0.2)
        place.write_text(svg(app), encoding="utf-8")


if __name__ == "__main__":
    columns, _, rows = sys.argv[2].partition("x")
    asyncio.run(take(Path(sys.argv[1]), (int(columns), int(rows)), sys.argv[3:]))
