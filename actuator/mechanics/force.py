"""Forces without motion: what the cylinder gives, what the load asks, and the bore that this needs."""

from __future__ import annotations

import math
from collections.abc import Sequence

from actuator.air.gas import GRAVITY
from actuator.errors import Refusal


def area_cap(bore: float) -> float:
    """Piston area on the cap side.

    Parameters
    ----------
    bore : float
        Inside diameter of the barrel. [m]

    Returns
    -------
    float
        π/4·D². [m²]
    """
    return math.pi / 4.0 * bore * bore


def area_rod(bore: float, rod: float) -> float:
    """Annular piston area on the rod side.

    Parameters
    ----------
    bore, rod : float
        Inside diameter of the barrel, diameter of the rod. [m]

    Returns
    -------
    float
        π/4·(D² − d²). [m²]
    """
    return math.pi / 4.0 * (bore - rod) * (bore + rod)


def theoretical_extend(p_supply: float, p_ambient: float, bore: float) -> float:
    """Force that the supply gives extending, the other side vented, no friction.

    Parameters
    ----------
    p_supply, p_ambient : float
        Supply and ambient pressure, absolute. [Pa]
    bore : float
        Inside diameter of the barrel. [m]

    Returns
    -------
    float
        (p_s − p₀)·A. [N]

    References
    ----------
    .. [1] Pressure times area; atmosphere acts on both ends of rod and piston.
    """
    return (p_supply - p_ambient) * area_cap(bore)


def theoretical_retract(p_supply: float, p_ambient: float, bore: float, rod: float) -> float:
    """Force that the supply gives retracting, the other side vented, no friction.

    Parameters
    ----------
    p_supply, p_ambient : float
        Supply of this stroke and ambient pressure, absolute. [Pa]
    bore, rod : float
        Inside diameter of the barrel, diameter of the rod. [m]

    Returns
    -------
    float
        (p_s − p₀)·(A − A_rod). [N]
    """
    return (p_supply - p_ambient) * area_rod(bore, rod)


def available_force(theoretical: float, friction: float) -> float:
    """Force left for the load at standstill.

    Parameters
    ----------
    theoretical : float
        Theoretical force in this direction. [N]
    friction : float
        Friction of the cylinder: running, or breakaway where it has to start. [N]

    Returns
    -------
    float
        Theoretical force less friction, never negative. [N]
    """
    return max(theoretical - friction, 0.0)


def largest_process_force(process: Sequence[tuple[float, float, float]]) -> float:
    """Largest sum of process forces that act at one position.

    Parameters
    ----------
    process : sequence of (start, end, force)
        Positions from the retracted end and the force between them. [m], [m], [N]

    Returns
    -------
    float
        Zero without process forces. Ranges that only touch do not add. [N]
    """
    return max(
        (sum(force for start, end, force in process if start <= at < end) for at, _, _ in process),
        default=0.0,
    )


def opposing_extend(
    *,
    mass: float,
    inclination: float = 0.0,
    guide_friction: float = 0.0,
    extend_force: float = 0.0,
    constant_force: float = 0.0,
    process: Sequence[tuple[float, float, float]] = (),
) -> float:
    """Load that opposes extending, at its worst position.

    Parameters
    ----------
    mass : float
        Everything that moves. [kg]
    inclination : float
        Above the horizontal, positive where extending lifts. [rad]
    guide_friction : float
        Coefficient of the external guide. [1]
    extend_force : float
        Opposes extending over the whole stroke. [N]
    constant_force : float
        Always acting, positive pushes the rod out. [N]
    process : sequence of (start, end, force)
        Process forces. [m], [m], [N]

    Returns
    -------
    float
        Gravity, guide friction, opposing and process forces, without inertia and friction of the cylinder;
        zero where the rest of them help. [N]
    """
    gravity = mass * GRAVITY * math.sin(inclination)
    guide = guide_friction * mass * GRAVITY * math.cos(inclination)
    return max(gravity + guide + extend_force - constant_force + largest_process_force(process), 0.0)


