"""From the document to parts: the only place where text becomes SI and gauge becomes absolute."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from actuator.errors import InputError, Problem
from actuator.parts import Compressor, Money, Plant, Project, Site
from actuator.project import paths
from actuator.project.document import Document
from actuator.project.fields import FORMAT, fields
from actuator.project.machines import machines
from actuator.project.paths import Steps
from actuator.project.schema import sheet
from actuator.project.walk import Values, Walk
from actuator.units import Reading


def validate(document: Document) -> Project | tuple[Problem, ...]:
    """Turn a document into a project, or name everything that is wrong with it.

    Parameters
    ----------
    document : Document
        As loaded or edited; never raises, whatever stands in it.

    Returns
    -------
    Project or tuple of Problem
        All problems at once, in the order of their lines.
    """
    if document.broken is not None:
        return (document.broken,)
    walk = Walk(document)
    project = _project(walk)
    if walk.problems or project is None:
        return tuple(sorted(walk.problems, key=lambda problem: problem.line))
    return project


def _project(walk: Walk) -> Project | None:
    """Read all tables in the order in which they need each other."""
    tree = walk.document.tree()
    _format(walk, tree.get("format"))
    top = walk.table(Project, (), {key: value for key, value in tree.items() if key != "format"})
    assert top is not None
    money = _part(walk, Money, ("money",), top.get("money", {}), _currency)
    site = _part(walk, Site, ("site",), top.get("site", {}), _ambient)
    walk.reading = Reading(
        ambient_pressure=site.ambient_pressure if site else Site().ambient_pressure,
        currency=money.currency if money else walk.reading.currency,
    )
    plant = _plant(walk, top.get("plant", {}))
    found = machines(walk, top.get("machines"), site or Site())
    if walk.problems or site is None or money is None or plant is None:
        return None
    return Project(title=top.get("title", ""), site=site, machines=found, plant=plant, money=money)


def _format(walk: Walk, given: Any) -> None:
    if given is None:
        walk.problem(("format",), None, f"is needed: write format = {FORMAT} in the first line")
    elif given != FORMAT or isinstance(given, bool):
        walk.problem(("format",), given, f"is not known; this version reads format = {FORMAT}")


def _part(
    walk: Walk,
    part: type[Any],
    steps: Steps,
    here: Any,
    first: Callable[[Walk, Steps, Any], None] | None = None,
) -> Any:
    """Read and build a part that has no parts inside; None where it has problems."""
    if first is not None and isinstance(here, dict):
        first(walk, steps, here)
    before = len(walk.problems)
    values = walk.table(part, steps, here)
    if values is None:
        return None
    if part is Compressor:
        _efficiencies(values)
    walk.needed(part, steps, values)
    return walk.built(part, steps, values) if len(walk.problems) == before else None


def _currency(walk: Walk, steps: Steps, here: dict[str, Any]) -> None:
    """Take the currency before the prices are read."""
    code = here.get("currency", "EUR")
    if isinstance(code, str):
        if len(code) == 3 and code.isascii() and code.isalpha() and code.isupper():
            walk.reading = Reading(currency=code)
        else:
            walk.problem((*steps, "currency"), code, 'must be three capital letters (ISO 4217), e.g. "EUR"')


def _ambient(walk: Walk, steps: Steps, here: dict[str, Any]) -> None:
    """Refuse an ambient pressure that is given as gauge: it is what gauge counts from."""
    spec = fields(Site)["ambient_pressure"]
    if walk.is_gauge(here.get(spec.key), spec):
        walk.problem(
            (*steps, spec.key),
            here[spec.key],
            'must be absolute, it is what gauge counts from: "101.3 kPa absolute"',
        )


def _efficiencies(values: Values) -> None:
    """A polytropic efficiency takes the place of the isentropic default."""
    if "polytropic_efficiency" in values and "isentropic_efficiency" not in values:
        values["isentropic_efficiency"] = None


def _plant(walk: Walk, here: Any) -> Plant | None:
    values = walk.table(Plant, ("plant",), here)
    if values is None:
        return None
    listed = values.get("compressors")
    steps: Steps = ("plant", "compressor")
    if listed is None:
        return Plant()
    if not isinstance(listed, list):
        walk.problem(steps, listed, "must be a list of tables: write [[plant.compressor]], with two brackets")
        return None
    if len(listed) != 1:
        walk.problem(
            (*steps, 2) if listed else steps,
            None,
            "this version reckons with exactly one compressor: leave one [[plant.compressor]], or none",
        )
        return None
    compressor = _part(walk, Compressor, (*steps, 1), listed[0])
    if compressor is None:
        return None
    if compressor.rated_pressure <= walk.reading.ambient_pressure:
        walk.problem(
            (*steps, 1, "rated_pressure"),
            listed[0].get("rated_pressure"),
            "must be above the ambient pressure",
        )
    return Plant(compressors=(compressor,))


def provenance(document: Document) -> dict[str, str]:
    """What was left out, and what holds in its place.

    Parameters
    ----------
    document : Document

    Returns
    -------
    dict of str to str
        Rule and source of the default by numbered path.
    """
    tree = document.tree()
    found: dict[str, str] = {}
    listed = tree.get("machine")
    for number, machine in enumerate(listed if isinstance(listed, list) else [], 1):
        inside = machine.get("actuator") if isinstance(machine, dict) else None
        for place, _ in enumerate(inside if isinstance(inside, list) else [], 1):
            for group in sheet(number, place):
                for row in group.fields:
                    if row.default and not document.text(row.path):
                        found[row.path] = row.default
    return found


__all__ = ["InputError", "paths", "provenance", "validate"]
