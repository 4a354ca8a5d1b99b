"""An actuator and its machine with every quantity that scatters moved off its value."""

from __future__ import annotations

import math
from dataclasses import dataclass, replace
from functools import cache
from typing import Any

from actuator.errors import Refusal
from actuator.kinds import fields_of
from actuator.parts import Actuator, Load, Machine, Site
from actuator.stroke.result import Path
from actuator.stroke.rows import flow_paths

_KEPT = ("holding",)
"""Parts of an actuator whose conductances are no flow path: a leak is guessed for itself."""
_SAME_FIT = 1e-3
"""Differences of b and m that come from the search of the fit. [1]"""


@dataclass(frozen=True, slots=True, kw_only=True)
class Deviation:
    """By how much what scatters lies off its value.

    Attributes
    ----------
    supply_pressure : float
        Added to the supply pressure; a return pressure of its own moves in proportion, counted from ambient. [Pa]
    friction : float
        Share of breakaway, running and viscous friction, and of the guide's coefficient. [1]
    mass : float
        Share of the moved mass, weight included. [1]
    opposing : float
        Share of the forces that oppose motion: extending, retracting, process. [1]
    constant : float
        Share of the constant force. [1]
    conductance : float
        Share of every conductance that the air passes. [1]
    delay : float
        Share of the valve's delay. [1]
    """

    supply_pressure: float = 0.0
    friction: float = 0.0
    mass: float = 0.0
    opposing: float = 0.0
    constant: float = 0.0
    conductance: float = 0.0
    delay: float = 0.0


def _load(load: Load, by: Deviation) -> Load:
    """Load with mass, forces and guide friction moved."""
    more = 1.0 + by.opposing
    return replace(
        load,
        mass=load.mass * (1.0 + by.mass),
        guide_friction=load.guide_friction * (1.0 + by.friction),
        extend_force=load.extend_force * more,
        retract_force=load.retract_force * more,
        constant_force=load.constant_force * (1.0 + by.constant),
        process_force=tuple(replace(item, force=item.force * more) for item in load.process_force),
    )


@cache
def _flowing(part: Any) -> tuple[tuple[str, bool], ...]:
    """Fields of a part that are a conductance, or a part that may hold some: name, and whether it is a part."""
    return tuple(
        (spec.name, spec.part is not None)
        for spec in fields_of(part)
        if spec.name not in _KEPT
        and not spec.is_list
        and (
            (spec.part is not None and _flowing(spec.part) != ())
            or (spec.kind is not None and spec.kind.dimension == "conductance")
        )
    )


def _conductances(part: Any, factor: float) -> Any:
    """Copy of a part with each conductance in it and in the parts inside it multiplied."""
    changed: dict[str, Any] = {}
    for name, inside in _flowing(part.__class__):
        value = getattr(part, name)
        if value is not None:
            changed[name] = _conductances(value, factor) if inside else value * factor
    return replace(part, **changed) if changed else part


def varied(actuator: Actuator, machine: Machine, site: Site, by: Deviation) -> tuple[Actuator, Machine] | Refusal:
    """Actuator and machine with what scatters moved off its value.

    Parameters
    ----------
    actuator, machine, site : part
        As the document has them.
    by : Deviation
        By how much.

    Returns
    -------
    tuple of Actuator and Machine, or Refusal
        Both as they are where nothing deviates; a refusal where no pressure above ambient is left.

    Raises
    ------
    InputError
        Where a value that results is none that the part can have.
    """
    if by == Deviation():
        return actuator, machine
    gauge = machine.supply_pressure - site.ambient_pressure
    if gauge + by.supply_pressure <= 0.0:
        return Refusal(
            f"a supply that lies {-by.supply_pressure / 1e5:.4g} bar low is not above the ambient pressure",
            "spread.supply_pressure",
        )
    back = actuator.return_pressure
    if back is not None:
        back = site.ambient_pressure + (back - site.ambient_pressure) * (1.0 + by.supply_pressure / gauge)
    friction, more = actuator.friction, 1.0 + by.friction
    flowing = _conductances(actuator, 1.0 + by.conductance) if by.conductance else actuator
    moved = replace(
        flowing,
        return_pressure=back,
        load=_load(actuator.load, by),
        friction=replace(
            friction,
            breakaway=friction.breakaway * more,
            coulomb=friction.coulomb * more,
            viscous=friction.viscous * more,
        ),
        valve=replace(flowing.valve, delay=flowing.valve.delay * (1.0 + by.delay)),
    )
    return moved, replace(machine, supply_pressure=machine.supply_pressure + by.supply_pressure)


def paths_times(paths: tuple[Path, ...], factor: float) -> tuple[Path, ...]:
    """Flow paths whose every element has ``factor`` times the conductance: C alone changes, the fit stays.

    Parameters
    ----------
    paths : tuple of Path
        Of the actuator as it is.
    factor : float
        Of the conductances. [1]

    Returns
    -------
    tuple of Path
    """
    return tuple(
        Path(
            name=path.name,
            conductance=path.conductance * factor,
            critical_ratio=path.critical_ratio,
            subsonic_index=path.subsonic_index,
            error=path.error,
        )
        for path in paths
    )


def scaled_paths(actuator: Actuator, machine: Machine, site: Site) -> tuple[Path, ...] | None:
    """Flow paths of an actuator, if a deviation of the conductance only multiplies them.

    Parameters
    ----------
    actuator, machine, site : part
        As the document has them.

    Returns
    -------
    tuple of Path or None
        None where something that does not scatter, as a tube, stands in a path: it has to be fitted anew each time.
    """
    most = actuator.spread.conductance
    paths = flow_paths(actuator)
    moved = varied(actuator, machine, site, Deviation(conductance=most))
    if isinstance(moved, Refusal):
        return None
    alike = all(
        math.isclose(one.conductance, other.conductance, rel_tol=1e-9)
        and math.isclose(one.critical_ratio, other.critical_ratio, abs_tol=_SAME_FIT)
        and math.isclose(one.subsonic_index, other.subsonic_index, abs_tol=_SAME_FIT)
        for one, other in zip(paths_times(paths, 1.0 + most), flow_paths(moved[0]), strict=True)
    )
    return paths if alike else None
