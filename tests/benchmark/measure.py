"""Times that can be compared: best of several, taken in turn, on a machine that does other things as well."""

from __future__ import annotations

import gc
from collections.abc import Callable, Mapping
from time import perf_counter


def in_turn(jobs: Mapping[str, Callable[[], object]], rounds: int) -> dict[str, float]:
    """Shortest time of each job; every round runs each of them once. [s]"""
    best = dict.fromkeys(jobs, float("inf"))
    for job in jobs.values():
        job()
    gc.collect()
    for _ in range(rounds):
        for name, job in jobs.items():
            begun = perf_counter()
            job()
            best[name] = min(best[name], perf_counter() - begun)
    return best
