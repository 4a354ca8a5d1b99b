"""Machines and their actuators: what is typed, what follows from it, what cannot be."""

from __future__ import annotations

import math
from typing import Any

from actuator import kinds
from actuator.parts import Actuator, Friction, Load, Machine, ProcessForce, Require, Site, Throttle, Valve
from actuator.project.fields import ALTERNATES, FAMILIES, PROCESS_FORCE, fields
from actuator.project.paths import Steps
from actuator.project.walk import Values, Walk

RESERVED = "supply"
"""Name of the node that pipes start from."""


def machines(walk: Walk, listed: Any, site: Site) -> tuple[Machine, ...]:
    """All machines; problems go to the walk."""
    if not isinstance(listed, list) or not listed:
        walk.problem(
            ("machine",),
            listed,
            "at least one is needed: write [[machine]], with two brackets, and its fields",
        )
        return ()
    found = [_machine(walk, ("machine", number), here, site) for number, here in enumerate(listed, 1)]
    _names(walk, ("machine",), listed)
    return tuple(machine for machine in found if machine is not None)


def _names(walk: Walk, steps: Steps, listed: list[Any]) -> None:
    """Names are there to be referred to: unique, printable, not reserved."""
    seen: dict[str, int] = {}
    for number, item in enumerate(listed, 1):
        name = item.get("name") if isinstance(item, dict) else None
        if not isinstance(name, str):
            continue
        at = (*steps, number, "name")
        if not name.strip() or not name.isprintable():
            walk.problem(at, name, 'must be a name of printable characters, e.g. "Pusher"')
        elif name == RESERVED:
            walk.problem(at, name, f'is reserved for the air supply; write another, e.g. "{name.capitalize()} gate"')
        elif name in seen:
            walk.problem(
                at,
                name,
                f'is already the name of {steps[-1]} {seen[name]}; write another, e.g. "{name} {number}"',
            )
        seen.setdefault(name, number)


def _machine(walk: Walk, steps: Steps, here: Any, site: Site) -> Machine | None:
    before = len(walk.problems)
    values = walk.table(Machine, steps, here)
    if values is None:
        return None
    walk.needed(Machine, steps, values)
    values.setdefault("supply_temperature", site.ambient_temperature)
    _pressure(walk, (*steps, "supply_pressure"), values.get("supply_pressure"), None)
    listed = values.pop("actuators", None)
    where = (*steps, "actuator")
    if not isinstance(listed, list) or not listed:
        walk.problem(
            where,
            listed,
            "at least one is needed: write [[machine.actuator]], with two brackets, and its fields",
        )
        return None
    actuators = [_actuator(walk, (*where, number), item, values) for number, item in enumerate(listed, 1)]
    _names(walk, where, listed)
    if len(walk.problems) > before:
        return None
    machine: Machine | None = walk.built(Machine, steps, {**values, "actuators": tuple(actuators)})
    return machine


def _pressure(walk: Walk, at: Steps, value: float | None, supply: float | None) -> None:
    """A supply pressure has to stand above the ambient, a return pressure not above the supply."""
    if value is None:
        return
    if value <= walk.reading.ambient_pressure:
        spec = fields(Site)["ambient_pressure"]
        ambient = walk.said(("site", "ambient_pressure"), walk.reading.ambient_pressure, spec)
        walk.problem(at, walk.at(at), f'must be above the ambient pressure, {ambient}; e.g. "6 bar gauge"')
    elif supply is not None and value > supply:
        spec = fields(Machine)["supply_pressure"]
        said = walk.said((*at[:2], "supply_pressure"), supply, spec)
        walk.problem(at, walk.at(at), f"must not be above the supply pressure, {said}")


def _actuator(walk: Walk, steps: Steps, here: Any, machine: Values) -> Actuator | None:
    before = len(walk.problems)
    values = walk.table(Actuator, steps, here)
    if values is None:
        return None
    walk.needed(Actuator, steps, values)
    _size(walk, steps, values)
    _timing(walk, steps, values, machine)
    _pressure(walk, (*steps, "return_pressure"), values.get("return_pressure"), machine.get("supply_pressure"))
    if "polytropic_index" in values:
        if "wall_heat_transfer" in values:
            at = (*steps, "polytropic_index")
            walk.problem(at, walk.at(at), "leave out either this or wall_heat_transfer: one replaces the other")
        values["wall_heat_transfer"] = None
    nested = {
        "load": _load(walk, (*steps, "load"), values.get("load", {}), values),
        "friction": _friction(walk, (*steps, "friction"), values.get("friction", {}), values, machine),
        "valve": _valve(walk, (*steps, "valve"), values.get("valve", {})),
        "throttle": _throttle(walk, (*steps, "throttle"), values.get("throttle")),
        "require": _require(walk, (*steps, "require"), values.get("require", {})),
    }
    if len(walk.problems) > before or not _follow(values, machine):
        return None
    actuator: Actuator | None = walk.built(Actuator, steps, {**values, **nested})
    return actuator


