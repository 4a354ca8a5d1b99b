"""Writing and showing: what we write reads back to the same float, what we show to the same figures."""

from __future__ import annotations

import math
from typing import Any, Literal

import pint
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from actuator.kinds import Kind
from actuator.unit_table import DIMENSIONS
from actuator.units import Reading, UnitFault, read, scale, show, write
from tests.units.aliases import KINDS

SYSTEMS = st.sampled_from(["si", "us"])
System = Literal["si", "us"]


def values(kind: Kind) -> st.SearchStrategy[float]:
    """Floats that a kind admits, from the smallest to the largest that still mean something."""
    low = kind.above if kind.above is not None else kind.at_least if kind.at_least is not None else -1e12
    high = kind.below if kind.below is not None else kind.at_most if kind.at_most is not None else 1e12
    if kind.dimension == "count":
        return st.integers(1, 10**9).map(float)
    some = st.floats(low, high, exclude_min=kind.above is not None, allow_subnormal=False)
    return some.filter(lambda value: value == 0.0 or abs(value) > 1e-30)


@st.composite
def quantities(draw: st.DrawFn) -> tuple[Kind, float]:
    kind = draw(st.sampled_from(list(KINDS.values())))
    return kind, draw(values(kind))


AMBIENT = st.floats(50_000.0, 120_000.0).map(lambda p: Reading(ambient_pressure=p))


@settings(deadline=None, max_examples=400)
@given(quantities(), AMBIENT, SYSTEMS)
def test_what_is_written_reads_back_to_the_same_float(
    quantity: tuple[Kind, float], reading: Reading, system: System
) -> None:
    kind, value = quantity
    assert read(write(value, kind, reading, system), kind, reading) == value


@settings(deadline=None, max_examples=300)
@given(quantities(), AMBIENT, SYSTEMS)
def test_what_is_shown_reads_back_to_the_shown_figures(
    quantity: tuple[Kind, float], reading: Reading, system: System
) -> None:
    kind, value = quantity
    number, unit = show(value, kind, reading, system)
    factor, offset, same = scale(kind, system, reading)
    assert unit == same
    shown = float(number.replace(" ", ""))
    size = max(abs(value * factor), abs(offset))
    assert shown == pytest.approx(value * factor + offset, rel=5.1e-4, abs=1e-12 * size)
    free = Kind(dimension=kind.dimension, unit=kind.unit)  # a rounded limit may fall outside the range
    back = read(f"{number} {unit}", free, reading)
    assert back == pytest.approx(value, abs=abs(shown / factor) * 5.1e-4 + 1e-9 * abs(offset / factor))


NEAR = "1 6 0.3 . - e e9 E-7 bar gauge (g) psig mm N l / min ANR FAD DIN1343 s cfm % ° C EUR /kWh nan inf , h/year ²"
PIECES = st.sampled_from([*NEAR.split(), " ", "\u2009"])
TEXTS = st.text(max_size=130) | st.lists(PIECES, max_size=8).map("".join)


@settings(deadline=None, max_examples=1000)
@given(TEXTS, st.sampled_from(list(KINDS.values())))
def test_any_text_is_read_or_refused_in_words(text: str, kind: Kind) -> None:
    told = ""
    try:
        value = read(text, kind, Reading())
    except UnitFault as fault:
        told, value = str(fault), math.nan
    assert bool(told) != (math.isfinite(value) and not kind.fault(value))


@pytest.mark.parametrize(
    ("value", "kind", "system", "number", "unit"),
    [
        (701_300.0, "AbsPressure", "si", "6.000", "bar gauge"),
        (101_300.0, "AbsPressure", "si", "0", "bar gauge"),
        (721_828.156385, "AbsPressure", "us", "90.00", "psi gauge"),
        (0.4134, "Time", "si", "0.4134", "s"),
        (0.05, "Length", "si", "50.00", "mm"),
        (0.05, "Length", "us", "1.969", "in"),
        (293.15, "Temperature", "si", "20.00", "degC"),
        (293.15, "Temperature", "us", "68.00", "degF"),
        (2e-8, "Conductance", "si", "2.000", "dm3/(s*bar)"),
        (0.012, "AirMass", "si", "12.00", "g"),
        (12345.6, "Force", "si", "12 346", "N"),
        (9999.96, "Force", "si", "10 000", "N"),
        (4.321e-7, "Energy", "si", "4.321e-07", "J"),
        (5e-8, "EnergyPrice", "si", "0.1800", "EUR/kWh"),
        (4800 / 8760, "HoursPerYear", "si", "4800", "h/year"),
        (0.005, "FlowANR", "si", "300.0", "L/min ANR"),
        (0.65, "Share", "si", "65.00", "%"),
        (0.3, "CriticalRatio", "si", "0.3000", ""),
        (2.0, "Count", "si", "2", ""),
        (1234.5, "MoneyYear", "si", "1234", "EUR/year"),
    ],
)
def test_figures_for_a_person(value: float, kind: str, system: System, number: str, unit: str) -> None:
    assert show(value, KINDS[kind], Reading(), system) == (number, unit)


@pytest.mark.parametrize(
    ("value", "kind", "system", "text"),
    [
        (0.05, "Length", "si", "50 mm"),
        (0.0508, "Length", "us", "2 in"),
        (701_300.0, "AbsPressure", "si", "6 bar gauge"),
        (0.015, "Time", "si", "15 ms"),
        (4.0, "Time", "si", "4 s"),
        (2e-8, "Conductance", "si", "2 dm3/(s*bar)"),
        (0.65, "Share", "si", "65 %"),
        (5e-8, "EnergyPrice", "si", "0.18 EUR/kWh"),
        (0.3, "CriticalRatio", "si", "0.3"),
    ],
)
def test_the_shortest_text_is_written(value: float, kind: str, system: System, text: str) -> None:
    assert write(value, KINDS[kind], Reading(), system) == text


def test_every_unit_of_the_table_has_the_dimension_of_its_kinds() -> None:
    registry: Any = pint.UnitRegistry(cache_folder=None)
    own = {"1/8760": "1"}  # an hour of a year, which pint would count as 365.25 days
    for name, dimension in DIMENSIONS.items():
        inside = {kind.unit for kind in KINDS.values() if kind.dimension == name}
        assert len(inside) == 1, name
        wanted = registry.Quantity(1.0, inside.pop()).dimensionality
        for spelling, expression in dimension.forms.items():
            assert registry.Quantity(1.0, own.get(expression, expression)).dimensionality == wanted, (name, spelling)


def test_every_spelling_of_the_table_is_read() -> None:
    kinds = {kind.dimension: Kind(dimension=kind.dimension, unit=kind.unit) for kind in KINDS.values()}
    words = {"pressure": " absolute", "free": " ANR", "intake": " FAD", "": ""}
    for name, dimension in DIMENSIONS.items():
        for spelling in dimension.forms:
            assert read(f"1 {spelling}{words[dimension.reference]}", kinds[name], Reading()) > 0.0
        for unit in (*dimension.si, *dimension.us, dimension.example.lstrip("0123456789. ")):
            assert read(f"1 {unit}", kinds[name], Reading()) > 0.0
        assert read(dimension.example, kinds[name], Reading()) > 0.0
