"""Tolerance bands: P5, P50 and P95 of every figure, and how often all requirements are met."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping, Sequence
from dataclasses import dataclass

import numpy as np

from actuator.errors import InputError, Refusal
from actuator.parts import Actuator, Machine, Site
from actuator.scatter.outcome import THREADS, Evaluate, Outcome, StopFlag, no_stop, side_by_side
from actuator.scatter.points import SAMPLES, SCRAMBLING, deviations
from actuator.scatter.vary import Deviation, paths_times, scaled_paths, varied

CHUNK = 8
"""Samples that a thread takes at a time. [1]"""
FIRST = 32
"""Samples of the first bands that are handed over; fewer say too little. [1]"""
TOO_MANY = 0.05
"""Share of samples without a figure above which P5 and P95 of the rest say nothing. [1]"""
_LEVELS = (0.05, 0.5, 0.95)


@dataclass(frozen=True, slots=True, kw_only=True)
class Band:
    """Scatter of one figure, in its SI unit."""

    p05: float
    """One sample in twenty lies below."""
    p50: float
    """Median."""
    p95: float
    """One sample in twenty lies above."""
    missing: int = 0
    """Samples in which the figure could not be had; the three are those of the others. [1]"""


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class Bands:
    """Scatter of all figures of one actuator, as far as computed."""

    samples: int
    """Computed so far. [1]"""
    wanted: int
    """To be computed in all. [1]"""
    bands: Mapping[str, Band | Refusal]
    """By name of the figure; refused where more than one sample in twenty has none."""
    met: float | Refusal
    """Share of the samples in which every requirement is met. [1]"""
    met_low: float | Refusal
    """Lower end of its 95 % confidence interval. [1]"""
    met_high: float | Refusal
    """Upper end. [1]"""


def _interval(hits: int, count: int) -> tuple[float, float]:
    """95 % confidence interval of a share; Wilson's score interval.

    It takes the samples as drawn by chance; Sobol points err less, so it is on the safe side.
    """
    from scipy.stats import binomtest

    found = binomtest(hits, count).proportion_ci(0.95, method="wilson")
    return float(found.low), float(found.high)


def _band(values: Sequence[float | Refusal]) -> Band | Refusal:
    numbers = [value for value in values if not isinstance(value, Refusal)]
    missing = len(values) - len(numbers)
    if missing > TOO_MANY * len(values):
        why = next(value for value in values if isinstance(value, Refusal))
        return why if not numbers else Refusal(f"in {missing} of {len(values)} samples: {why.reason}", why.field)
    low, middle, high = np.quantile(numbers, _LEVELS).tolist()
    return Band(p05=low, p50=middle, p95=high, missing=missing)


def summed_up(outcomes: Sequence[Outcome], wanted: int) -> Bands:
    """Bands of the samples there are.

    Parameters
    ----------
    outcomes : sequence of Outcome
        At least one, all with the same names.
    wanted : int
        How many there will be. [1]

    Returns
    -------
    Bands
    """
    names = outcomes[0].values
    whole = {name for name in names if not any(isinstance(item.values[name], Refusal) for item in outcomes)}
    table = np.array([[item.values[name] for name in names if name in whole] for item in outcomes], dtype=float)
    found: dict[str, Band | Refusal] = {}
    levels = iter(np.quantile(table, _LEVELS, axis=0).T.tolist() if whole else [])
    for name in names:
        if name in whole:
            low, middle, high = next(levels)
            found[name] = Band(p05=low, p50=middle, p95=high)
        else:
            found[name] = _band([item.values[name] for item in outcomes])
    judged = [item.met for item in outcomes if item.met is not None]
    if not judged:
        none = Refusal("no requirement is asked", "require")
        return Bands(samples=len(outcomes), wanted=wanted, bands=found, met=none, met_low=none, met_high=none)
    low, high = _interval(sum(judged), len(judged))
    return Bands(
        samples=len(outcomes),
        wanted=wanted,
        bands=found,
        met=sum(judged) / len(judged),
        met_low=low,
        met_high=high,
    )


def banded(
    actuator: Actuator,
    machine: Machine,
    site: Site,
    evaluate: Evaluate,
    *,
    cancelled: Callable[[], bool],
    samples: int = SAMPLES,
    scrambling: int = SCRAMBLING,
    threads: int = THREADS,
    stop: StopFlag | None = None,
) -> Iterator[Bands]:
    """Scatter of an actuator's figures under the spread that it states.

    Parameters
    ----------
    actuator, machine, site : part
        As the document has them.
    evaluate : callable
        Computes the figures of a varied actuator; called in several threads at once.
    cancelled : callable
        True ends the work.
    samples, scrambling, threads : int
        How many, which, and computed by how many at once; the threads change nothing in the result. [1]
    stop : StopFlag, optional
        Set when the work is cancelled, for ``evaluate`` to see.

    Yields
    ------
    Bands
        Of the samples so far, from ``FIRST`` on at each doubling of their number; at last of all.

    Raises
    ------
    Cancelled
        When ``cancelled()`` became true.
    """

    def work(by: Deviation) -> Outcome | Refusal:
        try:
            parts = varied(actuator, machine, site, by)
        except InputError as fault:
            return Refusal(str(fault), "spread")
        if isinstance(parts, Refusal):
            return parts
        return evaluate(*parts, None if paths is None else paths_times(paths, 1.0 + by.conductance))

    paths = scaled_paths(actuator, machine, site)
    points = deviations(actuator.spread, samples, scrambling)
    shown = FIRST // 2
    for found in side_by_side(
        work, points, threads=threads, chunk=CHUNK, cancelled=cancelled, stop=no_stop() if stop is None else stop
    ):
        if len(found) < min(2 * shown, samples):
            continue
        while 2 * shown <= len(found):
            shown *= 2
        count = len(found) if len(found) == samples else shown
        yield summed_up(_completed(found[:count]), samples)


def _completed(found: Sequence[Outcome | Refusal]) -> list[Outcome]:
    """Outcomes in which a sample that could not be computed has its reason for every figure."""
    whole = next((item for item in found if isinstance(item, Outcome)), None)
    names = dict(whole.values) if whole is not None else {}
    judged = None if whole is None or whole.met is None else False
    return [
        item if isinstance(item, Outcome) else Outcome(values=dict.fromkeys(names, item), met=judged) for item in found
    ]
