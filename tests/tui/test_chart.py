"""The drawing of a picture: whole at any size, legend with marks, reading line, and how it looks."""

from __future__ import annotations

import numpy as np
from hypothesis import given, settings
from hypothesis import strategies as st
from rich.cells import cell_len

from tui.widgets.chart import Drawn, draw, number
from tui.widgets.legend import reading
from tui.widgets.picture import Axis, Curve, Picture
from tui.widgets.raster import Glyphs

TIME = np.linspace(0.0, 4.0, 401)


def ramp(y: np.ndarray[tuple[int], np.dtype[np.float64]] | None = None) -> Picture:
    """A position that rises for a second, stays, and falls."""
    values = np.interp(TIME, [0.0, 1.0, 2.0, 3.0, 4.0], [0.0, 400.0, 400.0, 0.0, 0.0]) if y is None else y
    curve = Curve(name="piston", mark="◆", x=TIME, y=values)
    return Picture(title="Position", x=Axis(unit="s", tight=True), y=Axis(unit="mm"), curves=(curve,))


def loop() -> Picture:
    """A p-V loop with a rectangle behind it."""
    turn = np.linspace(0.0, 2.0 * np.pi, 500)
    ideal = Curve(
        name="ideal",
        mark="◇",
        x=np.array([20.0, 800.0, 800.0, 20.0, 20.0]),
        y=np.array([6.0, 6.0, 0.0, 0.0, 6.0]),
        tone=4,
        dash=(3, 3),
    )
    simulated = Curve(
        name="simulated",
        mark="●",
        x=410.0 + 390.0 * np.cos(turn),
        y=3.0 + 2.5 * np.sin(turn),
        tone=2,
        at=turn / (2.0 * np.pi) * 4.0,
    )
    axis = Axis(unit="cm3", include=(0.0,))
    return Picture(title="p-V", x=axis, y=Axis(unit="bar gauge"), curves=(ideal, simulated), reads="s")


def text(drawn: Drawn) -> list[str]:
    """Rows without their tones."""
    return ["".join(char for char, _ in row) for row in drawn.rows]


@settings(deadline=None, max_examples=60)
@given(
    st.integers(1, 120),
    st.integers(1, 40),
    st.sampled_from(["braille", "block", "ascii"]),
    st.none() | st.floats(-1.0, 5.0),
)
def test_every_size_is_filled_exactly(width: int, height: int, glyphs: Glyphs, at: float | None) -> None:
    for picture in (ramp(), loop()):
        rows = text(draw(picture, width, height, glyphs, at))
        assert len(rows) == height
        assert all(cell_len(row) == width for row in rows)


def test_a_larger_window_gives_a_larger_drawing() -> None:
    small, large = draw(ramp(), 40, 10, "braille"), draw(ramp(), 80, 20, "braille")
    assert large.count > small.count


def test_the_ramp_looks_like_a_ramp_in_ascii() -> None:
    assert [row.rstrip() for row in text(draw(ramp(), 31, 9, "ascii"))] == [
        "Position [mm]",
        "400|      ........",
        "   |    ...      ..",
        "   |   ..         ...",
        "200|  ..            ..",
        "   | ..              ..",
        "  0|..                ........",
        "   ++-----------+------------+",
        "    0           2           4 s",
    ]


def test_the_ramp_looks_like_a_ramp_in_braille() -> None:
    assert [row.rstrip() for row in text(draw(ramp(), 31, 9, "braille"))] == [
        "Position [mm]",
        "400┤     ⢠⠏⠉⠉⠉⠉⠉⠉⢧",
        "   │    ⢠⠏        ⢣⡀",
        "   │   ⢠⠋          ⢳⡀",
        "200┤  ⣰⠃            ⠱⡄",
        "   │ ⡰⠃              ⠹⡄",
        "  0┤⡼⠁                ⠹⣄⣀⣀⣀⣀⣀⣀",
        "   └┬───────────┬────────────┬",
        "    0           2           4 s",
    ]


