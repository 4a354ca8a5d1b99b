"""The reference model against itself: what it reports has to balance before it may judge anything.

Its state is pressure and temperature, so mass and energy close to the step tolerance only; the ledger's
items are integrals of their own.
"""

from __future__ import annotations

import pytest

from .cases import CASES, Case
from .project_side import project_paths
from .reference_cycle import reference
from .reference_flow import Element, chain_conductance, share_of_choked

CHOSEN = [
    case
    for case in CASES
    if case.name in ("base", "loaded", "lifting, meter-out", "cut off, short cycle", "index 1.2", "cold supply")
]
TOLERANCE = 1e-6
"""Share of what was supplied; the steps are taken at 1e-9. [1]"""


@pytest.mark.parametrize("case", CHOSEN, ids=lambda case: case.name)
def test_mass_energy_entropy_and_ledger_of_the_reference_close(case: Case) -> None:
    found = reference(
        case.actuator,
        case.machine,
        case.site,
        table=project_paths(case.actuator),
        ledger=True,
        rtol=1e-9,
        repeat=1e-8,
    )
    s, items = found.tally.sums, found.tally.ledger()
    scale, temp0 = items["supplied"], case.site.ambient_temperature
    assert s["drawn"] - s["given_back"] == pytest.approx(found.air_drawn, rel=TOLERANCE)
    assert s["vented"] - s["sucked_in"] == pytest.approx(found.air_drawn, rel=TOLERANCE)
    used = items["load"] + items["friction"] + items["stop"]
    first_law = s["enthalpy_supply"] - s["enthalpy_exhaust"] + s["wall_to_air"]
    assert s["boundary_work"] == pytest.approx(used, abs=TOLERANCE * scale)
    assert first_law == pytest.approx(used, abs=TOLERANCE * scale)
    produced = temp0 * (s["entropy_exhaust"] - s["entropy_supply"]) - s["wall_to_air"]
    throttled = s["supply_throttling"] + s["exhaust_throttling"]
    assert produced == pytest.approx(throttled + items["mixing"] + items["heat"], abs=TOLERANCE * scale)
    assert items["residual"] == pytest.approx(0.0, abs=TOLERANCE * scale)


def test_base_case_produces_the_entropy_printed_with_the_ledger() -> None:
    """1860.4014 J both ways: computed for the model's description by an independent model, no publication."""
    base = CASES[0]
    found = reference(base.actuator, base.machine, base.site, ledger=True, rtol=1e-10, repeat=1e-9)
    s = found.tally.sums
    temp0 = base.site.ambient_temperature
    produced = temp0 * (s["entropy_exhaust"] - s["entropy_supply"]) - s["wall_to_air"]
    assert produced == pytest.approx(1860.4014, abs=1e-4)


def test_two_elements_in_series_choke_at_the_printed_conductance() -> None:
    """C 1, b 0.5 then C 2, b 0.2 chokes at 1.000, reversed at 0.912: from the model's description."""
    first, second = Element(1.0, 0.5), Element(2.0, 0.2)
    assert chain_conductance((first, second), 1e-6) == pytest.approx(1.000, abs=5e-4)
    assert chain_conductance((second, first), 1e-6) == pytest.approx(0.912, abs=5e-4)


def test_flow_falls_linearly_to_zero_near_equal_pressures() -> None:
    element = Element(1.0, 0.3)
    edge = share_of_choked(element, 0.999)
    assert share_of_choked(element, 0.9995) == pytest.approx(edge / 2)
    assert share_of_choked(element, 1.0) == 0.0
