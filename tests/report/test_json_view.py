"""JSON: the promised keys, numbers that read back, reasons in the place of numbers."""

from __future__ import annotations

import json
from collections.abc import Iterator
from typing import Any

import pytest

from actuator.answer import Answer
from actuator.errors import Problem, Refusal
from actuator.report.json_view import HISTORIES, as_data, as_json, problems_as_data
from tests.report.build import NO_STROKE, NOT_REACHED, answer

HALF = (
    "reaction_time_s",
    "stroke_time_s",
    "settled_time_s",
    "force_time_s",
    "mean_speed_m_s",
    "peak_speed_m_s",
    "end_speed_m_s",
    "end_energy_J",
    "natural_frequency_Hz",
    "peak_deceleration_m_s2",
    "release_time_s",
    "unloaded_time_s",
)
ONCE = {"release_time_s", "unloaded_time_s"}
"""Keys of the nominal half stroke only."""
LEDGER = (
    "supplied",
    "load",
    "friction",
    "stop",
    "supply_path",
    "exhaust_path",
    "heat",
    "exhaust",
    "residual",
)
PROMISED = {
    "extend": HALF,
    "retract": HALF,
    "cycle": ("air_drawn_kg", "air_drawn_anr_m3", "textbook_anr_m3", "settled_anr_m3"),
    "cycle.exergy_J": LEDGER,
    "cycle.exergy_of_which_J": (
        "filling",
        "mixing",
        "returned",
        "dead_volume",
        "lift_extend",
        "lift_retract",
    ),
    "static": ("theoretical_extend_N", "theoretical_retract_N", "load_ratio_extend", "load_ratio_retract"),
    "rod": ("buckling_load_N", "buckling_safety"),
}
"""Keys that scripts rely on, by the object that they stand in."""


def walk(tree: Any) -> Iterator[Any]:
    """Every value at the ends of a tree."""
    if isinstance(tree, dict):
        for value in tree.values():
            yield from walk(value)
    elif isinstance(tree, list):
        for value in tree:
            yield from walk(value)
    else:
        yield tree


def inside(tree: Any, path: str) -> Any:
    for step in path.split("."):
        tree = tree[step]
    return tree


def test_the_promised_keys_are_there() -> None:
    data = as_data(answer())
    assert list(data) == ["problems", "machines", "supply", "money", "remarks"]
    (machine,) = data["machines"]
    assert machine["name"] == "Press, left"
    assert set(machine["demand"]) == {"mean_anr_m3_s", "peak_anr_m3_s", "per_cycle_anr_m3"}
    for actuator in machine["actuators"]:
        for path, keys in PROMISED.items():
            assert set(keys) <= set(inside(actuator, path)), path
        assert {"criteria", "position_reached_m", "completed", "cautions", "remarks", "indicator"} <= set(actuator)
    assert {"currency", "per_anr_m3", "energy_year_J", "cost_year", "carbon_year_kg", "machines"} <= set(data["money"])
    (money,) = data["money"]["machines"]
    assert set(money) == {"name", "energy_year_J", "cost_year", "carbon_year_kg", "actuators"}
    assert [item["name"] for item in money["actuators"]] == ["Pusher", "Lift.1"]


def test_the_worst_case_pair_stands_beside_the_nominal() -> None:
    given = answer()
    assert given.analysis is not None
    pair = given.analysis.machines[0].actuators[0].worst
    assert not isinstance(pair, Refusal)
    assert not isinstance(pair.slow.extend, Refusal)
    assert not isinstance(pair.hard.retract, Refusal)
    found = as_data(given)["machines"][0]["actuators"][0]["worst"]
    assert set(found) == {"slow", "hard"}
    for case in found.values():
        for way in ("extend", "retract"):
            assert {key for key in HALF if key.endswith(("time_s", "speed_m_s", "energy_J"))} - ONCE <= set(case[way])
            assert case[way]["completed"] is True
    assert found["slow"]["extend"]["stroke_time_s"] == pair.slow.extend.stroke_time
    assert found["hard"]["retract"]["end_energy_J"] == pair.hard.retract.end_energy
    assert found["slow"]["retract"]["moved_mass_kg"] == pair.slow.mass_retract
    assert found["slow"]["static"]["force_reserve_extend"] == pair.slow.force_reserve_extend
    assert found["slow"]["static"]["force_reserve_retract"] == {"refused": "no load"}
    assert found["hard"]["rod"]["buckling_safety"] == pair.hard.buckling_safety
    assert found["hard"]["cycle"]["air_drawn_kg"] == pair.hard.air_drawn
    lost = as_data(answer(refused=True))["machines"][0]["actuators"][1]["worst"]["slow"]["extend"]
    assert lost["stroke_time_s"] == {"refused": NO_STROKE.reason}
    assert lost["completed"] is False


