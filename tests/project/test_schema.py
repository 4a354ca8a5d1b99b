"""The form and the JSON Schema say what the document may hold, and no more."""

from __future__ import annotations

import re
from typing import Any

import jsonschema
import pytest

from actuator.project.document import demo, parse, template
from actuator.project.fields import find
from actuator.project.paths import steps_of
from actuator.project.schema import SheetField, json_schema, sheet
from actuator.project.validate import validate
from actuator.units import Reading, read
from tests.project.samples import sample, short

ROWS = [row for group in sheet(1, 1) for row in group.fields]
SCHEMA = json_schema()


def test_groups_of_the_form() -> None:
    assert [group.title for group in sheet(1, 1)] == [
        "Site",
        "Machine",
        "Actuator",
        "Load",
        "Friction",
        "Spring",
        "Valve",
        "Throttle",
        "Holding",
        "Requirements",
        "Spread",
        "Compressor",
        "Money",
    ]
    assert len({row.path for row in ROWS}) == len(ROWS)
    assert sheet(2, 3)[2].fields[0].path == "machine.2.actuator.3.name"


@pytest.mark.parametrize("row", ROWS, ids=lambda row: row.path)
def test_each_row_has_a_short_label_a_sentence_and_an_example_that_checks(row: SheetField) -> None:
    assert 0 < len(row.label) <= 22
    assert row.help.endswith(".")
    assert row.example or row.choices
    if row.kind is not None:
        read(row.example, row.kind, Reading())


@pytest.mark.parametrize("row", [row for row in ROWS if not row.instead_of], ids=lambda row: row.path)
def test_each_example_can_be_typed_into_its_field(row: SheetField) -> None:
    document = sample().edited(row.path, row.example or row.choices[0])
    checked = validate(document)
    # need or exclude another
    paired = ("polytropic_index", "polytropic_efficiency", "free_air", "package_power", "spring.rate", "spring.preload")
    assert not isinstance(checked, tuple) or row.path.endswith(paired)


FIXED = [row for row in ROWS if row.kind and re.match(r"[0-9.]+ ?[^ ]*(?: absolute| gauge)?(?:,|$)", row.default)]


@pytest.mark.parametrize("row", FIXED, ids=lambda row: row.path)
def test_a_default_that_is_a_quantity_is_the_one_that_holds(row: SheetField) -> None:
    spec = find(steps_of(row.path))
    assert spec is not None
    assert row.kind is not None
    assert read(row.default.split(",")[0], row.kind, Reading()) == pytest.approx(spec.default, rel=1e-15)


def test_most_defaults_are_quantities() -> None:
    assert len(FIXED) >= 25


def test_the_schema_is_valid_and_takes_our_documents() -> None:
    jsonschema.Draft202012Validator.check_schema(SCHEMA)
    for document in (sample(), short(), demo(), parse(template("si")), parse(template("us"))):
        jsonschema.Draft202012Validator(SCHEMA).validate(document.tree())


@pytest.mark.parametrize(
    ("path", "text"),
    [
        ("machine.1.actuator.1.bor", "50 mm"),
        ("machine.1.actuator.1.bore", ""),
        ("machine.1.actuator.1.bore", "50"),
        ("machine.1.actuator.1.bore", "fifty mm"),
        ("machine.1.actuator.1.kind", "rodless"),
        ("machine.1.actuator.1.valve.supply_cv", "0.5"),
        ("machine.1.actuator.1.valve.supply_c", ""),
        ("machine.1.actuator.1.valve.exhaust_kv", "0.5"),
        ("machine.1.actuator.1.valve.supply_b", "0.95"),
        ("machine.1.actuator.1.load", ""),
        ("machine.1.quantity", "0"),
        ("machine.1.quantity", "1.5"),
        ("machine.1.actuator.1.holding.pilot_check", "yes"),
        ("format", "2"),
        ("format", ""),
    ],
)
def test_the_schema_refuses_what_the_check_refuses(path: str, text: str) -> None:
    document = sample().edited(path, text)
    assert isinstance(validate(document), tuple)
    assert not jsonschema.Draft202012Validator(SCHEMA).is_valid(document.tree())


def test_every_property_is_described() -> None:
    def described(schema: dict[str, Any]) -> None:
        for each in schema.get("properties", {}).values():
            assert each["title"]
            assert each["description"].endswith(".")
            described(each)
            described(each.get("items", {}))

    described(SCHEMA)
