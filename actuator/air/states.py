"""Reference states of "free" air, and the exact way between them: the mass of dry air."""

from __future__ import annotations

from dataclasses import dataclass

from actuator.air.gas import DRY_DENSITY_ANR, HUMIDITY_ANR, P_ANR, R_AIR, TEMP_ANR
from actuator.air.saturation import saturation_pressure_scalar
from actuator.errors import InputError, Problem

PSI = 6894.757293168361
"""Pound-force per square inch, exact by definition of the pound and the inch. [Pa]"""


@dataclass(frozen=True, slots=True, kw_only=True)
class State:
    """A state that a volume of free air may refer to.

    Attributes
    ----------
    name : str
        Word of the document.
    pressure : float
        Absolute. [Pa]
    temperature : float
        [K]
    humidity : float
        Relative humidity. [1]
    meaning : str
        The state in words, with the body that uses it.
    source : str
        Key in ``SOURCES``.
    """

    name: str
    pressure: float
    temperature: float
    humidity: float
    meaning: str
    source: str


def _state(name: str, p: float, temp: float, humidity: float, meaning: str, source: str) -> State:
    return State(name=name, pressure=p, temperature=temp, humidity=humidity, meaning=meaning, source=source)


_LIST = (
    _state("ANR", P_ANR, TEMP_ANR, HUMIDITY_ANR, "20 degC, 100 kPa, 65 % RH (ISO 8778)", "iso8778"),
    _state("DIN1343", 101_325.0, 273.15, 0.0, "0 degC, 101.325 kPa, dry (DIN 1343)", "din1343"),
    _state("ISO1217", 100_000.0, 293.15, 0.0, "20 degC, 100 kPa, dry (ISO 1217)", "iso1217"),
    _state("SCFM-14.5-68F-dry", 14.5 * PSI, 293.15, 0.0, "68 degF, 14.5 psia, dry", "scfm"),
    _state("SCFM-14.696-60F-dry", 101_325.0, (60.0 + 459.67) / 1.8, 0.0, "60 degF, 14.696 psia, dry", "scfm"),
    _state("SCFM-14.7-68F-36", 14.7 * PSI, 293.15, 0.36, "68 degF, 14.7 psia, 36 % RH", "scfm"),
)

STATES: dict[str, State] = {item.name: item for item in _LIST}
"""States of fixed meaning by name; ``FAD`` is not among them, its state is the intake's own."""


def dry_density_at(p: float, temp: float, humidity: float) -> float:
    r"""Mass of dry air in a cubic metre of moist air.

    Parameters
    ----------
    p : float
        Pressure of the moist air, absolute. [Pa]
    temp : float
        Temperature. [K]
    humidity : float
        Relative humidity, 0 to 1. [1]

    Returns
    -------
    float
        Dry air per volume. [kg/m³]

    Raises
    ------
    InputError
        Where the vapour alone would reach the pressure.

    Notes
    -----
    .. math:: \rho_d = (p - \varphi\, p_s(T))/(R\, T)

    References
    ----------
    .. [1] Dalton's law; ASHRAE Handbook Fundamentals (2017), chapter 1 (from memory).
    """
    dry = p - humidity * saturation_pressure_scalar(temp)
    if dry <= 0.0:
        raise InputError(
            Problem(
                path="relative_humidity",
                given=f"{humidity:g}",
                allowed=f"at {temp:g} K and {p:g} Pa absolute the vapour alone would reach the pressure; "
                "check pressure, temperature and humidity",
            )
        )
    return dry / (R_AIR * temp)


def dry_density(state: str) -> float:
    """Mass of dry air in a cubic metre of free air in a named state.

    Parameters
    ----------
    state : str
        A name in :data:`STATES`; the volume at a compressor's intake (FAD) goes to :func:`dry_density_at`.

    Returns
    -------
    float
        Dry air per volume. [kg/m³]

    Raises
    ------
    InputError
        For an unknown name.
    """
    found = STATES.get(state)
    if found is None:
        raise InputError(Problem(path="state", given=state, allowed="one of " + ", ".join(STATES)))
    return dry_density_at(found.pressure, found.temperature, found.humidity)


def anr_volume(mass: float) -> float:
    """Volume in the standard reference atmosphere of a mass of dry air.

    Parameters
    ----------
    mass : float
        Dry air. [kg]

    Returns
    -------
    float
        Volume, 20 degC, 100 kPa, 65 % RH. [m³]

    References
    ----------
    .. [1] ISO 8778:2003, Standard reference atmosphere (numbers from memory).
    """
    return mass / DRY_DENSITY_ANR


def free_volume(mass: float, state: str) -> float:
    """Volume in a named state of a mass of dry air.

    Parameters
    ----------
    mass : float
        Dry air. [kg]
    state : str
        A name in :data:`STATES`.

    Returns
    -------
    float
        Volume. [m³]
    """
    return mass / dry_density(state)


def dry_mass(volume: float, state: str) -> float:
    """Mass of dry air in a volume of a named state.

    Parameters
    ----------
    volume : float
        Volume of free air in that state. [m³]
    state : str
        A name in :data:`STATES`.

    Returns
    -------
    float
        Dry air. [kg]
    """
    return volume * dry_density(state)
