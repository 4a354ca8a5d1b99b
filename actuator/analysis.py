"""Every computation of a project, section by section: parts in, results out, nothing kept."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import replace
from typing import Any

import numpy as np

from actuator.air.gas import DRY_DENSITY_ANR
from actuator.cautions import Caution, cautions
from actuator.energy.compressor import supply_work
from actuator.energy.consumption import ChamberTurn, air_difference, settled_air, textbook_air
from actuator.energy.cost import YearlyCost, yearly_cost
from actuator.energy.demand import demand
from actuator.energy.indicator import Indicator, ideal_indicator
from actuator.errors import Refusal
from actuator.holding.held import holding
from actuator.judge import judge
from actuator.parts import Actuator, Machine, Project, Site
from actuator.results import (
    ActuatorResult,
    Air,
    Analysis,
    Criterion,
    Demand,
    MachineResult,
    Rod,
    Static,
    Supply,
    WorstPair,
)
from actuator.scatter.hazards import hazards
from actuator.scatter.outcome import THREADS, no_stop, side_by_side
from actuator.scatter.pair import worst_pair
from actuator.statics import rod_column, static_forces
from actuator.stroke.compiled import expect, loaded
from actuator.stroke.dynamics import dynamics
from actuator.stroke.result import Path, StrokeResult
from actuator.stroke.rows import parameters
from actuator.stroke.simulate import flow_paths, simulate

AirCost = YearlyCost
__all__ = [
    "ActuatorResult",
    "Air",
    "AirCost",
    "Analysis",
    "Caution",
    "Criterion",
    "Demand",
    "Indicator",
    "MachineResult",
    "Rod",
    "Static",
    "Supply",
    "WorstPair",
    "YearlyCost",
    "analyse",
    "never",
    "varied_result",
]


STROKES = 3
"""Simulations of an actuator: as it is, and both of the worst-case pair. [1]"""


def never() -> bool:
    """Tell that nobody asked to stop."""
    return False


def air_of(actuator: Actuator, machine: Machine, site: Site, stroke: StrokeResult) -> Air:
    """Air of a cycle as simulated, beside the two hand figures, and why they differ; all cylinders together."""
    p_extend = machine.supply_pressure
    p_retract = actuator.return_pressure or p_extend
    on_cap, on_rod = (actuator.count * (way in actuator.air_ways) for way in ("extend", "retract"))
    swept_cap, dead_cap = (on_cap * size for size in (actuator.area_cap * actuator.stroke, actuator.dead_volume_cap))
    swept_rod, dead_rod = (on_rod * size for size in (actuator.area_rod * actuator.stroke, actuator.dead_volume_rod))
    drawn = stroke.extend.air_drawn + stroke.retract.air_drawn
    textbook = textbook_air(
        p_extend=p_extend,
        p_retract=p_retract,
        temp_supply=machine.supply_temperature,
        swept_cap=swept_cap,
        swept_rod=swept_rod,
    )
    settled = settled_air(
        p_extend=p_extend,
        p_retract=p_retract,
        p_ambient=site.ambient_pressure,
        temp_supply=machine.supply_temperature,
        swept_cap=swept_cap,
        swept_rod=swept_rod,
        dead_cap=dead_cap,
        dead_rod=dead_rod,
    )
    delay, period = actuator.valve.delay, machine.cycle_time
    extends, retracts = (
        int(np.searchsorted(stroke.time, (command + delay) % period))
        for command in (actuator.extend_at, actuator.retract_at)
    )
    cap, rod = (
        ChamberTurn(
            p_supply=p_supply,
            swept=swept,
            dead=dead,
            p_full=float(p[full]),
            temp_full=float(temp[full]),
            volume_full=float(volume[full]) if swept else 0.0,
            p_empty=float(p[empty]),
            temp_empty=float(temp[empty]),
            volume_empty=float(volume[empty]) if swept else 0.0,
        )
        for p_supply, swept, dead, p, temp, volume, full, empty in (
            (
                p_extend, swept_cap, dead_cap,
                stroke.p_cap, stroke.temp_cap, stroke.volume_cap, retracts, extends,
            ),
            (
                p_retract, swept_rod, dead_rod,
                stroke.p_rod, stroke.temp_rod, stroke.volume_rod, extends, retracts,
            ),
        )
    )  # fmt: skip
    why = air_difference(
        drawn=drawn,
        cap=cap,
        rod=rod,
        p_ambient=site.ambient_pressure,
        temp_supply=machine.supply_temperature,
        cut_off=actuator.cut_off,
    )
    return Air(
        air_drawn=drawn,
        air_drawn_anr=drawn / DRY_DENSITY_ANR,
        textbook_anr=textbook / DRY_DENSITY_ANR,
        settled_anr=settled / DRY_DENSITY_ANR,
        difference=why.text,
    )


def _same_motion(machine: Machine, other: Machine) -> bool:
    """Whether two machines give their actuators the same supply and cycle."""
    return (machine.supply_pressure, machine.supply_temperature, machine.cycle_time) == (
        other.supply_pressure,
        other.supply_temperature,
        other.cycle_time,
    )


def _known(project: Project, machine: Machine, previous: Analysis | None) -> list[ActuatorResult]:
    """Results of an earlier analysis with this machine's supply and cycle, at this site."""
    if previous is None or previous.project.site != project.site:
        return []
    return [result for old in previous.machines if _same_motion(machine, old.part) for result in old.actuators]


