"""Text to SI and back: number, unit, reference word. The only module that imports pint.

pint supplies exact factors, once per unit; numbers stay whole-number ratios until the last division, so
that what is read is the float nearest to what was typed.
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from decimal import Decimal
from fractions import Fraction
from functools import cache, lru_cache
from typing import Any, cast

from actuator.air.states import STATES, dry_density
from actuator.errors import ActuatorError
from actuator.kinds import Kind
from actuator.unit_faults import explain_range, explain_unit
from actuator.unit_table import ABSOLUTE, DIMENSIONS, GAUGE, INTAKE, Dimension, System

_NUMBER = re.compile(
    r"\s*([+-]?)(?=\.?[0-9])([0-9]{1,3}(?: [0-9]{3})+(?![0-9])|[0-9]*)(?:\.([0-9]*))?(?:[eE]([+-]?[0-9]+))?"
)
_PLAIN = str.maketrans(
    {
        "\u2009": " ",  # thin, no-break and narrow no-break space group thousands
        "\u00a0": " ",
        "\u202f": " ",
        "\u2212": "-",
        "·": "*",
        "⋅": "*",
        "×": "*",
        "²": "2",
        "³": "3",
        "µ": "u",
        "μ": "u",
    }
)
_LONGEST = 100
"""Characters of a quantity; longer text is refused before any arithmetic."""


class UnitFault(ActuatorError, ValueError):
    """A quantity that cannot be read; the text says what to write instead."""


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


@dataclass(frozen=True, slots=True)
class _Scale:
    """value = number * up / down + shift_up / shift_down (+ ambient), whole numbers throughout."""

    up: int
    down: int
    shift_up: int
    shift_down: int
    gauge: bool


@cache
def _registry() -> Any:
    """Pint's registry with exact fractions (loaded at the first conversion)."""
    import pint

    return pint.UnitRegistry(non_int_type=Fraction, cache_folder=None)


@cache
def _factor(expression: str) -> tuple[Fraction, Fraction]:
    """Exact factor and offset of a pint expression to SI base units."""
    if expression in ("1", "1/8760"):
        return Fraction(expression), Fraction(0)
    registry = _registry()
    zero, one = (
        Fraction(registry.Quantity(Fraction(count), expression).to_base_units().magnitude) for count in (0, 1)
    )
    return one - zero, zero


@lru_cache(maxsize=4096)
def _scale_of(name: str, unit: str) -> _Scale | None:
    """Scale of a unit text in one dimension; None where the closed table has none."""
    dimension = DIMENSIONS[name]
    found = _split(dimension, "".join(unit.split()))
    if found is None:
        return None
    expression, reference = found
    factor, offset = _factor(expression)
    if dimension.reference == "free" and reference != "ANR":
        share = Fraction(dry_density(reference)) / Fraction(dry_density("ANR"))
        factor = factor / share if dimension.money else factor * share
    return _Scale(
        factor.numerator, factor.denominator, offset.numerator, offset.denominator, reference == "gauge"
    )


