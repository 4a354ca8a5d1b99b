"""The extended rod as a column: Euler where it is slender, Johnson where it is stocky."""

from __future__ import annotations

import math
from dataclasses import dataclass

from actuator.errors import InputError, Problem, Refusal

E_STEEL = 210e9
"""Young's modulus of steel; Source ``practice``. [Pa]"""
YIELD_ROD = 355e6
"""Yield strength of a common rod steel; Source ``practice``. [Pa]"""
SAFETY = 4.0
"""Wanted buckling safety where none is asked, 3.5 to 5 being usual; Source ``practice``. [1]"""

FIXED = ("foot", "front flange", "rear flange")
"""Mountings that hold the rear end of the column against turning."""
HINGED = ("rear pin", "front trunnion", "mid trunnion")
"""Mountings that let it turn."""

END_FACTORS = {
    ("fixed", "fixed-guided"): 0.65,
    ("fixed", "hinged-guided"): 0.80,
    ("hinged", "fixed-guided"): 0.80,
    ("hinged", "hinged-guided"): 1.0,
    ("fixed", "free"): 2.1,
}
"""Effective over real length, recommended for design (theory 0.5, 0.7, 0.7, 1, 2); Source ``aisc360``. [1]"""

SHARE_OF_STROKE = {
    "foot": 0.0,
    "front flange": 0.0,
    "front trunnion": 0.0,
    "rear flange": 1.0,
    "rear pin": 1.0,
    "mid trunnion": 0.5,
}
"""Part of the stroke that lies between mounting and rod end when retracted. [1]"""
BORES = {
    "foot": 1.0,
    "front flange": 1.0,
    "front trunnion": 1.0,
    "rear flange": 3.0,
    "rear pin": 3.0,
    "mid trunnion": 1.5,
}
"""What else lies between them, in bores; Source ``practice``. [1]"""


@dataclass(frozen=True, slots=True, kw_only=True)
class Column:
    """Buckling of one rod."""

    load: float
    """Buckling load. [N]"""
    slenderness: float
    """Effective length over radius of gyration d/4. [1]"""
    transition: float
    """Slenderness from which Euler's formula holds. [1]"""
    rule: str
    """``"Euler"`` or ``"Johnson"``."""


def _known(mounting: str) -> None:
    if mounting not in SHARE_OF_STROKE:
        raise InputError(Problem(path="mounting", given=mounting, allowed="one of " + ", ".join(SHARE_OF_STROKE)))


def default_closed_length(mounting: str, bore: float, stroke: float) -> float:
    """Length from mounting to rod end, retracted, where the document gives none.

    Parameters
    ----------
    mounting : str
        How the barrel is fixed.
    bore, stroke : float
        Inside diameter of the barrel, way of the piston. [m]

    Returns
    -------
    float
        One bore at the front, stroke + 3 bores at the rear, stroke/2 + 1.5 bores at a mid trunnion; common
        practice, no source. [m]

    Raises
    ------
    InputError
        For an unknown mounting.
    """
    _known(mounting)
    return SHARE_OF_STROKE[mounting] * stroke + BORES[mounting] * bore


def end_factor(mounting: str, rod_end: str) -> float | Refusal:
    """Effective length over real length of the column.

    Parameters
    ----------
    mounting : str
        How the barrel is fixed.
    rod_end : str
        ``"fixed-guided"``, ``"hinged-guided"`` or ``"free"``.

    Returns
    -------
    float or Refusal
        Recommended K; refused for a free rod end on a hinged mounting, which is a mechanism. [1]

    Raises
    ------
    InputError
        For an unknown mounting or rod end.

    References
    ----------
    .. [1] AISC 360-16, Commentary, table C-A-7.1 (from memory).
    """
    _known(mounting)
    rear = "fixed" if mounting in FIXED else "hinged"
    if (rear, rod_end) in END_FACTORS:
        return END_FACTORS[rear, rod_end]
    if rod_end == "free":
        return Refusal("a free rod end on a hinged mounting is a mechanism: guide the rod end", "rod_end")
    raise InputError(Problem(path="rod_end", given=rod_end, allowed="one of fixed-guided, hinged-guided, free"))


def euler_load(modulus: float, inertia: float, effective_length: float) -> float:
    """Load at which a slender column buckles.

    Parameters
    ----------
    modulus : float
        Young's modulus. [Pa]
    inertia : float
        Smallest second moment of area. [m**4]
    effective_length : float
        Length between the points of inflection. [m]

    Returns
    -------
    float
        π²·E·I/(KL)². [N]

    References
    ----------
    .. [1] Gere, Mechanics of Materials, example 11.1, p. 763 (excerpt).
    """
    return math.pi**2 * modulus * inertia / effective_length**2


