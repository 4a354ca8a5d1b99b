"""Text: tables that fit a pipe, four significant figures, verdicts in words and numbers."""

from __future__ import annotations

import re
from dataclasses import replace

import pytest

from actuator.cautions import DECIDE
from actuator.errors import Problem, Refusal
from actuator.report.shown import Shown
from actuator.report.text import as_text, figure_list, problem_lines
from actuator.report.verdicts import all_met, verdict_line
from actuator.results import Criterion
from actuator.units import Reading
from tests.report.build import NO_STROKE, NOT_REACHED, answer

SHOWN = Shown(Reading(100000.0, "EUR"))


def cells(text: str, label: str) -> list[str]:
    """Words behind the first line that starts with a label."""
    line = next(line for line in text.splitlines() if line.startswith(f"  {label}  "))
    return line.removeprefix(f"  {label}").split()


@pytest.mark.parametrize("system", ["si", "us"])
@pytest.mark.parametrize("refused", [False, True])
def test_no_line_is_wider_than_100_columns_and_none_has_escapes(system: str, refused: bool) -> None:
    text = as_text(answer(completed=False, refused=refused), "us" if system == "us" else "si")
    assert max(len(line) for line in text.splitlines()) <= 100
    assert "\x1b" not in text
    assert text.endswith("\n")


def test_numbers_have_four_figures_and_both_directions_a_column() -> None:
    given = answer()
    assert given.analysis is not None
    stroke = given.analysis.machines[0].actuators[0].stroke
    assert not isinstance(stroke, Refusal)
    text = as_text(given)
    both = (stroke.extend.stroke_time, stroke.retract.stroke_time)
    assert cells(text, "Stroke time") == [*(f"{time:.3f}" for time in both), "s"]
    assert cells(text, "Stroke completed") == ["yes", "yes"]


def test_us_units_are_the_trade_s() -> None:
    given = answer()
    assert given.analysis is not None
    bore = given.analysis.machines[0].actuators[0].static.required_bore
    assert isinstance(bore, float)
    inches, unit = cells(as_text(given, "us"), "Required bore")
    assert unit == "in"
    assert float(inches) == pytest.approx(bore / 0.0254, rel=5e-4)  # 1 in = 25.4 mm exactly


def test_the_ledger_shows_joules_and_shares() -> None:
    given = answer()
    assert given.analysis is not None
    stroke = given.analysis.machines[0].actuators[0].stroke
    assert not isinstance(stroke, Refusal)
    assert not isinstance(stroke.ledger, Refusal)
    ledger = stroke.ledger
    value, share, percent, unit = cells(as_text(given), "Vented without working")
    assert (percent, unit) == ("%", "J")
    assert float(value) == pytest.approx(ledger.exhaust, rel=5e-4)
    assert float(share) == pytest.approx(100.0 * ledger.exhaust / ledger.supplied, rel=5e-4)


def test_what_is_refused_says_why_once() -> None:
    text = as_text(answer(completed=False))
    assert cells(text, "Stroke time")[0] == "refused"
    assert " ".join(text.split()).count(NOT_REACHED.reason) == 2  # the table of the motion, and the requirement
    assert cells(text, "Stroke completed") == ["no", "yes"]
    lost = " ".join(as_text(answer(refused=True)).split())
    assert NO_STROKE.reason in lost


def test_requirements_cautions_and_remarks_are_there() -> None:
    text = " ".join(as_text(answer()).split())
    assert "FAILED: Stroke time, retracting: 1.250 s, 25 % above the 1.000 s allowed" in text
    assert "an invented caution [nobody]" in text
    assert "an invented remark about the whole" in text
    assert "none asked, nothing judged" in text
    assert text.endswith(DECIDE)


CRITERION = Criterion(name="stroke_time", direction="extend", wanted=1.2, got=0.6, unit="s", margin=0.5, verdict="met")


@pytest.mark.parametrize(
    ("criterion", "line"),
    [
        (CRITERION, "met: Stroke time, extending: 0.6000 s, 50 % below the 1.200 s allowed"),
        (
            replace(CRITERION, got=1.2, margin=0.0),
            "met: Stroke time, extending: 1.200 s, exactly the 1.200 s allowed",
        ),
        (
            replace(CRITERION, got=1.5, margin=-0.25, verdict="failed", direction="retract"),
            "FAILED: Stroke time, retracting: 1.500 s, 25 % above the 1.200 s allowed",
        ),
        (
            replace(CRITERION, got=NOT_REACHED, margin=NOT_REACHED, verdict="refused"),
            f"REFUSED: Stroke time, extending: {NOT_REACHED.reason}; 1.200 s allowed",
        ),
        (
            replace(
                CRITERION, name="buckling_safety", direction="", wanted=4.0, got=3.0, margin=-0.25, verdict="failed"
            ),
            "FAILED: Buckling safety: 3.000, 25 % below the 4.000 asked",
        ),
        (
            replace(CRITERION, name="force_reserve", wanted=0.5, got=90.5, margin=180.0),
            "met: Force reserve, extending: 9050 %, 181 times the 50.00 % asked",
        ),
        (
            replace(CRITERION, name="force_reserve", wanted=0.3, got=Refusal("no load"), margin=Refusal("no load")),
            "met: Force reserve, extending: no load; 30.00 % asked",
        ),
        (
            replace(CRITERION, name="force_at_end", wanted=0.0, got=500.0, margin=Refusal("no share of a wanted 0")),
            "met: Force at end, extending: 500.0 N; 0 N asked",
        ),
    ],
)
def test_a_verdict_reads_as_a_sentence(criterion: Criterion, line: str) -> None:
    assert verdict_line(criterion, SHOWN) == line


def test_all_met_asks_every_requirement() -> None:
    given = answer().analysis
    assert given is not None
    assert not all_met(given)
    machine = given.machines[0]
    met = tuple(replace(item, criteria=(CRITERION,)) for item in machine.actuators)
    assert all_met(replace(given, machines=(replace(machine, actuators=met),)))
    unjudged = (met[0], replace(met[1], criteria=(replace(CRITERION, verdict="refused"),)))
    assert not all_met(replace(given, machines=(replace(machine, actuators=unjudged),)))


def test_problems_have_file_line_path_given_and_allowed() -> None:
    problem = Problem(path="machine.1.actuator.1.bore", given="50", allowed='give a unit, "50 mm"', line=7)
    assert problem_lines([problem], "line.toml") == [
        'line.toml: line 7: machine.1.actuator.1.bore: "50" given; give a unit, "50 mm"'
    ]


def test_the_list_of_figures_has_every_name_and_value() -> None:
    text = figure_list(answer(refused=True))
    assert re.search(r'^"Press, left"\.Pusher\.extend\.stroke_time +[0-9.]+ s$', text, re.MULTILINE)
    assert '"Press, left"."Lift.1".cycle.air_drawn' in text
    assert f"refused: {NO_STROKE.reason}" in text


def test_an_answer_with_problems_has_no_tables() -> None:
    broken = replace(answer(), project=None, analysis=None)
    with pytest.raises(LookupError, match="the document has problems"):
        as_text(broken)
    with pytest.raises(LookupError, match="the document has problems"):
        figure_list(broken)


def test_a_rod_without_a_rule_does_not_name_one() -> None:
    given = answer()
    assert given.analysis is not None
    machine = given.analysis.machines[0]
    free = replace(machine.actuators[0], rod=replace(machine.actuators[0].rod, rule=""))
    analysis = replace(given.analysis, machines=(replace(machine, actuators=(free,)),))
    assert "Rule used" in as_text(given)
    assert "Rule used" not in as_text(replace(given, analysis=analysis))