def _actuator(
    actuator: Actuator,
    machine: Machine,
    project: Project,
    supply: Supply | Refusal,
    *,
    paths: tuple[Path, ...],
    stroke: StrokeResult | Refusal,
    worst: WorstPair | Refusal,
) -> ActuatorResult:
    site = project.site
    held = holding(actuator, stroke, parameters(actuator, machine, site, paths))
    return ActuatorResult(
        part=actuator,
        **_scattering(actuator, machine, project, supply, stroke, paths),
        indicator=ideal_indicator(
            actuator,
            p_supply=machine.supply_pressure,
            temp_supply=machine.supply_temperature,
            p_ambient=site.ambient_pressure,
            temp_ambient=site.ambient_temperature,
        ),
        paths=paths,
        worst=worst,
        cautions=(*cautions(actuator, machine, site, stroke, held), *hazards(stroke, worst)),
        holding=held,
        remarks=stroke.remarks if isinstance(stroke, StrokeResult) else (),
    )


def _scattering(
    actuator: Actuator,
    machine: Machine,
    project: Project,
    supply: Supply | Refusal,
    stroke: StrokeResult | Refusal,
    paths: tuple[Path, ...],
) -> dict[str, Any]:
    """Sections of a result that cost next to nothing beside the stroke: those that tolerance bands are made of."""
    site = project.site
    static = static_forces(actuator, machine, site)
    rod = rod_column(actuator, machine, site)
    par = np.array(parameters(actuator, machine, site, paths))
    air = air_of(actuator, machine, site, stroke) if isinstance(stroke, StrokeResult) else stroke
    return {
        "static": static,
        "rod": rod,
        "stroke": stroke,
        "dynamics": dynamics(actuator, machine, stroke, par) if isinstance(stroke, StrokeResult) else stroke,
        "air": air,
        "cost": _cost(air if isinstance(air, Refusal) else air.air_drawn, machine, project, supply),
        "criteria": judge(actuator, static, rod, stroke),
    }


def varied_result(
    nominal: ActuatorResult,
    actuator: Actuator,
    machine: Machine,
    project: Project,
    supply: Supply | Refusal,
    *,
    stroke: StrokeResult | Refusal,
    paths: tuple[Path, ...],
) -> ActuatorResult:
    """Result of an actuator that differs a little from another, for tolerance bands.

    Parameters
    ----------
    nominal : ActuatorResult
        Of the other.
    actuator, machine, project : part
    supply : Supply or Refusal
        Energy of the air.
    stroke : StrokeResult or Refusal
        Cycle of the varied actuator.
    paths : tuple of Path
        Its flow paths.

    Returns
    -------
    ActuatorResult
        Forces, rod, motion, air, cost and criteria of the varied one; ideal diagram, worst-case pair and cautions
        stay those of the nominal one.
    """
    own = _scattering(actuator, machine, project, supply, stroke, paths)
    return replace(nominal, part=actuator, paths=paths, **own)


def _motions(
    asked: Sequence[tuple[Actuator, Machine]], site: Site, cancelled: Callable[[], bool]
) -> list[tuple[tuple[Path, ...], StrokeResult | Refusal, WorstPair]]:
    """Flow paths, cycle and worst-case pair of each actuator, side by side; the corners need no ledger."""
    stop = no_stop()
    paths = [flow_paths(actuator) for actuator, _ in asked]

    def corner(actuator: Actuator, machine: Machine, site: Site) -> StrokeResult | Refusal:
        return simulate(actuator, machine, site, ledger=False, stop=stop)

    def job(number: int) -> StrokeResult | Refusal | WorstPair:
        place, pair = divmod(number, 2)
        if pair:
            return worst_pair(*asked[place], site, corner)
        return simulate(*asked[place], site, paths=paths[place], stop=stop)

    if not asked:
        return []
    threads = THREADS if loaded() else 1
    jobs = range(2 * len(asked))
    *_, found = side_by_side(job, jobs, threads=threads, chunk=1, cancelled=cancelled, stop=stop)
    return list(zip(paths, found[::2], found[1::2], strict=True))


