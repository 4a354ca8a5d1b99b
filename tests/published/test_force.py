"""Static forces and buckling against printed figures."""

from __future__ import annotations

import math

import pytest
from scipy.constants import inch, pound_force, psi

from actuator.errors import Refusal
from actuator.mechanics.buckling import (
    END_FACTORS,
    column,
    end_factor,
    euler_load,
    transition_slenderness,
)
from actuator.mechanics.force import required_bore, theoretical_extend, theoretical_retract

KIP = 1000.0 * pound_force


def test_push_of_a_32_mm_cylinder() -> None:
    # Value usually printed for 32 mm at 6 bar gauge (from memory): 483 N
    assert theoretical_extend(7e5, 1e5, 0.032) == pytest.approx(483.0, abs=0.5)


def test_push_of_a_50_mm_cylinder() -> None:
    # Trade article, writeupcafe.com, how pneumatic cylinders power modern manufacturing: 50 mm at 6 bar: 1,178 N
    assert theoretical_extend(7e5, 1e5, 0.050) == pytest.approx(1178.0, abs=0.5)


def test_pressures_of_a_cylinder_with_a_rod() -> None:
    # Esposito, Fluid Power with Applications, ex. 6-1: 2 in bore, 1 in rod, 1000 lb both ways: 318 and 425 psi (the
    # last rounded up). Force over area, whatever the fluid
    atmosphere = 14.7 * psi
    push = theoretical_extend(atmosphere + 318.0 * psi, atmosphere, 2.0 * inch)
    pull = theoretical_retract(atmosphere + 425.0 * psi, atmosphere, 2.0 * inch, 1.0 * inch)
    assert push / pound_force == pytest.approx(1000.0, rel=0.5 / 318.0)
    assert pull / pound_force == pytest.approx(1000.0, rel=1.0 / 425.0)


def test_bore_back_from_the_load() -> None:
    # The same example, read backwards: 318 psi carry 1000 lb on 2 in, friction and reserve zero
    atmosphere = 14.7 * psi
    bore = required_bore(
        p_extend=atmosphere + 318.0 * psi,
        p_retract=atmosphere + 425.0 * psi,
        p_ambient=atmosphere,
        load_extend=1000.0 * pound_force,
        load_retract=1000.0 * pound_force,
        friction_share=0.0,
        rod_ratio=0.5,
    )
    assert not isinstance(bore, Refusal)
    assert bore / inch == pytest.approx(2.0, rel=1e-3)


def test_euler_load_of_a_column_held_in_the_middle() -> None:
    # Gere, Mechanics of Materials, ex. 11.1, p. 763: E 29 000 ksi, I 21.7 in⁴, 25 ft held half way, safety 2.5: 110 kip
    load = euler_load(29e6 * psi, 21.7 * inch**4, 25.0 * 12.0 * inch / 2.0)
    assert load / 2.5 / KIP == pytest.approx(110.0, abs=0.5)


def test_validity_of_euler_for_mild_steel() -> None:
    # Strength texts (from memory): Euler's formula above a slenderness of about 105, yield 355 MPa taken for the rod
    assert transition_slenderness() == pytest.approx(105.0, rel=0.05)


THEORY = {
    ("fixed", "fixed-guided"): 0.5,
    ("fixed", "hinged-guided"): 0.7,
    ("hinged", "fixed-guided"): 0.7,
    ("hinged", "hinged-guided"): 1.0,
    ("fixed", "free"): 2.0,
}
"""Theoretical end factors in any strength text (from memory)."""


def test_recommended_end_factors() -> None:
    # AISC 360-16, commentary, table C-A-7.1 (from memory): 0.65, 0.80, 1.0, 2.10; never below theory
    assert end_factor("front flange", "fixed-guided") == pytest.approx(0.65)
    assert end_factor("front flange", "hinged-guided") == pytest.approx(0.80)
    assert end_factor("rear pin", "hinged-guided") == pytest.approx(1.0)
    assert end_factor("front flange", "free") == pytest.approx(2.10)
    assert THEORY.keys() == END_FACTORS.keys()
    assert all(END_FACTORS[ends] >= theory for ends, theory in THEORY.items())


def test_euler_load_of_a_slender_rod_by_hand() -> None:
    # π²·E·I/L² with I = π/64·d⁴, 20 mm and 1 m by a pocket calculator: 9.8696 × 210e9 × 7.854e-9 = 16 278 N
    rod = column(0.020, 1.0)
    assert rod.rule == "Euler"
    assert rod.load == pytest.approx(16_278.0, abs=1.0)
    assert math.isclose(rod.slenderness, 200.0)
