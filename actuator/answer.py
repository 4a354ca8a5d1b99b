"""One answer for every view: the document, what is wrong with it, and all its results."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

from actuator.analysis import Analysis, analyse, never
from actuator.errors import Problem
from actuator.parts import Project
from actuator.project.document import Document
from actuator.project.validate import validate


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class Answer:
    """What :func:`work_out` returns; all that a view gets.

    ``project`` and ``analysis`` are None where the document has problems.
    """

    document: Document
    problems: tuple[Problem, ...]
    project: Project | None
    analysis: Analysis | None


def work_out(
    document: Document,
    previous: Answer | None = None,
    cancelled: Callable[[], bool] = never,
) -> Answer:
    """Validate a document and compute everything it describes.

    Parameters
    ----------
    document : Document
        As loaded or edited.
    previous : Answer, optional
        An earlier answer; sections whose inputs are equal are taken over.
    cancelled : callable, optional
        Asked between sections; true ends the work.

    Returns
    -------
    Answer

    Raises
    ------
    Cancelled
        When ``cancelled()`` became true.
    """
    checked = validate(document)
    if isinstance(checked, Project):
        known = previous.analysis if previous is not None else None
        return Answer(document=document, problems=(), project=checked, analysis=analyse(checked, known, cancelled))
    return Answer(document=document, problems=checked, project=None, analysis=None)
