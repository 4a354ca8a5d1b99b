"""Valve and throttle in series: the project's fit of a path against the exact chain.

The exact chain carries equal mass flow through both elements, each after ISO 6358-1 as it stands; the
intermediate pressure is found by root finding. The fit has to keep the error that it states itself.
"""

from __future__ import annotations

import numpy as np
import pytest

from actuator.stroke.simulate import flow_paths

from .cases import CASES, Case
from .project_side import halves, number, project_paths, project_result
from .reference_cycle import reference
from .reference_flow import chain_conductance, chains, share_of_choked

THROTTLED = [case for case in CASES if case.actuator.throttle.kind != "none"]
RATIOS = [*np.linspace(0.01, 0.99, 197), 0.995, 0.999]
GRID_MARGIN = 1.1
"""The largest error lies between the ratios at which the fit was judged. [1]"""


@pytest.mark.parametrize("case", THROTTLED, ids=lambda case: case.name)
def test_fit_keeps_its_stated_error_on_every_path(case: Case) -> None:
    exact, fits = chains(case.actuator), project_paths(case.actuator)
    stated = {path.name: path.error for path in flow_paths(case.actuator)}
    assert set(stated) == set(exact)
    for name, chain in exact.items():
        choked = chain_conductance(chain, 1e-6)
        assert fits[name].c == pytest.approx(choked, rel=1e-9), name
        seen = max(
            abs(fits[name].c * share_of_choked(fits[name], r) - chain_conductance(chain, r)) / choked for r in RATIOS
        )
        assert seen <= GRID_MARGIN * stated[name], name
        assert 0.0 < stated[name] < 0.01, name


def test_a_chain_is_not_symmetric() -> None:
    """Filling and emptying the same port through the same two elements: two fits, not one."""
    case = next(case for case in CASES if case.name == "small meter-out")
    fits = project_paths(case.actuator)
    assert fits["cap, filling"].c > 1.5 * fits["cap, back to supply"].c


def test_without_a_throttle_the_path_is_the_valve() -> None:
    case = CASES[0]
    valve = case.actuator.valve
    for path in flow_paths(case.actuator):
        assert path.error == 0.0
        assert path.conductance in (valve.supply_c, valve.exhaust_c)
        assert (path.critical_ratio, path.subsonic_index) == (valve.supply_b, valve.m)


@pytest.mark.parametrize("case", THROTTLED, ids=lambda case: case.name)
def test_stroke_with_fitted_paths_is_that_of_the_exact_chain_within_the_error(case: Case) -> None:
    exact = reference(case.actuator, case.machine, case.site, exact=True, rtol=1e-6, repeat=1e-5)
    got = project_result(case)
    stated = max(path.error for path in flow_paths(case.actuator))
    for direction, half in halves(got).items():
        wanted = exact.extend if direction == "extend" else exact.retract
        assert half.completed == wanted.completed
        assert number(half.stroke_time) == pytest.approx(wanted.stroke, rel=stated, abs=2e-4)
        assert number(half.end_speed) == pytest.approx(wanted.end_speed, rel=3.0 * stated, abs=2e-3)
