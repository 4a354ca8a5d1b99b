"""Requirements judged: what was wanted, what there is, the margin and the verdict."""

from __future__ import annotations

from collections.abc import Iterator

from actuator.errors import Refusal
from actuator.parts import Actuator
from actuator.results import Criterion, Rod, Static
from actuator.stroke.result import StrokeResult


def _judge(name: str, direction: str, wanted: float, got: float | Refusal, unit: str, *, upper: bool) -> Criterion:
    """One criterion; ``upper``: the wanted value is the most that is allowed, else the least."""
    if isinstance(got, Refusal):
        margin: float | Refusal = got
        verdict = "met" if got.reason == "no load" else "refused"
    else:
        verdict = "met" if (got <= wanted if upper else got >= wanted) else "failed"
        if wanted == 0.0:
            margin = Refusal("no share of a wanted 0", name)
        else:
            margin = (wanted - got) / wanted if upper else (got - wanted) / wanted
    return Criterion(name=name, direction=direction, wanted=wanted, got=got, unit=unit, margin=margin, verdict=verdict)


def _criteria(actuator: Actuator, static: Static, rod: Rod, stroke: StrokeResult | Refusal) -> Iterator[Criterion]:
    require = actuator.require
    halves = (
        (("extend", stroke.extend), ("retract", stroke.retract))
        if isinstance(stroke, StrokeResult)
        else (("extend", stroke), ("retract", stroke))
    )
    for direction, half in halves:
        if require.stroke_time is not None:
            got = half if isinstance(half, Refusal) else half.stroke_time
            yield _judge("stroke_time", direction, require.stroke_time, got, "s", upper=True)
    if require.force_reserve is not None:
        for direction, reserve in (("extend", static.force_reserve_extend), ("retract", static.force_reserve_retract)):
            yield _judge("force_reserve", direction, require.force_reserve, reserve, "1", upper=False)
    if require.buckling_safety is not None:
        yield _judge("buckling_safety", "", require.buckling_safety, rod.buckling_safety, "1", upper=False)
    extend = halves[0][1]
    if require.force_at_end is not None:
        force = extend if isinstance(extend, Refusal) else extend.force_at_end
        yield _judge("force_at_end", "extend", require.force_at_end, force, "N", upper=False)
    if require.force_time is not None:
        time = extend if isinstance(extend, Refusal) else extend.force_time
        yield _judge("force_time", "extend", require.force_time, time, "s", upper=True)


def judge(actuator: Actuator, static: Static, rod: Rod, stroke: StrokeResult | Refusal) -> tuple[Criterion, ...]:
    """Judge every requirement of an actuator that is asked for, one row a direction.

    Parameters
    ----------
    actuator : Actuator
    static, rod : result
        Of the same actuator.
    stroke : StrokeResult or Refusal
        Its simulated cycle.

    Returns
    -------
    tuple of Criterion
        The margin is a share of the wanted value, positive is good; a requirement on a figure that is refused
        is refused with the same reason, but a force reserve without any load is met.
    """
    return tuple(_criteria(actuator, static, rod, stroke))
