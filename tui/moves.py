"""Actions on what is looked at: workspace, actuator, field, units, pin."""

from __future__ import annotations

from typing import TYPE_CHECKING

from tui.screens.dialogs import Pick
from tui.session import places
from tui.widgets.field import Field
from tui.widgets.sheet import Sheet

if TYPE_CHECKING:
    from tui.app import Design
    from tui.widgets.raster import Glyphs

_GLYPHS: tuple[Glyphs, ...] = ("braille", "block", "ascii")


async def to_cylinder(app: Design) -> None:
    """Go to the workspace Cylinder."""
    await app.desk.go("cylinder")


async def to_stroke(app: Design) -> None:
    """Go to the workspace Stroke."""
    await app.desk.go("stroke")


def other_side(app: Design) -> None:
    """From the sheet to the workspace, or back."""
    app.desk.other_side()


def turn_sheet(app: Design) -> None:
    """Hide or show the sheet."""
    app.desk.turn_sheet()


def before(app: Design) -> None:
    """Look at the actuator before."""
    _step(app, -1)


def after(app: Design) -> None:
    """Look at the actuator after."""
    _step(app, 1)


def _step(app: Design, by: int) -> None:
    every = places(app.session.document)
    numbers = [(place.machine, place.actuator) for place in every]
    index = numbers.index((app.place.machine, app.place.actuator))
    if len(every) == 1:
        app.notify("The document has only one actuator.")
    else:
        _look_at(app, (index + by) % len(every))


def _look_at(app: Design, index: int) -> None:
    app.place = places(app.session.document)[index]
    app.show_place()
    app.call_later(app.show_view)  # the fields first


async def choose_place(app: Design) -> None:
    """Choose from the list of all actuators."""
    every = places(app.session.document)
    numbers = [(place.machine, place.actuator) for place in every]
    present = numbers.index((app.place.machine, app.place.actuator))
    index = await app.push_screen_wait(Pick("Machine / actuator", [place.name for place in every], present))
    if index is not None:
        _look_at(app, index)


async def choose_word(app: Design, field: Field) -> None:
    """Choose a field's word from its list; it counts as typed."""
    choices = list(field.spec.choices)
    present = choices.index(field.value) if field.value in choices else None
    index = await app.push_screen_wait(Pick(field.spec.label, choices, present))
    if index is not None:
        field.value = choices[index]
        field.cursor_position = len(field.value)


def next_problem(app: Design) -> None:
    """Go to the next field below that has a problem, from the top again after the last."""
    fields = [field for field in app.desk.query(Field) if field.display]
    here = fields.index(app.focused) if isinstance(app.focused, Field) else -1
    bad = [field for field in [*fields[here + 1 :], *fields[: here + 1]] if field.problem]
    if bad:
        bad[0].focus()
    elif app.desk.problems:
        to_problem(app, 0)
    else:
        app.notify("No field has a problem.")


def to_problem(app: Design, number: int) -> None:
    """Go to the field of one of the listed problems."""
    problem = app.desk.problems[number]
    steps = problem.path.split(".")
    if steps[0] == "machine" and len(steps) > 3 and steps[2] == "actuator":
        numbers = [(place.machine, place.actuator) for place in places(app.session.document)]
        where = (int(steps[1]), int(steps[3])) if steps[1].isdigit() and steps[3].isdigit() else (0, 0)
        if where in numbers:
            _look_at(app, numbers.index(where))
    if not app.desk.go_to(problem.path):
        app.notify(f"{problem} (no field of this sheet; put it right in the file)", timeout=10)


def turn_pin(app: Design) -> None:
    """Pin the present figures, or take the pin away."""
    if app.pin is not None:
        app.pin = None
        app.notify("Pin taken away.")
    elif app.answer is None:
        app.notify("There are no figures to pin yet.")
    else:
        app.pin = app.answer
        app.notify("Pinned: each figure shows its difference to this state.")
    app.show_view()
    if app.answered == app.session.revision:
        app.desk.show_outcome(app.desk.problems, figures=app.answer is not None, pinned=app.pin is not None)


def turn_units(app: Design) -> None:
    """Show figures in the other system of units."""
    app.system = "us" if app.system == "si" else "si"
    app.show_view()
    app.notify(f"Figures in {app.system.upper()} units; what was typed stays as typed.")


def turn_glyphs(app: Design) -> None:
    """Draw with the next set of characters."""
    app.glyphs = _GLYPHS[(_GLYPHS.index(app.glyphs) + 1) % len(_GLYPHS)]
    app.show_view()
    app.notify(f"Drawn with {app.glyphs}.")


def turn_theme(app: Design) -> None:
    """Change between the light and the dark theme."""
    app.theme = "textual-light" if app.current_theme.dark else "textual-dark"


def turn_entries(app: Design) -> None:
    """Show every entry of the sheet, or the usual ones."""
    every = app.desk.query_one(Sheet).turn_every()
    app.notify("All entries, with Cv, Kv, nominal flow and effective area." if every else "The usual entries.")
