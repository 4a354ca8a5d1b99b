"""What can hurt when nothing, or not enough, holds a load: texts for the cautions."""

from __future__ import annotations

import math
from collections.abc import Iterator

from actuator.air.gas import GRAVITY
from actuator.holding.held import Held
from actuator.holding.leak import NO_LEAK
from actuator.parts import Actuator


def lost(case: str) -> str:
    """What is lost, for a sentence: ``"supply and signal lost"``."""
    return case.replace("both", "supply and signal")


def _means(actuator: Actuator) -> str:
    """What the document names to hold the load; empty where there is nothing."""
    held = actuator.holding
    named = [f"a rod lock of {actuator.count * held.rod_lock:.4g} N"] if held.rod_lock > 0.0 else []
    named += ["pilot-operated check valves at the ports"] if held.pilot_check else []
    named += ["a check valve in the supply"] if held.supply_check else []
    return " and ".join(named)


def _fall(held: tuple[Held, ...], direction: str) -> str:
    """The hardest of the motions in a direction, and what closed-in air is good for."""
    text = ""
    moves = [
        (item.end_energy, item)
        for item in held
        if item.direction == direction and not item.holds and isinstance(item.end_energy, float)
    ]
    if moves:
        energy, item = max(moves, key=lambda move: move[0])
        text += (
            f" With {lost(item.case)} at the {item.start} end it goes {item.way * 1e3:.4g} mm in {item.time:.3g} s "
            f"and arrives with {item.end_speed:.3g} m/s, {energy:.3g} J."
        )
    waits = [item.starts_after for item in held if item.holds and item.by == "closed-in air"]
    times = [time for time in waits if isinstance(time, float)]
    if times:
        text += f" Closed-in air holds it for {min(times):.3g} s at the leak given, then it creeps."
    elif NO_LEAK in waits:
        text += " Closed-in air holds it until it has leaked away; no leak is given, so that time is not known."
    return text


def weight(actuator: Actuator, held: tuple[Held, ...]) -> Iterator[tuple[str, str]]:
    """A load on a slope, whatever the document names to lock it.

    Parameters
    ----------
    actuator : Actuator
    held : tuple of Held
        What happens when supply or signal is lost.

    Yields
    ------
    tuple of str
        Field that it goes with, and the text; nothing where no weight pulls.
    """
    load, friction = actuator.load, actuator.count * actuator.friction.breakaway
    pull = load.mass * GRAVITY * math.sin(load.inclination)
    if pull == 0.0:
        return
    direction = "retract" if pull > 0.0 else "extend"
    stuck = friction + load.guide_friction * load.mass * GRAVITY * math.cos(load.inclination)
    means = _means(actuator)
    relies = (
        f"it relies on {means}, which has to be rated for this load with a margin and proved at intervals"
        if means
        else "no rod lock, check valve or counterweight is part of this calculation"
    )
    falls = _fall(held, direction)
    if abs(pull) > stuck:
        rubs = "The friction given does not hold it."
    elif falls:
        rubs = "The friction given would hold the weight alone, but not against what else drives it then."
    else:
        rubs = "The friction given would hold it, but friction is no lock: wear, oil and vibration lower it."
    yield (
        "load.inclination",
        f"The weight pulls along the stroke with {abs(pull):.4g} N and {direction}s the piston when air or signal is "
        f"lost; {relies}. {rubs}{falls} Secure a raised load before anyone reaches under it.",
    )


def closed_in(held: tuple[Held, ...]) -> Iterator[tuple[str, str]]:
    """Air that stays between valve and piston when the machine is off.

    Parameters
    ----------
    held : tuple of Held

    Yields
    ------
    tuple of str
        Figure that it goes with, and the text; nothing where no air is closed in.
    """
    most = max(held, key=lambda item: item.trapped, default=None)
    if most is None or most.trapped <= 0.0:
        return
    yield (
        f"holding.{most.case.replace(' ', '_')}.{most.start}.trapped",
        f"With {lost(most.case)} and the piston {most.start}, {most.trapped / 100.0:.3g} bar·L gauge stay closed in "
        "between valve and piston. The machine is not free of pressure when its supply is vented: release each chamber "
        "on its own, with the load secured, before opening a fitting, and expect the load to move as it is released.",
    )
