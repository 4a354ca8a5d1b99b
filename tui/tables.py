"""What the screens show of an answer: figures as rows of text, ready before anything is drawn."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True, kw_only=True)
class Row:
    """One figure, or the two directions of one.

    Attributes
    ----------
    name : str
        Unique among all rows: level and key without direction, ``"actuator/stroke_time"``.
    label : str
        Empty for a remark, which has only words.
    cells : tuple of str
        Numbers without unit: one, or extending and retracting.
    unit : str
    reasons : tuple of str
        Why a cell is refused, in words; empty where none is.
    changes : tuple of str
        Differences to the pinned state, like ``cells``; empty where nothing is pinned.
    share : float or None
        Length of a bar, as a share of the whole. [1]
    figures : tuple of str
        Level and key of each figure in it, ``"actuator/extend.stroke_time"``; what their working is asked by.
    """

    name: str
    label: str
    cells: tuple[str, ...]
    unit: str = ""
    reasons: tuple[str, ...] = ()
    changes: tuple[str, ...] = ()
    share: float | None = None
    figures: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True, kw_only=True)
class Section:
    """Rows below one heading; ``heads`` names their columns where there are two."""

    title: str
    rows: tuple[Row, ...]
    heads: tuple[str, ...] = ()
