"""The worst-case pair: the slowest and the hardest that the stated spread can make of an actuator."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass
from typing import Literal

from actuator.errors import InputError, Refusal
from actuator.parts import Actuator, Machine, Site
from actuator.results import WorstCase, WorstPair
from actuator.scatter.vary import Deviation, varied
from actuator.statics import rod_column, static_forces
from actuator.stroke.result import HalfStroke, StrokeResult

Which = Literal["slow", "hard"]
Way = Literal["extend", "retract"]
Simulate = Callable[[Actuator, Machine, Site], StrokeResult | Refusal]
"""Simulates the cycle of an actuator in its machine."""


@dataclass(frozen=True, slots=True)
class _Corner:
    """One corner of the spread, with its cycle."""

    parts: tuple[Actuator, Machine] | Refusal
    stroke: StrokeResult | Refusal

    def half(self, way: Way) -> HalfStroke | Refusal:
        """One way of the piston in it."""
        return self.stroke if isinstance(self.stroke, Refusal) else getattr(self.stroke, way)


def corner(actuator: Actuator, which: Which, way: Way, mass: float) -> Deviation:
    """Deviation that makes one way of the piston slowest or hardest.

    Parameters
    ----------
    actuator : Actuator
    which : {"slow", "hard"}
        Slow: lowest pressure and conductance, most friction, longest delay. Hard: the contrary.
    way : {"extend", "retract"}
    mass : float
        Deviation of the moved mass. [1]

    Returns
    -------
    Deviation
        Forces that oppose the motion are largest when slow and smallest when hard; a constant force that drives
        this way is smallest when slow and largest when hard.
    """
    spread = actuator.spread
    sign = 1.0 if which == "hard" else -1.0
    drives = actuator.load.constant_force * (1.0 if way == "extend" else -1.0) > 0.0
    return Deviation(
        supply_pressure=sign * spread.supply_pressure,
        friction=-sign * spread.friction,
        mass=mass,
        opposing=-sign * spread.mass,
        constant=(sign if drives else -sign) * spread.mass,
        conductance=sign * spread.conductance,
        delay=-sign * spread.delay,
    )


def masses(actuator: Actuator, which: Which, way: Way) -> tuple[float, ...]:
    """Deviations of the mass that may be the worst.

    Parameters
    ----------
    actuator : Actuator
    which : {"slow", "hard"}
    way : {"extend", "retract"}

    Returns
    -------
    tuple of float
        The largest only, where the mass is slow to move and its weight does not help; else both ends of the range:
        a light load arrives faster and a heavy one with more behind it, so that is left to the simulation. [1]
    """
    most = actuator.spread.mass
    helps = math.sin(actuator.load.inclination) * (1.0 if way == "extend" else -1.0) < 0.0
    if most == 0.0:
        return (0.0,)
    return (most,) if which == "slow" and not helps else (most, -most)


def _badness(half: HalfStroke | Refusal, which: Which) -> float:
    """How slow, or how hard, one half stroke is; one that does not arrive is slowest, and not hard."""
    if which == "slow":
        return math.inf if isinstance(half, Refusal) or isinstance(half.stroke_time, Refusal) else half.stroke_time
    return -1.0 if isinstance(half, Refusal) or isinstance(half.end_energy, Refusal) else half.end_energy


def worst_pair(actuator: Actuator, machine: Machine, site: Site, simulate: Simulate) -> WorstPair:
    """Slowest and hardest half strokes under the spread, with the force, the buckling and the air that go with them.

    Parameters
    ----------
    actuator, machine, site : part
        As the document has them.
    simulate : callable
        Simulates a cycle; called once for each corner that differs.

    Returns
    -------
    WorstPair
        Each way has a corner of its own where weight or a constant force drives one way and opposes the other.

    Notes
    -----
    The corners follow a rule, all but the mass. A stroke that swings against the air in front of the piston can be
    some percent harder at a lower pressure or with more friction, where that catches the swing at its fastest; one
    whose exhaust is throttled hard, or whose cycle is too short to fill the chambers, can be some percent slower at a
    higher pressure.
    """
    known: dict[Deviation, _Corner] = {}

    def at(by: Deviation) -> _Corner:
        if by not in known:
            try:
                parts = varied(actuator, machine, site, by)
            except InputError as fault:
                parts = Refusal(str(fault), "spread")
            stroke = parts if isinstance(parts, Refusal) else simulate(*parts, site)
            known[by] = _Corner(parts, stroke)
        return known[by]

    def worst(which: Which, way: Way) -> _Corner:
        found = [at(corner(actuator, which, way, mass)) for mass in masses(actuator, which, way)]
        return max(found, key=lambda item: _badness(item.half(way), which))

    slow = _case(worst("slow", "extend"), worst("slow", "retract"), site)
    hard = _case(worst("hard", "extend"), worst("hard", "retract"), site)
    return WorstPair(slow=slow, hard=hard)


def _mass(found: _Corner) -> float | Refusal:
    return found.parts if isinstance(found.parts, Refusal) else found.parts[0].load.mass


def _reserve(found: _Corner, way: Way, site: Site) -> float | Refusal:
    if isinstance(found.parts, Refusal):
        return found.parts
    forces = static_forces(*found.parts, site)
    return forces.force_reserve_extend if way == "extend" else forces.force_reserve_retract


def _buckling(found: _Corner, site: Site) -> float | Refusal:
    if isinstance(found.parts, Refusal):
        return found.parts
    return rod_column(*found.parts, site).buckling_safety


def _case(extend: _Corner, retract: _Corner, site: Site) -> WorstCase:
    out, back = extend.half("extend"), retract.half("retract")
    lost = next((item for item in (out, back) if isinstance(item, Refusal)), None)
    return WorstCase(
        extend=out,
        retract=back,
        mass_extend=_mass(extend),
        mass_retract=_mass(retract),
        force_reserve_extend=_reserve(extend, "extend", site),
        force_reserve_retract=_reserve(retract, "retract", site),
        buckling_safety=_buckling(extend, site),
        air_drawn=lost
        if lost is not None
        else sum(item.air_drawn for item in (out, back) if isinstance(item, HalfStroke)),
    )
