"""Energy, money and carbon of a year's air."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True, kw_only=True)
class YearlyCost:
    """What a year's air takes."""

    energy_year: float
    """Electricity. [J]"""
    cost_year: float
    """In the document's currency. [1]"""
    carbon_year: float
    """CO2 equivalent. [kg]"""


def yearly_cost(
    air_per_cycle: float,
    cycles_per_year: float,
    specific_energy: float,
    *,
    energy_price: float,
    carbon_intensity: float,
) -> YearlyCost:
    """Electricity, money and carbon of the air of a year's cycles.

    Parameters
    ----------
    air_per_cycle : float
        Dry air drawn in a cycle. [kg]
    cycles_per_year : float
        [1]
    specific_energy : float
        Electricity per dry air. [J/kg]
    energy_price : float
        Money per electricity, in the document's currency. [1/J]
    carbon_intensity : float
        CO2 equivalent per electricity. [kg/J]

    Returns
    -------
    YearlyCost
        At the mean price; leaks, dryer and idling are not in it.
    """
    energy = air_per_cycle * cycles_per_year * specific_energy
    return YearlyCost(energy_year=energy, cost_year=energy * energy_price, carbon_year=energy * carbon_intensity)
