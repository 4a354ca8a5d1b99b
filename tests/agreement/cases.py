"""Varied cylinders on which the project's kernel and the reference model have to agree.

All of them are invented. Lengths in mm, conductances in dm³/(s·bar), pressures in bar absolute.
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any

from actuator.parts import Actuator, Friction, Load, Machine, ProcessForce, Site, Spring, Throttle, Valve
from actuator.parts.actuator import acting_needles

CONDUCTANCE = 1e-8
"""One dm³/(s·bar). [m³/(s·Pa)]"""


@dataclass(frozen=True)
class Case:
    """One cylinder in its machine."""

    name: str
    actuator: Actuator
    machine: Machine
    site: Site


def case(
    name: str,
    bore: float,
    rod: float,
    stroke: float,
    mass: float,
    *,
    c: float,
    exhaust_c: float | None = None,
    b: float = 0.3,
    m: float = 0.5,
    supply: float = 7.0,
    ambient: float = 1.0,
    temp_supply: float = 293.15,
    temp_ambient: float = 293.15,
    period: float = 4.0,
    extend_at: float = 0.0,
    retract_at: float | None = None,
    delay: float = 0.015,
    opening: float = 0.005,
    dead: float | tuple[float, float] | None = None,
    friction: tuple[float, float, float] | None = None,
    throttle: tuple[str, float, float, float] | None = None,
    throttle_b: float = 0.3,
    slope: float = 0.0,
    process: tuple[tuple[float, float, float], ...] = (),
    load: dict[str, float] | None = None,
    back: float | None = None,
    h: float | None = 60.0,
    n: float | None = None,
    coil: tuple[float, float] | None = None,
    **more: Any,
) -> Case:
    """Build a case; dead volumes [cm³] and friction default to common practice, ``slope`` in degrees.

    ``coil`` is a spring's rate [N/mm] and preload [N].
    """
    kind = more.get("kind", "double-acting")
    acting = acting_needles(kind, throttle[0]) if throttle else ()
    area = math.pi / 4 * (bore * 1e-3) ** 2
    push = (supply - ambient) * 1e5 * area
    breakaway, coulomb, viscous = friction or (0.08 * push, 0.05 * push, 0.6 * bore)
    dead_cap, dead_rod = dead if isinstance(dead, tuple) else (dead, dead)
    small = 0.1 * bore * 1e-3 * area
    part = Actuator(
        name=name,
        bore=bore * 1e-3,
        rod=rod * 1e-3,
        stroke=stroke * 1e-3,
        dead_volume_cap=small if dead_cap is None else dead_cap * 1e-6,
        dead_volume_rod=small if dead_rod is None else dead_rod * 1e-6,
        closed_length=bore * 1e-3,
        bearing_length=0.5e-3 * bore,
        return_pressure=None if back is None else back * 1e5,
        extend_at=extend_at,
        retract_at=period / 2 if retract_at is None else retract_at,
        wall_heat_transfer=None if n is not None else h,
        polytropic_index=n,
        load=Load(
            mass=mass,
            inclination=math.radians(slope),
            process_force=tuple(ProcessForce(start=a * 1e-3, end=z * 1e-3, force=f) for a, z, f in process),
            **(load or {}),
        ),
        friction=Friction(breakaway=breakaway, coulomb=coulomb, viscous=viscous, stribeck_speed=0.02),
        valve=Valve(
            supply_c=c * CONDUCTANCE,
            supply_b=b,
            exhaust_c=(exhaust_c or c) * CONDUCTANCE,
            exhaust_b=b,
            m=m,
            delay=delay,
            opening_time=opening,
            function="3/2" if coil else "5/2 spring",
        ),
        spring=None if coil is None else Spring(rate=coil[0] * 1e3, preload=coil[1]),
        throttle=Throttle()
        if throttle is None
        else Throttle(
            kind="meter-in" if throttle[0] == "meter-in" else "meter-out",
            extend_c=throttle[1] * CONDUCTANCE if "extend_c" in acting else None,
            retract_c=throttle[2] * CONDUCTANCE if "retract_c" in acting else None,
            free_c=throttle[3] * CONDUCTANCE,
            b=throttle_b,
        ),
        **more,
    )
    machine = Machine(
        name=name, supply_pressure=supply * 1e5, supply_temperature=temp_supply, cycle_time=period, actuators=(part,)
    )
    return Case(name, part, machine, Site(ambient_pressure=ambient * 1e5, ambient_temperature=temp_ambient))


def base_case(name: str, **changed: Any) -> Case:
    """The base case of the ledger's reference rows, with changes."""
    given: dict[str, Any] = {
        "c": 2.0, "dead": 20.0, "friction": (90.0, 60.0, 30.0), "delay": 0.0, "opening": 0.0
    }  # fmt: skip
    return case(name, 50, 20, 400, changed.pop("mass", 20.0), **(given | changed))


