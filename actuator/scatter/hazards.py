"""What can hurt within the stated spread, though the nominal figures do not show it."""

from __future__ import annotations

from collections.abc import Iterator

from actuator.cautions import DECIDE, Caution
from actuator.errors import Refusal
from actuator.results import WorstPair
from actuator.sources import OWN, PRACTICE
from actuator.stroke.result import StrokeResult

_GERUND = {"extend": "Extending", "retract": "Retracting"}


def _found(stroke: StrokeResult | Refusal, worst: WorstPair) -> Iterator[Caution]:
    for way, gerund in _GERUND.items():
        hard, slow = getattr(worst.hard, way), getattr(worst.slow, way)
        nominal = stroke if isinstance(stroke, Refusal) else getattr(stroke, way)
        usual = nominal if isinstance(nominal, Refusal) else nominal.end_energy
        most = hard if isinstance(hard, Refusal) else hard.end_energy
        if not isinstance(most, Refusal) and (isinstance(usual, Refusal) or most > usual):
            instead = "" if isinstance(usual, Refusal) else f", where the nominal figure is {usual:.3g} J"
            yield Caution(
                path=f"worst.hard.{way}.end_energy",
                text=f"{gerund} within the stated spread, the load can arrive with {most:.3g} J{instead}. What stops "
                f"it has to take that, as often as the machine cycles. {DECIDE}",
                source=str(PRACTICE),
            )
        reached = not isinstance(nominal, Refusal) and nominal.completed
        if reached and not isinstance(slow, Refusal) and not slow.completed:
            yield Caution(
                path=f"worst.slow.{way}.position_reached",
                text=f"{gerund} at the slow end of the stated spread, the piston does not arrive before it is sent "
                f"back: a machine that goes by time alone then moves against a load that is not where it is taken "
                f"to be. {DECIDE}",
                source=str(OWN),
            )


def hazards(stroke: StrokeResult | Refusal, worst: WorstPair | Refusal) -> tuple[Caution, ...]:
    """Cautions that go with the worst-case pair.

    Parameters
    ----------
    stroke : StrokeResult or Refusal
        The nominal cycle.
    worst : WorstPair or Refusal

    Returns
    -------
    tuple of Caution
    """
    return () if isinstance(worst, Refusal) else tuple(_found(stroke, worst))
