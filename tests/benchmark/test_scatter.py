"""Speed of worst-case pair, bands and sensitivity, as ratios of times of one run; nothing here asserts a time.

Run by hand, on a machine that is otherwise idle: ``python -m pytest -m benchmark -s tests/benchmark/test_scatter.py``.
"""

from __future__ import annotations

from functools import partial

import pytest

from actuator.answer import work_out
from actuator.project.document import parse
from actuator.report.scatter import bands_of, sensitivity_of
from actuator.scatter.pair import worst_pair
from actuator.stroke.compiled import prepare
from actuator.stroke.rows import flow_paths
from actuator.stroke.simulate import simulate
from tests.benchmark.accuracy import YARD
from tests.benchmark.cases import document, one
from tests.benchmark.measure import in_turn
from tests.benchmark.yardstick import half_stroke

ROUNDS = 15
WANTED = {
    "worst-case pair": "",
    "bands, 128 samples": "at most 40 on two idle cores",
    "bands, 128 samples, with the ledger": "",
    "sensitivity of one figure": "",
}


@pytest.mark.benchmark
def test_ratios_to_the_yardstick_are_printed(capsys: pytest.CaptureFixture[str]) -> None:
    prepare(wait=True)
    answer = work_out(parse(document(1)))
    part, machine, site = one()
    corner = partial(simulate, ledger=False)
    times = in_turn(
        {
            "yardstick": lambda: half_stroke((part, machine, site, flow_paths(part)), YARD),
            "worst-case pair": lambda: worst_pair(part, machine, site, corner),
            "bands, 128 samples": lambda: bands_of(answer, 0, 0),
            "bands, 128 samples, with the ledger": lambda: bands_of(answer, 0, 0, ledger=True),
            "sensitivity of one figure": lambda: sensitivity_of(answer, 0, 0, "extend.end_energy"),
        },
        ROUNDS,
    )
    yard = times.pop("yardstick")
    assert times.keys() == WANTED.keys()
    with capsys.disabled():
        print(f"\nyardstick {1e3 * yard:.2f} ms")
        for name, seconds in times.items():
            print(f"{name:<40} {1e3 * seconds:9.2f} ms {seconds / yard:8.2f}   {WANTED[name]}")
