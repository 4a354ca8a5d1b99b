"""The exergy ledger: it closes, no loss is negative, and entropy tells the same (T5, T6)."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import assume, given

from tests.agreement.cases import CASES, REFERENCE_CASES, Case
from tests.conservation.support import CP, MANY, R_AIR, Solved, solved
from tests.strategies import cylinders

CLOSES = 1e-6
"""Residual, as a share of what was supplied. [1]"""

COLUMNS = (
    "supplied", "load", "friction", "stop", "supply_path", "exhaust_path", "heat", "exhaust", "filling", "mixing",
)  # fmt: skip
ROWS: dict[str, tuple[float, ...]] = {
    "base": (1965.138, 0, 72.323, 23.970, 223.200, 555.285, 12.393, 1077.967, 36.253, 3.873),
    "short 1.2 s": (1853.216, 0, 72.917, 24.725, 229.095, 545.721, 3.941, 976.815, 37.008, 2.691),
    "loaded": (1968.765, 200.000, 85.854, 22.155, 192.009, 376.487, 19.330, 1072.929, 31.323, 3.335),
    "big dead vol.": (2320.127, 0, 72.974, 24.631, 345.801, 553.766, 37.254, 1285.701, 143.538, 20.007),
    "exhaust C x20": (1924.58, 0, 113.43, 246.49, 480.32, 3.84, 77.11, 1003.40, 198.38, 13.52),
}
"""Computed for the description of the model by an independent model, no publication. [J]"""


@pytest.mark.parametrize("case", REFERENCE_CASES, ids=lambda case: case.name)
def test_reference_rows_of_the_ledger(case: Case) -> None:
    """The digits printed there; the last one may differ by what the row's own rounding leaves."""
    items = solved(case).ledger
    digits = 5e-3 if case.name == "exhaust C x20" else 5e-4
    for name, printed in zip(COLUMNS, ROWS[case.name], strict=True):
        assert getattr(items, name) == pytest.approx(printed, abs=digits + 5e-7 * items.supplied), name


def test_base_case_produces_the_printed_entropy() -> None:
    """T0·S = 1860.4014 J: computed for the description of the model, no publication."""
    found = solved(REFERENCE_CASES[0])
    assert 293.15 * found.balances.entropy_produced == pytest.approx(1860.4014, rel=1e-6)


@MANY
@given(cylinders())
def test_items_add_up_to_what_is_supplied_less_what_is_kept(case: Case) -> None:
    found = solved(case)
    items = found.ledger
    booked = (
        items.load + items.friction + items.stop + items.supply_path
        + items.exhaust_path + items.heat + items.exhaust
    )  # fmt: skip
    # where next to nothing is supplied, the steps' tolerance on what the chambers hold is what remains
    scale = abs(items.supplied) + abs(items.exhaust) + abs(items.load) + 1e-2 * found.stored
    assert items.residual == pytest.approx(items.supplied - booked, abs=1e-12 * scale)
    assert items.residual == pytest.approx(items.stored_change, abs=CLOSES * scale)


@pytest.mark.parametrize("case", CASES, ids=lambda case: case.name)
def test_every_case_closes_at_the_tolerance_it_is_shown_with(case: Case) -> None:
    items = solved(case).ledger
    assert abs(items.residual - items.stored_change) < CLOSES * items.supplied


@MANY
@given(cylinders(polytropic=False))
def test_no_loss_is_negative(case: Case) -> None:
    found = solved(case)
    items = found.ledger
    dust = -1e-8 * found.scale
    for loss in ("friction", "stop", "supply_path", "heat", "filling", "mixing"):
        assert getattr(items, loss) >= dust, loss
    # the constant force gives back over a closed cycle what it took, and only over a closed one
    drift = abs(case.actuator.load.constant_force) * abs(found.result.position[-1] - found.result.position[0])
    assert items.load >= dust - drift
    assert found.balances.exhaust_side >= dust
    assert found.balances.entropy_produced >= dust / case.site.ambient_temperature
    assert items.filling + items.mixing <= items.supply_path + found.balances.exhaust_side - dust


@MANY
@given(cylinders())
def test_exhaust_side_is_split_in_two_without_rest(case: Case) -> None:
    """Exhaust = X − exhaust_path, each an integral of its own."""
    found = solved(case)
    items, scale = found.ledger, found.balances.exhaust_side + abs(found.ledger.exhaust_path) + 1e-6
    assert items.exhaust + items.exhaust_path == pytest.approx(found.balances.exhaust_side, abs=1e-9 * scale)


@MANY
@given(cylinders())
def test_supplied_is_drawn_mass_times_its_exergy_where_nothing_flows_back(case: Case) -> None:
    found = solved(case)
    assume(found.balances.given_back == 0.0)
    p_s, t_s = case.machine.supply_pressure, case.machine.supply_temperature
    p0, t0 = case.site.ambient_pressure, case.site.ambient_temperature
    psi = CP * (t_s - t0) - t0 * (CP * math.log(t_s / t0) - R_AIR * math.log(p_s / p0))
    assert found.ledger.supplied == pytest.approx(found.balances.drawn * psi, rel=1e-7, abs=1e-9)
    assert found.ledger.returned == 0.0


def _warmth(found: Solved, case: Case) -> float:
    """Exergy of the temperature of what is vented, from the histories. [J]"""
    r, t0 = found.result, case.site.ambient_temperature
    first = (case.actuator.retract_at + case.actuator.valve.delay) % case.machine.cycle_time
    second = (case.actuator.extend_at + case.actuator.valve.delay) % case.machine.cycle_time
    cap_vents = ((r.time - first) % case.machine.cycle_time) < ((second - first) % case.machine.cycle_time)
    temp = np.where(cap_vents, r.temp_cap, r.temp_rod)
    rate = np.maximum(r.flow_exhaust, 0.0) * CP * (temp - t0 - t0 * np.log(temp / t0))
    return float(np.trapezoid(rate, r.time))


@pytest.mark.parametrize("case", CASES, ids=lambda case: case.name)
def test_entropy_produced_is_what_throttling_mixing_and_walls_lose(case: Case) -> None:
    """Gouy–Stodola; the vented air's warmth is lost outside the boundary and comes from the histories."""
    found = solved(case)
    items, b = found.ledger, found.balances
    inside = items.supply_path + b.exhaust_side + items.heat - _warmth(found, case)
    lost = case.site.ambient_temperature * b.entropy_produced
    assert lost == pytest.approx(inside, abs=3e-4 * items.supplied)
