"""At which step tolerance the kernel is as accurate as the yardstick."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from typing import Any

import numpy as np
from numpy.typing import NDArray

from actuator.stroke import layout as at
from actuator.stroke.rows import Case, Rows, gather
from tests.benchmark.yardstick import half_stroke

Array = NDArray[np.float64]
TOLERANCES = (1e-3, 7e-4, 5e-4, 3e-4, 2e-4, 1.5e-4, 1e-4, 7e-5, 5e-5, 3e-5, 2e-5, 1e-5)
"""Step tolerances tried, coarse first. [1]"""
YARD = 1e-4
"""Tolerance of the yardstick. [1]"""


class HalfStrokes:
    """A batch of extending half strokes by the compiled kernel, to be run again and again."""

    def __init__(self, batch: Callable[..., float], cases: Sequence[Case]) -> None:
        self.batch = batch
        self.rows: Rows = gather(cases, compiled=True, way=1.0)
        self._start = self.rows.y.copy(), self.rows.mode.copy()
        self._stop = np.zeros(1, np.uint8)

    def reset(self) -> Rows:
        """Rows as before the first run."""
        self.rows.y[:], self.rows.mode[:] = self._start
        self.rows.info[:] = 0.0
        return self.rows

    def run(self, rtol: float) -> Array:
        """Time of arrival and speed there of each case, shape (cases, 2). [s, m/s]"""
        self.batch(1.0, 1.0, 1.0, rtol, False, *self.reset().arguments(), self._stop)
        found: Array = self.rows.info[:, [at.I_EXTENDED, at.I_EXTEND_SPEED]]
        return found


def _error(found: Array, true: Array) -> Array:
    """Root mean square of the relative errors in time and in speed."""
    result: Array = np.sqrt(np.mean((found / true - 1.0) ** 2, axis=0))
    return result


def compare(batch: Callable[..., float], cases: Sequence[Case]) -> dict[str, Any]:
    """Errors of yardstick and kernel against the yardstick at 1e-11, and the tolerance of equal accuracy."""
    true = np.array([half_stroke(case, 1e-11) for case in cases])
    yard = _error(np.array([half_stroke(case, YARD) for case in cases]), true)
    kernel = HalfStrokes(batch, cases)
    errors = {rtol: _error(kernel.run(rtol), true) for rtol in TOLERANCES}
    good = [rtol for rtol, error in errors.items() if np.all(error <= yard)]
    return {"yard": yard, "kernel": errors, "equal": good[0] if good else TOLERANCES[-1]}