def test_each_number_stands_at_its_own_key() -> None:
    given = answer()
    assert given.analysis is not None
    result = given.analysis.machines[0].actuators[0]
    stroke, air = result.stroke, result.air
    assert not isinstance(stroke, Refusal)
    assert not isinstance(stroke.ledger, Refusal)
    assert not isinstance(air, Refusal)
    found = as_data(given)["machines"][0]["actuators"][0]
    assert found["extend"]["stroke_time_s"] == stroke.extend.stroke_time
    assert found["retract"]["end_energy_J"] == stroke.retract.end_energy
    assert found["retract"]["peak_flow_kg_s"] == stroke.retract.peak_flow
    assert found["cycle"]["air_drawn_kg"] == air.air_drawn
    assert found["cycle"]["textbook_anr_m3"] == air.textbook_anr
    assert found["cycle"]["exergy_J"]["exhaust_path"] == stroke.ledger.exhaust_path
    assert found["cycle"]["exergy_of_which_J"]["lift_retract"] == stroke.ledger.lift_retract
    assert found["static"]["theoretical_retract_N"] == result.static.theoretical_retract
    assert found["rod"]["longest_stroke_m"] == result.rod.longest_stroke
    assert found["rod"]["rule"] == "Euler"
    assert found["indicator"]["mean_effective_pressure_Pa"] == result.indicator.mean_effective_pressure
    assert found["paths"]["rod_exhausting"]["fit_error"] == result.paths[6].error
    assert found["cycle"]["exergy_share"]["load"] == stroke.ledger.load / stroke.ledger.supplied
    assert (
        found["cycle"]["exhaust_loss_J"] == stroke.ledger.exhaust_path + stroke.ledger.exhaust
    )  # exhaust loss = pushed out + vented


def test_position_and_completion_are_always_there() -> None:
    ended = as_data(answer(completed=False))["machines"][0]["actuators"][0]
    assert ended["completed"] is False
    assert ended["extend"]["completed"] is False
    assert ended["retract"]["completed"] is True
    assert isinstance(ended["position_reached_m"], float)
    assert ended["extend"]["stroke_time_s"] == {"refused": NOT_REACHED.reason}
    refused = as_data(answer(refused=True))["machines"][0]["actuators"][1]
    assert refused["completed"] is False
    assert refused["position_reached_m"] == {"refused": NO_STROKE.reason}
    assert refused["cycle"]["exergy_J"]["load"] == {"refused": NO_STROKE.reason}
    assert isinstance(refused["static"]["theoretical_extend_N"], float)


@pytest.mark.parametrize("given", [answer(), answer(completed=False, refused=True)], ids=["all", "refused"])
def test_numbers_read_back_to_the_same_float_and_nothing_is_null(given: Answer) -> None:
    data = as_data(given, histories=True)
    text = as_json(data)
    assert "NaN" not in text
    assert "Infinity" not in text
    assert "null" not in text
    assert json.loads(text) == data
    assert None not in list(walk(data))


def test_histories_come_only_when_asked_for() -> None:
    without = as_data(answer())["machines"][0]["actuators"][0]
    assert "histories" not in without
    assert "volume_m3" not in without["indicator"]
    found = as_data(answer(), histories=True)["machines"][0]["actuators"][0]
    assert set(found["histories"]) == {*HISTORIES.values(), "force_N"}
    assert found["histories"]["force_N"][0] == -1.0
    assert {len(values) for values in found["histories"].values()} == {4}
    assert found["indicator"]["volume_m3"] == [1.0, 2.0]


def test_criteria_cautions_and_remarks() -> None:
    found = as_data(answer())["machines"][0]["actuators"][0]
    assert found["criteria"][1] == {
        "name": "stroke_time",
        "direction": "retract",
        "wanted": 1.0,
        "got": 1.25,
        "unit": "s",
        "margin": -0.25,
        "verdict": "failed",
    }
    assert found["criteria"][2]["got"] == {"refused": NOT_REACHED.reason}
    assert found["cautions"] == [{"path": "load.inclination", "text": "an invented caution", "source": "nobody"}]
    assert found["remarks"] == ["an invented remark", "an invented remark about the stroke"]


def test_problems_stand_in_the_place_of_machines() -> None:
    problem = Problem(path="machine.1.actuator.1.bore", given="50", allowed='give a unit, "50 mm"', line=7)
    assert problems_as_data([problem]) == {
        "problems": [
            {
                "path": "machine.1.actuator.1.bore",
                "given": "50",
                "allowed": 'give a unit, "50 mm"',
                "line": 7,
            }
        ],
        "machines": [],
    }


def test_other_characters_can_be_escaped() -> None:
    assert "m³" in as_json({"unit": "m³"})
    assert as_json({"unit": "m³"}, ascii_only=True).isascii()
