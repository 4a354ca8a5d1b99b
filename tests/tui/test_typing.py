"""Keys that come faster than the screen can answer keep their order, and none is lost."""

from __future__ import annotations

import asyncio

from textual import events

from tests.tui.bench import BORE, Quick, one
from tui.widgets.field import Field

BURST = ["end", *["backspace"] * 8, *"6", *"3", "space", *"mm"]


async def test_a_burst_of_keys_is_typed_in_order() -> None:
    app = Quick(one())
    async with app.run_test(size=(80, 24)) as pilot:
        await pilot.pause()
        field = next(item for item in app.screen.query(Field) if item.spec.path == BORE)
        field.focus()
        await pilot.pause()
        for _ in range(10):
            for key in BURST:
                app.post_message(events.Key(key, key if len(key) == 1 else " " if key == "space" else None))
                await asyncio.sleep(0)
            await pilot.pause(0.05)
            assert field.value == app.session.text(BORE) == "63 mm"


async def test_what_is_typed_but_not_taken_yet_is_not_overwritten() -> None:
    app = Quick(one())
    async with app.run_test(size=(80, 24)) as pilot:
        await pilot.pause()
        field = next(item for item in app.screen.query(Field) if item.spec.path == BORE)
        field.value = "63 mm"  # typed; its report is on the way
        field.put("50 mm")  # an answer to an older text arrives before
        assert field.value == "63 mm"
        await pilot.pause()
        assert app.session.text(BORE) == "63 mm"
        field.put("50 mm")
        assert field.value == "50 mm"
