"""Hundreds of random keys: every field shows the document's text, and nothing falls over."""

from __future__ import annotations

import random

from textual import events

from tests.tui.bench import Quick, drain, plant, settled
from tui.widgets.field import Field

TYPED = [*"0123456789", ".", " ", "m", "b", "-", "x"]
MOVES = ["left", "right", "home", "end", "up", "down", "tab", "shift+tab", "pageup", "pagedown"]
CHANGES = ["backspace", "delete", "ctrl+w", "ctrl+u", "ctrl+k", "ctrl+z", "ctrl+z", "ctrl+y", "ctrl+down", "ctrl+up"]
VIEWS = ["f2", "f3", "f6", "f7", "f8", "f9", "ctrl+n", "ctrl+r", "ctrl+t", "enter", "escape", "f1", "f4", "f5"]
SEED = 1
KEYS = TYPED * 3 + MOVES * 2 + CHANGES * 2 + VIEWS


async def test_fields_show_the_document_whatever_is_pressed() -> None:
    keys = random.Random(SEED).choices(KEYS, k=220)
    app = Quick(plant())
    async with app.run_test(size=(80, 24)) as pilot:
        await settled(app, pilot)
        for number, key in enumerate(keys):
            app.post_message(events.Key(key, key if len(key) == 1 else None))
            await drain(app)
            wrong = [item.spec.path for item in app.desk.query(Field) if item.value != app.session.text(item.spec.path)]
            assert not wrong, (wrong, keys[max(0, number - 12) : number + 1])
        await settled(app, pilot)
        assert app.session.past
        while app.session.past:
            app.session = app.session.undone()
        await settled(app, pilot)
        assert app.session.document == plant()
