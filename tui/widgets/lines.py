"""Sections of figures laid out in lines of a given width. No widget here."""

from __future__ import annotations

from dataclasses import dataclass, replace
from textwrap import wrap

from tui.tables import Row, Section
from tui.widgets.bars import bar

TITLE, BODY, NUMBER, NOTE, CHANGE, BAR = "title", "body", "number", "note", "change", "bar"

Part = tuple[str, str]
"""Text and what it is."""

GAP = 3
"""Cells between two columns of sections. [1]"""
BAR_LEAST = 9
"""Cells below which a bar gets a line of its own. [1]"""


@dataclass(frozen=True, slots=True)
class Line:
    """One line of a column.

    Attributes
    ----------
    parts : tuple of Part
        Together as wide as the column.
    row : str
        Name of the row that it belongs to; empty for headings.
    first : bool
        Whether it is the first line of its row.
    """

    parts: tuple[Part, ...]
    row: str = ""
    first: bool = False


@dataclass(frozen=True, slots=True)
class Layout:
    """Columns of lines, side by side.

    Attributes
    ----------
    columns : tuple of tuple of Line
    width : int
        Of one column. [1]
    """

    columns: tuple[tuple[Line, ...], ...]
    width: int

    @property
    def height(self) -> int:
        """Lines of the longest column. [1]"""
        return max((len(column) for column in self.columns), default=0)

    def place(self, name: str) -> tuple[int, int, int] | None:
        """Column, first line and number of lines of a row."""
        for number, column in enumerate(self.columns):
            lines = [y for y, line in enumerate(column) if line.row == name]
            if lines:
                return number, lines[0], len(lines)
        return None

    def row_at(self, x: int, y: int) -> str:
        """Name of the row at a cell; empty where none is."""
        number = min(x // (self.width + GAP), len(self.columns) - 1)
        column = self.columns[number] if self.columns else ()
        return column[y].row if 0 <= y < len(column) else ""

    @property
    def names(self) -> list[str]:
        """All rows, column by column."""
        return list(dict.fromkeys(line.row for column in self.columns for line in column if line.row))


def _fit(text: str, width: int) -> str:
    return text.ljust(width) if len(text) <= width else text[: max(width - 1, 0)] + "…"


@dataclass(frozen=True, slots=True)
class _Shape:
    """Widths that a section's rows share, in cells: of each column of numbers, of the unit, of labels."""

    columns: tuple[int, ...]
    unit: int
    label: int

    def numbers(self, cells: tuple[str, ...], unit: str) -> str:
        """Numbers to the right of their columns, one alone in the last, then the unit."""
        filled = (*[""] * (len(self.columns) - len(cells)), *cells)
        text = "".join(" " + cell.rjust(wide) for cell, wide in zip(filled, self.columns, strict=True))
        return text + (" " + unit.ljust(self.unit) if self.unit else "")


def _shape(section: Section) -> _Shape:
    count = max((len(row.cells) for row in section.rows), default=1)
    columns = []
    for place in range(count):
        cells = [of[place] for row in section.rows for of in (row.cells, row.changes) if place < len(of)]
        cells += section.heads[place : place + 1]
        columns.append(max((len(cell) for cell in cells), default=0))
    return _Shape(
        columns=tuple(columns),
        unit=max((len(row.unit) for row in section.rows), default=0),
        label=max((len(row.label) for row in section.rows), default=0),
    )


def section_lines(section: Section, width: int, plain: bool = False) -> list[Line]:
    """Lay one section out.

    Parameters
    ----------
    section : Section
    width : int
        Of every line. [1]
    plain : bool
        Only characters of ASCII in bars.

    Returns
    -------
    list of Line
        Heading first, no blank line after.
    """
    shape = _shape(section)
    lines = _heading(section, shape, width, plain)
    for row in section.rows:
        made = _row_lines(row, shape, width, plain)
        lines += [replace(line, first=number == 0) for number, line in enumerate(made)]
    return lines


def _heading(section: Section, shape: _Shape, width: int, plain: bool) -> list[Line]:
    """Title, a rule, and the names of the columns, below it where they have no room beside it."""
    heads = shape.numbers(section.heads, "") if section.heads else ""
    title = _fit(section.title, width) if len(section.title) >= width else section.title + " "
    rule = width - len(title) - len(heads)
    if rule >= 0:
        return [Line(((title, TITLE), (("-" if plain else "─") * rule, NOTE), (heads, NOTE)))]
    line = ("-" if plain else "─") * max(width - len(title), 0)
    return [Line(((title, TITLE), (line, NOTE))), Line(((heads.rjust(width)[-width:], NOTE),))]


def _row_lines(row: Row, shape: _Shape, width: int, plain: bool) -> list[Line]:
    """Label and numbers, a bar, the change against the pin, and why a number is missing."""
    numbers = shape.numbers(row.cells, row.unit)
    room = width - len(numbers) - 1
    barred = room - shape.label - 2
    lines: list[Line] = []
    if not row.label:
        pass
    elif row.share is not None and barred >= BAR_LEAST:
        drawn = bar(row.share, barred, plain) + " "
        lines.append(Line(((" " + row.label.ljust(shape.label + 1), BODY), (drawn, BAR), (numbers, NUMBER)), row.name))
    elif len(row.label) + 2 + len(numbers.lstrip()) <= width:  # a long label may use the numbers' left margin
        label = " " + row.label.ljust(room)
        lines.append(Line(((label, BODY), (numbers[len(label) + len(numbers) - width :], NUMBER)), row.name))
    else:
        *above, last = wrap(row.label, max(width - 2, 10), break_on_hyphens=False)
        lines += [Line(((f" {part}".ljust(width), BODY),), row.name) for part in above]
        if above and len(last) + 2 + len(numbers.lstrip()) <= width:
            lines.append(
                Line(((f" {last}".ljust(width - len(numbers.lstrip())), BODY), (numbers.lstrip(), NUMBER)), row.name)
            )
        else:
            lines.append(Line(((f" {last}".ljust(width), BODY),), row.name))
            lines.append(Line(((numbers.rjust(width)[-width:], NUMBER),), row.name))
    if row.share is not None and barred < BAR_LEAST:
        lines.append(Line((("   " + bar(row.share, width - 4, plain) + " ", BAR),), row.name))
    if row.changes:
        text = shape.numbers(row.changes, row.unit)
        lines.append(Line((("   from the pin".ljust(width)[: width - len(text)] + text, CHANGE),), row.name))
    for reason in row.reasons:
        begin = "   " if row.label else " - "
        parts = wrap(reason, max(width, 12), initial_indent=begin, subsequent_indent="   ")
        lines += [Line(((_fit(part, width), NOTE),), row.name) for part in parts]
    return lines


def lay_out(sections: tuple[Section, ...], width: int, least: int, plain: bool = False) -> Layout:
    """Put sections in as many columns as there is room for, in reading order, about equally long.

    Parameters
    ----------
    sections : tuple of Section
    width : int
        Of the whole. [1]
    least : int
        Width that a column needs. [1]
    plain : bool
        Only characters of ASCII.

    Returns
    -------
    Layout
    """
    count = max(1, min((width + GAP) // (least + GAP), len(sections)))
    wide = (width - GAP * (count - 1)) // count
    blocks = [section_lines(section, wide, plain) for section in sections]
    best = _split([len(block) + 1 for block in blocks], count)
    columns = []
    for first, last in best:
        column: list[Line] = []
        for block in blocks[first:last]:
            if column:
                column.append(Line(((" " * wide, BODY),)))
            column += block
        columns.append(tuple(column))
    return Layout(tuple(columns), wide)


def _split(heights: list[int], count: int) -> list[tuple[int, int]]:
    """Ranges of blocks, in order, whose longest is as short as can be."""
    low, high = max(heights, default=0), sum(heights)
    while low < high:
        middle = (low + high) // 2
        if len(_filled(heights, middle)) <= count:
            high = middle
        else:
            low = middle + 1
    return _filled(heights, low)


def _filled(heights: list[int], limit: int) -> list[tuple[int, int]]:
    """Ranges when each column is filled up to a limit."""
    ranges: list[tuple[int, int]] = []
    first = used = 0
    for number, height in enumerate(heights):
        if used and used + height > limit:
            ranges.append((first, number))
            first, used = number, 0
        used += height
    ranges.append((first, len(heights)))
    return ranges
