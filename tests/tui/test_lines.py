"""Tables of figures: every line as wide as its column, nothing cut, rows found again by place."""

from __future__ import annotations

import pytest
from rich.cells import cell_len

from tests.tui.bench import ONE, plant, solved
from tui.shown import View, cylinder_sections, ledger_sections, stroke_sections
from tui.tables import Row, Section
from tui.widgets.bars import bar
from tui.widgets.lines import GAP, lay_out, section_lines

SECTION = Section(
    title="Static force",
    heads=("extend", "retract"),
    rows=(
        Row(name="a", label="Theoretical force", cells=("1178", "989.6"), unit="N"),
        Row(name="b", label="Force reserve", cells=("2.73", "–"), unit="", reasons=("retract: no load",)),
    ),
)


def words(section: Section, width: int) -> list[str]:
    """Lines of a section as text."""
    return ["".join(text for text, _ in line.parts) for line in section_lines(section, width)]


def test_numbers_stand_below_the_names_of_their_columns() -> None:
    assert words(SECTION, 42) == [
        "Static force ──────────── extend retract  ",
        " Theoretical force          1178   989.6 N",
        " Force reserve              2.73       –  ",
        "   retract: no load                       ",
    ]


def test_a_label_that_has_no_room_beside_the_numbers_stands_above_them() -> None:
    lines = words(SECTION, 24)
    place = next(number for number, line in enumerate(lines) if "Theoretical force" in line)
    assert "1178" in lines[place + 1]


@pytest.mark.parametrize("width", [24, 35, 37, 52, 75, 106, 158])
@pytest.mark.parametrize("document", [ONE, plant().source], ids=["one", "plant"])
def test_real_tables_fill_their_columns_and_cut_no_label(width: int, document: str) -> None:
    view = View(answer=solved(document), machine=0, actuator=0)
    for sections in (cylinder_sections(view), stroke_sections(view), ledger_sections(view)):
        layout = lay_out(sections, width, 36)
        assert len(layout.columns) * (layout.width + GAP) - GAP <= width
        for column in layout.columns:
            for line in column:
                text = "".join(part for part, _ in line.parts)
                assert cell_len(text) == layout.width, (text, layout.width)
                assert width < 35 or "…" not in text, text


def test_columns_keep_the_order_of_sections_and_are_about_equally_long() -> None:
    view = View(answer=solved(ONE), machine=0, actuator=0)
    sections = cylinder_sections(view)
    layout = lay_out(sections, 120, 36)
    assert len(layout.columns) == 3
    assert layout.names == [row.name for section in sections for row in section.rows]
    blocks = [len(section_lines(section, layout.width)) + 1 for section in sections]
    assert layout.height <= sum(blocks) / 3 + max(blocks)


def test_a_row_is_found_by_its_name_and_by_its_place() -> None:
    layout = lay_out((SECTION, SECTION), 90, 36)
    place = layout.place("b")
    assert place is not None
    column, top, _ = place
    assert layout.row_at(column * (layout.width + GAP), top) == "b"
    assert layout.row_at(0, 0) == ""
    assert layout.row_at(0, 999) == ""
    assert layout.place("nowhere") is None


def test_changes_against_the_pin_stand_below_their_numbers() -> None:
    row = Row(name="a", label="Stroke time", cells=("0.535", "0.749"), unit="s", changes=("+0.012", "="))
    lines = words(Section(title="Motion", rows=(row,)), 40)
    assert "from the pin" in lines[2]
    assert "+0.012" in lines[2]
    assert lines[1].index("0.749") + len("0.749") == lines[2].rindex("=") + 1


@pytest.mark.parametrize(
    ("share", "drawn"),
    [(0.0, "    "), (1.0, "████"), (0.5, "██  "), (0.0006, "▏   "), (0.0004, "    "), (-0.2, "    "), (7, "████")],
)
def test_bars_are_as_long_as_their_share(share: float, drawn: str) -> None:
    assert bar(share, 4) == drawn


def test_bars_in_ascii() -> None:
    assert [bar(share, 4, plain=True) for share in (0.0, 0.001, 0.5, 1.0)] == ["    ", "#   ", "##  ", "####"]
