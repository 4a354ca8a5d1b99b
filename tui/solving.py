"""From a document to an answer, beside the screen. What is heavy is imported here and nowhere before."""

from __future__ import annotations

import gc
from collections.abc import Callable
from typing import TYPE_CHECKING

from actuator.errors import Cancelled

if TYPE_CHECKING:
    from actuator.answer import Answer
    from actuator.project.document import Document


def solved(document: Document, previous: Answer | None, cancelled: Callable[[], bool]) -> tuple[Answer | None, str]:
    """Work an answer out.

    Parameters
    ----------
    document : Document
    previous : Answer or None
        An earlier answer, whose equal parts are taken over.
    cancelled : callable
        True ends the work.

    Returns
    -------
    tuple of Answer or None, str
        No answer and no text where it was cancelled; no answer and a text where the program itself failed:
        the screens go on, and say so.
    """
    try:
        from actuator.answer import work_out

        answer = work_out(document, previous, cancelled)
        if previous is None:
            gc.freeze()  # what the first answer has loaded stays: later collections need not look through it
        return answer, ""
    except Cancelled:
        return None, ""
    except Exception as fault:
        return None, f"{type(fault).__name__}: {fault}"
