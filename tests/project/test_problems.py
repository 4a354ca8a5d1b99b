"""Everything that is wrong is named at once: line, path, what was given, what to write."""

from __future__ import annotations

import pytest

from actuator.errors import Problem
from actuator.project.document import Document, parse
from actuator.project.validate import validate
from tests.project.samples import SAMPLE, SHORT, sample, short

AT = "machine.1.actuator.1."


def problems(document: Document) -> dict[str, Problem]:
    """Problems by path; no path twice."""
    found = validate(document)
    assert isinstance(found, tuple), "no problems"
    by_path = {problem.path: problem for problem in found}
    assert len(by_path) == len(found)
    return by_path


EDITS = [
    (AT + "bore", "50", 'needs a unit: mm, m, in, ft; e.g. "50 mm"'),
    (AT + "bore", "0 mm", "must be above 0 mm"),
    (AT + "rod", "50 mm", 'must be below the bore, "50 mm"'),
    (AT + "rod", "3 in", 'must be below the bore, "50 mm"'),
    (AT + "stroke", "-1 mm", "must be above 0 mm"),
    (AT + "stroke", "400 km", 'unit "km" is not known for a length'),
    (AT + "stroke", "400000 m", "is out of proportion: at most 100 000 mm is reckoned with"),
    (AT + "load.mass", "1e-9 kg", "is out of proportion: at least 1.000e-05 kg is reckoned with"),
    (AT + "load.mass", "1e300 kg", "is out of proportion: at most 1 000 000 kg is reckoned with"),
    (AT + "dead_volume_cap", "20 mm", 'unit "mm" is not known for a volume'),
    (AT + "kind", "single-acting", 'must be one of "double-acting", "spring-return", "spring-extend", "through-rod"'),
    (AT + "rod", "0 mm", "must be above 0 mm"),
    (AT + "rod", "", 'is needed: Diameter of the piston rod. Write rod = "20 mm"'),
    (AT + "count", "0", "must be at least 1"),
    (AT + "count", "1.5", 'must be a whole number, e.g. "1"'),
    (AT + "spring.rate", "0.5 N/mm", "leave it out: a double-acting cylinder has no spring"),
    (AT + "valve.function", "3/2", 'is for single-acting cylinders; with kind = "double-acting" write'),
    (AT + "mounting", "front flang", 'did you mean "front flange"?'),
    (AT + "rod_end", "1", 'must be one of "fixed-guided", "hinged-guided", "free"'),
    (AT + "return_pressure", "7 bar gauge", 'must not be above the supply pressure, "6 bar gauge"'),
    (AT + "return_pressure", "1 bar absolute", 'must be above the ambient pressure, "101.3 kPa absolute"'),
    (AT + "extend_at", "4 s", 'must be below the cycle time, "4 s"'),
    (AT + "retract_at", "4000 ms", 'must be below the cycle time, "4 s"'),
    (AT + "retract_at", "0 s", 'must not be the same as extend_at, "0 s"'),
    (AT + "retract_at", "-1 s", "must be at least 0 s"),
    (AT + "cut_off", "50", 'is a share above 1: write "50 %" or "5000 %"'),
    (AT + "polytropic_index", "1.2", "leave out either this or wall_heat_transfer"),
    (AT + "load.mass", "", "is needed: Everything that moves, piston and rod included. Write mass = "),
    (AT + "load.inclination", "120 deg", "must be at most 90 deg"),
    (AT + "load.process_force", "lots", 'must be a list, [{ from = "380 mm"'),
    (AT + "load.process_force.1.force", "-3 N", "must be at least 0 N"),
    (AT + "load.process_force.1.to", "401 mm", 'must not lie beyond the stroke, "400 mm"'),
    (AT + "load.process_force.1.to", "380 mm", 'must lie beyond from, "380 mm"'),
    (AT + "load.process_force.1.from", "", 'is needed: Where the force begins, from the retracted end. Write from = "'),
    (AT + "friction.breakaway", "50 N", 'must be at least the running friction, "60 N"'),
    (AT + "valve.supply_c", "", "is needed: write one of supply_c, supply_cv, supply_kv, supply_qn, supply_s"),
    (AT + "valve.supply_cv", "0.5", "leave out either this or supply_c: one replaces the other"),
    (AT + "valve.exhaust_s", "5 mm2", "leave out either this or exhaust_c: one replaces the other"),
    (AT + "valve.supply_c", "0 dm3/(s*bar)", "must be above 0 dm3/(s*bar)"),
    (AT + "valve.supply_b", "0.95", "must be at most 0.9"),
    (AT + "valve.function", "3/2 spring", 'must be one of "5/2 spring"'),
    (AT + "throttle.kind", "", 'is needed where there is a throttle: write kind = "meter-out"'),
    (AT + "throttle.kind", "meter-both", 'must be one of "meter-out", "meter-in", "none"'),
    (AT + "throttle.free_c", "", 'is needed with kind = "meter-out": free_c = "3 dm3/(s*bar)"'),
    (AT + "holding.supply_check", "yes", "must be true or false, without quotes: supply_check = true"),
    (AT + "holding.pilot_check", "1", "must be true or false, without quotes: pilot_check = true"),
    (AT + "holding.rod_lock", "-5 N", "must be at least 0 N"),
    (AT + "holding.seal_leak_c", "0 dm3/(s*bar)", "must be above 0 dm3/(s*bar)"),
    (AT + "spread.supply_pressure", "-0.1 bar", "must be at least 0 bar"),
    (AT + "spread.supply_pressure", "0.3 bar gauge", "a difference is neither gauge nor absolute"),
    (AT + "spread.friction", "95 %", "must be at most 90 %"),
    (AT + "spread.delay", "-5 %", "must be at least 0 %"),
    (AT + "side_load", "-5 N", "must be at least 0 N"),
    (AT + "bearing_length", "0 mm", "must be above 0 mm"),
    (AT + "require.buckling_safety", "0", "must be above 0"),
    (AT + "name", "supply", "is reserved for the air supply"),
    (AT + "name", "", 'is needed: Unique in the machine. Write name = "Pusher"'),
    (AT + "name", " ", "must be a name of printable characters"),
    (AT + "name", "a\x1b[2J", "must be a name of printable characters"),
    ("machine.1.supply_pressure", "7 bar", 'say gauge or absolute: "7 bar gauge" or "7 bar absolute"'),
    ("machine.1.supply_pressure", "0 bar gauge", 'must be above the ambient pressure, "101.3 kPa absolute"'),
    ("machine.1.hours", "9000 h/year", "must be at most 8760 h/year"),
    ("machine.1.quantity", "1.5", 'must be a whole number, e.g. "1"'),
    ("machine.1.quantity", "0", "must be at least 1"),
    ("machine.1.utilisation", "101 %", "must be at most 100 %"),
    ("site.ambient_pressure", "1 bar gauge", "must be absolute, it is what gauge counts from"),
    ("site.ambient_temperature", "20 deg", 'unit "deg" is not known for a temperature'),
    ("format", "2", "is not known; this version reads format = 1"),
    ("format", "", "is needed: write format = 1 in the first line"),
    ("money.currency", "Euro", "must be three capital letters (ISO 4217)"),
    ("money.energy", "0.18 CHF/kWh", "prices are in EUR here"),
    ("plant.compressor.1.rated_pressure", "0 bar gauge", "must be above the ambient pressure"),
    ("plant.compressor.1.stages", "0", "must be at least 1"),
]


