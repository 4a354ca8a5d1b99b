"""The extended rod as a beam: limits, and the same by integrating its bending."""

from __future__ import annotations

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.integrate import quad

from actuator.mechanics.buckling import BORES, E_STEEL, default_closed_length
from actuator.mechanics.sag import extended_rod, gland_load, overhang, tip_sag

quick = settings(deadline=None, max_examples=60, derandomize=True, database=None)
sizes = st.floats(0.01, 2.0)
forces = st.floats(0.0, 2000.0)


@quick
@given(forces, forces, sizes, st.floats(1e-11, 1e-6))
def test_sag_is_the_bending_moment_integrated_twice(load: float, weight: float, length: float, inertia: float) -> None:
    """δ = ∫ M(x)·x/(E·I) dx from the free end, by the unit-load method and scipy."""
    found, _ = quad(lambda x: (load * x + 0.5 * weight * x * x) * x / (E_STEEL * inertia), 0.0, length)
    assert tip_sag(load=load, weight=weight, length=length, inertia=inertia) == pytest.approx(found, rel=1e-9)


@quick
@given(forces, st.floats(1.0, 2000.0), sizes, sizes)
def test_moments_about_the_gland_balance(load: float, weight: float, length: float, bearing: float) -> None:
    """What the piston carries follows from the sum of forces; its moment holds the overhang."""
    gland = gland_load(load=load, weight=weight, length=length, bearing_length=bearing)
    piston = gland - load - weight * (length + bearing)
    inside, _ = quad(lambda s: weight * (s - length), 0.0, length + bearing)
    assert piston * bearing + inside == pytest.approx(load * length, rel=1e-9, abs=1e-9 * gland * bearing)


def test_an_upright_rod_without_side_load_neither_sags_nor_leans() -> None:
    upright = extended_rod(
        rod=0.02, bore=0.05, stroke=0.4, mounting="foot", closed_length=0.05, bearing_length=0.025,
        inclination=math.pi / 2.0,
    )  # fmt: skip
    assert upright.sag == pytest.approx(0.0, abs=1e-15)
    assert upright.bearing_load == pytest.approx(0.0, abs=1e-12)


@pytest.mark.parametrize("mounting", sorted(BORES))
def test_the_barrel_is_no_part_of_the_overhang(mounting: str) -> None:
    """By default one bore stands out of the gland when retracted, whatever holds the barrel."""
    closed = default_closed_length(mounting, 0.05, 0.4)
    assert overhang(mounting, 0.05, 0.4, closed) == pytest.approx(0.45)
    assert overhang(mounting, 0.05, 0.4, closed + 0.1) == pytest.approx(0.55)
    assert overhang(mounting, 0.05, 0.4, 1e-3) == pytest.approx(0.4, abs=1.1e-3)
