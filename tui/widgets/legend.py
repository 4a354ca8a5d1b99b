"""The lines above a plot: title, curves by their marks, values at the reading line."""

from __future__ import annotations

import numpy as np

from tui.widgets.picture import Axis, Curve, Picture
from tui.widgets.raster import Floats

FRAME, LABEL, TITLE, CURSOR = -1, -2, -3, -4
"""Tones of what is no curve; a curve's tone is 1 to 4, 0 is blank. [1]"""

Cell = tuple[str, int]
"""A character and its tone."""


def reading(value: float, span: float) -> str:
    """A value at the reading line, to about a thousandth of its axis."""
    if not np.isfinite(value):
        return "–"
    decimals = min(max(3 - int(np.floor(np.log10(span))), 0), 6) if span > 0.0 else 3
    text = f"{value:.{decimals}f}"
    return (text.lstrip("-") if float(text) == 0.0 else text).replace("-", "−")


def span(axis: Axis, data: list[Floats]) -> float:
    """Length of an axis around all finite values. [1]"""
    low, high = around(axis, data)
    return high - low


def around(axis: Axis, data: list[Floats]) -> tuple[float, float]:
    """Least and greatest of all finite values and of those that must be on the axis."""
    parts = [part[np.isfinite(part)] for part in (*data, np.array(axis.include, dtype=np.float64))]
    values = np.concatenate(parts)
    return (float(values.min()), float(values.max())) if len(values) else (0.0, 1.0)


def index_at(curve: Curve, at: float) -> int:
    """Point of a curve next to the reading line's place."""
    along = curve.x if curve.at is None else curve.at
    right = int(np.searchsorted(along, at))
    if right <= 0 or right >= len(along):
        return min(max(right, 0), len(along) - 1)
    return right if along[right] - at < at - along[right - 1] else right - 1


def legend(picture: Picture, width: int, at: float | None) -> list[list[Cell]]:
    """Title with its unit, then curves by their marks, wrapped.

    At the reading line the values stand there too, as far as that takes no more lines: the picture below
    keeps its size.
    """
    title = text_cells(f"{picture.title} [{picture.y.unit}]", TITLE)
    names = [_named(curve, curve.name, len(picture.curves)) for curve in picture.curves]
    plain = _wrapped([title, *names], width)
    if at is None:
        return plain
    length = span(picture.y, [curve.y for curve in picture.curves])
    values = [
        reading(float(curve.y[index_at(curve, at)]), length) if _is_read(curve) else "" for curve in picture.curves
    ]
    pairs = list(zip(picture.curves, values, strict=True))
    count = len(picture.curves)
    full = [_named(curve, f"{curve.name} {value}".rstrip(), count, value) for curve, value in pairs]
    short = [_named(curve, value or curve.name, count, value) for curve, value in pairs]
    along = [curve.at for curve in picture.curves if curve.at is not None]
    when = span(Axis(unit=""), along) if along else span(picture.x, [curve.x for curve in picture.curves])
    moment = text_cells(f"at {reading(at, when)} {picture.reads or picture.x.unit}", CURSOR)
    for items in ([title, moment, *full], [title, *full], [title, *short]):
        lines = _wrapped(items, width)
        if len(lines) <= len(plain):
            return lines
    return plain


def _named(curve: Curve, text: str, count: int, value: str = "") -> list[Cell]:
    """A curve in the legend; one alone has its value only."""
    if count == 1:
        return text_cells(value, CURSOR)
    return [(curve.mark, curve.tone), *text_cells(f" {text}", LABEL)]


def _wrapped(items: list[list[Cell]], width: int) -> list[list[Cell]]:
    lines: list[list[Cell]] = [[]]
    for item in items:
        gap = 2 if lines[-1] and item else 0
        if lines[-1] and len(lines[-1]) + gap + len(item) > width:
            lines.append([])
            gap = 0
        lines[-1] += [(" ", 0)] * gap + item[:width]
    return lines


def text_cells(text: str, tone: int) -> list[Cell]:
    """A text in one tone."""
    return [(char, tone) for char in text]


def _is_read(curve: Curve) -> bool:
    """Whether one place of the reading line has one value on the curve."""
    return bool(len(curve.y)) and (curve.at is not None or not _is_loop(curve))


def _is_loop(curve: Curve) -> bool:
    """Whether the curve runs back along x."""
    return bool((np.diff(curve.x) < 0.0).any())