@pytest.mark.parametrize(("path", "text", "message"), EDITS)
def test_one_field_one_problem(path: str, text: str, message: str) -> None:
    document = sample().edited(path, text)
    found = problems(document)
    assert list(found) == [path]
    assert message in found[path].allowed
    assert found[path].given == document.text(path)


def test_a_shorter_stroke_leaves_the_process_force_beyond_it() -> None:
    found = problems(sample().edited("machine.actuator.stroke", "399 mm"))
    assert found[AT + "load.process_force.1.to"].allowed == 'must not lie beyond the stroke, "399 mm"'


@pytest.mark.parametrize("path", ["friction.coulomb", "friction.breakaway", "require.stroke_time", "valve.exhaust_c"])
def test_what_may_be_left_out_is_no_problem(path: str) -> None:
    assert not isinstance(validate(sample().edited(AT + path, "")), tuple)


def test_all_problems_come_at_once_in_the_order_of_their_lines() -> None:
    document = sample()
    for path, text in ((AT + "valve.supply_b", "x"), (AT + "bore", "50"), ("machine.1.hours", "9000 h/year")):
        document = document.edited(path, text)
    document = document.edited("site.ambient_pressure", "1 bar")
    found = problems(document)
    lines = [problem.line for problem in found.values()]
    rows = SAMPLE.splitlines()
    assert list(found) == ["site.ambient_pressure", "machine.1.hours", AT + "bore", AT + "valve.supply_b"]
    assert [rows[line - 1].split(" = ")[0] for line in lines] == ["ambient_pressure", "hours", "bore", "supply_b"]
    assert str(found[AT + "bore"]) == (
        f'line {lines[2]}: {AT}bore: "50" given; needs a unit: mm, m, in, ft; e.g. "50 mm"'
    )


