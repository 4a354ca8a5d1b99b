"""Sag and bearing load of the rod against printed beams."""

from __future__ import annotations

import math

import pytest

from actuator.mechanics.sag import gland_load, rod_weight, tip_sag


def test_cantilever_with_a_load_at_its_end() -> None:
    # Bansal, A Textbook of Strength of Materials, problem 13.1 (companion read; the book from memory): 3 m, 25 kN,
    # I 1e8 mm⁴, E 2.1e5 N/mm²: 10.71 mm
    sag = tip_sag(load=25e3, weight=0.0, length=3.0, inertia=1e8 * 1e-12, modulus=2.1e11)
    assert sag * 1e3 == pytest.approx(10.71, abs=0.005)


def test_cantilever_with_a_load_all_along() -> None:
    # The same, problem 13.3: 2.5 m, 16.4 kN/m, I 7.95e7 mm⁴, E 2e5 N/mm²: 5.036 mm
    sag = tip_sag(load=0.0, weight=16.4e3, length=2.5, inertia=7.95e7 * 1e-12, modulus=2e11)
    assert sag * 1e3 == pytest.approx(5.036, abs=0.0005)


def test_both_loads_at_once() -> None:
    # Problem 13.4 read backwards: 120 × 200 mm, 2.5 m, E 2e5 N/mm², 16.384 kN/m sag 5 mm; a load at the end of W·3/8
    # of a uniform W sags as much (both formulas in any strength text): 10 mm
    whole = 16.384e3
    inertia = 0.120 * 0.200**3 / 12.0
    sag = tip_sag(load=whole * 2.5 * 3.0 / 8.0, weight=whole, length=2.5, inertia=inertia, modulus=2e11)
    assert sag * 1e3 == pytest.approx(10.0, abs=0.005)


@pytest.mark.parametrize(("overhang", "times"), [(0.5, 1.5), (1.0, 2.0), (3.0, 4.0)])
def test_support_next_to_an_overhang(overhang: float, times: float) -> None:
    # Beam over two supports, load F on its overhanging end (tables of beam formulas, tquigley.com/T310.htm, seen):
    # R2 = F·(l + a)/l; with a = l/2 that is 3F/2, as in Gere, Mechanics of Materials, section 9.5 (from memory)
    assert gland_load(load=100.0, weight=0.0, length=overhang, bearing_length=1.0) == pytest.approx(100.0 * times)


def test_weight_of_a_steel_rod() -> None:
    # Tables of round steel bar (from memory): 20 mm 2.47 kg/m, 12 mm 0.888 kg/m
    for diameter, mass in ((0.020, 2.47), (0.012, 0.888)):
        assert rod_weight(diameter, 0.0) / 9.80665 == pytest.approx(mass, rel=0.5 / 247)
    assert rod_weight(0.020, math.pi / 3.0) == pytest.approx(0.5 * rod_weight(0.020, 0.0))
