"""Machines and their actuators: what is typed, what follows from it, what cannot be."""

from __future__ import annotations

import math
from typing import Any

from actuator.parts import Actuator, Machine, Site
from actuator.project import by_kind, details
from actuator.project.fields import fields
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
    if not _pressure(walk, (*steps, "supply_pressure"), values.get("supply_pressure"), None):
        values.pop("supply_pressure", None)  # what rests on it is not judged
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


def _pressure(walk: Walk, at: Steps, value: float | None, supply: float | None) -> bool:
    """Whether a supply stands above the ambient pressure, and a return pressure not above the supply."""
    if value is None:
        return True
    if value <= walk.reading.ambient_pressure:
        spec = fields(Site)["ambient_pressure"]
        ambient = walk.said(("site", "ambient_pressure"), walk.reading.ambient_pressure, spec)
        walk.problem(at, walk.at(at), f'must be above the ambient pressure, {ambient}; e.g. "6 bar gauge"')
        return False
    if supply is not None and value > supply:
        spec = fields(Machine)["supply_pressure"]
        said = walk.said((*at[:2], "supply_pressure"), supply, spec)
        walk.problem(at, walk.at(at), f"must not be above the supply pressure, {said}")
        return False
    return True


def _actuator(walk: Walk, steps: Steps, here: Any, machine: Values) -> Actuator | None:
    before = len(walk.problems)
    values = walk.table(Actuator, steps, here)
    if values is None:
        return None
    kind = values.get("kind", "double-acting")
    if (*steps, "kind") not in walk.bad:
        by_kind.refuse(walk, steps, kind, values)
    walk.needed(Actuator, steps, values)
    by_kind.rod(walk, steps, kind, values)
    _timing(walk, steps, values, machine)
    _pressure(walk, (*steps, "return_pressure"), values.get("return_pressure"), machine.get("supply_pressure"))
    if "polytropic_index" in values:
        if "wall_heat_transfer" in values:
            at = (*steps, "polytropic_index")
            walk.problem(at, walk.at(at), "leave out either this or wall_heat_transfer: one replaces the other")
        values["wall_heat_transfer"] = None
    nested = {
        "load": details.load(walk, (*steps, "load"), values.get("load", {}), values),
        "friction": details.friction(walk, (*steps, "friction"), values.get("friction", {}), values, machine),
        "spring": by_kind.spring(walk, (*steps, "spring"), values.get("spring", {}), kind),
        "valve": details.valve(walk, (*steps, "valve"), values.get("valve", {}), kind),
        "throttle": details.throttle(walk, (*steps, "throttle"), values.get("throttle"), kind),
        "holding": details.holding(walk, (*steps, "holding"), values.get("holding", {})),
        "require": details.require(walk, (*steps, "require"), values.get("require", {})),
        "spread": details.spread(walk, (*steps, "spread"), values.get("spread", {})),
    }
    if len(walk.problems) > before or not _follow(values, machine):
        return None
    actuator: Actuator | None = walk.built(Actuator, steps, {**values, **nested})
    return actuator


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
    annulus = area - math.pi / 4.0 * rod**2
    values.setdefault("dead_volume_cap", 0.1 * bore * (annulus if values.get("kind") == "through-rod" else area))
    values.setdefault("dead_volume_rod", 0.1 * bore * annulus)
    values.setdefault("retract_at", cycle / 2.0)
    values.setdefault("bearing_length", 0.5 * bore)
    mounting = values.get("mounting", "front flange")
    if mounting in ("rear flange", "rear pin"):
        closed = stroke + 3.0 * bore
    elif mounting == "mid trunnion":
        closed = stroke / 2.0 + 1.5 * bore
    else:
        closed = bore
    values.setdefault("closed_length", closed)
    return True
