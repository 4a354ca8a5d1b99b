"""The site, its machines, the compressor that feeds them, the money: the tree of a project."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Annotated

from actuator.errors import InputError, Problem
from actuator.kinds import (
    AbsPressure,
    CarbonIntensity,
    Count,
    EnergyPrice,
    Entry,
    FlowFAD,
    HoursPerYear,
    Period,
    PositiveShare,
    Power,
    Share,
    Temperature,
    TemperatureDifference,
    check,
)
from actuator.parts.actuator import Actuator


@dataclass(frozen=True, slots=True, kw_only=True)
class Site:
    """Where the machines stand: the atmosphere that they exhaust into."""

    ambient_pressure: Annotated[
        AbsPressure,
        Entry(
            "Ambient pressure",
            "Atmospheric pressure at the site.",
            default="101.3 kPa absolute, sea level",
            example="101.3 kPa absolute",
        ),
    ] = 101300.0
    ambient_temperature: Annotated[
        Temperature,
        Entry(
            "Ambient temperature",
            "Of the air around the machines and their walls.",
            default="20 degC",
            example="20 degC",
        ),
    ] = 293.15
    relative_humidity: Annotated[
        Share,
        Entry(
            "Humidity",
            "Relative humidity of the air that the compressor takes in.",
            default="65 %",
            example="65 %",
        ),
    ] = 0.65

    def __post_init__(self) -> None:
        check(self)


@dataclass(frozen=True, slots=True, kw_only=True)
class Machine:
    """A machine with its actuators, cycling."""

    name: Annotated[str, Entry("Name", "Unique in the document.", example='"Carton erector"')]
    quantity: Annotated[Count, Entry("Quantity", "How many such machines there are.", default="1", example="1")] = 1
    supply_pressure: Annotated[
        AbsPressure,
        Entry("Supply pressure", "At the machine's inlet, while air flows.", example="6 bar gauge"),
    ]
    supply_temperature: Annotated[
        Temperature,
        Entry(
            "Supply temperature",
            "Of the compressed air at the inlet.",
            default="the ambient temperature",
            example="20 degC",
        ),
    ]
    cycle_time: Annotated[Period, Entry("Cycle time", "From one start of the cycle to the next.", example="4 s")]
    hours: Annotated[
        HoursPerYear,
        Entry(
            "Hours",
            "Hours a year in which the machine is switched on.",
            default="4800 h/year, common practice, no source",
            example="4800 h/year",
        ),
    ] = 4800.0 / 8760.0
    utilisation: Annotated[
        Share,
        Entry("Utilisation", "Share of those hours in which it cycles.", default="100 %", example="85 %"),
    ] = 1.0
    actuators: Annotated[tuple[Actuator, ...], Entry("Actuators", "The machine's air cylinders.", key="actuator")] = ()

    def __post_init__(self) -> None:
        check(self)

    @property
    def cycles_per_year(self) -> float:
        """Cycles of one machine in a year of 8760 h. [1]"""
        return self.hours * 8760.0 * 3600.0 * self.utilisation / self.cycle_time


@dataclass(frozen=True, slots=True, kw_only=True)
class Compressor:
    """The compressor that the air's energy is reckoned with.

    Either its measured free air and package power at the rated pressure, or its stages and efficiencies.
    """

    name: Annotated[str, Entry("Name", "Unique among the compressors.", example='"C1"')] = "Compressor"
    rated_pressure: Annotated[
        AbsPressure,
        Entry(
            "Rated pressure",
            "Pressure that it delivers at.",
            default="7.5 bar gauge, common practice, no source",
            example="7.5 bar gauge",
        ),
    ] = 851300.0
    free_air: Annotated[
        FlowFAD | None,
        Entry(
            "Free air delivered",
            "At the intake's own state, loaded, rated pressure.",
            example="6.0 m3/min FAD",
        ),
    ] = None
    package_power: Annotated[
        Power | None, Entry("Package power", "Electrical, loaded, at rated pressure.", example="37 kW")
    ] = None
    stages: Annotated[
        Count,
        Entry(
            "Stages",
            "Number of stages of equal pressure ratio.",
            default="1, common practice, no source",
            example="1",
        ),
    ] = 1
    approach: Annotated[
        TemperatureDifference,
        Entry(
            "Intercooler approach",
            "Air after an intercooler above the intake's temperature.",
            default="10 K, common practice, no source",
            example="10 K",
        ),
    ] = 10.0
    isentropic_efficiency: Annotated[
        PositiveShare | None,
        Entry(
            "Isentropic efficiency",
            "Of each stage.",
            default="80 %, common practice, no source",
            example="80 %",
        ),
    ] = 0.80
    polytropic_efficiency: Annotated[
        PositiveShare | None,
        Entry("Polytropic efficiency", "Of each stage, in place of the isentropic one.", example="75 %"),
    ] = None
    drive_efficiency: Annotated[
        PositiveShare,
        Entry(
            "Drive efficiency",
            "Bearings, gear or belt.",
            default="97 %, common practice, no source",
            example="97 %",
        ),
    ] = 0.97
    motor_efficiency: Annotated[
        PositiveShare,
        Entry(
            "Motor efficiency",
            "Electrical input to shaft.",
            default="93 %, common practice, no source",
            example="93 %",
        ),
    ] = 0.93

    def __post_init__(self) -> None:
        check(self)
        problems = []
        if (self.free_air is None) != (self.package_power is None):
            missing = "package_power" if self.package_power is None else "free_air"
            problems.append(Problem(path=missing, given="", allowed="free_air and package_power go together"))
        if (self.isentropic_efficiency is None) == (self.polytropic_efficiency is None):
            problems.append(
                Problem(
                    path="polytropic_efficiency",
                    given="",
                    allowed="give either isentropic_efficiency or polytropic_efficiency, not both",
                )
            )
        if problems:
            raise InputError(*problems)


@dataclass(frozen=True, slots=True, kw_only=True)
class Plant:
    """What feeds the machines."""

    compressors: Annotated[
        tuple[Compressor, ...],
        Entry("Compressors", "The compressor that feeds the machines.", key="compressor"),
    ] = (Compressor(),)


@dataclass(frozen=True, slots=True, kw_only=True)
class Money:
    """Prices and carbon."""

    currency: Annotated[str, Entry("Currency", "Three capital letters (ISO 4217).", default="EUR", example='"EUR"')] = (
        "EUR"
    )
    energy: Annotated[
        EnergyPrice,
        Entry(
            "Energy price",
            "Per kilowatt hour of electricity.",
            default="0.20 /kWh, common practice, no source",
            example="0.18 /kWh",
        ),
    ] = 0.20 / 3.6e6
    carbon: Annotated[
        CarbonIntensity,
        Entry(
            "Carbon intensity",
            "CO2 equivalent per kilowatt hour of electricity.",
            default="0.35 kg/kWh, common practice, no source",
            example="0.35 kg/kWh",
        ),
    ] = 0.35 / 3.6e6

    def __post_init__(self) -> None:
        check(self)


@dataclass(frozen=True, slots=True, kw_only=True)
class Project:
    """Everything that one document describes."""

    title: Annotated[
        str, Entry("Title", "What the document is about.", default="empty", example='"Carton line, hall B"')
    ] = ""
    site: Annotated[Site, Entry("Site", "Where the machines stand.")] = field(default_factory=Site)
    machines: Annotated[tuple[Machine, ...], Entry("Machines", "The machines.", key="machine")] = ()
    plant: Annotated[Plant, Entry("Plant", "What feeds the machines.")] = field(default_factory=Plant)
    money: Annotated[Money, Entry("Money", "Prices and carbon.")] = field(default_factory=Money)
