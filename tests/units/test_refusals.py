"""What is refused, and that each message says what to write instead."""

from __future__ import annotations

import re

import pytest

from actuator.errors import ActuatorError
from actuator.units import Reading, UnitFault, read
from tests.units.aliases import KINDS

REFUSALS = [
    ("7 bar", "AbsPressure", 'say gauge or absolute: "7 bar gauge" or "7 bar absolute"'),
    ("7", "AbsPressure", 'say gauge or absolute: "7 bar gauge" or "7 bar absolute"'),
    ("90 psi", "AbsPressure", 'say gauge or absolute: "90 psi gauge" or "90 psi absolute"'),
    ("-1.2 bar gauge", "AbsPressure", "is below vacuum: must be above -1.013 bar gauge"),
    ("-1 bar absolute", "AbsPressure", "is below vacuum: must be above 0 bar absolute"),
    ("0 Pa absolute", "AbsPressure", "is below vacuum: must be above 0 Pa absolute"),
    ("0.3 bar gauge", "PressureDifference", 'a difference is neither gauge nor absolute: "0.3 bar"'),
    ("300 L/min", "FlowANR", '"300 L/min ANR" (20 degC, 100 kPa, 65 % RH (ISO 8778)) or "300 L/min DIN1343"'),
    ("5 L", "VolumeANR", 'say at which state the air is counted: "5 L ANR"'),
    ("20 scfm", "FlowANR", '"20 cfm SCFM-14.5-68F-dry" (68 degF, 14.5 psia, dry) or "20 cfm SCFM-14.696-60F-dry"'),
    ("20 SCFM", "FlowANR", 'e.g. "300 L/min ANR"'),
    ("20 Nl/min", "FlowANR", '"20 l/min DIN1343" (0 degC, 101.325 kPa, dry (DIN 1343)) or "20 l/min ANR"'),
    ("20 NL", "VolumeANR", '"NL" has more than one meaning: "20 L DIN1343"'),
    ("20 Nl", "VolumeANR", '"Nl" has more than one meaning: "20 l DIN1343"'),
    ("20 nl/min", "FlowANR", '"nl/min" has more than one meaning'),
    ("20 L/min FAD", "FlowANR", 'name a fixed state: "20 L/min ANR" or "20 L/min ISO1217"'),
    ("20 cfm", "FlowFAD", 'say that it is counted at the intake: "20 cfm FAD"'),
    ("6 m3/min ANR", "FlowFAD", 'is counted at the compressor\'s own intake: "6 m3/min FAD"'),
    ("1,5 mm", "Length", 'has a comma; write a decimal point, "1.5 mm", or no separator at thousands, "15 mm"'),
    ("1,234,5 mm", "Length", "has commas; write a decimal point"),
    ("nan mm", "Length", 'must be a finite number, e.g. "50 mm"'),
    ("NaN", "CriticalRatio", "must be a finite number"),
    ("inf mm", "Length", "must be a finite number"),
    ("-Infinity m", "Length", "must be a finite number"),
    ("1e400 mm", "Length", "is too large a number; write a smaller one"),
    ("1e310 m", "Length", "is too large a number; write a smaller one"),
    ("1e99999999 mm", "Length", "is too large a number; write a smaller one"),
    ("1e-400 mm", "Length", "is too small a number to be told from zero; write 0"),
    ("1e-99999999 N", "Force", "is too small a number to be told from zero; write 0"),
    ("9" * 101 + " mm", "Length", 'is too long; write a length, e.g. "50 mm"'),
    ("", "Length", 'is empty; write a length, e.g. "50 mm"'),
    ("   ", "Length", "is empty"),
    ("mm", "Length", 'must start with a number, e.g. "50 mm"'),
    ("fifty mm", "Length", "must start with a number"),
    ("５０ mm", "Length", "must start with a number"),
    ("50", "Length", 'needs a unit: mm, m, in, ft; e.g. "50 mm"'),
    ("0", "Force", 'needs a unit: N, kN, lbf; e.g. "100 N"'),
    ("50 mmm", "Length", 'unit "mmm" is not known for a length; did you mean "mm"?'),
    ("50 kg", "Length", 'unit "kg" is not known for a length; write mm, m, in, ft; e.g. "50 mm"'),
    ("5 Nm", "Force", 'unit "Nm" is not known for a force'),
    ("5 mm 5", "Length", 'unit "mm 5" is not known'),
    ("5 6 mm", "Length", 'unit "6 mm" is not known'),
    ("0 mm", "Length", "must be above 0 mm"),
    ("-3 in", "Length", "must be above 0 in"),
    ("-5 N", "OpposingForce", "must be at least 0 N"),
    ("0 dm3/(s*bar)", "Conductance", "must be above 0 dm3/(s*bar)"),
    ("91 deg", "Angle", "must be at most 90 deg"),
    ("-91 deg", "Angle", "must be at least -90 deg"),
    ("120 %", "Share", "must be at most 100 %"),
    ("65", "Share", 'is a share above 1: write "65 %" or "6500 %"'),
    ("30", "Ratio", 'is a share above 1: write "30 %" or "3000 %"'),
    ("1.5 %", "CriticalRatio", 'unit "%" does not belong here: write a number, e.g. "0.3"'),
    ("0.95", "CriticalRatio", "must be at most 0.9"),
    ("2.5", "Count", 'must be a whole number, e.g. "1"'),
    ("0", "Count", "must be at least 1"),
    ("9000 h/year", "HoursPerYear", "must be at most 8760 h/year"),
    ("4800 h", "HoursPerYear", 'unit "h" is not known for a number of hours a year'),
    ("-300 degC", "Temperature", "is below absolute zero: must be above -273.1 degC"),
    ("20 deg", "Temperature", 'unit "deg" is not known for a temperature'),
    ("0.18 USD/kWh", "EnergyPrice", 'prices are in EUR here (money.currency), e.g. "0.18 EUR/kWh"'),
    ("0.18 EUR", "EnergyPrice", 'unit "EUR" is not known for a price of energy; write /kWh, /J'),
]


@pytest.mark.parametrize(("text", "kind", "message"), REFUSALS)
def test_refused_and_told_what_to_write(text: str, kind: str, message: str) -> None:
    with pytest.raises(UnitFault, match=re.escape(message)):
        read(text, KINDS[kind], Reading())


def test_the_refusal_is_ours_and_the_builtin() -> None:
    with pytest.raises(UnitFault, match="needs a unit") as caught:
        read("50", KINDS["Length"], Reading())
    assert isinstance(caught.value, ActuatorError)
    assert isinstance(caught.value, ValueError)


SUGGESTIONS = [case for case in REFUSALS if re.search(r'"[0-9]', case[2])]


@pytest.mark.parametrize(("text", "kind", "message"), SUGGESTIONS)
def test_what_the_message_says_to_write_can_be_read(text: str, kind: str, message: str) -> None:
    with pytest.raises(UnitFault, match=re.escape(message)) as caught:
        read(text, KINDS[kind], Reading())
    offered = [each for each in re.findall(r'"([^"]+)"', str(caught.value)) if each[0].isdigit()]
    assert offered
    for each in offered:
        if each not in ("6500 %",):  # one of two readings of "65", out of range by itself
            read(each, KINDS[kind], Reading())
