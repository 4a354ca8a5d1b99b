"""Dots: lines without gaps, characters by the Unicode chart, round ticks."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from numpy.typing import NDArray

from tui.widgets.raster import cells, dots, inside, polyline, rounded, scaled


def connected(picture: NDArray[np.bool_]) -> bool:
    """Whether all dots hang together, diagonals included."""
    left = {(int(y), int(x)) for y, x in zip(*np.nonzero(picture), strict=True)}
    front = [left.pop()]
    while front:
        y, x = front.pop()
        near = {(y + dy, x + dx) for dy in (-1, 0, 1) for dx in (-1, 0, 1)} & left
        left -= near
        front += near
    return not left


def test_a_closed_loop_is_drawn_without_a_gap() -> None:
    turn = np.linspace(0.0, 2.0 * np.pi, 60)
    columns, rows = 80, 48
    picture = polyline(scaled(np.cos(turn), -1.0, 1.0, columns), scaled(np.sin(turn), -1.0, 1.0, rows), columns, rows)
    assert connected(picture)
    assert picture[:, 0].any()
    assert picture[:, -1].any()
    assert picture[0].any()
    assert picture[-1].any()
    assert not picture[rows // 2, columns // 2]


def test_a_far_jump_is_drawn_without_a_gap() -> None:
    picture = polyline(np.array([0.0, 39.0, 0.0]), np.array([0.0, 1.0, 23.0]), 40, 24)
    assert connected(picture)


def test_a_constant_lies_on_one_row_of_dots() -> None:
    values = scaled(np.full(50, 3.0), 0.0, 6.0, 25)
    picture = polyline(scaled(np.arange(50.0), 0.0, 49.0, 30), values, 30, 25)
    assert picture[12].all()
    assert picture.sum() == 30


def test_an_axis_without_length_puts_values_in_the_middle() -> None:
    assert scaled(np.array([5.0, np.nan]), 5.0, 5.0, 9)[0] == 4.0


def test_values_beyond_the_axis_are_drawn_on_its_edge() -> None:
    assert scaled(np.array([-10.0, 10.0]), 0.0, 1.0, 5).tolist() == [0.0, 4.0]


def test_what_is_no_number_is_a_gap_and_nothing_else() -> None:
    y = np.array([2.0, 2.0, np.nan, 2.0, np.inf, 2.0, 2.0])
    y = np.where(np.isfinite(y), y, np.nan)
    picture = polyline(np.array([0.0, 5.0, 6.0, 9.0, 12.0, 15.0, 19.0]), y, 20, 5)
    assert np.nonzero(picture.any(axis=0))[0].tolist() == [0, 1, 2, 3, 4, 5, 15, 16, 17, 18, 19]


def test_one_point_is_one_dot_and_no_point_is_none() -> None:
    assert polyline(np.array([3.0]), np.array([1.0]), 8, 4).sum() == 1
    assert polyline(np.array([]), np.array([]), 8, 4).sum() == 0


def test_dashes_leave_gaps_of_the_length_asked_for() -> None:
    picture = polyline(np.array([0.0, 29.0]), np.array([0.0, 0.0]), 30, 1, dash=(3, 2))
    assert picture[0].tolist() == [place % 5 < 3 for place in range(30)]


# The Unicode Standard, chart "Braille Patterns" U+2800: dot n sets bit n - 1; dots 1 2 3 7 stand in the left
# column from above, 4 5 6 8 in the right one.
BRAILLE = [((0, 0), 0x2801), ((1, 0), 0x2802), ((2, 0), 0x2804), ((0, 1), 0x2808)]
BRAILLE += [((1, 1), 0x2810), ((2, 1), 0x2820), ((3, 0), 0x2840), ((3, 1), 0x2880)]


@pytest.mark.parametrize(("dot", "code"), BRAILLE)
def test_braille_dots_are_those_of_the_unicode_chart(dot: tuple[int, int], code: int) -> None:
    picture = np.zeros((4, 2), dtype=np.bool_)
    picture[dot] = True
    assert cells(picture, "braille") == [[chr(code)]]


def test_blocks_and_ascii_show_the_same_dots() -> None:
    picture = np.array([[True, False, True], [True, True, False]])
    assert cells(picture, "block") == [["█", "▄", "▀"]]
    assert cells(picture, "ascii") == [[".", " ", "."], [".", ".", " "]]
    assert [dots(glyphs) for glyphs in ("braille", "block", "ascii")] == [(2, 4), (1, 2), (1, 1)]


finite = st.floats(-1e6, 1e6, allow_nan=False)


@given(finite, st.floats(1e-3, 1e3), st.integers(3, 12))
def test_rounded_axes_hold_their_values_with_few_even_ticks(low: float, share: float, most: int) -> None:
    high = low + share * max(abs(low), 1e-3)
    found = rounded(low, high, most)
    step = found[1] - found[0]
    assert found[0] <= low + 1e-6 * step
    assert found[-1] >= high - 1e-6 * step
    assert 2 <= len(found) <= most
    assert np.allclose(np.diff(found), step)
    mantissa = step / 10.0 ** np.floor(np.log10(step) + 1e-9)
    assert min(abs(mantissa - allowed) for allowed in (1.0, 2.0, 5.0)) < 1e-6


@given(finite, st.integers(2, 12))
def test_an_axis_of_one_value_is_widened(value: float, most: int) -> None:
    found = rounded(value, value, most)
    assert found[0] < found[-1]
    assert found[0] <= value <= found[-1]


@given(finite, st.floats(1e-3, 1e6), st.integers(2, 12))
def test_ticks_between_kept_ends_stay_between_them(low: float, length: float, most: int) -> None:
    high = low + length
    found = inside(low, high, most)
    slack = 1e-6 * length
    assert 1 <= len(found) <= most
    assert all(low - slack <= value <= high + slack for value in found)
