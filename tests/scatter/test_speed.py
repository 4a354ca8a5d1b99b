"""How long scatter takes, in yardsticks; run by hand on a quiet machine."""

from __future__ import annotations

from functools import partial

import pytest

from actuator.analysis import analyse
from actuator.answer import Answer, work_out
from actuator.project.document import parse
from actuator.report.scatter import bands_of, sensitivity_of
from actuator.stroke.compiled import prepare
from tests.cli.test_bands import DOCUMENT
from tests.scatter.yardstick import best, half_stroke


@pytest.fixture(name="given", scope="module")
def _given() -> Answer:
    prepare(wait=True)
    given = work_out(parse(DOCUMENT))
    bands_of(given, 0, 0, samples=8)  # imports scipy.stats
    return given


@pytest.mark.benchmark
def test_the_yardstick_solves_the_base_case() -> None:
    """0.40 s: the independent model's 0.3985 to 0.4134 s, depending on the period, less the refinements."""
    assert half_stroke() == pytest.approx(0.41, abs=0.02)


@pytest.mark.benchmark
def test_bands_of_128_samples_take_at_most_40_yardsticks(given: Answer) -> None:
    unit = best(half_stroke, 20)
    for ledger in (False, True):
        ratio = best(partial(bands_of, given, 0, 0, ledger=ledger), 8) / unit
        print(f"128 samples{', with ledger' if ledger else ''}: {ratio:.1f} yardsticks of {1e3 * unit:.2f} ms")
        assert ratio < (60.0 if ledger else 40.0)


@pytest.mark.benchmark
def test_an_answer_with_its_worst_pair_takes_at_most_5_yardsticks(given: Answer) -> None:
    assert given.project is not None
    project = given.project
    ratio = best(lambda: analyse(project), 20) / best(half_stroke, 20)
    print(f"analysis of one cylinder with its worst pair: {ratio:.2f} yardsticks")
    assert ratio < 5.0


@pytest.mark.benchmark
def test_sensitivity_takes_no_longer_than_bands(given: Answer) -> None:
    ratio = best(lambda: sensitivity_of(given, 0, 0, "extend.end_energy"), 8) / best(half_stroke, 20)
    print(f"sensitivity of one figure: {ratio:.1f} yardsticks")
    assert ratio < 40.0
