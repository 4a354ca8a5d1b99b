"""An answer as JSON: numbers in SI with the unit at the end of the key, a reason where there is none."""

from __future__ import annotations

import json
from collections.abc import Sequence
from dataclasses import fields
from typing import Any

from actuator.answer import Answer
from actuator.cautions import Caution
from actuator.errors import Problem, Refusal
from actuator.report import bands_view, holding_view
from actuator.report.bands_view import Scatters
from actuator.report.figures import FIGURES, At, completed, worst
from actuator.results import ActuatorResult, Analysis, Criterion, MachineResult
from actuator.stroke.result import StrokeResult

Tree = dict[str, Any]

HISTORIES = {
    "time": "time_s",
    "position": "position_m",
    "speed": "speed_m_s",
    "p_cap": "p_cap_Pa",
    "p_rod": "p_rod_Pa",
    "temp_cap": "temp_cap_K",
    "temp_rod": "temp_rod_K",
    "volume_cap": "volume_cap_m3",
    "volume_rod": "volume_rod_m3",
    "flow_supply": "flow_supply_kg_s",
    "flow_exhaust": "flow_exhaust_kg_s",
}
"""Arrays of a stroke result, and their keys."""
DIAGRAM = {
    "volume": "volume_m3",
    "pressure": "pressure_Pa",
    "volume_retract": "volume_retract_m3",
    "pressure_retract": "pressure_retract_Pa",
}
"""Points of the ideal indicator diagram, and their keys."""


def _plain(value: float | Refusal) -> float | Tree:
    return {"refused": value.reason} if isinstance(value, Refusal) else float(value)


def _put(tree: Tree, path: Sequence[str], value: Any) -> None:
    *above, last = path
    for key in above:
        tree = tree.setdefault(key, {})
    tree[last] = value


def _figures(at: At, *, money: bool) -> Tree:
    """Figures of one place, those about money apart; what happens on a loss is a list of its own."""
    tree: Tree = {}
    for figure in FIGURES[at.level].values():
        head, *tail = figure.json_path
        if head == "holding":
            continue
        if (head == "money") == money:
            _put(tree, tail if money else (head, *tail), _plain(figure.value(at)))
    return tree


def _criterion(found: Criterion) -> Tree:
    return {
        "name": found.name,
        "direction": found.direction,
        "wanted": found.wanted,
        "got": _plain(found.got),
        "unit": found.unit,
        "margin": _plain(found.margin),
        "verdict": found.verdict,
    }


def _caution(found: Caution) -> Tree:
    return {"path": found.path, "text": found.text, "source": found.source}


def _histories(stroke: StrokeResult) -> Tree:
    return {key: getattr(stroke, name).tolist() for name, key in HISTORIES.items()}


def _actuator(at: At, histories: bool, scatters: Scatters) -> Tree:
    result: ActuatorResult = at.actuator
    tree: Tree = {"name": result.part.name, **_figures(at, money=False)}
    reached = tree["extend"]["position_reached_m"]
    for direction in ("extend", "retract"):
        tree[direction]["completed"] = completed(at, direction)
        for case in worst.CASES:
            tree["worst"][case][direction]["completed"] = worst.completed(at, case, direction)
    tree["rod"]["rule"] = result.rod.rule
    tree["indicator"]["direction"] = result.indicator.direction
    tree["indicator"]["remarks"] = list(result.indicator.remarks)
    if not isinstance(result.air, Refusal):
        tree["cycle"]["difference"] = result.air.difference
    tree["criteria"] = [_criterion(item) for item in result.criteria]
    tree["position_reached_m"] = reached
    tree["completed"] = tree["extend"]["completed"] and tree["retract"]["completed"]
    tree["holding"] = holding_view.listed(at)
    tree["cautions"] = [_caution(item) for item in result.cautions]
    tree["remarks"] = list(result.remarks)
    if not isinstance(result.stroke, Refusal):
        tree["simulation"] = {
            "cycles": result.stroke.cycles,
            "periodic": result.stroke.periodic,
            "engine": result.stroke.engine,
        }
        tree["remarks"] += [text for text in result.stroke.remarks if text not in tree["remarks"]]
        if histories:
            tree["histories"] = _histories(result.stroke)
            if not isinstance(result.dynamics, Refusal):
                tree["histories"]["force_N"] = result.dynamics.force.tolist()
    if at.machine_index is not None and at.actuator_index is not None:
        scatter = scatters.get((at.machine_index, at.actuator_index))
        tree |= bands_view.as_tree(scatter) if scatter is not None else {}
    if histories:
        tree["indicator"] |= {key: list(getattr(result.indicator, name)) for name, key in DIAGRAM.items()}
    return tree


def _machine(analysis: Analysis, number: int, histories: bool, scatters: Scatters) -> Tree:
    machine: MachineResult = analysis.machines[number]
    places = [At(analysis, number, index) for index in range(len(machine.actuators))]
    return {
        "name": machine.part.name,
        "quantity": machine.part.quantity,
        "actuators": [_actuator(at, histories, scatters) for at in places],
        **_figures(At(analysis, number), money=False),
    }


def _money(analysis: Analysis) -> Tree:
    machines = [
        {
            "name": machine.part.name,
            **_figures(At(analysis, number), money=True),
            "actuators": [
                {"name": actuator.part.name, **_figures(At(analysis, number, index), money=True)}
                for index, actuator in enumerate(machine.actuators)
            ],
        }
        for number, machine in enumerate(analysis.machines)
    ]
    return {
        "currency": analysis.project.money.currency,
        **_figures(At(analysis), money=True),
        "machines": machines,
    }


def problems_as_data(problems: Sequence[Problem]) -> Tree:
    """What stands in the place of an answer where the document has problems.

    Parameters
    ----------
    problems : sequence of Problem

    Returns
    -------
    dict
    """
    rows = [{field.name: getattr(item, field.name) for field in fields(item)} for item in problems]
    return {"problems": rows, "machines": []}


def as_data(answer: Answer, *, histories: bool = False, scatters: Scatters | None = None) -> Tree:
    """An answer as plain lists, dicts, texts and numbers.

    Parameters
    ----------
    answer : Answer
    histories : bool, optional
        With the time histories of every actuator and the points of its ideal diagram.
    scatters : Scatters, optional
        Tolerance bands, of the actuators that have some.

    Returns
    -------
    dict
        Every number in SI and finite; a figure that cannot be had is ``{"refused": "why"}``.
    """
    analysis = answer.analysis
    if analysis is None:
        return problems_as_data(answer.problems)
    data: Tree = {
        "problems": [],
        "machines": [_machine(analysis, number, histories, scatters or {}) for number in range(len(analysis.machines))],
        **_figures(At(analysis), money=False),
        "money": _money(analysis),
        "remarks": list(analysis.remarks),
    }
    if not isinstance(analysis.supply, Refusal):
        data["supply"]["how"] = analysis.supply.how
    return data


def as_json(data: Tree, *, ascii_only: bool = False) -> str:
    """JSON text of :func:`as_data`; floats in the shortest form that reads back to the same float.

    Parameters
    ----------
    data : dict
    ascii_only : bool, optional
        Write other characters as escapes.

    Returns
    -------
    str
        Ends with a newline.
    """
    return json.dumps(data, indent=2, ensure_ascii=ascii_only, allow_nan=False) + "\n"
