"""A cylinder for scipy, double-acting or with a spring: forces and right-hand sides.

Written from the equations alone, with pressure and temperature of each chamber as the state, so that
it shares nothing with the project's kernel (which carries mass and internal energy) but the parts.
"""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from actuator.parts import Actuator, Machine, Site

from .reference_flow import (
    GAMMA,
    GRAVITY,
    R_AIR,
    Exchange,
    PathTable,
    chains,
    exchange_by_chain,
    exchange_by_table,
    shut,
)
from .reference_ledger import LedgerTerms, Tally, ledger_rates

Array = NDArray[np.float64]
Direction = Literal["extend", "retract"]
RightHandSide = Callable[[float, Array], list[float]]


@dataclass
class State:
    """Where the cylinder stands: piston, its way of moving (−1, 0, +1), pressure and temperature."""

    x: float
    v: float
    way: int
    p1: float
    t1: float
    p2: float
    t2: float

    def gas(self) -> Array:
        return np.array([self.p1, self.t1, self.p2, self.t2])


@dataclass(frozen=True)
class Connection:
    """How the valve stands in one segment."""

    direction: Direction
    cut: bool
    """The supply path of the filling chamber is shut."""
    ramp: float
    """Opening time while the paths still open, else 0; they count from the switching. [s]"""

    def opening(self, time: float) -> float:
        return time / self.ramp if self.ramp else 1.0


