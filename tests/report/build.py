"""Answers made by hand: invented numbers, all different, so that a view that mixes them up is caught."""

from __future__ import annotations

import itertools
from collections.abc import Iterator
from dataclasses import fields
from functools import cache
from typing import Any

import numpy as np

from actuator.answer import Answer
from actuator.cautions import Caution
from actuator.energy.cost import YearlyCost
from actuator.energy.indicator import Indicator
from actuator.errors import Refusal
from actuator.holding.held import Held
from actuator.holding.leak import NEVER
from actuator.parts import Project
from actuator.project.document import parse
from actuator.project.validate import validate
from actuator.report.figures import flow
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
    WorstCase,
    WorstPair,
)
from actuator.stroke.dynamics import Dynamics, HalfDynamics
from actuator.stroke.result import HalfStroke, Ledger, Path, StrokeResult

DOCUMENT = """
format = 1
title = "Invented line"

[site]
ambient_pressure = "100 kPa absolute"

[[machine]]
name = "Press, left"
quantity = 3
supply_pressure = "6 bar gauge"
cycle_time = "4 s"

[[machine.actuator]]
name = "Pusher"
bore = "50 mm"
rod = "20 mm"
stroke = "400 mm"
[machine.actuator.load]
mass = "20 kg"
process_force = [{ from = "380 mm", to = "400 mm", force = "300 N" }]
[machine.actuator.valve]
supply_cv = 0.5
[machine.actuator.require]
stroke_time = "1 s"
force_reserve = "30 %"
buckling_safety = 4.0
force_at_end = "500 N"
force_time = "0.2 s"

[[machine.actuator]]
name = "Lift.1"
bore = "63 mm"
rod = "20 mm"
stroke = "200 mm"
[machine.actuator.load]
mass = "45 kg"
inclination = "90 deg"
[machine.actuator.valve]
supply_c = "3 dm3/(s*bar)"

[money]
currency = "EUR"
"""

NOT_REACHED = Refusal("the end is not reached: the piston stops at 312 mm", "stroke")
NO_STROKE = Refusal("the cycle does not settle within 200 cycles", "cycle_time")


def _numbers() -> Iterator[float]:
    """Numbers that no two figures share."""
    return (1.0 + 0.0137 * count for count in itertools.count(1))


def _filled(made: type[Any], numbers: Iterator[float], **given: Any) -> Any:
    """A result whose floats are all different."""
    return made(**{field.name: next(numbers) for field in fields(made) if field.name not in given}, **given)


def _half(direction: str, numbers: Iterator[float], completed: bool) -> HalfStroke:
    lost = (
        {}
        if completed
        else dict.fromkeys(
            (
                "reaction_time",
                "stroke_time",
                "settled_time",
                "force_time",
                "force_at_end",
                "mean_speed",
                "end_speed",
                "end_energy",
            ),
            NOT_REACHED,
        )
    )
    half: HalfStroke = _filled(HalfStroke, numbers, direction=direction, completed=completed, **lost)
    return half


def stroke_result(numbers: Iterator[float], *, completed: bool = True) -> StrokeResult:
    """A cycle of four points."""
    arrays = {
        field.name: np.linspace(1.0, 2.0, 4) * (1.0 + 0.1 * place)
        for place, field in enumerate(fields(StrokeResult)[:11])
    }
    return StrokeResult(
        **arrays,
        extend=_half("extend", numbers, completed),
        retract=_half("retract", numbers, True),
        ledger=_filled(Ledger, numbers),
        balances=Refusal("not asked for"),
        cycles=3,
        periodic=True,
        mismatch=1e-9,
        engine="interpreted",
        rates=5000,
        remarks=("an invented remark about the stroke",),
    )


def _dynamics(numbers: Iterator[float]) -> Dynamics:
    extend, retract = (_filled(HalfDynamics, numbers) for _ in range(2))
    return Dynamics(extend=extend, retract=retract, force=np.linspace(-1.0, 1.0, 4))


