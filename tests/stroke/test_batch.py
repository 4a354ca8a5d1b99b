"""A batch is its cases one by one, in either engine and any number of threads, and one flag ends it."""

from __future__ import annotations

import threading
from concurrent.futures import ThreadPoolExecutor
from typing import Literal

import numpy as np
import pytest

from actuator.errors import Cancelled
from actuator.stroke import layout as at
from actuator.stroke.compiled import engine
from actuator.stroke.rows import Case, gather
from actuator.stroke.simulate import simulate
from tests.stroke.states import base, many

RTOL = 1e-4
FIGURES = [at.I_STATUS, at.I_EXTENDED, at.I_EXTEND_SPEED, at.I_STEPS, at.I_RATES]
NEVER = np.zeros(1, np.uint8)


def _half_strokes(cases: list[Case], compiled: bool) -> np.ndarray[tuple[int, int], np.dtype[np.float64]]:
    rows = gather(cases, compiled=compiled, way=1.0)
    kernel = engine("compiled" if compiled else "interpreted")[0]
    assert kernel(1.0, 1.0, 1.0, RTOL, False, *rows.arguments(), NEVER) == at.DONE
    return np.array(rows.info)[:, FIGURES]


def test_compiled_is_interpreted_to_the_last_bit() -> None:
    cases = many(12)
    np.testing.assert_array_equal(_half_strokes(cases, True), _half_strokes(cases, False))


def test_a_batch_is_its_cases_one_by_one() -> None:
    cases = many(12)
    together = _half_strokes(cases, True)
    alone = np.concatenate([_half_strokes([case], True) for case in cases])
    np.testing.assert_array_equal(together, alone)
    assert together[1, 1] == -1.0  # the one that is held never arrives
    arrived = np.delete(together, 1, axis=0)
    assert (arrived[:, 1] > 0.0).all()
    assert (arrived[:, 2] > 0.0).all()


@pytest.mark.parametrize("threads", [2, 5])
def test_any_number_of_threads_gives_the_same(threads: int) -> None:
    cases = many(40)
    parts = [cases[first::threads] for first in range(threads)]
    with ThreadPoolExecutor(threads) as pool:
        found = list(pool.map(lambda part: _half_strokes(part, True), parts))
    whole = _half_strokes(cases, True)
    for first, part in enumerate(found):
        np.testing.assert_array_equal(part, whole[first::threads])


def test_half_stroke_of_a_batch_is_that_of_the_first_cycle() -> None:
    """Extending from rest at the retracted end, as in a cycle so long that everything settles."""
    part, machine, site, _ = base()
    found = simulate(part, machine, site, ledger=False, rtol=1e-8, engine="compiled")
    rows = gather([base()], compiled=True, way=1.0)
    engine("compiled")[0](1.0, 1.0, 1.0, 1e-8, False, *rows.arguments(), NEVER)
    assert hasattr(found, "extend")
    assert rows.info[0, at.I_EXTENDED] == pytest.approx(found.extend.stroke_time, rel=0.02)


@pytest.mark.parametrize("wanted", ["compiled", "interpreted"])
def test_a_flag_that_is_set_ends_the_work(wanted: Literal["compiled", "interpreted"]) -> None:
    rows = gather(many(3), compiled=wanted == "compiled", way=1.0)
    kernel, _ = engine(wanted)
    assert kernel(1.0, 1.0, 1.0, RTOL, False, *rows.arguments(), np.ones(1, np.uint8)) == at.STOPPED
    part, machine, site, _ = base()
    with pytest.raises(Cancelled, match="stopped"):
        simulate(part, machine, site, engine=wanted, stop=np.ones(1, np.uint8))


def test_a_flag_set_meanwhile_ends_the_compiled_kernel() -> None:
    """The kernel holds no lock: this thread runs on and sets the flag of an endless run."""
    kernel, _ = engine("compiled")
    rows = gather([base()] * 3000, compiled=True)
    stop = np.zeros(1, np.uint8)
    found: list[float] = []
    run = threading.Thread(
        target=lambda: found.append(kernel(200.0, -1.0, 0.0, 1e-9, False, *rows.arguments(), stop)), daemon=True
    )
    run.start()
    while rows.info[0, at.I_STEPS] == 0.0:
        pass
    stop[0] = 1
    run.join(60.0)
    assert found == [at.STOPPED]
