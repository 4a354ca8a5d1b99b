"""What happens when supply, signal or both are lost: as a table of text, as sentences, as a list for JSON."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

from actuator.errors import Refusal
from actuator.holding.held import NO_AIR, STILL, Held
from actuator.holding.leak import NEVER
from actuator.report.figures import FIGURES, At, Figure
from actuator.report.figures.held import LEAVES, NAMES
from actuator.report.shown import Shown
from actuator.report.tables import Cell, cell, wrapped

_SIDES = {
    "open": "open",
    "supplied": "on supply",
    "shut": "closed in",
    "checked": "closed in by a check valve",
}
_PLAIN = {STILL.reason: "-", NO_AIR.reason: "-", NEVER.reason: "never"}
"""What stands for reasons that the line itself tells."""
_COLUMNS = ("way", "time", "end_speed", "end_energy", "starts_after")
_HEADS = ("way", "time", "speed", "energy", "starts")


def _away(item: Held) -> str:
    return "retract" if item.start == "extended" else "extend"


def _figure(item: Held, name: str) -> Figure:
    return FIGURES["actuator"][f"holding.{item.case.replace(' ', '_')}.{_away(item)}.{name}"]


def sentence(item: Held) -> str:
    """One loss in words: connections, what holds, or which way it goes."""
    if item.holds:
        outcome = f"held: {item.by}"
        if item.direction:
            outcome += f"; once closed-in air has leaked away it {item.direction}s"
    else:
        outcome = f"not held, it {item.direction}s"
    return (
        f"{item.case[0].upper()}{item.case[1:]}, piston {item.start}: cap side {_SIDES[item.cap]}, rod side "
        f"{_SIDES[item.rod]}; {outcome}."
    )


def remarks(figure: Figure, at: At) -> Iterator[str]:
    """Sentence of the loss that a figure belongs to."""
    for item in at.actuator.holding:
        if figure.group == f"Holding, {item.case}" and LEAVES.get(figure.direction) == item.start:
            yield sentence(item)


def table(at: At, shown: Shown) -> list[str]:
    """All losses, one line each, and why what is refused is refused.

    Parameters
    ----------
    at : At
        An actuator.
    shown : Shown

    Returns
    -------
    list of str
    """
    held = at.actuator.holding
    if not held:
        return []
    units = [shown.number(0.0, _figure(held[0], name).kind)[1] for name in _COLUMNS]
    heads = "".join(f"{f'{head} [{unit}]':>14}" for head, unit in zip(_HEADS, units, strict=True))
    title = "When air or signal is lost"
    lines = ["", f"{title:<27}{heads}"]
    lines.append("-" * len(lines[1]))
    why: dict[str, None] = {}
    for item in held:
        cells = [cell(_figure(item, name), at, shown) for name in _COLUMNS]
        numbers = "".join(f"{_number(found):>14}" for found in cells)
        lines.append(f"  {f'{item.case}, {item.start}':<25}{numbers}")
        lines += wrapped(sentence(item).split(": ", 1)[1], "      ", "      ")
        why |= dict.fromkeys(found.reason for found in cells if found.reason and found.reason not in _PLAIN)
    for reason in why:
        lines += wrapped(f"-: {reason}")
    return lines


def _number(found: Cell) -> str:
    """Number of a cell; a dash where there is none."""
    return _PLAIN.get(found.reason, "-") if found.reason else found.number


def listed(at: At) -> list[dict[str, Any]]:
    """All losses as plain dicts: words, and numbers in SI with the unit at the end of the key."""
    rows = []
    for item in at.actuator.holding:
        row: dict[str, Any] = {
            "case": item.case,
            "from": item.start,
            "cap": item.cap,
            "rod": item.rod,
            "holds": item.holds,
            "by": item.by,
            "direction": item.direction,
        }
        for name in NAMES:
            figure = _figure(item, name)
            value = figure.value(at)
            row[figure.json_path[-1]] = {"refused": value.reason} if isinstance(value, Refusal) else value
        rows.append(row)
    return rows
