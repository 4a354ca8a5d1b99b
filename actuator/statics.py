"""Sections of an analysis that need no motion: static forces, and the extended rod."""

from __future__ import annotations

import math

from actuator.errors import Refusal
from actuator.mechanics.buckling import column, end_factor, longest_stroke
from actuator.mechanics.force import (
    force_reserve,
    load_ratio,
    opposing_extend,
    opposing_retract,
    required_bore,
)
from actuator.mechanics.sag import extended_rod
from actuator.mechanics.spring import required_bore_against_spring
from actuator.parts import Actuator, Machine, Site
from actuator.results import Rod, Static

BUCKLING_SAFETY = 4.0
"""Safety that the longest stroke is given for where none is asked: common practice (3.5 to 5), no source. [1]"""


def _thrusts(actuator: Actuator, machine: Machine, site: Site) -> tuple[float, float]:
    """Force of the air on one cylinder's piston, extending and retracting; 0 where no air drives it. [N]"""
    p0 = site.ambient_pressure
    out = (machine.supply_pressure - p0) * actuator.area_cap
    back = ((actuator.return_pressure or machine.supply_pressure) - p0) * actuator.area_rod
    return out if "extend" in actuator.air_ways else 0.0, back if "retract" in actuator.air_ways else 0.0


def theoretical_forces(actuator: Actuator, machine: Machine, site: Site) -> tuple[float, float]:
    """Theoretical force of all cylinders together, no friction.

    Parameters
    ----------
    actuator, machine, site : part

    Returns
    -------
    tuple of float
        Extending and retracting. Against a spring it is what the air leaves over at the end of its stroke, and
        the spring's own way has the preload: each way at its weakest. [N]
    """
    out, back = _thrusts(actuator, machine, site)
    if actuator.spring is not None:
        preload, largest = actuator.spring.preload, actuator.spring.largest(actuator.stroke)
        out, back = (out - largest, preload) if actuator.kind == "spring-return" else (preload, back - largest)
    return actuator.count * out, actuator.count * back


def _ratio(actuator: Actuator, way: str, load: float, theoretical: float) -> float | Refusal:
    """Load ratio; a spring has reasons of its own for leaving no force."""
    if actuator.spring is not None and theoretical <= 0.0:
        if way in actuator.air_ways:
            return Refusal("at the end of the air stroke the spring is stronger than the air", "spring.rate")
        return Refusal("without preload the spring gives no force at its end", "spring.preload")
    return load_ratio(load, theoretical)


def _bore(actuator: Actuator, machine: Machine, site: Site, out: float, back: float) -> float | Refusal:
    """Required bore of one cylinder, which carries its share of the loads; rod and friction in proportion."""
    p0, p_extend = site.ambient_pressure, machine.supply_pressure
    reserve, running = actuator.require.force_reserve or 0.0, actuator.friction.coulomb
    rod_ratio = actuator.rod / actuator.bore
    out, back = out / actuator.count, back / actuator.count
    push, pull = _thrusts(actuator, machine, site)
    if actuator.spring is not None:
        returning = actuator.kind == "spring-return"
        load, other = (out, back) if returning else (back, out)
        if load <= 0.0 < other:
            return Refusal("only the spring carries a load: there is no bore to size")
        return required_bore_against_spring(
            p_supply=p_extend,
            p_ambient=p0,
            load=load,
            spring_force=actuator.spring.largest(actuator.stroke),
            reserve=reserve,
            friction_share=running / (push if returning else pull),
            rod_ratio=0.0 if returning else rod_ratio,
        )
    through = actuator.kind == "through-rod"
    bore = required_bore(
        p_extend=p_extend,
        p_retract=actuator.return_pressure or p_extend,
        p_ambient=p0,
        load_extend=out,
        load_retract=back,
        reserve=reserve,
        friction_share=running / push,
        rod_ratio=0.0 if through else rod_ratio,
    )
    if isinstance(bore, Refusal) or not through:
        return bore
    return bore / math.sqrt(1.0 - rod_ratio**2)  # from the annulus of both sides to the bore around it


def static_forces(actuator: Actuator, machine: Machine, site: Site) -> Static:
    """Forces of an actuator without motion, load ratio, reserve and the bore that would do."""
    load = actuator.load
    push, pull = theoretical_forces(actuator, machine, site)
    out = opposing_extend(
        mass=load.mass,
        inclination=load.inclination,
        guide_friction=load.guide_friction,
        extend_force=load.extend_force,
        constant_force=load.constant_force,
        process=[(item.start, item.end, item.force) for item in load.process_force],
    )
    back = opposing_retract(
        mass=load.mass,
        inclination=load.inclination,
        guide_friction=load.guide_friction,
        retract_force=load.retract_force,
        constant_force=load.constant_force,
    )
    running = actuator.count * actuator.friction.coulomb
    return Static(
        theoretical_extend=push,
        theoretical_retract=pull,
        load_extend=out,
        load_retract=back,
        load_ratio_extend=_ratio(actuator, "extend", out, push),
        load_ratio_retract=_ratio(actuator, "retract", back, pull),
        force_reserve_extend=force_reserve(push, running, out),
        force_reserve_retract=force_reserve(pull, running, back),
        required_bore=_bore(actuator, machine, site, out, back),
    )


def largest_push(actuator: Actuator, machine: Machine, site: Site) -> float:
    """Largest push on one rod: (p_s - p0)·A_cap, or the spring's largest force where that drives it out. [N]"""
    if actuator.spring is not None and actuator.kind == "spring-extend":
        return actuator.spring.largest(actuator.stroke)
    return _thrusts(actuator, machine, site)[0]


def rod_column(actuator: Actuator, machine: Machine, site: Site) -> Rod:
    """The extended rod of one cylinder as a column under the largest push, and as a beam."""
    if actuator.kind == "rodless":
        none = Refusal("no rod")
        return Rod(
            largest_push=none,
            buckling_load=none,
            buckling_safety=none,
            slenderness=none,
            rule="",
            longest_stroke=none,
            overhang=none,
            sag=none,
            bearing_load=none,
        )
    push = largest_push(actuator, machine, site)
    factor = end_factor(actuator.mounting, actuator.rod_end)
    longest = longest_stroke(
        rod=actuator.rod,
        mounting=actuator.mounting,
        rod_end=actuator.rod_end,
        stroke=actuator.stroke,
        closed_length=actuator.closed_length,
        push=push,
        safety=actuator.require.buckling_safety or BUCKLING_SAFETY,
    )
    beam = extended_rod(
        rod=actuator.rod,
        bore=actuator.bore,
        stroke=actuator.stroke,
        mounting=actuator.mounting,
        closed_length=actuator.closed_length,
        bearing_length=actuator.bearing_length,
        inclination=actuator.load.inclination,
        side_load=actuator.side_load,
    )
    if isinstance(factor, Refusal):
        return Rod(
            largest_push=push,
            buckling_load=factor,
            buckling_safety=factor,
            slenderness=factor,
            rule="",
            longest_stroke=longest,
            overhang=beam.overhang,
            sag=beam.sag,
            bearing_load=beam.bearing_load,
        )
    found = column(actuator.rod, factor * (actuator.closed_length + actuator.stroke))
    return Rod(
        largest_push=push,
        buckling_load=found.load,
        buckling_safety=found.load / push if push > 0.0 else Refusal("nothing pushes on the rod"),
        slenderness=found.slenderness,
        rule=found.rule,
        longest_stroke=longest,
        overhang=beam.overhang,
        sag=beam.sag,
        bearing_load=beam.bearing_load,
    )
