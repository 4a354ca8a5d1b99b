"""The design's example gives the parts that one reads from it; what is left out follows its rule."""

from __future__ import annotations

import math

import pytest

from actuator.parts import (
    Actuator,
    Friction,
    Holding,
    Load,
    Machine,
    ProcessForce,
    Project,
    Require,
    Site,
    Spread,
    Throttle,
    Valve,
)
from actuator.project.document import Document, demo, parse, template
from actuator.project.validate import validate
from tests.project.samples import sample, short


def project_of(document: Document) -> Project:
    """The project of a document that has no problems."""
    checked = validate(document)
    assert isinstance(checked, Project), checked
    return checked


def test_the_example_of_the_design_in_si() -> None:
    assert project_of(sample()) == Project(
        title="Carton line, hall B",
        site=Site(ambient_pressure=101_300.0, ambient_temperature=293.15, relative_humidity=0.65),
        machines=(
            Machine(
                name="Carton erector",
                quantity=1,
                supply_pressure=701_300.0,
                supply_temperature=293.15,
                cycle_time=4.0,
                hours=4800.0 / 8760.0,
                utilisation=0.85,
                actuators=(
                    Actuator(
                        name="Pusher",
                        kind="double-acting",
                        bore=0.05,
                        rod=0.02,
                        stroke=0.4,
                        dead_volume_cap=20e-6,
                        dead_volume_rod=20e-6,
                        mounting="front flange",
                        rod_end="fixed-guided",
                        closed_length=0.09,
                        bearing_length=0.025,
                        return_pressure=701_300.0,
                        extend_at=0.0,
                        retract_at=2.0,
                        wall_heat_transfer=60.0,
                        load=Load(
                            mass=20.0,
                            process_force=(ProcessForce(start=0.38, end=0.4, force=300.0),),
                        ),
                        friction=Friction(breakaway=90.0, coulomb=60.0, viscous=30.0, stribeck_speed=0.02),
                        valve=Valve(
                            supply_c=2e-8,
                            supply_b=0.3,
                            exhaust_c=2e-8,
                            exhaust_b=0.3,
                            function="5/2 spring",
                            delay=0.015,
                            opening_time=0.005,
                        ),
                        throttle=Throttle(kind="meter-out", extend_c=1.2e-8, retract_c=1.2e-8, b=0.3, free_c=3e-8),
                        holding=Holding(rod_lock=0.0),
                        require=Require(stroke_time=1.2, force_reserve=0.3, buckling_safety=4.0, force_at_end=0.0),
                    ),
                ),
            ),
        ),
    )


def test_what_is_left_out_follows_the_stated_rules() -> None:
    machine = project_of(short()).machines[0]
    pusher, lift = machine.actuators
    area = math.pi / 4 * 0.05**2
    assert machine.supply_temperature == 293.15
    assert pusher.dead_volume_cap == pytest.approx(0.1 * 0.05 * area)
    assert pusher.dead_volume_rod == pytest.approx(0.1 * 0.05 * (area - math.pi / 4 * 0.02**2))
    assert pusher.friction.breakaway == pytest.approx(0.08 * 6e5 * area)
    assert pusher.friction.coulomb == pytest.approx(0.05 * 6e5 * area)
    assert pusher.friction.viscous == pytest.approx(30.0)
    assert pusher.friction.stribeck_speed == 0.02
    assert (pusher.extend_at, pusher.retract_at, lift.retract_at) == (0.0, 2.0, 3.0)
    assert pusher.closed_length == 0.05
    assert pusher.bearing_length == 0.025
    assert pusher.holding == Holding()
    assert pusher.spread == Spread(supply_pressure=3e4, friction=0.3, mass=0.1, conductance=0.1, delay=0.2)
    assert pusher.throttle.kind == "none"
    assert (pusher.valve.exhaust_c, pusher.valve.exhaust_b) == (2e-8, 0.3)
    assert pusher.require == Require()
    assert pusher.return_pressure is None
    assert (pusher.wall_heat_transfer, pusher.polytropic_index) == (60.0, None)