def test_names_stand_in_the_legend_with_their_marks_and_the_marks_on_the_lines() -> None:
    rows = text(draw(loop(), 60, 16, "braille"))
    assert "◇ ideal" in rows[0]
    assert "● simulated" in rows[0]
    assert "[bar gauge]" in rows[0]
    assert any("◇" in row for row in rows[1:])
    assert any("●" in row for row in rows[1:])
    assert rows[-1].rstrip().endswith("cm3")


def test_a_long_legend_is_wrapped_not_cut() -> None:
    rows = text(draw(loop(), 24, 14, "braille"))
    head = " ".join(rows[:3])
    assert "p-V [bar gauge]" in head
    assert "ideal" in head
    assert "simulated" in head


def test_one_curve_alone_has_neither_legend_nor_marks() -> None:
    assert not any("◆" in row for row in text(draw(ramp(), 60, 12, "braille")))


def test_the_reading_line_gives_place_and_value() -> None:
    rows = text(draw(ramp(), 60, 12, "braille", at=0.5))
    assert "200.0" in rows[0]
    assert "0.500 s" in rows[-1]
    assert any("│" in row[5:] for row in rows[1:])


def test_on_a_loop_the_reading_line_is_a_cross_at_the_time_asked_for() -> None:
    rows = text(draw(loop(), 60, 16, "braille", at=1.0))  # a quarter of the turn: the top of the loop
    assert "at 1.000 s" in rows[0]
    assert "5.500" in rows[0]
    cross = [(y, row.index("✚")) for y, row in enumerate(rows) if "✚" in row]
    assert len(cross) == 1
    y, x = cross[0]
    assert y < 6
    assert 25 < x < 36


def test_gaps_and_nothing_at_all_are_drawn_without_fault() -> None:
    hole = np.where((TIME > 1.5) & (TIME < 2.5), np.nan, 5.0)
    assert text(draw(ramp(hole), 50, 10, "braille"))
    nothing = np.full(len(TIME), np.nan)
    assert text(draw(ramp(nothing), 50, 10, "braille", at=1.0))
    empty = Curve(name="none", mark="x", x=np.zeros(0), y=np.zeros(0))
    picture = Picture(title="Empty", x=Axis(unit="s"), y=Axis(unit="mm"), curves=(empty,))
    assert text(draw(picture, 50, 10, "braille", at=1.0))[0].startswith("Empty [mm]")


def test_ticks_have_the_decimals_of_their_step() -> None:
    assert [number(value, 0.5) for value in (-1.0, -0.5, 0.0, 0.5)] == ["−1.0", "−0.5", "0.0", "0.5"]
    assert number(400.0, 200.0) == "400"
    assert number(2e6, 1e6) == "2e+06"


def test_readings_are_given_to_a_thousandth_of_their_axis() -> None:
    assert [reading(value, 6.0) for value in (0.0, 5.9996, -1e-9, float("nan"))] == ["0.000", "6.000", "0.000", "–"]
    assert reading(312.04, 400.0) == "312.0"
    assert reading(-0.25, 2.0) == "−0.250"
    assert reading(1234567.0, 2e6) == "1234567"


def test_values_at_the_reading_line_take_no_more_lines_than_names() -> None:
    for width in range(20, 80):
        without = text(draw(loop(), width, 16, "braille"))
        along = text(draw(loop(), width, 16, "braille", at=1.0))
        frame = [next(number for number, row in enumerate(rows) if "┤" in row) for rows in (without, along)]
        assert frame[0] == frame[1], width


def test_the_picture_keeps_its_height_where_whole_ticks_would_cost_too_much() -> None:
    rows = text(draw(ramp(np.interp(TIME, [0.0, 4.0], [0.0, 6.0])), 40, 6, "braille"))
    assert rows[1].strip(" │┤")  # the curve reaches the top row
