"""Random valid cylinders for property tests: an actuator in its machine, at its site."""

from __future__ import annotations

import math

from hypothesis import strategies as st

from tests.agreement.cases import Case, case

BORES = (12.0, 16.0, 20.0, 25.0, 32.0, 40.0, 50.0, 63.0, 80.0, 100.0, 125.0)
"""Bores of ISO 6432 and ISO 15552, from memory. [mm]"""


def _three_digits(value: float) -> float:
    return float(f"{value:.3g}")


def _log(low: float, high: float) -> st.SearchStrategy[float]:
    """Evenly spread over the decades between two positive numbers, as a person would write them."""
    return st.floats(math.log(low), math.log(high)).map(lambda value: _three_digits(math.exp(value)))


def _between(low: float, high: float) -> st.SearchStrategy[float]:
    """In steps of a thousandth of the range, so that no number is absurdly small."""
    return st.integers(0, 1000).map(lambda step: low + (high - low) * step / 1000)


@st.composite
def cylinders(draw: st.DrawFn, *, polytropic: bool = True, quick: bool = True) -> Case:
    """A cylinder that a person could build, with valve and load in proportion to its bore.

    ``polytropic`` admits a polytropic index in place of wall heat transfer, ``quick`` admits cycles
    too short to finish the strokes.
    """
    bore = draw(st.sampled_from(BORES))
    rod = bore * draw(_between(0.25, 0.5))
    stroke = draw(_log(10.0, 1500.0))
    supply, ambient = draw(_between(3.5, 11.0)), draw(_between(0.75, 1.05))
    push = (supply - ambient) * 1e5 * math.pi / 4 * (bore * 1e-3) ** 2
    speed = draw(_log(0.15, 3.0))
    c = speed * math.pi / 4 * (bore * 1e-3) ** 2 / 1e5 / 1e-8
    period = stroke * 1e-3 / speed * draw(_log(1.5 if quick else 6.0, 20.0)) + draw(_between(0.1, 0.8))
    extend_at = draw(_between(0.0, 0.9)) * period
    retract_at = math.fmod(extend_at + draw(_between(0.25, 0.75)) * period, period)
    breakaway = push * draw(_between(0.02, 0.1))
    needles = tuple(c * draw(_log(0.25, 1.5)) for _ in range(2))
    edges = sorted((draw(_between(0.05, 0.95)), 1.0))
    dead = math.pi / 4 * bore**2 * bore * 1e-3
    return case(
        "random",
        bore,
        rod,
        stroke,
        max(push / 9.81 * draw(_log(0.02, 0.5)), 0.1),
        c=c,
        exhaust_c=c * draw(_log(0.4, 2.5)),
        b=draw(_between(0.1, 0.5)),
        m=draw(_between(0.4, 0.6)),
        supply=supply,
        ambient=ambient,
        temp_supply=draw(_between(278.15, 318.15)),
        temp_ambient=draw(_between(273.15, 313.15)),
        period=period,
        extend_at=extend_at,
        retract_at=retract_at,
        delay=draw(_between(0.0, 0.03)),
        opening=draw(_between(0.0, 0.02)),
        dead=(dead * draw(_log(0.03, 1.0)), dead * draw(_log(0.03, 1.0))),
        friction=(breakaway, breakaway * draw(_between(0.4, 1.0)), 0.6 * bore * draw(_between(0.1, 2.0))),
        throttle=draw(
            st.sampled_from((None, "meter-in", "meter-out")).map(
                lambda kind: None if kind is None else (kind, needles[0], needles[1], 2.0 * c)
            )
        ),
        slope=draw(st.sampled_from((0.0, 0.0, 90.0, -90.0, 30.0))),
        process=((edges[0] * stroke, edges[1] * stroke, push * draw(_between(0.0, 0.5))),),
        load={
            "guide_friction": draw(_between(0.0, 0.2)),
            "extend_force": push * draw(_between(0.0, 0.2)),
            "retract_force": push * draw(_between(0.0, 0.2)),
            "constant_force": push * draw(_between(-0.15, 0.15)),
        },
        back=draw(st.one_of(st.none(), _between(0.5, 1.0).map(lambda share: share * supply))),
        cut_off=draw(st.one_of(st.just(1.0), _between(0.3, 0.95))),
        h=draw(st.one_of(st.just(60.0), st.just(0.0), _log(5.0, 1000.0))),
        n=draw(st.one_of(st.none(), _between(1.0, 1.4))) if polytropic else None,
    )
