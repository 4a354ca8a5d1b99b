"""What a plot shows: curves over axes. Data only; the drawing is in ``chart``."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    import numpy as np
    from numpy.typing import NDArray


@dataclass(frozen=True, slots=True, kw_only=True)
class Axis:
    """Unit of an axis, and the values that must be on it.

    Attributes
    ----------
    unit : str
        ``"bar gauge"``.
    include : tuple of float
        In the unit shown. [1]
    tight : bool
        Ends at the data, not at whole ticks.
    """

    unit: str
    include: tuple[float, ...] = ()
    tight: bool = False


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class Curve:
    """One line of a plot.

    Attributes
    ----------
    name : str
        For the legend.
    mark : str
        One character that stands on the line and in the legend, so that no colour is needed.
    x, y : ndarray
        Shape (n,), in the units of the axes. [1]
    tone : int
        Colour of the theme, 1 to 4. [1]
    dash : tuple of int or None
        Dots drawn, dots left out.
    at : ndarray or None
        Shape (n,), what the reading line moves along where that is not ``x`` (a loop runs over time). [1]
    """

    name: str
    mark: str
    x: NDArray[np.float64]
    y: NDArray[np.float64]
    tone: int = 1
    dash: tuple[int, int] | None = None
    at: NDArray[np.float64] | None = None


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class Picture:
    """All of one plot.

    Attributes
    ----------
    title : str
        What is read upward; the unit is put behind it.
    x, y : Axis
    curves : tuple of Curve
        The last is drawn over the others. One alone needs no legend.
    reads : str
        Unit of the reading line's place, where it is not the horizontal axis's.
    gutter : int
        Cells to the left of the frame, at least: plots below each other then share their axis. [1]
    """

    title: str
    x: Axis
    y: Axis
    curves: tuple[Curve, ...]
    reads: str = ""
    gutter: int = 0
