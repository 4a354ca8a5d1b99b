"""Documents of every kind of cylinder: what each needs, takes by default, and cannot have."""

from __future__ import annotations

import math

import jsonschema
import pytest

from actuator.errors import Problem
from actuator.parts import Actuator, Spring
from actuator.project.document import Document, parse
from actuator.project.schema import json_schema
from actuator.project.validate import validate
from tests.project.samples import SHORT, short
from tests.project.test_sample import project_of

AT = "machine.1.actuator.1."
SCHEMA = jsonschema.Draft202012Validator(json_schema())
AREA = math.pi / 4 * 0.05**2
ANNULUS = math.pi / 4 * (0.05**2 - 0.02**2)


def of_kind(kind: str, **edits: str) -> Document:
    """The short document with its first actuator of a kind; a spring for those that need one."""
    document = short().edited(AT + "kind", kind)
    if kind.startswith("spring"):
        document = document.edited(AT + "spring.rate", "0.5 N/mm").edited(AT + "spring.preload", "30 N")
    if kind == "rodless":
        document = document.edited(AT + "rod", "")
    for key, text in edits.items():
        document = document.edited(AT + key.replace("__", "."), text)
    return document


def first(document: Document) -> Actuator:
    return project_of(document).machines[0].actuators[0]


def only_problem(document: Document) -> Problem:
    found = validate(document)
    assert isinstance(found, tuple)
    assert len(found) == 1, found
    return found[0]


@pytest.mark.parametrize("kind", ["double-acting", "spring-return", "spring-extend", "through-rod", "rodless"])
def test_each_kind_checks_clean_in_check_and_schema(kind: str) -> None:
    document = of_kind(kind, count="2")
    part = first(document)
    assert (part.kind, part.count) == (kind, 2)
    assert part.valve.function == ("3/2" if kind.startswith("spring") else "5/2 spring")
    assert part.rod == (0.0 if kind == "rodless" else 0.02)
    assert part.spring == (Spring(rate=500.0, preload=30.0) if kind.startswith("spring") else None)
    SCHEMA.validate(document.tree())


@pytest.mark.parametrize(
    ("kind", "thrust", "cap"),
    [
        ("spring-return", AREA, AREA),
        ("spring-extend", ANNULUS, AREA),
        ("through-rod", ANNULUS, ANNULUS),
        ("rodless", AREA, AREA),
    ],
)
def test_friction_and_dead_volume_follow_the_area_that_the_air_acts_on(kind: str, thrust: float, cap: float) -> None:
    part = first(of_kind(kind, count="3"))
    assert part.friction.breakaway == pytest.approx(0.08 * 6e5 * thrust)
    assert part.friction.coulomb == pytest.approx(0.05 * 6e5 * thrust)
    assert part.friction.viscous == pytest.approx(30.0)
    assert part.dead_volume_cap == pytest.approx(0.1 * 0.05 * cap)


def test_stiffness_is_read_in_the_units_of_the_trade() -> None:
    """1 lbf/in = 175.127 N/m: 4.448222 N over 25.4 mm."""
    for text, value in (("0.5 N/mm", 500.0), ("500 N/m", 500.0), ("2 lbf/in", 350.254), ("0 N/mm", 0.0)):
        spring = first(of_kind("spring-return", spring__rate=text)).spring
        assert spring is not None
        assert spring.rate == pytest.approx(value, rel=1e-5)