def _size(walk: Walk, steps: Steps, values: Values) -> None:
    """The rod fits into the bore."""
    bore, rod = values.get("bore"), values.get("rod")
    if bore is not None and rod is not None and rod >= bore:
        said = walk.said((*steps, "bore"), bore, fields(Actuator)["bore"])
        walk.problem((*steps, "rod"), walk.at((*steps, "rod")), f"must be below the bore, {said}")


def _timing(walk: Walk, steps: Steps, values: Values, machine: Values) -> None:
    """Both commands fall into the cycle, and not on the same instant."""
    cycle = machine.get("cycle_time")
    if cycle is None:
        return
    said = walk.said((*steps[:2], "cycle_time"), cycle, fields(Machine)["cycle_time"])
    whole = True
    for key in ("extend_at", "retract_at"):
        if values.get(key, 0.0) >= cycle:
            whole = False
            at = (*steps, key)
            walk.problem(at, walk.at(at), f"must be below the cycle time, {said}")
    if whole and (*steps, "extend_at") not in walk.bad and (*steps, "retract_at") not in walk.bad:
        extend = values.get("extend_at", 0.0)
        if values.get("retract_at", cycle / 2.0) == extend:
            at = (*steps, "retract_at")
            other = walk.said((*steps, "extend_at"), extend, fields(Actuator)["extend_at"])
            given = walk.at(at)
            left_out = "" if given is not None else "left out it is half the cycle time; "
            walk.problem(at, given, f"{left_out}must not be the same as extend_at, {other}")


def _follow(values: Values, machine: Values) -> bool:
    """Set what follows from other fields, by the rules that the fields' declarations state."""
    needed = [values.get(name) for name in ("bore", "rod", "stroke")] + [machine.get("cycle_time")]
    if any(value is None for value in needed):
        return False
    bore, rod, stroke, cycle = (float(value) for value in needed if value is not None)
    area = math.pi / 4.0 * bore**2
    values.setdefault("dead_volume_cap", 0.1 * bore * area)
    values.setdefault("dead_volume_rod", 0.1 * bore * (area - math.pi / 4.0 * rod**2))
    values.setdefault("retract_at", cycle / 2.0)
    mounting = values.get("mounting", "front flange")
    if mounting in ("rear flange", "rear pin"):
        closed = stroke + 3.0 * bore
    elif mounting == "mid trunnion":
        closed = stroke / 2.0 + 1.5 * bore
    else:
        closed = bore
    values.setdefault("closed_length", closed)
    return True


def _load(walk: Walk, steps: Steps, here: Any, actuator: Values) -> Load | None:
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
    load: Load | None = walk.built(Load, steps, values)
    return load


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
    force: ProcessForce | None = walk.built(ProcessForce, steps, values)
    return force


def _friction(walk: Walk, steps: Steps, here: Any, actuator: Values, machine: Values) -> Friction | None:
    before = len(walk.problems)
    values = walk.table(Friction, steps, here)
    supply, bore = machine.get("supply_pressure"), actuator.get("bore")
    if values is None or supply is None or bore is None or len(walk.problems) > before:
        return None
    thrust = max(supply - walk.reading.ambient_pressure, 0.0) * math.pi / 4.0 * bore**2
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
    friction: Friction | None = walk.built(Friction, steps, values)
    return friction


def _valve(walk: Walk, steps: Steps, here: Any) -> Valve | None:
    before = len(walk.problems)
    values = walk.table(Valve, steps, here)
    if values is None:
        return None
    walk.needed(Valve, steps, values, but=("supply_c",))
    values.setdefault("supply_b", fields(Valve)["supply_b"].default)
    values.setdefault("exhaust_b", values["supply_b"])
    for family in FAMILIES:
        _conductance(walk, steps, family, here, values)
    if len(walk.problems) > before:
        return None
    values.setdefault("exhaust_c", values["supply_c"])
    valve: Valve | None = walk.built(Valve, steps, values)
    return valve


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
            values_kind = kinds.kind_of(kinds.Conductance)
            if values_kind.fault(values[f"{family}_c"]):
                walk.problem(
                    (*steps, f"{family}_{way.suffix}"),
                    value,
                    "gives no conductance that can be reckoned with",
                )


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


def _throttle(walk: Walk, steps: Steps, here: Any) -> Throttle | None:
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
        for key in ("extend_c", "retract_c", "free_c"):
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
    throttle: Throttle | None = walk.built(Throttle, steps, values)
    return throttle


def _require(walk: Walk, steps: Steps, here: Any) -> Require | None:
    before = len(walk.problems)
    values = walk.table(Require, steps, here)
    if values is None:
        return None
    if "force_time" in values and "force_at_end" not in values and (*steps, "force_at_end") not in walk.bad:
        at = (*steps, "force_at_end")
        walk.problem(at, None, 'is needed with force_time: write force_at_end = "500 N", or leave force_time out')
    if len(walk.problems) > before:
        return None
    require: Require | None = walk.built(Require, steps, values)
    return require
