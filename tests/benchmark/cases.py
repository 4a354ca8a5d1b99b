"""What is measured: one actuator, twenty of them in one document, and many different half strokes."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from actuator.parts import Actuator, Machine, Project, Site
from actuator.project.document import parse
from actuator.project.validate import validate
from actuator.stroke.rows import Case, flow_paths

_HEAD = """
format = 1

[[machine]]
name = "Invented machine"
supply_pressure = "6 bar gauge"
cycle_time = "4 s"
"""

_ACTUATOR = """
[[machine.actuator]]
name = "Pusher {number}"
bore = "50 mm"
rod = "20 mm"
stroke = "{stroke} mm"
dead_volume_cap = "20 cm3"
dead_volume_rod = "20 cm3"
retract_at = "2 s"

[machine.actuator.load]
mass = "20 kg"

[machine.actuator.friction]
breakaway = "90 N"
coulomb = "60 N"
viscous = "30 N*s/m"
stribeck_speed = "20 mm/s"

[machine.actuator.valve]
supply_c = "2.0 dm3/(s*bar)"
delay = "0 ms"
opening_time = "0 ms"
"""


def document(actuators: int) -> str:
    """Text of a document with so many actuators on one machine, all different."""
    return _HEAD + "".join(_ACTUATOR.format(number=number, stroke=400 - 5 * number) for number in range(actuators))


def one() -> tuple[Actuator, Machine, Site]:
    """The actuator of the document of one."""
    project = validate(parse(document(1)))
    assert isinstance(project, Project)
    return project.machines[0].actuators[0], project.machines[0], project.site


def different(count: int, seed: int = 1) -> list[Case]:
    """So many different actuators: bore 25 to 100 mm, stroke 50 to 600 mm, load, valve, weight, ramp and walls."""
    rng = np.random.default_rng(seed)
    part, machine, site = one()
    found: list[Case] = []
    for _ in range(count):
        bore = float(rng.choice([0.025, 0.032, 0.04, 0.05, 0.063, 0.08, 0.1]))
        area = 0.25 * np.pi * bore**2
        force = 6e5 * area
        supply = float(rng.uniform(0.5, 2.0)) * 1e-8 * (bore / 0.05) ** 2
        varied = replace(
            part,
            bore=bore,
            rod=0.4 * bore if bore < 0.05 else 0.32 * bore,
            stroke=float(rng.uniform(0.05, 0.6)),
            dead_volume_cap=area * float(rng.uniform(0.005, 0.03)),
            dead_volume_rod=area * float(rng.uniform(0.005, 0.03)),
            wall_heat_transfer=float(rng.uniform(20.0, 100.0)),
            load=replace(
                part.load,
                mass=force / 600.0 * float(rng.uniform(2.0, 20.0)),
                extend_force=force * float(rng.uniform(0.0, 0.4)),
                inclination=float(rng.choice([0.0, 0.0, 0.5])),
            ),
            friction=replace(part.friction, breakaway=0.08 * force, coulomb=0.05 * force, viscous=600.0 * bore),
            valve=replace(
                part.valve,
                supply_c=supply,
                exhaust_c=supply * float(rng.uniform(0.3, 1.0)),
                opening_time=float(rng.choice([0.0, 0.005])),
            ),
        )
        found.append((varied, replace(machine, cycle_time=20.0, actuators=(varied,)), site, flow_paths(varied)))
    return found