REFUSALS = [
    ("double-acting", "spring.preload", "30 N", "leave it out: a double-acting cylinder has no spring"),
    ("rodless", "spring.rate", "0.5 N/mm", "leave it out: a rodless cylinder has no spring"),
    ("rodless", "rod", "20 mm", "leave it out: a rodless cylinder has no rod"),
    ("rodless", "rod_end", "free", "leave it out: a rodless cylinder has no rod"),
    ("rodless", "mounting", "foot", "leave it out: a rodless cylinder has no rod"),
    ("rodless", "closed_length", "90 mm", "leave it out: a rodless cylinder has no rod"),
    ("rodless", "side_load", "10 N", "leave it out: a rodless cylinder has no rod"),
    ("rodless", "bearing_length", "30 mm", "leave it out: a rodless cylinder has no rod"),
    ("rodless", "require.buckling_safety", "4", "leave it out: a rodless cylinder has no rod"),
    ("spring-return", "return_pressure", "3 bar gauge", "leave it out: a spring-return cylinder is returned by its sp"),
    ("spring-extend", "return_pressure", "3 bar gauge", "leave it out: a spring-extend cylinder is driven out by its"),
    ("spring-return", "dead_volume_rod", "20 cm3", "leave it out: a spring-return cylinder takes air on one side only"),
    ("spring-extend", "dead_volume_cap", "20 cm3", "leave it out: a spring-extend cylinder takes air on one side only"),
    ("spring-return", "valve.function", "5/2 spring", 'must be "3/2" with kind = "spring-return"'),
    ("through-rod", "valve.function", "3/2", 'is for single-acting cylinders; with kind = "through-rod" write e.g.'),
    ("spring-return", "spring.rate", "", 'is needed with kind = "spring-return": rate = "0.5 N/mm"'),
    ("spring-extend", "spring.preload", "", 'is needed with kind = "spring-extend": preload = "30 N"'),
    ("spring-return", "spring.preload", "-3 N", "must be at least 0 N"),
    ("spring-return", "spring.rate", "0.5 N", 'unit "N" is not known for a force per length'),
    ("through-rod", "rod", "", 'is needed: Diameter of the piston rod. Write rod = "20 mm"'),
    ("through-rod", "rod", "0 mm", "must be above 0 mm"),
    ("spring-return", "rod", "60 mm", 'must be below the bore, "50 mm"'),
]


@pytest.mark.parametrize(("kind", "key", "text", "words"), REFUSALS)
def test_what_a_kind_cannot_have_is_refused(kind: str, key: str, text: str, words: str) -> None:
    document = of_kind(kind).edited(AT + key, text)
    found = only_problem(document)
    assert found.path == AT + key
    assert found.allowed.startswith(words)


SEEN_BY_SCHEMA = [row for row in REFUSALS if "leave it out" in row[3] or "needed" in row[3] or "3/2" in row[3]]


@pytest.mark.parametrize(("kind", "key", "text", "words"), SEEN_BY_SCHEMA)
def test_the_schema_refuses_it_too(kind: str, key: str, text: str, words: str) -> None:
    document = of_kind(kind)
    assert SCHEMA.is_valid(document.tree())
    assert not SCHEMA.is_valid(document.edited(AT + key, text).tree()), words


def test_without_its_table_both_fields_of_the_spring_are_asked_for() -> None:
    found = validate(short().edited(AT + "kind", "spring-return"))
    assert isinstance(found, tuple)
    assert [problem.path for problem in found] == [AT + "spring.rate", AT + "spring.preload"]


def test_a_spring_that_is_no_table_is_refused() -> None:
    at = 'name = "Pusher"\n'
    found = only_problem(parse(SHORT.replace(at, at + "spring = 3\n")))
    assert (found.path, found.allowed) == (AT + "spring", "leave it out: a double-acting cylinder has no spring")


@pytest.mark.parametrize(
    ("kind", "metering", "acts", "idle"),
    [
        ("spring-return", "meter-out", "retract_c", "extend_c"),
        ("spring-return", "meter-in", "extend_c", "retract_c"),
        ("spring-extend", "meter-out", "extend_c", "retract_c"),
        ("spring-extend", "meter-in", "retract_c", "extend_c"),
    ],
)
def test_one_port_has_one_needle(kind: str, metering: str, acts: str, idle: str) -> None:
    c = "0.5 dm3/(s*bar)"
    document = of_kind(kind, throttle__kind=metering, throttle__free_c=c).edited(f"{AT}throttle.{acts}", c)
    throttle = first(document).throttle
    assert getattr(throttle, acts) == pytest.approx(5e-9)
    assert getattr(throttle, idle) is None
    found = only_problem(document.edited(f"{AT}throttle.{idle}", c))
    assert found.path == f"{AT}throttle.{idle}"
    assert found.allowed == f"leave it out: at the one port of a {kind} cylinder only {acts} acts with {metering}"
    missing = only_problem(document.edited(f"{AT}throttle.{acts}", ""))
    assert missing.path == f"{AT}throttle.{acts}"
    assert missing.allowed.startswith(f'is needed with kind = "{metering}": {acts} = ')
