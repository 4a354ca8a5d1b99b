"""The project's kernel against a separate scipy model at tight tolerance.

Tolerances are those the project promises: 0.1 % or 0.2 ms in times, 0.1 % in air, 0.5 % or 2 mm/s in
end speed. Both sides get the same flow paths, so that only the dynamics are compared; the fit of valve
and throttle in series is judged by itself, in ``test_series.py``.
"""

from __future__ import annotations

from functools import cache

import pytest

from actuator.errors import Refusal

from .cases import CASES, Case
from .project_side import halves, number, project_paths, project_result
from .reference_cycle import Reference, reference

BY_NAME = {case.name: case for case in CASES}


@cache
def reference_of(name: str) -> Reference:
    """The reference model's answer, solved once."""
    case = BY_NAME[name]
    table = project_paths(case.actuator)
    return reference(case.actuator, case.machine, case.site, table=table, ledger=True)


def test_the_cases_are_many_and_their_names_differ() -> None:
    assert len(CASES) >= 44
    assert len(BY_NAME) == len(CASES)


@pytest.mark.parametrize("ledger", [True, False], ids=["with ledger", "without"])
@pytest.mark.parametrize("case", CASES, ids=lambda case: case.name)
def test_kernel_agrees_with_the_independent_model(case: Case, ledger: bool) -> None:
    expected = reference_of(case.name)
    got = project_result(case, ledger=ledger)
    assert expected.mismatch <= 1e-6
    assert got.periodic
    for direction, half in halves(got).items():
        wanted = expected.extend if direction == "extend" else expected.retract
        assert half.completed == wanted.completed, direction
        assert half.position_reached == pytest.approx(wanted.reached, abs=1e-3 * case.actuator.stroke)
        assert half.peak_speed == pytest.approx(wanted.peak_speed, rel=5e-3, abs=2e-3), direction
        assert half.air_drawn == pytest.approx(wanted.drawn, abs=1e-3 * expected.air_drawn), direction
        if wanted.completed:
            assert number(half.reaction_time) == pytest.approx(wanted.reaction, rel=1e-3, abs=2e-4)
            assert number(half.stroke_time) == pytest.approx(wanted.stroke, rel=1e-3, abs=2e-4)
            assert number(half.end_speed) == pytest.approx(wanted.end_speed, rel=5e-3, abs=2e-3)
    drawn = got.extend.air_drawn + got.retract.air_drawn
    assert drawn == pytest.approx(expected.air_drawn, rel=1e-3)


@pytest.mark.parametrize("case", CASES, ids=lambda case: case.name)
def test_ledger_agrees_item_by_item(case: Case) -> None:
    expected = reference_of(case.name).tally.ledger()
    result = project_result(case)
    got = result.ledger
    assert not isinstance(got, Refusal)
    assert got.residual == pytest.approx(got.stored_change, abs=1e-6 * got.supplied)
    for item, wanted in expected.items():
        # A bounce of a few nanometres at the end counts as rest on one side only. A cycle that
        # repeats only to within ``mismatch`` cannot be known better than that.
        share = 1e-3 if item == "filling" else 1e-5 + 3.0 * result.mismatch
        assert getattr(got, item) == pytest.approx(wanted, abs=share * got.supplied), item


@pytest.mark.parametrize("case", CASES, ids=lambda case: case.name)
def test_entropy_heat_and_masses_agree(case: Case) -> None:
    sums = reference_of(case.name).tally.sums
    result = project_result(case)
    got = result.balances
    assert not isinstance(got, Refusal)
    share = 1e-5 + 3.0 * result.mismatch
    temp0, energy, mass = case.site.ambient_temperature, sums["supplied"], sums["drawn"]
    produced = sums["entropy_exhaust"] - sums["entropy_supply"] - sums["wall_to_air"] / temp0
    assert got.entropy_produced == pytest.approx(produced, abs=share * energy / temp0)
    enthalpy = sums["enthalpy_supply"]
    assert sum(got.heat) == pytest.approx(sums["wall_to_air"], abs=share * enthalpy)
    assert sum(got.work) == pytest.approx(sums["boundary_work"], abs=share * energy)
    assert got.drawn == pytest.approx(sums["drawn"], abs=share * mass)
    assert got.given_back == pytest.approx(sums["given_back"], abs=share * mass)
    assert got.vented == pytest.approx(sums["vented"] - sums["sucked_in"], abs=share * mass)
