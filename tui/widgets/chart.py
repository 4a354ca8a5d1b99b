"""A picture drawn into cells: frame, ticks, curves, marks, legend and the reading line."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from tui.widgets.legend import CURSOR, FRAME, LABEL, Cell, around, index_at, legend, reading, text_cells
from tui.widgets.picture import Axis, Curve, Picture
from tui.widgets.raster import NOTHING, Floats, Glyphs, cells, dots, inside, polyline, rounded, scaled

LOSS = 1.3
"""Length of an axis over that of its data, beyond which whole ticks at its ends are given up. [1]"""


@dataclass(frozen=True, slots=True)
class Drawn:
    """A finished drawing.

    Attributes
    ----------
    rows : tuple of tuple of Cell
        Character and tone of each cell, top row first.
    x_low, x_high : float
        Ends of the horizontal axis, in its unit. [1]
    first, count : int
        Column of the first cell inside the frame, and how many there are. [1]
    """

    rows: tuple[tuple[Cell, ...], ...]
    x_low: float
    x_high: float
    first: int
    count: int


def number(value: float, step: float) -> str:
    """A tick's text, with as many decimals as its step needs."""
    decimals = max(0, -int(np.floor(np.log10(step) + 1e-9))) if step > 0.0 else 0
    if abs(value) >= 1e5 or decimals > 4:
        return f"{value:.3g}"
    return f"{value + 0.0:.{decimals}f}".replace("-", "−")


@dataclass(frozen=True, slots=True)
class _Scale:
    """An axis as drawn: its ends, and values with their texts."""

    low: float
    high: float
    labels: tuple[tuple[float, str], ...]


def _scale(axis: Axis, data: list[Floats], most: int) -> _Scale:
    """Axis around all finite values, with no more than ``most`` labels.

    Its ends are whole ticks, unless the picture would lose too much of its height to them.
    """
    low, high = around(axis, data)
    marks = rounded(low, high, most)
    real = high - low > NOTHING * max(abs(low), abs(high))
    if real and (axis.tight or marks[-1] - marks[0] > LOSS * (high - low)):
        marks = inside(low, high, most)
    else:
        low, high = marks[0], marks[-1]
    step = marks[1] - marks[0] if len(marks) > 1 else abs(low) or 1.0
    return _Scale(low, high, tuple((value, number(value, step)) for value in marks))


