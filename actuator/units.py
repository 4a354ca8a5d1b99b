"""Text to SI and back: number, unit, reference word. The only module that imports pint.

pint supplies exact factors, once per unit; numbers stay whole-number ratios until the last division, so
that what is read is the float nearest to what was typed.
"""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from functools import cache, lru_cache
from typing import Any

from actuator.air.states import STATES, dry_density
from actuator.kinds import Kind
from actuator.unit_faults import LONGEST, UnitFault, explain_range, explain_share, explain_unit
from actuator.unit_numbers import NUMBER, Scale, exact, figures, plain, shortest, value_of
from actuator.unit_table import ABSOLUTE, DIMENSIONS, GAUGE, INTAKE, Dimension, System


@dataclass(frozen=True, slots=True)
class Reading:
    """What gauge pressures and prices are referred to.

    Attributes
    ----------
    ambient_pressure : float
        Absolute pressure that gauge readings count from. [Pa]
    currency : str
        ISO 4217 code that prices are in.
    """

    ambient_pressure: float = 101300.0
    currency: str = "EUR"


@cache
def _registry() -> Any:
    """Pint's registry with exact fractions (loaded at the first conversion)."""
    import pint

    return pint.UnitRegistry(non_int_type=Fraction, cache_folder=None)


@cache
def _factor(expression: str) -> tuple[Fraction, Fraction]:
    """Exact factor and offset of a pint expression to SI base units."""
    if expression in ("1", "1/8760"):  # a plain number, and an hour of the year of 8760 h
        return Fraction(expression), Fraction(0)
    registry = _registry()
    zero, one = (Fraction(registry.Quantity(Fraction(count), expression).to_base_units().magnitude) for count in (0, 1))
    return one - zero, zero


@lru_cache(maxsize=4096)
def _scale_of(name: str, unit: str) -> Scale | None:
    """Scale of a unit text in one dimension; None where the closed table has none."""
    dimension = DIMENSIONS[name]
    found = _split(dimension, "".join(unit.split()))
    if found is None:
        return None
    expression, reference = found
    factor, offset = _factor(expression)
    if dimension.reference == "free" and reference != "ANR":
        share = Fraction(dry_density(reference)) / Fraction(dry_density("ANR"))  # equal mass of dry air
        factor = factor / share if dimension.money else factor * share
    return Scale(factor.numerator, factor.denominator, offset.numerator, offset.denominator, reference == "gauge")


def _split(dimension: Dimension, unit: str) -> tuple[str, str] | None:
    """Pint expression and reference word of a unit text without spaces."""
    if not dimension.reference:
        if not unit and dimension.bare:
            return "1", ""
        expression = dimension.forms.get(unit) or dimension.forms.get(unit.replace("°", "deg"))
        return None if expression is None else (expression, "")
    for word, reference in _words(dimension.reference):
        if not unit.endswith(word):
            continue
        bare = unit[: -len(word)]
        if reference.startswith("SCFM"):
            bare = bare.removeprefix("s")  # "scfm", "Nm3/h": their state is named
        elif reference == "DIN1343":
            bare = bare.removeprefix("N")
        if bare in dimension.forms:
            return dimension.forms[bare], reference
    return None


def _words(reference: str) -> list[tuple[str, str]]:
    """Reference words as typed, and what each means."""
    if reference == "pressure":
        return [(word, "gauge") for word in GAUGE] + [(word, "absolute") for word in ABSOLUTE]
    states = list(STATES) if reference == "free" else [INTAKE]
    return [(form, state) for state in states for form in (state, f"({state})")]


