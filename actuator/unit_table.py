"""The closed table of units: which spellings a quantity may have, and in which it is shown.

Data only. Factors come from pint in :mod:`actuator.units`; a spelling that is not here is refused.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

System = Literal["si", "us"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Dimension:
    """Units of one dimension.

    Attributes
    ----------
    name : str
        What messages call it, with its article: ``"a length"``.
    forms : dict of str to str
        Spelling, without spaces and without reference word, to pint's own expression.
    si, us : tuple of str
        Unit texts that values are shown in (the first) or written in (the shortest text wins).
    example : str
        Valid text, shown in messages.
    reference : str
        ``"pressure"`` where gauge or absolute has to be said, ``"free"`` where the state of free air,
        ``"intake"`` where FAD has to be said; else empty.
    money : bool
        A currency code may stand before the unit.
    bare : bool
        A number without unit is allowed.
    """

    name: str
    forms: dict[str, str]
    si: tuple[str, ...]
    us: tuple[str, ...]
    example: str
    reference: str = ""
    money: bool = False
    bare: bool = False


PRESSURE = {
    "bar": "bar",
    "mbar": "millibar",
    "hPa": "hPa",
    "kPa": "kPa",
    "MPa": "MPa",
    "Pa": "Pa",
    "psi": "psi",
    "inHg": "inHg",
    "mmHg": "mmHg",
    "kgf/cm2": "kgf/cm**2",
}
LENGTH = {
    **dict.fromkeys(("mm", "millimeter", "millimetre"), "mm"),
    "cm": "cm",
    "m": "m",
    "um": "um",
    **dict.fromkeys(("in", "inch", '"'), "inch"),
    "ft": "ft",
}
AREA = {"mm2": "mm**2", "cm2": "cm**2", "m2": "m**2", "in2": "inch**2", "sqin": "inch**2", "ft2": "ft**2"}
VOLUME = {
    **dict.fromkeys(("L", "l", "dm3", "liter", "litre"), "L"),
    **dict.fromkeys(("mL", "ml", "cm3", "cc"), "cm**3"),
    "mm3": "mm**3",
    "m3": "m**3",
    **dict.fromkeys(("in3", "cuin"), "inch**3"),
    **dict.fromkeys(("ft3", "cuft", "cf"), "ft**3"),
    "gal": "gallon",
}
TIME = {
    **dict.fromkeys(("s", "sec"), "s"),
    "ms": "ms",
    "min": "min",
    "h": "hour",
}
MASS = {"kg": "kg", "g": "g", "t": "tonne", "lb": "lb", "lbs": "lb", "lbm": "lb", "oz": "oz"}
FORCE = {"N": "N", "kN": "kN", "kgf": "kgf", "lbf": "lbf", "ozf": "ozf"}
ENERGY = {
    "J": "J",
    "kJ": "kJ",
    "MJ": "MJ",
    "Wh": "W*hour",
    "kWh": "kWh",
    "MWh": "MWh",
    "ft*lbf": "ft*lbf",
    "Btu": "Btu_it",
}
VOLUME_FLOW = {
    f"{volume}/{time}": f"{VOLUME[volume]}/{TIME[time]}"
    for volume in ("L", "l", "dm3", "mL", "ml", "cm3", "m3", "ft3", "cuft")
    for time in ("s", "min", "h")
} | {"cfm": "ft**3/min", "cfh": "ft**3/hour", "lpm": "L/min"}

DIMENSIONS: dict[str, Dimension] = {
    "pressure": Dimension(
        name="a pressure",
        forms=PRESSURE,
        si=("bar gauge", "kPa absolute", "Pa absolute"),
        us=("psi gauge", "psi absolute", "Pa absolute"),
        example="6 bar gauge",
        reference="pressure",
    ),
    "pressure_difference": Dimension(
        name="a pressure difference",
        forms=PRESSURE,
        si=("bar", "mbar", "kPa", "Pa"),
        us=("psi",),
        example="0.3 bar",
    ),
    "temperature": Dimension(
        name="a temperature",
        forms={
            **dict.fromkeys(("degC", "C", "celsius"), "degC"),
            **dict.fromkeys(("degF", "F", "fahrenheit"), "degF"),
            "K": "kelvin",
            **dict.fromkeys(("degR", "R"), "degR"),
        },
        si=("degC", "K"),
        us=("degF", "degR"),
        example="20 degC",
    ),
    "temperature_difference": Dimension(
        name="a temperature difference",
        forms={
            "K": "kelvin",
            "degC": "delta_degC",
            **dict.fromkeys(("degF", "deltadegF"), "delta_degF"),
            "degR": "degR",
        },
        si=("K",),
        us=("degF",),
        example="10 K",
    ),
    "length": Dimension(name="a length", forms=LENGTH, si=("mm", "m"), us=("in", "ft"), example="50 mm"),
    "area": Dimension(name="an area", forms=AREA, si=("mm2", "cm2", "m2"), us=("in2", "ft2"), example="10 mm2"),
    "volume": Dimension(name="a volume", forms=VOLUME, si=("cm3", "L", "m3"), us=("in3", "ft3"), example="20 cm3"),
    "mass": Dimension(name="a mass", forms=MASS, si=("kg", "g", "t"), us=("lb", "oz"), example="20 kg"),
    "force": Dimension(name="a force", forms=FORCE, si=("N", "kN"), us=("lbf",), example="100 N"),
    "viscous": Dimension(
        name="a force per speed",
        forms={
            **dict.fromkeys(("N*s/m", "Ns/m", "N/(m/s)"), "N*s/m"),
            "N*s/mm": "N*s/mm",
            **dict.fromkeys(("lbf*s/in", "lbf/(in/s)"), "lbf*s/inch"),
            **dict.fromkeys(("lbf*s/ft", "lbf/(ft/s)"), "lbf*s/ft"),
        },
        si=("N*s/m",),
        us=("lbf*s/in",),
        example="30 N*s/m",
    ),
    "stiffness": Dimension(
        name="a force per length",
        forms={"N/m": "N/m", "N/mm": "N/mm", "kN/m": "kN/m", **dict.fromkeys(("lbf/in", "lb/in"), "lbf/inch")},
        si=("N/mm", "N/m"),
        us=("lbf/in",),
        example="0.5 N/mm",
    ),
    "speed": Dimension(
        name="a speed",
        forms={
            f"{way}/{time}": f"{LENGTH[way]}/{TIME[time]}"
            for way in ("mm", "cm", "m", "in", "ft")
            for time in ("s", "min")
        },
        si=("m/s", "mm/s"),
        us=("in/s", "ft/s"),
        example="20 mm/s",
    ),
    "frequency": Dimension(
        name="a frequency", forms={"Hz": "Hz", "kHz": "kHz"}, si=("Hz",), us=("Hz",), example="10 Hz"
    ),
    "acceleration": Dimension(
        name="an acceleration",
        forms={f"{way}/s2": f"{LENGTH[way]}/s**2" for way in ("mm", "m", "in", "ft")},
        si=("m/s2",),
        us=("ft/s2",),
        example="20 m/s2",
    ),
    "time": Dimension(
        name="a time", forms=TIME, si=("s", "ms", "min", "h"), us=("s", "ms", "min", "h"), example="1.2 s"
    ),
    "angle": Dimension(
        name="an angle",
        forms={**dict.fromkeys(("deg", "°", "degree", "degrees"), "deg"), "rad": "rad"},
        si=("deg", "rad"),
        us=("deg", "rad"),
        example="30 deg",
    ),
    "share": Dimension(
        name="a share",
        forms={"%": "percent", "percent": "percent"},
        si=("%", ""),
        us=("%", ""),
        example="85 %",
        bare=True,
    ),
    "number": Dimension(name="a number", forms={}, si=("",), us=("",), example="0.3", bare=True),
    "count": Dimension(name="a whole number", forms={}, si=("",), us=("",), example="1", bare=True),
    "conductance": Dimension(
        name="a sonic conductance",
        forms={
            **{
                f"{volume}/({time}*{pressure})": f"{VOLUME[volume]}/({TIME[time]}*{PRESSURE[pressure]})"
                for volume in ("dm3", "L", "l", "m3", "cm3", "ft3")
                for time in ("s", "min", "h")
                for pressure in ("bar", "Pa", "kPa", "MPa", "psi")
            },
            **{
                f"{volume}/{time}/{pressure}": f"{VOLUME[volume]}/({TIME[time]}*{PRESSURE[pressure]})"
                for volume in ("dm3", "L", "l", "m3", "ft3")
                for time in ("s", "min", "h")
                for pressure in ("bar", "Pa", "kPa", "psi")
            },
            "cfm/psi": "ft**3/(min*psi)",
        },
        si=("dm3/(s*bar)", "m3/(s*Pa)"),
        us=("dm3/(s*bar)", "m3/(s*Pa)"),
        example="2.0 dm3/(s*bar)",
    ),
    "heat_transfer": Dimension(
        name="a heat transfer coefficient",
        forms={
            **dict.fromkeys(("W/(m2*K)", "W/m2/K", "W/(m2K)", "W/m2K"), "W/(m**2*kelvin)"),
            **dict.fromkeys(
                ("Btu/(h*ft2*degF)", "BTU/(h*ft2*degF)", "Btu/(hr*ft2*degF)"), "Btu_it/(hour*ft**2*delta_degF)"
            ),
        },
        si=("W/(m2*K)",),
        us=("Btu/(h*ft2*degF)",),
        example="60 W/(m2*K)",
    ),
    "hours_per_year": Dimension(
        name="a number of hours a year",
        forms={**dict.fromkeys(("h/year", "h/yr", "h/a"), "1/8760"), "%": "percent"},
        si=("h/year", "%"),
        us=("h/year", "%"),
        example="4800 h/year",
    ),
    "volume_anr": Dimension(
        name="a volume of free air",
        forms=VOLUME,
        si=("L ANR", "m3 ANR"),
        us=("ft3 ANR",),
        example="5 L ANR",
        reference="free",
    ),
    "flow_anr": Dimension(
        name="a flow of free air",
        forms=VOLUME_FLOW,
        si=("L/min ANR", "m3/s ANR"),
        us=("cfm ANR",),
        example="300 L/min ANR",
        reference="free",
    ),
    "flow_fad": Dimension(
        name="a free air delivery",
        forms=VOLUME_FLOW,
        si=("m3/min FAD", "m3/s FAD"),
        us=("cfm FAD",),
        example="6 m3/min FAD",
        reference="intake",
    ),
    "mass_flow": Dimension(
        name="a mass flow",
        forms={
            f"{mass}/{time}": f"{MASS[mass]}/{TIME[time]}"
            for mass in ("kg", "g", "t", "lb")
            for time in ("s", "min", "h")
        },
        si=("g/s", "kg/s"),
        us=("lb/min",),
        example="2 g/s",
    ),
    "air_mass": Dimension(name="a mass of air", forms=MASS, si=("g", "kg"), us=("lb",), example="12 g"),
    "energy": Dimension(name="an energy", forms=ENERGY, si=("J", "kJ"), us=("ft*lbf", "J"), example="20 J"),
    "yearly_energy": Dimension(
        name="an energy a year",
        forms={f"{unit}/{year}": ENERGY[unit] for unit in ENERGY for year in ("year", "yr", "a")},
        si=("kWh/year", "J/year"),
        us=("kWh/year", "J/year"),
        example="1200 kWh/year",
    ),
    "specific_energy": Dimension(
        name="an energy per mass",
        forms={
            f"{energy}/{mass}": f"{ENERGY[energy]}/{MASS[mass]}"
            for energy in ("J", "kJ", "MJ", "kWh", "Btu")
            for mass in ("kg", "g", "lb")
        },
        si=("kJ/kg", "J/kg"),
        us=("Btu/lb", "J/kg"),
        example="350 kJ/kg",
    ),
    "power": Dimension(
        name="a power",
        forms={"W": "W", "kW": "kW", "MW": "MW", "hp": "hp", "PS": "metric_horsepower"},
        si=("kW", "W"),
        us=("hp", "kW"),
        example="37 kW",
    ),
    "energy_price": Dimension(
        name="a price of energy",
        forms={f"/{unit}": f"1/({ENERGY[unit]})" for unit in ("kWh", "MWh", "MJ", "J")},
        si=("/kWh", "/J"),
        us=("/kWh", "/J"),
        example="0.18 /kWh",
        money=True,
    ),
    "carbon_intensity": Dimension(
        name="a mass of CO2 per energy",
        forms={
            f"{mass}{what}/{energy}": f"{MASS[mass]}/({ENERGY[energy]})"
            for mass in ("kg", "g", "t", "lb")
            for what in ("", "CO2", "CO2e")
            for energy in ("kWh", "MWh", "MJ", "J")
        },
        si=("kg/kWh", "kg/J"),
        us=("lb/kWh", "kg/kWh", "kg/J"),
        example="0.35 kg/kWh",
    ),
    "carbon": Dimension(
        name="a mass of CO2 a year",
        forms={f"{mass}/{year}": MASS[mass] for mass in ("kg", "t", "lb") for year in ("year", "yr", "a")},
        si=("kg/year",),
        us=("lb/year", "kg/year"),
        example="900 kg/year",
    ),
    "money": Dimension(
        name="a sum of money a year",
        forms=dict.fromkeys(("/year", "/yr", "/a"), "1"),
        si=("/year",),
        us=("/year",),
        example="1 234 EUR/year",
        money=True,
    ),
    "energy_per_volume": Dimension(
        name="an energy per volume of free air",
        forms={
            f"{energy}/{unit}": f"{ENERGY[energy]}/({VOLUME[unit]})"
            for energy in ("J", "kJ", "kWh")
            for unit in ("m3", "ft3")
        },
        si=("kWh/m3 ANR",),
        us=("kWh/ft3 ANR", "kWh/m3 ANR"),
        example="0.1 kWh/m3 ANR",
        reference="free",
    ),
    "price_air": Dimension(
        name="a price of free air",
        forms={f"/{unit}": f"1/({VOLUME[unit]})" for unit in ("m3", "L", "ft3")},
        si=("/m3 ANR",),
        us=("/ft3 ANR", "/m3 ANR"),
        example="0.02 EUR/m3 ANR",
        reference="free",
        money=True,
    ),
}
"""Rows by :attr:`actuator.kinds.Kind.dimension`."""

GAUGE = ("gauge", "(gauge)", "(g)", "g")
ABSOLUTE = ("absolute", "(absolute)", "abs", "(abs)", "(a)", "a")

INTAKE = "FAD"
"""Volume at the compressor's own intake: a state of the site, not of a standard."""
