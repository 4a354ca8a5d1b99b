"""Documents that several tests read."""

from __future__ import annotations

from actuator.project.document import Document, parse
from actuator.project.schema import sheet

SAMPLE = """\
format = 1
title = "Carton line, hall B"            # demo: invented plant

[site]
ambient_pressure = "101.3 kPa absolute"
ambient_temperature = "20 degC"
relative_humidity = "65 %"

[[machine]]
name = "Carton erector"
quantity = 1
supply_pressure = "6 bar gauge"           # at the machine inlet
supply_temperature = "20 degC"
cycle_time = "4 s"
hours = "4800 h/year"
utilisation = "85 %"

[[machine.actuator]]
name = "Pusher"
kind = "double-acting"                    # spring-return, spring-extend, through-rod, rodless
bore = "50 mm"
rod = "20 mm"
stroke = "400 mm"
dead_volume_cap = "20 cm3"                # without tubes
dead_volume_rod = "20 cm3"
mounting = "front flange"                 # foot, rear flange, rear pin, front trunnion, mid trunnion
rod_end = "fixed-guided"                  # hinged-guided, free
closed_length = "90 mm"                   # mounting plane or pin to rod end, retracted
return_pressure = "6 bar gauge"           # lower supply for the retract stroke, if regulated
side_load = "0 N"                         # across the rod at its end
bearing_length = "25 mm"                  # piston to gland, extended
extend_at = "0 s"                         # valve commands within the machine's cycle
retract_at = "2 s"
wall_heat_transfer = "60 W/(m2*K)"        # or polytropic_index = 1.2

[machine.actuator.load]
mass = "20 kg"                            # everything that moves
inclination = "0 deg"                     # above the horizontal; + means extending lifts
guide_friction = 0.0                      # coefficient
extend_force = "0 N"                      # opposing, whole stroke
retract_force = "0 N"
constant_force = "0 N"                    # signed, always acting, + = extending
process_force = [{ from = "380 mm", to = "400 mm", force = "300 N" }]   # extending only

[machine.actuator.friction]               # left out: 8 % and 5 % of (p_s − p0)·A, 0.6 N*s/m per mm bore, 20 mm/s
breakaway = "90 N"
coulomb = "60 N"
viscous = "30 N*s/m"
stribeck_speed = "20 mm/s"

[machine.actuator.valve]
supply_c = "2.0 dm3/(s*bar)"              # supply to cylinder port
supply_b = 0.30
exhaust_c = "2.0 dm3/(s*bar)"             # cylinder port to atmosphere
exhaust_b = 0.30
function = "5/2 spring"                   # 5/2 detent, 5/3 closed, 5/3 exhausted, 5/3 pressurised
delay = "15 ms"                           # command to first opening
opening_time = "5 ms"

[machine.actuator.throttle]               # one-way flow control at the ports
kind = "meter-out"                        # meter-in, none
extend_c = "1.2 dm3/(s*bar)"              # acts while extending
retract_c = "1.2 dm3/(s*bar)"
b = 0.3
free_c = "3 dm3/(s*bar)"                  # through the check valve

[machine.actuator.holding]
supply_check = false
pilot_check = false
rod_lock = "0 N"

[machine.actuator.require]                # what the job asks; left out = not judged
stroke_time = "1.2 s"                     # each way, command to end
force_reserve = "30 %"
buckling_safety = 4.0
force_at_end = "0 N"                      # and how long after arrival it stands

[machine.actuator.spread]                 # worst-case pair and bands
supply_pressure = "0.3 bar"
friction = "30 %"
mass = "10 %"
conductance = "10 %"
delay = "20 %"
"""
"""The example of the design: every field that format 1 has in this version."""

SHORT = """\
format = 1

[[machine]]
name = "Packer"
supply_pressure = "6 bar gauge"
cycle_time = "4 s"

[[machine.actuator]]
name = "Pusher"
bore = "50 mm"
rod = "20 mm"
stroke = "400 mm"
load.mass = "20 kg"
valve.supply_c = "2 dm3/(s*bar)"

[[machine.actuator]]
name = "Lift 1.5"
bore = "63 mm"
rod = "20 mm"
stroke = "200 mm"
retract_at = "3 s"
[machine.actuator.load]
mass = "30 kg"
[machine.actuator.valve]
supply_c = "3 dm3/(s*bar)"
"""
"""Only what is needed, two actuators, one with dotted keys."""

PATHS = [row.path for actuator in (1, 2) for group in sheet(1, actuator) for row in group.fields]
"""Every field of the forms of two actuators."""


def sample() -> Document:
    """The design's example."""
    return parse(SAMPLE)


def short() -> Document:
    """The document that leaves out what may be left out."""
    return parse(SHORT)
