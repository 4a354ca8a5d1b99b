"""Figures above the actuator: demand of a machine, the way from the meter to the air, money and carbon."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from actuator.errors import Refusal
from actuator.kinds import (
    CarbonYear,
    Energy,
    EnergyPerANR,
    FlowANR,
    Kind,
    MoneyYear,
    PriceAir,
    SpecificEnergy,
    VolumeANR,
    YearlyEnergy,
)
from actuator.report.figures.cycle import RATIO, ledger_item, share_of
from actuator.report.figures.registry import At, Figure, Level, kind
from actuator.results import Supply

_COMPRESSOR = ("plant.compressor.1", "site")
_COSTS: tuple[tuple[str, Any, str], ...] = (
    ("energy_year", YearlyEnergy, "Electricity a year"),
    ("cost_year", MoneyYear, "Cost a year"),
    ("carbon_year", CarbonYear, "Carbon a year"),
)
_COST_FORMULA: dict[Level, dict[str, str]] = {
    "actuator": {
        "energy_year": "air per cycle × cycles a year × electricity per mass of air\n"
        "cycles a year = hours × utilisation/cycle time",
        "cost_year": "electricity a year × energy price",
        "carbon_year": "electricity a year × carbon intensity",
    },
    "machine": dict.fromkeys(("energy_year", "cost_year", "carbon_year"), "sum over its actuators × quantity"),
    "project": {name: "sum over the machines" for name, _, _ in _COSTS},
}
_RATES = {"cost_year": ("money.energy",), "carbon_year": ("money.carbon",)}
_NOTES: dict[Level, str] = {
    "actuator": "Of one actuator in one machine.",
    "machine": "Of all machines of this kind.",
    "project": "",
}


def _cost(name: str) -> Callable[[At], float | Refusal]:
    def get(at: At) -> float | Refusal:
        if at.level == "project":
            cost = at.analysis.cost
        else:
            cost = at.machine.cost if at.level == "machine" else at.actuator.cost
        if isinstance(cost, Refusal):
            return cost
        found: float = getattr(cost, name)
        return found

    return get


def _cost_figure(level: Level, name: str, alias: Any, label: str) -> Figure:
    uses: tuple[str, ...] = ()
    inputs: tuple[str, ...] = ()
    if level == "actuator":
        inputs = _RATES.get(name, ("machine.hours", "machine.utilisation", "machine.cycle_time"))
        if name == "energy_year":
            uses = ("cycle.air_drawn", "project.supply.specific_energy")
        else:
            uses = ("money.energy_year",)
    elif level == "machine":
        inputs = ("machine.quantity",)
        uses = (f"actuators.money.{name}",)
    else:
        uses = (f"machines.money.{name}",)
    return Figure(
        level=level,
        key=f"money.{name}",
        kind=kind(alias),
        label=label,
        group="Money and carbon",
        formula=_COST_FORMULA[level][name],
        sources=("own",),
        inputs=inputs,
        uses=uses,
        get=_cost(name),
        note=_NOTES[level],
    )


def _costs(level: Level) -> tuple[Figure, ...]:
    return tuple(_cost_figure(level, *row) for row in _COSTS)


def _demand(name: str, alias: Any, label: str, formula: str, *, note: str = "") -> Figure:
    def get(at: At) -> float | Refusal:
        found: float | Refusal = getattr(at.machine.demand, name + "_anr")
        return found

    return Figure(
        level="machine",
        key=f"demand.{name}",
        kind=kind(alias),
        label=label,
        group="Air demand",
        formula=formula,
        sources=("own", "iso8778"),
        inputs=("machine.cycle_time",),
        uses=("actuators.cycle.air_drawn_anr",),
        get=get,
        note=note,
    )


def _of_supply(read: Callable[[Supply], float]) -> Callable[[At], float | Refusal]:
    def get(at: At) -> float | Refusal:
        supply = at.analysis.supply
        return supply if isinstance(supply, Refusal) else read(supply)

    return get


def _specific_work(supply: Supply) -> float:
    return supply.specific_work


def _specific_energy(supply: Supply) -> float:
    return supply.specific_energy


def _supply(read: Callable[[Supply], float], key: str, alias: Any, label: str, formula: str, **more: Any) -> Figure:
    return Figure(
        level="project",
        key=key,
        kind=alias if isinstance(alias, Kind) else kind(alias),
        label=label,
        group="Compressed air",
        formula=formula,
        sources=("own", "cengel", "iso1217", "practice"),
        get=_of_supply(read),
        **more,
    )


def _upstream(read: Callable[[Supply], float]) -> Callable[[At], float | Refusal]:
    def get(at: At) -> float | Refusal:
        air, rate = at.actuator.air, _of_supply(read)(at)
        if isinstance(air, Refusal):
            return air
        return rate if isinstance(rate, Refusal) else air.air_drawn * rate

    return get


UPSTREAM: tuple[Figure, ...] = (
    Figure(
        level="actuator",
        key="cycle.upstream.electricity",
        kind=kind(Energy),
        label="Electricity at the meter",
        group="From the meter to the port",
        formula="air drawn × electricity per mass of air",
        sources=("own",),
        uses=("cycle.air_drawn", "project.supply.specific_energy"),
        get=_upstream(_specific_energy),
        grouped=True,
    ),
    Figure(
        level="actuator",
        key="cycle.upstream.compression",
        kind=kind(Energy),
        label="Work on the air",
        group="From the meter to the port",
        formula="air drawn × work of compression per mass of air",
        sources=("own",),
        uses=("cycle.air_drawn", "project.supply.specific_work"),
        get=_upstream(_specific_work),
        grouped=True,
    ),
    *(
        Figure(
            level="actuator",
            key=f"cycle.upstream_share.{name}",
            kind=RATIO,
            label=f"{label}, share",
            group="From the meter to the port",
            formula=f"{label.lower()}/electricity at the meter",
            sources=("own",),
            uses=(used, "cycle.upstream.electricity"),
            get=share_of(read, _upstream(_specific_energy)),
        )
        for name, label, used, read in (
            ("compression", "Work on the air", "cycle.upstream.compression", _upstream(_specific_work)),
            ("port", "Supplied at the port", "cycle.exergy.supplied", ledger_item("supplied")),
            ("load", "Load", "cycle.exergy.load", ledger_item("load")),
        )
    ),
)

ACTUATOR: tuple[Figure, ...] = UPSTREAM + _costs("actuator")
MACHINE: tuple[Figure, ...] = (
    _demand("mean", FlowANR, "Mean", "Σ air of a cycle/cycle time"),
    _demand(
        "peak",
        FlowANR,
        "Peak",
        "highest mean of Σ q_s/ρ_dry(ANR) over any 0.5 s of the cycle",
        note="The window of 0.5 s is common practice, no source.",
    ),
    _demand("per_cycle", VolumeANR, "Per cycle", "Σ air of a cycle"),
    *_costs("machine"),
)
PROJECT: tuple[Figure, ...] = (
    _supply(
        _specific_work,
        "supply.specific_work",
        SpecificEnergy,
        "Work of compression",
        "w = Σ over N stages of c_p·T·(r^k − 1)/η_s, or c_p·T·(r^(k/η_p) − 1);  r = (p₂/p₁)^(1/N), "
        "k = (γ − 1)/γ\nT = intake temperature, after an intercooler no more than the approach above it",
        inputs=_COMPRESSOR,
        note="Per mass of dry air, before drive and motor. Where package power is given: ideal isentropic "
        "compression in one stage (η_s = 1, N = 1), for comparison.",
    ),
    _supply(
        _specific_energy,
        "supply.specific_energy",
        SpecificEnergy,
        "Electricity per mass",
        "e = w/(η_drive·η_motor), or package power/(free air × density of its dry air) where both are given",
        inputs=_COMPRESSOR,
        uses=("supply.specific_work",),
    ),
    _supply(
        lambda supply: supply.energy_per_anr,
        "supply.energy_per_anr",
        EnergyPerANR,
        "Electricity per volume",
        "e·ρ_dry(ANR),  ρ_dry(ANR) = 1.1703 kg/m³",
        uses=("supply.specific_energy",),
    ),
    _supply(
        lambda supply: supply.price_per_anr,
        "money.per_anr_m3",
        PriceAir,
        "Price of the air",
        "electricity per volume of air × energy price",
        inputs=("money.energy",),
        uses=("supply.energy_per_anr",),
    ),
    *_costs("project"),
)