def draw(
    picture: Picture, width: int, height: int, glyphs: Glyphs, at: float | None = None, bare: bool = False
) -> Drawn:
    """Draw a picture into ``width`` times ``height`` cells.

    Parameters
    ----------
    picture : Picture
    width, height : int
        In cells; anything from 1 is accepted, a frame needs some 20 x 6. [1]
    glyphs : {"braille", "block", "ascii"}
    at : float, optional
        Where the reading line stands, in the unit of the horizontal axis (or of the curves' ``at``). [1]
    bare : bool
        Leave the numbers of the horizontal axis to the plot below.

    Returns
    -------
    Drawn
    """
    plain = glyphs == "ascii"
    head = legend(picture, width, at)
    inner = height - len(head) - (1 if bare else 2)
    if inner < 2 or width < 16:
        rows = [*head, *([[]] * height)][:height]
        return Drawn(tuple(_row(row, width) for row in rows), 0.0, 0.0, 0, 0)
    y_scale = _scale(picture.y, [curve.y for curve in picture.curves], min(max(3, (inner + 1) // 2), 8))
    gutter = max(picture.gutter, max(len(text) for _, text in y_scale.labels) + 1)
    count = width - gutter - 1
    x_scale = _scale(picture.x, [curve.x for curve in picture.curves], max(3, count // 7))
    x_ends, y_ends = (x_scale.low, x_scale.high), (y_scale.low, y_scale.high)
    canvas = _curves(picture, (count, inner), glyphs, y_ends, x_ends)
    _cursor(canvas, picture, x_ends, y_ends, at, plain)
    rows = _framed(canvas, y_scale, gutter, plain)
    rows += _bottom(picture.x, x_scale, gutter, count, width, plain)[: 1 if bare else 2]
    if at is not None and not bare:
        _moment(rows[-1], picture, x_ends, gutter, count, at)
    finished = tuple(_row(row, width) for row in [*head, *rows][:height])
    return Drawn(finished, *x_ends, gutter, count)


def _row(row: list[Cell], width: int) -> tuple[Cell, ...]:
    return tuple([*row, *([(" ", 0)] * (width - len(row)))][:width])


def _curves(
    picture: Picture,
    size: tuple[int, int],
    glyphs: Glyphs,
    y_ends: tuple[float, float],
    x_ends: tuple[float, float],
) -> list[list[Cell]]:
    """Dots of all curves; a cell belongs to the last curve in it, which also puts its marks."""
    count, inner = size
    across, down = dots(glyphs)
    columns, rows = count * across, inner * down
    picture_dots = np.zeros((rows, columns), dtype=np.bool_)
    owner = np.zeros((inner, count), dtype=np.int64)
    placed: list[tuple[int, int, str, int]] = []
    for number_of, curve in enumerate(picture.curves):
        if not len(curve.x):
            continue
        px = scaled(curve.x, *x_ends, columns)
        py = rows - 1 - scaled(curve.y, *y_ends, rows)
        drawn = polyline(px, py, columns, rows, curve.dash)
        picture_dots |= drawn
        owner[drawn.reshape(inner, down, count, across).any(axis=(1, 3))] = curve.tone
        if len(picture.curves) > 1:
            placed += _marks(curve, px, py, (across, down), number_of, len(picture.curves))
    characters = cells(picture_dots, glyphs)
    canvas = [
        [(char, tone if char != " " else 0) for char, tone in zip(row, tones, strict=True)]
        for row, tones in zip(characters, owner.tolist(), strict=True)
    ]
    for row, column, mark, tone in placed:
        canvas[row][column] = (mark, tone)
    return canvas


def _marks(
    curve: Curve, px: Floats, py: Floats, cell: tuple[int, int], number_of: int, of_all: int
) -> list[tuple[int, int, str, int]]:
    """Cells of a curve's marks: even along its drawn way, each curve a little further than the one before."""
    good = np.isfinite(px) & np.isfinite(py)
    if not good.any():
        return []
    x, y = px[good], py[good]
    way = np.concatenate((np.zeros(1), np.cumsum(np.hypot(np.diff(x), np.diff(y)))))
    total = float(way[-1])
    many = int(np.clip(total // (24 * cell[0]), 1, 9))
    at = (np.arange(many) + 0.25 + 0.6 * number_of / max(of_all, 1)) / many * total
    points = np.minimum(np.searchsorted(way, at), len(x) - 1)
    return [(int(y[i] + 0.5) // cell[1], int(x[i] + 0.5) // cell[0], curve.mark, curve.tone) for i in points]


def _cursor(
    canvas: list[list[Cell]],
    picture: Picture,
    x_ends: tuple[float, float],
    y_ends: tuple[float, float],
    at: float | None,
    plain: bool,
) -> None:
    """Put the reading line, or a cross on a loop."""
    if at is None:
        return
    inner, count = len(canvas), len(canvas[0])
    for curve in picture.curves:
        if curve.at is not None and len(curve.x):
            point = index_at(curve, at)
            x = scaled(curve.x[point : point + 1], *x_ends, count)
            y = scaled(curve.y[point : point + 1], *y_ends, inner)
            if np.isfinite(x).all() and np.isfinite(y).all():
                canvas[inner - 1 - round(float(y[0]))][round(float(x[0]))] = ("+" if plain else "✚", CURSOR)
    if all(curve.at is None for curve in picture.curves):
        column = round(float(scaled(np.array([at]), *x_ends, count)[0]))
        for row in canvas:
            char = row[column][0]
            row[column] = (char if char != " " else "|" if plain else "│", CURSOR)


def _moment(row: list[Cell], picture: Picture, x_ends: tuple[float, float], gutter: int, count: int, at: float) -> None:
    """Put the reading line's place between the numbers below it; on a loop it has none."""
    if any(curve.at is not None for curve in picture.curves):
        return
    text = f" {reading(at, x_ends[1] - x_ends[0])} {picture.x.unit} "
    column = gutter + round(float(scaled(np.array([at]), *x_ends, count)[0]))
    start = max(min(column - len(text) // 2, len(row) - len(text)), 0)
    row[start : start + len(text)] = text_cells(text, CURSOR)[: len(row) - start]


def _framed(canvas: list[list[Cell]], scale: _Scale, gutter: int, plain: bool) -> list[list[Cell]]:
    """Ticks and their numbers to the left of the canvas."""
    inner = len(canvas)
    texts: dict[int, str] = {}
    for value, text in scale.labels:
        texts[inner - 1 - round(float(scaled(np.array([value]), scale.low, scale.high, inner)[0]))] = text
    rows = []
    for y, row_cells in enumerate(canvas):
        edge = "|" if plain else "┤" if y in texts else "│"
        rows.append([*text_cells(texts.get(y, "").rjust(gutter - 1), LABEL), (edge, FRAME), *row_cells])
    return rows


def _bottom(axis: Axis, scale: _Scale, gutter: int, count: int, width: int, plain: bool) -> list[list[Cell]]:
    """The lower edge with its ticks, and their numbers, the last with the unit."""
    line = ["-" if plain else "─"] * count
    below = [" "] * width
    free = width
    for number_of, (value, text) in enumerate(reversed(scale.labels)):
        column = round(float(scaled(np.array([value]), scale.low, scale.high, count)[0]))
        line[column] = "+" if plain else "┬"
        shown = f"{text} {axis.unit}".rstrip() if number_of == 0 else text
        start = max(min(gutter + column - len(text) // 2, width - len(shown)), 0)
        if start + len(shown) < free or number_of == 0:
            below[start : start + len(shown)] = shown
            free = start
    frame = [*text_cells(" " * (gutter - 1), 0), *text_cells(("+" if plain else "└") + "".join(line), FRAME)]
    return [frame, text_cells("".join(below), LABEL)]
