"""Which field moves a figure most: one step of each, everything computed anew."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass, replace
from typing import Any

from actuator.errors import InputError, Refusal
from actuator.kinds import FieldSpec, Kind, fields_of
from actuator.parts import Actuator, Machine, Site
from actuator.parts.spread import Spread
from actuator.scatter.outcome import THREADS, Evaluate, StopFlag, no_stop, side_by_side
from actuator.scatter.vary import Deviation, varied

STEP = 0.1
"""Step of a design field, a share of its value; own choice. [1]"""
_NO_DESIGN = ("require", "spread", "holding")
"""Parts of an actuator that ask, or say what is not known, and so are no design."""
_OF_MACHINE = ("supply_pressure", "cycle_time")
"""Fields of the machine that enter an actuator's figures, and that a step makes sense for."""


@dataclass(frozen=True, slots=True, kw_only=True)
class Step:
    """One field moved by one step, and what that does to the chosen figure."""

    path: str
    """Relative to the actuator, ``"valve.supply_c"``; ``machine.`` in front for those of the machine."""
    label: str
    """Of the field."""
    kind: Kind
    """Of the field."""
    before: float
    """Value of the field; of a field of the spread, 0. In its SI unit."""
    after: float
    """The same after the step."""
    figure: float | Refusal
    """The chosen figure after the step, in its SI unit."""
    change: float | Refusal
    """That less the figure as it is."""


Steps = tuple[FieldSpec | int, ...]
"""Way from a part to a field inside it: fields, and 0-based numbers in lists."""


@dataclass(frozen=True, slots=True, kw_only=True)
class _Task:
    path: str
    spec: FieldSpec
    before: float
    after: float
    parts: tuple[Actuator, Machine] | Refusal


def _spread(actuator: Actuator, machine: Machine, site: Site) -> Iterator[_Task]:
    """One task for each field of the spread: all that it stands for, up by its whole deviation."""
    spread = actuator.spread
    for spec in fields_of(Spread):
        most = getattr(spread, spec.name)
        if most == 0.0:
            continue
        together = ("mass", "opposing", "constant") if spec.name == "mass" else (spec.name,)
        by = Deviation(**dict.fromkeys(together, most))
        yield _Task(
            path=f"spread.{spec.key}",
            spec=spec,
            before=0.0,
            after=most,
            parts=varied(actuator, machine, site, by),
        )


def _leaves(part: Any) -> Iterator[tuple[Steps, FieldSpec, float]]:
    """Numeric fields that are not zero, in a part and in the parts inside it: way to it, specification, value."""
    for spec in fields_of(part.__class__):
        value = getattr(part, spec.name)
        if spec.entry is None or value is None or spec.name in _NO_DESIGN:
            continue
        if spec.part is not None:
            inside = (
                [((spec, number), item) for number, item in enumerate(value)] if spec.is_list else [((spec,), value)]
            )
            for way, item in inside:
                yield from (((*way, *below), inner, number) for below, inner, number in _leaves(item))
        elif spec.kind is not None and isinstance(value, float) and value != 0.0:
            yield (spec,), spec, value


def _put(part: Any, way: Steps, value: float) -> Any:
    """Copy of a part with another value at the end of a way."""
    first, *rest = way
    if isinstance(first, int):
        return (*part[:first], _put(part[first], tuple(rest), value), *part[first + 1 :])
    inner = _put(getattr(part, first.name), tuple(rest), value) if rest else value
    return replace(part, **{first.name: inner})


def _stepped(value: float, spec: FieldSpec, site: Site, step: float) -> float:
    """Value one step on; a pressure steps in what it has above ambient."""
    if spec.kind is not None and spec.kind.dimension == "pressure":
        return site.ambient_pressure + (value - site.ambient_pressure) * (1.0 + step)
    return value * (1.0 + step)


