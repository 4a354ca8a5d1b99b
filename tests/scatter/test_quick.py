"""A quick simulation is the full one to a thousandth."""

from __future__ import annotations

import dataclasses

import pytest

from actuator.errors import Refusal
from actuator.stroke.result import HalfStroke, StrokeResult
from actuator.stroke.simulate import simulate
from tests.agreement.cases import CASES, Case

PART = {case.name: case for case in CASES}
NAMES = (
    "base",
    "short 1.2 s",
    "lowering, meter-out",
    "meter-in, unequal needles",
    "pressing at the end",
    "turned back halfway out",
    "cut off, short cycle",
    "index 1.2",
    "too heavy to lift",
)
CLOSE = 2e-3
"""A thousandth in times and speeds, twice that in energies. [1]"""
LEAST = {"force_time": 1e-4, "air_drawn": 1e-7, "position_reached": 1e-4}
"""Differences that do not count, where a figure may be next to nothing. [s, kg, m]"""


def _both(case: Case, ledger: bool) -> tuple[StrokeResult, StrokeResult]:
    full = simulate(case.actuator, case.machine, case.site)
    quick = simulate(case.actuator, case.machine, case.site, quick=True, ledger=ledger)
    assert not isinstance(full, Refusal)
    assert not isinstance(quick, Refusal)
    return full, quick


def _alike(full: HalfStroke, quick: HalfStroke) -> None:
    for field in dataclasses.fields(HalfStroke):
        value = getattr(full, field.name)
        found = getattr(quick, field.name)
        if isinstance(value, float):
            assert found == pytest.approx(value, rel=CLOSE, abs=LEAST.get(field.name, 1e-12)), field.name
        else:
            assert type(found) is type(value), field.name


@pytest.mark.parametrize("name", NAMES)
def test_a_quick_simulation_gives_the_figures_of_the_full_one(name: str) -> None:
    full, quick = _both(PART[name], ledger=False)
    assert quick.rates < 0.7 * full.rates
    assert quick.periodic
    assert isinstance(quick.ledger, Refusal)
    _alike(full.extend, quick.extend)
    _alike(full.retract, quick.retract)


@pytest.mark.parametrize("name", NAMES[:3])
def test_a_quick_simulation_carries_the_ledger_where_asked(name: str) -> None:
    full, quick = _both(PART[name], ledger=True)
    assert not isinstance(full.ledger, Refusal)
    assert not isinstance(quick.ledger, Refusal)
    for field in dataclasses.fields(full.ledger):
        value = getattr(full.ledger, field.name)
        assert getattr(quick.ledger, field.name) == pytest.approx(value, abs=1e-3 * full.ledger.supplied), field.name
