"""Points at which the scatter is sampled: scrambled Sobol points, evenly spread over the stated ranges."""

from __future__ import annotations

from actuator.parts.spread import Spread
from actuator.scatter.vary import Deviation

SAMPLES = 128
"""Points of a full set; a power of two, so that they are balanced. [1]"""
SCRAMBLING = 20260
"""Number that the scrambling starts from: the same document always gives the same bands. [1]"""
_FIELDS = 5


def deviations(spread: Spread, count: int, scrambling: int = SCRAMBLING) -> tuple[Deviation, ...]:
    """Deviations to compute at, in an order whose every beginning of 2ⁿ is balanced.

    Parameters
    ----------
    spread : Spread
        Ranges, either way.
    count : int
        How many; balanced where it is a power of two. [1]
    scrambling : int
        Number that the scrambling of the points starts from. [1]

    Returns
    -------
    tuple of Deviation
        Mass and the forces of the load move together, as one field; so do all conductances, and all friction.

    Notes
    -----
    Each field is drawn evenly between its limits and apart from the others: where nothing but limits is known,
    the rectangular distribution says least beyond them [1]_. It is also the wider choice: a normal distribution
    that ends at the same limits gives narrower bands.

    References
    ----------
    .. [1] JCGM 101:2008, 6.4.2 (from memory).
    """
    from scipy.stats import qmc  # 0.5 s to import: not before bands are asked for

    points = qmc.Sobol(_FIELDS, scramble=True, rng=scrambling).random_base2(max(count - 1, 0).bit_length())[:count]
    return tuple(
        Deviation(
            supply_pressure=pressure * spread.supply_pressure,
            friction=friction * spread.friction,
            mass=load * spread.mass,
            opposing=load * spread.mass,
            constant=load * spread.mass,
            conductance=conductance * spread.conductance,
            delay=delay * spread.delay,
        )
        for pressure, friction, load, conductance, delay in (2.0 * points - 1.0).tolist()
    )
