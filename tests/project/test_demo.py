"""The demo plant has something to say: one requirement fails by a little, all others are met."""

from __future__ import annotations

from actuator.answer import work_out
from actuator.project.document import demo


def test_one_requirement_of_the_demo_fails_by_a_little() -> None:
    analysis = work_out(demo()).analysis
    assert analysis is not None
    judged = [
        (result.part.name, criterion)
        for machine in analysis.machines
        for result in machine.actuators
        for criterion in result.criteria
    ]
    failed = [
        (name, criterion.name, criterion.direction) for name, criterion in judged if criterion.verdict == "failed"
    ]
    assert failed == [("Clamp", "force_reserve", "extend")]
    (margin,) = [criterion.margin for _, criterion in judged if criterion.verdict == "failed"]
    assert isinstance(margin, float)
    assert -0.15 < margin < 0.0
    assert all(criterion.verdict in ("met", "failed") for _, criterion in judged)
    assert len(judged) > 10
