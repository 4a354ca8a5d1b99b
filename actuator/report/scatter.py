"""Tolerance bands and sensitivity of an answer: the registry's figures, read at every point of the scatter."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, replace

from actuator.analysis import never, varied_result
from actuator.answer import Answer
from actuator.parts import Actuator, Machine, Spread
from actuator.report.figures import FIGURES, At, Figure
from actuator.results import Analysis
from actuator.scatter.bands import Bands, banded
from actuator.scatter.outcome import Evaluate, Outcome, StopFlag, no_stop
from actuator.scatter.points import SAMPLES, deviations
from actuator.scatter.sensitivity import Step, sensitivity
from actuator.stroke.compiled import engine as pick_engine
from actuator.stroke.compiled import prepare
from actuator.stroke.result import Path
from actuator.stroke.rows import flow_paths
from actuator.stroke.simulate import simulate

FEW = 16
"""Samples where the kernel is interpreted, some fifty times as slow. [1]"""
BANDED = ("extend.", "retract.", "cycle.", "static.", "rod.", "money.")
"""Beginnings of the keys of figures that have bands: those of the sections that are computed anew at each point."""
OF_LEDGER = ("cycle.exergy", "cycle.exhaust_loss", "cycle.upstream")
"""Beginnings of the keys of figures that need the ledger."""
OF_STEPS = ("residual", "stored_change")
"""Last steps of keys of figures that only tell how finely the cycle was computed."""


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class Scatter:
    """Tolerance bands of one actuator's figures.

    Attributes
    ----------
    found : Bands
        By the registry's keys; a figure that is left out has no entry.
    engine : str
        ``"compiled"`` or ``"interpreted"``.
    remarks : tuple of str
        What the reader should know.
    """

    found: Bands
    engine: str
    remarks: tuple[str, ...]


def scattered(*, ledger: bool = False) -> tuple[Figure, ...]:
    """Figures of an actuator that have a band; those of the ledger only where it is carried."""
    return tuple(
        figure
        for key, figure in FIGURES["actuator"].items()
        if key.startswith(BANDED) and (ledger or not key.startswith(OF_LEDGER)) and not key.endswith(OF_STEPS)
    )


def _place(answer: Answer, machine: int, actuator: int) -> tuple[Analysis, Machine, Actuator]:
    if answer.analysis is None:
        raise LookupError("the document has problems")
    part = answer.analysis.machines[machine].part
    return answer.analysis, part, part.actuators[actuator]


def evaluator(
    analysis: Analysis,
    machine: int,
    actuator: int,
    *,
    ledger: bool = False,
    compiled: bool = True,
    stop: StopFlag | None = None,
) -> Evaluate:
    """Reader of the figures of one actuator, varied.

    Parameters
    ----------
    analysis : Analysis
        As the document has it.
    machine, actuator : int
        0-based place. [1]
    ledger : bool
        Whether the figures of the exergy ledger are wanted too.
    compiled : bool
        Which kernel to run.
    stop : StopFlag, optional
        Set, it ends a simulation that is running.

    Returns
    -------
    callable
        Actuator and machine to an outcome: figures by the registry's keys, and whether all requirements are met.
    """
    nominal = analysis.machines[machine]
    wanted = scattered(ledger=ledger)

    def evaluate(varied: Actuator, supplied: Machine, paths: tuple[Path, ...] | None) -> Outcome:
        own = paths or flow_paths(varied)
        stroke = simulate(
            varied,
            supplied,
            analysis.project.site,
            paths=own,
            ledger=ledger,
            quick=True,
            engine="compiled" if compiled else "interpreted",
            stop=stop,
        )
        result = varied_result(
            nominal.actuators[actuator],
            varied,
            supplied,
            analysis.project,
            analysis.supply,
            stroke=stroke,
            paths=own,
        )
        machines = list(analysis.machines)
        machines[machine] = replace(nominal, part=supplied, actuators=(result,))
        at = At(replace(analysis, machines=tuple(machines)), machine, 0)
        verdicts = [item.verdict == "met" for item in result.criteria]
        return Outcome(
            values={figure.key: figure.value(at) for figure in wanted},
            met=all(verdicts) if verdicts else None,
        )

    return evaluate


def _compiled(wait: bool) -> bool:
    """Whether the compiled kernel is there; ``wait`` lets it be compiled first."""
    if wait:
        prepare(wait=True)
    return pick_engine("auto")[1]


def bands_of(
    answer: Answer,
    machine: int,
    actuator: int,
    cancelled: Callable[[], bool] = never,
    progress: Callable[[Scatter], None] | None = None,
    *,
    samples: int | None = None,
    ledger: bool = False,
    wait: bool = False,
) -> Scatter:
    """Tolerance bands of one actuator's figures under the spread that the document states.

    Parameters
    ----------
    answer : Answer
        With an analysis.
    machine, actuator : int
        0-based place. [1]
    cancelled : callable
        True ends the work within a few hundredths of a second.
    progress : callable, optional
        Given the bands of the samples so far, at each doubling of their number, in this thread.
    samples : int, optional
        How many; left out: 128, or 16 where the kernel is interpreted. [1]
    ledger : bool
        Whether the exergy ledger gets bands too, for half as much time again.
    wait : bool
        Whether to wait for the kernel to be compiled.

    Returns
    -------
    Scatter

    Raises
    ------
    Cancelled
        When ``cancelled()`` became true.
    LookupError
        Where the document has problems.
    """
    analysis, supplied, part = _place(answer, machine, actuator)
    compiled = _compiled(wait)
    count = samples or (SAMPLES if compiled else FEW)
    stop = no_stop()
    evaluate = evaluator(analysis, machine, actuator, ledger=ledger, compiled=compiled, stop=stop)
    remarks = (
        ()
        if compiled or samples
        else (f"{FEW} samples in place of {SAMPLES}: the kernel is not compiled, so P5 and P95 are rough",)
    )
    found = None
    for bands in banded(part, supplied, analysis.project.site, evaluate, cancelled=cancelled, samples=count, stop=stop):
        found = Scatter(found=bands, engine="compiled" if compiled else "interpreted", remarks=remarks)
        if progress is not None:
            progress(found)
    assert found is not None
    return found


def sensitivity_of(
    answer: Answer,
    machine: int,
    actuator: int,
    figure: str,
    cancelled: Callable[[], bool] = never,
) -> tuple[Step, ...]:
    """Fields that move one figure of an actuator, those that move it most first.

    Parameters
    ----------
    answer : Answer
        With an analysis.
    machine, actuator : int
        0-based place. [1]
    figure : str
        Key in the registry, ``"extend.end_energy"``; one of :func:`scattered`.
    cancelled : callable
        True ends the work.

    Returns
    -------
    tuple of Step

    Raises
    ------
    Cancelled
        When ``cancelled()`` became true.
    LookupError
        Where the document has problems, or no such figure has bands.
    """
    analysis, supplied, part = _place(answer, machine, actuator)
    if figure not in {item.key for item in scattered(ledger=True)}:
        raise LookupError(f"{figure} has no sensitivity")
    ledger = figure not in {item.key for item in scattered()}
    stop = no_stop()
    evaluate = evaluator(analysis, machine, actuator, ledger=ledger, compiled=_compiled(False), stop=stop)
    return sensitivity(part, supplied, analysis.project.site, evaluate, figure, cancelled=cancelled, stop=stop)


def warm_up() -> None:
    """Import what bands need, which takes a second, before anyone waits for them."""
    deviations(Spread(), 1)
