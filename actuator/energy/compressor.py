"""Steady-flow compression, and the electricity that a kilogram of compressed air takes."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np
from numpy.typing import ArrayLike, NDArray

from actuator.air.gas import CP, GAMMA, R_AIR
from actuator.air.states import dry_density_at
from actuator.air.work import exprel
from actuator.errors import Refusal
from actuator.parts import Compressor, Site

Array = NDArray[np.float64]

MOISTURE_NOTE = (
    "Work is that of dry air; the vapour taken in counts in the free air delivered, not in the work "
    "(about 1.5 % at 20 degC and 65 % relative humidity)."
)


@dataclass(frozen=True, slots=True, kw_only=True)
class SupplyWork:
    """What one kilogram of dry compressed air costs the compressor."""

    specific_work: float
    """Work on the air by the stages and efficiencies, before drive and motor. [J/kg]"""
    specific_energy: float
    """Electricity. [J/kg]"""
    how: str
    """``"package power"`` or ``"stages and efficiencies"``."""
    note: str
    """What the figures rest on, in words."""


def steady_flow_work(temp_in: ArrayLike, ratio: ArrayLike, index: ArrayLike, *, gas_constant: float = R_AIR) -> Array:
    r"""Work of compressing a steady flow, without friction.

    Parameters
    ----------
    temp_in : array_like
        Inlet temperature. [K]
    ratio : array_like
        Outlet over inlet pressure, absolute, above zero. [1]
    index : array_like
        Polytropic index: 1 isothermal, 1.4 isentropic, between them cooled. [1]
    gas_constant : float
        [J/(kg·K)]

    Returns
    -------
    ndarray
        Work per mass that the compressor puts in. [J/kg]

    Notes
    -----
    With z = (n − 1)/n·ln r and exprel(z) = (eᶻ − 1)/z, smooth through n = 1:

    .. math:: w = R T_1 \ln r\, \mathrm{exprel}(z) = \frac{n}{n - 1} R T_1 (r^{(n - 1)/n} - 1)

    References
    ----------
    .. [1] Cengel, Boles, Thermodynamics: An Engineering Approach, example 7-13, p. 368 (excerpt).
    """
    index = np.asarray(index, dtype=np.float64)
    log_ratio = np.log(np.asarray(ratio, dtype=np.float64))
    temp_in = np.asarray(temp_in, dtype=np.float64)
    result: Array = gas_constant * temp_in * log_ratio * exprel((index - 1.0) / index * log_ratio)
    return result


def outlet_temperature(temp_in: ArrayLike, ratio: ArrayLike, index: ArrayLike) -> Array:
    """Temperature after one stage of polytropic compression.

    Parameters
    ----------
    temp_in : array_like
        Inlet temperature. [K]
    ratio : array_like
        Outlet over inlet pressure. [1]
    index : array_like
        Polytropic index. [1]

    Returns
    -------
    ndarray
        T₂ = T₁·r^((n − 1)/n). [K]
    """
    index = np.asarray(index, dtype=np.float64)
    result: Array = np.asarray(temp_in, dtype=np.float64) * np.asarray(ratio, dtype=np.float64) ** (
        (index - 1.0) / index
    )
    return result


def stage_ratio(ratio: float, stages: int) -> float:
    """Pressure ratio of each of several equal stages, which needs the least work.

    Parameters
    ----------
    ratio : float
        Final over first pressure. [1]
    stages : int
        Number of stages. [1]

    Returns
    -------
    float
        r^(1/N). [1]
    """
    return math.exp(math.log(ratio) / stages)


def staged_work(
    temp_in: float,
    ratio: float,
    index: float,
    *,
    stages: int = 1,
    approach: float = 0.0,
    gas_constant: float = R_AIR,
) -> float:
    """Work of compressing a steady flow in equal stages with cooling between them.

    Parameters
    ----------
    temp_in : float
        Inlet temperature of the first stage. [K]
    ratio : float
        Final over first pressure. [1]
    index : float
        Polytropic index of every stage. [1]
    stages : int
        Number of stages. [1]
    approach : float
        Air after an intercooler above the first inlet's temperature; zero is perfect cooling. Air that is
        colder than that is not warmed. [K]
    gas_constant : float
        [J/(kg·K)]

    Returns
    -------
    float
        Work per mass, without friction. [J/kg]
    """
    each = stage_ratio(ratio, stages)
    total, temp = 0.0, temp_in
    for _ in range(stages):
        total += float(steady_flow_work(temp, each, index, gas_constant=gas_constant))
        temp = min(float(outlet_temperature(temp, each, index)), temp_in + approach)
    return total


def volumetric_efficiency(clearance: float, ratio: float, index: float) -> float:
    """Share of a piston compressor's swept volume that draws in fresh air, by clearance alone.

    Parameters
    ----------
    clearance : float
        Clearance over swept volume. [1]
    ratio : float
        Pressure ratio of the stage. [1]
    index : float
        Index of expansion and compression, above zero. [1]

    Returns
    -------
    float
        1 + c − c·r^(1/n); zero where the clearance air fills the whole stroke. [1]

    References
    ----------
    .. [1] Joel, Basic Engineering Thermodynamics, 5th ed., example 14.1, p. 400 (excerpt).
    """
    return max(1.0 + clearance - clearance * math.exp(math.log(ratio) / index), 0.0)


def free_air(drawn: float, p: float, temp: float, p_free: float, temp_free: float) -> float:
    """Volume flow at free-air conditions of what a cylinder draws in at its own.

    Parameters
    ----------
    drawn : float
        Volume flow at suction conditions. [m³/s]
    p, temp : float
        Suction pressure, absolute, and temperature. [Pa], [K]
    p_free, temp_free : float
        Free-air pressure, absolute, and temperature. [Pa], [K]

    Returns
    -------
    float
        The same mass of dry air at free-air conditions. [m³/s]
    """
    return drawn * p / p_free * temp_free / temp


def _stage_work(compressor: Compressor, temp_in: float, ratio: float) -> float:
    """Real work on the air, with the efficiency of the stages. [J/kg]"""
    each = stage_ratio(ratio, compressor.stages)
    k = (GAMMA - 1.0) / GAMMA
    if compressor.isentropic_efficiency is not None:
        rise = math.expm1(k * math.log(each)) / compressor.isentropic_efficiency
    else:
        rise = math.expm1(k * math.log(each) / (compressor.polytropic_efficiency or 1.0))
    total, temp = 0.0, temp_in
    for _ in range(compressor.stages):
        total += CP * temp * rise
        temp = min(temp * (1.0 + rise), temp_in + compressor.approach)
    return total


def supply_work(compressor: Compressor, site: Site) -> SupplyWork | Refusal:
    r"""Work and electricity per kilogram of dry air that the compressor delivers at its rated pressure.

    Parameters
    ----------
    compressor : Compressor
        Measured free air and package power, or stages and efficiencies.
    site : Site
        Its intake is the site's atmosphere.

    Returns
    -------
    SupplyWork or Refusal
        Refused where the rated pressure is not above ambient, and where the measured pair would be better than
        ideal isothermal compression.

    Notes
    -----
    Measured: package power over (free air delivered · dry air density of the intake); the work beside it is then
    that of ideal isentropic compression in one stage, for comparison. Otherwise, N stages of
    equal ratio, each with c_p·T₁·(r^k − 1)/η_s, or c_p·T₁·(r^(k/η_p) − 1), k = (γ − 1)/γ, intercooled to the
    approach, over drive and motor efficiency. Moisture is neglected in the work.

    References
    ----------
    .. [1] ISO 1217:2009, Displacement compressors, acceptance tests (free air delivered, from memory).
    .. [2] Cengel, Boles, Thermodynamics: An Engineering Approach, example 7-15, p. 374 (excerpt).
    """
    ratio = compressor.rated_pressure / site.ambient_pressure
    if ratio <= 1.0:
        return Refusal("the compressor's rated pressure is not above ambient", "rated_pressure")
    if compressor.free_air is not None and compressor.package_power is not None:
        work = float(steady_flow_work(site.ambient_temperature, ratio, GAMMA))
        density = dry_density_at(site.ambient_pressure, site.ambient_temperature, site.relative_humidity)
        energy = compressor.package_power / (compressor.free_air * density)
        least = float(steady_flow_work(site.ambient_temperature, ratio, 1.0))
        if energy < least:
            return Refusal(
                f"package_power and free_air together make {energy / 1e3:.3g} kJ/kg, less than the "
                f"{least / 1e3:.3g} kJ/kg of ideal isothermal compression: one of them is wrong",
                "package_power",
            )
        how = "package power"
    else:
        work = _stage_work(compressor, site.ambient_temperature, ratio)
        energy = work / (compressor.drive_efficiency * compressor.motor_efficiency)
        how = "stages and efficiencies"
    return SupplyWork(specific_work=work, specific_energy=energy, how=how, note=MOISTURE_NOTE)