def _split(dimension: Dimension, unit: str) -> tuple[str, str] | None:
    """Pint expression and reference word of a unit text without spaces."""
    if not dimension.reference:
        if not unit and dimension.bare:
            return "1", ""
        expression = dimension.forms.get(unit.replace("°", "deg") if unit != "°" else unit)
        return None if expression is None else (expression, "")
    if dimension.reference == "pressure":
        words = [(word, "gauge") for word in GAUGE] + [(word, "absolute") for word in ABSOLUTE]
    elif dimension.reference == "free":
        words = [(form, state) for state in STATES for form in (state, f"({state})")]
    else:
        words = [(INTAKE, INTAKE), (f"({INTAKE})", INTAKE)]
    for word, reference in words:
        if unit.endswith(word):
            bare = unit[: -len(word)]
            if reference.startswith("SCFM") or reference == "DIN1343":
                bare = bare.removeprefix("s" if reference.startswith("SCFM") else "N")
            if bare in dimension.forms:
                return dimension.forms[bare], reference
    return None


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
    """
    dimension = DIMENSIONS[kind.dimension]
    plain = text if text.isascii() else text.translate(_PLAIN)
    match = _NUMBER.match(plain)
    unit = plain[match.end() :].strip() if match else ""
    if dimension.money and unit[:3] == reading.currency:
        unit = unit[3:].lstrip()
    scale = None
    if match is not None and len(plain) <= _LONGEST:
        scale = _scale_of(kind.dimension, unit)
    if match is None or scale is None:
        raise UnitFault(explain_unit(plain, match.end() if match else 0, kind, reading.currency))
    value = _value(match, scale, reading.ambient_pressure)
    if kind.dimension == "count" and value != int(value):
        raise UnitFault('must be a whole number, e.g. "1"')
    if kind.fault(value):
        raise UnitFault(explain_range(kind, value, lambda limit: _limit_text(limit, kind, unit, reading)))
    return value


def _value(match: re.Match[str], scale: _Scale, ambient: float) -> float:
    """Float nearest to the typed number, in SI."""
    sign, whole, fraction, power = match.groups()
    fraction = fraction or ""
    digits = int(whole.replace(" ", "") + fraction)
    exponent = int(power or 0) - len(fraction)
    if not digits:
        exponent = 0
    if exponent > 400:
        raise UnitFault("is too large a number")
    if exponent < -500:
        raise UnitFault("is too small a number to be told from 0; write 0")
    up = (-digits if sign == "-" else digits) * scale.up
    down = scale.down
    if exponent >= 0:
        up *= 10**exponent
    else:
        down *= 10**-exponent
    if scale.shift_up:
        up, down = up * scale.shift_down + scale.shift_up * down, down * scale.shift_down
    if scale.gauge:
        whole_up, whole_down = ambient.as_integer_ratio()
        up, down = up * whole_down + whole_up * down, down * whole_down
    try:
        value = up / down
    except OverflowError:
        raise UnitFault("is too large a number") from None
    if value == 0.0 and up:
        raise UnitFault("is too small a number to be told from 0; write 0")
    return value


def _limit_text(limit: float, kind: Kind, unit: str, reading: Reading) -> str:
    """A limit of the kind, in the unit that was typed."""
    scale = _scale_of(kind.dimension, unit)
    assert scale is not None
    number = _exact(limit, scale, reading)
    return " ".join(f"{float(number):.4g} {unit}".split())


def _exact(value: float, scale: _Scale, reading: Reading) -> Fraction:
    """Number in a unit that stands for an SI value, exactly."""
    left = Fraction(value) - Fraction(scale.shift_up, scale.shift_down)
    if scale.gauge:
        left -= Fraction(reading.ambient_pressure)
    return left * scale.down / scale.up


def _unit_text(unit: str, kind: Kind, reading: Reading) -> str:
    """Unit text as shown: a price gets its currency."""
    return reading.currency + unit if DIMENSIONS[kind.dimension].money else unit


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
    unit = getattr(DIMENSIONS[kind.dimension], system)[0]
    found = _scale_of(kind.dimension, unit)
    assert found is not None
    zero = _exact(0.0, found, reading)
    return float(Fraction(found.down, found.up)), float(zero), _unit_text(unit, kind, reading)


def show(
    value: float, kind: Kind, reading: Reading, system: System = "si", digits: int = 4
) -> tuple[str, str]:
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
    unit = getattr(DIMENSIONS[kind.dimension], system)[0]
    found = _scale_of(kind.dimension, unit)
    assert found is not None
    number = float(_exact(value, found, reading))
    text = f"{number:.0f}" if kind.dimension == "count" else _figures(number, digits)
    return text, _unit_text(unit, kind, reading)


def _figures(number: float, digits: int) -> str:
    """Significant figures; thousands grouped from five digits on."""
    size = abs(number)
    if size == 0.0:
        return "0"
    if not 1e-4 <= size < 1e9:
        return f"{number:.{digits - 1}e}"
    rounded = Decimal(f"{size:.{digits - 1}e}")
    places = max(digits - 1 - rounded.adjusted(), 0)
    text = f"{number:.{places}f}"
    return f"{number:,.{places}f}".replace(",", " ") if size >= 10000.0 else text


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
    units = cast("tuple[str, ...]", getattr(DIMENSIONS[kind.dimension], system))
    found = [text for unit in units if (text := _shortest(value, kind, unit, reading))]
    return min(found, key=len)


def _shortest(value: float, kind: Kind, unit: str, reading: Reading) -> str:
    """Fewest digits in one unit that read back to ``value``; empty where 25 are not enough."""
    found = _scale_of(kind.dimension, unit)
    assert found is not None
    number = _exact(value, found, reading)
    unit = _unit_text(unit, kind, reading)
    for digits in range(1, 26):
        text = f"{_decimal(number, digits)} {unit}".rstrip()
        match = _NUMBER.match(text)
        assert match is not None
        if _value(match, found, reading.ambient_pressure) == value:
            return text
    return ""


def _decimal(number: Fraction, digits: int) -> str:
    """Exact ratio rounded to significant digits, without exponent where that stays short."""
    if not number:
        return "0"
    places = digits - 1 - Decimal(f"{float(number):e}").adjusted()
    rounded = Decimal(round(number * Fraction(10) ** places)).scaleb(-places)
    plain = f"{rounded.normalize():f}"
    return plain if len(plain) <= 25 else f"{rounded.normalize():e}"
