"""What a cycle's histories tell beyond its times: swinging of the air springs, deceleration, letting go."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np
from numpy.typing import ArrayLike

from actuator.air.gas import GAMMA
from actuator.errors import Refusal
from actuator.parts import Actuator, Machine
from actuator.stroke import layout as at
from actuator.stroke.histories import push_on, since
from actuator.stroke.result import Array, StrokeResult


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class HalfDynamics:
    """One way of the piston; times count from its valve command."""

    natural_frequency: float | Refusal
    """Of mass and air springs, lowest while the piston moves this way. [Hz]"""
    peak_deceleration: float | Refusal
    """Highest while it moves this way; what a rigid stop does is left out. [m/s**2]"""
    release_time: float | Refusal
    """Until the force of the other way, less running friction, has gone. [s]"""
    unloaded_time: float | Refusal
    """Until the force of the other way has gone, friction left out. [s]"""


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class Dynamics:
    """Both ways of one actuator's periodic cycle."""

    extend: HalfDynamics
    retract: HalfDynamics
    force: Array
    """Shape (n,), on the time axis of the cycle: pressures, weight, constant force and spring, positive extending,
    friction left out. [N]"""


def natural_frequency(
    p_cap: ArrayLike,
    p_rod: ArrayLike,
    volume_cap: ArrayLike,
    volume_rod: ArrayLike,
    *,
    area_cap: float,
    area_rod: float,
    mass: float,
    index: float = GAMMA,
    spring_rate: float = 0.0,
) -> Array:
    r"""Natural frequency of a mass between two closed air springs.

    Parameters
    ----------
    p_cap, p_rod : array_like
        Pressures, absolute. [Pa]
    volume_cap, volume_rod : array_like
        Volumes, dead volume included. [m³]
    area_cap, area_rod : float
        Piston areas; zero for a side without air of its own. [m²]
    mass : float
        Everything that moves. [kg]
    index : float
        Polytropic index of the air. [1]
    spring_rate : float
        Of a spring on the piston. [N/m]

    Returns
    -------
    ndarray
        [Hz]

    Notes
    -----
    .. math:: \omega^2 = \frac{1}{M} \left[n \left(\frac{p_1 A_1^2}{V_1} + \frac{p_2 A_2^2}{V_2}\right) + k\right]

    References
    ----------
    .. [1] Textbooks of pneumatic drives: 4·n·p·A/(m·L) in the middle of an equal-area cylinder (from memory).
    """
    cap, rod, v_cap, v_rod = (np.asarray(item, dtype=np.float64) for item in (p_cap, p_rod, volume_cap, volume_rod))
    springs = cap * area_cap**2 / v_cap + rod * area_rod**2 / v_rod
    result: Array = np.sqrt((index * springs + spring_rate) / mass) / (2.0 * math.pi)
    return result


def push_of(stroke: StrokeResult, par: Array) -> Array:
    """Force on the piston over a cycle, without friction and opposing forces, positive extending.

    Parameters
    ----------
    stroke : StrokeResult
    par : ndarray
        The kernel's parameters of the same actuator.

    Returns
    -------
    ndarray
        Shape of the cycle's time axis, read-only. [N]
    """
    push = push_on(stroke, par)
    push.setflags(write=False)
    return push


def _falls_to(level: float, clock: Array, force: Array, field: str) -> float | Refusal:
    """Time at which a force first is no more than a level, straight lines between the points."""
    if force[0] <= level:
        return 0.0
    low = np.flatnonzero(force <= level)
    if not len(low):
        return Refusal(f"{float(force[-1]):.4g} N of it still stand at the next command", field)
    i = int(low[0])
    share = (force[i - 1] - level) / (force[i - 1] - force[i])
    return float(clock[i - 1] + share * (clock[i] - clock[i - 1]))


def _half(
    sign: float,
    actuator: Actuator,
    machine: Machine,
    stroke: StrokeResult,
    frequency: Array,
    push: Array,
    coulomb: float,
) -> HalfDynamics:
    direction = "extend" if sign > 0.0 else "retract"
    command, counter = actuator.extend_at, actuator.retract_at
    if sign < 0.0:
        command, counter = counter, command
    period, delay = machine.cycle_time, actuator.valve.delay
    passed = since(stroke.time, (command + delay) % period, period)
    order = np.flatnonzero(passed <= (counter - command) % period)
    order = order[np.argsort(passed[order], kind="stable")]
    clock = passed[order] + delay
    speed, step = sign * stroke.speed, np.diff(stroke.time)
    moving = speed > 0.0
    still = Refusal("the piston does not move this way", f"{direction}.peak_speed")
    smooth = (step > 1e-9) & moving[:-1]
    deceleration = -np.diff(speed)[smooth] / step[smooth]
    against = -sign * push[order]
    return HalfDynamics(
        natural_frequency=float(frequency[moving].min()) if moving.any() else still,
        peak_deceleration=float(deceleration.max(initial=0.0)) if moving.any() else still,
        release_time=_falls_to(coulomb, clock, against, f"{direction}.release_time"),
        unloaded_time=_falls_to(0.0, clock, against, f"{direction}.unloaded_time"),
    )


def dynamics(actuator: Actuator, machine: Machine, stroke: StrokeResult, par: Array) -> Dynamics:
    """Natural frequency, deceleration and time to let go of both ways.

    Parameters
    ----------
    actuator, machine : part
    stroke : StrokeResult
        Their periodic cycle.
    par : ndarray
        The kernel's parameters of the same.

    Returns
    -------
    Dynamics
    """
    push = push_of(stroke, par)
    frequency = natural_frequency(
        stroke.p_cap,
        stroke.p_rod,
        stroke.volume_cap,
        stroke.volume_rod,
        area_cap=0.0 if par[at.VENTED_CAP] else par[at.AREA_CAP],
        area_rod=0.0 if par[at.VENTED_ROD] else par[at.AREA_ROD],
        mass=par[at.MASS],
        index=actuator.polytropic_index or GAMMA,
        spring_rate=-par[at.SPRING_RATE],
    )
    coulomb = float(par[at.COULOMB])
    extend, retract = (_half(sign, actuator, machine, stroke, frequency, push, coulomb) for sign in (1.0, -1.0))
    return Dynamics(extend=extend, retract=retract, force=push)
