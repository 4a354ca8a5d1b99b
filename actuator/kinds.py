"""Kinds of quantity: what a float means, in which unit, and what it may be.

A part declares each field once, ``bore: Annotated[Length, Entry("Bore", "...")]``; schema, form label,
range check, JSON suffix and report column all read that declaration.
"""

from __future__ import annotations

import dataclasses
import math
import types
import typing
from dataclasses import dataclass
from functools import cache
from typing import Annotated, Any, Literal

from actuator.errors import InputError, Problem


@dataclass(frozen=True, slots=True, kw_only=True)
class Kind:
    """Meaning, SI unit and range of a float.

    Attributes
    ----------
    dimension : str
        Row of the unit table in ``units.py`` that text of this kind is read and shown by.
    unit : str
        SI unit of the number inside, in pint's grammar; ``"1"`` for none.
    suffix : str
        What ends a JSON key of this kind, ``"_m"``; empty for plain numbers.
    above, at_least, below, at_most : float or None
        Range in the SI unit. [unit]
    """

    dimension: str
    unit: str
    suffix: str = ""
    above: float | None = None
    at_least: float | None = None
    below: float | None = None
    at_most: float | None = None

    def fault(self, value: float) -> str:
        """What is wrong with ``value`` (in the SI unit), or an empty text."""
        if not math.isfinite(value):
            return "a finite number is needed"
        if self.above is not None and not value > self.above:
            return f"must be above {self.above:g} {self.unit}"
        if self.at_least is not None and not value >= self.at_least:
            return f"must be at least {self.at_least:g} {self.unit}"
        if self.below is not None and not value < self.below:
            return f"must be below {self.below:g} {self.unit}"
        if self.at_most is not None and not value <= self.at_most:
            return f"must be at most {self.at_most:g} {self.unit}"
        return ""


@dataclass(frozen=True, slots=True)
class Entry:
    """How a field shows in forms, messages and the schema.

    Attributes
    ----------
    label : str
        Short name, at most 22 characters.
    help : str
        One sentence: what it is, from where to where it is measured.
    default : str
        Where a default is computed or taken: its rule and source in words
        (``"8 % of (p_s - p0)*A, common practice, no source"``).
    key : str
        Key in the document where it differs from the field's name.
    example : str
        Text that is valid for the field, shown in messages.
    """

    label: str
    help: str
    default: str = ""
    key: str = ""
    example: str = ""