REFERENCE_CASES = (
    base_case("base"),
    base_case("short 1.2 s", period=1.2),
    base_case("loaded", load={"extend_force": 400.0, "retract_force": 100.0, "guide_friction": 0.1}),
    base_case("big dead vol.", dead=200.0),
    base_case("exhaust C x20", exhaust_c=40.0),
)
"""The five rows of the ledger."""

SPRINGS = (
    case("spring returns", 32, 12, 50, 2.0, c=0.8, kind="spring-return", coil=(1.0, 60.0), period=1.5),
    case("spring extends", 32, 12, 50, 2.0, c=0.8, kind="spring-extend", coil=(1.0, 60.0), period=1.5),
    case("spring, tiny", 12, 6, 10, 0.05, c=0.2, kind="spring-return", coil=(0.5, 8.0), period=0.6),
    case("spring, stopper", 40, 16, 25, 3.0, c=1.0, kind="spring-return", coil=(2.0, 50.0), slope=90, period=1.2),
    case("spring lifts", 40, 16, 40, 2.0, c=1.0, kind="spring-extend", coil=(1.5, 90.0), slope=90, period=2.0),
    case(
        "spring, meter-out", 32, 12, 80, 3.0, c=1.2, kind="spring-return", coil=(0.8, 70.0),
        throttle=("meter-out", 0.2, 0.15, 1.5), period=3.0,
    ),
    case(
        "spring, meter-in", 32, 12, 80, 3.0, c=1.2, kind="spring-return", coil=(0.8, 70.0),
        throttle=("meter-in", 0.2, 0.2, 1.5), period=3.0,
    ),
    case(
        "spring extends, meter-out", 40, 16, 100, 5.0, c=1.5, kind="spring-extend", coil=(0.8, 100.0),
        throttle=("meter-out", 0.3, 0.3, 2.0), period=3.0,
    ),
    case("spring turned back early", 32, 12, 100, 6.0, c=0.5, kind="spring-return", coil=(0.5, 60.0), retract_at=0.15),
    case(
        "spring against work", 50, 20, 60, 5.0, c=1.5, kind="spring-return", coil=(1.0, 120.0),
        process=((40, 60, 300.0),),
    ),
    case("spring, cut off", 40, 16, 80, 4.0, c=1.5, kind="spring-return", coil=(0.6, 80.0), cut_off=0.6, period=2.0),
    case("spring, index 1.2", 40, 16, 80, 4.0, c=1.5, kind="spring-extend", coil=(0.6, 80.0), n=1.2, period=2.0),
    case("spring held by pressure", 50, 20, 80, 3.0, c=1.0, supply=2.0, kind="spring-return", coil=(1.5, 120.0)),
    case(
        "spring too weak", 40, 16, 80, 4.0, c=1.5, kind="spring-return", coil=(0.3, 40.0),
        load={"guide_friction": 1.0},
    ),
    case("spring, adiabatic", 40, 16, 80, 4.0, c=1.5, kind="spring-return", coil=(0.6, 80.0), h=0.0, period=1.0),
)  # fmt: skip
"""Single-acting cylinders."""