@pytest.mark.parametrize(
    ("source", "path", "allowed"),
    [
        ('bor = "50 mm"', AT + "bor", 'is no key here; did you mean "bore"?'),
        ('Bore = "50 mm"', AT + "Bore", 'is no key here; did you mean "bore"?'),
        ("tube = { bore = '6 mm' }", AT + "tube", "is no key here; known are name, kind, count, bore"),
        ('cushion.kind = "bumper"', AT + "cushion", "is no key here"),
        ('extend_after = "Lift extend"', AT + "extend_after", "is no key here"),
        ('"two words" = 1', AT + '"two words"', "is no key here"),
    ],
)
def test_an_unknown_key_is_refused_with_the_nearest(source: str, path: str, allowed: str) -> None:
    text = SAMPLE.replace('name = "Pusher"\n', f'name = "Pusher"\n{source}\n')
    found = problems(parse(text))
    assert list(found) == [path]
    assert allowed in found[path].allowed
    assert text.splitlines()[found[path].line - 1].startswith(source[:4])


@pytest.mark.parametrize("key", ["end_speed", "spread", "soft_start", "spring", "holding", "bumper"])
def test_keys_of_other_versions_are_unknown(key: str) -> None:
    found = problems(sample().edited(f"{AT}require.{key}", "0.3 m/s"))
    assert "is no key here" in found[f"{AT}require.{key}"].allowed


