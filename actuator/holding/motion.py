"""How a load moves that nothing holds: how far, how long, how fast."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass

from actuator.errors import Refusal
from actuator.mechanics.friction import running
from actuator.stroke.result import Array

TOLERANCE = 1e-6
"""Error of a step, relative. [1]"""
MOST_STEPS = 2000
LONGEST = 3600.0
"""Motions that take longer are not followed. [s]"""
CREEPS = Refusal("it creeps: longer than an hour")


@dataclass(frozen=True, slots=True, kw_only=True)
class Rubbing:
    """Friction of the cylinder and of the guide, as of :func:`actuator.mechanics.friction.running`."""

    breakaway: float
    """[N]"""
    coulomb: float
    """[N]"""
    viscous: float
    """[N*s/m]"""
    stribeck_speed: float
    """[m/s]"""
    guide: float
    """[N]"""

    @property
    def sticking(self) -> float:
        """Force that starting has to overcome. [N]"""
        return self.breakaway + self.guide

    def at(self, speed: float) -> float:
        """Friction force at a speed. [N]"""
        return self.guide + running(speed, self.breakaway, self.coulomb, self.viscous, self.stribeck_speed)


def way_until_it_sticks(force: Callable[[float], float], sticking: float, stroke: float) -> float:
    """Way to where the driving force has fallen to what friction holds.

    Parameters
    ----------
    force : callable
        Driving force after a way, not rising with it. [N]
    sticking : float
        What friction holds at rest; less than the force at the start. [N]
    stroke : float
        Whole way. [m]

    Returns
    -------
    float
        The stroke where the force exceeds friction to the end. [m]
    """
    if force(stroke) >= sticking:
        return stroke
    low, high = 0.0, stroke
    while high - low > 1e-12 * stroke:
        middle = 0.5 * (low + high)
        low, high = (middle, high) if force(middle) > sticking else (low, middle)
    return 0.5 * (low + high)


def travel(force: Callable[[float], float], rubbing: Rubbing, mass: float, way: float) -> tuple[float, float] | Refusal:
    r"""Time that a mass takes from rest over a way, and its speed there.

    Parameters
    ----------
    force : callable
        Driving force after a way; above what friction holds until the end of the way. [N]
    rubbing : Rubbing
    mass : float
        [kg]
    way : float
        [m]

    Returns
    -------
    tuple of float, or Refusal
        Time [s] and speed [m/s]; refused where it creeps for more than an hour.

    Notes
    -----
    .. math:: M \dot v = D(x) - F(v)

    With :math:`x = x_e u^2` the speed grows evenly with u, so that rest at u = 0 and the end at u = 1 need no
    search: :math:`dv/du = 2 x_e u\, a/v`, :math:`dt/du = 2 x_e u/v`. Steps by the pair of Bogacki and Shampine,
    3(2); where viscous friction rules, so that these would be too many, by scipy's LSODA.
    """
    start = (force(0.0) - rubbing.at(0.0)) / mass
    slope = math.sqrt(max(2.0 * way * start, 0.0))

    def speed_rate(u: float, v: float) -> float:
        if u == 0.0:
            return slope
        return 2.0 * way * u * (force(way * u * u) - rubbing.at(v)) / (mass * v)

    u, v, time, step = 0.0, 0.0, 0.0, 1e-3
    if slope == 0.0:
        return CREEPS
    rate, pace = slope, 2.0 * way / slope
    for _ in range(MOST_STEPS):
        step = min(step, 1.0 - u)
        v2 = v + 0.5 * step * rate
        rate2 = speed_rate(u + 0.5 * step, v2)
        v3 = v + 0.75 * step * rate2
        if min(v2, v3) <= 0.0:
            step *= 0.25
            continue
        rate3 = speed_rate(u + 0.75 * step, v3)
        new = v + step * (2.0 * rate + 3.0 * rate2 + 4.0 * rate3) / 9.0
        if new <= 0.0:
            step *= 0.25
            continue
        rate4 = speed_rate(u + step, new)
        lower = v + step * (7.0 * rate + 6.0 * rate2 + 8.0 * rate3 + 3.0 * rate4) / 24.0
        error = abs(new - lower) / (TOLERANCE * new)
        if error > 1.0:
            step *= max(0.9 * error ** (-1.0 / 3.0), 0.2)
            continue
        pace2, pace3 = (2.0 * way * (u + part * step) / found for part, found in ((0.5, v2), (0.75, v3)))
        pace_new = 2.0 * way * (u + step) / new
        time += step * (2.0 * pace + 3.0 * pace2 + 4.0 * pace3) / 9.0
        u, v, rate, pace = u + step, new, rate4, pace_new
        if u >= 1.0:
            return (time, v) if time < LONGEST else CREEPS
        step *= min(0.9 * max(error, 1e-6) ** (-1.0 / 3.0), 4.0)
    return _slowly(force, rubbing, mass, way)


def _slowly(
    force: Callable[[float], float], rubbing: Rubbing, mass: float, way: float
) -> tuple[float, float] | Refusal:
    """The same in time, for motions that friction rules."""
    from scipy.integrate import solve_ivp

    def rates(_: float, y: Array) -> tuple[float, float]:
        x, v = float(y[0]), float(y[1])
        return v, (force(min(max(x, 0.0), way)) - rubbing.at(max(v, 0.0))) / mass

    def there(_: float, y: Array) -> float:
        return float(y[0]) - way

    there.terminal = True  # type: ignore[attr-defined]
    accuracy = (1e-9 * way, 1e-9)
    found = solve_ivp(rates, (0.0, LONGEST), (0.0, 0.0), method="LSODA", events=there, rtol=1e-8, atol=accuracy)
    if found.t_events is None or found.y_events is None or not found.t_events[0].size:
        return CREEPS
    return float(found.t_events[0][0]), float(found.y_events[0][0][1])
