"""What happens when supply, signal or both are lost: for each, from either end."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass

from actuator.errors import Refusal
from actuator.holding.connections import CASES, ENDS, Connection, End, LossCase, Side, connection
from actuator.holding.leak import NEVER, start_of_motion
from actuator.holding.motion import Rubbing, travel, way_until_it_sticks
from actuator.parts import Actuator
from actuator.stroke import layout as at
from actuator.stroke.result import Array, HalfStroke, StrokeResult

STILL = Refusal("it holds")
Move = tuple[float, float | Refusal, float | Refusal]
"""Way [m], time [s], speed at its end [m/s]."""
STAYS: Move = (0.0, STILL, 0.0)
NO_AIR = Refusal("no closed-in air holds it")


@dataclass(frozen=True, slots=True, kw_only=True)
class Held:
    """One loss, with the piston settled at one end."""

    case: LossCase
    """``"supply lost"``, ``"signal lost"`` or ``"both lost"``."""
    start: End
    """End that the piston stands at: ``"extended"`` or ``"retracted"``."""
    cap: Side
    """What the cap side is connected to then: ``"open"``, ``"supplied"``, ``"shut"`` or ``"checked"``."""
    rod: Side
    holds: bool
    """Whether it stays, at least until closed-in air has leaked away."""
    by: str
    """What holds it; empty where nothing does."""
    direction: str
    """``"extend"`` or ``"retract"``: where it goes, at once or when the air has gone; empty where it never does."""
    drive: float
    """Force on the piston right after the loss, without friction and lock, positive extending. [N]"""
    hold: float
    """What friction, guide and rod lock resist with. [N]"""
    way: float
    """Zero where it holds; on closed-in air to where friction takes over. [m]"""
    time: float | Refusal
    """[s]"""
    end_speed: float | Refusal
    """At the end of the way. [m/s]"""
    end_energy: float | Refusal
    """[J]"""
    trapped: float
    """Pressure above ambient times volume of what is closed in. [J]"""
    starts_after: float | Refusal
    """Zero where it moves at once. [s]"""


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class _Setting:
    """The piston at one end after a loss; forces are towards the way that leaves this end."""

    par: list[float]
    sign: float
    """1: leaves extending, from the retracted end; -1: leaves retracting."""
    link: Connection
    p_cap: float
    p_rod: float

    def place(self, way: float) -> float:
        """Position after a way from this end. [m]"""
        return way if self.sign > 0.0 else self.par[at.STROKE] - way

    def volumes(self, way: float) -> tuple[float, float]:
        """Of both chambers. [m³]"""
        par, x = self.par, self.place(way)
        cap = par[at.DEAD_CAP] + par[at.AREA_CAP] * x
        return float(cap), float(par[at.DEAD_ROD] + par[at.AREA_ROD] * (par[at.STROKE] - x))

    def pressures(self, way: float) -> tuple[float, float]:
        """Of both chambers, isothermal, closed-in masses frozen. [Pa]"""
        p0 = self.par[at.P_AMB]
        found = []
        for side, p, start, now in zip(
            (self.link.cap, self.link.rod), (self.p_cap, self.p_rod), self.volumes(0.0), self.volumes(way), strict=True
        ):
            frozen = p * start / now
            found.append({"shut": frozen, "checked": max(frozen, p0)}.get(side, p))
        return found[0], found[1]

    def push(self, p_cap: float, p_rod: float, way: float) -> float:
        """Force of pressures, weight, constant force and spring, positive extending. [N]"""
        par, p0 = self.par, self.par[at.P_AMB]
        air = (p_cap - p0) * par[at.AREA_CAP] - (p_rod - p0) * par[at.AREA_ROD]
        spring = par[at.SPRING_FORCE] + par[at.SPRING_RATE] * self.place(way)
        return air - par[at.WEIGHT] + par[at.CONSTANT] + spring

    def leaving(self, way: float) -> float:
        """Driving force after a way. [N]"""
        return self.sign * self.push(*self.pressures(way), way)

    def driving(self) -> Callable[[float], float]:
        """:meth:`leaving`, as a straight line where no air is closed in."""
        start, slope = self.leaving(0.0), self.par[at.SPRING_RATE]
        return self.leaving if any(self.closed) else lambda way: start + slope * way

    @property
    def without_air(self) -> float:
        """Driving force at the start with both sides open. [N]"""
        p0 = self.par[at.P_AMB]
        return self.sign * self.push(p0, p0, 0.0)

    @property
    def closed(self) -> tuple[bool, bool]:
        """Which chambers hold closed-in air."""
        return self.link.cap in ("shut", "checked"), self.link.rod in ("shut", "checked")

    @property
    def trapped(self) -> float:
        """Gauge pressure times volume of what is closed in. [J]"""
        p0 = self.par[at.P_AMB]
        rows = zip(self.closed, (self.p_cap, self.p_rod), self.volumes(0.0), strict=True)
        return sum(((p - p0) * volume for shut, p, volume in rows if shut), 0.0)


def _setting(actuator: Actuator, par: list[float], case: LossCase, end: End) -> _Setting:
    """Settled at the end that the last command led to, then the loss."""
    link = connection(
        actuator.valve.function, case, end,
        supply_check=actuator.holding.supply_check, pilot_check=actuator.holding.pilot_check,
        air_ways=tuple(
            way for way, open_side in (("extend", at.VENTED_CAP), ("retract", at.VENTED_ROD)) if not par[open_side]
        ),
    )  # fmt: skip
    p0, out = par[at.P_AMB], end == "extended"
    filled = {
        "cap": par[at.P_EXTEND] if out and not par[at.VENTED_CAP] else p0,
        "rod": par[at.P_RETRACT] if not out and not par[at.VENTED_ROD] else p0,
    }
    reached = {"open": (p0, p0), "supplied": (par[at.P_EXTEND], par[at.P_RETRACT])}
    return _Setting(
        par=par,
        sign=-1.0 if out else 1.0,
        link=link,
        p_cap=float(reached[link.cap][0] if link.cap in reached else filled["cap"]),
        p_rod=float(reached[link.rod][1] if link.rod in reached else filled["rod"]),
    )


def _by(setting: _Setting, sticking: float, hold: float) -> str:
    """What keeps the piston where it is; empty where nothing does."""
    force = setting.leaving(0.0)
    if force > hold:
        return ""
    if force > 0.0:
        return "friction" if force <= sticking else "rod lock"
    if setting.without_air > hold:
        return "closed-in air" if any(setting.closed) else "supply air"
    return "pressed to its end" if force < 0.0 else "nothing pushes it"


def _leaks(setting: _Setting, hold: float, conductance: float | None) -> float | Refusal:
    """Time until closed-in air no longer holds the piston."""
    par, pressures, volumes = setting.par, (setting.p_cap, setting.p_rod), setting.volumes(0.0)
    rises = (-setting.sign * par[at.AREA_CAP], setting.sign * par[at.AREA_ROD])
    held = next((i for i in (0, 1) if setting.closed[i] and rises[i] > 0.0 and pressures[i] > par[at.P_AMB]), None)
    if held is None:
        return NO_AIR
    other = 1 - held
    return start_of_motion(
        p_held=pressures[held],
        p_other=pressures[other],
        volume=volumes[held],
        other_volume=volumes[other] if setting.closed[other] else None,
        rise=rises[held],
        other_rise=rises[other],
        pressing=hold - setting.leaving(0.0),
        p_ambient=par[at.P_AMB],
        temp=par[at.T_AMB],
        conductance=conductance,
    )


def _moved(setting: _Setting, rubbing: Rubbing, ordinary: HalfStroke | Refusal | None) -> Move:
    """Way, time and speed of a piston that nothing holds."""
    if ordinary is not None:
        way = setting.par[at.STROKE]
        if isinstance(ordinary, Refusal):
            return way, ordinary, ordinary
        return way, ordinary.stroke_time, ordinary.end_speed
    force = setting.driving()
    way = way_until_it_sticks(force, rubbing.sticking, setting.par[at.STROKE])
    found = travel(force, rubbing, setting.par[at.MASS], way)
    return (way, found, found) if isinstance(found, Refusal) else (way, *found)


def holding(actuator: Actuator, stroke: StrokeResult | Refusal, par: Sequence[float] | Array) -> tuple[Held, ...]:
    """What the load does when supply, signal or both are lost, from either end.

    Parameters
    ----------
    actuator : Actuator
    stroke : StrokeResult or Refusal
        Its simulated cycle: where a lost signal starts an ordinary stroke, the figures are those of that stroke.
    par : sequence of float
        The kernel's parameters of the same actuator.

    Returns
    -------
    tuple of Held
        Three losses, each from the extended and from the retracted end.

    Notes
    -----
    The chambers are settled when the loss comes. An open chamber is taken to be at ambient pressure at once, so
    the air that still brakes a falling load is left out; a supplied one keeps its pressure; closed-in air keeps its
    mass at ambient temperature. Forces that only oppose motion are left out, and a rod lock that slips is not
    counted as a brake. All of that is on the safe side.

    References
    ----------
    .. [1] Balance of force and mass, derived in this project.
    """
    row = [float(number) for number in par]
    count = float(actuator.count)
    rubbing = Rubbing(
        breakaway=row[at.BREAKAWAY],
        coulomb=row[at.COULOMB],
        viscous=row[at.VISCOUS],
        stribeck_speed=row[at.STRIBECK],
        guide=row[at.GUIDE],
    )
    hold = rubbing.sticking + count * actuator.holding.rod_lock
    leak = actuator.holding.seal_leak_c
    moves: dict[tuple[float, Connection], Move] = {}
    found = []
    for case in CASES:
        for end in ENDS:
            setting = _setting(actuator, row, case, end)
            by = _by(setting, rubbing.sticking, hold)
            away = "retract" if end == "extended" else "extend"
            starts = _leaks(setting, hold, None if leak is None else count * leak) if by else 0.0
            way, time, speed = STAYS
            if not by:
                key = (setting.sign, setting.link)
                if key not in moves:
                    half: HalfStroke | Refusal | None = None
                    if setting.link.ordinary:
                        half = stroke if isinstance(stroke, Refusal) else getattr(stroke, away)
                    moves[key] = _moved(setting, rubbing, half)
                way, time, speed = moves[key]
            found.append(
                Held(
                    case=case,
                    start=end,
                    cap=setting.link.cap,
                    rod=setting.link.rod,
                    holds=bool(by),
                    by=by,
                    direction="" if starts in (NO_AIR, NEVER) else away,
                    drive=setting.sign * setting.leaving(0.0),
                    hold=hold,
                    way=way,
                    time=time,
                    end_speed=speed,
                    end_energy=speed if isinstance(speed, Refusal) else 0.5 * row[at.MASS] * speed**2,
                    trapped=setting.trapped,
                    starts_after=starts,
                )
            )
    return tuple(found)