def transition_slenderness(modulus: float = E_STEEL, yield_stress: float = YIELD_ROD) -> float:
    """Slenderness at which Euler's stress is half the yield strength.

    Parameters
    ----------
    modulus, yield_stress : float
        Young's modulus and yield strength. [Pa]

    Returns
    -------
    float
        π·√(2E/σ_y). [1]
    """
    return math.pi * math.sqrt(2.0 * modulus / yield_stress)


def column(rod: float, effective_length: float, *, modulus: float = E_STEEL, yield_stress: float = YIELD_ROD) -> Column:
    r"""Buckling load of a round rod.

    Parameters
    ----------
    rod : float
        Diameter. [m]
    effective_length : float
        End factor times the extended length. [m]
    modulus, yield_stress : float
        Young's modulus and yield strength. [Pa]

    Returns
    -------
    Column
        Load, slenderness and the rule that gave it.

    Notes
    -----
    With λ = KL/(d/4), from λ_t = π√(2E/σ_y) on Euler's load, below it Johnson's, which meets it with equal
    slope:

    .. math:: F = A \sigma_y [1 - \sigma_y \lambda^2/(4 \pi^2 E)]

    Where the rear end is hinged the barrel, far stiffer, is counted as if it were rod.

    References
    ----------
    .. [1] Shigley, Mischke, Budynas, Mechanical Engineering Design, 7th ed. (2004), sections 4-12 to 4-13
       (from memory).
    """
    area = math.pi / 4.0 * rod * rod
    slenderness = effective_length / (0.25 * rod)
    transition = transition_slenderness(modulus, yield_stress)
    if slenderness >= transition:
        load = euler_load(modulus, math.pi / 64.0 * rod**4, effective_length)
        return Column(load=load, slenderness=slenderness, transition=transition, rule="Euler")
    load = area * yield_stress * (1.0 - yield_stress * slenderness**2 / (4.0 * math.pi**2 * modulus))
    return Column(load=load, slenderness=slenderness, transition=transition, rule="Johnson")


def longest_column(rod: float, load: float, *, modulus: float = E_STEEL, yield_stress: float = YIELD_ROD) -> float:
    """Longest effective length at which a rod's buckling load is still ``load``; inverse of :func:`column`.

    Parameters
    ----------
    rod : float
        Diameter. [m]
    load : float
        Buckling load that is needed, above zero. [N]
    modulus, yield_stress : float
        Young's modulus and yield strength. [Pa]

    Returns
    -------
    float
        Effective length; zero where the rod yields before. [m]
    """
    area = math.pi / 4.0 * rod * rod
    stress = load / area
    if stress >= yield_stress:
        return 0.0
    if stress <= 0.5 * yield_stress:
        slenderness = math.pi * math.sqrt(modulus / stress)
    else:
        slenderness = 2.0 * math.pi * math.sqrt((1.0 - stress / yield_stress) * modulus / yield_stress)
    return slenderness * 0.25 * rod


def longest_stroke(
    *,
    rod: float,
    mounting: str,
    rod_end: str,
    stroke: float,
    closed_length: float,
    push: float,
    safety: float = SAFETY,
) -> float | Refusal:
    """Longest stroke at which the rod keeps a buckling safety.

    Parameters
    ----------
    rod : float
        Diameter. [m]
    mounting, rod_end : str
        How barrel and rod end are held.
    stroke, closed_length : float
        Present stroke, and length from mounting to rod end when retracted; behind the mounting the closed
        length grows with the stroke. [m]
    push : float
        Largest push on the rod. [N]
    safety : float
        Wanted buckling load over push. [1]

    Returns
    -------
    float or Refusal
        Stroke; refused for a mechanism, without push, and where no stroke keeps the safety. [m]
    """
    factor = end_factor(mounting, rod_end)
    if isinstance(factor, Refusal):
        return factor
    if push <= 0.0:
        return Refusal("nothing pushes on the rod")
    length = longest_column(rod, safety * push) / factor
    share = SHARE_OF_STROKE[mounting]
    longest = (length - (closed_length - share * stroke)) / (1.0 + share)
    if longest <= 0.0:
        return Refusal(f"no stroke keeps a buckling safety of {safety:g} with this rod", "rod")
    return longest