AbsPressure = Annotated[float, Kind(dimension="pressure", unit="Pa", suffix="_Pa", above=0.0)]
PressureDifference = Annotated[float, Kind(dimension="pressure_difference", unit="Pa", suffix="_Pa")]
Temperature = Annotated[float, Kind(dimension="temperature", unit="K", suffix="_K", above=0.0)]
TemperatureDifference = Annotated[float, Kind(dimension="temperature_difference", unit="K", suffix="_K", at_least=0.0)]
Length = Annotated[float, Kind(dimension="length", unit="m", suffix="_m", above=0.0)]
Position = Annotated[float, Kind(dimension="length", unit="m", suffix="_m", at_least=0.0)]
Area = Annotated[float, Kind(dimension="area", unit="m**2", suffix="_m2", above=0.0)]
Volume = Annotated[float, Kind(dimension="volume", unit="m**3", suffix="_m3", above=0.0)]
Mass = Annotated[float, Kind(dimension="mass", unit="kg", suffix="_kg", above=0.0)]
Force = Annotated[float, Kind(dimension="force", unit="N", suffix="_N")]
OpposingForce = Annotated[float, Kind(dimension="force", unit="N", suffix="_N", at_least=0.0)]
Stiffness = Annotated[float, Kind(dimension="stiffness", unit="N/m", suffix="_N_m", at_least=0.0)]
Viscous = Annotated[float, Kind(dimension="viscous", unit="N*s/m", suffix="_N_s_m", at_least=0.0)]
Speed = Annotated[float, Kind(dimension="speed", unit="m/s", suffix="_m_s", at_least=0.0)]
PositiveSpeed = Annotated[float, Kind(dimension="speed", unit="m/s", suffix="_m_s", above=0.0)]
Frequency = Annotated[float, Kind(dimension="frequency", unit="Hz", suffix="_Hz", at_least=0.0)]
Acceleration = Annotated[float, Kind(dimension="acceleration", unit="m/s**2", suffix="_m_s2", at_least=0.0)]
Time = Annotated[float, Kind(dimension="time", unit="s", suffix="_s", at_least=0.0)]
Period = Annotated[float, Kind(dimension="time", unit="s", suffix="_s", above=0.0)]
Angle = Annotated[float, Kind(dimension="angle", unit="rad", suffix="_rad", at_least=-math.pi / 2, at_most=math.pi / 2)]
Share = Annotated[float, Kind(dimension="share", unit="1", at_least=0.0, at_most=1.0)]
PositiveShare = Annotated[float, Kind(dimension="share", unit="1", above=0.0, at_most=1.0)]
Ratio = Annotated[float, Kind(dimension="share", unit="1", at_least=0.0)]
Deviation = Annotated[float, Kind(dimension="share", unit="1", at_least=0.0, at_most=0.9)]
"""Largest relative deviation from a value, either way. [1]"""
PressureDeviation = Annotated[float, Kind(dimension="pressure_difference", unit="Pa", suffix="_Pa", at_least=0.0)]
"""Largest deviation from a pressure, either way. [Pa]"""
Number = Annotated[float, Kind(dimension="number", unit="1", at_least=0.0)]
PositiveNumber = Annotated[float, Kind(dimension="number", unit="1", above=0.0)]
Index = Annotated[float, Kind(dimension="number", unit="1", at_least=1.0, at_most=1.4)]
CriticalRatio = Annotated[float, Kind(dimension="number", unit="1", at_least=0.0, at_most=0.9)]
SubsonicIndex = Annotated[float, Kind(dimension="number", unit="1", at_least=0.3, at_most=1.0)]
Conductance = Annotated[float, Kind(dimension="conductance", unit="m**3/(s*Pa)", suffix="_m3_s_Pa", above=0.0)]
HeatTransfer = Annotated[float, Kind(dimension="heat_transfer", unit="W/(m**2*K)", suffix="_W_m2_K", at_least=0.0)]
HoursPerYear = Annotated[float, Kind(dimension="hours_per_year", unit="1", at_least=0.0, at_most=1.0)]
"""Share of the 8760 h of a year; typed as ``4800 h/year``. [1]"""
VolumeANR = Annotated[float, Kind(dimension="volume_anr", unit="m**3", suffix="_anr_m3", at_least=0.0)]
FlowANR = Annotated[float, Kind(dimension="flow_anr", unit="m**3/s", suffix="_anr_m3_s", at_least=0.0)]
FlowFAD = Annotated[float, Kind(dimension="flow_fad", unit="m**3/s", suffix="_fad_m3_s", above=0.0)]
"""Volume per second at the compressor's own intake state. [m³/s]"""
MassFlow = Annotated[float, Kind(dimension="mass_flow", unit="kg/s", suffix="_kg_s")]
AirMass = Annotated[float, Kind(dimension="air_mass", unit="kg", suffix="_kg")]
Energy = Annotated[float, Kind(dimension="energy", unit="J", suffix="_J")]
YearlyEnergy = Annotated[float, Kind(dimension="yearly_energy", unit="J", suffix="_J")]
SpecificEnergy = Annotated[float, Kind(dimension="specific_energy", unit="J/kg", suffix="_J_kg")]
EnergyPerANR = Annotated[float, Kind(dimension="energy_per_volume", unit="J/m**3", suffix="_J_m3")]
"""Electricity per volume of free air, ANR. [J/m³]"""
Power = Annotated[float, Kind(dimension="power", unit="W", suffix="_W", above=0.0)]
EnergyPrice = Annotated[float, Kind(dimension="energy_price", unit="1/J", at_least=0.0)]
"""Money per joule of electricity, in the document's currency. [1/J]"""
CarbonIntensity = Annotated[float, Kind(dimension="carbon_intensity", unit="kg/J", at_least=0.0)]
CarbonYear = Annotated[float, Kind(dimension="carbon", unit="kg", suffix="_kg")]
MoneyYear = Annotated[float, Kind(dimension="money", unit="1")]
PriceAir = Annotated[float, Kind(dimension="price_air", unit="1/m**3")]
Count = Annotated[int, Kind(dimension="count", unit="1", at_least=1.0)]


