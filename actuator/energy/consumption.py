"""Air of a cycle by hand, and why a simulation draws something else."""

from __future__ import annotations

from dataclasses import dataclass

from actuator.air.gas import P_ANR, R_AIR
from actuator.air.states import anr_volume


@dataclass(frozen=True, slots=True, kw_only=True)
class ChamberTurn:
    """One chamber at the two instants at which the valve gives and takes its supply."""

    p_supply: float
    """Supply pressure of the stroke that fills it, absolute. [Pa]"""
    swept: float
    """Swept volume, area times stroke. [m³]"""
    dead: float
    """Dead volume. [m³]"""
    p_full: float
    """Pressure when the valve takes the supply away, absolute. [Pa]"""
    temp_full: float
    """Temperature at that instant. [K]"""
    volume_full: float
    """Volume at that instant, dead volume included. [m³]"""
    p_empty: float
    """Pressure when the valve gives the supply, absolute. [Pa]"""
    temp_empty: float
    """Temperature at that instant. [K]"""
    volume_empty: float
    """Volume at that instant, dead volume included. [m³]"""


@dataclass(frozen=True, slots=True, kw_only=True)
class AirDifference:
    """What lies between the textbook figure and the air that is really drawn."""

    causes: tuple[tuple[str, float], ...]
    """Cause and its share in (drawn − textbook), signed; they add up exactly. [kg]"""
    text: str
    """The same in words with numbers, litres ANR."""


def textbook_air(*, p_extend: float, p_retract: float, temp_supply: float, swept_cap: float, swept_rod: float) -> float:
    """Air of a cycle by the textbook: swept volumes at supply pressure and temperature.

    Parameters
    ----------
    p_extend, p_retract : float
        Supply pressure of the two strokes, absolute. [Pa]
    temp_supply : float
        [K]
    swept_cap, swept_rod : float
        Swept volumes. [m³]

    Returns
    -------
    float
        Dry air of a cycle, no dead volume. [kg]

    References
    ----------
    .. [1] Esposito, Fluid Power with Applications, example 13-12, p. 511 (excerpt), which counts one chamber
       only.
    """
    return (p_extend * swept_cap + p_retract * swept_rod) / (R_AIR * temp_supply)


def settled_air(
    *,
    p_extend: float,
    p_retract: float,
    p_ambient: float,
    temp_supply: float,
    swept_cap: float,
    swept_rod: float,
    dead_cap: float,
    dead_rod: float,
) -> float:
    """Air of a cycle whose chambers fill and empty fully: dead volumes refilled from ambient pressure.

    Parameters
    ----------
    p_extend, p_retract, p_ambient : float
        Supply pressure of the two strokes and ambient pressure, absolute. [Pa]
    temp_supply : float
        [K]
    swept_cap, swept_rod, dead_cap, dead_rod : float
        Swept and dead volumes. [m³]

    Returns
    -------
    float
        Dry air of a cycle. [kg]
    """
    dead = (p_extend - p_ambient) * dead_cap + (p_retract - p_ambient) * dead_rod
    swept = textbook_air(
        p_extend=p_extend,
        p_retract=p_retract,
        temp_supply=temp_supply,
        swept_cap=swept_cap,
        swept_rod=swept_rod,
    )
    return swept + dead / (R_AIR * temp_supply)


def hand_formula(mass: float, temp_supply: float) -> float:
    """What V·p/100 kPa gives for a textbook mass: no moisture, no temperature.

    Parameters
    ----------
    mass : float
        Dry air by :func:`textbook_air`. [kg]
    temp_supply : float
        Supply temperature that the mass was reckoned with. [K]

    Returns
    -------
    float
        Volume; 1.5 % below the ANR volume at 20 degC. [m³]
    """
    return mass * R_AIR * temp_supply / P_ANR


