"""Figures of one place as rows and tables of plain text."""

from __future__ import annotations

import textwrap
from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass

from actuator.errors import Refusal
from actuator.report.figures import FIGURES, At, Figure
from actuator.report.shown import Shown

WIDTH = 100
"""Columns of the text view. [1]"""
_LABEL, _CELL = 34, 16
REFUSED = "refused"


@dataclass(frozen=True, slots=True)
class Cell:
    """One number of a table, or the reason why there is none."""

    number: str
    unit: str
    reason: str = ""


def cell(figure: Figure, at: At, shown: Shown) -> Cell:
    """Value of a figure as a cell."""
    value = figure.value(at)
    if isinstance(value, Refusal):
        return Cell(REFUSED, shown.number(0.0, figure.kind)[1], value.reason)
    return Cell(*shown.number(value, figure.kind))


def groups(at: At) -> dict[str, list[Figure]]:
    """Figures of a place by the heading that they stand under, in order."""
    found: dict[str, list[Figure]] = {}
    for figure in FIGURES[at.level].values():
        found.setdefault(figure.group, []).append(figure)
    return found


def wrapped(text: str, first: str = "  ", others: str = "    ") -> list[str]:
    """Text in lines of the view's width."""
    return textwrap.wrap(text, WIDTH, initial_indent=first, subsequent_indent=others)


def line(label: str, cells: Sequence[str], unit: str = "") -> str:
    """One row: label, right-aligned cells, unit."""
    numbers = "".join(f"{text:>{_CELL}}" for text in cells)
    return f"  {label:<{_LABEL}}{numbers}  {unit}".rstrip()


def head(title: str, columns: Sequence[str], unit: str = "unit") -> list[str]:
    """Heading of a table, underlined."""
    text = f"{title:<{_LABEL + 2}}" + "".join(f"{name:>{_CELL}}" for name in columns) + f"  {unit}"
    return ["", text.rstrip(), "-" * len(text.rstrip())]


def reasons(cells: Iterable[tuple[str, Cell]]) -> Iterator[str]:
    """Why cells are refused, one line a reason with the figures that it goes for."""
    found: dict[str, list[str]] = {}
    for label, item in cells:
        if item.reason:
            found.setdefault(item.reason, []).append(label)
    for reason, labels in found.items():
        yield from wrapped(f"refused: {', '.join(dict.fromkeys(labels))}: {reason}")


def table(title: str, figures: Sequence[Figure], at: At, shown: Shown) -> list[str]:
    """A group of figures: one row each, or one row for both directions.

    Parameters
    ----------
    title : str
        Heading.
    figures : sequence of Figure
        Of the place's level; those without a direction stand below those with one.
    at : At
    shown : Shown

    Returns
    -------
    list of str
        Lines, heading first; reasons of what is refused last.
    """
    directed = [figure for figure in figures if figure.direction]
    single = [figure for figure in figures if not figure.direction]
    lines = head(title, ("extend", "retract") if directed else ("value",))
    rows: dict[str, list[Figure]] = {}
    for figure in directed + single:
        rows.setdefault(figure.row, []).append(figure)
    seen: list[tuple[str, Cell]] = []
    for row in rows.values():
        if directed and row[0] in single[:1]:
            lines.append(line("", ("value",)))
        cells = [cell(figure, at, shown) for figure in row]
        seen += [(f"{figure.label} {figure.direction}".rstrip(), item) for figure, item in zip(row, cells, strict=True)]
        lines.append(line(row[0].label, [item.number for item in cells], cells[0].unit))
    return lines + list(reasons(seen))


def share_table(title: str, items: Sequence[tuple[Figure, Figure | None]], at: At, shown: Shown, of: str) -> list[str]:
    """Figures with their shares of the first.

    Parameters
    ----------
    title : str
        Heading.
    items : sequence of (Figure, Figure or None)
        Figure and its share; None for the whole itself.
    at : At
    shown : Shown
    of : str
        What the shares are of, for the heading.

    Returns
    -------
    list of str
    """
    lines = head(title, ("value", of))
    seen: list[tuple[str, Cell]] = []
    for figure, share in items:
        value = cell(figure, at, shown)
        part = cell(share, at, shown) if share is not None else Cell("100", "%")
        seen.append((figure.label, value))
        text = part.number if part.reason else f"{part.number} {part.unit}"
        lines.append(line(figure.label, (value.number, text), value.unit))
    return lines + list(reasons(seen))
