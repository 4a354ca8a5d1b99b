"""What hangs on an actuator: load, friction, valve, throttle, requirements."""

from __future__ import annotations

import math
from typing import Any

from actuator import kinds
from actuator.parts import Actuator, Friction, Holding, Load, ProcessForce, Require, Spread, Throttle, Valve
from actuator.parts.actuator import acting_needles
from actuator.project import by_kind
from actuator.project.fields import ALTERNATES, FAMILIES, PROCESS_FORCE, fields
from actuator.project.limits import beyond
from actuator.project.paths import Steps
from actuator.project.walk import Values, Walk


def load(walk: Walk, steps: Steps, here: Any, actuator: Values) -> Load | None:
    """Moved mass and what opposes it."""
    before = len(walk.problems)
    values = walk.table(Load, steps, here)
    if values is None:
        return None
    walk.needed(Load, steps, values)
    if "process_force" in values:
        listed = values["process_force"]
        at = (*steps, "process_force")
        if isinstance(listed, list):
            forces = [_process_force(walk, (*at, number), item, actuator) for number, item in enumerate(listed, 1)]
            values["process_force"] = tuple(forces)
        else:
            walk.problem(at, listed, f"must be a list, {PROCESS_FORCE}")
    if len(walk.problems) > before:
        return None
    made: Load | None = walk.built(Load, steps, values)
    return made


def _process_force(walk: Walk, steps: Steps, here: Any, actuator: Values) -> ProcessForce | None:
    before = len(walk.problems)
    if not isinstance(here, dict):
        walk.problem(steps, here, f"must be {PROCESS_FORCE[1:-1]}")
        return None
    values = walk.table(ProcessForce, steps, here)
    if values is None:
        return None
    walk.needed(ProcessForce, steps, values)
    start, end, stroke = values.get("start"), values.get("end"), actuator.get("stroke")
    at = (*steps, "to")
    if start is not None and end is not None and end <= start:
        said = walk.said((*steps, "from"), start, fields(ProcessForce)["from"])
        walk.problem(at, walk.at(at), f"must lie beyond from, {said}")
    elif end is not None and stroke is not None and end > stroke * (1.0 + 1e-12):
        said = walk.said((*steps[:4], "stroke"), stroke, fields(Actuator)["stroke"])
        walk.problem(at, walk.at(at), f"must not lie beyond the stroke, {said}")
    if len(walk.problems) > before:
        return None
    made: ProcessForce | None = walk.built(ProcessForce, steps, values)
    return made


def friction(walk: Walk, steps: Steps, here: Any, actuator: Values, machine: Values) -> Friction | None:
    """Friction; what is left out follows from thrust and bore."""
    before = len(walk.problems)
    values = walk.table(Friction, steps, here)
    supply, bore, rod = machine.get("supply_pressure"), actuator.get("bore"), actuator.get("rod")
    if values is None or supply is None or bore is None or rod is None or len(walk.problems) > before:
        return None
    inside = rod if actuator.get("kind") in ("spring-extend", "through-rod") else 0.0
    thrust = max(supply - walk.reading.ambient_pressure, 0.0) * math.pi / 4.0 * (bore**2 - inside**2)
    values.setdefault("breakaway", 0.08 * thrust)
    values.setdefault("coulomb", 0.05 * thrust)
    values.setdefault("viscous", 0.6 * bore * 1000.0)
    if values["breakaway"] < values["coulomb"]:
        at, given = (*steps, "breakaway"), walk.at((*steps, "breakaway"))
        spec = fields(Friction)["coulomb"]
        said = walk.said((*steps, "coulomb"), values["coulomb"], spec)
        own = walk.said(at, values["breakaway"], spec)
        left_out = "" if given is not None else f"left out it is {own}; "
        walk.problem(at, given, f"{left_out}must be at least the running friction, {said}")
        return None
    made: Friction | None = walk.built(Friction, steps, values)
    return made


def valve(walk: Walk, steps: Steps, here: Any, kind: str) -> Valve | None:
    """Valve; each path's conductance in one of five ways."""
    before = len(walk.problems)
    values = walk.table(Valve, steps, here)
    if values is None:
        return None
    walk.needed(Valve, steps, values, but=("supply_c",))
    by_kind.valve_function(walk, steps, kind, values)
    values.setdefault("supply_b", fields(Valve)["supply_b"].default)
    values.setdefault("exhaust_b", values["supply_b"])
    for family in FAMILIES:
        _conductance(walk, steps, family, here, values)
    if len(walk.problems) > before:
        return None
    values.setdefault("exhaust_c", values["supply_c"])
    made: Valve | None = walk.built(Valve, steps, values)
    return made


