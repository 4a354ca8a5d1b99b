"""Public docstrings name every argument, give units that can be read, and sources resolve."""

from __future__ import annotations

import importlib
import inspect
import pkgutil
import re
from collections.abc import Iterator
from types import FunctionType
from typing import Any

import pint
import pytest

import actuator
from actuator.sources import SOURCES, Source

ROOMS = (
    "actuator.air", "actuator.flow", "actuator.mechanics", "actuator.energy", "actuator.holding", "actuator.stroke",
)  # fmt: skip
_SUPERSCRIPTS = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻", "0123456789-")
_WORDS = {"1", "degC", "m³ ANR", "m³/s ANR", "J/m³ ANR", "J/kg dry air", "kg/m³ dry air"}


def _modules(prefix: str) -> Iterator[Any]:
    package = importlib.import_module(prefix)
    yield package
    for found in pkgutil.iter_modules(package.__path__, prefix + "."):
        yield importlib.import_module(found.name)


def _functions() -> list[FunctionType]:
    return [
        value
        for room in ROOMS
        for module in _modules(room)
        for name, value in vars(module).items()
        if isinstance(value, FunctionType) and value.__module__ == module.__name__ and not name.startswith("_")
    ]


def _section(doc: str, title: str) -> str:
    found = re.search(rf"^{title}\n-+\n(.*?)(?=^\w[\w ]*\n-+\n|\Z)", doc, re.M | re.S)
    return found.group(1) if found else ""


def _readable(unit: str) -> bool:
    """Whether a unit in brackets is one that pint knows."""
    if unit in _WORDS:
        return True
    text = re.sub(r"[⁰¹²³⁴⁵⁶⁷⁸⁹⁻]+", lambda hit: "**" + hit.group().translate(_SUPERSCRIPTS), unit)
    try:
        pint.Unit(text.replace("·", "*").replace(" ", "*"))
    except (pint.UndefinedUnitError, ValueError, pint.DefinitionSyntaxError):
        return False
    return True


@pytest.mark.parametrize("function", _functions(), ids=lambda item: f"{item.__module__}.{item.__name__}")
def test_every_public_function_tells_what_it_takes(function: FunctionType) -> None:
    doc = inspect.getdoc(function)
    assert doc, "no docstring"
    listed = _section(doc, "Parameters")
    names = {
        name.strip().lstrip("*")
        for line in listed.splitlines()
        if line and not line.startswith(" ")
        for name in line.split(" : ")[0].split(",")
    }
    if names:
        assert names <= set(inspect.signature(function).parameters) | {"None"}
    for title in ("Parameters", "Returns"):
        for unit in re.findall(r"\[([^\[\]]+)\](?=\s*(?:,|$|\n))", _section(doc, title)):
            for one in unit.split(", "):
                assert _readable(one), f"[{one}]"


def test_units_in_result_fields_can_be_read() -> None:
    source = "".join(
        inspect.getsource(importlib.import_module(f"actuator.{name}")) for name in ("results", "stroke.result")
    )
    units = [one for hit in re.findall(r"\[([^\[\]]+)\]\"\"\"", source) for one in hit.split(", ")]
    assert len(units) > 40
    assert [unit for unit in units if not _readable(unit)] == []


def test_sources_stand_once_and_say_how_they_are_known() -> None:
    assert len(SOURCES) > 10
    for key, source in SOURCES.items():
        assert key == source.key
        assert source.title
        assert source.how in ("seen", "excerpt", "from memory", "common practice")


def test_every_source_in_the_code_is_one_of_the_list() -> None:
    known = set(SOURCES.values())
    for found in pkgutil.walk_packages(actuator.__path__, "actuator."):
        if found.name.endswith("__main__"):
            continue
        for name, value in vars(importlib.import_module(found.name)).items():
            if isinstance(value, Source):
                assert value in known, f"{found.name}.{name}"
