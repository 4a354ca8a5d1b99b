"""What the views say of springs, rods that are not there, and cylinders in parallel."""

from __future__ import annotations

import json
from functools import cache

import pytest

from actuator.answer import Answer, work_out
from actuator.errors import Refusal
from actuator.project.document import parse
from actuator.report.figures import ACTUATOR_FIGURES, At
from actuator.report.json_view import as_data, as_json
from actuator.report.text import as_text
from actuator.report.workings import render, working

LOAD = """
[machine.actuator.load]
mass = "4 kg"
inclination = "90 deg"
[machine.actuator.valve]
supply_c = "1 dm3/(s*bar)"
"""
MACHINE = """
format = 1
[[machine]]
name = "Gate"
supply_pressure = "6 bar gauge"
cycle_time = "3 s"
[[machine.actuator]]
name = "Stopper"
bore = "40 mm"
stroke = "50 mm"
"""
SPRING = '[machine.actuator.spring]\nrate = "1 N/mm"\npreload = "60 N"\n'


@cache
def answer(kind: str, count: int) -> Answer:
    """One invented actuator of a kind, ``count`` of them in parallel."""
    rod = "" if kind == "rodless" else 'rod = "16 mm"\n'
    spring = SPRING if kind.startswith("spring") else ""
    found = work_out(parse(f'{MACHINE}kind = "{kind}"\ncount = {count}\n{rod}{spring}{LOAD}'))
    assert found.analysis is not None, found.problems
    return found


def cautions(found: Answer) -> dict[str, str]:
    assert found.analysis is not None
    return {item.path: item.text for item in found.analysis.machines[0].actuators[0].cautions}


def test_a_spring_is_told_with_its_forces_and_its_energy() -> None:
    """60 N to 110 N over 50 mm, twice: 120 N, 220 N, 8.5 J."""
    told = cautions(answer("spring-return", 2))
    assert "drives the piston to its retracted end, with 220 N falling to 120 N" in told["spring"]
    assert "it stores 8.5 J" in told["spring"]
    assert "shutting the air off does not make this load safe" in told["spring"]
    assert "drives the piston back from wherever it is" in told["valve.function"]
    assert "follows its spring, load and weight" in told["valve.function"]
    assert "to its extended end" in cautions(answer("spring-extend", 1))["spring"]
    assert "spring" not in cautions(answer("through-rod", 1))


def test_only_a_chamber_that_can_be_vented_has_a_first_stroke() -> None:
    def warned(kind: str) -> bool:
        analysis = answer(kind, 1).analysis
        assert analysis is not None
        return any("first stroke after venting" in item.text for item in analysis.machines[0].actuators[0].cautions)

    assert warned("rodless")
    assert not warned("spring-return")


def test_pinching_is_that_of_the_whole() -> None:
    """6 bar on two of 1256.6 mm² is 1508 N; two springs of at most 110 N drive out with 220 N."""
    at = "static.theoretical_extend"
    assert "Rod, load and fixed parts pinch with up to 1508 N" in cautions(answer("spring-return", 2))[at]
    assert "pinch with up to 220 N extending" in cautions(answer("spring-extend", 2))[at]
    assert cautions(answer("rodless", 1))[at].startswith("Carriage, load")


def test_trapped_air_is_that_of_the_sides_that_take_it() -> None:
    """Two of π/4·(40 mm)²·54 mm = 0.1357 L; on the rod side two of π/4·(40² − 16²) mm²·54 mm = 0.114 L."""
    assert "Extended, the cap chambers hold 0.136 L" in cautions(answer("spring-return", 2))["stroke"]
    assert "Retracted, the rod chambers hold 0.114 L" in cautions(answer("spring-extend", 2))["stroke"]


def test_the_text_names_kind_and_number_and_only_the_paths_there_are() -> None:
    text = as_text(answer("spring-extend", 2))
    assert "2 in parallel, each spring-extend, bore 40.00 mm, rod 16.00 mm" in text
    assert "  rod, filling" in text
    assert "  cap, filling" not in text
    assert "The ideal diagram is that of the retracting stroke." in text
    without = as_text(answer("rodless", 1))
    assert "rodless, bore 40.00 mm, stroke 50.00 mm" in without
    assert "no rod" in without


@pytest.mark.parametrize("kind", ["spring-return", "spring-extend", "through-rod", "rodless"])
def test_json_is_whole_and_its_refusals_have_reasons(kind: str) -> None:
    data = json.loads(as_json(as_data(answer(kind, 2), histories=True)))
    found = data["machines"][0]["actuators"][0]
    assert found["indicator"]["direction"] == ("retract" if kind == "spring-extend" else "extend")
    assert found["completed"]
    if kind == "rodless":
        assert found["rod"]["buckling_safety"] == {"refused": "no rod"}
    if kind == "spring-return":
        assert found["indicator"]["volume_retract_m3"] == []
        assert found["paths"]["rod_filling"]["conductance_m3_s_Pa"] == {"refused": "this actuator has no such path"}
        assert found["retract"]["air_drawn_kg"] == 0.0


@pytest.mark.parametrize(
    ("kind", "words"),
    [
        ("spring-return", "F_spring = −(F₀ + k·x)"),
        ("spring-extend", "F_spring = F₀ + k·(S − x)"),
        ("through-rod", "A₁ = A₂ = π/4·(D² − d²)"),
        ("rodless", "A₁ = A₂ = π/4·D²"),
    ],
)
def test_a_working_states_what_the_kind_changes(kind: str, words: str) -> None:
    one, two = (render(working(answer(kind, count), 0, 0, "extend.stroke_time"), 200) for count in (1, 2))
    assert words in one
    assert ("F_const + F_spring(x)" in one) == kind.startswith("spring")
    assert "times their number" in two
    assert "times their number" not in one
    assert ("spring.rate" in one) == kind.startswith("spring")
    assert "actuator.1.count" in two


@pytest.mark.parametrize("kind", ["spring-return", "spring-extend", "through-rod", "rodless"])
def test_every_figure_of_every_kind_has_a_working_that_renders(kind: str) -> None:
    found = answer(kind, 2)
    assert found.analysis is not None
    at = At(found.analysis, 0, 0)
    for figure in ACTUATOR_FIGURES:
        value = figure.value(at)
        text = render(working(found, 0, 0, figure.key))
        assert not isinstance(value, Refusal) or value.reason in " ".join(text.split()), figure.key