CASES = (
    *REFERENCE_CASES,
    *SPRINGS,
    case("through rod", 40, 16, 200, 8.0, c=1.5, kind="through-rod", period=2.5),
    case("through rod up a ramp", 50, 20, 300, 20.0, c=2.0, kind="through-rod", slope=30),
    case("rodless", 40, 0, 600, 10.0, c=1.5, kind="rodless", period=5.0),
    case(
        "rodless, meter-out", 32, 0, 900, 6.0, c=1.2, kind="rodless", throttle=("meter-out", 0.4, 0.6, 1.5), period=8.0
    ),
    case("tiny", 12, 6, 10, 0.1, c=0.3, period=1.0),
    case("small meter-out", 12, 6, 100, 0.5, c=0.4, throttle=("meter-out", 0.15, 0.15, 0.4), period=2.0),
    case("small and quick", 16, 6, 50, 0.3, c=0.8, period=0.5),
    case("small, lifting", 20, 8, 25, 3.0, c=0.6, slope=90, period=1.0),
    case("small, lowering", 20, 8, 200, 2.0, c=0.6, slope=-90, period=2.0),
    case("meter-in", 25, 10, 100, 2.0, c=1.0, throttle=("meter-in", 0.3, 0.3, 1.2), period=3.0),
    case("meter-out, unequal needles", 32, 12, 160, 5.0, c=1.5, throttle=("meter-out", 0.5, 1.0, 2.0)),
    case("meter-in, unequal needles", 32, 12, 250, 5.0, c=1.5, throttle=("meter-in", 0.8, 0.4, 2.0), throttle_b=0.2),
    case("lifting, meter-out", 40, 16, 320, 25.0, c=2.0, slope=90, throttle=("meter-out", 1.0, 1.0, 3.0)),
    case("lowering, meter-out", 40, 16, 320, 25.0, c=2.0, slope=-90, throttle=("meter-out", 0.8, 1.5, 3.0)),
    case("lowering, free", 50, 20, 500, 15.0, c=3.0, slope=-90),
    case("up a ramp", 63, 20, 500, 60.0, c=4.0, slope=30, load={"guide_friction": 0.1}, period=5.0),
    case("down a ramp", 63, 20, 500, 60.0, c=4.0, slope=-30, load={"guide_friction": 0.15}, period=5.0),
    case("heavy slide", 80, 25, 600, 150.0, c=6.0, load={"guide_friction": 0.05}, period=6.0),
    case("large, meter-out", 100, 25, 800, 200.0, c=10.0, throttle=("meter-out", 5.0, 5.0, 12.0), period=8.0),
    case("largest", 125, 32, 1000, 300.0, c=15.0, period=8.0),
    case("longest", 50, 20, 1500, 10.0, c=2.5, period=10.0),
    case("largest, shortest", 125, 32, 10, 20.0, c=6.0, period=1.5),
    case("longest, slow", 32, 12, 1500, 4.0, c=1.2, throttle=("meter-out", 0.25, 0.25, 1.5), period=30.0),
    case("turned back halfway out", 50, 20, 400, 20.0, c=2.0, period=3.0, retract_at=0.3),
    case("return never finished", 50, 20, 400, 20.0, c=1.5, period=0.5),
    case("never finished either way", 50, 20, 800, 20.0, c=1.5, period=0.4),
    case("weaker return, turned back", 50, 20, 400, 40.0, c=2.0, back=2.0, period=3.0, retract_at=0.25),
    case("just time enough", 40, 16, 200, 8.0, c=2.0, period=0.8),
    case("pressing at the end", 63, 20, 100, 5.0, c=3.0, process=((80, 100, 1000.0),), period=2.0),
    case("two overlapping zones", 63, 20, 200, 5.0, c=3.0, process=((40, 120, 400.0), (80, 160, 600.0)), period=3.0),
    case("stopped by the work", 40, 16, 200, 5.0, c=2.0, process=((120, 200, 2000.0),), period=3.0),
    case("guide friction", 50, 20, 300, 80.0, c=2.5, load={"guide_friction": 0.3}),
    case("pushed", 50, 20, 300, 20.0, c=2.5, load={"constant_force": 300.0}),
    case("pulled", 50, 20, 300, 20.0, c=2.5, load={"constant_force": -300.0}),
    case("weaker return", 50, 20, 400, 20.0, c=2.0, back=4.0),
    case("weaker return, lifting", 40, 16, 250, 20.0, c=2.0, back=3.0, slope=90),
    case("cut off at half", 63, 20, 400, 20.0, c=3.0, cut_off=0.5),
    case("cut off, throttled", 50, 20, 300, 10.0, c=2.0, cut_off=0.7, throttle=("meter-out", 1.0, 1.0, 3.0)),
    case("cut off too soon, falls back", 50, 20, 400, 45.0, c=2.0, cut_off=0.2, slope=90),
    case("cut off, short cycle", 63, 20, 300, 15.0, c=4.0, cut_off=0.6, period=1.2),
    case("index 1.2", 50, 20, 400, 20.0, c=2.0, n=1.2),
    case("index 1.0", 32, 12, 200, 5.0, c=1.5, n=1.0, period=2.0),
    case("index 1.4", 63, 20, 250, 30.0, c=3.0, n=1.4, period=3.0),
    case("adiabatic", 50, 20, 400, 20.0, c=2.0, h=0.0),
    case("adiabatic, short cycle", 40, 16, 250, 6.0, c=2.0, h=0.0, period=0.9),
    case("strong heat transfer", 50, 20, 400, 20.0, c=2.0, h=1000.0),
    case("dead volumes, short cycle", 40, 16, 100, 6.0, c=1.5, dead=(300.0, 150.0), period=1.0),
    case("at once", 40, 16, 200, 10.0, c=2.0, delay=0.0, opening=0.0, period=2.0),
    case("slow valve", 50, 20, 250, 10.0, c=3.0, delay=0.06, opening=0.15),
    case("commands turned round", 40, 16, 200, 10.0, c=2.0, extend_at=1.5, retract_at=0.4, period=2.5),
    case("too heavy to lift", 40, 16, 200, 90.0, c=2.0, slope=90),
    case("too weak to return", 40, 16, 200, 70.0, c=2.0, slope=-90, load={"retract_force": 200.0}),
    case("warm supply", 50, 20, 300, 15.0, c=2.0, temp_supply=318.15, temp_ambient=278.15),
    case("cold supply", 50, 20, 300, 15.0, c=2.0, temp_supply=278.15, temp_ambient=308.15, period=1.6),
    case("m 0.6", 50, 20, 300, 15.0, c=2.0, b=0.15, m=0.6),
    case("m 0.42", 32, 12, 300, 8.0, c=1.5, b=0.45, m=0.42, throttle=("meter-in", 0.7, 0.7, 2.0)),
    case("high b", 50, 20, 300, 15.0, c=2.0, b=0.6, exhaust_c=1.2),
    case("on a mountain", 50, 20, 300, 15.0, c=2.0, ambient=0.7, supply=5.0),
    case("high pressure", 25, 10, 150, 4.0, c=1.0, supply=11.0, period=2.0),
    case("low pressure", 80, 25, 200, 10.0, c=4.0, supply=2.5, period=3.0),
    case("hardly any friction", 40, 16, 250, 10.0, c=2.0, friction=(1.0, 1.0, 5.0), period=3.0),
    case("small exhaust", 63, 20, 300, 25.0, c=4.0, exhaust_c=1.0, period=4.0),
)
"""Every case, the reference rows first."""
