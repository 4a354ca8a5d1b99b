"""Cautions: each where it belongs, none missing, all deferring to those who decide."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest
from scipy.integrate import quad

from actuator.cautions import BLOW_OFF_GAUGE, DECIDE, Caution, cautions, stored_energy
from actuator.errors import Refusal
from actuator.parts import Actuator, Machine, Project, Site
from actuator.parts.valve import ValveFunction
from actuator.stroke.result import StrokeResult
from tests.report.build import NO_STROKE, answer, stroke_result


def project() -> Project:
    found = answer().project
    assert found is not None
    return found


def told(
    actuator: Actuator | None = None,
    machine: Machine | None = None,
    stroke: StrokeResult | Refusal = NO_STROKE,
) -> dict[str, Caution]:
    given = project().machines[0]
    found = cautions(actuator or given.actuators[0], machine or given, Site(), stroke)
    return {item.path: item for item in found}


def test_every_caution_defers_and_names_its_source() -> None:
    found = told(project().machines[0].actuators[1], stroke=stroke_result(iter(np.arange(1.0, 200.0))))
    assert len(found) >= 8
    for item in found.values():
        assert item.text.endswith(DECIDE)
        assert item.source


def test_a_weight_without_lock_is_always_told() -> None:
    level, lift = project().machines[0].actuators
    assert "load.inclination" not in told(level)
    # 45 kg · 9.80665 m/s² = 441.3 N, by hand
    assert "with 441.3 N and retracts the piston" in told(lift)["load.inclination"].text
    hanging = replace(lift, load=replace(lift.load, inclination=-lift.load.inclination))
    assert "extends the piston" in told(hanging)["load.inclination"].text
    assert "does not hold it" in told(hanging)["load.inclination"].text
    light = replace(lift, load=replace(lift.load, mass=0.5))
    assert "friction is no lock" in told(light)["load.inclination"].text


@pytest.mark.parametrize(
    ("function", "words"),
    [
        ("5/2 spring", "the piston goes back"),
        ("5/2 detent", "completes its stroke"),
        ("5/3 closed", "creeps as seals leak"),
        ("5/3 exhausted", "the piston is free"),
        ("5/3 pressurised", "is driven out"),
    ],
)
def test_loss_of_signal_follows_the_valve_function(function: ValveFunction, words: str) -> None:
    actuator = project().machines[0].actuators[0]
    found = told(replace(actuator, valve=replace(actuator.valve, function=function)))
    assert words in found["valve.function"].text


def test_end_energy_and_slow_strokes_come_from_the_simulation() -> None:
    stroke = stroke_result(iter(np.arange(1.0, 200.0)))
    slow = replace(
        stroke,
        extend=replace(stroke.extend, end_energy=13.9, mean_speed=0.2),
        retract=replace(stroke.retract, end_energy=2.0, mean_speed=0.04),
    )
    found = told(stroke=slow)
    assert "Retracting, the load arrives with 2 J" in found["retract.end_energy"].text
    assert "40 mm/s lies below 50 mm/s" in found["retract.mean_speed"].text
    assert "extend.mean_speed" not in found
    stopped = replace(slow, extend=replace(slow.extend, completed=False))
    assert "sent back before it arrives" in told(stroke=stopped)["extend.position_reached"].text


def test_a_rod_that_sags_or_leans_on_its_gland_is_told() -> None:
    actuator = project().machines[0].actuators[0]
    assert not {"rod.sag", "rod.bearing_load"} & set(told(actuator))
    # 1000 N at 0.45 m of a 20 mm rod: F·L³/(3·E·I) = 18.4 mm, and 1000·(450 + 25)/25 = 19 kN on the gland, by hand
    loaded = told(replace(actuator, side_load=1000.0))
    assert "sags by 18.5 mm over 450 mm" in loaded["rod.sag"].text
    assert "carries 1.911e+04 N across the rod" in loaded["rod.bearing_load"].text


def test_first_stroke_after_venting_is_told_with_the_energy_to_compare() -> None:
    stroke = stroke_result(iter(np.arange(1.0, 200.0)))
    stroke = replace(stroke, extend=replace(stroke.extend, end_energy=13.9))
    actuator, machine = project().machines[0].actuators[0], project().machines[0]
    texts = [item.text for item in cautions(actuator, machine, Site(), stroke)]
    assert any("than the 13.9 J of the periodic cycle" in text for text in texts)
    assert any("first stroke after venting" in item.text for item in told().values())


def test_blow_off_rule_begins_at_30_psi() -> None:
    """30 psi: 29 CFR 1910.242(b), osha.gov; 1 psi = 6894.757 Pa."""
    assert pytest.approx(30 * 6894.757, rel=1e-6) == BLOW_OFF_GAUGE
    machine = project().machines[0]
    ambient = Site().ambient_pressure
    above = told(machine=replace(machine, supply_pressure=ambient + 2.1e5))
    below = told(machine=replace(machine, supply_pressure=ambient + 2.0e5))
    assert "1910.242(b)" in above["machine.supply_pressure"].source
    assert "machine.supply_pressure" not in below


def test_stored_energy_is_the_internal_energy_of_an_isentropic_expansion() -> None:
    """Against the integral of p dV from the full state to ambient pressure, by scipy."""
    p, volume, p0 = 11e5, 0.5, 1e5
    end = volume * (p / p0) ** (1 / 1.4)
    work, _ = quad(lambda v: p * (volume / v) ** 1.4, volume, end)
    assert stored_energy(p, volume, p0) == pytest.approx(work, rel=1e-9)


def test_trapped_air_is_told_as_pressure_times_volume() -> None:
    actuator, machine = project().machines[0].actuators[0], project().machines[0]
    site = Site(ambient_pressure=1e5)
    found = {item.path: item for item in cautions(actuator, machine, site, NO_STROKE)}
    # π/4·(50 mm)²·(400 mm + 5 mm of dead volume) = 0.795 L; 6 bar gauge times that = 4.77 bar·L, by hand
    assert "holds 0.795 L" in found["stroke"].text
    assert "p·V = 4.77 bar·L gauge" in found["stroke"].text
    empty = replace(machine, supply_pressure=site.ambient_pressure)
    assert "stroke" not in {item.path for item in cautions(actuator, empty, site, NO_STROKE)}
