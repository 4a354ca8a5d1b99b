"""What can hurt: cautions that go with an actuator's results, each deferring to those who decide."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from actuator.air.gas import GAMMA
from actuator.errors import Refusal
from actuator.holding import words
from actuator.holding.held import Held
from actuator.mechanics.sag import extended_rod
from actuator.parts import Actuator, Machine, Site
from actuator.sources import ISO_4414, OSHA_1910, OWN, PCC_2, PRACTICE, Source
from actuator.stroke.result import HalfStroke, StrokeResult

STICK_SLIP_SPEED = 0.05
"""Mean speed below which stick-slip is likely: common practice, no source. [m/s]"""
LARGE_SAG = 1.0 / 500.0
"""Sag over overhang from which it is told: own choice, no source. [1]"""
LARGE_BEARING_LOAD = 0.2
"""Load on the gland over the theoretical push from which it is told: own choice, no source. [1]"""
BLOW_OFF_GAUGE = 30.0 * 6894.757293168361
"""30 psi, limit for cleaning with compressed air in 29 CFR 1910.242(b), gauge. [Pa]"""

DECIDE = "Local codes, the makers' data and a licensed practitioner decide."

_SIGNAL_LOST = {
    "5/2 spring": "the spring moves the valve to rest, taken here as retracting, and the piston goes back "
    "with full force from wherever it is",
    "5/2 detent": "the valve stays where it is and the piston completes its stroke with full force",
    "5/3 closed": "the ports close and the piston stops on trapped air: it gives under load, and creeps as seals leak",
    "5/3 exhausted": "both chambers vent and the piston is free: whatever pushes it moves it",
    "3/2": "the valve vents the port and the spring drives the piston back from wherever it is",
    "5/3 pressurised": "both chambers are pressurised and the piston is driven out by the pressure on the "
    "area of its rod",
}
"""What losing the signal does, by valve function, seen from the actuator."""


@dataclass(frozen=True, slots=True, kw_only=True)
class Caution:
    """What can hurt, with its source.

    Attributes
    ----------
    path : str
        Field, relative to the actuator, or figure that it goes with: ``"load.inclination"``,
        ``"extend.end_energy"``.
    text : str
        What can happen and what to look after.
    source : str
        Where that is said.
    """

    path: str
    text: str
    source: str


def _caution(path: str, text: str, source: Source) -> Caution:
    return Caution(path=path, text=f"{text} {DECIDE}", source=str(source))


def _held(actuator: Actuator, held: tuple[Held, ...]) -> Iterator[Caution]:
    """A load that can fall, and air that stays closed in."""
    for path, text in (*words.weight(actuator, held), *words.closed_in(held)):
        yield _caution(path, text, ISO_4414)


def _loss(actuator: Actuator) -> Iterator[Caution]:
    """Exhaust and stop: what losing signal or supply does."""
    function = actuator.valve.function
    yield _caution(
        "valve.function",
        f"When the signal is lost with a {function} valve, {_SIGNAL_LOST[function]}. When the supply is lost "
        f"the force goes with the pressure, and the piston follows {'its spring, ' if actuator.spring else ''}load "
        "and weight. An emergency stop has to be judged for both, and for the return of either.",
        ISO_4414,
    )


def _spring(actuator: Actuator) -> Iterator[Caution]:
    """A spring that moves the load without air, and is never free of load."""
    if actuator.spring is None:
        return
    count, end = actuator.count, "retracted" if actuator.kind == "spring-return" else "extended"
    preload, largest = count * actuator.spring.preload, count * actuator.spring.largest(actuator.stroke)
    yield _caution(
        "spring",
        f"The spring drives the piston to its {end} end, with {largest:.4g} N falling to {preload:.4g} N, whenever air "
        "or signal is lost, from wherever it is: shutting the air off does not make this load safe. Pushed back over "
        f"the whole stroke it stores {count * actuator.spring.energy(actuator.stroke):.3g} J, and its preload stays "
        "with no air in the cylinder: do not take the cylinder apart without the maker's instructions.",
        ISO_4414,
    )


def _first_stroke(actuator: Actuator, stroke: StrokeResult | Refusal) -> Iterator[Caution]:
    """Both chambers vented: nothing to push against. A single-acting cylinder never has anything there."""
    if actuator.single_acting:
        return
    energy = ""
    if not isinstance(stroke, Refusal) and not isinstance(stroke.extend.end_energy, Refusal):
        energy = f" than the {stroke.extend.end_energy:.3g} J of the periodic cycle"
    meter = (
        " A throttle on the outflow does not slow this stroke: there is no air to meter."
        if actuator.throttle.kind == "meter-out"
        else ""
    )
    yield _caution(
        "extend.end_energy",
        "The first stroke after venting has no counter-pressure: the piston jumps, and can arrive with much "
        f"more energy{energy}.{meter} Keep clear when pressure returns; a soft start fills slowly.",
        ISO_4414,
    )


def _impact(actuator: Actuator, machine: Machine, site: Site, stroke: StrokeResult | Refusal) -> Iterator[Caution]:
    """Pinch points and the energy at the ends."""
    force = actuator.count * (machine.supply_pressure - site.ambient_pressure) * actuator.area_cap
    if actuator.spring is not None and actuator.kind == "spring-extend":
        force = actuator.count * actuator.spring.largest(actuator.stroke)
    moving = "Carriage" if actuator.kind == "rodless" else "Rod"
    yield _caution(
        "static.theoretical_extend",
        f"{moving}, load and fixed parts pinch with up to {force:.4g} N extending, and go on pushing at "
        "standstill. Guard the whole way of the load.",
        ISO_4414,
    )
    if isinstance(stroke, Refusal):
        return
    for half in (stroke.extend, stroke.retract):
        if not isinstance(half.end_energy, Refusal) and half.end_energy > 0.0:
            yield _caution(
                f"{half.direction}.end_energy",
                f"{_gerund(half)} the load arrives with {half.end_energy:.3g} J at a stop that this document "
                "takes as rigid. The maker's limit for the bare piston, or a cushion or shock absorber rated "
                "for this energy and its repetition, has to cover it.",
                PRACTICE,
            )


def _gerund(half: HalfStroke) -> str:
    return "Extending," if half.direction == "extend" else "Retracting,"


def stored_energy(pressure: float, volume: float, ambient: float) -> float:
    r"""Energy that compressed air gives when it expands to ambient pressure at once.

    Parameters
    ----------
    pressure, ambient : float
        Absolute, before and after. [Pa]
    volume : float
        Before. [m³]

    Returns
    -------
    float
        [J]

    Notes
    -----
    Isentropic expansion of an ideal gas, without the work on the atmosphere, so on the high side:

    .. math:: E = \frac{p V}{\gamma - 1} [1 - (p_0/p)^{(\gamma - 1)/\gamma}]

    References
    ----------
    ASME PCC-2, stored energy of a pneumatic test (from memory).
    """
    cooled: float = (ambient / pressure) ** ((GAMMA - 1.0) / GAMMA)
    return pressure * volume / (GAMMA - 1.0) * (1.0 - cooled)


def _stored(actuator: Actuator, machine: Machine, site: Site) -> Iterator[Caution]:
    """Air that stays under pressure in a chamber."""
    p, p0 = machine.supply_pressure, site.ambient_pressure
    if p <= p0:
        return
    end, side = ("Extended", "cap") if "extend" in actuator.air_ways else ("Retracted", "rod")
    swept, dead = (
        (actuator.area_cap, actuator.dead_volume_cap)
        if side == "cap"
        else (actuator.area_rod, actuator.dead_volume_rod)
    )
    volume = actuator.count * (swept * actuator.stroke + dead)
    chambers = f"chamber{'s hold' if actuator.count > 1 else ' holds'}"
    energy = stored_energy(p, volume, p0)
    yield _caution(
        "stroke",
        f"{end}, the {side} {chambers} {volume * 1e3:.3g} L at supply pressure: "
        f"p·V = {(p - p0) * volume / 100.0:.3g} bar·L gauge, about {energy:.3g} J if it bursts free. Air may "
        "stay trapped after the supply is shut off: vent it and prove it before opening a fitting. For "
        "receivers compare p·V with the local pressure equipment rules.",
        PCC_2,
    )


def _noise_and_blow_off(machine: Machine, site: Site) -> Iterator[Caution]:
    yield _caution(
        "valve.exhaust_c",
        "Open exhausts are loud, up to levels that need hearing protection. A silencer lowers the noise and "
        "the exhaust conductance, more so as it clogs: enter the conductance of both.",
        PRACTICE,
    )
    if machine.supply_pressure - site.ambient_pressure > BLOW_OFF_GAUGE:
        yield _caution(
            "machine.supply_pressure",
            "This supply is above 30 psi (2.07 bar) gauge. As one example of a local rule, the United States "
            "allow cleaning with compressed air only below that pressure, with chip guarding and personal "
            "protection. Never point it at people.",
            OSHA_1910,
        )


def _side_load(actuator: Actuator, machine: Machine, site: Site) -> Iterator[Caution]:
    """A rod that bends, or leans on its gland."""
    if actuator.kind == "rodless":
        return
    beam = extended_rod(
        rod=actuator.rod,
        bore=actuator.bore,
        stroke=actuator.stroke,
        mounting=actuator.mounting,
        closed_length=actuator.closed_length,
        bearing_length=actuator.bearing_length,
        inclination=actuator.load.inclination,
        side_load=actuator.side_load,
    )
    if beam.sag > LARGE_SAG * beam.overhang:
        yield _caution(
            "rod.sag",
            f"Extended, the rod's end sags by {beam.sag * 1e3:.3g} mm over {beam.overhang * 1e3:.4g} mm, more than "
            "1/500. It does not meet its mark, lowers what the rod carries against buckling, and wears one side "
            "of gland and seals: guide the rod's end, or take a thicker rod.",
            PRACTICE,
        )
    push = (machine.supply_pressure - site.ambient_pressure) * actuator.area_cap
    if beam.bearing_load > LARGE_BEARING_LOAD * push:
        yield _caution(
            "rod.bearing_load",
            f"Extended, the gland carries {beam.bearing_load:.4g} N across the rod, more than a fifth of the "
            "cylinder's push. The friction and life reckoned with here do not cover that: carry the load on a "
            "guide of its own, or compare with the side load that the maker allows at this stroke.",
            PRACTICE,
        )


def _motion(stroke: StrokeResult | Refusal) -> Iterator[Caution]:
    """Slow strokes, and strokes that do not finish."""
    if isinstance(stroke, Refusal):
        return
    for half in (stroke.extend, stroke.retract):
        if not half.completed:
            yield _caution(
                f"{half.direction}.position_reached",
                f"{_gerund(half)} the piston is sent back before it arrives. Whatever waits for the end of "
                "the stroke, a sensor or the next motion, never gets it.",
                OWN,
            )
        elif not isinstance(half.mean_speed, Refusal) and half.mean_speed < STICK_SLIP_SPEED:
            yield _caution(
                f"{half.direction}.mean_speed",
                f"{_gerund(half)} the mean speed of {half.mean_speed * 1e3:.3g} mm/s lies below 50 mm/s, "
                "where stick-slip is likely: the piston may halt and jump, and the times of slow strokes "
                "follow friction, which drifts.",
                PRACTICE,
            )


def cautions(
    actuator: Actuator,
    machine: Machine,
    site: Site,
    stroke: StrokeResult | Refusal,
    held: tuple[Held, ...] = (),
) -> tuple[Caution, ...]:
    """Cautions that go with one actuator's results.

    Parameters
    ----------
    actuator : Actuator
    machine : Machine
        That it works in.
    site : Site
    stroke : StrokeResult or Refusal
        Its simulated cycle.
    held : tuple of Held, optional
        What happens when supply or signal is lost.

    Returns
    -------
    tuple of Caution
        The gravest first.
    """
    return (
        *_held(actuator, held),
        *_loss(actuator),
        *_spring(actuator),
        *_first_stroke(actuator, stroke),
        *_impact(actuator, machine, site, stroke),
        *_side_load(actuator, machine, site),
        *_motion(stroke),
        *_stored(actuator, machine, site),
        *_noise_and_blow_off(machine, site),
    )
