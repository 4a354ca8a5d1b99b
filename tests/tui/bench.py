"""What the tests of the screens share: a document, an app that computes at once, and ways to wait."""

from __future__ import annotations

import asyncio
import time
from collections.abc import Callable
from functools import cache
from pathlib import Path
from typing import Any

from textual.pilot import Pilot

from actuator.answer import Answer, work_out
from actuator.parts import Project
from actuator.project.document import Document, demo, parse
from actuator.project.validate import validate
from actuator.settings import Settings
from tui.app import Design
from tui.session import Session
from tui.widgets.field import Field

SIZES = [(80, 24), (120, 36), (160, 50)]
"""Terminals that every screen has to be whole in. [1]"""

ONE = """\
format = 1
title = "One cylinder"            # kept

[[machine]]
name = "Press"
supply_pressure = "6 bar gauge"
cycle_time = "4 s"

[[machine.actuator]]
name = "Ram"
bore = "50 mm"                    # a comment
rod = "20 mm"
stroke = "400 mm"

[machine.actuator.load]
mass = "20 kg"
extend_force = "300 N"

[machine.actuator.valve]
supply_c = "2.0 dm3/(s*bar)"

[machine.actuator.require]
stroke_time = "1.5 s"
force_reserve = "30 %"
"""
"""A valid document with one actuator; an invented example."""
BORE = "machine.1.actuator.1.bore"


def one(path: Path | None = None) -> Document:
    """The document with one actuator; written to ``path`` where one is given."""
    if path is not None:
        path.write_text(ONE, encoding="utf-8")
    return parse(ONE, path)


@cache
def solved(text: str) -> Answer:
    """Real answer of a document, worked out once for all tests."""
    return work_out(parse(text))


class Quick(Design):
    """Validates every edit for real, and shows the figures of the first document for any that is valid.

    It computes in the event loop at once, so that tests need not wait.
    """

    def __init__(self, document: Document, settings: Settings | None = None) -> None:
        super().__init__(document, settings or Settings())
        self.asked: list[Document] = []
        self.known = solved(document.to_toml())

    def solve(self, session: Session, previous: Answer | None) -> Any:
        """Answer in place of the worker."""
        self.asked.append(session.document)
        checked = validate(session.document)
        if isinstance(checked, Project):
            answer = Answer(document=session.document, problems=(), project=checked, analysis=self.known.analysis)
        else:
            answer = Answer(document=session.document, problems=checked, project=None, analysis=None)
        self.post_message(self.Solved(session.revision, answer))
        return None


def plant() -> Document:
    """The demo plant: three actuators in two machines."""
    return demo()


async def settled(app: Design, pilot: Pilot[Any], limit: float = 60.0) -> None:
    """Wait until the answer of the present revision is shown."""
    end = time.monotonic() + limit
    while app.answered != app.session.revision:
        assert time.monotonic() < end, "no answer came"
        await pilot.pause(0.01)
    await pilot.pause()


async def until(pilot: Pilot[Any], condition: Callable[[], bool], limit: float = 60.0) -> None:
    """Wait until a condition holds."""
    end = time.monotonic() + limit
    while not condition():
        assert time.monotonic() < end, "it never came about"
        await pilot.pause(0.01)


async def drain(app: Design, rounds: int = 3) -> None:
    """Wait until no widget has a message waiting."""
    quiet = 0
    while quiet < rounds:
        await asyncio.sleep(0)
        nodes = (app, app.screen, *app.screen.walk_children(), *app.desk.walk_children())
        quiet = 0 if any(node.message_queue_size for node in nodes) else quiet + 1


def seen(app: Design) -> list[str]:
    """Text of the screen, row by row."""
    strips = app.screen._compositor.render_strips()
    return ["".join(segment.text for segment in strip if not segment.control) for strip in strips]


def field(app: Design, path: str) -> Field:
    """The field of a path."""
    found = app.desk.query_one("#sheet").query(Field)
    return next(item for item in found if item.spec.path == path)


def shows(app: Design, *texts: str) -> bool:
    """Whether all texts are on the screen."""
    everything = "\n".join(seen(app))
    return all(text in everything for text in texts)


def at_desk(app: Design) -> bool:
    """Whether no window stands over the desk."""
    return app.screen is app.desk
