"""Each requirement with its margin, in words and numbers."""

from __future__ import annotations

from actuator.errors import Refusal
from actuator.kinds import Kind, fields_of
from actuator.parts import Require
from actuator.report.shown import Shown
from actuator.results import Analysis, Criterion

UPPER = ("stroke_time", "force_time")
"""Requirements that set an upper limit; the others set a lower one."""
_DIRECTIONS = {"extend": ", extending", "retract": ", retracting"}
_SIGNS = {"met": "met", "failed": "FAILED", "refused": "REFUSED"}


def kind_of_requirement(name: str) -> Kind:
    """Kind of a requirement's wanted and got."""
    found = next(spec.kind for spec in fields_of(Require) if spec.key == name)
    assert found is not None
    return found


def label_of_requirement(name: str) -> str:
    """Its label in the document's forms."""
    found = next(spec.entry for spec in fields_of(Require) if spec.key == name)
    assert found is not None
    return found.label


def _distance(margin: float, upper: bool) -> str:
    """How far a value lies from its limit, in words; ``margin`` is positive on the good side."""
    side = "below" if (margin > 0.0) == upper else "above"
    if side == "above" and abs(margin) >= 9.0:
        return f"{1.0 + abs(margin):,.0f} times".replace(",", " ")
    return f"{abs(margin) * 100.0:.3g} % {side}"


def verdict_line(criterion: Criterion, shown: Shown) -> str:
    """One requirement as a sentence.

    Parameters
    ----------
    criterion : Criterion
    shown : Shown
        Units of the reader.

    Returns
    -------
    str
        ``"met: Stroke time, extending: 0.7012 s, 41.6 % below the 1.200 s allowed"``.
    """
    kind = kind_of_requirement(criterion.name)
    label = label_of_requirement(criterion.name) + _DIRECTIONS.get(criterion.direction, "")
    wanted = shown.text(criterion.wanted, kind)
    limit = f"{wanted} allowed" if criterion.name in UPPER else f"{wanted} asked"
    sign = _SIGNS[criterion.verdict]
    if isinstance(criterion.got, Refusal):
        return f"{sign}: {label}: {criterion.got.reason}; {limit}"
    got = shown.text(criterion.got, kind)
    if isinstance(criterion.margin, Refusal):
        return f"{sign}: {label}: {got}; {limit}"
    if criterion.margin == 0.0:
        return f"{sign}: {label}: {got}, exactly the {limit}"
    distance = _distance(criterion.margin, criterion.name in UPPER)
    return f"{sign}: {label}: {got}, {distance} the {limit}"


def all_met(analysis: Analysis) -> bool:
    """Whether no requirement of any actuator fails or cannot be judged."""
    return all(
        criterion.verdict == "met"
        for machine in analysis.machines
        for actuator in machine.actuators
        for criterion in actuator.criteria
    )