def _holding(numbers: Iterator[float]) -> tuple[Held, ...]:
    """All six losses; signal lost holds on closed-in air, for good at the retracted end."""
    found = []
    for case, holds in (("supply lost", False), ("signal lost", True), ("both lost", False)):
        for start, direction in (("extended", "retract"), ("retracted", "extend")):
            forever = holds and start == "retracted"
            more = {"starts_after": NEVER} if forever else {}
            found.append(
                _filled(
                    Held,
                    numbers,
                    case=case,
                    start=start,
                    cap="checked" if holds else "open",
                    rod="shut" if holds else "supplied",
                    holds=holds,
                    by="closed-in air" if holds else "",
                    direction="" if forever else direction,
                    **more,
                )
            )
    return tuple(found)


def _criteria(part: Any) -> tuple[Criterion, ...]:
    if part.require.stroke_time is None:
        return ()
    return (
        Criterion(
            name="stroke_time",
            direction="extend",
            wanted=1.0,
            got=0.8,
            unit="s",
            margin=0.2,
            verdict="met",
        ),
        Criterion(
            name="stroke_time",
            direction="retract",
            wanted=1.0,
            got=1.25,
            unit="s",
            margin=-0.25,
            verdict="failed",
        ),
        Criterion(
            name="force_time",
            direction="extend",
            wanted=0.2,
            got=NOT_REACHED,
            unit="s",
            margin=NOT_REACHED,
            verdict="refused",
        ),
    )


def _worst(numbers: Iterator[float]) -> WorstPair:
    slow, hard = (
        _filled(
            WorstCase,
            numbers,
            extend=_half("extend", numbers, True),
            retract=_half("retract", numbers, True),
            force_reserve_retract=Refusal("no load"),
        )
        for _ in range(2)
    )
    return WorstPair(slow=slow, hard=hard)


def _actuator(part: Any, numbers: Iterator[float], stroke: StrokeResult | Refusal) -> ActuatorResult:
    points = dict.fromkeys(("volume", "pressure", "volume_retract", "pressure_retract"), (1.0, 2.0))
    return ActuatorResult(
        part=part,
        static=_filled(Static, numbers, force_reserve_retract=Refusal("no load")),
        rod=_filled(Rod, numbers, rule="Euler"),
        indicator=_filled(
            Indicator, numbers, direction="extend", remarks=("an invented remark about the diagram",), **points
        ),
        paths=tuple(_filled(Path, numbers, name=name) for name in flow.PATHS),
        stroke=stroke,
        dynamics=stroke if isinstance(stroke, Refusal) else _dynamics(numbers),
        holding=_holding(numbers),
        air=stroke if isinstance(stroke, Refusal) else _filled(Air, numbers, difference="an invented reason"),
        cost=stroke if isinstance(stroke, Refusal) else _filled(YearlyCost, numbers),
        worst=stroke if isinstance(stroke, Refusal) else _worst(numbers),
        criteria=_criteria(part),
        cautions=(Caution(path="load.inclination", text="an invented caution", source="nobody"),),
        remarks=("an invented remark",),
    )


@cache
def answer(*, completed: bool = True, refused: bool = False) -> Answer:
    """An answer of two actuators in one machine.

    Parameters
    ----------
    completed : bool
        Whether the first actuator's extending stroke arrives.
    refused : bool
        Whether the second actuator's cycle could not be simulated.
    """
    document = parse(DOCUMENT)
    project = validate(document)
    assert isinstance(project, Project), project
    numbers = _numbers()
    machine = project.machines[0]
    strokes: tuple[StrokeResult | Refusal, ...] = (
        stroke_result(numbers, completed=completed),
        NO_STROKE if refused else stroke_result(numbers),
    )
    results = tuple(_actuator(part, numbers, stroke) for part, stroke in zip(machine.actuators, strokes, strict=True))
    analysis = Analysis(
        project=project,
        machines=(
            MachineResult(
                part=machine,
                actuators=results,
                demand=_filled(Demand, numbers),
                cost=_filled(YearlyCost, numbers),
            ),
        ),
        supply=_filled(Supply, numbers, how="package power"),
        cost=_filled(YearlyCost, numbers),
        remarks=("an invented remark about the whole",),
    )
    return Answer(document=document, problems=(), project=project, analysis=analysis)
