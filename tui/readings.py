"""Actions that open something to read: working, cautions, help."""

from __future__ import annotations

from textwrap import wrap
from typing import TYPE_CHECKING

from tui.screens.dialogs import Reader
from tui.widgets.about import About

if TYPE_CHECKING:
    from actuator.analysis import Caution
    from tui.app import Design

_HELP = """\
Type in any field: everything follows after a short pause. While a field is wrong or the calculation runs, the
last figures stay and are marked out of date; what is wrong stands below the field and above the workspace.

Fields hold a number, a unit and, for pressure and free air, the reference: 6 bar gauge, 101.3 kPa absolute,
300 L/min ANR. An empty field takes its default, which stands there in grey. A field with ▾ has a list: enter
opens it.

› marks the chosen figure or field, ! a problem, ✓ a requirement that is met, ✗ one that failed, ? one that
could not be judged, – a figure that cannot be had (the reason stands below it).
"""
_ALWAYS = (
    "All figures are engineering estimates of a model. Makers' data, local codes and regulations, and a "
    "licensed practitioner decide. Compressed air and moving pistons store energy that can injure: isolate, "
    "vent and secure before any work."
)


def helping(app: Design) -> None:
    """Show keys and signs."""
    from tui.actions import ACTIONS, key_text

    about = app.desk.query_one(About).text

    def text(width: int) -> str:
        parts = [_wrapped(about, width)] if about else []
        parts += [_wrapped(part, width) for part in _HELP.strip().split("\n\n")]
        keys = [
            f"{key_text(action.keys) or 'palette':>9}  {action.title}: {action.help}" for action in ACTIONS.values()
        ]
        keys += [
            f"{'ctrl-P':>9}  Palette: every action by name",
            f"{'↑ ↓ tab':>9}  Fields and figures; in plots ← → move the reading line",
        ]
        listed = [line for key in keys for line in wrap(key, width, subsequent_indent=" " * 11)]
        return "\n\n".join([*parts, "\n".join(listed), _wrapped(_ALWAYS, width)])

    app.push_screen(Reader("Help", text))


def _wrapped(text: str, width: int) -> str:
    return "\n".join(wrap(" ".join(text.split()), width))


def working(app: Design) -> None:
    """Show how the chosen figure comes about."""
    row = app.desk.chosen_row()
    if app.answer is None or row is None:
        app.notify("Choose a figure first: F6 goes to the figures, ↑ ↓ choose.")
        return
    if not row.figures:
        app.notify("This line is a remark; it has no working of its own.")
        return
    answer, place, system = app.answer, app.place, app.system

    def text(width: int) -> str:
        from actuator.report.workings import render
        from actuator.report.workings import working as worked

        parts = []
        for figure in row.figures:
            level, _, key = figure.partition("/")
            machine = None if level == "project" else place.machine - 1
            actuator = place.actuator - 1 if level == "actuator" else None
            parts.append(render(worked(answer, machine, actuator, key, system), width))
        return ("\n" + "─" * width + "\n\n").join(parts)

    app.push_screen(Reader(f"Working: {plain_label(row.label)}", text))


def plain_label(label: str) -> str:
    """A row's label without the sign of a verdict."""
    return label.lstrip("✓✗? ")


def cautions(app: Design) -> None:
    """Show what can hurt: first what goes with the chosen figure, then the rest of this actuator's."""
    if app.answer is None or app.answer.analysis is None:
        app.notify("There are no figures yet.")
        return
    machines = app.answer.analysis.machines
    here = machines[app.place.machine - 1].actuators if app.place.machine <= len(machines) else ()
    found = here[app.place.actuator - 1].cautions if 0 < app.place.actuator <= len(here) else ()
    row = app.desk.chosen_row()
    first = [item for item in found if row is not None and _goes_with(item, row.figures)]
    rest = [item for item in found if item not in first]

    def text(width: int) -> str:
        parts = []
        if row is not None and row.figures:
            parts.append(
                f"With {plain_label(row.label)}" if first else f"{plain_label(row.label)}: no caution of its own."
            )
        parts += [_told(item, width) for item in first]
        if rest:
            parts.append("With this actuator")
            parts += [_told(item, width) for item in rest]
        return "\n\n".join([*parts, _wrapped(_ALWAYS, width)])

    app.push_screen(Reader("Cautions", text))


def _told(item: Caution, width: int) -> str:
    lines = wrap(item.text, width, initial_indent="! ", subsequent_indent="  ")
    source = wrap(f"{item.source}; {item.path}", width, initial_indent="    ", subsequent_indent="    ")
    return "\n".join([*lines, *source])


def _goes_with(item: Caution, figures: tuple[str, ...]) -> bool:
    """Whether a caution's field enters one of the figures, or it names the figure."""
    from actuator.report.figures import FIGURES

    tail = ".".join(step for step in item.path.split(".") if not step.isdigit())
    tail = tail.removeprefix("machine.actuator.")
    for name in figures:
        level, _, key = name.partition("/")
        figure = next(by_key[key] for of, by_key in FIGURES.items() if of == level and key in by_key)
        known = {key, *figure.inputs}
        if tail in known or any(tail.startswith(known_one + ".") for known_one in known):
            return True
    return False