SHAPES = [
    ("format = 1\n", "machine", "at least one is needed: write [[machine]]"),
    ("format = 1\nmachine = []\n", "machine", "at least one is needed"),
    ("format = 1\n[machine]\nname = 'A'\n", "machine", "at least one is needed: write [[machine]], with two brackets"),
    ("format = 1\nmachine = ['x']\n", "machine.1", "must be a table: write [[machine]] on a line of its own"),
    (SHORT + "site = 3\n", AT.replace("1.actuator.1", "1.actuator.2") + "valve.site", "is no key here"),
    ("site = 'x'\n" + SHORT, "site", "must be a table: write [site] on a line of its own"),
    ("title = 5\n" + SHORT, "title", 'must be text in quotes, "5"'),
    ("title = ['a']\n" + SHORT, "title", "must be one value, not a list or table"),
    (SHORT.replace('"50 mm"', "50"), AT + "bore", 'needs a unit: mm, m, in, ft; e.g. "50 mm"'),
    (SHORT.replace('"50 mm"', "0.05"), AT + "bore", 'needs a unit: mm, m, in, ft; e.g. "50 mm"'),
    (SHORT.replace('"50 mm"', "true"), AT + "bore", 'must be a quantity: bore = "50 mm"'),
    (SHORT.replace('"50 mm"', "1979-05-27"), AT + "bore", 'must be a quantity: bore = "50 mm"'),
    (SHORT.replace('"50 mm"', "['50 mm']"), AT + "bore", "must be one value, not a list or table"),
    (SHORT.replace('"50 mm"', "nan"), AT + "bore", "must be a finite number"),
    (SHORT.replace('"50 mm"', "inf"), AT + "bore", "must be a finite number"),
    (SHORT + "\n[plant]\ncompressor = {}\n", "plant.compressor", "write [[plant.compressor]], with two brackets"),
    (SHORT + "\n[[plant.compressor]]\n" * 2, "plant.compressor.2", "one compressor is reckoned with in this version"),
    (
        SHORT + "\n[[plant.compressor]]\nfree_air = '1 m3/min FAD'\n",
        "plant.compressor.1.package_power",
        "is needed with",
    ),
    (SHORT + "\n[[plant.compressor]]\npackage_power = '5 kW'\n", "plant.compressor.1.free_air", "or leave both out"),
    (
        SHORT + "\n[[plant.compressor]]\npolytropic_efficiency = '70 %'\nisentropic_efficiency = '70 %'\n",
        "plant.compressor.1.polytropic_efficiency",
        "leave out either this or isentropic_efficiency",
    ),
    (SHORT + "process_force = 3\n", AT.replace("actuator.1", "actuator.2") + "valve.process_force", "is no key here"),
    (
        SHORT.replace("load.mass", "load.process_force = ['x']\nload.mass"),
        AT + "load.process_force.1",
        "must be { from",
    ),
    (SHORT.replace('"Lift 1.5"', '"Pusher"'), "machine.1.actuator.2.name", "is already the name of actuator 1"),
    (SHORT + SHORT[SHORT.index("[[machine]]") :], "machine.2.name", "is already the name of machine 1"),
    (SHORT.replace('"Packer"', '"supply"'), "machine.1.name", "is reserved for the air supply"),
    (SHORT[: SHORT.index("[[machine.actuator]]")], "machine.1.actuator", "at least one is needed: write [[machine.act"),
    (
        SHORT.replace('"4 s"', '"6 s"').replace("retract_at = ", "extend_at = "),
        "machine.1.actuator.2.retract_at",
        "left",
    ),
    (
        SHORT + "\n[machine.actuator.friction]\ncoulomb = '500 N'\n",
        "machine.1.actuator.2.friction.breakaway",
        "left out it",
    ),
    (
        SHORT + "\n[machine.actuator.require]\nforce_time = '1 s'\n",
        "machine.1.actuator.2.require.force_at_end",
        "is needed",
    ),
]


@pytest.mark.parametrize(("source", "path", "allowed"), SHAPES)
def test_wrong_shapes_are_refused(source: str, path: str, allowed: str) -> None:
    found = problems(parse(source))
    assert list(found) == [path]
    assert allowed in found[path].allowed


@pytest.mark.parametrize(
    ("source", "line", "given"),
    [
        ('format = 1\ntitle = "x\n', 2, 'title = "x'),
        ("format = 1\n[machine\n", 2, "[machine"),
        ("format = 1\nformat = 2\n", 2, "format = 2"),
        ("format = 1\n\n\nbore = 50 mm\n", 4, "bore = 50 mm"),
        ("title = '''\nnever closed\n", 2, "never closed"),
        ("a = " + "[" * 5000, 0, ""),
        ("format = 1\nx = " + "9" * 5000, 0, ""),
    ],
)
def test_text_that_is_no_toml_opens_with_its_line_marked(source: str, line: int, given: str) -> None:
    document = parse(source)
    found = problems(document)
    assert list(found) == ["document"]
    assert (found["document"].line, found["document"].given) == (line, given)
    assert document.to_toml() == source


def test_a_missing_field_points_at_its_table() -> None:
    source = SHORT.replace('stroke = "200 mm"\n', "")
    found = problems(parse(source))["machine.1.actuator.2.stroke"]
    rows = source.splitlines()
    assert (rows[found.line - 1], rows[found.line]) == ("[[machine.actuator]]", 'name = "Lift 1.5"')
    assert found.given == ""
    assert found.allowed == 'is needed: Way of the piston from end to end. Write stroke = "400 mm"'


def test_a_field_that_was_emptied_points_at_its_line() -> None:
    found = problems(short().edited("machine.actuator.2.stroke", ""))["machine.1.actuator.2.stroke"]
    assert SHORT.splitlines()[found.line - 1] == 'stroke = "200 mm"'
