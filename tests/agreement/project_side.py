"""The one place where the agreement tests call the project's own kernel."""

from __future__ import annotations

from typing import Literal

from actuator.errors import Refusal
from actuator.parts import Actuator
from actuator.stroke.result import HalfStroke, StrokeResult
from actuator.stroke.simulate import flow_paths, simulate

from .cases import Case
from .reference_flow import Element, PathTable


def project_paths(actuator: Actuator) -> PathTable:
    """The project's fit of every path, as one element each."""
    return {
        path.name: Element(path.conductance, path.critical_ratio, path.subsonic_index) for path in flow_paths(actuator)
    }


def project_result(
    case: Case,
    *,
    ledger: bool = True,
    rtol: float | None = None,
    engine: Literal["auto", "compiled", "interpreted"] = "compiled",
) -> StrokeResult:
    """The project's periodic cycle; fails where it is refused."""
    found = simulate(case.actuator, case.machine, case.site, ledger=ledger, rtol=rtol, engine=engine)
    assert not isinstance(found, Refusal), f"{case.name}: {found}"
    return found


def number(figure: float | Refusal) -> float:
    """The figure; fails where it is refused."""
    assert not isinstance(figure, Refusal), str(figure)
    return figure


def halves(result: StrokeResult) -> dict[str, HalfStroke]:
    """Both ways, by name."""
    return {"extend": result.extend, "retract": result.retract}
