"""What is computed at one point of the scatter, and how many points are computed at once."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping, Sequence
from concurrent.futures import FIRST_COMPLETED, ThreadPoolExecutor, wait
from dataclasses import dataclass
from typing import Any, TypeVar

import numpy as np
from numpy.typing import NDArray

from actuator.errors import Cancelled, Refusal
from actuator.parts import Actuator, Machine
from actuator.stroke.result import Path

THREADS = 2
"""Threads that compute; the compiled kernel lets them run side by side. [1]"""
POLL = 0.02
"""How long to wait before asking again whether the work is still wanted. [s]"""


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class Outcome:
    """Figures of one actuator.

    Attributes
    ----------
    values : mapping of str to float or Refusal
        By name, in SI.
    met : bool or None
        Whether every requirement is met; None where none is asked.
    """

    values: Mapping[str, float | Refusal]
    met: bool | None


Evaluate = Callable[[Actuator, Machine, tuple[Path, ...] | None], Outcome]
"""Computes the figures of an actuator in its machine, with its flow paths where they are known already."""
StopFlag = NDArray[np.uint8]
"""One element; not zero ends what is being computed."""
T = TypeVar("T")


def no_stop() -> StopFlag:
    """Make a flag that is not set."""
    return np.zeros(1, np.uint8)


def side_by_side(
    work: Callable[[T], Any],
    tasks: Sequence[T],
    *,
    threads: int,
    chunk: int,
    cancelled: Callable[[], bool],
    stop: StopFlag,
) -> Iterator[list[Any]]:
    """Do tasks in threads, and hand over what is done from the first on.

    Parameters
    ----------
    work : callable
        Does one task.
    tasks : sequence
    threads, chunk : int
        Threads, and tasks that one takes at a time. [1]
    cancelled : callable
        Asked all along; true ends the work.
    stop : StopFlag
        Set when cancelled, for what ``work`` has running.

    Yields
    ------
    list
        Results of the first tasks in their order, each time longer, at last all of them. The result of a task
        does not depend on the threads.

    Raises
    ------
    Cancelled
        When ``cancelled()`` became true.
    """

    def several(first: int) -> list[Any]:
        found = []
        for task in tasks[first : first + chunk]:
            if stop[0]:
                raise Cancelled("stopped")
            found.append(work(task))
        return found

    with ThreadPoolExecutor(threads, thread_name_prefix="scatter") as pool:
        futures = [pool.submit(several, first) for first in range(0, len(tasks), chunk)]
        done: list[Any] = []
        try:
            while futures:
                if cancelled():
                    raise Cancelled("cancelled")
                wait(futures[:1], POLL, FIRST_COMPLETED)
                grown = len(done)
                while futures and futures[0].done():
                    done += futures.pop(0).result()
                if len(done) > grown:
                    yield done.copy()
        finally:
            if futures:
                stop[0] = 1
                for future in futures:
                    future.cancel()
