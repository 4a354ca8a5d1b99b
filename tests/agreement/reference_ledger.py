"""The exergy ledger of the reference model, each item an integral of its own."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from .reference_flow import GAMMA, R_AIR

if TYPE_CHECKING:
    from .reference_equations import Model

CP = GAMMA * R_AIR / (GAMMA - 1.0)

COLUMNS = {
    "drawn": 1e-5,
    "given_back": 1e-5,
    "vented": 1e-5,
    "sucked_in": 1e-5,
    "supplied": 1.0,
    "returned": 1.0,
    "load": 1.0,
    "friction": 1.0,
    "supply_throttling": 1.0,
    "supply_mixing": 1.0,
    "exhaust_path": 1.0,
    "heat": 1.0,
    "exhaust_throttling": 1.0,
    "exhaust_warmth": 1.0,
    "exhaust_mixing": 1.0,
    "wall_to_air": 1.0,
    "boundary_work": 1.0,
    "enthalpy_supply": 1.0,
    "enthalpy_exhaust": 1.0,
    "entropy_supply": 1e-2,
    "entropy_exhaust": 1e-2,
}
"""Integrals carried beside the state and the size that their absolute tolerance goes by."""


@dataclass
class Tally:
    """Sums of the integrals over a cycle. [J], [kg], [J/K]"""

    sums: dict[str, float] = field(default_factory=lambda: dict.fromkeys([*COLUMNS, "stop", "filling"], 0.0))

    def add(self, name: str, amount: float) -> None:
        """Book an amount that comes at once."""
        self.sums[name] += amount

    def take(self, ends: list[float], *, rest: bool) -> None:
        """Book the integrals of one segment."""
        for name, amount in zip(COLUMNS, ends, strict=False):
            self.sums[name] += amount
            if rest and name == "supply_throttling":
                self.sums["filling"] += amount

    def ledger(self) -> dict[str, float]:
        """The items as the ledger names them. [J]"""
        s = self.sums
        side = s["exhaust_throttling"] + s["exhaust_warmth"] + s["exhaust_mixing"]
        items = {
            "supplied": s["supplied"],
            "load": s["load"],
            "friction": s["friction"],
            "stop": s["stop"],
            "supply_path": s["supply_throttling"] + s["supply_mixing"],
            "exhaust_path": s["exhaust_path"],
            "heat": s["heat"],
            "exhaust": side - s["exhaust_path"],
        }
        items["residual"] = items["supplied"] - sum(v for k, v in items.items() if k != "supplied")
        items["filling"] = s["filling"]
        items["returned"] = s["returned"]
        items["mixing"] = s["supply_mixing"] + s["exhaust_mixing"]
        return items


Gas = tuple[float, float, float, float]
"""Pressure [Pa], temperature [K], flow in [kg/s], heat from the wall [W] of a chamber."""
LedgerTerms = Callable[[float, float, Gas, Gas], list[float]]
"""(speed, friction force of the cylinder, cap, rod side) -> rates of :data:`COLUMNS`."""


def ledger_rates(model: Model, direction: str, way: int, against: float) -> LedgerTerms:
    """Rates of :data:`COLUMNS` in one segment.

    ``against`` is guide friction and opposing force; the guide counts as friction, the rest as load.
    """
    p0, temp0, temp_s = model.p0, model.temp0, model.temp_s
    p_s, p_line = model.p_supply[direction], model.p_supply["extend"]
    extending = direction == "extend"
    a1, a2 = model.area1, model.area2
    guide = model.guide if way else 0.0
    load = against - guide
    log = math.log

    def psi(p: float, t: float) -> float:
        return CP * (t - temp0) - temp0 * (CP * log(t / temp0) - R_AIR * log(p / p0))

    def entropy(p: float, t: float) -> float:
        return CP * log(t / temp0) - R_AIR * log(p / p0)

    def mixing(q: float, t_in: float, t: float) -> float:
        return temp0 * q * CP * (t_in / t - 1.0 - log(t_in / t))

    psi_s, s_s = psi(p_line, temp_s), entropy(p_line, temp_s)

    def rates(v: float, rub: float, cap: Gas, rod: Gas) -> list[float]:
        (p, t, q, _), (pe, te, qe, _) = (cap, rod) if extending else (rod, cap)
        vol_rate_e = -a2 * v if extending else a1 * v
        if q >= 0.0:
            supplied, h_s, ent_s = q * psi_s, q * CP * temp_s, q * s_s
            throttling, mixed = R_AIR * temp0 * q * log(p_line / p), mixing(q, temp_s, t)
        else:
            supplied, h_s, ent_s = q * psi(p_s, t), q * CP * t, q * entropy(p_s, t)
            throttling, mixed = R_AIR * temp0 * q * log(p_s / p), 0.0
        if qe <= 0.0:
            throttling_e, mixed_e = -R_AIR * temp0 * qe * log(pe / p0), 0.0
            warmth, h_e, ent_e = -qe * psi(p0, te), -qe * CP * te, -qe * entropy(p0, te)
        else:
            throttling_e, mixed_e = R_AIR * temp0 * qe * log(p0 / pe), mixing(qe, temp0, te)
            warmth, h_e, ent_e = 0.0, -qe * CP * temp0, 0.0
        heat = -cap[3] * (1.0 - temp0 / cap[1]) - rod[3] * (1.0 - temp0 / rod[1])
        speed = v * way
        return [
            max(q, 0.0),
            max(-q, 0.0),
            max(-qe, 0.0),
            max(qe, 0.0),
            supplied,
            -supplied if q < 0.0 else 0.0,
            load * speed,
            (rub + guide) * speed,
            throttling,
            mixed,
            -(pe - p0) * vol_rate_e,
            heat,
            throttling_e,
            warmth,
            mixed_e,
            cap[3] + rod[3],
            (cap[0] * a1 - rod[0] * a2) * v,
            h_s,
            h_e,
            ent_s,
            ent_e,
        ]

    return rates
