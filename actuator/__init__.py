"""The model of air cylinders and plant air, and the doors into it.

>>> from actuator import load, work_out
"""

from __future__ import annotations

from typing import TYPE_CHECKING

if TYPE_CHECKING:
    import os
    from collections.abc import Callable

    from actuator.answer import Answer
    from actuator.project.document import Document

__all__ = ["load", "work_out"]


def load(path: str | os.PathLike[str]) -> Document:
    """Open a document, see :func:`actuator.project.document.load`.

    Parameters
    ----------
    path : str or path-like
        TOML file.

    Returns
    -------
    Document
        Opened even where its text is no TOML; :func:`work_out` then names the problem.

    Raises
    ------
    OSError
        Where the file cannot be read.
    """
    from pathlib import Path

    from actuator.project.document import load as load_document

    return load_document(Path(path))


def work_out(document: Document, previous: Answer | None = None, cancelled: Callable[[], bool] | None = None) -> Answer:
    """Validate a document and compute all it describes, see :func:`actuator.answer.work_out`.

    Parameters
    ----------
    document : Document
    previous : Answer, optional
        Sections whose inputs are equal are taken over.
    cancelled : callable, optional
        Asked between sections; true ends the work.

    Returns
    -------
    Answer
        The same object that command line and screens show.

    Raises
    ------
    Cancelled
        When ``cancelled()`` became true.
    """
    from actuator.analysis import never
    from actuator.answer import work_out as compute

    return compute(document, previous, cancelled if cancelled is not None else never)