@pytest.mark.parametrize(
    ("mounting", "length"),
    [
        ("foot", 0.05),
        ("front flange", 0.05),
        ("front trunnion", 0.05),
        ("rear flange", 0.4 + 0.15),
        ("rear pin", 0.4 + 0.15),
        ("mid trunnion", 0.2 + 0.075),
    ],
)
def test_closed_length_follows_the_mounting(mounting: str, length: float) -> None:
    document = short().edited("machine.actuator.1.mounting", mounting)
    assert project_of(document).machines[0].actuators[0].closed_length == pytest.approx(length)


def test_supply_temperature_follows_the_ambient() -> None:
    assert project_of(short().edited("site.ambient_temperature", "35 degC")).machines[0].supply_temperature == 308.15


def test_gauge_and_defaults_count_from_the_site() -> None:
    high = project_of(short().edited("site.ambient_pressure", "80 kPa absolute"))
    assert high.machines[0].supply_pressure == 680_000.0
    assert high.plant.compressors[0].rated_pressure == 830_000.0
    assert high.machines[0].actuators[0].friction.breakaway == pytest.approx(0.08 * 6e5 * math.pi / 4 * 0.05**2)


def test_exhaust_follows_the_supply_path() -> None:
    valve = project_of(short().edited("machine.actuator.1.valve.supply_b", "0.4")).machines[0].actuators[0].valve
    assert (valve.supply_b, valve.exhaust_b) == (0.4, 0.4)


@pytest.mark.parametrize(
    ("key", "text", "conductance", "tolerance"),
    [
        ("supply_cv", "1", 4.0e-8, 0.05),
        ("supply_kv", "0.865", 4.0e-8, 0.05),
        ("supply_qn", "254.5 L/min ANR", 1e-8, 1e-3),
        ("supply_qn", "234.1 NL/min DIN1343", 1.0155e-8, 2e-3),
        ("supply_s", "5.0 mm2", 1e-8, 0.01),
    ],
)
def test_other_numbers_of_the_trade_give_the_conductance(
    key: str, text: str, conductance: float, tolerance: float
) -> None:
    """C = 4 Cv in dm3/(s*bar), Kv = 0.865 Cv, S = 5.0 C in mm2: common rules, which scatter by 5 % (from memory).

    254.5 L/min ANR from 6 to 5 bar gauge is C = 1 by the formula of ISO 6358 at b = 0.3. Normal litres are
    counted by the mass of dry air (1.2931/1.1703), 1.5 % more than by pressure and temperature alone (1.0874).
    """
    document = short().edited("machine.actuator.1.valve.supply_c", "").edited(f"machine.actuator.1.valve.{key}", text)
    valve = project_of(document).machines[0].actuators[0].valve
    assert valve.supply_c == pytest.approx(conductance, rel=tolerance)
    assert valve.exhaust_c == valve.supply_c


def test_one_replaces_the_other() -> None:
    document = short().edited("machine.actuator.1.polytropic_index", "1.2")
    pusher = project_of(document).machines[0].actuators[0]
    assert (pusher.wall_heat_transfer, pusher.polytropic_index) == (None, 1.2)
    plant = project_of(short().edited("plant.compressor.polytropic_efficiency", "75 %")).plant
    assert (plant.compressors[0].isentropic_efficiency, plant.compressors[0].polytropic_efficiency) == (None, 0.75)


def test_prices_are_read_in_the_currency_of_the_document() -> None:
    document = short().edited("money.energy", "0.12 USD/kWh").edited("money.currency", "USD")
    assert project_of(document).money.energy == pytest.approx(0.12 / 3.6e6, rel=1e-15)


def test_starting_documents_check_clean() -> None:
    metric, inch = project_of(parse(template("si"))), project_of(parse(template("us")))
    assert metric.machines[0].actuators[0].bore == 0.05
    assert inch.machines[0].actuators[0].bore == 0.0508
    assert inch.machines[0].supply_pressure == pytest.approx((14.7 + 90.0) * 6894.757, rel=1e-6)


def test_the_demo_plant_checks_clean_and_says_that_it_is_invented() -> None:
    project = project_of(demo())
    assert demo().path is None
    assert "INVENTED" in demo().source.splitlines()[0]
    assert "Invented" in project.title
    assert [actuator.name for machine in project.machines for actuator in machine.actuators] == [
        "Pusher",
        "Lift",
        "Clamp",
        "Stopper",
    ]
