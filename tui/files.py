"""Actions on the document: undo, save, open, quit, drafts. Nothing typed is lost without being asked."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

from actuator.project.document import load, parse
from tui.screens.dialogs import Ask, Entry
from tui.session import Place, Session

if TYPE_CHECKING:
    from actuator.project.document import Document
    from tui.app import Design

FIRST = "Working out the first answer …"


def undo(app: Design) -> None:
    """Take the last change back, and go to its field."""
    if not app.session.past:
        app.notify("Nothing to undo.")
        return
    step = app.session.past[-1]
    app.session = app.session.undone()
    _show_change(app, step.path)


def redo(app: Design) -> None:
    """Do the last undone change again, and go to its field."""
    if not app.session.future:
        app.notify("Nothing to redo.")
        return
    step = app.session.future[-1]
    app.session = app.session.redone()
    _show_change(app, step.path)


def _show_change(app: Design, path: str) -> None:
    """Look at the actuator that a change was made to, and at its field."""
    steps = path.split(".")
    if steps[0] == "machine" and len(steps) > 3:
        actuator = int(steps[3]) if steps[2] == "actuator" else app.place.actuator
        same = steps[2] != "actuator" and int(steps[1]) == app.place.machine
        if not same and (app.place.machine, app.place.actuator) != (int(steps[1]), actuator):
            app.place = Place(int(steps[1]), actuator, "")
            app.show_place()
            app.show_view()
    app.desk.go_to(path)


async def save(app: Design) -> None:
    """Write to the document's own file, or ask for one."""
    path = app.session.document.path
    if path is None:
        await save_as(app)
    else:
        _write(app, path)


async def save_as(app: Design) -> None:
    """Ask for a file and write there."""
    await _saved_as(app)


async def _saved_as(app: Design) -> bool:
    """Whether it was saved."""
    present = app.session.document.path
    text = await app.push_screen_wait(Entry("Save as", str(present or Path.cwd() / "machine.toml"), _unusable))
    if text is None:
        return False
    path = Path(text.strip()).expanduser().absolute()
    if path.exists() and path != (present.absolute() if present else None):
        answer = await app.push_screen_wait(
            Ask(
                "File exists",
                f"{path} exists. Write over it?",
                {"over": "Write over it", "back": "Back"},
            )
        )
        if answer != "over":
            return False
    return _write(app, path)


def _unusable(text: str) -> str:
    """What is wrong with a path to write to."""
    if not text.strip():
        return "a file name is needed"
    path = Path(text.strip()).expanduser()
    if path.is_dir():
        return "this is a folder; add a file name"
    if not path.absolute().parent.is_dir():
        return f"there is no folder {path.absolute().parent}"
    return ""


def _write(app: Design, path: Path) -> bool:
    """Write the document; a fault is told and nothing else changes."""
    before = app.session.document
    try:
        document = before.saved(path)
    except OSError as fault:
        app.notify(f"Not saved: {fault}", severity="error", timeout=10)
        return False
    app.session = app.session.kept(document)
    app.drafts.follow(app.session)
    app.drafts.forget(before)
    app.notify(f"Saved {path.name}")
    return True


async def open_other(app: Design) -> None:
    """Ask for a file and begin on it."""
    if not await _may_leave(app, "Open another document"):
        return
    present = app.session.document.path
    text = await app.push_screen_wait(Entry("Open", str(present or Path.cwd()) + ("" if present else "/"), _unreadable))
    if text is not None:
        _begin(app, load(Path(text.strip()).expanduser().absolute()))


def _unreadable(text: str) -> str:
    """What is wrong with a path to read from."""
    path = Path(text.strip()).expanduser()
    if path.is_dir():
        return "this is a folder; add a file name"
    try:
        load(path)
    except OSError as fault:
        return fault.strerror or str(fault)
    return ""


def _begin(app: Design, document: Document, saved: Document | None = None) -> None:
    """Work on another document; its revision goes on, so that no late answer is taken for its own."""
    app.drafts.end(app.session)
    app.answer = app.pin = None
    begun = Session.begun(document, saved)
    app.place = Place(0, 0, "")
    app.desk.show_waiting(FIRST)
    app.session = begun.at_revision(app.session.revision + 1)


async def leave(app: Design) -> None:
    """Quit, asking where something is unsaved."""
    if isinstance(app.screen, Ask):
        return
    if await _may_leave(app, "Quit"):
        app.drafts.end(app.session)
        app.exit(0)


async def _may_leave(app: Design, title: str) -> bool:
    """Whether the present document may be left: saved, unchanged, or given up knowingly."""
    if not app.session.unsaved:
        return True
    document = app.session.document
    name = document.path.name if document.path else "This document"
    answer = await app.push_screen_wait(
        Ask(
            title,
            f"{name} has changes that are not saved.",
            {"save": "Save", "lose": "Do not save", "back": "Back"},
        )
    )
    if answer == "save":
        return _write(app, document.path) if document.path else await _saved_as(app)
    return answer == "lose"


async def offer_draft(app: Design) -> None:
    """Offer what an earlier run left behind."""
    document = app.session.document
    draft = app.drafts.left_behind(document)
    if draft is None:
        return
    when = _when(draft.written)
    name = document.path.name if document.path else "a document without a file"
    answer = await app.push_screen_wait(
        Ask(
            "Draft found",
            f"An earlier run ended with unsaved changes to {name}, last kept {when}.\n\n"
            "Take the draft: go on from it (undo brings the file's state back).\n"
            "Throw away: the draft is deleted.\nLater: it is kept and offered again at the next start.",
            {"take": "Take the draft", "throw": "Throw away", "later": "Later"},
        )
    )
    if answer == "throw":
        app.drafts.discard(draft)
    elif answer == "take":
        _begin(app, parse(draft.text, document.path), document)
        app.drafts.follow(app.session)
        app.drafts.discard(draft)


def _when(seconds: float) -> str:
    """A time of the clock, local."""
    from datetime import datetime

    return datetime.fromtimestamp(seconds).astimezone().strftime("%Y-%m-%d %H:%M")
