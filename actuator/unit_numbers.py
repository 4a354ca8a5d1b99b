"""Exact numbers: typed digits to the nearest float, and a float to the fewest digits that mean it."""

from __future__ import annotations

import re
from dataclasses import dataclass
from decimal import Decimal
from fractions import Fraction

from actuator.unit_faults import UnitFault

NUMBER = re.compile(
    r"\s*([+-]?)(?=\.?[0-9])([0-9]{1,3}(?: [0-9]{3})+(?![0-9])|[0-9]*)(?:\.([0-9]*))?(?:[eE]([+-]?[0-9]+))?"
)
"""Sign, whole part with or without grouping spaces, decimals, power of ten."""

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
_MOST_POWER = 400
"""Powers of ten beyond this leave the range of a float whatever the unit."""


def plain(text: str) -> str:
    """Text with typographic signs in their plain form."""
    return text if text.isascii() else text.translate(_PLAIN)


@dataclass(frozen=True, slots=True)
class Scale:
    """value = number * up / down + shift_up / shift_down (+ ambient), whole numbers throughout.

    Attributes
    ----------
    up, down, shift_up, shift_down : int
        Factor and offset as ratios; the offset is for thermometer scales. [1]
    gauge : bool
        The number counts from the ambient pressure.
    """

    up: int
    down: int
    shift_up: int
    shift_down: int
    gauge: bool


def value_of(match: re.Match[str], scale: Scale, ambient: float) -> float:
    """Float nearest to the typed number, in SI.

    Parameters
    ----------
    match : re.Match
        Of :data:`NUMBER`.
    scale : Scale
        Of the typed unit.
    ambient : float
        Absolute pressure that gauge readings count from. [Pa]

    Returns
    -------
    float

    Raises
    ------
    UnitFault
        Where the number is beyond the range of a float.
    """
    sign, whole, fraction, power = match.groups()
    fraction = fraction or ""
    digits = int(whole.replace(" ", "") + fraction)
    exponent = int(power or 0) - len(fraction) if digits else 0
    if exponent > _MOST_POWER:
        raise UnitFault("is too large a number; write a smaller one")
    if exponent < -_MOST_POWER:
        raise UnitFault("is too small a number to be told from zero; write 0 or a larger one")
    up = (-digits if sign == "-" else digits) * scale.up
    down = scale.down
    if exponent >= 0:
        up *= 10**exponent
    else:
        down *= 10**-exponent
    if scale.shift_up:
        up, down = up * scale.shift_down + scale.shift_up * down, down * scale.shift_down
    if scale.gauge:
        ambient_up, ambient_down = ambient.as_integer_ratio()
        up, down = up * ambient_down + ambient_up * down, down * ambient_down
    try:
        value = up / down
    except OverflowError:
        raise UnitFault("is too large a number; write a smaller one") from None
    if value == 0.0 and up:
        raise UnitFault("is too small a number to be told from zero; write 0 or a larger one")
    return value


def exact(value: float, scale: Scale, ambient: float) -> Fraction:
    """Number in a unit that stands for an SI value, exactly."""
    left = Fraction(value) - Fraction(scale.shift_up, scale.shift_down)
    if scale.gauge:
        left -= Fraction(ambient)
    return left * scale.down / scale.up


def shortest(value: float, scale: Scale, ambient: float) -> str:
    """Fewest digits in one unit that read back to ``value``; empty where 25 are not enough."""
    number = exact(value, scale, ambient)
    for digits in range(1, 26):
        text = decimal(number, digits)
        match = NUMBER.match(text)
        assert match is not None
        if value_of(match, scale, ambient) == value:
            return text
    return ""


def decimal(number: Fraction, digits: int) -> str:
    """Exact ratio rounded to significant digits, without power of ten where that stays short."""
    if not number:
        return "0"
    places = digits - 1 - (Decimal(number.numerator) / Decimal(number.denominator)).adjusted()
    rounded = Decimal(round(number * Fraction(10) ** places)).scaleb(-places).normalize()
    text = f"{rounded:f}"
    return text if len(text) <= 25 else f"{rounded:e}"


def figures(number: float, digits: int) -> str:
    """Significant figures for a person; thousands grouped from five digits on."""
    size = abs(number)
    if size == 0.0:
        return "0"
    if not 1e-4 <= size < 1e9:
        return f"{number:.{digits - 1}e}"
    rounded = Decimal(f"{size:.{digits - 1}e}")
    places = max(digits - 1 - rounded.adjusted(), 0)
    if rounded < 10000:
        return f"{number:.{places}f}"
    return f"{number:,.{places}f}".replace(",", " ")