def _conductance(walk: Walk, steps: Steps, family: str, here: Any, values: Values) -> None:
    """One of C, Cv, Kv, nominal flow, effective area, as C."""
    keys = [f"{family}_c", *(f"{family}_{way.suffix}" for way in ALTERNATES)]
    given = [key for key in keys if key in here]
    for key in given[1:]:
        walk.problem((*steps, key), here[key], f"leave out either this or {given[0]}: one replaces the other")
    if not given and family == "supply":
        walk.problem(
            (*steps, keys[0]),
            None,
            f'is needed: write one of {", ".join(keys)}, e.g. {keys[0]} = "2.0 dm3/(s*bar)"',
        )
    for way in ALTERNATES:
        value = values.pop(f"{family}_{way.suffix}", None)
        if value is not None:
            values[f"{family}_c"] = _converted(way.suffix, value, values[f"{family}_b"])
            if beyond(values[f"{family}_c"], kinds.kind_of(kinds.Conductance), walk.reading):
                at = (*steps, f"{family}_{way.suffix}")
                walk.problem(at, walk.at(at), f'is out of proportion; write it as {keys[0]} = "2.0 dm3/(s*bar)"')


def _converted(suffix: str, value: float, b: float) -> float:
    """Sonic conductance from another number of the trade."""
    from actuator.flow import conversion

    if suffix == "cv":
        return conversion.conductance_from_cv(value, b)
    if suffix == "kv":
        return conversion.conductance_from_kv(value, b)
    if suffix == "qn":
        return conversion.conductance_from_nominal_flow(value, b)
    return conversion.conductance_from_effective_area(value)


def throttle(walk: Walk, steps: Steps, here: Any, cylinder: str) -> Throttle | None:
    """Flow controls; no table, or an empty one, means none."""
    if here is None or here == {}:
        return Throttle()
    before = len(walk.problems)
    values = walk.table(Throttle, steps, here)
    if values is None:
        return None
    at = (*steps, "kind")
    if "kind" not in values and at not in walk.bad:
        walk.problem(at, None, 'is needed where there is a throttle: write kind = "meter-out", "meter-in" or "none"')
    if values.get("kind", "none") != "none":
        acting = acting_needles(cylinder, values["kind"])
        for key in ("extend_c", "retract_c"):
            if key in values and key not in acting:
                why = f"at the one port of a {cylinder} cylinder only {acting[0]} acts with {values['kind']}"
                walk.problem((*steps, key), walk.at((*steps, key)), f"leave it out: {why}")
        for key in (*acting, "free_c"):
            if key not in values and (*steps, key) not in walk.bad:
                entry = fields(Throttle)[key].entry
                assert entry is not None
                walk.problem(
                    (*steps, key),
                    None,
                    f'is needed with kind = "{values["kind"]}": {key} = "{entry.example}"',
                )
    if len(walk.problems) > before:
        return None
    made: Throttle | None = walk.built(Throttle, steps, values)
    return made


def holding(walk: Walk, steps: Steps, here: Any) -> Holding | None:
    """What holds the load when air or signal is lost."""
    before = len(walk.problems)
    values = walk.table(Holding, steps, here)
    if values is None or len(walk.problems) > before:
        return None
    made: Holding | None = walk.built(Holding, steps, values)
    return made


def require(walk: Walk, steps: Steps, here: Any) -> Require | None:
    """What the job asks."""
    before = len(walk.problems)
    values = walk.table(Require, steps, here)
    if values is None:
        return None
    if "force_time" in values and "force_at_end" not in values and (*steps, "force_at_end") not in walk.bad:
        at = (*steps, "force_at_end")
        walk.problem(at, None, 'is needed with force_time: write force_at_end = "500 N", or leave force_time out')
    if len(walk.problems) > before:
        return None
    made: Require | None = walk.built(Require, steps, values)
    return made


def spread(walk: Walk, steps: Steps, here: Any) -> Spread | None:
    """How far the values may lie from the document's."""
    before = len(walk.problems)
    values = walk.table(Spread, steps, here)
    if values is None or len(walk.problems) > before:
        return None
    made: Spread | None = walk.built(Spread, steps, values)
    return made
