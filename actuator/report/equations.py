"""The equations behind the simulated figures, as an engineer would write them down."""

from __future__ import annotations

from actuator.parts import Actuator

MOTION = (
    "M·dv/dt = p₁·A₁ − p₂·A₂ − p₀·(A₁ − A₂) − M·g·sin α + F_const − F_opp(x, v) − F_fric(v),  dx/dt = v\n"
    "F_opp = F_ext + F_process(x) extending, F_ret retracting;  at rest it moves when the drive exceeds "
    "breakaway, guide and opposing force\n"
    "F_fric = sgn(v)·[F_c + (F_b − F_c)·exp(−(v/v_s)²) + μ·M·g·cos α] + k·v"
)
SPRINGS = {
    "spring-return": "F_spring = −(F₀ + k·x),  the rod side is open to the atmosphere: p₂ = p₀",
    "spring-extend": "F_spring = F₀ + k·(S − x),  the cap side is open to the atmosphere: p₁ = p₀",
}
"""Force of the spring of one cylinder, by kind; it adds to the motion's forces."""
AREAS = {
    "through-rod": "A₁ = A₂ = π/4·(D² − d²)",
    "rodless": "A₁ = A₂ = π/4·D²",
}
"""Piston areas where they differ from A₁ = π/4·D², A₂ = π/4·(D² − d²)."""
PARALLEL = "areas, volumes, walls, conductances, friction and spring of one cylinder times their number"
MASS = "dm/dt = Σ q,  each chamber;  p·V = m·R·T,  R = 287.05 J/(kg·K)"
WALL = "m·c_v·dT/dt = Σ q_in·(c_p·T_in − c_v·T) − Σ q_out·R·T − p·dV/dt + h·A_w·(T_w − T),  A_w = π·D·x + 2·A"
POLYTROPIC = "dp/dt = (n/V)·(Σ R·T_in·q_in − Σ R·T·q_out − p·dV/dt) with the polytropic index n"
FLOW = (
    "q = C·p_u·ρ₀·√(T₀/T_u)·φ(p_d/p_u),  φ = 1 up to b, [1 − ((r − b)/(1 − b))²]^m above (ISO 6358);  "
    "ρ₀ = 1.185 kg/m³, T₀ = 293.15 K"
)
PERIODIC = (
    "Both paths open linearly over the opening time, after the valve's delay; the cycle is repeated until "
    "its end state equals its start; start of motion, ends and switching are located as events."
)


def equations(actuator: Actuator) -> tuple[str, ...]:
    """Equations that the simulation of one actuator solves.

    Parameters
    ----------
    actuator : Actuator
        Its choice of wall heat transfer or polytropic index decides the energy equation.

    Returns
    -------
    tuple of str
    """
    energy = WALL if actuator.polytropic_index is None else POLYTROPIC
    own = [SPRINGS.get(actuator.kind, ""), AREAS.get(actuator.kind, ""), PARALLEL if actuator.count > 1 else ""]
    motion = MOTION.replace("F_const −", "F_const + F_spring(x) −") if actuator.spring is not None else MOTION
    return (motion, *(line for line in own if line), MASS, energy, FLOW, PERIODIC)
