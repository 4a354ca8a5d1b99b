"""The rows of the benchmark: each a time of this run, and its ratio to the yardstick of the same run."""

from __future__ import annotations

import os
import tempfile
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from pathlib import Path
from typing import Any

import numpy as np

from actuator.answer import work_out
from actuator.project.document import parse
from actuator.stroke import compiled
from actuator.stroke.rows import flow_paths
from actuator.stroke.simulate import simulate
from tests.benchmark import plain_c
from tests.benchmark.accuracy import YARD, HalfStrokes, compare
from tests.benchmark.cases import different, document, one
from tests.benchmark.measure import in_turn
from tests.benchmark.yardstick import half_stroke

MANY = 5000
FEW = 40
ROUNDS = 7
Print = Callable[[str], None]


def edits(actuators: int) -> Callable[[], object]:
    """A warm ``work_out`` of a document in which one field changes each time, so that nothing can be taken over."""
    text = parse(document(actuators))
    known = [work_out(text)]
    count = iter(range(1, 10**6))

    def again() -> object:
        edited = text.edited("machine.1.supply_pressure", f"{6.0 + 0.001 * next(count):.3f} bar gauge")
        known[0] = work_out(edited, known[0])
        assert not known[0].problems
        return known[0]

    return again


@contextmanager
def interpreted() -> Iterator[None]:
    """Within, the kernel runs interpreted."""
    before = os.environ.get(compiled.OFF)
    os.environ[compiled.OFF] = "1"
    try:
        yield
    finally:
        os.environ.pop(compiled.OFF)
        if before is not None:
            os.environ[compiled.OFF] = before


def _interpreted(job: Callable[[], object]) -> Callable[[], object]:
    def run() -> object:
        with interpreted():
            return job()

    return run


def _row(out: Print, name: str, seconds: float, ratio: float, wanted: str) -> None:
    out(f"{name:<62} {seconds * 1e3:10.4f} ms {ratio:9.2f}   {wanted}")


def single(out: Print, equal: float) -> None:
    """One actuator, and twenty in one document."""
    part, machine, site = one()
    case = (part, machine, site, flow_paths(part))
    both = edits(1)
    times = in_turn(
        {
            "yardstick": lambda: half_stroke(case, YARD),
            "periodic": lambda: simulate(part, machine, site, ledger=False, rtol=equal, engine="compiled"),
            "ledger": lambda: simulate(part, machine, site, engine="compiled"),
            "plain": lambda: simulate(part, machine, site, engine="interpreted"),
            "one": both,
            "slow": _interpreted(both),
            "twenty": edits(20),
        },
        ROUNDS,
    )
    yard = times["yardstick"]
    out(f"{'':<62} {'':>13} {'ratio':>9}   wanted")
    _row(out, "yardstick: a half stroke by LSODA, rtol 1e-4", yard, 1.0, "")
    _row(out, "periodic state with histories / yardstick", times["periodic"], times["periodic"] / yard, "at most 1")
    _row(out, "the same with the ledger at its own tolerance / yardstick", times["ledger"], times["ledger"] / yard, "")
    _row(out, "work_out, one actuator, all edited / yardstick", times["one"], times["one"] / yard, "at most 3")
    _row(out, "periodic state with the ledger, interpreted / yardstick", times["plain"], times["plain"] / yard, "")
    _row(out, "work_out, interpreted / yardstick", times["slow"], times["slow"] / yard, "at most 40")
    _row(out, "work_out, 20 actuators / one", times["twenty"], times["twenty"] / times["one"], "at most 14")


def many(out: Print, batch: Callable[..., float], equal: float, folder: Path) -> None:
    """Half strokes in a batch of different cases, on one core, against LSODA on some of them and against plain C."""
    cases = different(MANY)
    yards = cases[:: MANY // FEW]
    kernel = HalfStrokes(batch, cases)
    jobs: dict[str, Callable[[], Any]] = {
        "yardstick": lambda: [half_stroke(case, YARD) for case in yards],
        "batch": lambda: kernel.run(equal),
    }
    if plain_c.compiler() is not None:
        c = plain_c.build(folder)
        jobs["c"] = lambda: c(kernel.reset(), equal)
    times = in_turn(jobs, ROUNDS)
    yard, own = times["yardstick"] / len(yards), times["batch"] / MANY
    _row(out, f"yardstick, mean of {len(yards)} of the batch", yard, 1.0, "")
    _row(out, f"half stroke in a batch of {MANY}: yardstick / it", own, yard / own, "at least 150")
    if "c" not in times:
        out("half stroke in the batch / the same in C: no C compiler here")
        return
    mine, its = kernel.run(equal), c(kernel.reset(), equal)[:, :2]
    worst = float(np.abs(its / mine - 1.0).max())
    assert worst <= 1e-9, f"C and kernel differ by {worst:.1e}"
    _row(out, "half stroke in the batch / the same in C", times["c"] / MANY, times["batch"] / times["c"], "at most 2")


def report(out: Print = print) -> None:
    """Measure everything and print it."""
    batch, ready = compiled.engine("compiled")
    assert ready
    found = compare(batch, different(FEW))
    out("errors in stroke time and end speed, root mean square over different half strokes:")
    out(f"  LSODA at {YARD:g}: {found['yard'][0]:.1e} {found['yard'][1]:.1e}")
    for rtol, error in found["kernel"].items():
        out(f"  kernel at {rtol:g}: {error[0]:.1e} {error[1]:.1e}{'  <- equal' if rtol == found['equal'] else ''}")
    single(out, found["equal"])
    with tempfile.TemporaryDirectory() as folder:
        many(out, batch, found["equal"], Path(folder))