def _design(actuator: Actuator, machine: Machine, site: Site) -> Iterator[_Task]:
    """One task for each field that a designer sets: a tenth more, or a tenth less where more cannot be."""
    for way, spec, value in _leaves(actuator):
        path = ".".join(str(step + 1) if isinstance(step, int) else step.key for step in way)
        made = [(step, _tried(actuator, way, _stepped(value, spec, site, step), machine)) for step in (STEP, -STEP)]
        step, part = next((item for item in made if not isinstance(item[1], Refusal)), made[0])
        yield _Task(
            path=path,
            spec=spec,
            before=value,
            after=_stepped(value, spec, site, step),
            parts=part if isinstance(part, Refusal) else (part, machine),
        )
    for spec in fields_of(Machine):
        if spec.name in _OF_MACHINE:
            value = float(getattr(machine, spec.name))
            after = _stepped(value, spec, site, STEP)
            moved = _put(machine, (spec,), after)
            yield _Task(path=f"machine.{spec.key}", spec=spec, before=value, after=after, parts=(actuator, moved))


def _tried(actuator: Actuator, way: Steps, value: float, machine: Machine) -> Any:
    """Actuator with another value in it, or why it cannot have it."""
    try:
        made = _put(actuator, way, value)
    except InputError as fault:
        return Refusal(fault.problems[0].allowed, fault.problems[0].path)
    if max(made.extend_at, made.retract_at) >= machine.cycle_time or made.extend_at == made.retract_at:
        return Refusal("the commands must fall apart, and into the cycle", "retract_at")
    return made


def _difference(value: float | Refusal, nominal: float | Refusal) -> float | Refusal:
    if isinstance(value, Refusal):
        return value
    return nominal if isinstance(nominal, Refusal) else value - nominal


def _size(found: Step) -> float:
    return -1.0 if isinstance(found.change, Refusal) else abs(found.change)


def sensitivity(
    actuator: Actuator,
    machine: Machine,
    site: Site,
    evaluate: Evaluate,
    figure: str,
    *,
    cancelled: Callable[[], bool],
    threads: int = THREADS,
    stop: StopFlag | None = None,
) -> tuple[Step, ...]:
    """Move each field by one step, compute the figure anew, and rank the fields by what that does to it.

    Parameters
    ----------
    actuator, machine, site : part
        As the document has them.
    evaluate : callable
        Computes the figures of a varied actuator; called in several threads at once.
    figure : str
        Name of the figure.
    cancelled : callable
        True ends the work.
    threads : int
        How many compute at once; they change nothing in the result. [1]
    stop : StopFlag, optional
        Set when the work is cancelled, for ``evaluate`` to see.

    Returns
    -------
    tuple of Step
        Largest change first, fields whose step gives no figure last. A step is the whole deviation upwards for a
        field of the spread, a tenth of its value for any other; the rest stays as it is, also what the document
        leaves to a default. Fields that are zero have no step.

    Raises
    ------
    Cancelled
        When ``cancelled()`` became true.
    """
    tasks = [
        _Task(path="", spec=fields_of(Actuator)[0], before=0.0, after=0.0, parts=(actuator, machine)),
        *_spread(actuator, machine, site),
        *_design(actuator, machine, site),
    ]

    def work(task: _Task) -> float | Refusal:
        return task.parts if isinstance(task.parts, Refusal) else evaluate(*task.parts, None).values[figure]

    flag = no_stop() if stop is None else stop
    *_, found = side_by_side(work, tasks, threads=threads, chunk=4, cancelled=cancelled, stop=flag)
    nominal: float | Refusal = found[0]
    steps = []
    for task, value in zip(tasks[1:], found[1:], strict=True):
        entry, kind = task.spec.entry, task.spec.kind
        assert entry is not None
        assert kind is not None
        steps.append(
            Step(
                path=task.path,
                label=entry.label,
                kind=kind,
                before=task.before,
                after=task.after,
                figure=value,
                change=_difference(value, nominal),
            )
        )
    return tuple(sorted(steps, key=_size, reverse=True))
