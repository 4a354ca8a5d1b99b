"""One source, two ways to run it, any number of threads: the same figures."""

from __future__ import annotations

import dataclasses
from concurrent.futures import ThreadPoolExecutor

import numpy as np
import pytest

from actuator.errors import Refusal
from actuator.stroke.result import Balances, HalfStroke, Ledger, StrokeResult

from .cases import CASES, Case
from .project_side import project_result

SAME = 1e-9
"""The compiler may reorder sums and fuse products; nothing else differs. [1]"""
HISTORIES = ("time", "position", "speed", "p_cap", "p_rod", "temp_cap", "temp_rod", "flow_supply", "flow_exhaust")
CHOSEN = [
    case
    for case in CASES
    if case.name
    in (
        "base", "short 1.2 s", "lifting, meter-out", "longest, slow", "cut off, short cycle", "index 1.2",
        "adiabatic", "stopped by the work", "too heavy to lift", "weaker return, turned back", "slow valve",
    )
]  # fmt: skip


def _figures(part: HalfStroke | Ledger | Balances) -> dict[str, object]:
    return {field.name: getattr(part, field.name) for field in dataclasses.fields(part)}


def _alike(one: StrokeResult, other: StrokeResult, rel: float) -> None:
    assert (one.cycles, one.periodic, one.rates, one.remarks) == (
        other.cycles, other.periodic, other.rates, other.remarks,
    )  # fmt: skip
    for name in HISTORIES:
        a, b = getattr(one, name), getattr(other, name)
        np.testing.assert_allclose(b, a, rtol=rel, atol=rel * float(np.abs(a).max()), err_msg=name)
    assert not isinstance(one.ledger, Refusal)
    assert not isinstance(other.ledger, Refusal)
    energy = one.ledger.supplied + 1e-9
    for name, value in _figures(one.ledger).items():
        assert getattr(other.ledger, name) == pytest.approx(value, rel=rel, abs=rel * energy), name
    assert not isinstance(one.balances, Refusal)
    assert not isinstance(other.balances, Refusal)
    for name, value in _figures(one.balances).items():
        scale = rel * sum(one.balances.enthalpy_in) + 1e-15
        assert getattr(other.balances, name) == pytest.approx(value, rel=rel, abs=scale), name
    for half, twin in ((one.extend, other.extend), (one.retract, other.retract)):
        for name, value in _figures(half).items():
            if isinstance(value, float) and not isinstance(value, bool):
                assert getattr(twin, name) == pytest.approx(value, rel=rel, abs=1e-15), name
            else:
                assert getattr(twin, name) == value, name


@pytest.mark.parametrize("case", CHOSEN, ids=lambda case: case.name)
def test_interpreted_is_compiled(case: Case) -> None:
    compiled = project_result(case, engine="compiled")
    interpreted = project_result(case, engine="interpreted")
    assert (compiled.engine, interpreted.engine) == ("compiled", "interpreted")
    _alike(compiled, interpreted, SAME)


@pytest.mark.parametrize("engine", ["compiled", "interpreted"])
@pytest.mark.parametrize("workers", [1, 2, 5])
def test_any_number_of_threads_gives_the_same_to_the_last_bit(workers: int, engine: str) -> None:
    compiled = engine == "compiled"
    chosen = CASES[:24] if compiled else CASES[5:9]

    def run(case: Case) -> StrokeResult:
        return project_result(case, engine="compiled" if compiled else "interpreted", ledger=compiled)

    alone = [run(case) for case in chosen]
    with ThreadPoolExecutor(workers) as pool:
        together = list(pool.map(run, chosen))
    for one, other in zip(alone, together, strict=True):
        for name in HISTORIES:
            assert np.array_equal(getattr(one, name), getattr(other, name)), name
        assert (one.cycles, one.rates, one.mismatch) == (other.cycles, other.rates, other.mismatch)
        assert one.remarks == other.remarks
        for half, twin in ((one.extend, other.extend), (one.retract, other.retract)):
            assert _figures(half) == _figures(twin)
        if not isinstance(one.ledger, Refusal) and not isinstance(other.ledger, Refusal):
            assert _figures(one.ledger) == _figures(other.ledger)
