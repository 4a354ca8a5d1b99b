"""Nothing is cut off, at any of the terminals that the screens are made for."""

from __future__ import annotations

from typing import Any

import pytest
from rich.cells import cell_len
from textual.pilot import Pilot
from textual.screen import Screen
from textual.widget import Widget
from textual.widgets import Static

from tests.tui.bench import BORE, SIZES, Quick, field, one, plant, seen, settled, until
from tui.actions import key_line
from tui.widgets.field import Field
from tui.widgets.keys import Keys

MATTER = ["Help", "Cylinder", "Stroke", "Working", "Cautions", "Side", "Save", "Quit"]
"""Keys that must have room everywhere: the first of the line of keys."""


def cut(screen: Screen[Any]) -> list[str]:
    """Widgets of which a part can neither be seen nor be scrolled to."""
    found = []
    for widget in screen.walk_children(Widget):
        if not all(node.display for node in widget.ancestors_with_self if isinstance(node, Widget)):
            continue
        place = screen.find_widget(widget)
        holders = [node for node in widget.ancestors if isinstance(node, Widget) and node is not screen]
        scrolls = any(node.is_scrollable and node.allow_vertical_scroll for node in holders)
        if place.region.intersection(place.clip) != place.region and not scrolls:
            found.append(f"{widget!r} {place.region} in {place.clip}")
        if isinstance(widget, Static):
            needed = widget.get_content_height(widget.size, screen.size, widget.size.width)
            if needed > widget.size.height and not scrolls:
                found.append(f"{widget!r} needs {needed} lines, has {widget.size.height}")
    return found


def whole(app: Quick, size: tuple[int, int]) -> None:
    """Check the picture and every widget in it."""
    rows = seen(app)
    assert len(rows) == size[1]
    assert all(cell_len(row) == size[0] for row in rows)
    assert cut(app.screen) == []


@pytest.mark.parametrize("size", SIZES, ids=str)
async def test_both_workspaces_are_whole_with_and_without_problems(size: tuple[int, int]) -> None:
    app = Quick(plant())
    async with app.run_test(size=size) as pilot:
        await settled(app, pilot)
        for key in ("f3", "f2", "f9", "f3", "f9", "ctrl+r", "f2"):
            await pilot.press(key)
            await pilot.pause()
            whole(app, size)
        await pilot.press("f9")
        await pilot.pause()
        assert app.desk.query_one("#view").size.width >= size[0] - 2
        await pilot.press("f9")
        await scrolled(app, pilot)
        for path, text in ((BORE, "0 mm"), (BORE.replace("bore", "rod"), "wide"), ("site.ambient_pressure", "1 bar")):
            app.session = app.session.edited(path, text)
        await settled(app, pilot)
        assert app.desk.problems
        whole(app, size)


async def scrolled(app: Quick, pilot: Pilot[Any]) -> None:
    """The last field and the last figure can be brought into view."""
    last = [item for item in app.desk.query(Field) if item.display][-1]
    last.focus()
    await until(pilot, lambda: last.region.bottom <= app.desk.query_one("#sheet").region.bottom)
    assert last.spec.label in "\n".join(seen(app))
    await pilot.press("f6", "end")
    await pilot.pause()
    assert any("›" in row for row in seen(app))


@pytest.mark.parametrize("size", [SIZES[0], SIZES[-1]], ids=str)
async def test_windows_are_whole(size: tuple[int, int]) -> None:
    app = Quick(plant())
    async with app.run_test(size=size) as pilot:
        await settled(app, pilot)
        for key in ("f1", "f4", "f5", "ctrl+g", "f12"):
            await pilot.press(key)
            await pilot.pause()
            await pilot.pause()
            assert app.screen is not app.desk, key
            whole(app, size)
            await pilot.press("escape")
            await pilot.pause()
        await pilot.press("1", "ctrl+q")
        await pilot.pause()
        whole(app, size)


@pytest.mark.parametrize("width", [size[0] for size in SIZES])
def test_the_keys_that_matter_have_room(width: int) -> None:
    keys = Keys(key_line()).fitting(width)
    assert [name for _, name, _ in keys[:8]] == MATTER
    assert sum(len(key) + 1 + len(name) for key, name, _ in keys) + len(keys) - 1 <= width


async def test_labels_and_texts_of_fields_have_room_at_eighty_columns() -> None:
    app = Quick(plant())
    async with app.run_test(size=(80, 24)) as pilot:
        await settled(app, pilot)
        for item in app.desk.query(Field):
            assert len(item.spec.label) <= item.label_width
            if not item.display:
                continue
            assert item.outer_size.width - item.label_width - 4 >= 15, "1.2 dm3/(s*bar) has to fit"


async def test_a_cut_widget_is_found() -> None:
    app = Quick(one())
    async with app.run_test(size=(80, 24)) as pilot:
        await settled(app, pilot)
        app.desk.query_one("#verdict").styles.max_height = 1
        await app.desk.mount(Static("one\ntwo\nthree", id="planted"))
        app.desk.query_one("#planted").styles.height = 1
        await pilot.pause()
        assert any("planted" in fault for fault in cut(app.desk))


async def test_a_long_problem_is_wrapped_below_its_field() -> None:
    app = Quick(one())
    async with app.run_test(size=(80, 24)) as pilot:
        await settled(app, pilot)
        await pilot.press(*" or so")
        await settled(app, pilot)
        bore = field(app, BORE)
        told = " ".join(bore.problem.split())
        rows = [row[: bore.outer_size.width] for row in seen(app)]
        start = next(number for number, row in enumerate(rows) if "└" in row)
        below = " ".join(" ".join(row.replace("└", " ") for row in rows[start : start + bore.size.height + 4]).split())
        assert told in below


async def test_a_resized_terminal_is_filled_again() -> None:
    app = Quick(one())
    async with app.run_test(size=(160, 50)) as pilot:
        await settled(app, pilot)
        await pilot.press("f3")
        for size in ((80, 24), (120, 36), (160, 50)):
            await pilot.resize_terminal(*size)
            await pilot.pause(0.1)
            whole(app, size)
