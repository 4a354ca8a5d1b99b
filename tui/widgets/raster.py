"""Curves to rows of characters: braille dots, half blocks or plain ASCII. No widget here.

Everything is counted in dots: a cell holds ``dots(glyphs)`` of them, columns by rows. Row 0 is the top.
"""

from __future__ import annotations

from typing import Literal

import numpy as np
from numpy.typing import NDArray

Glyphs = Literal["braille", "block", "ascii"]
Floats = NDArray[np.float64]
Dots = NDArray[np.bool_]

_DOTS: dict[Glyphs, tuple[int, int]] = {"braille": (2, 4), "block": (1, 2), "ascii": (1, 1)}
_BRAILLE = np.array([[1, 8], [2, 16], [4, 32], [64, 128]], dtype=np.int64)
_BLOCK = " ▀▄█"
NOTHING = 1e-9
"""Length of an axis, as a share of its values, below which they count as equal. [1]"""


def dots(glyphs: Glyphs) -> tuple[int, int]:
    """Dots of one cell, columns and rows. [1]"""
    return _DOTS[glyphs]


def scaled(values: Floats, low: float, high: float, count: int) -> Floats:
    """Values to dot positions, ``low`` on dot 0 and ``high`` on the last.

    A value that is no number stays one, so that the curve has a gap there.

    Parameters
    ----------
    values : ndarray
        Shape (n,). [1]
    low, high : float
        Ends of the axis; where they are equal the middle dot is given. [1]
    count : int
        Dots along the axis. [1]

    Returns
    -------
    ndarray
        Clipped to the axis. [1]
    """
    if not high > low:
        return np.where(np.isfinite(values), (count - 1) / 2.0, np.nan)
    return np.clip((values - low) / (high - low), 0.0, 1.0) * (count - 1)


def polyline(px: Floats, py: Floats, columns: int, rows: int, dash: tuple[int, int] | None = None) -> Dots:
    """Straight lines through dot positions; ``py`` counts downward from the top.

    Parameters
    ----------
    px, py : ndarray
        Shape (n,); a point that is no number breaks the line. [1]
    columns, rows : int
        Size of the picture in dots. [1]
    dash : tuple of int, optional
        Dots drawn, dots left out, along the line. [1]

    Returns
    -------
    ndarray of bool
        Shape (rows, columns). [1]
    """
    picture = np.zeros((rows, columns), dtype=np.bool_)
    good = np.isfinite(px) & np.isfinite(py)
    if len(px) == 1 and good[0]:
        picture[round(float(py[0])), round(float(px[0]))] = True
    whole = good[:-1] & good[1:]
    if not whole.any():
        return picture
    x, y = px[:-1][whole], py[:-1][whole]
    dx, dy = np.diff(px)[whole], np.diff(py)[whole]
    steps = np.maximum(np.ceil(np.maximum(np.abs(dx), np.abs(dy))).astype(np.int64), 1) + 1
    before = np.repeat(np.cumsum(steps) - steps, steps)
    share = (np.arange(int(steps.sum())) - before) / np.repeat(steps - 1, steps)
    at_x = np.rint(np.repeat(x, steps) + share * np.repeat(dx, steps)).astype(np.int64)
    at_y = np.rint(np.repeat(y, steps) + share * np.repeat(dy, steps)).astype(np.int64)
    if dash is not None:
        drawn = _along(at_x, at_y) % sum(dash) < dash[0]
        at_x, at_y = at_x[drawn], at_y[drawn]
    picture[at_y, at_x] = True
    return picture


def _along(x: NDArray[np.int64], y: NDArray[np.int64]) -> NDArray[np.int64]:
    """Way along a chain of dots, counted in dots. [1]"""
    moved = np.maximum(np.abs(np.diff(x)), np.abs(np.diff(y)))
    return np.concatenate((np.zeros(1, dtype=np.int64), np.cumsum(moved)))


def cells(picture: Dots, glyphs: Glyphs) -> list[list[str]]:
    """Rows of one character a cell; a blank where no dot is.

    Parameters
    ----------
    picture : ndarray of bool
        Shape (rows, columns) in dots, whole cells. [1]
    glyphs : {"braille", "block", "ascii"}

    Returns
    -------
    list of list of str
    """
    across, down = dots(glyphs)
    height, width = picture.shape[0] // down, picture.shape[1] // across
    grouped = picture.reshape(height, down, width, across)
    if glyphs == "braille":
        codes = (grouped * _BRAILLE[:, None, :]).sum(axis=(1, 3))
        return [[chr(0x2800 + code) if code else " " for code in row] for row in codes.tolist()]
    if glyphs == "block":
        halves = grouped[:, 0, :, 0] + 2 * grouped[:, 1, :, 0].astype(np.int64)
        return [[_BLOCK[code] for code in row] for row in halves.tolist()]
    return [["." if dot else " " for dot in row] for row in picture.tolist()]


def step_for(low: float, high: float, most: int) -> float:
    """Least of 1, 2 or 5 times a power of ten that needs no more than ``most`` ticks around both ends.

    Parameters
    ----------
    low, high : float
        Ends of the data, ``high`` above ``low``. [1]
    most : int
        At least 2. [1]

    Returns
    -------
    float
    """
    power = 10.0 ** np.floor(np.log10((high - low) / most))
    steps = [float(factor * power) for factor in (0.5, 1.0, 2.0, 5.0, 10.0, 20.0, 50.0)]
    return next((step for step in steps if len(_whole(low, high, step)) <= most), steps[-1])


def _whole(low: float, high: float, step: float) -> range:
    """Numbers of the steps from the one at or below ``low`` to the one at or above ``high``."""
    return range(int(np.floor(low / step + 1e-9)), int(np.ceil(high / step - 1e-9)) + 1)


def rounded(low: float, high: float, most: int) -> list[float]:
    """Ticks whose first is at or below ``low`` and whose last at or above ``high``.

    Parameters
    ----------
    low, high : float
        Least and greatest value to be shown; equal ones are widened. [1]
    most : int
        Ticks that there is room for; 3 are always taken for granted. [1]

    Returns
    -------
    list of float
        Rising, at least two.
    """
    if not high - low > NOTHING * max(abs(low), abs(high)):
        half = abs(low) * 0.1 or 1.0
        low, high = low - half, high + half
    step = step_for(low, high, max(most, 3))
    found = [number * step for number in _whole(low, high, step)]
    return found if len(found) > 1 else [found[0], found[0] + step]


def inside(low: float, high: float, most: int) -> list[float]:
    """Round values between two ends that are kept as they are; at least the lower end."""
    if not high > low:
        return [low]
    step = step_for(low, high, max(most, 2))
    found = [number * step for number in _whole(low, high, step)]
    return [value for value in found if low - 1e-9 * step <= value <= high + 1e-9 * step] or [low]
