"""Sections of an analysis that need no motion: static forces, and the extended rod."""

from __future__ import annotations

from actuator.errors import Refusal
from actuator.mechanics.buckling import column, end_factor, longest_stroke
from actuator.mechanics.force import (
    force_reserve,
    load_ratio,
    opposing_extend,
    opposing_retract,
    required_bore,
    theoretical_extend,
    theoretical_retract,
)
from actuator.mechanics.sag import extended_rod
from actuator.parts import Actuator, Machine, Site
from actuator.results import Rod, Static

BUCKLING_SAFETY = 4.0
"""Safety that the longest stroke is given for where none is asked: common practice (3.5 to 5), no source. [1]"""


def static_forces(actuator: Actuator, machine: Machine, site: Site) -> Static:
    """Forces of an actuator without motion, load ratio, reserve and the bore that would do."""
    load, p0, p_extend = actuator.load, site.ambient_pressure, machine.supply_pressure
    p_retract = actuator.return_pressure or p_extend
    push = theoretical_extend(p_extend, p0, actuator.bore)
    pull = theoretical_retract(p_retract, p0, actuator.bore, actuator.rod)
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
    running = actuator.friction.coulomb
    return Static(
        theoretical_extend=push,
        theoretical_retract=pull,
        load_extend=out,
        load_retract=back,
        load_ratio_extend=load_ratio(out, push),
        load_ratio_retract=load_ratio(back, pull),
        force_reserve_extend=force_reserve(push, running, out),
        force_reserve_retract=force_reserve(pull, running, back),
        required_bore=required_bore(
            p_extend=p_extend,
            p_retract=p_retract,
            p_ambient=p0,
            load_extend=out,
            load_retract=back,
            reserve=actuator.require.force_reserve or 0.0,
            friction_share=running / push,
            rod_ratio=actuator.rod / actuator.bore,
        ),
    )


def rod_column(actuator: Actuator, static: Static) -> Rod:
    """The extended rod as a column under the largest push, (p_s - p0)·A_cap, and as a beam."""
    factor = end_factor(actuator.mounting, actuator.rod_end)
    longest = longest_stroke(
        rod=actuator.rod,
        mounting=actuator.mounting,
        rod_end=actuator.rod_end,
        stroke=actuator.stroke,
        closed_length=actuator.closed_length,
        push=static.theoretical_extend,
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
        buckling_load=found.load,
        buckling_safety=found.load / static.theoretical_extend,
        slenderness=found.slenderness,
        rule=found.rule,
        longest_stroke=longest,
        overhang=beam.overhang,
        sag=beam.sag,
        bearing_load=beam.bearing_load,
    )
