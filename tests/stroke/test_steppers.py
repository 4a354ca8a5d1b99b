"""Order of both pairs on a smooth stretch of the kernel's own equations, and the ledger in their weights."""

from __future__ import annotations

import itertools
import math
from collections.abc import Callable

import numpy as np
import pytest

from actuator.stroke import layout as at
from actuator.stroke import rodas
from actuator.stroke.equations import rates
from actuator.stroke.ledger import book
from actuator.stroke.slopes import slopes_at
from actuator.stroke.states import Row, State
from actuator.stroke.steppers import Step, explicit_step, implicit_step
from tests.stroke.states import moving

LONG = 0.02
"""The stretch; no flow changes its kind within. [s]"""

Stepper = Callable[[float, float, State, State, Row, Row], Step]


def _implicit(time: float, h: float, y: State, k: State, mode: Row, par: Row) -> Step:
    return implicit_step(time, h, y, k, slopes_at(time, y, mode, par), mode, par)


def _end(
    stepper: Stepper, start: tuple[float, State, Row, Row], steps: int
) -> np.ndarray[tuple[int], np.dtype[np.float64]]:
    time, y, mode, par = start
    h = LONG / steps
    k = rates(time, y, mode, par)
    for i in range(steps):
        done = stepper(time + i * h, h, y, k, mode, par)
        y, k = done.y, done.k
    return np.array(y)


def _orders(stepper: Stepper, start: tuple[float, State, Row, Row], counts: list[int]) -> list[float]:
    true = _end(explicit_step, start, 4000)
    errors = [float(np.abs(_end(stepper, start, count) / true - 1.0).max()) for count in counts]
    return [math.log2(coarse / fine) for coarse, fine in itertools.pairwise(errors)]


STRETCHES = {
    "walls": moving(full=0.5, rest=0.6),
    "polytropic": moving(full=0.5, rest=0.6, index=1.2),
    "opening": moving(full=0.5, rest=0.6, over=0.05),
    "back": moving(direction=-1.0, full=0.5, rest=0.6),
}


@pytest.mark.parametrize("name", STRETCHES)
def test_explicit_pair_has_order_five(name: str) -> None:
    orders = _orders(explicit_step, STRETCHES[name], [4, 8, 16])
    assert orders[-1] == pytest.approx(5.0, abs=0.25), orders


@pytest.mark.parametrize("name", STRETCHES)
def test_implicit_pair_has_order_four(name: str) -> None:
    orders = _orders(_implicit, STRETCHES[name], [4, 8, 16])
    assert orders[-1] == pytest.approx(4.0, abs=0.25), orders


def test_implicit_pair_stays_put_where_the_explicit_one_explodes() -> None:
    """A chamber at the supply's pressure fills a thousand times faster than a step."""
    _, y, mode, par = moving(full=0.9999, rest=0.145)
    mode[at.DIRECTION] = 0.0
    start: State = (y[0], 0.0, y[2], y[3], y[4], y[5])
    k = rates(0.0, start, mode, par)
    calm = _implicit(0.0, 1.0, start, k, mode, par)
    wild = explicit_step(0.0, 1.0, start, k, mode, par)
    p = 0.4 * calm.y[at.U_CAP] / (par[at.DEAD_CAP] + par[at.AREA_CAP] * calm.y[at.X])
    assert p == pytest.approx(par[at.P_LINE], rel=1e-3)
    assert wild.wrong > 1.0


def test_weights_of_the_implicit_pair() -> None:
    """Orders one and two of a quadrature; the errors' weights see no constant."""
    weights = (rodas.B1, rodas.B2, rodas.B3, rodas.B4, rodas.B5, rodas.B6)
    errors = (rodas.E1, rodas.E2, rodas.E3, rodas.E4, rodas.E5, rodas.E6)
    times = (0.0, rodas.T2, rodas.T3, rodas.T4, 1.0, 1.0)
    assert sum(weights) == pytest.approx(1.0, abs=1e-14)
    assert sum(errors) == pytest.approx(0.0, abs=1e-14)
    assert sum(b * t for b, t in zip(weights, times, strict=True)) + rodas.BD == pytest.approx(0.5, abs=1e-14)


@pytest.mark.parametrize("implicit", [False, True])
@pytest.mark.parametrize("name", STRETCHES)
def test_integrals_over_a_step_balance_its_states_to_rounding(name: str, implicit: bool) -> None:
    time, y, mode, par = STRETCHES[name]
    par[at.LEDGER_SCALE] = 1000.0
    k = rates(time, y, mode, par)
    h = 2e-3
    step = _implicit(time, h, y, k, mode, par) if implicit else explicit_step(time, h, y, k, mode, par)
    work, gain = [[0.0] * at.N_INTEGRAL for _ in range(at.N_WORK)], [0.0] * at.N_INTEGRAL
    doubt = book(time, h, implicit, step, mode, par, work, gain)
    assert 0.0 < doubt < 1e-4

    def of(place: int) -> float:
        return gain[place - at.N_STATE]

    for side in (0, 1):
        mass, energy = at.M_CAP + 2 * side, at.U_CAP + 2 * side
        inflow, outflow = of(at.Q_IN_CAP + side), of(at.Q_OUT_CAP + side)
        assert step.y[mass] - y[mass] == pytest.approx(inflow - outflow, abs=1e-12 * y[mass])
        balance = of(at.Q_HIN_CAP + side) - of(at.Q_HOUT_CAP + side) - of(at.Q_WORK_CAP + side)
        assert step.y[energy] - y[energy] == pytest.approx(balance + of(at.Q_WALL_CAP + side), abs=1e-12 * y[energy])


@pytest.mark.parametrize("implicit", [False, True])
def test_integrals_of_losses_converge_with_the_order_of_the_pair(implicit: bool) -> None:
    time, y0, mode, par = STRETCHES["walls"]
    par[at.LEDGER_SCALE] = 1000.0
    work, gain = [[0.0] * at.N_INTEGRAL for _ in range(at.N_WORK)], [0.0] * at.N_INTEGRAL

    def total(steps: int, stiff: bool) -> np.ndarray[tuple[int], np.dtype[np.float64]]:
        y, k, h = y0, rates(time, y0, mode, par), LONG / steps
        found = np.zeros(at.N_WATCHED)
        for i in range(steps):
            stepper = _implicit if stiff else explicit_step
            step = stepper(time + i * h, h, y, k, mode, par)
            book(time + i * h, h, stiff, step, mode, par, work, gain)
            found += gain[: at.N_WATCHED]
            y, k = step.y, step.k
        return found

    true = total(400, False)
    scale = np.abs(true).max()
    errors = [float(np.abs(total(count, implicit) - true).max() / scale) for count in (8, 16, 32)]
    order = math.log2(errors[1] / errors[2])
    assert order > (3.7 if implicit else 4.5), errors
