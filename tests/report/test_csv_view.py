"""CSV: the same numbers as JSON, one row a figure."""

from __future__ import annotations

import csv
import io

from actuator.answer import Answer
from actuator.report.csv_view import as_csv
from actuator.report.json_view import as_data
from actuator.report.names import all_figures
from tests.report.build import NO_STROKE, answer


def rows(given: Answer) -> list[dict[str, str]]:
    assert given.analysis is not None
    return list(csv.DictReader(io.StringIO(as_csv(given.analysis))))


def test_header_and_one_row_a_figure() -> None:
    given = answer()
    assert given.analysis is not None
    text = as_csv(given.analysis)
    assert text.splitlines()[0] == "machine,actuator,figure,value,unit,refused"
    assert "\r" not in text
    names = [(row["machine"], row["actuator"], row["figure"]) for row in rows(given)]
    assert len(set(names)) == len(names) == len(list(all_figures(given.analysis)))
    assert ("Press, left", "Lift.1", "extend.stroke_time") in names
    assert ("Press, left", "", "demand.mean") in names
    assert ("", "", "money.cost_year") in names


def test_numbers_are_those_of_json() -> None:
    given = answer(refused=True)
    assert given.analysis is not None
    data = as_data(given)
    (machine,) = data["machines"]
    money = data["money"]["machines"][0]
    for item, row in zip(all_figures(given.analysis), rows(given), strict=True):
        index, path = item.at.actuator_index, list(item.figure.json_path)
        if path[0] == "money":
            above = data["money"] if item.at.machine_index is None else money
            tree = above if index is None else money["actuators"][index]
            path = path[1:]
        elif index is not None:
            tree = machine["actuators"][index]
        else:
            tree = machine if item.figure.level == "machine" else data
        if path[0] == "holding":
            case, start = path[1].replace("_", " "), {"extend": "retracted", "retract": "extended"}[path[2]]
            tree = next(found for found in tree["holding"] if (found["case"], found["from"]) == (case, start))
            path = path[3:]
        for step in path:
            tree = tree[step]
        if row["refused"]:
            assert tree == {"refused": row["refused"]}
            assert row["value"] == ""
        else:
            assert float(row["value"]) == tree


def test_a_refused_figure_has_its_reason_and_no_number() -> None:
    found = [row for row in rows(answer(refused=True)) if row["actuator"] == "Lift.1"]
    time = next(row for row in found if row["figure"] == "extend.stroke_time")
    assert time["value"] == ""
    assert time["refused"] == NO_STROKE.reason


def test_units_name_their_reference_and_currency() -> None:
    units = {row["figure"]: row["unit"] for row in rows(answer())}
    assert units["extend.stroke_time"] == "s"
    assert units["cycle.air_drawn_anr"] == "m3 ANR"
    assert units["demand.mean"] == "m3 ANR/s"
    assert units["money.cost_year"] == "EUR"
    assert units["money.per_anr_m3"] == "EUR/m3 ANR"
    assert units["static.load_ratio_extend"] == "1"