def _causes(turn: ChamberTurn, p_ambient: float, temp_supply: float) -> dict[str, float]:
    """Steps from the settled figure of one chamber to the mass that it really took. [kg]"""
    unit = R_AIR * temp_supply
    full = turn.swept + turn.dead
    return {
        "stroke not completed": (
            turn.p_supply * (turn.volume_full - full) - p_ambient * (turn.volume_empty - turn.dead)
        )
        / unit,
        "pressure at the end of filling": (turn.p_full - turn.p_supply) * turn.volume_full / unit,
        "temperature at the end of filling": turn.p_full
        * turn.volume_full
        / R_AIR
        * (1.0 / turn.temp_full - 1.0 / temp_supply),
        "pressure left at the end of exhausting": (p_ambient - turn.p_empty) * turn.volume_empty / unit,
        "temperature at the end of exhausting": turn.p_empty
        * turn.volume_empty
        / R_AIR
        * (1.0 / temp_supply - 1.0 / turn.temp_empty),
    }


def air_difference(
    *,
    drawn: float,
    cap: ChamberTurn,
    rod: ChamberTurn,
    p_ambient: float,
    temp_supply: float,
    cut_off: float = 1.0,
) -> AirDifference:
    """Why the simulated air differs from the textbook and the settled figure.

    Parameters
    ----------
    drawn : float
        Simulated air of a cycle, less what flows back into the supply. [kg]
    cap, rod : ChamberTurn
        Both chambers when the valve switches.
    p_ambient : float
        Absolute. [Pa]
    temp_supply : float
        [K]
    cut_off : float
        Share of the stroke after which the supply is shut, for the wording. [1]

    Returns
    -------
    AirDifference
        A chamber takes (mass when the supply leaves) − (mass when it comes). Going from the settled state to
        the real one, first volume, then pressure, then temperature, each step is one cause; what the chambers
        do not hold is named as such.
    """
    textbook = textbook_air(
        p_extend=cap.p_supply,
        p_retract=rod.p_supply,
        temp_supply=temp_supply,
        swept_cap=cap.swept,
        swept_rod=rod.swept,
    )
    settled = settled_air(
        p_extend=cap.p_supply,
        p_retract=rod.p_supply,
        p_ambient=p_ambient,
        temp_supply=temp_supply,
        swept_cap=cap.swept,
        swept_rod=rod.swept,
        dead_cap=cap.dead,
        dead_rod=rod.dead,
    )
    causes = {"dead volumes": settled - textbook}
    of_cap, of_rod = _causes(cap, p_ambient, temp_supply), _causes(rod, p_ambient, temp_supply)
    causes |= {name: of_cap[name] + of_rod[name] for name in of_cap}
    causes["air not held by a chamber when the valve switches"] = drawn - textbook - sum(causes.values())
    return AirDifference(
        causes=tuple(causes.items()),
        text=_words(drawn, textbook, settled, causes, temp_supply, cut_off),
    )


def _litres(mass: float) -> str:
    return f"{anr_volume(mass) * 1e3:.4g} L ANR"


def _words(
    drawn: float,
    textbook: float,
    settled: float,
    causes: dict[str, float],
    temp_supply: float,
    cut_off: float,
) -> str:
    """Sentences with numbers; causes below 0.1 % of the textbook figure are left out."""
    told = [(name, mass) for name, mass in causes.items() if abs(mass) >= 1e-3 * textbook]
    told.sort(key=lambda item: -abs(item[1]))
    lines = [
        f"Drawn {_litres(drawn)}; textbook {_litres(textbook)} (swept volumes at supply pressure), "
        f"settled {_litres(settled)} (with dead volumes).",
        f"Against the textbook {100.0 * (drawn / textbook - 1.0):+.1f} %"
        + (": " if told else ", no single cause above 0.1 %.")
        + "; ".join(f"{name} {100.0 * mass / textbook:+.1f} %" for name, mass in told)
        + ("." if told else ""),
    ]
    if cut_off < 1.0:
        lines.append(f"The supply is shut at {100.0 * cut_off:.3g} % of the stroke: chambers end below it.")
    hand = hand_formula(textbook, temp_supply)
    lines.append(
        f"The hand formula V·p/100 kPa reads {hand * 1e3:.4g} L "
        f"({100.0 * (hand / anr_volume(textbook) - 1.0):+.1f} %): it leaves the supply temperature and the "
        "vapour in a litre ANR out of account."
    )
    return " ".join(lines)