def _cost(
    air: float | Refusal, machine: Machine, project: Project, supply: Supply | Refusal, quantity: int = 1
) -> YearlyCost | Refusal:
    """Cost of a year of a cycle's air, for ``quantity`` machines."""
    if isinstance(air, Refusal):
        return air
    if isinstance(supply, Refusal):
        return supply
    return yearly_cost(
        air * quantity,
        machine.cycles_per_year,
        supply.specific_energy,
        energy_price=project.money.energy,
        carbon_intensity=project.money.carbon,
    )


def _machine(
    machine: Machine, project: Project, supply: Supply | Refusal, results: tuple[ActuatorResult, ...]
) -> MachineResult:
    lost = next((item.stroke for item in results if isinstance(item.stroke, Refusal)), None)
    if lost is not None or not results:
        why = lost if lost is not None else Refusal("the machine has no actuator")
        return MachineResult(
            part=machine,
            actuators=results,
            demand=Demand(mean_anr=why, peak_anr=why, per_cycle_anr=why),
            cost=why,
        )
    histories = [
        (item.stroke.time, item.stroke.flow_supply) for item in results if isinstance(item.stroke, StrokeResult)
    ]
    drawn = sum(item.air.air_drawn for item in results if isinstance(item.air, Air))
    flow = demand(histories, machine.cycle_time)
    return MachineResult(
        part=machine,
        actuators=results,
        demand=Demand(
            mean_anr=drawn / machine.cycle_time / DRY_DENSITY_ANR,
            peak_anr=flow.peak / DRY_DENSITY_ANR,
            per_cycle_anr=drawn / DRY_DENSITY_ANR,
        ),
        cost=_cost(drawn, machine, project, supply, machine.quantity),
    )


def analyse(project: Project, previous: Analysis | None = None, cancelled: Callable[[], bool] = never) -> Analysis:
    """Compute everything that a project describes.

    Parameters
    ----------
    project : Project
    previous : Analysis, optional
        An earlier analysis: strokes whose inputs are equal are taken over.
    cancelled : callable, optional
        Asked all along; true ends the work within a few hundredths of a second.

    Returns
    -------
    Analysis
        A figure that cannot be had is a :class:`Refusal` in its place; the rest is computed all the same.

    Raises
    ------
    Cancelled
        When ``cancelled()`` became true.
    """
    work = supply_work(project.plant.compressors[0], project.site)
    supply: Supply | Refusal
    if isinstance(work, Refusal):
        supply = work
    else:
        per_anr = work.specific_energy * DRY_DENSITY_ANR
        supply = Supply(
            specific_work=work.specific_work,
            specific_energy=work.specific_energy,
            energy_per_anr=per_anr,
            price_per_anr=per_anr * project.money.energy,
            how=work.how,
        )
    known: dict[tuple[int, int], ActuatorResult] = {}
    asked: list[tuple[Actuator, Machine]] = []
    for m, machine in enumerate(project.machines):
        olds = _known(project, machine, previous)
        for a, actuator in enumerate(machine.actuators):
            old = next((item for item in olds if item.part == actuator), None)
            if old is not None:
                known[m, a] = old
            else:
                asked.append((actuator, machine))
    expect(STROKES * len(asked))
    moved = iter(_motions(asked, project.site, cancelled))
    machines = []
    for m, machine in enumerate(project.machines):
        results = []
        for a, actuator in enumerate(machine.actuators):
            old = known.get((m, a))
            paths, stroke, worst = (old.paths, old.stroke, old.worst) if old is not None else next(moved)
            results.append(_actuator(actuator, machine, project, supply, paths=paths, stroke=stroke, worst=worst))
        machines.append(_machine(machine, project, supply, tuple(results)))
    costs = [item.cost for item in machines]
    lost = next((item for item in costs if isinstance(item, Refusal)), None)
    known_costs = [item for item in costs if isinstance(item, YearlyCost)]
    return Analysis(
        project=project,
        machines=tuple(machines),
        supply=supply,
        cost=lost
        if lost is not None
        else YearlyCost(
            energy_year=sum(item.energy_year for item in known_costs),
            cost_year=sum(item.cost_year for item in known_costs),
            carbon_year=sum(item.carbon_year for item in known_costs),
        ),
        remarks=_remarks(tuple(machines)),
    )


def _remarks(machines: tuple[MachineResult, ...]) -> tuple[str, ...]:
    """What holds for the whole answer."""
    strokes = [item.stroke for machine in machines for item in machine.actuators]
    if any(isinstance(item, StrokeResult) and item.engine == "interpreted" for item in strokes):
        from actuator.stroke.compiled import remark

        return (f"strokes computed by the interpreted kernel{': ' + remark() if remark() else ''}",)
    return ()