def kind_of(alias: Any) -> Kind:
    """The :class:`Kind` inside one of the aliases of this module."""
    return next(item for item in alias.__metadata__ if isinstance(item, Kind))


@dataclass(frozen=True, slots=True, kw_only=True)
class FieldSpec:
    """One field of a part, as its declaration says it.

    Attributes
    ----------
    name, key : str
        Attribute of the part; key in the document.
    kind : Kind or None
        None for text, choices, nested parts and lists of parts.
    entry : Entry or None
        None where the field is no entry of the document (``machines`` of a project, ...).
    choices : tuple of str
        Allowed words of a choice; empty otherwise.
    part : type or None
        Class of a nested part, or of the items of a list of parts.
    is_list, is_text, is_count, is_flag, optional, required : bool
        ``is_flag``: true or false; ``optional`` admits None; ``required`` has neither default nor rule.
    default : object
        The declared default; ``dataclasses.MISSING`` where there is none.
    """

    name: str
    key: str
    kind: Kind | None
    entry: Entry | None
    choices: tuple[str, ...]
    part: type | None
    is_list: bool
    is_text: bool
    is_count: bool
    is_flag: bool = False
    optional: bool
    required: bool
    default: Any


def _peel(hint: Any) -> tuple[Any, tuple[Any, ...], bool]:
    """Bare type, metadata and whether None is admitted."""
    metadata: tuple[Any, ...] = ()
    optional = False
    while True:
        if typing.get_origin(hint) is Annotated:
            metadata = (*hint.__metadata__, *metadata)
            hint = hint.__origin__
        elif typing.get_origin(hint) in (types.UnionType, typing.Union):
            left = [item for item in typing.get_args(hint) if item is not type(None)]
            optional, hint = True, left[0]
        else:
            return hint, metadata, optional


@cache
def fields_of(part: type[Any]) -> tuple[FieldSpec, ...]:
    """Specifications of a part's fields, in order of declaration."""
    hints = typing.get_type_hints(part, include_extras=True)
    found = []
    for field in dataclasses.fields(part):
        bare, metadata, optional = _peel(hints[field.name])
        kind = next((item for item in metadata if isinstance(item, Kind)), None)
        entry = next((item for item in metadata if isinstance(item, Entry)), None)
        is_list = typing.get_origin(bare) is tuple
        inner = typing.get_args(bare)[0] if is_list else bare
        default = field.default
        if default is dataclasses.MISSING and field.default_factory is not dataclasses.MISSING:
            default = field.default_factory()
        found.append(
            FieldSpec(
                name=field.name,
                key=entry.key if entry and entry.key else field.name,
                kind=kind,
                entry=entry,
                choices=tuple(typing.get_args(bare)) if typing.get_origin(bare) is Literal else (),
                part=inner if dataclasses.is_dataclass(inner) and isinstance(inner, type) else None,
                is_list=is_list,
                is_text=bare is str,
                is_count=bare is int,
                is_flag=bare is bool,
                optional=optional,
                required=default is dataclasses.MISSING and not (entry and entry.default),
                default=default,
            )
        )
    return tuple(found)


def check(part: Any) -> None:
    """Check a part's own floats against their kinds; parts call this when they are built.

    Raises
    ------
    InputError
        With one problem for each field that is out of range.
    """
    problems = []
    for spec in fields_of(part.__class__):
        value = getattr(part, spec.name)
        if spec.kind is not None and value is not None and not spec.is_list:
            fault = spec.kind.fault(float(value))
            if fault:
                problems.append(Problem(path=spec.key, given=f"{value!r} {spec.kind.unit}", allowed=fault))
        elif spec.choices and value not in spec.choices:
            problems.append(Problem(path=spec.key, given=str(value), allowed="one of " + ", ".join(spec.choices)))
    if problems:
        raise InputError(*problems)
