"""Names of figures: any tail that no other figure has."""

from __future__ import annotations

import pytest

from actuator.report.names import Named, NotFound, all_figures, find
from actuator.results import Analysis
from tests.report.build import answer


@pytest.fixture(name="analysis")
def _analysis() -> Analysis:
    found = answer().analysis
    assert found is not None
    return found


@pytest.mark.parametrize(
    ("typed", "name"),
    [
        ("Pusher.extend.stroke_time", '"Press, left".Pusher.extend.stroke_time'),
        ('"Press, left".Pusher.extend.stroke_time', '"Press, left".Pusher.extend.stroke_time'),
        ("Press, left.Pusher.extend.stroke_time", '"Press, left".Pusher.extend.stroke_time'),
        ("Pusher.extend.stroke_time_s", '"Press, left".Pusher.extend.stroke_time'),
        ("Pusher.cycle.exergy_J.friction", '"Press, left".Pusher.cycle.exergy.friction'),
        ('"Lift.1".cycle.exergy.friction', '"Press, left"."Lift.1".cycle.exergy.friction'),
        ("Lift.1.cycle.exergy.friction", '"Press, left"."Lift.1".cycle.exergy.friction'),
        ("Pusher.worst.slow.extend.stroke_time", '"Press, left".Pusher.worst.slow.extend.stroke_time'),
        ("Pusher.worst.hard.retract.end_energy_J", '"Press, left".Pusher.worst.hard.retract.end_energy'),
        ("demand.mean", '"Press, left".demand.mean'),
        ("mean", '"Press, left".demand.mean'),
        ("money.cost_year", "money.cost_year"),
        ("per_anr_m3", "money.per_anr_m3"),
    ],
)
def test_a_tail_finds_its_figure(analysis: Analysis, typed: str, name: str) -> None:
    found = find(analysis, typed)
    assert isinstance(found, Named)
    assert found.name == name


def test_every_full_name_finds_itself(analysis: Analysis) -> None:
    for item in all_figures(analysis):
        found = find(analysis, item.name)
        assert isinstance(found, Named), item.name
        assert (found.figure, found.at.owner) == (item.figure, item.at.owner)


def test_an_ambiguous_tail_names_all_that_it_could_mean(analysis: Analysis) -> None:
    assert find(analysis, "extend.stroke_time") == NotFound(
        ('"Press, left".Pusher.extend.stroke_time', '"Press, left"."Lift.1".extend.stroke_time'), True
    )


def test_half_a_step_is_no_tail(analysis: Analysis) -> None:
    assert isinstance(find(analysis, "troke_time"), NotFound)


def test_an_unknown_name_is_answered_with_the_nearest(analysis: Analysis) -> None:
    found = find(analysis, "extend.strok_time")
    assert isinstance(found, NotFound)
    assert not found.ambiguous
    assert found.names[0] == '"Press, left".Pusher.extend.stroke_time'