def opposing_retract(
    *,
    mass: float,
    inclination: float = 0.0,
    guide_friction: float = 0.0,
    retract_force: float = 0.0,
    constant_force: float = 0.0,
) -> float:
    """Load that opposes retracting.

    Parameters
    ----------
    mass : float
        Everything that moves. [kg]
    inclination : float
        Above the horizontal, positive where extending lifts. [rad]
    guide_friction : float
        Coefficient of the external guide. [1]
    retract_force : float
        Opposes retracting over the whole stroke. [N]
    constant_force : float
        Always acting, positive pushes the rod out. [N]

    Returns
    -------
    float
        Gravity, guide friction and opposing forces, without inertia and friction of the cylinder; zero where
        the rest of them help. [N]
    """
    gravity = mass * GRAVITY * math.sin(inclination)
    guide = guide_friction * mass * GRAVITY * math.cos(inclination)
    return max(guide - gravity + retract_force + constant_force, 0.0)


def load_ratio(load: float, theoretical: float) -> float | Refusal:
    """Share of the theoretical force that the load takes.

    Parameters
    ----------
    load : float
        Opposing load in this direction. [N]
    theoretical : float
        Theoretical force in this direction. [N]

    Returns
    -------
    float or Refusal
        Common practice, no source: up to 0.5 for fast strokes, 0.7 for slow ones, 0.85 to clamp. [1]
    """
    if theoretical <= 0.0:
        return Refusal("the supply pressure is not above ambient: no force", "supply_pressure")
    return load / theoretical


def force_reserve(theoretical: float, friction: float, load: float) -> float | Refusal:
    """Force left over, as a share of the load.

    Parameters
    ----------
    theoretical : float
        Theoretical force in this direction. [N]
    friction : float
        Running friction of the cylinder. [N]
    load : float
        Opposing load in this direction at its worst position. [N]

    Returns
    -------
    float or Refusal
        (theoretical − friction − load)/load; negative where the load is not carried, refused without. [1]
    """
    if load <= 0.0:
        return Refusal("no load")
    return (theoretical - friction - load) / load


def required_bore(
    *,
    p_extend: float,
    p_retract: float,
    p_ambient: float,
    load_extend: float,
    load_retract: float,
    reserve: float = 0.0,
    friction_share: float = 0.05,
    rod_ratio: float = 0.4,
) -> float | Refusal:
    r"""Smallest bore whose force carries load, friction and reserve both ways.

    Parameters
    ----------
    p_extend, p_retract, p_ambient : float
        Supply pressures of the two strokes and ambient pressure, absolute. [Pa]
    load_extend, load_retract : float
        Opposing loads. [N]
    reserve : float
        Wanted force reserve, share of the load. [1]
    friction_share : float
        Running friction over (p_s − p₀)·A of the extending stroke; 5 % is common practice, no source. [1]
    rod_ratio : float
        Rod over bore, kept in proportion. [1]

    Returns
    -------
    float or Refusal
        Bore; refused without load, and where no bore can do it. [m]

    Notes
    -----
    With Δp = p − p₀, friction share f, rod ratio k and reserve ρ, the larger of

    .. math:: A_e = \frac{F_e (1 + \rho)}{\Delta p_e (1 - f)}, \quad
              A_r = \frac{F_r (1 + \rho)}{\Delta p_r (1 - k^2) - f \Delta p_e}
    """
    if load_extend <= 0.0 and load_retract <= 0.0:
        return Refusal("no load")
    push = (p_extend - p_ambient) * (1.0 - friction_share)
    pull = (p_retract - p_ambient) * (1.0 - rod_ratio**2) - friction_share * (p_extend - p_ambient)
    area = 0.0
    for load, pressure, way in ((load_extend, push, "extending"), (load_retract, pull, "retracting")):
        if load <= 0.0:
            continue
        if pressure <= 0.0:
            return Refusal(f"{way}, the supply pressure leaves no force over friction", "supply_pressure")
        area = max(area, load * (1.0 + reserve) / pressure)
    return math.sqrt(4.0 * area / math.pi)