class Model:
    """Equations of one cylinder."""

    def __init__(
        self,
        actuator: Actuator,
        machine: Machine,
        site: Site,
        *,
        table: PathTable | None = None,
        exact: bool = False,
    ) -> None:
        self.part = actuator
        self.p0, self.temp0 = site.ambient_pressure, site.ambient_temperature
        self.temp_s = machine.supply_temperature
        back = actuator.return_pressure
        self.p_supply = {"extend": machine.supply_pressure, "retract": back or machine.supply_pressure}
        self.period = machine.cycle_time
        full, annulus = math.pi / 4 * actuator.bore**2, math.pi / 4 * (actuator.bore**2 - actuator.rod**2)
        self.area1 = annulus if actuator.kind == "through-rod" else full
        self.area2 = full if actuator.kind == "rodless" else annulus
        self.vented = {"spring-return": "rod", "spring-extend": "cap"}.get(actuator.kind, "")
        load = actuator.load
        self.guide = load.guide_friction * load.mass * GRAVITY * math.cos(load.inclination)
        self.steady = (
            load.constant_force - self.p0 * (self.area1 - self.area2) - load.mass * GRAVITY * math.sin(load.inclination)
        )
        self.ledger = False
        self.tally = Tally()
        self.paths = self._paths(table, exact)

    def _paths(self, table: PathTable | None, exact: bool) -> dict[tuple[str, str], Exchange]:
        """Exchange of each chamber with supply and atmosphere, keyed (side, "supply"/"atmosphere")."""
        built = chains(self.part)
        if table is None and not exact:
            table = {name: chain[0] for name, chain in built.items() if len(chain) == 1}
            assert len(table) == len(built), "with a throttle give a path table, or exact=True"
        found: dict[tuple[str, str], Exchange] = {}
        for side, direction in (("cap", "extend"), ("rod", "retract")):
            if side == self.vented:
                found[side, "supply"] = found[side, "atmosphere"] = shut
                continue
            p_s = self.p_supply[direction]
            for far, into, out, p_far, temp in (
                ("supply", f"{side}, filling", f"{side}, back to supply", p_s, self.temp_s),
                ("atmosphere", f"{side}, sucking in", f"{side}, exhausting", self.p0, self.temp0),
            ):
                found[side, far] = (
                    exchange_by_table(table[into], table[out], p_far, temp)
                    if table is not None
                    else exchange_by_chain(built[into], built[out], p_far, temp)
                )
        return found

    def spring(self, x: float) -> float:
        """Force of the spring along +x: in at the retracted end it is relaxed to its preload, or out there. [N]"""
        coil = self.part.spring
        if coil is None:
            return 0.0
        if self.vented == "rod":
            return -(coil.preload + coil.rate * x)
        return coil.preload + coil.rate * (self.part.stroke - x)

    def drive(self, p1: float, p2: float, x: float) -> float:
        """Force along +x without friction and without what only opposes motion. [N]"""
        return p1 * self.area1 - p2 * self.area2 + self.steady + self.spring(x)

    def opposing(self, x: float, way: int) -> float:
        """What only opposes motion in direction ``way`` at ``x``, without friction. [N]"""
        load = self.part.load
        if way < 0:
            return load.retract_force
        return load.extend_force + sum(z.force for z in load.process_force if z.start <= x <= z.end)

    def threshold(self, x: float, way: int) -> float:
        """Force that starting in direction ``way`` has to exceed. [N]"""
        return self.part.friction.breakaway + self.guide + self.opposing(x, way)

    def has_room(self, x: float, way: int) -> bool:
        """Whether the piston can move in direction ``way``, or stands at that stop."""
        return x < self.part.stroke if way > 0 else x > 0.0

    def starts(self, state: State) -> int:
        """Way in which a resting piston is driven beyond its threshold: +1, −1, or 0."""
        force = self.drive(state.p1, state.p2, state.x)
        ways = (way for way in (1, -1) if self.has_room(state.x, way))
        return next((way for way in ways if way * force > self.threshold(state.x, way)), 0)

    def chamber(
        self, p: float, t: float, q: float, t_far: float, vol: float, vol_rate: float, wall: float
    ) -> tuple[float, float, float]:
        """Rates of pressure [Pa/s] and temperature [K/s], and the heat from the wall [W]."""
        h, index = self.part.wall_heat_transfer, self.part.polytropic_index
        bracket = R_AIR * q * (t_far if q > 0.0 else t) - p * vol_rate
        if index is None:
            heat = h * wall * (self.temp0 - t) if h else 0.0
            p_rate = (GAMMA * bracket + (GAMMA - 1.0) * heat) / vol
        else:
            heat = (index - GAMMA) / (GAMMA - 1.0) * bracket
            p_rate = index * bracket / vol
        return p_rate, t * (p_rate / p + (vol_rate - q * R_AIR * t / p) / vol), heat

    def _flows(self, connection: Connection) -> tuple[Exchange, Exchange, float, float]:
        """Flow into cap and rod side, and the temperature that the air comes with."""
        if connection.direction == "extend":
            into_cap = shut if connection.cut else self.paths["cap", "supply"]
            return into_cap, self.paths["rod", "atmosphere"], self.temp_s, self.temp0
        into_rod = shut if connection.cut else self.paths["rod", "supply"]
        return self.paths["cap", "atmosphere"], into_rod, self.temp0, self.temp_s

    def _ledger(self, connection: Connection, way: int, against: float) -> LedgerTerms | None:
        return ledger_rates(self, connection.direction, way, against) if self.ledger else None

    def moving(self, connection: Connection, way: int, x_ahead: float) -> RightHandSide:
        """Rates of (x, v, p1, T1, p2, T2); the opposing force is the one at ``x_ahead``."""
        part, friction, mass = self.part, self.part.friction, self.part.load.mass
        stroke, a1, a2, dead1, dead2 = (
            part.stroke,
            self.area1,
            self.area2,
            part.dead_volume_cap,
            part.dead_volume_rod,
        )
        round_wall, vented = math.pi * part.bore, self.vented
        f_c, k_v, v_s = friction.coulomb, friction.viscous, friction.stribeck_speed
        f_over = friction.breakaway - f_c
        against = self.guide + self.opposing(x_ahead, way)
        flow1, flow2, far1, far2 = self._flows(connection)
        ledger = self._ledger(connection, way, against)

        def rates(time: float, y: Array) -> list[float]:
            x, v, p1, t1, p2, t2 = y.tolist()[:6]
            opening = connection.opening(time)
            q1, q2 = flow1(p1, t1, opening), flow2(p2, t2, opening)
            speed = v * way
            rub = f_c + f_over * math.exp(-((speed / v_s) ** 2)) + k_v * speed
            left = stroke - x
            dp1, dt1, h1 = self.chamber(p1, t1, q1, far1, dead1 + a1 * x, a1 * v, round_wall * x + 2.0 * a1)
            dp2, dt2, h2 = self.chamber(p2, t2, q2, far2, dead2 + a2 * left, -a2 * v, round_wall * left + 2.0 * a2)
            if vented == "rod":
                dp2 = dt2 = h2 = 0.0
            elif vented == "cap":
                dp1 = dt1 = h1 = 0.0
            found = [v, (self.drive(p1, p2, x) - way * (rub + against)) / mass, dp1, dt1, dp2, dt2]
            if ledger:
                found += ledger(v, rub, (p1, t1, q1, h1), (p2, t2, q2, h2))
            return found

        return rates

    def resting(self, connection: Connection, x: float) -> RightHandSide:
        """Rates of (p1, T1, p2, T2) with the piston standing at ``x``."""
        part, a1, a2 = self.part, self.area1, self.area2
        left = part.stroke - x
        vol1, vol2 = part.dead_volume_cap + a1 * x, part.dead_volume_rod + a2 * left
        wall1, wall2 = math.pi * part.bore * x + 2.0 * a1, math.pi * part.bore * left + 2.0 * a2
        flow1, flow2, far1, far2 = self._flows(connection)
        ledger = self._ledger(connection, 0, 0.0)

        def rates(time: float, y: Array) -> list[float]:
            p1, t1, p2, t2 = y.tolist()[:4]
            opening = connection.opening(time)
            q1, q2 = flow1(p1, t1, opening), flow2(p2, t2, opening)
            dp1, dt1, h1 = self.chamber(p1, t1, q1, far1, vol1, 0.0, wall1)
            dp2, dt2, h2 = self.chamber(p2, t2, q2, far2, vol2, 0.0, wall2)
            found = [dp1, dt1, dp2, dt2]
            if ledger:
                found += ledger(0.0, 0.0, (p1, t1, q1, h1), (p2, t2, q2, h2))
            return found

        return rates
