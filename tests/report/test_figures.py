"""The registry: complete, without doubles, and every reference in it resolves."""

from __future__ import annotations

import math
from dataclasses import fields, is_dataclass, replace
from typing import Any

import pytest

from actuator.answer import Answer
from actuator.errors import Refusal
from actuator.report.fields import field_values
from actuator.report.figures import FIGURES, At, Figure, completed
from actuator.report.names import all_figures
from actuator.report.shown import shown_for
from actuator.report.workings import used_figures
from actuator.sources import SOURCES
from tests.report.build import NO_STROKE, NOT_REACHED, answer

EVERY = [figure for level in FIGURES.values() for figure in level.values()]
PLACES = {"actuator": (0, 0), "machine": (0, None), "project": (None, None)}


def place(figure: Figure, given: Answer) -> At:
    assert given.analysis is not None
    return At(given.analysis, *PLACES[figure.level])


def test_every_key_and_json_path_is_there_once() -> None:
    for figures in FIGURES.values():
        paths = [figure.json_path for figure in figures.values()]
        assert len(set(paths)) == len(paths)
    assert len({(figure.level, figure.key) for figure in EVERY}) == len(EVERY)


@pytest.mark.parametrize("figure", EVERY, ids=lambda figure: f"{figure.level}/{figure.key}")
def test_a_figure_has_label_formula_source_and_inputs_that_resolve(figure: Figure) -> None:
    given = answer()
    at = place(figure, given)
    assert given.project is not None
    assert figure.label
    assert figure.formula
    assert all(key in SOURCES for key in figure.sources)
    assert figure.sources
    assert figure.inputs or figure.uses, "nothing goes in"
    for used in used_figures(figure, at):
        assert used.at.level == used.figure.level
    for path in figure.inputs:
        found = field_values(
            given, path, shown_for(given.project), machine=at.machine_index, actuator=at.actuator_index
        )
        optional = path.startswith("require.") or path in ("return_pressure", "polytropic_index", "spring")
        assert found or optional, path


def _floats(result: Any) -> list[float]:
    """All floats of a result, those of the results inside it too; arrays and points apart."""
    found: list[float] = []
    for field in fields(result):
        value = getattr(result, field.name)
        if isinstance(value, float):
            found.append(value)
        elif isinstance(value, tuple) and value and is_dataclass(value[0]):
            found += [number for item in value for number in _floats(item)]
        elif is_dataclass(value) and field.name not in ("part", "project"):
            found += _floats(value)
    return found


def test_no_number_of_the_results_is_left_without_a_figure() -> None:
    """Apart from what is no figure: mismatch of the cycle, numbers of the criteria."""
    analysis = answer().analysis
    assert analysis is not None
    values = {item.figure.value(item.at) for item in all_figures(analysis)}
    criteria = {0.2, 0.25, -0.25, 0.8, 1.0, 1.25}
    missing = [number for number in _floats(analysis) if number not in values | criteria | {1e-9}]
    assert missing == []


def test_figures_of_a_cycle_that_could_not_be_simulated_carry_its_reason() -> None:
    analysis = answer(refused=True).analysis
    assert analysis is not None
    at = At(analysis, 0, 1)
    for figure in FIGURES["actuator"].values():
        value = figure.value(at)
        if figure.simulated:
            assert value == NO_STROKE, figure.key
    assert isinstance(FIGURES["actuator"]["static.theoretical_extend"].value(at), float)
    assert not completed(at, "extend")


def test_a_stroke_that_does_not_arrive_refuses_what_needs_the_arrival_only() -> None:
    analysis = answer(completed=False).analysis
    assert analysis is not None
    at = At(analysis, 0, 0)
    known = FIGURES["actuator"]
    assert known["extend.stroke_time"].value(at) == NOT_REACHED
    assert isinstance(known["extend.position_reached"].value(at), float)
    assert isinstance(known["extend.peak_speed"].value(at), float)
    assert not completed(at, "extend")
    assert completed(at, "retract")


@pytest.mark.parametrize("number", [math.nan, math.inf, -math.inf])
def test_a_number_that_is_not_finite_is_refused(number: float) -> None:
    figure = replace(FIGURES["project"]["money.cost_year"], get=lambda _: number)
    analysis = answer().analysis
    assert analysis is not None
    found = figure.value(At(analysis))
    assert isinstance(found, Refusal)
    assert "no finite number" in found.reason


def test_shares_are_refused_where_nothing_is_supplied() -> None:
    given = answer().analysis
    assert given is not None
    machine = given.machines[0]
    stroke = machine.actuators[0].stroke
    assert not isinstance(stroke, Refusal)
    assert not isinstance(stroke.ledger, Refusal)
    empty = replace(stroke, ledger=replace(stroke.ledger, supplied=0.0))
    actuators = (replace(machine.actuators[0], stroke=empty),)
    at = At(replace(given, machines=(replace(machine, actuators=actuators),)), 0, 0)
    found = FIGURES["actuator"]["cycle.exergy_share.load"].value(at)
    assert isinstance(found, Refusal)
    assert found.reason == "nothing is supplied in the cycle"


@pytest.mark.parametrize(
    ("key", "path"),
    [
        ("extend.stroke_time", "extend.stroke_time_s"),
        ("cycle.exergy.friction", "cycle.exergy_J.friction"),
        ("cycle.air_drawn", "cycle.air_drawn_kg"),
        ("cycle.air_drawn_anr", "cycle.air_drawn_anr_m3"),
        ("cycle.textbook", "cycle.textbook_anr_m3"),
        ("static.load_ratio_extend", "static.load_ratio_extend"),
        ("rod.buckling_load", "rod.buckling_load_N"),
    ],
)
def test_the_json_path_is_the_key_with_its_unit(key: str, path: str) -> None:
    assert ".".join(FIGURES["actuator"][key].json_path) == path
