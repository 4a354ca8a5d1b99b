"""One table of everything that can be done: keys, footer, palette and help all read it."""

from __future__ import annotations

from collections.abc import Callable, Coroutine, Iterator
from dataclasses import dataclass
from typing import TYPE_CHECKING, Any

from textual.binding import Binding

from tui import files, moves, readings

if TYPE_CHECKING:
    from tui.app import Design

Done = Coroutine[Any, Any, None] | None


@dataclass(frozen=True, slots=True, kw_only=True)
class Action:
    """One thing to do.

    Attributes
    ----------
    id : str
        Name in the user's keymap, ``"file.save"``.
    keys : str
        Keys in Textual's names; empty where only the palette has it.
    name : str
        For the footer.
    title, help : str
        For palette and help.
    run : callable
        Takes the app; what waits for a window is a coroutine.
    footer : int
        Place in the line of keys, from 1; 0 where it is not in it. [1]
    """

    id: str
    keys: str
    name: str
    title: str
    help: str
    run: Callable[..., Done]
    footer: int = 0


_TABLE = (
    Action(
        id="help",
        keys="f1",
        name="Help",
        title="Help",
        help="Keys, signs and what the screens show",
        run=readings.helping,
        footer=1,
    ),
    Action(
        id="go.cylinder",
        keys="f2",
        name="Cylinder",
        title="Workspace Cylinder",
        help="Forces, rod, ideal diagram, air, demand, energy and money",
        run=moves.to_cylinder,
        footer=2,
    ),
    Action(
        id="go.stroke",
        keys="f3",
        name="Stroke",
        title="Workspace Stroke",
        help="Plots over time, p-V loops, exergy ledger, figures of each half stroke",
        run=moves.to_stroke,
        footer=3,
    ),
    Action(
        id="figure.working",
        keys="f4",
        name="Working",
        title="Working of the chosen figure",
        help="Formula, the numbers put in and where they come from, sources",
        run=readings.working,
        footer=4,
    ),
    Action(
        id="figure.cautions",
        keys="f5",
        name="Cautions",
        title="Cautions of the chosen figure",
        help="What can hurt, and whose rules decide",
        run=readings.cautions,
        footer=5,
    ),
    Action(
        id="go.side",
        keys="f6",
        name="Side",
        title="Other side",
        help="From the sheet to the workspace, or back",
        run=moves.other_side,
        footer=6,
    ),
    Action(
        id="go.before",
        keys="f7",
        name="Before",
        title="Actuator before",
        help="Look at the actuator before this one",
        run=moves.before,
    ),
    Action(
        id="go.after",
        keys="f8",
        name="After",
        title="Actuator after",
        help="Look at the actuator after this one",
        run=moves.after,
        footer=15,
    ),
    Action(
        id="view.sheet",
        keys="f9",
        name="Sheet",
        title="Hide or show the sheet",
        help="Without it the workspace has the whole width",
        run=moves.turn_sheet,
        footer=11,
    ),
    Action(
        id="go.list",
        keys="ctrl+g",
        name="Actuators",
        title="Choose an actuator",
        help="List of all machines and actuators of the document",
        run=moves.choose_place,
    ),
    Action(
        id="go.next_problem",
        keys="ctrl+n",
        name="Problem",
        title="Next problem",
        help="Go to the next field with a problem",
        run=moves.next_problem,
    ),
    Action(
        id="edit.undo",
        keys="ctrl+z",
        name="Undo",
        title="Undo",
        help="Take the last change back; typing in one field is one change",
        run=files.undo,
        footer=10,
    ),
    Action(
        id="edit.redo",
        keys="ctrl+y",
        name="Redo",
        title="Redo",
        help="Do it again",
        run=files.redo,
        footer=14,
    ),
    Action(
        id="file.save",
        keys="ctrl+s",
        name="Save",
        title="Save",
        help="Write the document to its file; asks for a place where it has none",
        run=files.save,
        footer=7,
    ),
    Action(
        id="file.save_as",
        keys="f12",
        name="Save as",
        title="Save as",
        help="Write the document to another file",
        run=files.save_as,
        footer=16,
    ),
    Action(
        id="file.open",
        keys="ctrl+o",
        name="Open",
        title="Open",
        help="Open another document; asks where this one is unsaved",
        run=files.open_other,
        footer=17,
    ),
    Action(
        id="view.pin",
        keys="ctrl+r",
        name="Pin",
        title="Pin these figures, or take the pin away",
        help="Each figure then stands beside its difference to the pinned state",
        run=moves.turn_pin,
        footer=12,
    ),
    Action(
        id="view.units",
        keys="ctrl+t",
        name="Units",
        title="Units SI or US",
        help="Units that figures are shown in; what was typed stays as typed",
        run=moves.turn_units,
        footer=13,
    ),
    Action(
        id="view.entries",
        keys="",
        name="Entries",
        title="All entries of the sheet, or the usual ones",
        help="Also Cv, Kv, nominal flow and effective area of the valve, in place of C",
        run=moves.turn_entries,
    ),
    Action(
        id="view.glyphs",
        keys="",
        name="Glyphs",
        title="Draw with braille, blocks or ASCII",
        help="For terminals whose font lacks some characters",
        run=moves.turn_glyphs,
    ),
    Action(
        id="view.theme",
        keys="",
        name="Theme",
        title="Light or dark",
        help="Another theme",
        run=moves.turn_theme,
    ),
    Action(
        id="file.quit",
        keys="ctrl+q",
        name="Quit",
        title="Quit",
        help="Leave; asks where something is unsaved",
        run=files.leave,
        footer=8,
    ),
)
ACTIONS: dict[str, Action] = {action.id: action for action in _TABLE}
"""All actions by id, in the order of footer, palette and help."""

INNER: dict[str, Callable[..., Done]] = {
    "draft.offer": files.offer_draft,
    "field.choose": moves.choose_word,
    "go.problem": moves.to_problem,
}
"""What widgets ask for with something of their own in hand; it stands in no menu."""


def bindings() -> Iterator[Binding]:
    """Keys of the table."""
    for action in ACTIONS.values():
        if action.keys:
            yield Binding(action.keys, f"do('{action.id}')", action.name, tooltip=action.help, id=action.id)


def key_line() -> list[tuple[str, str, str]]:
    """Key, name and id of what stands in the line of keys, the most used first."""
    shown = sorted((action for action in ACTIONS.values() if action.footer), key=lambda action: action.footer)
    return [(key_text(action.keys), action.name, action.id) for action in shown]


def carry_out(app: Design, name: str, *arguments: Any) -> None:
    """Do it; what waits for a window runs beside the screen.

    Parameters
    ----------
    app : Design
    name : str
        Id in the table.
    """
    run = ACTIONS[name].run if name in ACTIONS else INNER[name]
    waiting = run(app, *arguments)
    if waiting is not None:
        app.run_worker(waiting, group="window")


def key_text(keys: str) -> str:
    """Key as it is shown, ``"F4"``, ``"^S"``."""
    return keys.upper().replace("CTRL+", "^")
