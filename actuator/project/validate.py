"""From the document to parts: the only place where text becomes SI and gauge becomes absolute."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from actuator.errors import Problem
from actuator.parts import Compressor, Money, Plant, Project, Site
from actuator.project.document import Document
from actuator.project.fields import FORMAT, fields
from actuator.project.machines import machines
from actuator.project.paths import Steps
from actuator.project.walk import Walk
from actuator.units import Reading

_RATED_GAUGE = 7.5e5
"""Default rated pressure above ambient, 7.5 bar gauge; common practice, no source. [Pa]"""


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


def _compressor(walk: Walk, steps: Steps, here: Any) -> Compressor | None:
    """Measured package, or stages and efficiencies."""
    before = len(walk.problems)
    values = walk.table(Compressor, steps, here)
    if values is None:
        return None
    ambient = walk.reading.ambient_pressure
    if values.setdefault("rated_pressure", ambient + _RATED_GAUGE) <= ambient:
        at = (*steps, "rated_pressure")
        walk.problem(at, walk.at(at), 'must be above the ambient pressure, e.g. "7.5 bar gauge"')
    for key, other in (("free_air", "package_power"), ("package_power", "free_air")):
        if key in here and other not in here:
            entry = fields(Compressor)[other].entry
            assert entry is not None
            walk.problem((*steps, other), None, f'is needed with {key}: {other} = "{entry.example}", or leave both out')
    if "polytropic_efficiency" in here:
        if "isentropic_efficiency" in here:
            at = (*steps, "polytropic_efficiency")
            walk.problem(at, walk.at(at), "leave out either this or isentropic_efficiency: one replaces the other")
        values["isentropic_efficiency"] = None
    if len(walk.problems) > before:
        return None
    made: Compressor | None = walk.built(Compressor, steps, values)
    return made


def _plant(walk: Walk, here: Any) -> Plant | None:
    """The one compressor, typed or by default."""
    values = walk.table(Plant, ("plant",), here)
    if values is None:
        return None
    listed = values.get("compressors", [{}])
    steps: Steps = ("plant", "compressor")
    if not isinstance(listed, list) or not listed:
        walk.problem(steps, listed, "must be a list of tables: write [[plant.compressor]], with two brackets")
        return None
    if len(listed) > 1:
        walk.problem(
            (*steps, 2), None, "one compressor is reckoned with in this version: leave one [[plant.compressor]]"
        )
        return None
    compressor = _compressor(walk, (*steps, 1), listed[0])
    return Plant(compressors=(compressor,)) if compressor is not None else None
