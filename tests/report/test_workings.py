"""Workings: formula, numbers put in with their origin, sources."""

from __future__ import annotations

from dataclasses import replace

import pytest

from actuator.answer import Answer
from actuator.parts import Project
from actuator.project.document import parse
from actuator.project.validate import validate
from actuator.report.names import all_figures
from actuator.report.workings import Working, render, working
from tests.report.build import DOCUMENT, NOT_REACHED, answer


def inputs(found: Working) -> dict[str, tuple[str, str]]:
    return {item.path: (item.value, item.origin) for item in found.inputs}


def test_every_figure_of_an_answer_has_a_working_that_renders() -> None:
    given = answer(completed=False, refused=True)
    assert given.analysis is not None
    for item in all_figures(given.analysis):
        found = working(given, item.at.machine_index, item.at.actuator_index, item.figure.key)
        assert found.name == item.name
        assert found.formula
        assert found.sources
        text = render(found)
        assert text.startswith(item.name + "\n")
        assert max(len(line) for line in text.splitlines()) <= 100, item.name
        assert len(text.splitlines()) < 150, item.name


def test_origins_say_typed_default_or_computed() -> None:
    found = inputs(working(answer(), 0, 0, "static.theoretical_retract"))
    at = "machine.1.actuator.1."
    assert found[at + "bore"] == ("50.00 mm", "typed")
    assert found["machine.1.supply_pressure"] == ("6.000 bar gauge", "typed")
    assert found["site.ambient_pressure"] == ("1.000 bar absolute", "typed")
    assert at + "return_pressure" not in found
    simulated = inputs(working(answer(), 0, 0, "extend.stroke_time"))
    value, origin = simulated[at + "friction.breakaway"]
    assert origin == "default: 8 % of (p_s - p0)*A_cap (spring-extend: A_rod), common practice, no source"
    # 8 % of 6 bar on π/4·(50 mm)² = 0.08 · 600 000 Pa · 1.9635e-3 m² = 94.25 N, by hand
    assert value == "94.25 N"
    assert simulated[at + "load.process_force.1.force"] == ("300.0 N", "typed")
    ratio = inputs(working(answer(), 0, 0, "static.load_ratio_extend"))
    assert {origin for _, origin in ratio.values()} == {"computed"}
    assert '"Press, left".Pusher.static.load_extend' in ratio


def test_a_conductance_that_was_typed_otherwise_says_how_and_on_what_assumption() -> None:
    found = inputs(working(answer(), 0, 0, "paths.cap_filling.conductance"))
    origin = found["machine.1.actuator.1.valve.supply_c"][1]
    assert origin.startswith("typed as supply_cv = 0.5. ")
    assert "measured with water" in origin


def test_numbers_follow_the_reader_s_units() -> None:
    found = inputs(working(answer(), 0, 0, "static.theoretical_extend", "us"))
    value, unit = found["machine.1.actuator.1.bore"][0].split()
    assert unit == "in"
    assert float(value) == pytest.approx(50.0 / 25.4, rel=5e-4)
    assert found["site.ambient_pressure"][0] == "14.50 psi absolute"  # 100 kPa / 6.894757 kPa


def test_a_simulated_figure_states_the_equations_solved() -> None:
    found = working(answer(), 0, 0, "extend.stroke_time")
    assert found.formula[0] == "t_s = t(first contact with the end) − t(valve command)"
    text = " ".join(found.formula)
    assert "M·dv/dt" in text
    assert "h·A_w·(T_w − T)" in text
    polytropic = DOCUMENT.replace('stroke = "400 mm"', 'stroke = "400 mm"\npolytropic_index = 1.2')
    text = " ".join(working(_other(polytropic), 0, 0, "extend.stroke_time").formula)
    assert "polytropic index n" in text
    assert "h·A_w" not in text


def _other(source: str) -> Answer:
    """The hand-made answer on another document."""
    document = parse(source)
    project = validate(document)
    assert isinstance(project, Project), project
    given = answer()
    assert given.analysis is not None
    machine = given.analysis.machines[0]
    parts = project.machines[0].actuators
    actuators = tuple(replace(item, part=part) for item, part in zip(machine.actuators, parts, strict=True))
    machines = (replace(machine, part=project.machines[0], actuators=actuators),)
    analysis = replace(given.analysis, project=project, machines=machines)
    return Answer(document=document, problems=(), project=project, analysis=analysis)


def test_sums_name_what_they_are_made_of() -> None:
    found = working(answer(), 0, None, "demand.per_cycle")
    assert [item.name for item in found.inputs] == [
        "Pusher: Air drawn, ANR",
        "Lift.1: Air drawn, ANR",
        "Cycle time",
    ]


def test_remarks_go_with_the_figure() -> None:
    assert "an invented reason" in working(answer(), 0, 0, "cycle.air_drawn").remarks
    assert "Rule used: Euler." in working(answer(), 0, 0, "rod.buckling_load").remarks
    assert "an invented remark about the diagram" in working(answer(), 0, 0, "indicator.work").remarks
    assert "an invented remark about the stroke" in working(answer(), 0, 0, "extend.end_speed").remarks


def test_a_refused_figure_shows_its_reason() -> None:
    found = working(answer(completed=False), 0, 0, "extend.stroke_time")
    assert found.value == f"refused: {NOT_REACHED.reason}"


def test_what_is_not_there_cannot_be_explained() -> None:
    with pytest.raises(LookupError, match="extend_stroke"):
        working(answer(), 0, 0, "extend_stroke")
    with pytest.raises(LookupError, match="the document has problems"):
        working(replace(answer(), analysis=None), 0, 0, "extend.stroke_time")
