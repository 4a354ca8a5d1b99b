"""Constants of air as the model knows it: ideal gas, constant specific heats."""

from __future__ import annotations

from actuator.air.saturation import saturation_pressure_scalar

R_AIR = 287.05
"""Gas constant of dry air, 287.053 in the standard atmosphere; Source ``iso2533``. [J/(kg*K)]"""
GAMMA = 1.4
"""Isentropic exponent of air; Source ``iso2533``. [1]"""
CV = R_AIR / (GAMMA - 1.0)
"""Specific heat at constant volume. [J/(kg*K)]"""
CP = GAMMA * CV
"""Specific heat at constant pressure. [J/(kg*K)]"""
GRAVITY = 9.80665
"""Standard acceleration of free fall; Source ``iso80000``. [m/s**2]"""
TEMP_ANR = 293.15
"""Temperature of the standard reference atmosphere; Source ``iso8778``. [K]"""
P_ANR = 100_000.0
"""Pressure of the standard reference atmosphere, absolute; Source ``iso8778``. [Pa]"""
HUMIDITY_ANR = 0.65
"""Relative humidity of the standard reference atmosphere; Source ``iso8778``. [1]"""
RHO_ISO6358 = 1.185
"""Density that turns a conductance into a mass flow: a defined constant of the flow equation,
not the density of any air in this project; Source ``iso6358``. [kg/m**3]"""
DRY_DENSITY_ANR = (P_ANR - HUMIDITY_ANR * saturation_pressure_scalar(TEMP_ANR)) / (R_AIR * TEMP_ANR)
"""Dry air in a cubic metre of the standard reference atmosphere, 1.1703. [kg/m**3]"""