def read(text: str, kind: Kind, reading: Reading) -> float:
    """Read a quantity as typed.

    Parameters
    ----------
    text : str
        Number, unit, and where it matters a reference word: ``"6 bar gauge"``.
    kind : Kind
        What is expected.
    reading : Reading
        Ambient pressure for gauge readings, currency of prices.

    Returns
    -------
    float
        In the kind's SI unit, pressures absolute. [kind.unit]

    Raises
    ------
    UnitFault
        Saying what to write instead.

    Examples
    --------
    >>> from actuator.kinds import AbsPressure, kind_of
    >>> read("6 bar gauge", kind_of(AbsPressure), Reading(ambient_pressure=1e5))
    700000.0
    """
    dimension = DIMENSIONS[kind.dimension]
    typed = plain(text)
    match = NUMBER.match(typed)
    unit = typed[match.end() :].strip() if match else ""
    if dimension.money and unit[:3] == reading.currency:
        unit = unit[3:].lstrip()
    scale = _scale_of(kind.dimension, unit) if match is not None and len(typed) <= LONGEST else None
    if match is None or scale is None:
        raise UnitFault(explain_unit(typed, match.end() if match else 0, kind, reading.currency))
    value = value_of(match, scale, reading.ambient_pressure)
    if kind.dimension == "count" and value != int(value):
        raise UnitFault('must be a whole number, e.g. "1"')
    if kind.dimension == "share" and not unit and value > 1.0:
        raise UnitFault(explain_share(typed.strip(), value))
    if kind.fault(value):
        ambient = reading.ambient_pressure
        raise UnitFault(
            explain_range(kind, value, lambda limit: f"{float(exact(limit, scale, ambient)):.4g} {unit}".strip())
        )
    return value


def _unit_text(unit: str, kind: Kind, reading: Reading) -> str:
    """Unit text as shown: a price gets its currency."""
    return reading.currency + unit if DIMENSIONS[kind.dimension].money else unit


def _shown(kind: Kind, system: System, reading: Reading) -> tuple[Scale, str]:
    """Scale and text of the one unit that a dimension is shown in."""
    dimension = DIMENSIONS[kind.dimension]
    unit = (dimension.us if system == "us" else dimension.si)[0]
    found = _scale_of(kind.dimension, unit)
    assert found is not None
    return found, _unit_text(unit, kind, reading)


def scale(kind: Kind, system: System, reading: Reading) -> tuple[float, float, str]:
    """Factor, offset and unit text for showing: shown = value * factor + offset.

    Parameters
    ----------
    kind : Kind
        What the values are.
    system : {"si", "us"}
        Trade units to show in.
    reading : Reading
        Ambient pressure for gauge readings, currency of prices.

    Returns
    -------
    tuple of float, float, str
    """
    found, unit = _shown(kind, system, reading)
    return float(Fraction(found.down, found.up)), float(exact(0.0, found, reading.ambient_pressure)), unit


def show(value: float, kind: Kind, reading: Reading, system: System = "si", digits: int = 4) -> tuple[str, str]:
    """Number and unit for a person, in one trade unit per dimension.

    Parameters
    ----------
    value : float
        In the kind's SI unit, pressures absolute. [kind.unit]
    kind : Kind
        What it is.
    reading : Reading
        Ambient pressure for gauge readings, currency of prices.
    system : {"si", "us"}, optional
    digits : int, optional
        Significant figures; whole numbers are never cut. [1]

    Returns
    -------
    tuple of str, str
        ``("6.000", "bar gauge")``.
    """
    found, unit = _shown(kind, system, reading)
    number = float(exact(value, found, reading.ambient_pressure))
    return f"{number:.0f}" if kind.dimension == "count" else figures(number, digits), unit


def write(value: float, kind: Kind, reading: Reading, system: System = "si") -> str:
    """Shortest text that :func:`read` turns into exactly this float.

    Parameters
    ----------
    value : float
        In the kind's SI unit, within the kind's range. [kind.unit]
    kind : Kind
        What it is.
    reading : Reading
        Ambient pressure for gauge readings, currency of prices.
    system : {"si", "us"}, optional

    Returns
    -------
    str
    """
    dimension = DIMENSIONS[kind.dimension]
    written = []
    for unit in dimension.us if system == "us" else dimension.si:
        found = _scale_of(kind.dimension, unit)
        assert found is not None
        number = shortest(value, found, reading.ambient_pressure)
        if number and not (dimension.name == "a share" and not unit and value > 1.0):
            written.append(f"{number} {_unit_text(unit, kind, reading)}".strip())
    return min(written, key=len)


__all__ = ["Reading", "UnitFault", "read", "scale", "show", "write"]
