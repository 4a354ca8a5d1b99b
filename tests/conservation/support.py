"""What the conservation tests share: settings, and a result taken apart."""

from __future__ import annotations

from dataclasses import dataclass

from hypothesis import HealthCheck, settings

from actuator.errors import Refusal
from actuator.stroke.result import Balances, Ledger, StrokeResult
from tests.agreement.cases import Case
from tests.agreement.project_side import project_result

R_AIR = 287.05
CP = 3.5 * R_AIR

MANY = settings(max_examples=40, deadline=None, derandomize=True, suppress_health_check=[HealthCheck.too_slow])
"""Random cylinders, the same ones on every run."""


@dataclass(frozen=True)
class Solved:
    """A result with its ledger and balances at hand."""

    result: StrokeResult
    ledger: Ledger
    balances: Balances

    @property
    def scale(self) -> float:
        """Energy that errors are judged by: what went through, or is kept in the chambers. [J]"""
        through = sum(self.balances.enthalpy_in) + sum(self.balances.enthalpy_out)
        return through + self.stored

    @property
    def stored(self) -> float:
        """p·V of both chambers at the start. [J]"""
        r = self.result
        return float(r.p_cap[0] * r.volume_cap[0] + r.p_rod[0] * r.volume_rod[0])


def solved(case: Case, *, rtol: float | None = None) -> Solved:
    """Simulate a case with its ledger; fails where any of it is refused."""
    result = project_result(case, rtol=rtol)
    ledger, balances = result.ledger, result.balances
    assert not isinstance(ledger, Refusal)
    assert not isinstance(balances, Refusal)
    return Solved(result, ledger, balances)
