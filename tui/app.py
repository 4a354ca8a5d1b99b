"""The program on the screen: it owns the session, has answers worked out, and keeps drafts."""

from __future__ import annotations

import asyncio
import contextlib
import gc
import signal
import threading
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

from actuator.errors import Cancelled, InputError, Problem
from actuator.settings import Settings, load_settings
from tui import actions, files
from tui.drafts import Drafts
from tui.screens.desk import Desk
from tui.session import Place, Session, places
from tui.terminal import console
from tui.widgets.field import Field
from tui.widgets.figures import Figures
from tui.widgets.head import Chooser, Head
from tui.widgets.keys import Keys
from tui.widgets.problems import Problems

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
    BINDINGS: ClassVar[list[BindingType]] = list(actions.bindings())
    COMMAND_PALETTE_BINDING = "ctrl+p"

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
        self._keeping, self._kept = threading.Lock(), 0
        self.settings = settings
        self.system: System = settings.units
        self.glyphs: Glyphs = "block" if console() else "braille"
        self.answer: Answer | None = None
        self.pin: Answer | None = None
        self.answered = -1
        self.chosen = ""
        self.place: Place = places(document)[0]
        self.set_reactive(Design.session, Session.begun(document))
        self.desk = Desk(self.session, self.place, actions.key_line())

    async def on_mount(self) -> None:
        """Show the desk, mind the signals, look for a draft, begin to compute."""
        with contextlib.suppress(NotImplementedError):
            for number in (signal.SIGTERM, signal.SIGHUP):
                asyncio.get_running_loop().add_signal_handler(number, self._stopped, number)
        self.theme = self.settings.theme or self.theme
        self.set_keymap(dict(self.settings.keys))
        await self.push_screen(self.desk)
        self.show_place()
        self.desk.show_waiting(files.FIRST)
        self.desk.call_after_refresh(self._begin)

    def _begin(self) -> None:
        """Compute only once the first picture stands."""
        self.solve(self.session, None)
        self.do("draft.offer")

    def _stopped(self, number: int) -> None:
        self.keep_draft()
        self.exit(return_code=128 + number)

    # --- one way: edit, session, screen and answer ---------------------------------------------------

    @on(Input.Changed)
    def take_edit(self, event: Input.Changed) -> None:
        """Put what was typed into the document."""
        field = event.input
        if isinstance(field, Field):
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
        """Show it, and have it worked out."""
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
        answer, fault = None, ""
        try:
            from actuator.answer import work_out  # nothing heavy is loaded before the first paint

            answer = work_out(session.document, previous, stop.is_set)
        except Cancelled:
            return
        except Exception as error:
            fault = f"{type(error).__name__}: {error}"
        self.post_message(self.Solved(session.revision, answer, fault))

    @on(Solved)
    def take_answer(self, event: Solved) -> None:
        """Take an answer that is still asked for; without figures the last ones stay."""
        if event.revision != self.session.revision:
            return
        self.answered = event.revision
        problems: tuple[Problem, ...] = event.answer.problems if event.answer else ()
        if event.answer is not None and event.answer.analysis is not None:
            if self.answer is None:
                gc.freeze()  # what the first answer has loaded stays: later collections need not look at it
            self.answer = event.answer
            self.desk.show_waiting("")
            self.show_view()
            self.desk.show_state("up to date" + (", pinned" if self.pin else ""), sound=True)
        else:
            count = len(problems)
            why = f"{count} problem{'' if count == 1 else 's'}" if count else "calculation failed"
            self.desk.show_state(f"! OUT OF DATE: {why}" if self.answer else f"! {why}", sound=False)
        if event.fault:
            problems = (Problem(path="calculation", given="", allowed=event.fault),)
        self.desk.show_problems(problems)
        if self.answer is None:
            self.desk.show_waiting("No figures until the problems above are put right.")

    @work(thread=True, exclusive=True, group="draft", exit_on_error=False)
    def _keep_later(self, session: Session) -> None:
        """Write the draft beside the screen, once typing pauses longer."""
        if get_current_worker().cancelled_event.wait(DRAFT):
            return
        self.keep_draft(session)

    def keep_draft(self, session: Session | None = None) -> None:
        """Write the draft where something is unsaved, else take it away."""
        session = session or self.session
        with self._keeping, contextlib.suppress(OSError):
            if session.revision < self._kept:
                return
            self._kept = session.revision
            if session.unsaved:
                self.drafts.keep(session.document)
            else:
                self.drafts.forget(session.document)

    # --- what is looked at ---------------------------------------------------------------------------

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
            from tui.shown import View

            place = self.place
            view = View(
                answer=self.answer,
                machine=place.machine - 1,
                actuator=max(place.actuator, 1) - 1,
                system=self.system,
                pin=self.pin,
            )
            self.desk.show_view(view, self.glyphs)

    def do(self, name: str, *arguments: Any) -> None:
        """Carry out one of the table of actions."""
        actions.carry_out(self, name, *arguments)

    def action_do(self, name: str) -> None:
        """The same, for a key."""
        self.do(name)

    async def action_quit(self) -> None:
        """Quit, but ask where something is unsaved (also from Textual's own menus)."""
        self.do("file.quit")

    def action_working(self) -> None:
        """Show the working of the chosen figure."""
        self.do("figure.working")

    def get_system_commands(self, screen: Screen[Any]) -> Iterable[SystemCommand]:  # noqa: ARG002
        """Every action of the table."""
        for action in actions.ACTIONS.values():
            yield SystemCommand(action.title, action.help, lambda name=action.id: self.do(name))

    @on(Figures.Chosen)
    def take_choice(self, event: Figures.Chosen) -> None:
        """The figure that working and cautions are asked for."""
        self.chosen = event.name

    @on(Keys.Pressed)
    def take_key(self, event: Keys.Pressed) -> None:
        """A name in the line of keys was clicked."""
        self.do(event.name)

    @on(Head.Go)
    def take_go(self, event: Head.Go) -> None:
        """A workspace was clicked."""
        self.do(f"go.{event.key}")

    @on(Chooser.Step)
    def take_step(self, event: Chooser.Step) -> None:
        """Another actuator was clicked."""
        self.do({-1: "go.before", 1: "go.after", 0: "go.list"}[event.by])

    @on(Field.Choose)
    def take_choose(self, event: Field.Choose) -> None:
        """The list of choices of a field was asked for."""
        self.do("field.choose", event.field)

    @on(Problems.Picked)
    def take_problem(self, event: Problems.Picked) -> None:
        """A problem was picked: go to its field."""
        self.do("go.problem", event.number)


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
            app.keep_draft()  # also after a fault of the program itself
        app.drafts.close()
    return app.return_code or 0
