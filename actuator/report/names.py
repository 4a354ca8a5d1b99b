"""Full names of figures, and how a name that a person types finds its figure."""

from __future__ import annotations

import difflib
from collections.abc import Iterator
from dataclasses import dataclass

from actuator.project.paths import join
from actuator.report.figures import FIGURES, At, Figure
from actuator.results import Analysis


@dataclass(frozen=True, slots=True, eq=False)
class Named:
    """A figure at its place."""

    figure: Figure
    at: At

    @property
    def name(self) -> str:
        """Full name: machine, actuator and key, ``'"Carton erector".Pusher.extend.stroke_time'``."""
        return ".".join((*(join((owner,)) for owner in self.at.owner), self.figure.key))

    @property
    def spellings(self) -> tuple[str, ...]:
        """Forms that find it: with and without quotes, key or JSON path."""
        endings = (self.figure.key, ".".join(self.figure.json_path))
        owners = (tuple(join((owner,)) for owner in self.at.owner), self.at.owner)
        return tuple(dict.fromkeys(".".join((*owner, ending)) for owner in owners for ending in endings))

    @property
    def beginnings(self) -> tuple[str, ...]:
        """Tails of the spellings that begin with an owner or with the figure's own first step."""
        endings = (self.figure.key, ".".join(self.figure.json_path))
        owners = (tuple(join((owner,)) for owner in self.at.owner), self.at.owner)
        return tuple(
            ".".join((*owner[first:], ending))
            for owner in owners
            for first in range(1, len(owner) + 1)
            for ending in endings
        )


def places(analysis: Analysis) -> Iterator[At]:
    """Every place that has figures: each actuator, then its machine, then the project."""
    for number, machine in enumerate(analysis.machines):
        for index in range(len(machine.actuators)):
            yield At(analysis, number, index)
        yield At(analysis, number)
    yield At(analysis)


def all_figures(analysis: Analysis) -> Iterator[Named]:
    """Every figure of an analysis at its place, in the order in which tables show them."""
    for at in places(analysis):
        for figure in FIGURES[at.level].values():
            yield Named(figure, at)


@dataclass(frozen=True, slots=True)
class NotFound:
    """A name that finds no figure, or more than one.

    Attributes
    ----------
    names : tuple of str
        The figures it could mean, or the nearest known ones.
    ambiguous : bool
        Whether each of them matches.
    """

    names: tuple[str, ...]
    ambiguous: bool


def find(analysis: Analysis, name: str) -> Named | NotFound:
    """Figure of a full name or of any tail of it that no other figure has.

    A tail that begins with an owner or a figure's first step goes before those that begin inside a key:
    ``extend.stroke_time`` is the nominal one, not that of ``worst.slow.extend.stroke_time``.

    Parameters
    ----------
    analysis : Analysis
    name : str
        ``"extend.stroke_time"``, ``"Pusher.cycle.exergy.friction"``.

    Returns
    -------
    Named or NotFound
    """
    every = list(all_figures(analysis))
    whole = [item for item in every if name in item.spellings]
    tails = (
        whole
        or [item for item in every if name in item.beginnings]
        or [item for item in every if any(spelling.endswith("." + name) for spelling in item.spellings)]
    )
    if len(tails) == 1:
        return tails[0]
    if tails:
        return NotFound(tuple(item.name for item in tails), ambiguous=True)
    known = [item.name for item in every]
    keys = {item.figure.key: item.name for item in reversed(every)}
    near = difflib.get_close_matches(name, [*keys, *known], n=3, cutoff=0.5)
    return NotFound(tuple(dict.fromkeys(keys.get(item, item) for item in near)), ambiguous=False)
