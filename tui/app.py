"""The program on the screen: it owns the session, has answers worked out, and keeps drafts."""

from __future__ import annotations

import asyncio
import signal
from collections.abc import Iterable
from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING, Any, ClassVar

from textual import on, work
from textual.app import App, SystemCommand
from textual.binding import BindingType
from textual.message import Message
from textual.reactive import reactive
from textual.screen import Screen
from textual.widgets import Input
from textual.worker import get_current_worker

from actuator.errors import InputError, Problem
from actuator.settings import Settings, load_settings
from tui import actions, files
from tui.drafts import Drafts
from tui.screens.desk import Desk
from tui.session import Place, Session, places
from tui.solving import solved
from tui.terminal import console
from tui.widgets.field import Field

if TYPE_CHECKING:
    from actuator.answer import Answer
    from actuator.project.document import Document
    from actuator.unit_table import System
    from tui.widgets.raster import Glyphs

SETTLE = 0.15
"""Pause in typing after which an answer is worked out. [s]"""
DRAFT = 1.0
"""Pause after which the draft is written. [s]"""


class Design(App[int], inherit_bindings=False):
    """Edit a document and watch its answer. The session is the only state; screens show it."""

    CSS_PATH = Path(__file__).with_name("app.tcss")
    TITLE = "Pneumatic actuator design"
    NOTIFICATION_TIMEOUT = 3
    BINDINGS: ClassVar[list[BindingType]] = list(actions.bindings())

    session: reactive[Session] = reactive(None, init=False)  # type: ignore[arg-type]

    @dataclass
    class Solved(Message):
        """A calculation ended; it may be out of date already. Without an answer ``fault`` says why."""

        revision: int
        answer: Answer | None
        fault: str = ""

    def __init__(self, document: Document, settings: Settings) -> None:
        super().__init__()
        self.drafts = Drafts()
        self.settings = settings
        self.system: System = settings.units
        self.glyphs: Glyphs = "block" if console() else "braille"
        self.answer: Answer | None = None
        self.pin: Answer | None = None
        self.answered = -1
        self.place: Place = places(document)[0]
        self.set_reactive(Design.session, Session.begun(document))
        self.desk = Desk(self.session, self.place, actions.key_line())

    async def on_mount(self) -> None:
        """Show the desk, mind the signals, begin to compute once the first picture stands."""
        for number in (signal.SIGTERM, signal.SIGHUP):
            asyncio.get_running_loop().add_signal_handler(number, self._stopped, number)
        self.theme = self.settings.theme if self.settings.theme in self.available_themes else self.theme
        self.set_keymap(dict(self.settings.keys))
        await self.push_screen(self.desk)
        self.show_place()
        self.desk.show_waiting(files.FIRST)
        self.desk.call_after_refresh(self._begin)

    def _begin(self) -> None:
        self.solve(self.session, None)
        self.action_do("draft.offer")
        for remark in self.settings.remarks:
            self.notify(remark, title="Settings", severity="warning", timeout=10)

    def _stopped(self, number: int) -> None:
        self.drafts.follow(self.session)
        self.exit(return_code=128 + number)

    @on(Input.Changed)
    def take_edit(self, event: Input.Changed) -> None:
        """Put what was typed into the document."""
        field = event.input
        if isinstance(field, Field):
            field.taken = field.value
            try:
                self.session = self.session.edited(field.spec.path, field.value)
            except InputError as fault:  # the file has no such table, or is no TOML
                field.put(self.session.text(field.spec.path))
                self.notify(f"{fault}", title="Not possible here", severity="warning", timeout=8)

    @on(Input.Blurred)
    def take_leave(self) -> None:
        """What is typed next is another step of undo."""
        self.set_reactive(Design.session, self.session.left())

    def watch_session(self, session: Session) -> None:
        """Show it, keep its draft, and have it worked out."""
        self.show_place()
        self.desk.show_working()
        self._keep_later(session)
        self.solve(session, self.answer)

    @work(thread=True, exclusive=True, group="solve", exit_on_error=False)
    def solve(self, session: Session, previous: Answer | None) -> None:
        """Work out an answer beside the screen, once typing pauses."""
        stop = get_current_worker().cancelled_event
        if stop.wait(SETTLE if session.revision else 0.0):
            return
        answer, fault = solved(session.document, previous, stop.is_set)
        if answer is not None or fault:
            self.post_message(self.Solved(session.revision, answer, fault))

    @on(Solved)
    def take_answer(self, event: Solved) -> None:
        """Take an answer that is still asked for; without figures the last ones stay."""
        if event.revision != self.session.revision:
            return
        self.answered = event.revision
        problems = (
            event.answer.problems if event.answer else (Problem(path="calculation", given="", allowed=event.fault),)
        )
        if event.answer is not None and event.answer.analysis is not None:
            self.answer = event.answer
            self.show_view()
        self.desk.show_outcome(problems, figures=self.answer is not None, pinned=self.pin is not None)

    @work(thread=True, exclusive=True, group="draft", exit_on_error=False)
    def _keep_later(self, session: Session) -> None:
        """Write the draft beside the screen, once typing pauses longer."""
        if not get_current_worker().cancelled_event.wait(DRAFT):
            self.drafts.follow(session)

    def show_place(self) -> None:
        """Show the session for the actuator that is looked at; it may have gone or changed its name."""
        every = places(self.session.document)
        numbers = [(place.machine, place.actuator) for place in every]
        here = (self.place.machine, self.place.actuator)
        index = numbers.index(here) if here in numbers else 0
        self.place = every[index]
        self.desk.show_session(self.session, self.place, index, len(every))

    def show_view(self) -> None:
        """Show the answer for the actuator that is looked at."""
        if self.answer is not None:
            self.desk.show_view(self.answer, self.place, self.system, self.pin, self.glyphs)

    def action_do(self, name: str, *arguments: Any) -> None:
        """Carry out one of the table of actions."""
        actions.carry_out(self, name, *arguments)

    @on(Desk.Wanted)
    def take_wanted(self, event: Desk.Wanted) -> None:
        """The same, for the mouse."""
        self.action_do(event.name, *event.arguments)

    def get_system_commands(self, screen: Screen[Any]) -> Iterable[SystemCommand]:  # noqa: ARG002
        """Every action of the table."""
        for action in actions.ACTIONS.values():
            yield SystemCommand(action.title, action.help, lambda name=action.id: self.action_do(name))


def run(document: Document, settings: Settings | None = None) -> int:
    """Open the screens on a document.

    Parameters
    ----------
    document : Document
        Loaded, or the demo.
    settings : Settings, optional
        The user's; read where they are not given.

    Returns
    -------
    int
        0, or 128 and the number of the signal that ended it. [1]
    """
    app = Design(document, settings or load_settings())
    try:
        app.run()
    finally:
        if app.return_code:
            app.drafts.follow(app.session)  # also after a fault of the program itself
        app.drafts.close()
    return app.return_code or 0
