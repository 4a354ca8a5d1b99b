"""Natural frequency of a cylinder against textbook figures."""

from __future__ import annotations

import math

import pytest

from actuator.mechanics.force import area_cap
from actuator.stroke.dynamics import natural_frequency


@pytest.mark.parametrize(("index", "printed"), [(1.4, 7.92), (1.0, 6.69)])
def test_equal_areas_in_the_middle_of_the_stroke(index: float, printed: float) -> None:
    # Textbooks of pneumatic drives (from memory): ω² = 4·n·p·A/(m·L); bore 50 mm, stroke 0.2 m, 10 kg, 4.5 bar
    # absolute: 7.92 Hz adiabatic, 6.69 Hz isothermal
    area = area_cap(0.050)
    half = area * 0.1
    found = natural_frequency(4.5e5, 4.5e5, half, half, area_cap=area, area_rod=area, mass=10.0, index=index)
    assert float(found) == pytest.approx(printed, abs=0.005)


def test_a_mass_on_a_steel_spring_alone() -> None:
    # Any text on vibrations: f = √(k/m)/(2·π); 1 kg on 4·π² N/m swings once a second
    found = natural_frequency(1e5, 1e5, 1.0, 1.0, area_cap=0.0, area_rod=0.0, mass=1.0, spring_rate=4.0 * math.pi**2)
    assert float(found) == pytest.approx(1.0, rel=1e-12)
