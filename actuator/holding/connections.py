"""What each chamber is connected to once air or signal is lost: the valve's function, and the check valves."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

LossCase = Literal["supply lost", "signal lost", "both lost"]
End = Literal["extended", "retracted"]
Side = Literal["open", "supplied", "shut", "checked"]
"""``"open"``: to the atmosphere; ``"supplied"``: to a line at supply pressure; ``"shut"``: closed in; ``"checked"``:
closed in by a check valve that lets air of the atmosphere in."""
CASES: tuple[LossCase, ...] = ("supply lost", "signal lost", "both lost")
ENDS: tuple[End, ...] = ("extended", "retracted")

_LINES = {
    "extend": ("supply", "exhaust"),
    "retract": ("exhaust", "supply"),
    "5/3 closed": ("blocked", "blocked"),
    "5/3 exhausted": ("exhaust", "exhaust"),
    "5/3 pressurised": ("supply", "supply"),
}
"""What cap and rod port lead to in each position of the valve."""


@dataclass(frozen=True, slots=True, kw_only=True)
class Connection:
    """Both chambers after the loss."""

    cap: Side
    rod: Side
    ordinary: bool
    """Whether the valve has gone to its other position with air, or a spring, to drive: an ordinary stroke."""


def connection(
    function: str,
    case: LossCase,
    end: End,
    *,
    supply_check: bool = False,
    pilot_check: bool = False,
    air_ways: tuple[str, ...] = ("extend", "retract"),
) -> Connection:
    """What the chambers are connected to after a loss.

    Parameters
    ----------
    function : str
        Of the valve: ``"5/2 spring"``, ``"5/2 detent"``, ``"5/3 closed"``, ``"5/3 exhausted"``,
        ``"5/3 pressurised"``, ``"3/2"``.
    case : str
        What is lost.
    end : str
        Where the piston stands, and where the valve sent it.
    supply_check : bool
        A check valve keeps the air between itself and the valve's inlet.
    pilot_check : bool
        Check valves at the ports, opened by the pressure in the line of the other port.
    air_ways : tuple of str
        Ways that air drives; a single-acting cylinder has one port, its other side is open.

    Returns
    -------
    Connection

    Notes
    -----
    A spring moves a 5/2 valve to rest as retracting, a 3/2 valve to venting. Air that a check valve keeps in a line
    is taken to hold its pressure where a chamber is newly joined to it, and to be no help to a chamber that it
    stands on already: both on the safe side. The check valve of a single-acting cylinder is opened by the supply.
    """
    commanded = "extend" if end == "extended" else "retract"
    rest = {
        "5/2 spring": "retract",
        "5/2 detent": commanded,
        "3/2": "extend" if air_ways == ("retract",) else "retract",
    }.get(function, function)
    position = commanded if case == "supply lost" else rest
    before, after = _LINES[commanded], _LINES[position]
    air = case == "signal lost"
    kept = air or supply_check
    single = len(air_ways) == 1

    def side(own: int, way: str) -> Side:
        if way not in air_ways:
            return "open"
        line, other = after[own], after[1 - own]
        if line == "blocked":
            return "shut"
        if line == "supply" and kept:
            return "supplied" if air or before[own] != "supply" else "shut"
        opened = air if single else other == "supply" and kept
        return "checked" if pilot_check and not opened else "open"

    cap, rod = side(0, "extend"), side(1, "retract")
    turned = position != commanded and position in ("extend", "retract")
    return Connection(cap=cap, rod=rod, ordinary=turned and (air or "supplied" in (cap, rod)))
